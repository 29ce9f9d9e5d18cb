package geom_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/geom"
)

// shaftAxes gives the outward and the spinward direction of a passage.
func shaftAxes(p *geom.Passage) (out, spin r3.Vec) {
	return polar(1, p.Phi, 0), polar(1, p.Phi+math.Pi/2, 0)
}

// TestPassageClear moves down each shaft along lines beside its middle, out to
// 0.99 of half its width either way: from the end of the hub's floor to the
// ring's ceiling the nearest matter is always a wall, at its true distance.
func TestPassageClear(t *testing.T) {
	w := wheel(3)
	in := w.build()
	for _, p := range w.passages {
		out, spin := shaftAxes(&p)
		h := p.Width / 2
		x0 := math.Sqrt(p.From*p.From - h*h)
		for _, u := range []float64{-0.99, -0.5, 0, 0.5, 0.99} {
			for _, v := range []float64{-0.99, -0.5, 0, 0.5, 0.99} {
				for x := x0; x <= p.To; x += 0.005 {
					q := r3.Add(r3.Add(r3.Scale(x, out), r3.Scale(u*h, spin)), r3.Vec{Z: p.Z + v*h})
					want := h - h*math.Max(math.Abs(u), math.Abs(v))
					if d := in.Dist(q); math.Abs(d-want) > slack(worldSize) {
						t.Fatalf("%s, %g m out, %g and %g of the half width aside: Dist is %g m, want %g", p.Name, x, u, v, d, want)
					}
				}
			}
		}
	}
}

// TestPassageMouths goes on along the same lines into the rooms at both ends:
// there is no lip and no phantom wall, nothing is nearer than the ends of the
// walls, which lie behind, or than the hub's floor.
func TestPassageMouths(t *testing.T) {
	w := wheel(3)
	in := w.build()
	for _, p := range w.passages {
		out, spin := shaftAxes(&p)
		h := p.Width / 2
		x0 := math.Sqrt(p.From*p.From - h*h)
		for _, u := range []float64{-0.99, 0, 0.6, 0.99} {
			for _, v := range []float64{-0.99, 0, 0.6, 0.99} {
				aside := r3.Add(r3.Scale(u*h, spin), r3.Vec{Z: p.Z + v*h})
				for past := 0.0; past <= 1; past += 0.005 {
					ends := math.Hypot(h-h*math.Max(math.Abs(u), math.Abs(v)), past)
					floor := p.From - math.Hypot(x0-past, u*h)
					if d := in.Dist(toward(aside, x0-past, out)); d < math.Min(ends, floor)-slack(worldSize) {
						t.Fatalf("%s, %g m into the hub, %g and %g of the half width aside: Dist is %g m, want %g", p.Name, past, u, v, d, math.Min(ends, floor))
					}
					if d := in.Dist(toward(aside, p.To+past, out)); d < ends-slack(worldSize) {
						t.Fatalf("%s, %g m into the ring, %g and %g of the half width aside: Dist is %g m, want %g", p.Name, past, u, v, d, ends)
					}
				}
			}
		}
	}
}

// TestHullClosed tries that at the depth of the hub's floor and of the ring's
// ceiling there is matter everywhere but within the shafts: no slit is left
// between a mouth and the walls.
func TestHullClosed(t *testing.T) {
	for i, w := range []*world{wheel(3), wide()} {
		in := w.build()
		rng := random(t, 80+uint64(i))
		for range 40000 {
			r := between(rng, 3, 3+wall)
			if rng.IntN(2) == 0 {
				r = between(rng, 12.8-wall, 12.8)
			}
			p := w.passages[rng.IntN(len(w.passages))]
			h := p.Width / 2
			q := polar(r, p.Phi+geom.HalfAngle(p.Width, r)*between(rng, -1.2, 1.2), p.Z+h*between(rng, -1.2, 1.2))
			across, _ := alongShaft(&p, q)
			if d := in.Dist(q); across > h && d > slack(worldSize) || across < h && d <= -slack(worldSize) {
				t.Fatalf("world %d: %g m from the axis, %g m beside the middle of a shaft %g m wide: Dist %g", i, r, across, p.Width, d)
			}
		}
	}
}
