package scenarios

import (
	"slices"

	"offplumb/sim/model"
)

func (b *builder) people(o *object) {
	for _, c := range o.subs("crew") {
		b.in.Crews = append(b.in.Crews, model.Crew{Name: c.str("name"), Mass: c.num("mass"), Stature: c.num("stature"),
			Breadth: c.numOr("breadth", model.DefaultBreadth), Waist: c.numOr("waist", model.WaistShare), Head: c.numOr("head", model.HeadShare)})
	}
	for _, p := range o.subs("crew_path") {
		path := model.Path{Name: p.str("name"), Crew: p.str("crew"), Start: b.station(p.sub("start")), Time: p.num("time"), Carry: carryOf(p.sub("carry"))}
		for _, q := range p.list("gravity_levels") {
			path.GravityLevels = append(path.GravityLevels, q.si)
		}
		for _, l := range p.subs("legs") {
			path.Legs = append(path.Legs, b.leg(l))
		}
		b.in.Paths = append(b.in.Paths, path)
	}
}

// carriedHeight is where a load is held that says no place, m above the feet.
const carriedHeight = 1

func carryOf(o *object) model.Carry {
	c := model.Carry{Mass: o.num("mass"), At: model.Reach{Height: carriedHeight}}
	if o.has("at") {
		c.At = reachOf(o.sub("at"))
	}
	return c
}

var facings = map[string]model.Direction{"spinward": model.Spinward, "antispinward": model.Antispinward,
	"+axial": model.PlusAxial, "-axial": model.MinusAxial}

var headAxes = map[string]model.Axis{"vertical": model.AboutVertical, "spinward": model.AboutSpinward, "axial": model.AboutAxial}

// defaultTurn is how long a turn of the head takes, s.
const defaultTurn = 1

// legKind is a kind of leg: the word for errors, what it must have, and what
// it may have, beside the key that it is named by.
type legKind struct {
	key, word string
	kind      model.LegKind
	wants     []string
	takes     []string
}

var legKinds = []legKind{
	{"walk", "a walk", model.Walk, []string{"speed"}, []string{"ramp", "profile"}},
	{"climb", "a climb", model.Climb, []string{"speed"}, []string{"ramp", "profile", "facing", "pitch", "head_first", "through"}},
	{"descend", "a descent", model.Descend, []string{"speed"}, []string{"ramp", "profile", "facing", "pitch", "head_first", "through"}},
	{"ride", "a ride", model.Ride, []string{"speed"}, []string{"ramp", "profile"}},
	{"stand_up", "standing up", model.StandUp, nil, []string{"speed", "ramp", "profile"}},
	{"sit_down", "sitting down", model.SitDown, nil, []string{"speed", "ramp", "profile"}},
	{"turn_head", "a turn of the head", model.TurnHead, nil, []string{"over", "about"}},
	{"turn", "a turn", model.Turn, nil, []string{"over"}},
	{"stand", "standing", model.Stand, nil, nil},
}

// legDetails are the keys that some kinds of legs take.
var legDetails = []string{"speed", "ramp", "profile", "facing", "pitch", "head_first", "through", "over", "about"}

func (b *builder) leg(o *object) model.Leg {
	for i := range legKinds {
		if k := &legKinds[i]; o.has(k.key) {
			b.wants(o, k.word, k.wants...)
			for _, other := range legDetails {
				if !slices.Contains(k.wants, other) && !slices.Contains(k.takes, other) {
					b.refuses(o, k.word+" has none", other)
				}
			}
			return b.legOf(o, k)
		}
	}
	return model.Leg{}
}

func (b *builder) legOf(o *object, k *legKind) model.Leg {
	l := model.Leg{Kind: k.kind, Speed: o.num("speed"), Ramp: o.numOr("ramp", model.DefaultRamp), Facing: facings[o.str("facing")],
		About: headAxes[o.str("about")], Pitch: o.num("pitch"), HeadFirst: o.flag("head_first"), Through: o.str("through"),
		Trapezoid: o.str("profile") == "trapezoid"}
	switch k.kind {
	case model.Walk:
		b.walk(&l, o.sub("walk"))
	case model.Ride:
		b.ride(&l, o)
	case model.StandUp, model.SitDown:
		l.Distance, l.Speed, l.Ramp = o.num(k.key), o.numOr("speed", model.DefaultRise), o.numOr("ramp", model.DefaultRiseRamp)
	case model.TurnHead, model.Turn:
		l.Angle, l.Duration = o.num(k.key), o.numOr("over", defaultTurn)
	case model.Stand:
		l.Duration = o.num(k.key)
	default:
		l.Distance = o.num(k.key)
	}
	return l
}

func (b *builder) ride(l *model.Leg, o *object) {
	r := o.sub("ride")
	l.Trapezoid = o.str("profile") != "smooth"
	l.Up = r.num("up")
	if r.has("spinward") {
		a := r.arc("spinward")
		l.Round = &a
	}
}

func (b *builder) walk(l *model.Leg, o *object) {
	if o == nil {
		return
	}
	if o.has("spinward") {
		a := o.arc("spinward")
		l.Spinward = &a
	}
	if o.has("axial") {
		z := o.num("axial")
		l.Axial = &z
	}
	l.Laps = o.num("laps")
	if len(o.node.names) == 0 {
		b.fault(o.node.at, o.path, "", "a walk wants where to: spinward, laps or axial")
	}
}
