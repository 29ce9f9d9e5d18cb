package flight

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/model"
)

// seeded gives a generator with a fixed seed, which a failure prints.
func seeded(t *testing.T, stream uint64) *rand.Rand {
	const seed = 0x0ddba11
	t.Cleanup(func() {
		if t.Failed() {
			t.Logf("random numbers of PCG(%#x, %d)", seed, stream)
		}
	})
	return rand.New(rand.NewPCG(seed, stream))
}

// direction gives a random unit vector.
func direction(rng *rand.Rand) r3.Vec {
	for {
		v := r3.Vec{X: 2*rng.Float64() - 1, Y: 2*rng.Float64() - 1, Z: 2*rng.Float64() - 1}
		if n := r3.Norm(v); n > 0.1 && n < 1 {
			return r3.Scale(1/n, v)
		}
	}
}

// vector gives a random vector of a size from 1e-3 to 1e2.
func vector(rng *rand.Rand) r3.Vec {
	return r3.Scale(math.Pow(10, 5*rng.Float64()-3), direction(rng))
}

// rounding is what a sum of some ten numbers may err by, as a share of the
// greatest.
const rounding = 1e-13

// TestStrikeLaws tries one impulse on random bodies: the rebound has e times
// the speed along the normal; friction is across it, within mu times the normal
// impulse, and brings the contact point to rest at most; the energy, with that
// of the spin, does not grow.
func TestStrikeLaws(t *testing.T) {
	rng := seeded(t, 1)
	for range 20_000 {
		f := &Flier{body: model.Body{Rolls: rng.IntN(2) == 0}, wide: math.Pow(10, 4*rng.Float64()-4)}
		if rng.IntN(20) == 0 {
			f.wide = 0
		}
		e, mu := rng.Float64(), math.Pow(10, 3*rng.Float64()-2)
		if rng.IntN(10) == 0 {
			e = float64(rng.IntN(2))
		}
		if rng.IntN(10) == 0 {
			mu = 0
		}
		n, v, w := direction(rng), vector(rng), r3.Vec{}
		if r3.Dot(v, n) > 0 {
			v = r3.Scale(-1, v)
		}
		if f.rolls(1) {
			w = r3.Scale(1/f.wide, vector(rng))
		}
		into := -r3.Dot(v, n)
		v2, w2 := f.strike(n, v, w, e, mu)
		tol := rounding * (r3.Norm(v) + f.wide*r3.Norm(w))
		if up := r3.Dot(v2, n); math.Abs(up-e*into) > tol {
			t.Fatalf("rebounds with %g m/s from %g, e = %g", up, into, e)
		}
		j := r3.Sub(r3.Sub(v2, v), r3.Scale((1+e)*into, n))
		if size := r3.Norm(j); size > mu*(1+e)*into+tol {
			t.Fatalf("friction impulse %g m/s, mu times the normal one is %g", size, mu*(1+e)*into)
		}
		u, u2 := slipOf(f, v, w, n), slipOf(f, v2, w2, n)
		if r3.Norm(u2) > r3.Norm(u)+tol || r3.Dot(u, u2) < -tol*r3.Norm(u) {
			t.Fatalf("slip %v turns into %v", u, u2)
		}
		if mu*(1+e)*into > r3.Norm(u) && r3.Norm(u2) > 10*tol {
			t.Fatalf("slip %v is not stopped: %v", u, u2)
		}
		if before, after := kinetic(f, v, w), kinetic(f, v2, w2); after > before*(1+rounding)+tol*tol {
			t.Fatalf("energy grows from %g to %g J/kg", before, after)
		}
	}
}

// slipOf is the velocity of the point in contact: that of the centre where the
// body does not roll.
func slipOf(f *Flier, v, w, n r3.Vec) r3.Vec {
	if !f.rolls(1) {
		w = r3.Vec{}
	}
	return f.slipOf(v, w, n)
}

// kinetic is the energy of motion and spin by mass, J/kg.
func kinetic(f *Flier, v, w r3.Vec) float64 {
	e := r3.Norm2(v) / 2
	if f.rolls(1) {
		e += f.wide * f.wide / 5 * r3.Norm2(w)
	}
	return e
}

// contacts makes random contacts that some place of free space can have: their
// normals lie in one half space.
func contacts(rng *rand.Rand) []push {
	up := direction(rng)
	all := make([]push, 1+rng.IntN(6))
	for i := range all {
		n := direction(rng)
		if r3.Dot(n, up) < 0 {
			n = r3.Scale(-1, n)
		}
		if i > 0 && rng.IntN(4) == 0 { // nearly that of another
			n = r3.Unit(r3.Add(all[0].normal, r3.Scale(math.Pow(10, -6*rng.Float64()), n)))
		}
		all[i] = push{normal: n, answer: n, closing: rng.Float64() - 0.3, noise: 1e-9, mu: rng.Float64()}
		if rng.IntN(2) == 0 {
			all[i].closing = 0
		}
	}
	return all
}

// TestPressedLaws tries the choice of contacts on random ones: those chosen
// push, and with their pushes none of the gaps closes. There is such a choice
// but where more than three contacts, or some that hardly differ, share the
// load.
func TestPressedLaws(t *testing.T) {
	rng := seeded(t, 2)
	const cases = 20_000
	none := 0
	for range cases {
		all, pull := contacts(rng), vector(rng)
		idx := pressed(all, pull)
		sub := subset(all, idx)
		if len(sub) > 0 && !balance(sub, pull) {
			t.Fatalf("chooses contacts that cannot be told apart: %v", sub)
		}
		acc := pull
		for i := range sub {
			if sub[i].force < 0 {
				t.Fatalf("contact pulls with %g m/s^2", -sub[i].force)
			}
			acc = r3.Add(acc, r3.Scale(sub[i].force, sub[i].normal))
		}
		closes := false
		for i := range all {
			closes = closes || r3.Dot(all[i].normal, acc)+all[i].closing < -1e-6*(1+r3.Norm(acc))
		}
		if closes && len(idx) > 0 {
			t.Fatalf("a gap closes although %v are chosen", idx)
		}
		if closes {
			none++
		}
	}
	if none > cases/100 {
		t.Errorf("no choice for %d of %d", none, cases)
	}
}

// TestHoldsLaws tries rest on random contacts: what friction holds is held by
// more friction too, never against what pulls away from all contacts, and on
// one surface up to the slope whose tangent is mu.
func TestHoldsLaws(t *testing.T) {
	rng := seeded(t, 3)
	for range 20_000 {
		all, pull := contacts(rng), vector(rng)
		for i := range all {
			all[i].closing = 0 // a body at rest
		}
		on := holds(all, pull)
		away := true
		for i := range all {
			all[i].mu *= 1.5
			away = away && r3.Dot(all[i].normal, pull) > 0
		}
		if on != nil && holds(all, pull) == nil {
			t.Fatalf("more friction does not hold what less does")
		}
		if on != nil && away {
			t.Fatalf("held against a pull away from all contacts")
		}
	}
	n := r3.Vec{Z: 1}
	for _, mu := range []float64{0, 0.1, 0.7, 3} {
		for _, slope := range []float64{mu - 1e-9, mu + 1e-9} {
			all := []push{{normal: n, answer: n, mu: mu}}
			if got := holds(all, r3.Vec{X: slope, Z: -1}) != nil; got != (math.Abs(slope) <= mu) {
				t.Errorf("mu %g: a slope of tangent %.12g held: %v", mu, slope, got)
			}
		}
	}
}
