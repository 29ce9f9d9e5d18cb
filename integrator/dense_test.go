package integrator_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"offplumb/integrator"
	"offplumb/integrator/odetest"
)

// eachStep gives every step of a usual run of every problem.
func eachStep(t *testing.T, tol float64, do func(p odetest.Problem, s *integrator.Step)) {
	t.Helper()
	for _, p := range odetest.All() {
		st := newStepper(t, p, tight(tol))
		st.Reset(p.T0, p.Y0)
		mustSolve(t, st, p.TEnd, nil, func(s *integrator.Step, _ []integrator.Hit) error {
			do(p, s)
			return nil
		})
	}
}

// norm is the Euclidean norm of some components.
func norm(y []float64) float64 {
	sum := 0.0
	for _, v := range y {
		sum += v * v
	}
	return math.Sqrt(sum)
}

// TestStepMeetsItsEnds tries the law of doc.go, bit for bit, and that a step
// starts where the last one ended.
func TestStepMeetsItsEnds(t *testing.T) {
	var end []float64
	endT, of := 0.0, ""
	eachStep(t, 1e-6, func(p odetest.Problem, s *integrator.Step) {
		y := make([]float64, p.Dim())
		if s.At(s.T0, y); !sameBits(y, s.Y0) {
			t.Errorf("%s: At(%g) is %v, Y0 is %v", p.Name, s.T0, y, s.Y0)
		}
		if s.At(s.T1, y); !sameBits(y, s.Y1) {
			t.Errorf("%s: At(%g) is %v, Y1 is %v", p.Name, s.T1, y, s.Y1)
		}
		if of == p.Name && (s.T0 != endT || !sameBits(end, s.Y0)) {
			t.Errorf("%s: a step starts at %g, the last one ended at %g", p.Name, s.T0, endT)
		}
		of, endT, end = p.Name, s.T1, append(end[:0], s.Y1...)
	})
}

// TestStepMeetsItsEndsAtZero: the law holds for the sign of a zero too.
func TestStepMeetsItsEndsAtZero(t *testing.T) {
	zero := math.Copysign(0, -1)
	st := newStepper(t, drift(), loose())
	st.Reset(0, []float64{zero, 1}, integrator.FirstStep(1))
	s, err := st.Step(1)
	if err != nil {
		t.Fatal(err)
	}
	y := make([]float64, 2)
	if s.At(0, y); !sameBits(y, s.Y0) {
		t.Errorf("At(0) is %v, Y0 is %v", y, s.Y0)
	}
}

// TestRateAtEnds: at the ends of a step the rate is the derivative there. The
// coefficients of P are up to 36 for a stage, and some ten terms are rounded.
func TestRateAtEnds(t *testing.T) {
	eachStep(t, 1e-6, func(p odetest.Problem, s *integrator.Step) {
		n := p.Dim()
		rate, want := make([]float64, n), make([]float64, n)
		for _, end := range []struct {
			t float64
			y []float64
		}{{s.T0, s.Y0}, {s.T1, s.Y1}} {
			s.Rate(end.t, rate)
			p.Deriv(end.t, end.y, want)
			most := max(s.MaxRate(0, n), norm(want))
			if miss := distance(rate, want); miss > 10*36*epsilon*most {
				t.Errorf("%s: rate at %g misses by %g of %g", p.Name, end.t, miss, most)
			}
		}
	})
}

// TestRateIsSlope holds Rate against the differences of At.
func TestRateIsSlope(t *testing.T) {
	eachStep(t, 1e-3, func(p odetest.Problem, s *integrator.Step) {
		n := p.Dim()
		a, b, rate := make([]float64, n), make([]float64, n), make([]float64, n)
		h := s.T1 - s.T0
		for _, theta := range []float64{0.2, 0.5, 0.9} {
			mid, d := s.T0+theta*h, 1e-4*h
			s.At(mid-d, a)
			s.At(mid+d, b)
			s.Rate(mid, rate)
			// the third derivative is at most 24/h^2 of the second's and first's
			// greatest; the rounding of the states, and of t, over d
			tol := 24*1e-8*(s.MaxRate(0, n)+h*s.MaxAccel(0, n)) +
				10*epsilon*(norm(s.Y0)+norm(s.Y1)+s.MaxRate(0, n)*s.T1)/d
			for i := range n {
				if slope := (b[i] - a[i]) / (2 * d); math.Abs(slope-rate[i]) > tol {
					t.Errorf("%s at %g: component %d has rate %g, slope %g", p.Name, mid, i, rate[i], slope)
				}
			}
		}
	})
}

