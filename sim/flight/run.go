package flight

import (
	"errors"
	"math"

	"offplumb/integrator"
	"offplumb/sim/geom"
)

// ending is what the next phase must know of how the last one ended.
type ending struct {
	parted []geom.Patch // left for want of force
	leant  []geom.Patch // grazed, and about to be pressed on
	left   []geom.Patch // no longer grazed
	skids  bool         // a rolling body lost its grip
	breaks bool         // the habitat's motion goes on by another law
	// slipped: friction has held the body up to this instant, and does not any
	// more, but for rounding.
	slipped bool
}

// run is the integration of one phase.
type run struct {
	st     *integrator.Stepper
	limit  float64                 // s
	smooth float64                 // s, when the stretch of the habitat's motion ends
	on     func(t float64) float64 // when the next one ends, for what goes on through it; nil: it ends the phase
	grazed []geom.Patch
	events func(grazed []geom.Patch) *ends
	opts   []integrator.Option
	tidy   func(y []float64) bool // corrects a state after a step, and tells whether it did
	y      []float64              // the state corrected
}

// errTidied stops the integration after a step whose end was corrected.
var errTidied = errors.New("flight: corrected")

// solve integrates from the state y to the end of the phase. It goes on where
// the body has only left something that it grazed.
func (r *run) solve(t *Track, p *Phase, y []float64) (integrator.Result, ending, error) {
	at, next := 0.0, 0.0
	for {
		r.st.Reset(at, y, append(r.opts, integrator.FirstStep(next))...)
		e := r.events(r.grazed)
		res, err := r.reach(e, p)
		if err != nil && err != errTidied {
			return res, ending{}, err
		}
		t.Work.add(res.Stats)
		next = r.st.NextStep()
		if err == errTidied && t.Work.Steps <= mostSteps {
			at, y = res.T, r.y
			continue
		}
		end := e.ending(res.Hits)
		end.breaks = !res.Stopped && res.T < r.limit
		if len(end.left) == 0 || len(end.left) < len(res.Hits) {
			return res, end, nil
		}
		r.grazed = without(r.grazed, end.left)
		at, y = res.T, res.Y
	}
}

// reach integrates up to an event, the end of the time, or the end of the
// stretch of the habitat's motion. What goes through such an end has a step end
// there: forces in flight change without a jump, but with a kink.
func (r *run) reach(e *ends, p *Phase) (integrator.Result, error) {
	keep := r.keep(p)
	for {
		res, err := integrator.Solve(r.st, math.Min(r.limit, r.smooth), e.specs, keep)
		if err != nil || res.Stopped || r.limit <= r.smooth || r.on == nil || len(r.grazed) > 0 {
			return res, err
		}
		r.smooth = r.on(res.T)
	}
}

func without(list, gone []geom.Patch) []geom.Patch {
	var out []geom.Patch
	for _, p := range list {
		if !hasPatch(gone, p) {
			out = append(out, p)
		}
	}
	return out
}

// add adds a phase, unless it took no time.
func (t *Track) add(p Phase) {
	if p.T1 > p.T0 {
		t.Phases = append(t.Phases, p)
	}
}

// keep stores the steps of a phase. Where a step's end was corrected, the
// integration stops, to go on from there.
func (r *run) keep(p *Phase) func(*integrator.Step, []integrator.Hit) error {
	return func(s *integrator.Step, hits []integrator.Hit) error {
		if s.T1 > s.T0 {
			p.steps = append(p.steps, s.Clone())
		}
		if len(hits) > 0 || r.tidy == nil {
			return nil
		}
		if r.y = append(r.y[:0], s.Y1...); r.tidy(r.y) {
			return errTidied
		}
		return nil
	}
}
