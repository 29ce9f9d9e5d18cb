package integrator_test

import (
	"math"
	"testing"

	"offplumb/integrator"
	"offplumb/integrator/odetest"
)

// record is everything a run shows of itself.
type record struct {
	bits []uint64
	hits []integrator.Hit
	work integrator.Stats
}

// runRecorded runs p with two events from its start.
func runRecorded(t *testing.T, st *integrator.Stepper, p odetest.Problem) record {
	t.Helper()
	events := []integrator.EventSpec{
		{Event: gap(func(x float64) float64 { return x }), Slop: 1e-9},
		{Event: fenced{func(x float64) float64 { return x - 0.3 }, 20, 0, 1e-4}, Slop: 1e-9, Rising: true},
	}
	var r record
	y := make([]float64, p.Dim())
	st.Reset(p.T0, p.Y0)
	res := mustSolve(t, st, p.TEnd, events, func(s *integrator.Step, hits []integrator.Hit) error {
		s.At((s.T0+s.T1)/2, y)
		for _, v := range append(append([]float64{s.T0, s.T1, s.MaxRate(0, 1)}, y...), s.Y1...) {
			r.bits = append(r.bits, math.Float64bits(v))
		}
		r.hits = append(r.hits, hits...)
		return nil
	})
	r.work = res.Stats
	return r
}

// TestEqualBitsOnReuse tries the law of doc.go: after other runs, one cut short
// by a hit and one that failed, a stepper does what a new one does.
func TestEqualBitsOnReuse(t *testing.T) {
	p := odetest.Kepler(0.5)
	want := runRecorded(t, newStepper(t, p, tight(1e-7)), p)
	if len(want.hits) == 0 {
		t.Fatal("no hits to compare")
	}
	st := newStepper(t, p, tight(1e-7))
	for i, spoil := range []func(){
		func() {},
		func() { // stops within a step
			st.Reset(3, []float64{2, 0, 0, 0.3}, integrator.MaxStep(0.1))
			mustSolve(t, st, 9, []integrator.EventSpec{{Event: gap(func(x float64) float64 { return x - 1 }), Terminal: true}}, nil)
		},
		func() { // fails
			st.Reset(0, p.Y0, integrator.MaxSteps(3), integrator.FirstStep(1e-3))
			if _, err := integrator.Solve(st, p.TEnd, nil, nil); err == nil {
				t.Error("no failure")
			}
		},
		func() { // fails just after a rejected trial
			st.Reset(0, p.Y0, integrator.MaxSteps(1), integrator.FirstStep(10))
			if _, err := integrator.Solve(st, p.TEnd, nil, nil); err == nil || st.Stats().Rejected != 1 {
				t.Error("no failure after a rejected trial")
			}
		},
		func() { // fails with states that are not finite
			st.Reset(0, []float64{math.Inf(1), math.NaN(), 0, 0})
			if _, err := integrator.Solve(st, p.TEnd, nil, nil); err == nil {
				t.Error("no failure")
			}
		},
	} {
		spoil()
		got := runRecorded(t, st, p)
		if len(got.bits) != len(want.bits) || got.work != want.work {
			t.Fatalf("run %d: work %+v, want %+v", i, got.work, want.work)
		}
		for j := range want.bits {
			if got.bits[j] != want.bits[j] {
				t.Fatalf("run %d: number %d differs in its bits", i, j)
			}
		}
		sameHits(t, "reused", got.hits, want.hits)
	}
}

// TestOptionsOfZero: an option of 0 is as none.
func TestOptionsOfZero(t *testing.T) {
	p := odetest.Kepler(0.5)
	st := newStepper(t, p, tight(1e-7))
	st.Reset(p.T0, p.Y0)
	plain := mustSolve(t, st, p.TEnd, nil, nil)
	want, work := append([]float64(nil), plain.Y...), plain.Stats
	st.Reset(p.T0, p.Y0, integrator.FirstStep(0), integrator.MaxStep(0), integrator.MaxSteps(0))
	res := mustSolve(t, st, p.TEnd, nil, nil)
	if !sameBits(res.Y, want) || res.Stats != work {
		t.Errorf("ended at %v after %+v, without options at %v after %+v", res.Y, res.Stats, want, work)
	}
}

