package geom_test

import (
	"math"
	"math/rand/v2"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/geom"
)

// wall is the thickness of hulls, decks and walls in the interiors below, m.
const wall = 0.05

var none = math.NaN()

// whole gives a deck the whole way round.
func whole(name string, r, z0, z1 float64) geom.Deck {
	return geom.Deck{Shell: geom.Shell{Name: name, R0: r, R1: r + wall, Whole: true, Z0: z0, Z1: z1, Restitution: none, Friction: none,
		Inner: name, Outer: name + " underside", Edge: name + " edge"}}
}

// part gives a deck from phi0 to phi1 (rad).
func part(name string, r, phi0, phi1, z0, z1 float64) geom.Deck {
	d := whole(name, r, z0, z1)
	d.Whole, d.Phi0, d.Phi1 = false, phi0, phi1
	return d
}

// world is an interior with what it was made from.
type world struct {
	rooms    []geom.Cylinder
	decks    []geom.Deck
	passages []geom.Passage
	blocks   []*geom.Block
	tori     []geom.Torus
	balls    []geom.Ball
	cabins   []geom.Cabin
	posts    []*geom.Capsule
}

func (w *world) build() *geom.Interior {
	b := &geom.Builder{}
	for _, c := range w.rooms {
		b.AddCylinder(c)
	}
	for _, d := range w.decks {
		b.AddDeck(d)
	}
	for _, p := range w.passages {
		b.AddPassage(p)
	}
	for _, t := range w.tori {
		b.AddTorus(t)
	}
	for _, s := range w.balls {
		b.AddBall(s)
	}
	for _, c := range w.cabins {
		b.AddCabin(c)
	}
	for _, c := range w.posts {
		b.Add(c, b.Surface("rail", none, none))
	}
	for _, k := range w.blocks {
		b.Add(k, blockNames(b)...)
	}
	return b.Build()
}

// blockNames are the surfaces of all blocks in these interiors.
func blockNames(b *geom.Builder) []geom.SurfaceID {
	var ids []geom.SurfaceID
	for _, side := range []string{"top", "underside", "spinward side", "antispinward side", "+axial side", "-axial side"} {
		ids = append(ids, b.Surface("bench "+side, none, none))
	}
	return ids
}

// gallery is a ring room with a ceiling, an inner deck over a part of it with
// one plain hatch, one with a coaming and one closed, hatches in the floor, and
// a bench.
func gallery() *world {
	floor := whole("floor", 18, -7, 7)
	floor.Openings = []geom.Opening{
		{Name: "hold", Phi: 2, Z: 0, Spinward: 1.2, Axial: 0.8},
		{Name: "drain", Phi: 2.5, Z: 0, Spinward: 0.6, Axial: 0.8, Coaming: 0.3},
	}
	upper := part("upper", 15.4, -0.7, 0.9, -6, 7)
	upper.Openings = []geom.Opening{
		{Name: "hatch", Phi: 0.2, Z: 1, Spinward: 0.9, Axial: 1.1},
		{Name: "well", Phi: -0.3, Z: -1, Spinward: 1, Axial: 0.9, Coaming: 0.1},
		{Name: "trap", Phi: 0.5, Z: -3, Spinward: 0.8, Axial: 0.8, Closed: true},
	}
	turn := 0.5
	spin, up := polar(1, 1.2+math.Pi/2, 0), polar(-1, 1.2, 0)
	bench := &geom.Block{Centre: polar(17.55, 1.2, 2), Up: up, Half: [3]float64{0.6, 0.35, 0.45},
		Along:  r3.Add(r3.Scale(math.Cos(turn), spin), r3.Vec{Z: math.Sin(turn)}),
		Across: r3.Add(r3.Scale(-math.Sin(turn), spin), r3.Vec{Z: math.Cos(turn)})}
	return &world{rooms: []geom.Cylinder{{Floor: floor, Ceiling: 12.8, Thickness: wall}},
		decks: []geom.Deck{upper}, blocks: []*geom.Block{bench}}
}

// wheel is a hub and a ring, joined by spokes.
func wheel(spokes int) *world {
	w := &world{}
	hub, ring := whole("hub floor", 3, -5, 5), whole("floor", 18, -7, 7)
	rim := geom.Cylinder{Floor: ring, Ceiling: 12.8, Thickness: wall}
	for i := range spokes {
		p := geom.Passage{Name: "spoke " + string(rune('A'+i)), Phi: 0.4 + 2*math.Pi*float64(i)/float64(spokes), Z: 0.5,
			From: 3, To: 12.8, Width: 1.6, Wall: wall}
		hub.Holes = append(hub.Holes, p.FloorMouth(3))
		rim.Mouths = append(rim.Mouths, p.CeilingMouth(rim.Ceiling, wall))
		w.passages = append(w.passages, p)
	}
	w.rooms = []geom.Cylinder{rim, {Name: "hub", Floor: hub, Thickness: wall}}
	return w
}

// randomDeck gives a deck with an opening in each of six parts of the circle:
// plain, with a coaming, or closed, some of them reaching past its edges.
func randomDeck(rng *rand.Rand, name string, r float64) geom.Deck {
	d := whole(name, r, -between(rng, 4, 7), between(rng, 4, 7))
	if rng.IntN(2) == 0 {
		d.Whole, d.Phi0 = false, between(rng, -math.Pi, math.Pi)
		d.Phi1 = d.Phi0 + between(rng, 0.5, 6.2)
	}
	const parts = 6
	for i := range parts {
		o := geom.Opening{Name: name + " " + string(rune('a'+i)), Z: between(rng, -5, 5), Axial: between(rng, 0.1, 3),
			Phi:      2 * math.Pi * ((float64(i)+between(rng, 0.3, 0.7))/parts + float64(rng.IntN(7)-3)),
			Spinward: between(rng, 0.05, 0.35) * r / parts * 2 * math.Pi}
		if rng.IntN(2) == 0 {
			o.Coaming = between(rng, 0.02, 0.5)
		}
		o.Closed = rng.IntN(3) == 0
		d.Openings = append(d.Openings, o)
	}
	return d
}

// randomWorld gives a ring with a deck in it, both with openings, and a bench
// in any attitude.
func randomWorld(rng *rand.Rand) *world {
	floor := randomDeck(rng, "floor", between(rng, 14, 18))
	floor.Whole = true
	bench := &geom.Block{Centre: polar(between(rng, 11, 16), between(rng, -3, 3), between(rng, -5, 5)), Half: [3]float64{0.6, 0.35, 0.45}}
	bench.Along, bench.Across, bench.Up = attitude(rng)
	return &world{rooms: []geom.Cylinder{{Floor: floor, Ceiling: between(rng, 8, 10), Thickness: wall}},
		decks: []geom.Deck{randomDeck(rng, "upper", between(rng, 11, 13))}, blocks: []*geom.Block{bench}}
}
