package geom_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/geom"
)

// worldsBeside are interiors to move spheres in.
func worldsBeside(rng *rand.Rand) []*geom.Interior {
	out := []*geom.Interior{gallery().build(), wheel(3).build()}
	for range 6 {
		out = append(out, randomWorld(rng).build())
	}
	return out
}

// freePlace gives a place for a sphere of the radius a (m), near something, or
// nothing.
func freePlace(rng *rand.Rand, in *geom.Interior, a float64) (r3.Vec, bool) {
	p := polar(between(rng, 0, 18), between(rng, -3.2, 3.2), between(rng, -6, 6))
	if c := in.Contact(p); rng.IntN(3) > 0 && c.Gap > 0 {
		p = toward(c.Point, a+decades(rng, 1e-5, 1), c.Normal)
	}
	return p, in.Dist(p) > a
}

// TestNothingWithinTimeBeside tries the law of TimeBeside: a sphere that moves
// with an acceleration within the bound meets nothing for that time. And the
// time is no shorter than the way to the nearest solid takes at full speed.
func TestNothingWithinTimeBeside(t *testing.T) {
	rng := random(t, 60)
	const thin = 1e-6
	longer, tried := 0, 0
	for _, in := range worldsBeside(rng) {
		for range 1500 {
			a := decades(rng, 1e-3, 0.5)
			p, ok := freePlace(rng, in, a)
			if !ok {
				continue
			}
			v, acc := r3.Scale(decades(rng, 1e-3, 30), direction(rng)), decades(rng, 1e-3, 30)
			b := &geom.Beside{Wide: a, Thin: thin}
			limit := decades(rng, 1e-3, 10)
			time := in.TimeBeside(p, v, acc, limit, b)
			gap, speed := in.Dist(p)-a, r3.Norm(v)
			plain := math.Min(limit, 2*gap/(speed+math.Sqrt(speed*speed+2*acc*gap)))
			if time > limit || time < plain*(1-1e-12) {
				t.Fatalf("%g s at %v, want %g to %g", time, p, plain, limit)
			}
			tried++
			if time > 2*plain {
				longer++
			}
			push := r3.Scale(acc*rng.Float64(), direction(rng))
			for k := 1.0; k <= 40; k++ {
				u := time * k / 40
				q := r3.Add(p, r3.Add(r3.Scale(u, v), r3.Scale(u*u/2, push)))
				if d := in.DistBeside(q, b) - a; d < -thin {
					t.Fatalf("%g m within something after %g of %g s from %v with %v m/s", -d, u, time, p, v)
				}
			}
		}
	}
	if longer < tried/10 {
		t.Errorf("aims only %d of %d times", longer, tried)
	}
}

// TestRunsKeepsTheFace tries the law of Runs: within that way the nearest point
// of a piece stays on its face.
func TestRunsKeepsTheFace(t *testing.T) {
	rng := random(t, 61)
	known := 0
	for _, in := range worldsBeside(rng) {
		for range 1500 {
			p, ok := freePlace(rng, in, 0)
			if !ok {
				continue
			}
			touch := in.Touching(p, in.Dist(p)+1e-9, nil)
			if len(touch) == 0 {
				continue
			}
			way := in.Runs(p, touch[0].Patch)
			if way == 0 {
				continue
			}
			known++
			i := nearestPiece(in, p)
			solid := in.Pieces()[i].Solid
			_, _, face := solid.Nearest(p)
			for range 10 {
				q := toward(p, math.Min(way, 50)*rng.Float64(), direction(rng))
				if _, _, f := solid.Nearest(q); f != face && clearWay(solid, p, q) {
					t.Fatalf("%T: face %d at %v, %d at %v, %g m away; runs %g m", solid, face, p, f, q, dist(p, q), way)
				}
			}
		}
	}
	if known < 500 {
		t.Errorf("only %d faces known", known)
	}
}

// clearWay says whether the straight way from p to q is out of a solid.
func clearWay(s geom.Solid, p, q r3.Vec) bool {
	u, left := r3.Unit(r3.Sub(q, p)), dist(p, q)
	for left > 0 {
		d := s.Dist(p)
		if d < 1e-9 {
			return false
		}
		p, left = toward(p, math.Min(d, left), u), left-d
	}
	return true
}

func nearestPiece(in *geom.Interior, p r3.Vec) int {
	at, best := -1, math.Inf(1)
	for i, piece := range in.Pieces() {
		if d := piece.Solid.Dist(p); d < best {
			at, best = i, d
		}
	}
	return at
}

// TestTouchingCountsContacts tries how many contacts a sphere has: pieces that
// go on from each other are one, also for a point; the sides of a hole, and a
// wall on a floor, are two.
func TestTouchingCountsContacts(t *testing.T) {
	const r, half = 10.0, 0.4
	d := whole("floor", r, -5, 5)
	d.Openings = []geom.Opening{{Name: "hatch", Spinward: 2 * half, Axial: 2 * half}, {Name: "lid", Phi: 1, Spinward: 1, Axial: 1, Closed: true}}
	b := &geom.Builder{}
	b.AddDeck(d)
	b.Add(&geom.Block{Centre: polar(r-0.5, 2, 0), Along: polar(1, 2+math.Pi/2, 0), Across: r3.Vec{Z: 1}, Up: polar(-1, 2, 0), Half: [3]float64{0.3, 0.3, 0.5}}, blockNames(b)...)
	in := b.Build()
	spin, out := polar(1, 2+math.Pi/2, 0), polar(1, 2, 0) // at the block
	edge := math.Asin(half / r)                           // the spinward side of the hatch
	for _, c := range []struct {
		name string
		p    r3.Vec
		a    float64
		want int
	}{
		{"ball on the floor", polar(r-0.2, 0.5, 0), 0.2, 1},
		{"ball on a seam of bands", polar(r-0.2, 0.5, half), 0.2, 1},
		{"ball on the rim of a lid", polar(r-0.2, 1+math.Asin(0.5/r), 0), 0.2, 1},
		{"point on the rim of a lid", polar(r-1e-9, 1+math.Asin(0.5/r), 0), 0, 1},
		{"point beside a lid", polar(r-1e-9, 1+math.Asin(0.5/r)+1e-10, 0), 0, 1},
		{"ball in a slot between two sides of a hatch", polar(r-math.Sqrt(0.5*0.5-half*half), 0, 0), 0.5, 4},
		{"ball in the corner of a hatch", toward(polar(r+0.02, edge, half-0.2), -0.2, polar(1, edge+math.Pi/2, 0)), 0.2, 2},
		{"ball at the foot of a block", toward(toward(r3.Vec{}, math.Sqrt((r-0.2)*(r-0.2)-0.5*0.5), out), 0.5, spin), 0.2, 2},
		{"point at the foot of a block", toward(polar(r, 2+math.Asin(0.3/r), 0), -1e-9, out), 0, 2},
		{"nothing", polar(r-1, 0.5, 0), 0.2, 0},
	} {
		got := in.Touching(c.p, c.a+2e-8, nil)
		if len(got) != c.want {
			t.Errorf("%s: %d contacts, want %d: %+v", c.name, len(got), c.want, got)
		}
	}
}
