package integrator_test

import (
	"errors"
	"math"
	"strings"
	"testing"

	"offplumb/integrator"
	"offplumb/integrator/odetest"
)

// wantFailure demands a StepError of the given reason, and that the stepper
// stands where the error and the result say.
func wantFailure(t *testing.T, st *integrator.Stepper, res integrator.Result, err error, reason integrator.Reason) *integrator.StepError {
	t.Helper()
	var fail *integrator.StepError
	if !errors.As(err, &fail) {
		t.Fatalf("error %v, want a StepError", err)
	}
	if fail.Reason != reason {
		t.Errorf("failed by %q, want %q", fail.Reason, reason)
	}
	if at, y := st.State(); res.T != at || !sameBits(res.Y, y) {
		t.Errorf("the result is at %g, %v; the stepper at %g, %v", res.T, res.Y, at, y)
	}
	return fail
}

// TestTooSmall: y' = y^2 from 1 is 1/(1 - t), of no value at 1. A step changes
// y by at most 2 tol y, and with it the time left, 1/y, by at most 2 tol. The
// last length tried is one that cannot be made five times shorter.
func TestTooSmall(t *testing.T) {
	const tol = 1e-9
	st := newStepper(t, system{1, func(_ float64, y, dy []float64) { dy[0] = y[0] * y[0] }}, tight(tol))
	st.Reset(0, []float64{1})
	res, err := integrator.Solve(st, 2, nil, nil)
	fail := wantFailure(t, st, res, err, integrator.TooSmall)
	if most := 2 * tol * float64(res.Accepted); fail.T != res.T || math.Abs(fail.T-1) > most {
		t.Errorf("failed at %.12g, reached %.12g; want 1 within %g", fail.T, res.T, most)
	}
	if !(fail.H >= 15*epsilon*fail.T && fail.H <= 5*16*epsilon*fail.T) { // t rounds by one
		t.Errorf("failed with a step of %g", fail.H)
	}
}

func TestTooMany(t *testing.T) {
	p := odetest.Kepler(0.9)
	st := newStepper(t, p, tight(1e-9))
	st.Reset(0, p.Y0, integrator.FirstStep(10), integrator.MaxSteps(12))
	res, err := integrator.Solve(st, p.TEnd, nil, nil)
	fail := wantFailure(t, st, res, err, integrator.TooMany)
	if res.Accepted+res.Rejected != 12 || res.Accepted == 0 || res.Rejected == 0 {
		t.Errorf("%d steps and %d rejected, want some of each and 12 in all", res.Accepted, res.Rejected)
	}
	if fail.T != res.T || fail.H != st.NextStep() {
		t.Errorf("failed at %g with %g, stands at %g before %g", fail.T, fail.H, res.T, st.NextStep())
	}
	again, err := integrator.Solve(st, p.TEnd, nil, nil)
	wantFailure(t, st, again, err, integrator.TooMany)
	if again.T != res.T || again.Stats != res.Stats {
		t.Errorf("went on from %g to %g", res.T, again.T)
	}
	st.Reset(0, p.Y0)
	mustSolve(t, st, p.TEnd, nil, nil) // the limit is gone
}

// TestNonFiniteBeyond: where the derivative ends, the run comes as near as time
// resolves.
func TestNonFiniteBeyond(t *testing.T) {
	for _, bad := range []float64{math.NaN(), math.Inf(1), math.Inf(-1)} {
		st := newStepper(t, system{1, func(t float64, _, dy []float64) {
			dy[0] = 1
			if t > 0.5 {
				dy[0] = bad
			}
		}}, tight(1e-9))
		st.Reset(0, []float64{0})
		res, err := integrator.Solve(st, 1, nil, nil)
		fail := wantFailure(t, st, res, err, integrator.NonFinite)
		if !(fail.T <= 0.5 && fail.T+fail.H > 0.5 && fail.H <= 5*16*epsilon*0.5) {
			t.Errorf("failed at %.17g with a step of %g", fail.T, fail.H)
		}
		if math.Abs(res.Y[0]-res.T) > 100*epsilon {
			t.Errorf("the state is %g at %g", res.Y[0], res.T)
		}
	}
}

