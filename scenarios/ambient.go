package scenarios

import "offplumb/sim/model"

// mostAmbient is the strongest ambient gravity that is taken, m/s^2: a hundred
// times that of the Earth. No planet or moon has a tenth of it.
const mostAmbient = 100 * model.StandardGravity

// leastAmbient is the weakest, m/s^2: in an hour it moves a body by 6 m.
const leastAmbient = 1e-6

var towardKeys = &section{name: "a direction", doc: "A direction in the inertial frame by its parts along those of the habitat at time 0, of any length.",
	keys: []key{
		num("outward", anything, "away from the axis, at spinward zero").or("0"),
		num("spinward", anything, "spinward, at spinward zero").or("0"),
		num("axial", anything, "toward +axial").or("0"),
	}}

// directions are the words for directions, in the inertial frame: parts
// outward, spinward and axial.
var directions = map[string][3]float64{"+axial": {2: 1}, "-axial": {2: -1}, "outward": {1}, "inward": {-1}, "spinward": {1: 1}, "antispinward": {1: -1}}

// directionKeys are those of where a pull leads.
var directionKeys = []key{
	word("direction", "", "where it leads, fixed in the inertial frame: as the word is meant at spinward zero at time 0",
		"+axial", "-axial", "outward", "inward", "spinward", "antispinward").one("direction"),
	table("toward", towardKeys, "in place of direction, its parts").one("direction"),
}

var uniformPull = &section{name: "a uniform pull", doc: "Gravity of one strength and one direction in the inertial frame.",
	keys: append([]key{
		qty("strength", accel, span{low: leastAmbient, high: mostAmbient}, "of the pull").need(),
	}, directionKeys...), exactly: []string{"direction"}}

var centralPull = &section{name: "a central pull", doc: "Gravity toward a centre that is fixed in the inertial frame, by the inverse square of the distance.",
	keys: append([]key{
		qty("strength", accel, span{low: leastAmbient, high: mostAmbient}, "of the pull at the habitat's origin: on the axis at axial zero").need(),
		qty("distance", length, positive, "from the habitat's origin to the centre, which must stay outside the hull").need(),
	}, directionKeys...), exactly: []string{"direction"}}

var ambientKeys = &section{name: "the ambient gravity", doc: "Gravity that does not come from turning, fixed in the inertial frame: of the planet or moon on which the habitat stands.",
	keys: []key{
		table("uniform", uniformPull, "of one strength and direction everywhere").one("pull"),
		table("central", centralPull, "toward a centre").one("pull"),
	}, exactly: []string{"pull"}}

// ambient reads the ambient gravity.
func (b *builder) ambient(o *object) model.Ambient {
	if o == nil {
		return model.Ambient{}
	}
	pull := o.sub("uniform")
	if pull == nil {
		pull = o.sub("central")
	}
	if pull == nil {
		return model.Ambient{}
	}
	g := model.Ambient{Strength: pull.num("strength"), Distance: pull.num("distance")}
	d, named := directions[pull.str("direction")]
	t := pull.sub("toward")
	if t != nil {
		d = [3]float64{t.num("outward"), t.num("spinward"), t.num("axial")}
	}
	if !g.Lead(d) && t != nil && !named {
		b.fault(t.node.key, t.path, `write toward = { axial = -1 }`, "wants a direction, and all its parts are 0")
	}
	return g
}
