package geom_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/geom"
)

// spun gives a way that bends all the time: from p with the velocity v, under
// an acceleration of the size acc that turns at a rate.
func spun(p, v, along, across r3.Vec, acc, rate float64) func(t float64) r3.Vec {
	return func(t float64) r3.Vec {
		// The double integral of acc (cos(rate t) along + sin(rate t) across).
		a := (1 - math.Cos(rate*t)) / (rate * rate)
		b := (rate*t - math.Sin(rate*t)) / (rate * rate)
		move := r3.Add(r3.Scale(acc*a, along), r3.Scale(acc*b, across))
		return r3.Add(p, r3.Add(r3.Scale(t, v), move))
	}
}

// TestPromisesHold tries what TimeBeside, forward and backward, and TimeWithin
// promise, on ways of which the acceleration is as great as they are told all
// the time, whatever its direction: the promised time passes without a touch of
// more than thin.
func TestPromisesHold(t *testing.T) {
	const thin, looks, ways = 1e-6, 40, 4000
	b := &geom.Builder{}
	b.AddCylinder(geom.Cylinder{Floor: geom.Deck{Shell: geom.Shell{Name: "floor", R0: 8, R1: 8.05, Whole: true, Z0: -5, Z1: 5,
		Restitution: math.NaN(), Friction: math.NaN(), Inner: "floor", Outer: "outside", Edge: "edge"}}, Ceiling: 2, Thickness: 0.05})
	id := b.Surface("box", math.NaN(), math.NaN())
	b.Add(&geom.Block{Centre: r3.Vec{X: 6, Y: 1}, Along: r3.Vec{X: 1}, Across: r3.Vec{Y: 1}, Up: r3.Vec{Z: 1}, Half: [3]float64{0.5, 0.4, 1}}, id, id, id, id, id, id)
	in := b.Build()
	rng := random(t, 31)
	unit := func() r3.Vec {
		return r3.Unit(r3.Vec{X: rng.NormFloat64(), Y: rng.NormFloat64(), Z: rng.NormFloat64()})
	}
	told := 0
	for range ways {
		p := r3.Vec{X: 16 * (rng.Float64() - 0.5), Y: 16 * (rng.Float64() - 0.5), Z: 10 * (rng.Float64() - 0.5)}
		watch := geom.Beside{Wide: 0.1 * rng.Float64(), Thin: thin, Back: rng.IntN(2) == 0}
		if !in.Inside(p) || in.Dist(p) <= watch.Wide {
			continue
		}
		if rng.IntN(2) == 0 { // down to a touch
			c := in.Contact(p)
			p = r3.Add(p, r3.Scale(watch.Wide-c.Gap+1e-9, c.Normal))
		}
		v, along := r3.Scale(8*rng.Float64(), unit()), unit()
		across := r3.Unit(r3.Cross(along, unit()))
		acc, limit := 12*rng.Float64()*float64(rng.IntN(2)), 0.1+2*rng.Float64()
		way := spun(p, v, along, across, acc, 0.1+4*rng.Float64())
		clear := in.TimeBeside(p, v, acc, limit, &watch)
		within := in.TimeWithin(p, v, acc, limit, thin)
		if clear > limit || within > limit {
			t.Fatalf("promises %g s and %g s of %g s", clear, within, limit)
		}
		if clear > 0.02 {
			told++
		}
		for k := 1; k <= looks; k++ {
			share := float64(k) / looks
			if d := in.Dist(way(share * clear)); d < watch.Wide-2*thin {
				t.Fatalf("from %v at %v, acceleration %g: %g m deep after %g s of %g s promised (back: %v)", p, v, acc, watch.Wide-d, share*clear, clear, watch.Back)
			}
			if d := in.Beyond(way(share * within)); d > 2*thin {
				t.Fatalf("from %v at %v, acceleration %g: %g m beyond the hull after %g s of %g s promised", p, v, acc, d, share*within, within)
			}
		}
	}
	if told < ways/8 {
		t.Errorf("only %d promises are worth their name", told)
	}
}
