package flight

import (
	"sort"

	"offplumb/integrator"
	"offplumb/sim/frame"
	"offplumb/sim/geom"
	"offplumb/sim/model"
)

// Kind is what a body does during a phase.
type Kind int

// The kinds of phases.
const (
	Free Kind = iota // in flight, touching nothing
)

// String names a kind as the tables do.
func (k Kind) String() string { return [...]string{"flight"}[k] }

// Outcome is how a release ends.
type Outcome int

// The outcomes.
const (
	Landed Outcome = iota // it touched a surface
	TimeUp                // its duration, or the longest allowed, ended
	Lost                  // its centre passed the hull's outer face
)

// String names an outcome as the tables do.
func (o Outcome) String() string { return [...]string{"landed", "time", "lost"}[o] }

// Phase is a stretch of a track in which a body does one thing.
type Phase struct {
	Kind   Kind
	T0, T1 float64 // s since the release
	base   frame.State
	steps  []integrator.Segment // departures from the uniform motion of base
}

// Impact is a touch of a surface.
type Impact struct {
	Time    float64      // s since the release
	State   frame.State  // of the centre on arrival, habitat components
	Contact geom.Contact // the surface point and its normal, habitat components
	Surface string       // its name
}

// Work counts what the integration of a track took.
type Work struct {
	Steps, Rejected, Derivs int
}

// Track is the motion that a release takes. Its states are inertial.
type Track struct {
	Release *model.Release
	Body    model.Body
	Start   model.Place // where it is let go; its deck is the one beneath
	Begin   float64     // s, habitat time of the release; a track's times count from it
	First   frame.State // at the release, inertial
	Local   frame.State // at the release, habitat components
	Phases  []Phase
	Impacts []Impact
	Outcome Outcome
	End     float64     // s since the release
	Last    frame.State // at the end, inertial
	Work    Work
}

// Landing is the first touch, or nil.
func (t *Track) Landing() *Impact {
	if len(t.Impacts) == 0 {
		return nil
	}
	return &t.Impacts[0]
}

// At gives the inertial state at a time (s since the release), held at the
// ends of the track.
func (t *Track) At(time float64) frame.State {
	if time <= 0 || len(t.Phases) == 0 {
		return t.First
	}
	if time >= t.End {
		return t.Last
	}
	p := t.PhaseAt(time)
	steps := t.Phases[p].steps
	i := sort.Search(len(steps), func(i int) bool { return steps[i].T1 >= time })
	if i == len(steps) {
		i--
	}
	return t.Phases[p].state(i, time)
}

// PhaseAt gives the index of the phase under way, the earlier one at a joint.
func (t *Track) PhaseAt(time float64) int {
	i := sort.Search(len(t.Phases), func(i int) bool { return t.Phases[i].T1 >= time })
	return min(i, len(t.Phases)-1)
}

// Knots gives the ends of the integration steps, s since the release: between
// two of them the track is smooth.
func (t *Track) Knots() []float64 {
	var out []float64
	for _, p := range t.Phases {
		for i := range p.steps {
			out = append(out, p.steps[i].T0)
		}
	}
	return append(out, t.End)
}