// TestNonFiniteStart: there is nothing to start from.
func TestNonFiniteStart(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	for _, c := range []struct {
		y    []float64
		opts []integrator.Option
	}{
		{[]float64{nan, 1}, nil}, {[]float64{inf, 1}, nil}, {[]float64{0, nan}, nil}, {[]float64{0, -inf}, nil},
		{[]float64{inf, 1}, []integrator.Option{integrator.FirstStep(0.1)}},
		{[]float64{0, nan}, []integrator.Option{integrator.FirstStep(0.1)}},
	} {
		for _, tol := range []integrator.Tol{
			tight(1e-9), loose(), {Rel: 1e-9, Abs: []float64{1}, Groups: []int{2}},
		} {
			st := newStepper(t, drift(), tol)
			st.Reset(0, c.y, c.opts...)
			res, err := integrator.Solve(st, 1, nil, nil)
			if fail := wantFailure(t, st, res, err, integrator.NonFinite); fail.T != 0 || res.Accepted != 0 {
				t.Errorf("from %v: failed at %g after %d steps", c.y, fail.T, res.Accepted)
			}
			if c.opts == nil && res.Rejected != 0 {
				t.Errorf("from %v: %d trials before it was found", c.y, res.Rejected)
			}
		}
	}
}

// TestNonFiniteState: exp(t) is infinite, as float64, beyond 709.78.
func TestNonFiniteState(t *testing.T) {
	st := newStepper(t, system{1, func(_ float64, y, dy []float64) { dy[0] = y[0] }}, tight(1e-9))
	st.Reset(0, []float64{1})
	res, err := integrator.Solve(st, 1000, nil, nil)
	fail := wantFailure(t, st, res, err, integrator.NonFinite)
	// each step may add its tolerance to the logarithm
	if most := 2e-9*float64(res.Accepted) + 1e-9; math.Abs(fail.T-math.Log(math.MaxFloat64)) > most {
		t.Errorf("failed at %.12g, want %.12g within %g", fail.T, math.Log(math.MaxFloat64), most)
	}
	if res.Y[0] > math.MaxFloat64 {
		t.Error("the state reached is infinite")
	}
}

func TestBackward(t *testing.T) {
	st := newStepper(t, drift(), tight(1e-6))
	for _, end := range []float64{4.9, -1, math.Inf(-1), math.NaN()} {
		st.Reset(5, []float64{1, 2})
		res, err := integrator.Solve(st, end, nil, nil)
		fail := wantFailure(t, st, res, err, integrator.Backward)
		if fail.T != 5 || fail.H != end-5 && !math.IsNaN(end) {
			t.Errorf("end %g: failed at %g with %g", end, fail.T, fail.H)
		}
		_, err = st.Step(end)
		wantFailure(t, st, res, err, integrator.Backward)
		mustSolve(t, st, 6, nil, nil) // it may still go on
	}
	st.Reset(5, []float64{1, 2})
	if _, err := st.Step(5); err == nil {
		t.Error("a step of no length was taken")
	}
}

// badBound is a bounded event with any bound.
type badBound struct {
	gap
	rate, accel float64
	from        float64 // time from which the bound holds; before, it is sound
}

func (b badBound) Bound(_ *integrator.Step, t float64, _ []float64) (rate, accel, thin float64) {
	if t < b.from {
		return 1, 0, 0.01
	}
	return b.rate, b.accel, 0.01
}

