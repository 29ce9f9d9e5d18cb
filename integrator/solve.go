package integrator

// Result is where an integration ended. Y and Hits are the stepper's own,
// valid until its next Step or Reset.
type Result struct {
	T       float64   // time reached
	Y       []float64 // state there
	Hits    []Hit     // hits of the last step, if it ended at a terminal one
	Stopped bool      // it ended at a terminal hit
	Stats             // work since Reset
}

// Solve steps st from where it stands to tEnd, or to the first terminal hit of
// events. It gives every accepted step, with the hits on it, to onStep unless
// that is nil; the last one is truncated at the terminal hit, and has no length
// if that is at its start. An error of onStep ends the integration and is
// returned as it is. onStep may sample and copy the step; it must neither step
// nor reset st.
//
// After Solve returned without error, another Solve with the same events goes
// on from there: to a nearer end first, such as a predicted contact, and then
// to the real one. Events start afresh after a Reset only; it panics if their
// number changed without one.
//
// With an error of the integration, a [StepError], the result holds the last
// state reached.
func Solve(st *Stepper, tEnd float64, events []EventSpec, onStep func(*Step, []Hit) error) (Result, error) {
	t, y := st.State()
	if !st.started {
		panic("integrator: Solve before Reset")
	}
	if !(tEnd >= t) {
		return st.result(), st.fail(Backward, tEnd-t)
	}
	if err := st.startEvents(t, y, events); err != nil {
		return st.result(), err
	}
	for t < tEnd {
		s, err := st.Step(st.aim(tEnd))
		if err != nil {
			return st.result(), err
		}
		hits, stop, err := st.find.Search(s)
		if err != nil {
			return st.result(), err
		}
		if onStep != nil {
			if err := onStep(s, hits); err != nil {
				return st.result(), err
			}
		}
		if stop {
			res := st.result()
			res.Hits, res.Stopped = hits, true
			return res, nil
		}
		t = s.T1
	}
	return st.result(), nil
}

// aim gives where the next step is to end at the latest: where an event asks
// for it, within reason, or at tEnd.
func (st *Stepper) aim(tEnd float64) float64 {
	st.commit()
	h := st.NextStep()
	if !st.aims || h == 0 {
		return tEnd
	}
	end := st.find.aim(st.t, st.y0, st.k[0], h)
	if end-st.t >= leastAim*h {
		return min(tEnd, end)
	}
	return tEnd
}

// leastAim is the share of a step below which it is not cut short.
const leastAim = 0x1p-10

// startEvents starts the events of a run that was not begun yet.
func (st *Stepper) startEvents(t float64, y []float64, events []EventSpec) error {
	if !st.fresh {
		if len(events) != len(st.find.watch) {
			panic("integrator: Solve goes on with a different number of events; Reset first")
		}
		return nil
	}
	if err := st.find.Start(t, y, events); err != nil {
		return err
	}
	st.fresh, st.aims = false, false
	for i := range st.find.watch {
		st.aims = st.aims || st.find.watch[i].aimed != nil
	}
	return nil
}

// result tells where st stands.
func (st *Stepper) result() Result {
	t, y := st.State()
	return Result{T: t, Y: y, Stats: st.stats}
}
