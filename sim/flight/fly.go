package flight

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/integrator"
	"offplumb/sim/air"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// Setup changes what flies a body, for ambient gravity or another drag law.
type Setup struct {
	Fields []Field
	Law    air.Law // nil: the program's own
}

// Flier flies releases one after another. It serves one goroutine.
type Flier struct {
	m     *model.Model
	setup Setup
	free  *free
	st    *integrator.Stepper
	touch *gap
	hull  *gap
	wide  float64 // m, radius of the body in flight
}

// NewFlier makes a flier for the releases of a model.
func NewFlier(m *model.Model) *Flier { return NewFlierWith(m, Setup{}) }

// NewFlierWith is NewFlier with a setup.
func NewFlierWith(m *model.Model, s Setup) *Flier {
	return &Flier{m: m, setup: s, free: &free{}}
}

// stepper is made at the first flight, since tolerances may be refused.
func (f *Flier) stepper() error {
	if f.st != nil {
		return nil
	}
	s := f.m.Solver
	st, err := integrator.NewStepper(integrator.DormandPrince54(), f.free,
		integrator.Tol{Rel: s.RelTol, Abs: []float64{s.PosTol, s.VelTol}, Groups: []int{3, 3}})
	if err != nil {
		return err
	}
	f.st = st
	f.touch = touch(f.free, f.m.Interior, 0)
	f.touch.of = func(p r3.Vec) float64 { return f.m.Interior.Dist(p) - f.wide }
	f.hull = inside(f.free, f.m.Interior)
	return nil
}

// Fly flies a release until it lands, its time ends or it leaves the habitat.
// It fails with an [integrator.StepError] where the motion cannot be computed.
func (f *Flier) Fly(let *Let) (*Track, error) {
	if err := f.stepper(); err != nil {
		return nil, err
	}
	a := f.m.Motion.At(let.Begin)
	t := &Track{Release: let.Release, Body: let.Body, Start: let.Place, Begin: let.Begin,
		Local: let.Local, First: a.ToInertial(let.Local)}
	if let.Release.Start.Kind == model.Still && let.Release.Carried == nil {
		// At rest without the roundings of the way to the habitat and back.
		t.First.Vel = r3.Vec{}
	}
	t.Start.Deck, t.Start.Height = f.beneath(let)
	f.free.base, f.free.begin = t.First, let.Begin
	f.free.forces = NewForces(f.m, let.Body, f.setup.Law, f.setup.Fields...)
	f.wide = let.Body.Diameter / 2
	f.touch.step, f.hull.step = never, never
	return t, f.fly(t)
}

// beneath gives the deck beneath a release and the height above it.
func (f *Flier) beneath(let *Let) (int, float64) {
	d := f.m.DeckBeneath(let.Place.Polar)
	return d, f.m.Decks[d].Radius - let.Place.R
}

// fly integrates one flight phase.
func (f *Flier) fly(t *Track) error {
	phase := Phase{Kind: Free, base: t.First}
	f.st.Reset(0, make([]float64, 6))
	slop := model.TouchSlack * math.Max(1, r3.Norm(t.First.Pos)*1e-5)
	if f.lies(t, slop) {
		t.Last, t.Phases = t.First, append(t.Phases, phase)
		f.land(t)
		return nil
	}
	events := []integrator.EventSpec{
		{Event: f.touch, Slop: slop, Terminal: true},
		{Event: f.hull, Terminal: true},
	}
	res, err := integrator.Solve(f.st, f.longest(t.Release), events, func(s *integrator.Step, _ []integrator.Hit) error {
		if s.T1 > s.T0 {
			phase.steps = append(phase.steps, s.Clone())
		}
		return nil
	})
	if err != nil {
		return err
	}
	t.End, t.Last = res.T, depart(t.First, res.T, res.Y)
	t.Work = Work{Steps: res.Accepted, Rejected: res.Rejected, Derivs: res.Derivs}
	phase.T1 = t.End
	t.Phases = append(t.Phases, phase)
	f.end(t, res.Stopped, res.Hits)
	return nil
}

// longest is how long a release may take, s.
func (f *Flier) longest(r *model.Release) float64 {
	if r.Until.Kind == model.UntilDuration {
		return math.Min(r.Until.Duration, f.m.Solver.MaxTime)
	}
	return f.m.Solver.MaxTime
}

// end says how a flight ended. Of a touch and a loss at one instant the touch
// counts.
func (f *Flier) end(t *Track, stopped bool, hits []integrator.Hit) {
	t.Outcome = TimeUp
	if !stopped {
		return
	}
	if t.Outcome = Lost; hits[0].Event == 0 {
		f.land(t)
	}
}

// parting is the least speed, in m/s, at which a body that touches at its
// release counts as leaving: slower, it would stay within a nanometre for a
// second.
const parting = 1e-9

// lies says whether a body touches a surface at its release, to within slop
// (m), and does not leave it: it moves in, or it is at rest along the normal
// and pressed on. Where that is not plain the search for contact decides.
func (f *Flier) lies(t *Track, slop float64) bool {
	c := f.m.Interior.Contact(t.Local.Pos)
	away := r3.Dot(t.Local.Vel, c.Normal)
	if c.Gap-f.wide > slop || away > parting {
		return false
	}
	a := f.m.Motion.At(t.Begin)
	ap := a.Apparent(t.Local)
	force := a.In(f.free.forces.Accel(t.Begin, t.First))
	return away < -parting || r3.Dot(r3.Add(ap.Sum(), force), c.Normal) < 0
}

// land ends a track at a touch.
func (f *Flier) land(t *Track) {
	t.Outcome = Landed
	a := f.m.Motion.At(t.Begin + t.End)
	local := a.ToHabitat(t.Last)
	c := f.m.Interior.Contact(local.Pos)
	t.Impacts = append(t.Impacts, Impact{Time: t.End, State: local, Contact: c,
		Surface: f.m.Interior.Surface(c.Surface).Name})
}

// state gives the inertial state on a phase's i-th step at a time (s since the
// release).
func (p *Phase) state(i int, time float64) frame.State {
	var y [6]float64
	p.steps[i].At(time, y[:])
	return depart(p.base, time-p.T0, y[:])
}
