package geom_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/geom"
)

// least gives the least distance along a straight line from a to b, between
// points this far apart (m): the true least is lower by half of it at most.
func least(in *geom.Interior, a, b r3.Vec, step float64) float64 {
	n := cells(dist(a, b), step)
	low := math.Inf(1)
	for i := range n + 1 {
		u := float64(i) / float64(n)
		low = math.Min(low, in.Dist(r3.Add(r3.Scale(1-u, a), r3.Scale(u, b))))
	}
	return low
}

// stepOf is how close the places along a middle line are tried, as a share of
// the width: a tenth of what 0.99 of the width leaves free on each side.
const stepOf = 0.01 / 2 / 10

// hatchway is a floor with one opening.
func hatchway(r float64, o geom.Opening) *geom.Interior {
	d := whole("floor", r, -20, 20)
	d.Openings = []geom.Opening{o}
	b := &geom.Builder{}
	b.AddDeck(d)
	return b.Build()
}

// TestOpeningPasses moves spheres of 0.99 and 1.01 times an opening's width
// through it along its middle line, which is a radius: the one keeps clear,
// the other touches. The distance along the middle line is least just at the
// rim, where it is half the width.
func TestOpeningPasses(t *testing.T) {
	for _, r := range []float64{2, 18, 224, 894} {
		for _, coaming := range []float64{0, 0.1, 0.6} {
			for _, size := range [][2]float64{{0.9, 0.9}, {0.7, 2}, {2, 0.7}, {0.06, 0.08}} {
				in := hatchway(r, geom.Opening{Name: "hatch", Phi: 2.7, Z: 1.5, Spinward: size[0], Axial: size[1], Coaming: coaming})
				w := math.Min(size[0], size[1])
				low := least(in, polar(r-1, 2.7, 1.5), polar(r+1, 2.7, 1.5), stepOf*w)
				if low-stepOf*w/2 <= 0.99*w/2 {
					t.Errorf("r %g, coaming %g, %v: a sphere of 0.99 the width comes within %g m of it", r, coaming, size, low-0.99*w/2)
				}
				if low >= 1.01*w/2 {
					t.Errorf("r %g, coaming %g, %v: a sphere of 1.01 the width passes, %g m clear", r, coaming, size, low-1.01*w/2)
				}
			}
		}
	}
}

// TestOpeningWidth tries that the clear width is that between the sides at
// the deck's surface, and between the tops of a coaming, to rounding.
func TestOpeningWidth(t *testing.T) {
	for _, coaming := range []float64{0, 0.1} {
		const r, phi, z, w = 18.0, 1.1, 0.5, 0.9
		in := hatchway(r, geom.Opening{Name: "hatch", Phi: phi, Z: z, Spinward: w, Axial: 3, Coaming: coaming})
		// Beside the top corner, on the line across the opening through both.
		top := r - coaming
		mid := polar(math.Sqrt(top*top-w*w/4), phi, z)
		if d := in.Dist(mid); math.Abs(d-w/2) > slack(r) {
			t.Errorf("coaming %g: half the clear width is %.17g m, want %g", coaming, d, w/2)
		}
	}
}

func TestHalfAngle(t *testing.T) {
	for _, c := range []struct{ w, r, want float64 }{
		{1, 1, math.Pi / 6}, {math.Sqrt2, 1, math.Pi / 4}, {2, 1, math.Pi / 2}, {5, 1, math.Pi / 2},
		{0.02, 1e6, 1e-8}, // asin x = x (1 + x^2/6 ...): equal to rounding
	} {
		if got := geom.HalfAngle(c.w, c.r); math.Abs(got-c.want) > 4*epsilon*c.want {
			t.Errorf("HalfAngle(%g, %g) = %.17g, want %.17g", c.w, c.r, got, c.want)
		}
	}
}

// TestOpeningClosed tries that nothing passes a closed opening, with and
// without a coaming: its lid is level with the deck and fits without a gap.
func TestOpeningClosed(t *testing.T) {
	for _, coaming := range []float64{0, 0.1} {
		const r, phi, z, w = 18.0, 2.7, 1.5, 0.9
		in := hatchway(r, geom.Opening{Name: "hatch", Phi: phi, Z: z, Spinward: w, Axial: w, Coaming: coaming, Closed: true})
		if low := least(in, polar(r-1, phi, z), polar(r+1, phi, z), stepOf*w); low > -wall/2+stepOf*w {
			t.Errorf("coaming %g: the middle line is free to %g m", coaming, low)
		}
		half := geom.HalfAngle(w, r)
		for i := -24; i <= 24; i++ {
			for j := -24; j <= 24; j++ {
				p := polar(r+wall/2, phi+half*float64(i)/20, z+w/2*float64(j)/20)
				if d := in.Dist(p); d > slack(r) {
					t.Errorf("coaming %g: a gap of %g m at %v", coaming, d, p)
				}
			}
		}
		if d := in.Dist(polar(r-0.01, phi, z)); math.Abs(d-0.01) > slack(r) {
			t.Errorf("coaming %g: 10 mm above the deck the lid is %g m away", coaming, d)
		}
	}
}

// TestOpeningLeavesDeck tries that the deck beside an opening is as deep as
// elsewhere: no seam of the pieces around it shows.
func TestOpeningLeavesDeck(t *testing.T) {
	rng := random(t, 30)
	in := gallery().build()
	for range 20000 {
		p := polar(between(rng, 17.5, 18), between(rng, -math.Pi, math.Pi), between(rng, -6.4, 6.4))
		near := math.Abs(turnFrom(2.2, p)) < 0.5 && math.Abs(p.Z) < 1.5 || math.Abs(turnFrom(1.2, p)) < 0.2 && math.Abs(p.Z-2) < 1.7
		if want := 18 - math.Hypot(p.X, p.Y); !near && math.Abs(in.Dist(p)-want) > slack(worldSize) {
			t.Fatalf("%g m above the floor at %v Dist is %g", want, p, in.Dist(p))
		}
	}
}
