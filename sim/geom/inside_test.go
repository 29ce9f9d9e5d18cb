package geom_test

import (
	"math"
	"testing"

	"offplumb/sim/geom"
)

// inRoom says whether p lies between the ceiling and the floor of a room and
// between its bulkheads.
func inRoom(c *geom.Cylinder, r, z float64) bool {
	return r > c.Ceiling && r < c.Floor.R0 && z > c.Floor.Z0 && z < c.Floor.Z1
}

// wide is a hub with a passage that is two thirds as wide as the hub.
func wide() *world {
	w := wheel(1)
	p := &w.passages[0]
	p.Width = 4
	w.rooms[1].Floor.Holes[0] = p.FloorMouth(3)
	w.rooms[0].Mouths[0] = p.CeilingMouth(12.8, wall)
	return w
}

// TestInside tries that all of the rooms and all of the passages are inside
// and not beyond the hull, and that what is neither nor in a wall is not.
func TestInside(t *testing.T) {
	for i, w := range []*world{gallery(), wheel(3), wide()} {
		in := w.build()
		rng := random(t, 50+uint64(i))
		edges := coverPieces(in, 5).edges
		for range 40000 {
			p := somewhere(rng, edges)
			r := math.Hypot(p.X, p.Y)
			within := false
			for k := range w.rooms {
				within = within || inRoom(&w.rooms[k], r, p.Z)
			}
			for k := range w.passages {
				across, along := alongShaft(&w.passages[k], p)
				s := &w.passages[k]
				h := s.Width / 2
				within = within || across < h && along > math.Sqrt(s.From*s.From-h*h) && along < s.To
			}
			if within && !in.Inside(p) {
				t.Fatalf("world %d: %v, %g m from the axis, is not inside", i, p, r)
			}
			if within && in.Beyond(p) > 0 {
				t.Fatalf("world %d: %v, %g m from the axis, is %g m beyond the hull", i, p, r, in.Beyond(p))
			}
			if !within && in.Inside(p) && in.Dist(p) > slack(worldSize) && !inFloorHole(w, r) {
				t.Fatalf("world %d: %v, %g m from the axis, is inside, %g m from matter", i, p, r, in.Dist(p))
			}
		}
	}
}

// inFloorHole says whether a place is at the depth of a floor: in a hatch of
// it, which counts as inside.
func inFloorHole(w *world, r float64) bool {
	for i := range w.rooms {
		if f := &w.rooms[i].Floor; r >= f.R0 && r <= f.R1 {
			return true
		}
	}
	return false
}

// TestBeyond holds Beyond against what is plain to see of a ring room: a hull
// from 12.75 m to 18.05 m from the axis, 14.1 m long.
func TestBeyond(t *testing.T) {
	in := gallery().build()
	for _, c := range []struct{ r, z, want float64 }{
		{15.4, 0, -2.65}, {18.05, 0, 0}, {19, 0, 0.95}, {18, 0, -0.05}, {15, 7.05, 0}, {15, -8, 0.95}, {15, 6, -1.05}, {12.75, 0, 0}, {12, 1, 0.75}, {13, 6.9, -0.15},
	} {
		if got := in.Beyond(polar(c.r, 2.2, c.z)); math.Abs(got-c.want) > slack(worldSize) {
			t.Errorf("r %g, z %g: %g m beyond the hull, want %g", c.r, c.z, got, c.want)
		}
	}
}

// TestNoWayOut follows random walks that keep clear of all matter: from inside
// a closed hull none leads out.
func TestNoWayOut(t *testing.T) {
	wheel3, wideHub := wheel(3).build(), wide().build()
	rng := random(t, 55)
	for i := range 400 {
		in := []*geom.Interior{wheel3, wideHub}[i%2]
		p := polar(15, between(rng, -math.Pi, math.Pi), between(rng, -6, 6))
		if rng.IntN(2) == 0 {
			p = polar(1, between(rng, -math.Pi, math.Pi), between(rng, -4, 4))
		}
		for range 300 {
			p = toward(p, between(rng, 0, 1)*in.Dist(p), direction(rng))
			if in.Beyond(p) > 0 {
				t.Fatalf("a walk in free space led %g m beyond the hull, to %v", in.Beyond(p), p)
			}
		}
	}
}
