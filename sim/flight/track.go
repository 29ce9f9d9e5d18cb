package flight

import (
	"math"
	"sort"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/integrator"
	"offplumb/sim/frame"
	"offplumb/sim/geom"
	"offplumb/sim/model"
)

// Kind is what a body does during a phase.
type Kind int

// The kinds of phases.
const (
	Free  Kind = iota // in flight, touching nothing
	Slide             // sliding on surfaces
	Roll              // rolling on a surface without slip
	Rest              // at rest relative to the habitat
)

// String names a kind as the tables do.
func (k Kind) String() string { return [...]string{"flight", "slide", "roll", "rest"}[k] }

// Outcome is how a release ends.
type Outcome int

// The outcomes.
const (
	Landed Outcome = iota // it touched a surface
	TimeUp                // its duration, or the longest allowed, ended
	Lost                  // its centre passed the hull's outer face
	Rested                // it came to rest
	Stuck                 // it is wedged, or its motion has no end that the model can resolve
)

// String names an outcome as the tables do.
func (o Outcome) String() string { return [...]string{"landed", "time", "lost", "rested", "stuck"}[o] }

// Phase is a stretch of a track in which a body does one thing.
type Phase struct {
	Kind    Kind
	T0, T1  float64 // s since the release
	Surface string  // of a slide, roll or rest: what it is on at the start

	drift *drift // of dust, which gives its velocity by its place
	local bool   // steps are in the habitat frame, else inertial
	base  frame.State
	spin  r3.Vec               // rad/s, of a rolling body at the start, relative to the habitat
	steps []integrator.Segment // from T0: departures from base, in flight from its uniform motion
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

func (w *Work) add(s integrator.Stats) {
	w.Steps, w.Rejected, w.Derivs = w.Steps+s.Accepted, w.Rejected+s.Rejected, w.Derivs+s.Derivs
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
	Left    float64 // s, when its centre first passed the hull's outer face; -1: it did not, or is not followed beyond

	motion frame.Motion
	steps  []integrator.Segment // of all phases
	space  []float64            // for their coefficients
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
	p := &t.Phases[t.PhaseAt(time)]
	s := p.at(time)
	if p.local {
		a := t.motion.At(t.Begin + time)
		return a.ToInertial(s)
	}
	return s
}

// at gives the state on a phase, in its own frame.
func (p *Phase) at(time float64) frame.State {
	u := time - p.T0
	i := sort.Search(len(p.steps), func(i int) bool { return p.steps[i].T1 >= u })
	if i = min(i, len(p.steps)-1); i < 0 {
		return p.base
	}
	var y [dims]float64
	p.steps[i].At(u, y[:p.steps[i].Dim()])
	if p.drift != nil {
		q := r3.Add(p.base.Pos, vec(y[:]))
		return frame.State{Pos: q, Vel: p.drift.velocity(u, q)}
	}
	if p.local {
		return frame.State{Pos: r3.Add(p.base.Pos, vec(y[:])), Vel: vec(y[3:])}
	}
	return depart(&p.base, u, y[:])
}

// PhaseAt gives the index of the phase under way, the earlier one at a joint.
func (t *Track) PhaseAt(time float64) int {
	i := sort.Search(len(t.Phases), func(i int) bool { return t.Phases[i].T1 >= time })
	return min(i, len(t.Phases)-1)
}

// Knots gives the ends of the integration steps, s since the release: between
// two of them the track is smooth.
func (t *Track) Knots() []float64 {
	n := 1
	for i := range t.Phases {
		n += max(1, len(t.Phases[i].steps))
	}
	out := make([]float64, 0, n)
	for i := range t.Phases {
		out = t.Phases[i].starts(out)
	}
	return append(out, t.End)
}

// Knots gives the ends of the integration steps of a phase, s since the
// release.
func (p *Phase) Knots() []float64 { return append(p.starts(nil), p.T1) }

func (p *Phase) starts(to []float64) []float64 {
	if len(p.steps) == 0 && p.T1 > p.T0 {
		return append(to, p.T0) // a rest that ended
	}
	for i := range p.steps {
		to = append(to, p.T0+p.steps[i].T0)
	}
	return to
}

// Steps gives the number of integration steps of a phase.
func (p *Phase) Steps() int { return len(p.steps) }

// Step gives the start and the end of an integration step, s since the release.
func (p *Phase) Step(k int) (t0, t1 float64) {
	s := &p.steps[k]
	return p.T0 + s.T0, p.T0 + s.T1
}

// Seen gives the state in the habitat at a time (s since the release) within
// step k of a phase.
func (t *Track) Seen(p *Phase, k int, time float64) frame.State {
	var y [dims]float64
	u := time - p.T0
	p.steps[k].At(u, y[:p.steps[k].Dim()])
	if p.local {
		return frame.State{Pos: r3.Add(p.base.Pos, vec(y[:])), Vel: vec(y[3:])}
	}
	return frame.Seen(t.motion, t.Begin+time, depart(&p.base, u, y[:]))
}

// SpeedSeen is the speed, m/s, of [Track.Seen], to rounding.
func (t *Track) SpeedSeen(p *Phase, k int, time float64) float64 {
	w, ok := t.motion.(frame.Steady)
	if !ok || p.local {
		return math.Sqrt(r3.Norm2(t.Seen(p, k, time).Vel))
	}
	var y [dims]float64
	u := time - p.T0
	p.steps[k].At(u, y[:p.steps[k].Dim()])
	s := depart(&p.base, u, y[:])
	return math.Sqrt(r3.Norm2(w.Relative(&s)))
}