// TestMaxRateAndMaxAccel tries the law that no sample exceeds the bounds, for
// random ranges of components.
func TestMaxRateAndMaxAccel(t *testing.T) {
	const seed = 41
	rng := rand.New(rand.NewPCG(seed, 0))
	eachStep(t, 1e-3, func(p odetest.Problem, s *integrator.Step) {
		n := p.Dim()
		from := rng.IntN(n)
		to := from + 1 + rng.IntN(n-from)
		rate, accel := s.MaxRate(from, to), s.MaxAccel(from, to)
		dy, more := make([]float64, n), make([]float64, n)
		h := s.T1 - s.T0
		for range 20 {
			when := s.T0 + h*rng.Float64()
			s.Rate(when, dy)
			if got := norm(dy[from:to]); got > rate*(1+100*epsilon) {
				t.Errorf("seed %d: %s at %g: rate %g of [%d, %d), bound %g", seed, p.Name, when, got, from, to, rate)
			}
			// a change of the rate, over a time, is at most the bound on the
			// acceleration times that; rounding is that of the whole range
			later := s.T0 + h*rng.Float64()
			s.Rate(later, more)
			for i := range n {
				more[i] -= dy[i]
			}
			if got := norm(more[from:to]); got > accel*math.Abs(later-when)+1000*epsilon*(rate+accel*s.T1) {
				t.Errorf("seed %d: %s: rate of [%d, %d) changes by %g from %g to %g, bound %g",
					seed, p.Name, from, to, got, when, later, accel*math.Abs(later-when))
			}
		}
	})
}

// TestMaxRateIsTight: for a throw the bounds are the greatest values
// themselves, since a rate that changes uniformly is greatest at an end.
func TestMaxRateIsTight(t *testing.T) {
	st := newStepper(t, thrown(), loose())
	st.Reset(0, []float64{1, 2, 3, 4}, integrator.FirstStep(2))
	s, err := st.Step(2)
	if err != nil {
		t.Fatal(err)
	}
	const rounding = 1000 * epsilon
	if got, want := s.MaxRate(0, 2), math.Hypot(3, 4-9.8*2); math.Abs(got-want) > rounding*want {
		t.Errorf("MaxRate is %.17g, want %.17g", got, want)
	}
	if got := s.MaxAccel(0, 2); math.Abs(got-9.8) > rounding*9.8 {
		t.Errorf("MaxAccel is %.17g, want 9.8", got)
	}
	if got := s.MaxAccel(2, 4); got > rounding*9.8 {
		t.Errorf("MaxAccel of the velocity is %g, want 0", got)
	}
}

// TestBoundsAreLooseByLittle: a bound by Bernstein coefficients exceeds the
// greatest value by what the polynomial curves, which over a step that meets
// its tolerance is little: over the run on an orbit by less than a tenth.
func TestBoundsAreLooseByLittle(t *testing.T) {
	p := odetest.Kepler(0.5)
	st := newStepper(t, p, tight(1e-8))
	st.Reset(p.T0, p.Y0)
	mustSolve(t, st, p.TEnd, nil, func(s *integrator.Step, _ []integrator.Hit) error {
		var dy [4]float64
		rate, accel := 0.0, 0.0
		for i := range 101 {
			s.Rate(s.T0+(s.T1-s.T0)*float64(i)/100, dy[:])
			rate = max(rate, norm(dy[:2]))
			accel = max(accel, norm(dy[2:]))
		}
		if got := s.MaxRate(0, 2); got > 1.1*rate {
			t.Errorf("step from %g: MaxRate %g, sampled %g", s.T0, got, rate)
		}
		// the slope of the velocity's interpolant, not of the position's: alike
		if got := s.MaxAccel(0, 2); got > 1.1*accel || got < 0.9*accel {
			t.Errorf("step from %g: MaxAccel %g, sampled %g", s.T0, got, accel)
		}
		return nil
	})
}

