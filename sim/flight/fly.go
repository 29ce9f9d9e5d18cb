package flight

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/integrator"
	"offplumb/sim/air"
	"offplumb/sim/frame"
	"offplumb/sim/geom"
	"offplumb/sim/model"
)

// Setup changes what flies a body, for ambient gravity or another drag law.
type Setup struct {
	Fields []Field
	Law    air.Law // nil: the program's own
	Full   bool    // dust too is flown by the full equations
}

// Flier flies releases one after another. It serves one goroutine.
type Flier struct {
	m       *model.Model
	setup   Setup
	free    *free
	st      *integrator.Stepper // of free flight
	slide   *slide
	contact *integrator.Stepper // of sliding and rolling
	touch   *apart
	hull    *apart
	out     outer
	both    *apart // touch and hull as one
	watch   geom.Beside
	goes    ends         // of flights
	near    []geom.Touch // space for what it touches

	flightRun run
	into      *Track  // that is flown
	leaves    float64 // s since the release, when the flight under way began
	rough     float64 // m/s^2, what an acceleration may be by rounding, in this flight
	onStep    func(*integrator.Step, []integrator.Hit) error
	tidy      func(y []float64) bool // of the phase
	tidied    []float64              // the state corrected
	body      model.Body             // in flight
	wide      float64                // m, its radius
	quick     Quick                  // how fast it takes up the motion of the air
	ended     bool                   // its track is
	arrival   frame.State            // inertial, at the end of its last phase, before any impact
	zero      [6]float64
}

// NewFlier makes a flier for the releases of a model.
func NewFlier(m *model.Model) *Flier { return NewFlierWith(m, Setup{}) }

// NewFlierWith is NewFlier with a setup.
func NewFlierWith(m *model.Model, s Setup) *Flier {
	return &Flier{m: m, setup: s, free: &free{}, slide: &slide{}}
}

// steppers are made at the first flight, since tolerances may be refused.
func (f *Flier) steppers() error {
	if f.st != nil {
		return nil
	}
	s := f.m.Solver
	st, err := integrator.NewStepper(integrator.DormandPrince54(), f.free,
		integrator.Tol{Rel: s.RelTol, Abs: []float64{s.PosTol, s.VelTol}, Groups: []int{3, 3}})
	if err != nil {
		return err
	}
	f.contact, err = integrator.NewStepper(integrator.DormandPrince54(), f.slide,
		integrator.Tol{Rel: s.RelTol, Abs: []float64{s.PosTol, s.VelTol, s.VelTol / spinLength}, Groups: []int{3, 3, 3}})
	if err != nil {
		return err
	}
	f.st = st
	f.onStep = f.keepStep
	f.flightRun.st = st
	f.flightRun.events = f.flightEvents
	f.flightRun.on = func(at float64) float64 { return at + f.spanFrom(f.into, f.leaves+at) }
	f.touch, f.hull, f.both = &apart{f: f, touch: true}, &apart{f: f, hull: true}, &apart{f: f, touch: true, hull: true}
	f.out = outerOf(f)
	return nil
}

// spinLength turns the tolerance of velocities into one of spins, m: the
// surface of a ball of this radius moves by no more than the tolerance.
const spinLength = 0.1

// Fly follows a release until it rests, its time ends or it leaves the
// habitat. It fails with an [integrator.StepError] where the motion cannot be
// computed.
func (f *Flier) Fly(let *Let) (*Track, error) {
	t := &Track{}
	if err := f.FlyAgain(t, let); err != nil {
		return nil, err
	}
	return t, nil
}

// FlyAgain is [Flier.Fly] with a track that is no longer wanted, the space of
// which it takes for the new one: then a flight allocates nothing that grows
// with its steps.
func (f *Flier) FlyAgain(t *Track, let *Let) error {
	if err := f.steppers(); err != nil {
		return err
	}
	a := f.m.Motion.At(let.Begin)
	*t = Track{Release: let.Release, Body: let.Body, Start: let.Place, Begin: let.Begin,
		Left: -1, Local: let.Local, First: a.ToInertial(let.Local), motion: f.m.Motion,
		Phases: t.Phases[:0], Impacts: t.Impacts[:0], steps: t.steps[:0], space: t.space}
	if let.Release.Start.Kind == model.Still && let.Release.Carried == nil {
		// At rest without the roundings of the way to the habitat and back.
		t.First.Vel = r3.Vec{}
	}
	t.Start.Deck, t.Start.Height = f.beneath(let)
	f.free.forces.set(f.m, let.Body, f.setup.Law, f.setup.Fields)
	f.body, f.wide = let.Body, let.Body.Diameter/2
	if f.quick = (Quick{}); !f.setup.Full {
		f.quick = quickOf(f.m, &f.free.forces, let.Body)
	}
	return f.follow(t)
}

