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
	first  float64                // s, the first step; 0: automatic
	most   float64                // s, the longest step; 0: no limit
	tidy   func(y []float64) bool // corrects a state after a step, and tells whether it did
}

// errTidied stops the integration after a step whose end was corrected.
var errTidied = errors.New("flight: corrected")

// solve integrates from the state y to the end of the phase. It goes on where
// the body has only left something that it grazed.
func (f *Flier) solve(t *Track, p *Phase, r *run, y []float64) (integrator.Result, ending, error) {
	from := len(t.steps)
	f.into, f.tidy = t, r.tidy
	at, next := 0.0, r.first
	for {
		r.st.Reset(at, y, integrator.FirstStep(next), integrator.MaxStep(r.most))
		e := r.events(r.grazed)
		res, err := f.reach(r, e)
		if err != nil && err != errTidied {
			return res, ending{}, err
		}
		t.Work.add(res.Stats)
		p.steps = t.steps[from:len(t.steps):len(t.steps)]
		next = r.st.NextStep()
		if err == errTidied && t.Work.Steps <= mostSteps {
			at, y = res.T, f.tidied
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
func (f *Flier) reach(r *run, e *ends) (integrator.Result, error) {
	for {
		res, err := integrator.Solve(r.st, math.Min(r.limit, r.smooth), e.specs, f.onStep)
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

// keepStep stores a step of the phase under way. Where its end was corrected,
// the integration stops, to go on from there.
func (f *Flier) keepStep(s *integrator.Step, hits []integrator.Hit) error {
	if s.T1 > s.T0 {
		f.into.keep(s)
	}
	if len(hits) > 0 || f.tidy == nil {
		return nil
	}
	if f.tidied = append(f.tidied[:0], s.Y1...); f.tidy(f.tidied) {
		return errTidied
	}
	return nil
}

// keep adds a copy of a step. A track that is flown again has the space of the
// last time.
func (t *Track) keep(s *integrator.Step) {
	n := len(t.steps)
	if n < cap(t.steps) {
		t.steps = t.steps[:n+1]
	} else {
		t.steps = append(t.steps, integrator.Segment{})
	}
	if g := &t.steps[n]; g.Dim() == 0 {
		size := (1 + denseDegree) * len(s.Y0)
		if len(t.space) < size {
			t.space = make([]float64, size*max(fewSteps, n))
		}
		g.Use(t.space[:size:size])
		t.space = t.space[size:]
	}
	s.CopyTo(&t.steps[n])
}

const (
	denseDegree = 4 // of the interpolants of steps
	fewSteps    = 8 // for which space is made at first
)
