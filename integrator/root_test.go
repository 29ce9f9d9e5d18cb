package integrator_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"offplumb/integrator"
)

// shape is a function that falls through zero once, at the root r of (0, 1).
type shape struct {
	name string
	g    func(t, r float64) float64
}

var shapes = []shape{
	{"straight", func(t, r float64) float64 { return r - t }},
	{"steep", func(t, r float64) float64 { return 1e12 * (r - t) }},
	{"flat", func(t, r float64) float64 { return 1e-200 * (r - t) }},
	{"convex", func(t, r float64) float64 { return (r - t) * (2 + r - t) }},
	{"exponential", func(t, r float64) float64 { return math.Expm1(30 * (r - t)) }},
	{"cubic", func(t, r float64) float64 { return (r - t) * (r - t) * (r - t) }},
	{"root", func(t, r float64) float64 { return math.Cbrt(r - t) }},
	{"jump", func(t, r float64) float64 { return math.Copysign(1, r-t) }},
	{"uneven jump", func(t, r float64) float64 {
		if t < r {
			return 1e-20
		}
		return -1
	}},
	{"uneven jump the other way", func(t, r float64) float64 {
		if t < r {
			return 1
		}
		return -1e-20
	}},
	{"ledge above", func(t, r float64) float64 {
		if t < r && t > r-1e-8 {
			return 1e-20
		}
		return r - t
	}},
	{"ledge below", func(t, r float64) float64 {
		if t > r && t < r+1e-8 {
			return -1e-20
		}
		return r - t
	}},
	{"kink", func(t, r float64) float64 { return max(1e-9*(r-t), r-t) }},
	{"kink the other way", func(t, r float64) float64 { return min(1e-9*(r-t), r-t) }},
}

// TestRootIsBracketed tries rule 2: whatever the shape, the hit is within the
// resolution of the root and before it, at the cost of at most one look more
// than bisection. The step is the whole of [0, 1].
func TestRootIsBracketed(t *testing.T) {
	const seed, n = 23, 500
	res := resolution(1, 1)
	bisection := int(math.Ceil(math.Log2(1 / res)))
	for _, s := range shapes {
		rng := rand.New(rand.NewPCG(seed, 0))
		for range n {
			r := rng.Float64()
			looks := 0
			g := timed(func(t float64) float64 { looks++; return s.g(t, r) })
			hits := allHits(t, tick(t, 0, 1), 1, integrator.EventSpec{Event: g})
			if len(hits) != 1 || !(hits[0].T >= r-res && hits[0].T <= r) {
				t.Fatalf("seed %d: %s: hits %v, want one in [%.17g, %.17g]", seed, s.name, hits, r-res, r)
			}
			if polishing := looks - 3; polishing > bisection+1 { // less the start, and the end twice
				t.Fatalf("seed %d: %s: root %.17g took %d looks, bisection %d", seed, s.name, r, polishing, bisection)
			}
		}
	}
}

// TestRootOfSmoothIsCheap: where the function is smooth, far fewer looks than
// bisection's do. The secant squares the distance, save that the move toward
// the middle, of 0.2 width^2, spoils it: from a width of 1 to 4e-14 in some
// three sections of three looks.
func TestRootOfSmoothIsCheap(t *testing.T) {
	const seed, n = 24, 500
	rng := rand.New(rand.NewPCG(seed, 0))
	total := 0
	for range n {
		r := rng.Float64()
		g := timed(func(t float64) float64 { total++; return math.Sin(r-t) * (2 + t) })
		allHits(t, tick(t, 0, 1), 1, integrator.EventSpec{Event: g})
	}
	if mean := float64(total)/n - 3; mean > 15 {
		t.Errorf("seed %d: %.1f looks for a root, bisection takes 45", seed, mean)
	}
}