// beneath gives the deck beneath a release and the height above it.
func (f *Flier) beneath(let *Let) (int, float64) {
	d := f.m.DeckBeneath(let.Place.Polar)
	return d, f.m.Above(d, let.Place.Polar)
}

// fly integrates one flight, to a touch, the end of its time or its loss. The
// spin of a body in flight stays in the inertial frame.
func (f *Flier) fly(t *Track, now *moving, grazed []geom.Patch) (ending, error) {
	settles, drifts := f.quickIn(now)
	if drifts {
		return f.driftOn(t, now)
	}
	base := t.First
	if now.t > 0 {
		base = f.inertial(t, now)
	}
	a := f.m.Motion.At(t.Begin + now.t)
	spin := r3.Add(a.Out(now.w), a.Omega)
	phase := Phase{Kind: Free, T0: now.t, base: base, spin: now.w}
	f.free.base, f.free.begin = base, t.Begin+now.t
	r := &f.flightRun
	r.limit, r.grazed, r.first, r.most = f.longest(t.Release)-now.t, grazed, f.firstStep(), 0
	if len(grazed) > 0 {
		r.most = f.longestStep(t.Begin + now.t)
	}
	r.smooth, f.free.last = f.smoothUntil(t, now)
	if f.quick.Drifts() {
		start := *r // which ends where the drift begins
		start.smooth, start.on = math.Min(r.smooth, settles), nil
		r = &start
	}
	f.leaves, f.rough = now.t, noise(r3.Vec{}, now.v)
	res, end, err := f.solve(t, &phase, r, f.zero[:])
	if err != nil {
		return ending{}, err
	}
	now.t += res.T
	phase.T1 = now.t
	t.add(phase)
	last := depart(&base, res.T, res.Y)
	a = f.m.Motion.At(t.Begin + now.t)
	local := a.ToHabitat(last)
	now.q, now.v, now.w = local.Pos, local.Vel, a.In(r3.Sub(spin, a.Omega))
	f.arrival = last
	if !end.breaks {
		f.settle(t, now, res)
	}
	return end, nil
}

// flightEvents lists what ends a flight: a touch, the loss of the body. One
// that starts clear of everything has both in one event.
func (f *Flier) flightEvents(grazed []geom.Patch) *ends {
	base := f.free.base
	least := slop(base.Pos) / 4
	f.watch = geom.Beside{Wide: f.wide, Thin: thin, Slop: slop(base.Pos) / 2, Grazed: grazed}
	f.touch.ready()
	e := &f.goes
	e.clear()
	if at, y := f.st.State(); !f.out.outside && len(grazed) == 0 && f.touch.Value(at, y) > least {
		f.both.ready()
		e.add(f.both, least, turns)
		return e
	}
	e.add(f.touch, least, turns)
	f.leaving(e)
	e.graze(f, grazed, least, f.rough, f.free.local, func(at float64, y []float64) r3.Vec {
		// What grazes does not go through the end of a stretch of the motion.
		time := math.Min(f.free.begin+at, f.free.last)
		a := f.m.Motion.At(time)
		return f.pull(&a, time, f.free.local(at, y))
	})
	return e
}

// settle ends a release that flew out of its time or out of the hull. Of a
// touch and a loss at one instant the touch counts.
func (f *Flier) settle(t *Track, now *moving, res integrator.Result) {
	switch {
	case !res.Stopped:
		f.end(t, now, TimeUp)
	case f.lost(t, now, res):
		f.end(t, now, Lost)
	default:
		return
	}
	t.Last = f.arrival
}

// longest is how long a release may take, s.
func (f *Flier) longest(r *model.Release) float64 {
	if r.Until.Kind == model.UntilDuration {
		return math.Min(r.Until.Duration, f.m.Solver.MaxTime)
	}
	return f.m.Solver.MaxTime
}
