package model_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/frame"
	"offplumb/sim/geom"
	"offplumb/sim/model"
)

// randomRoom gives a room of any shape, with a place for an end of a passage.
func randomRoom(rng *rand.Rand, r, top float64) (room model.Room, inner, outer float64) {
	between := func(lo, hi float64) float64 { return lo + (hi-lo)*rng.Float64() }
	room = model.Room{Shape: model.Shape(rng.IntN(4)), FloorRadius: r}
	switch room.Shape {
	case model.Torus:
		room.FlatFloor = rng.IntN(2) == 0
		room.TubeRadius = between(0.2, 0.5) * (r - top)
		return room, r, r - 2*room.TubeRadius
	case model.Cabin:
		room.Size = [3]float64{between(1, 6), between(1, 6), between(0.2, 0.9) * (r - top)}
		return room, r, r - room.Size[2]
	case model.Sphere:
		return room, r, between(top, 0.9*r)
	}
	room.Length = between(1, 10)
	if rng.IntN(2) == 0 && top > 0 {
		room.CeilingRadius = between(top, r)
	}
	return room, r, math.Max(room.CeilingRadius, top)
}

// randomJoined gives a habitat that is joined to a hub by a passage.
func randomJoined(rng *rand.Rand) model.Model {
	between := func(lo, hi float64) float64 { return lo + (hi-lo)*rng.Float64() }
	hub, from, _ := randomRoom(rng, between(2, 6), 0)
	hub.Name = "hub"
	rim, _, to := randomRoom(rng, between(12, 20), hub.FloorRadius+0.2)
	p := model.Passage{Name: "spoke", Spinward: deg(between(-8, 8)), Axial: between(-0.5, 0.5), FromRadius: from, ToRadius: to + between(-0.05, 0.5)}
	if w := between(0.3, 2.5); rng.IntN(2) == 0 {
		p.Width = w
	} else {
		p.Diameter = w
	}
	if rng.IntN(2) == 0 { // a place well inside, for one at the hull may reach no room where that curves
		p.FromRadius -= between(0, 0.5)
	}
	in := model.Model{Habitat: model.Habitat{Room: rim, Spin: 0.5}, Rooms: []model.Room{hub}, Passages: []model.Passage{p}}
	if rng.IntN(3) == 0 && rim.Shape != model.Cabin {
		in.Decks = []model.Deck{{Name: model.FloorName, Thickness: between(0.02, 0.4)}}
	}
	return in
}

// graze is how deep, as a share of half its width, the checks let something
// reach into the corner of a passage.
const graze = 0.1

// TestJoinedRoomsAreClosed tries rooms of all shapes with passages of all
// sizes: whatever is taken is clear along the passage's middle line, and no walk
// that keeps clear of matter leads out of it.
func TestJoinedRoomsAreClosed(t *testing.T) {
	const seed, tries = 0x0ff91a3b, 2000
	rng := rand.New(rand.NewPCG(seed, 1))
	taken := map[[2]model.Shape]int{}
	for i := range tries {
		in := randomJoined(rng)
		m, problems := model.New(in)
		if len(problems) > 0 {
			continue
		}
		p := &in.Passages[0]
		taken[[2]model.Shape{in.Rooms[0].Shape, in.Habitat.Shape}]++
		phi := p.Spinward.Value
		clear := geom.Passage{Phi: phi, Z: p.Axial, From: p.FromRadius, To: p.ToRadius, Width: math.Max(p.Width, p.Diameter), Round: p.Width == 0}
		half := clear.Width / 2
		for range 300 {
			at := geom.ShaftAt(phi, p.Axial)
			w := p.FromRadius + (p.ToRadius-p.FromRadius)*rng.Float64()
			q := r3.Add(clear.Point(w), r3.Add(r3.Scale(half*(2*rng.Float64()-1), at.Spin), r3.Vec{Z: half * (2*rng.Float64() - 1)}))
			if clear.Holds(q, slack) && (m.Interior.Dist(q) < -graze*half || !m.Interior.Inside(q)) {
				t.Fatalf("PCG(%#x, 1), number %d: %v, in the passage, %g m from the axis, is %g m from free\n%+v", seed, i, q, w, m.Interior.Dist(q), in)
			}
		}
		for range 6 {
			q := frame.Polar{R: p.FromRadius + (p.ToRadius-p.FromRadius)*rng.Float64(), Phi: phi, Z: p.Axial}.Vec()
			for range 150 {
				dir := r3.Vec{X: rng.NormFloat64(), Y: rng.NormFloat64(), Z: rng.NormFloat64()}
				q = r3.Add(q, r3.Scale(rng.Float64()*m.Interior.Dist(q)/r3.Norm(dir), dir))
				if m.Interior.Beyond(q) > 0 || !m.Interior.Inside(q) && m.Interior.Dist(q) > slack {
					t.Fatalf("PCG(%#x, 1), number %d: a walk leads out, to %v, %g m beyond the hull\n%+v", seed, i, q, m.Interior.Beyond(q), in)
				}
			}
		}
	}
	for hub := range model.Cabin + 1 {
		for rim := range model.Cabin + 1 {
			if n := taken[[2]model.Shape{hub, rim}]; n < 5 {
				t.Errorf("only %d pairs of shapes %d and %d", n, hub, rim)
			}
		}
	}
}