// TestSegmentsStay: copies of the interpolant give the same states after the
// stepper has moved on, and space is reused.
func TestSegmentsStay(t *testing.T) {
	p := odetest.Torus()
	st := newStepper(t, p, tight(1e-6))
	st.Reset(p.T0, p.Y0)
	var kept []integrator.Segment
	var mids [][]float64
	var reused integrator.Segment
	mustSolve(t, st, p.TEnd, nil, func(s *integrator.Step, _ []integrator.Hit) error {
		y := make([]float64, 3)
		s.At((s.T0+s.T1)/2, y)
		kept, mids = append(kept, s.Clone()), append(mids, y)
		s.CopyTo(&reused)
		if reused.T0 != s.T0 || reused.T1 != s.T1 || reused.Dim() != 3 {
			t.Errorf("copied [%g, %g] of dimension %d, want [%g, %g]", reused.T0, reused.T1, reused.Dim(), s.T0, s.T1)
		}
		return nil
	})
	for i, g := range kept {
		y := make([]float64, 3)
		if g.At((g.T0+g.T1)/2, y); !sameBits(y, mids[i]) {
			t.Errorf("segment %d gives %v, the step gave %v", i, y, mids[i])
		}
	}
}

// TestTruncate: a truncated step ends with the interpolant's state, its copy
// too, and the run goes on from there as one that starts there.
func TestTruncate(t *testing.T) {
	p := odetest.Kepler(0.1)
	st := newStepper(t, p, tight(1e-6))
	st.Reset(p.T0, p.Y0)
	s, err := st.Step(p.TEnd)
	if err != nil {
		t.Fatal(err)
	}
	cut := s.T0 + 0.7*(s.T1-s.T0)
	want := make([]float64, 4)
	s.At(cut, want)
	rate := s.MaxRate(0, 4)
	s.Truncate(cut)
	if s.T1 != cut || !sameBits(s.Y1, want) {
		t.Fatalf("truncated to %g, %v; want %g, %v", s.T1, s.Y1, cut, want)
	}
	if g := s.Clone(); g.T1 != cut || s.MaxRate(0, 4) != rate {
		t.Errorf("a copy ends at %g, want %g; the bound went from %g to %g", g.T1, cut, rate, s.MaxRate(0, 4))
	}
	if at, y := st.State(); at != cut || !sameBits(y, want) {
		t.Errorf("the stepper stands at %g, %v", at, y)
	}
	next := st.NextStep()
	s, err = st.Step(p.TEnd)
	if err != nil {
		t.Fatal(err)
	}
	fresh := newStepper(t, p, tight(1e-6))
	fresh.Reset(cut, want, integrator.FirstStep(next))
	s2, err := fresh.Step(p.TEnd)
	if err != nil {
		t.Fatal(err)
	}
	if s.T1 != s2.T1 || !sameBits(s.Y1, s2.Y1) {
		t.Errorf("goes on to %g, %v; a fresh run to %g, %v", s.T1, s.Y1, s2.T1, s2.Y1)
	}
	// one call more, for the step that was cut; none for a cut at its end
	s.Truncate(s.T1)
	for range 3 {
		if _, err := st.Step(p.TEnd); err != nil {
			t.Fatal(err)
		}
	}
	if w := st.Stats(); w.Derivs != 2+6*(w.Accepted+w.Rejected)+1 {
		t.Errorf("%d calls for %d steps and %d rejected", w.Derivs, w.Accepted, w.Rejected)
	}
}

func TestTruncateOutsidePanics(t *testing.T) {
	for _, cut := range []float64{-0.1, 1.1, math.NaN()} {
		st := tick(t, 0, 1)
		s, err := st.Step(1)
		if err != nil {
			t.Fatal(err)
		}
		wantPanic(t, "Truncate", func() { s.Truncate(cut) })
	}
}

// wantPanic demands that do panics.
func wantPanic(t *testing.T, what string, do func()) {
	t.Helper()
	defer func() {
		t.Helper()
		if recover() == nil {
			t.Errorf("%s did not panic", what)
		}
	}()
	do()
}