func TestBadEvent(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	far := gap(func(x float64) float64 { return 10 - x })
	turn := func(at, bad float64) gap {
		return func(x float64) float64 {
			if x > at {
				return bad
			}
			return 10 - x
		}
	}
	for _, c := range []struct {
		name  string
		event integrator.Event
		t     float64 // least time of the failure: the look before is sound
	}{
		{"not a number at the start", turn(-1, nan), 0},
		{"infinite at the start", turn(-1, inf), 0},
		{"not a number later", turn(2.5, nan), 2.5},
		{"infinite later", turn(2.5, -inf), 2.5},
		{"rate not a number", badBound{far, nan, 0, 0}, 0},
		{"negative rate", badBound{far, -1, 0, 0}, 0},
		{"infinite rate", badBound{far, inf, 0, 0}, 0},
		{"acceleration not a number", badBound{far, 1, nan, 0}, 0},
		{"negative acceleration", badBound{far, 1, -1, 0}, 0},
		{"infinite acceleration", badBound{far, 1, inf, 0}, 0},
		{"rate not a number later", badBound{far, nan, 0, 2.5}, 2.5},
	} {
		t.Run(c.name, func(t *testing.T) {
			st := tick(t, 0, 1)
			res, err := integrator.Solve(st, 5, []integrator.EventSpec{{Event: c.event, Slop: 1e-9}}, nil)
			fail := wantFailure(t, st, res, err, integrator.BadEvent)
			if fail.T < c.t || fail.T > c.t+1 {
				t.Errorf("failed at %g, want it from %g on within a step", fail.T, c.t)
			}
		})
	}
}

// TestStalled: a bound that is far too large is given up.
func TestStalled(t *testing.T) {
	if testing.Short() {
		t.Skip("takes 2^24 looks")
	}
	st := tick(t, 0, 1)
	event := fenced{func(x float64) float64 { return 10 - x }, 1e300, 0, 0.01}
	res, err := integrator.Solve(st, 5, []integrator.EventSpec{{Event: event}}, nil)
	fail := wantFailure(t, st, res, err, integrator.Stalled)
	if !(fail.T >= 0 && fail.H > 0 && fail.T+fail.H <= 1) {
		t.Errorf("failed at %g with %g to go, want a time within the step", fail.T, fail.H)
	}
}

// TestFailedStepLeavesState tries the law of doc.go on a step that fails after
// some trials.
func TestFailedStepLeavesState(t *testing.T) {
	wall := 0.0 // the derivative ends here
	st := newStepper(t, system{2, func(t float64, y, dy []float64) {
		dy[0], dy[1] = y[1], -y[0]
		if t > wall {
			dy[1] = math.NaN()
		}
	}}, tight(1e-9))
	wall = 3
	st.Reset(0, []float64{1, 0})
	for {
		at, y := st.State()
		before := append([]float64{at}, y...)
		_, err := st.Step(10)
		if err == nil {
			continue
		}
		if at, y := st.State(); !sameBits(before, append([]float64{at}, y...)) {
			t.Errorf("the failed step moved %v to %g, %v", before, at, y)
		}
		break
	}
	// it can be repaired: what stands behind the system may change
	wall = math.Inf(1)
	res := mustSolve(t, st, 10, nil, nil)
	if miss := distance(res.Y, []float64{math.Cos(10), -math.Sin(10)}); miss > 1e-9*float64(res.Accepted) {
		t.Errorf("after the repair the end misses by %g", miss)
	}
}

// TestErrorOfCaller: an error of onStep comes back as it is.
func TestErrorOfCaller(t *testing.T) {
	mine := errors.New("enough")
	st := tick(t, 0, 1)
	res, err := integrator.Solve(st, 5, nil, func(s *integrator.Step, _ []integrator.Hit) error {
		if s.T1 >= 2 {
			return mine
		}
		return nil
	})
	if err != mine || res.T != 2 || res.Accepted != 2 {
		t.Errorf("error %v at %g after %d steps, want %v at 2", err, res.T, res.Accepted, mine)
	}
}

func TestErrorSaysWhatAndWhere(t *testing.T) {
	err := &integrator.StepError{T: 1.25, H: 0.5, Reason: integrator.TooSmall}
	for _, part := range []string{string(integrator.TooSmall), "t = 1.25", "step 0.5"} {
		if !strings.Contains(err.Error(), part) {
			t.Errorf("%q does not say %q", err, part)
		}
	}
}