// TestSamplingChangesNothing: a run that is looked into takes the same steps as
// one that is not.
func TestSamplingChangesNothing(t *testing.T) {
	p := odetest.Kepler(0.5)
	st := newStepper(t, p, tight(1e-7))
	sampled := runRecorded(t, st, p).work
	st.Reset(p.T0, p.Y0)
	res := mustSolve(t, st, p.TEnd, nil, nil)
	if res.Stats != sampled {
		t.Errorf("work %+v with samples and events, %+v without", sampled, res.Stats)
	}
}

// TestResetCopies: the caller's state is neither kept nor changed.
func TestResetCopies(t *testing.T) {
	y := []float64{0, 1}
	st := newStepper(t, drift(), tight(1e-6))
	st.Reset(0, y)
	y[1] = 5
	res := mustSolve(t, st, 1, nil, nil)
	if y[0] != 0 || y[1] != 5 || math.Abs(res.Y[0]-1) > 10*epsilon {
		t.Errorf("ended at %v; the caller's state is %v", res.Y, y)
	}
}

// TestStepEnds: steps never pass the end, and the last one meets it.
func TestStepEnds(t *testing.T) {
	const most = 0.7
	st := newStepper(t, drift(), tight(1e-6))
	st.Reset(-2, []float64{0, 1}, integrator.MaxStep(most))
	for at := -2.0; at < 5; {
		s, err := st.Step(5)
		if err != nil {
			t.Fatal(err)
		}
		h := s.T1 - s.T0
		if s.T0 != at || !(h > 0) || s.T1 > 5 || h > most*(1+4*epsilon) && (s.T1 != 5 || h > 1.01*most) {
			t.Errorf("step from %g to %g, the last ended at %g", s.T0, s.T1, at)
		}
		at = s.T1
		if next := st.NextStep(); next > most {
			t.Errorf("the next step would be %g", next)
		}
	}
	// no splinter: a step that would leave less than 1 % goes to the end
	st.Reset(0, []float64{0, 1}, integrator.FirstStep(most), integrator.MaxStep(most))
	if s, err := st.Step(most * 1.009); err != nil || s.T1 != most*1.009 {
		t.Errorf("a step of 0.7 leaves a splinter: %+v, %v", s, err)
	}
}

// TestStepWithoutEnd: an infinite end is none.
func TestStepWithoutEnd(t *testing.T) {
	p := odetest.Oscillator()
	st := newStepper(t, p, tight(1e-6))
	st.Reset(0, p.Y0)
	events := []integrator.EventSpec{{Event: gap(func(x float64) float64 { return x }), Slop: 1e-9, Terminal: true}}
	res := mustSolve(t, st, math.Inf(1), events, nil)
	if !res.Stopped || math.Abs(res.T-math.Pi/2) > 1e-5 {
		t.Errorf("stopped %v at %g, want pi/2", res.Stopped, res.T)
	}
}

// TestSolveInParts: a run to the middle and on ends as exactly as one at once,
// and a Solve to where it stands does nothing.
func TestSolveInParts(t *testing.T) {
	p := odetest.Kepler(0.1)
	st := newStepper(t, p, tight(1e-9))
	st.Reset(p.T0, p.Y0)
	for _, end := range []float64{p.T0, 1, 1, 7.5, p.TEnd, p.TEnd} {
		before := st.Stats()
		at, _ := st.State()
		res := mustSolve(t, st, end, nil, nil)
		if res.T != end || end == at && res.Stats != before {
			t.Errorf("solved from %g to %g, want %g; work %+v, before %+v", at, res.T, end, res.Stats, before)
		}
	}
	_, y := st.State()
	miss, size := errorAtEnd(p, y)
	if most := float64(st.Stats().Accepted) * p.Growth * 2e-9 * (1 + size); miss > most {
		t.Errorf("error %g, want at most %g", miss, most)
	}
}
