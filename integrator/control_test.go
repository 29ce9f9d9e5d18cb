package integrator_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"offplumb/integrator"
	"offplumb/integrator/odetest"
)

// TestStepToNearerEnd: an end that comes early shortens one step, and leaves
// the ones after it their length: wholly where the step is too short to tell
// anything, else by its own error, which gives share^(1-5*0.17) of the length
// by the exponent of the controller, and some more for the error's variation.
func TestStepToNearerEnd(t *testing.T) {
	p := odetest.Oscillator()
	for _, c := range []struct{ share, least float64 }{{1e-9, 1}, {1e-3, 1}, {0.05, 1}, {0.3, 0.7}, {0.9, 0.8}} {
		st := newStepper(t, p, tight(1e-8))
		st.Reset(0, p.Y0)
		mustSolve(t, st, 5, nil, nil)
		long := st.NextStep()
		if _, err := st.Step(5 + c.share*long); err != nil {
			t.Fatal(err)
		}
		if next := st.NextStep(); !(next >= c.least*long) {
			t.Errorf("after %g of a step the next is %g, it was %g", c.share, next, long)
		}
	}
}

// TestFirstStep tries the published guess, (0.01/max(d1, d2))^(1/5) with the
// norms of the first and second derivatives, on y' = b + c t, whose steps have
// no error.
func TestFirstStep(t *testing.T) {
	const abs = 1e-6
	for _, c := range []struct{ b, c float64 }{{1, 0}, {1, 1e4}, {1, 0.1}, {-3, 1e3}} {
		st := newStepper(t, system{1, func(t float64, _, dy []float64) { dy[0] = c.b + c.c*t }},
			integrator.Tol{Abs: []float64{abs}})
		st.Reset(0, []float64{1})
		s, err := st.Step(10)
		if err != nil {
			t.Fatal(err)
		}
		want := math.Pow(0.01*abs/max(math.Abs(c.b), c.c), 0.2)
		if got := s.T1 - s.T0; math.Abs(got-want) > 1e-9*want { // c is a difference of rounded rates
			t.Errorf("y' = %g + %g t: first step %g, want %g", c.b, c.c, got, want)
		}
	}
}

// TestFirstStepPasses: guessed from two derivatives only, the first step is
// near enough to one that passes: where it does not, one or two trials make it.
func TestFirstStepPasses(t *testing.T) {
	for _, p := range odetest.All() {
		for _, tol := range tolerances {
			st := newStepper(t, p, tight(tol))
			st.Reset(p.T0, p.Y0)
			if _, err := st.Step(p.TEnd); err != nil {
				t.Fatal(err)
			}
			if n := st.Stats().Rejected; n > 2 {
				t.Errorf("%s at tolerance %g: %d trials rejected at the start", p.Name, tol, n)
			}
		}
	}
}

// TestStepChanges: the next step is between a fifth of the last and ten times
// it, and after a rejection it is no longer.
func TestStepChanges(t *testing.T) {
	rejections := 0
	for _, p := range odetest.All() {
		st := newStepper(t, p, tight(1e-5))
		st.Reset(p.T0, p.Y0)
		before := 0
		mustSolve(t, st, p.TEnd, nil, func(s *integrator.Step, _ []integrator.Hit) error {
			h, next := s.T1-s.T0, st.NextStep()
			rejected := st.Stats().Rejected > before
			if s.T1 < p.TEnd && (next < 0.2*h*(1-1e-9) || next > 10*h*(1+1e-9) || rejected && next > h*(1+1e-9)) {
				t.Errorf("%s: after a step of %g from %g, rejected before %v, the next is %g", p.Name, h, s.T0, rejected, next)
			}
			if rejected {
				rejections++
			}
			before = st.Stats().Rejected
			return nil
		})
	}
	if rejections == 0 {
		t.Error("no step was rejected")
	}
}

// TestStepsDoNotAlternate: where not exactness but stability limits the steps,
// as on y' = -1000 (y - cos t) - sin t, a control by the last error alone has
// every sixth trial rejected; with the error before it the steps settle.
func TestStepsDoNotAlternate(t *testing.T) {
	const rate = 1000
	st := newStepper(t, system{1, func(t float64, y, dy []float64) {
		dy[0] = -rate*(y[0]-math.Cos(t)) - math.Sin(t)
	}}, tight(1e-4))
	st.Reset(0, []float64{1})
	res := mustSolve(t, st, 10, nil, nil)
	if res.Rejected > res.Accepted/50 {
		t.Errorf("%d trials rejected of %d", res.Rejected, res.Accepted+res.Rejected)
	}
	// stable up to 3.3 of the rate for this pair (Hairer & Wanner, Solving
	// Ordinary Differential Equations II, section IV.2; from memory)
	if least := 10 * rate / 3.4; float64(res.Accepted) < least {
		t.Errorf("%d steps, want %g at the least", res.Accepted, least)
	}
}

// TestDerivIsNotAskedBeyondEnd: a derivative that jumps at the end of a run
// does not disturb it. The guess of the first step may round beyond it.
func TestDerivIsNotAskedBeyondEnd(t *testing.T) {
	const seed = 51
	rng := rand.New(rand.NewPCG(seed, 0))
	last := 0.0
	st := newStepper(t, system{1, func(t float64, y, dy []float64) {
		last = max(last, t)
		dy[0] = y[0]
	}}, loose())
	for range 1000 {
		t0 := rng.Float64()
		tEnd := t0 + rng.Float64()
		last = 0
		st.Reset(t0, []float64{1}, integrator.FirstStep(0.2*rng.Float64()))
		mustSolve(t, st, tEnd, nil, nil)
		if last > tEnd {
			t.Errorf("seed %d: from %.17g to %.17g, asked at %.17g", seed, t0, tEnd, last)
		}
		last, tEnd = 0, t0+1e-7*rng.Float64()
		st.Reset(t0, []float64{1})
		mustSolve(t, st, tEnd, nil, nil)
		if last > tEnd+epsilon {
			t.Errorf("seed %d: guessing from %.17g to %.17g, asked at %.17g", seed, t0, tEnd, last)
		}
	}
}
