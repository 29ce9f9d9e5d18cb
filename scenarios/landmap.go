package scenarios

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"offplumb/sim/model"
	"offplumb/sim/study"
)

var region = &section{name: "a region", doc: "A patch of a deck, or the tops of boxes.", keys: append(patch[:len(patch):len(patch)],
	texts("fixtures", "the tops of these boxes, turned ones too, in place of a patch; posts and walls have none"))}

// patch are the keys of a patch of a deck.
var patch = []key{
	text("deck", "the deck").or(`"floor"`),
	{name: "spinward", want: wantList, dims: []*dimension{length, angle}, count: 2, span: anything, deflt: "the whole deck", doc: "extent, antispinward end first"},
	lengths("axial", 2, anything, "extent").or("the whole deck"),
}

var goal = &section{name: "a thing to be reached", doc: "An opening, surfaces, or a patch of a deck.",
	keys: append([]key{
		text("name", "its name in tables and figures").or("the opening, the surface, or zone 1, 2 and so on"),
		text("opening", "an opening that a body falls through"),
		texts("surface", "surfaces, of which a body touches one first, or rests on it"),
	}, patch...)}

var landingMap = &section{name: "a landing map", doc: "Where a body lands that is let go anywhere over a region, and from where it can reach an opening or a place.",
	keys: []key{
		title(),
		text("body", "name of the body").or("a point, without drag"),
		table("over", region, "where it is let go").need(),
		{name: "heights", want: wantList, dims: []*dimension{length}, span: anything, required: true, doc: "where it is let go: of its centre above the deck, or above the tops of the fixtures"},
		qty("speed", speed, notNegative, "of a careless hand, in all directions; at 0 m/s it is dropped").or(`"0 m/s"`),
		{name: "directions", want: wantInteger, span: span{low: 12, high: model.MostDirections}, deflt: fmt.Sprint(model.DefaultDirections),
			doc: "how many directions: 12, 42, 92, 162, 252, 362, 492, 642, 812 or 1002, spread evenly"},
		qty("step", length, positive, "between the places").need(),
		qty("cell", length, positive, "of the map: the side of its squares").need(),
		word("until", `"landing"`, `when a flight is done; with "rest", what it does after its landing counts too: openings, impacts, resting places`, "landing", "rest"),
		tables("reaches", goal, "from where these are reached").or("nothing"),
	}}

func (b *builder) landingMap(o *object) model.LandingMap {
	l := model.LandingMap{Name: o.str("name"), Body: o.str("body"), Speed: o.num("speed"), Directions: 1,
		Step: o.num("step"), Cell: o.num("cell"), Until: model.UntilLanding}
	if o.str("until") == "rest" {
		l.Until = model.UntilRest
	}
	if over := o.sub("over"); over != nil {
		l.Over = b.region(over)
	}
	for _, q := range o.list("heights") {
		l.Heights = append(l.Heights, q.si)
	}
	if l.Speed > 0 {
		l.Directions = int(o.numOr("directions", model.DefaultDirections))
		b.directions(o, l.Directions)
	} else if !o.has("speed") || o.vals["speed"] != nil {
		b.refuses(o, "what is dropped has no direction: wants a speed above 0", "directions")
	}
	for i, g := range o.subs("reaches") {
		l.Goals = append(l.Goals, b.goal(i, g))
	}
	return l
}

// directions refuses a number of directions that cannot be spread evenly.
func (b *builder) directions(o *object, n int) {
	if o.vals["directions"] == nil || slices.Contains(study.DirectionCounts(), n) {
		return
	}
	best := 0
	for _, k := range study.DirectionCounts() {
		if math.Abs(float64(k-n)) < math.Abs(float64(best-n)) {
			best = k
		}
	}
	words := strings.Trim(strings.ReplaceAll(fmt.Sprint(study.DirectionCounts()), " ", ", "), "[]")
	b.fault(o.at("directions"), join(o.path, "directions"), fmt.Sprintf("the nearest is %d", best), "wants one of %s, got %d", words, n)
}

func (b *builder) region(o *object) model.Region {
	r := model.Region{Deck: o.str("deck"), Fixtures: o.texts("fixtures"), HasFixtures: o.has("fixtures")}
	if r.HasFixtures {
		b.refuses(o, "the tops of fixtures stand in place of a patch", "deck", "spinward", "axial")
	}
	if list := o.list("spinward"); list != nil && b.likeFirst(o, "spinward", 1, list) {
		r.Spinward = &[2]model.Arc{{Value: list[0].si, IsAngle: list[0].dim == angle}, {Value: list[1].si, IsAngle: list[1].dim == angle}}
	}
	if list := o.list("axial"); list != nil {
		r.Axial = &[2]float64{list[0].si, list[1].si}
	}
	return r
}

func (b *builder) goal(i int, o *object) model.Goal {
	g := model.Goal{Name: o.str("name"), Opening: o.str("opening"), Surfaces: o.texts("surface")}
	zone := o.has("deck") || o.has("spinward") || o.has("axial")
	kinds := 0
	for _, is := range []bool{o.has("opening"), o.has("surface"), zone} {
		if is {
			kinds++
		}
	}
	if kinds != 1 {
		b.fault(o.node.key, o.path, `such as { opening = "hatch" } or { deck = "floor", spinward = ["1 m", "2 m"], axial = ["0 m", "1 m"] }`, "wants one of an opening, a surface, or a patch of a deck")
		return g
	}
	if zone {
		r := b.region(o)
		g.Zone = &r
	}
	switch {
	case o.has("name"):
		if why := nameFault(g.Name); why != "" {
			b.fault(o.at("name"), join(o.path, "name"), "", "%s", why)
		}
	case g.Opening != "":
		g.Name = g.Opening
	case len(g.Surfaces) > 0:
		g.Name = strings.Join(g.Surfaces, ", ")
	default:
		g.Name = fmt.Sprintf("zone %d", i+1)
	}
	return g
}
