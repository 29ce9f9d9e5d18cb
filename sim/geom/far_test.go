package geom_test

import (
	"math"
	"math/big"
	"testing"

	"offplumb/sim/geom"
)

// farRadius is that of a very large habitat, m: its numbers lie 4.7e-10 m
// apart.
const farRadius = 2.3e6

// precise is how many bits the exact figures are computed with.
const precise = 200

func exact(x float64) *big.Float { return new(big.Float).SetPrec(precise).SetFloat64(x) }

func num() *big.Float { return new(big.Float).SetPrec(precise) }

// exactSin and exactCos sum the Taylor series, whose terms vanish fast for an
// angle of a few radians.
func exactSin(x *big.Float) *big.Float { return taylor(x, x, 1) }

func exactCos(x *big.Float) *big.Float { return taylor(x, exact(1), 0) }

func taylor(x, first *big.Float, power int) *big.Float {
	square := num().Neg(num().Mul(x, x))
	sum, term := num().Set(first), num().Set(first)
	for k := power + 2; k < 120; k += 2 {
		term.Quo(num().Mul(term, square), exact(float64(k*(k-1))))
		sum.Add(sum, term)
	}
	return sum
}

func rounded(x *big.Float) float64 {
	v, _ := x.Float64()
	return v
}

// TestFarFloorGap holds the gap above a floor of that radius against the exact
// one, for places as the numbers have them. math.Hypot multiplies the larger
// side by sqrt(1 + q^2): q, its square, the sum, the root and the product
// round by half an epsilon each, the first three halved by the root: 2.5 half
// epsilons of the radius, 6.4e-10 m. The difference from the floor's radius
// is exact.
func TestFarFloorGap(t *testing.T) {
	rng := random(t, 60)
	b := &geom.Builder{}
	b.AddDeck(whole("floor", farRadius, -100, 100))
	in := b.Build()
	const tol = 2.5 * epsilon / 2 * farRadius
	for range 5000 {
		p := polar(farRadius-decades(rng, 1e-3, 50), between(rng, -math.Pi, math.Pi), between(rng, -50, 50))
		square := num().Add(num().Mul(exact(p.X), exact(p.X)), num().Mul(exact(p.Y), exact(p.Y)))
		want := rounded(num().Sub(exact(farRadius), num().Sqrt(square)))
		if got := in.Dist(p); math.Abs(got-want) > tol {
			t.Fatalf("gap at %v is %.17g m, exactly %.17g: off by %.3g", p, got, want, got-want)
		}
	}
}

// TestFarRimGap does so for the sides of an opening, where angles round. The
// floor left beside it spans an angle from the hole's middle to a turn later.
// In units of epsilon: its ends, up to 3 pi, round by 1 and 4 and take a turn
// that is itself 1 off; its middle rounds by 2 and half its extent by 1; the
// arc tangent by 2, its difference from the middle by 2, and by 1 where a turn
// is taken off. The sum is 14, 7e-9 m at this radius.
func TestFarRimGap(t *testing.T) {
	rng := random(t, 61)
	const tol = 14 * epsilon * farRadius
	for range 100 {
		phi, w := between(rng, -math.Pi, math.Pi), between(rng, 0.5, 3)
		in := hatchway(farRadius, geom.Opening{Name: "hatch", Phi: phi, Z: 0, Spinward: w, Axial: 5})
		half := geom.HalfAngle(w, farRadius)
		for _, sign := range []float64{-1, 1} {
			side := num().Add(exact(phi), exact(sign*half))
			p := polar(farRadius+wall/2, phi+sign*half*between(rng, 0.5, 0.9), 0.1)
			across := num().Sub(num().Mul(exact(p.X), exactSin(side)), num().Mul(exact(p.Y), exactCos(side)))
			want := sign * rounded(across)
			if got := in.Dist(p); math.Abs(got-want) > tol {
				t.Fatalf("hatch at %g: gap at %v is %.17g m, exactly %.17g: off by %.3g", phi, p, got, want, got-want)
			}
		}
	}
}

// TestFarBlockGap does so above a bench. Its middle and the place are numbers
// 4.7e-10 m apart, their difference is exact, and what follows rounds numbers
// of the size of the bench; but its sides are where the rounded middle puts
// them.
func TestFarBlockGap(t *testing.T) {
	spin, up := polar(1, 1.3+math.Pi/2, 0), polar(-1, 1.3, 0)
	bench := &geom.Block{Centre: polar(farRadius-0.45, 1.3, 2), Along: spin, Across: polar(0, 0, 1), Up: up, Half: [3]float64{0.6, 0.35, 0.45}}
	for _, gap := range []float64{1e-3, 0.1, 2} {
		p := polar(farRadius-0.9-gap, 1.3, 2)
		// The middle and p are each off by half a spacing in x and in y.
		if got, tol := bench.Dist(p), math.Sqrt2*2*epsilon*farRadius; math.Abs(got-gap) > tol {
			t.Errorf("gap is %.17g, want %g: off by %.3g", got, gap, got-gap)
		}
	}
}
