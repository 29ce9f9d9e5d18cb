package flight

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/integrator"
	"offplumb/sim/frame"
	"offplumb/sim/geom"
	"offplumb/sim/model"
)

// Dust follows the air within its relaxation time tau, so that an explicit
// method would take steps of a few tau through a fall of a million of them. A
// body whose tau is a small share of the pace T of what goes on about it is
// flown by the full equations for settleTimes tau, in which its start dies out,
// and then drifts: its velocity is that at which drag balances all else,
//
//	K(|v - w|) (v - w) = B(r) - 2 omega x v - A,  A = (V . grad) V
//
// in the habitat's frame, with w the draft, B the accelerations but for drag, and
// V the solution for A = 0 (the slow manifold of the equation: Maxey, J. Fluid
// Mech. 174 (1987) 441, for small tau; from memory). What A lacks of the true
// acceleration moves v by a share of about (tau/T)^2.
const (
	// quickShare is the share tau/T below which a body drifts: the velocity is
	// then off by 1e-6 or little more. At 5 rpm T is 2 s: water drops below 25 um.
	quickShare = 1e-3
	// settleTimes is how many tau the start takes: it leaves e^-25, 1.4e-11.
	settleTimes = 25
	// driftBound is the bound on the error of a drift, as a share of the way
	// relative to the habitat, by (tau/T)^2: what the error is in tests, with a
	// margin of some times.
	driftBound = 10
	// leastPace is the rate, 1/s, of what goes on about a body where nothing
	// else tells: in 10 s it may feel something else.
	leastPace = 0.1
	// quickReynolds bounds the Reynolds number of the fall, so that the balance
	// is found by iteration, which gains half a digit or more a time.
	quickReynolds = 50
	// mostBalances bounds the iterations.
	mostBalances = 100
	// balanced is the change, as a share, at which they end: rounding.
	balanced = 4e-16
	// driftTurn is how far, in rad, the habitat turns in a step at most, so that
	// it is smooth in the inertial frame too.
	driftTurn = 1
	// fieldShare is the share of T over which A is differenced: its error,
	// (1e-3)^2 of it by the cut series, is below what A lacks.
	fieldShare = 1e-3
)

// Quick says how fast a body takes up the motion of the air.
type Quick struct {
	Relaxation float64 // s, tau: mass by drag and speed where the speed vanishes
	Pace       float64 // s, T: the time in which what it feels changes by as much as it is
}

// Drifts says whether a body is flown by the drift model.
func (q Quick) Drifts() bool { return q.Relaxation > 0 && q.Relaxation <= quickShare*q.Pace }

// Bound bounds the error of a drift, as a share of the way in the habitat.
func (q Quick) Bound() float64 {
	x := q.Relaxation / q.Pace
	return driftBound * x * x
}

// QuickOf tells how fast a body takes up the motion of the air, and in what.
// Without drag, or where Stokes' law is far from it, the relaxation is 0.
func QuickOf(m *model.Model, b model.Body) Quick { return quickOf(m, NewForces(m, b, nil), b) }

func quickOf(m *model.Model, f *Forces, b model.Body) Quick {
	k := f.drag.PerVelocity2(0)
	if f.drag.None() || k == 0 {
		return Quick{}
	}
	inertia := b.Mass
	if f.around != nil {
		inertia += addedShare * f.around.moved
	}
	fastest, _ := f.motion.Bounds(0, m.Settled())
	rate := math.Max(leastPace, fastest)
	if s := f.motion.Stretch(0); !s.Steady() {
		rate = math.Max(rate, 1/s.Pace)
	}
	for _, c := range m.Habitat.Changes {
		rate = math.Max(rate, 4/c.Over) // 3u^2 - 2u^3 bends at a rate of 6 over its time
	}
	if d := m.Weather.Draft; d != nil {
		// The fade about the axis, of a slope of 1.5 over the core, and the turning there.
		rate = math.Max(rate, d.Steepest()+3*d.Fastest()/(model.DraftCore*m.Habitat.FloorRadius))
	}
	q := Quick{Relaxation: inertia / k, Pace: 1 / rate}
	slip := q.Relaxation * (fastest*fastest*m.Habitat.FloorRadius + f.ambient(m))
	if m.Air.Density*b.Diameter*slip/m.Air.Viscosity > quickReynolds {
		return Quick{}
	}
	return q
}

// ambient is the strength of the ambient fields at the reference floor, m/s^2.
func (f *Forces) ambient(m *model.Model) float64 {
	total := r3.Vec{}
	for _, g := range f.fields {
		total = r3.Add(total, g.Accel(0, frame.State{Pos: r3.Vec{X: m.Habitat.FloorRadius}}))
	}
	return r3.Norm(total)
}

// drift is a body that drifts, as a system of equations in the habitat frame:
// its state is the place from the start of the phase (m).
type drift struct {
	f      *Forces
	step   float64 // s, over which A is differenced
	begin  float64 // s, habitat time at t = 0
	first  float64 // s, habitat time before which the habitat may turn by another law
	last   float64 // s, habitat time of the last instant of the stretch of the habitat's motion
	origin r3.Vec  // m
}

func (d *drift) stepper(s model.Solver) (*integrator.Stepper, error) {
	return integrator.NewStepper(integrator.DormandPrince54(), d, integrator.Tol{Rel: s.RelTol, Abs: []float64{s.PosTol}, Groups: []int{3}})
}

// Dim implements [integrator.System].
func (d *drift) Dim() int { return 3 }

// Deriv implements [integrator.System].
func (d *drift) Deriv(t float64, y, dy []float64) {
	v := d.velocity(t, r3.Add(d.origin, vec(y)))
	dy[0], dy[1], dy[2] = v.X, v.Y, v.Z
}

// velocity gives the velocity in the habitat (m/s) at a place there.
func (d *drift) velocity(t float64, q r3.Vec) r3.Vec {
	time := math.Min(d.begin+t, d.last)
	v := d.balance(time, q, r3.Vec{})
	to, from := math.Min(time+d.step, d.last), math.Max(time-d.step, d.first)
	fore := d.balance(to, r3.Add(q, r3.Scale(to-time, v)), r3.Vec{})
	aft := d.balance(from, r3.Add(q, r3.Scale(from-time, v)), r3.Vec{})
	return d.balance(time, q, r3.Scale(1/(to-from), r3.Sub(fore, aft)))
}

// balance gives the velocity at which drag balances all else but for the
// acceleration acc (m/s^2), all in habitat components.
func (d *drift) balance(time float64, q, acc r3.Vec) r3.Vec {
	a := d.f.motion.At(time)
	pos := a.Out(q)
	h := here{wind: r3.Cross(a.Omega, pos), density: 1, perMass: d.f.perMass}
	if d.f.around != nil {
		h = d.f.around.at(d.f, time, pos)
	}
	h.weigh(d.f, d.f.around, time, frame.State{Pos: pos, Vel: h.wind})
	wind := a.In(r3.Sub(h.wind, r3.Cross(a.Omega, pos)))
	push := r3.Sub(r3.Add(a.In(h.rest), a.Apparent(frame.State{Pos: q}).Sum()), acc)
	omega := a.In(a.Omega)
	v := wind
	for range mostBalances {
		all := r3.Sub(push, r3.Scale(2, r3.Cross(omega, v)))
		next := r3.Add(wind, r3.Scale(1/(h.perMass*h.rate(d.f, r3.Norm2(r3.Sub(v, wind)))), all))
		change := r3.Norm(r3.Sub(next, v))
		v = next
		if change <= balanced*r3.Norm(v) {
			break
		}
	}
	return v
}

// quickIn says after what time (s) a body drifts, and whether that is now.
func (f *Flier) quickIn(now *moving) (in float64, drifts bool) {
	if !f.quick.Drifts() {
		return math.Inf(1), false
	}
	// A few roundings of the time may be left.
	left := settleTimes*f.quick.Relaxation - now.t
	return left, left <= 1e-9*settleTimes*f.quick.Relaxation
}

// driftOn lets a body drift to a touch, the end of its time or of the stretch of
// the habitat's motion, or its loss.
func (f *Flier) driftOn(t *Track, now *moving) (ending, error) {
	forces := f.free.forces // the track keeps it
	d := &drift{f: &forces, step: fieldShare * f.quick.Pace, begin: t.Begin + now.t, origin: now.q}
	phase := Phase{Kind: Free, T0: now.t, local: true, drift: d}
	st, err := d.stepper(f.m.Solver)
	if err != nil {
		return ending{}, err
	}
	omega, _ := f.m.Motion.Bounds(d.begin, d.begin)
	r := &run{st: st, most: driftTurn / math.Max(omega, slowest), limit: f.longest(t.Release) - now.t, events: func([]geom.Patch) *ends { return f.driftEvents(d) }}
	r.smooth, d.last = f.smoothUntil(t, now)
	d.first = math.Inf(-1)
	if !f.m.Motion.Stretch(d.begin).Steady() {
		d.first = d.begin
	}
	phase.base = frame.State{Pos: now.q, Vel: d.velocity(0, now.q)}
	res, end, err := f.solve(t, &phase, r, f.zero[:3])
	if err != nil {
		return ending{}, err
	}
	now.t += res.T
	phase.T1 = now.t
	t.add(phase)
	now.q = r3.Add(d.origin, vec(res.Y))
	now.v, now.w = d.velocity(res.T, now.q), r3.Vec{}
	f.arrival = f.inertial(t, now)
	switch {
	case end.breaks:
		return end, nil
	case !res.Stopped:
		f.end(t, now, TimeUp)
	case res.Hits[0].Event == 1: // of a touch and a loss at one instant the touch counts
		f.end(t, now, Lost)
	default:
		return end, nil
	}
	t.Last = f.arrival
	return end, nil
}

// driftEvents lists what ends a drift, in the order of flightEvents.
func (f *Flier) driftEvents(d *drift) *ends {
	f.watch = geom.Beside{Wide: f.wide, Thin: thin, Slop: slop(d.origin) / 2}
	e := &ends{}
	e.add(nears{f, d}, slop(d.origin)/4, turns)
	e.add(strayed{f, d}, 0, turns)
	return e
}

// nears is the gap of a drifting body to all there is.
type nears struct {
	f *Flier
	d *drift
}

func (e nears) Value(_ float64, y []float64) float64 {
	return math.Min(e.f.m.Interior.DistBeside(r3.Add(e.d.origin, vec(y)), &e.f.watch), math.MaxFloat32) - e.f.wide
}

func (e nears) Bound(s *integrator.Step, t float64, y []float64) (rate, accel, least float64) {
	var dy [3]float64
	s.Rate(t, dy[:])
	time := e.f.m.Interior.TimeBeside(r3.Add(e.d.origin, vec(y)), vec(dy[:]), s.MaxAccel(0, 3), s.T1-t, &e.f.watch)
	return promise(e.Value(t, y), time), 0, thin
}

// strayed is how far a drifting body is from the hull's outer face, within.
type strayed struct {
	f *Flier
	d *drift
}

func (e strayed) Value(_ float64, y []float64) float64 {
	return -e.f.m.Interior.Beyond(r3.Add(e.d.origin, vec(y)))
}

func (e strayed) Bound(s *integrator.Step, t float64, _ []float64) (rate, accel, least float64) {
	var dy [3]float64
	s.Rate(t, dy[:])
	return r3.Norm(vec(dy[:])), s.MaxAccel(0, 3), thin
}

// sticks ends a release of dust that touches a surface: it neither rebounds nor
// slides, since grains of some tens of micrometres are held by far more than
// their weight (Hinds, Aerosol Technology, chapter 6; from memory).
func (f *Flier) sticks(t *Track, now *moving, c *geom.Touch) {
	if now.t == 0 {
		f.arrival = t.First
	}
	f.record(t, *now, c)
	if t.Release.Until.Kind == model.UntilLanding {
		f.end(t, now, Landed)
		t.Last = f.arrival
		return
	}
	now.v, now.w = r3.Vec{}, r3.Vec{}
	t.Phases = append(t.Phases, Phase{Kind: Rest, local: true, base: frame.State{Pos: now.q}, T0: now.t, T1: now.t,
		Surface: f.m.Interior.Surface(c.Surface).Name})
	f.end(t, now, Rested)
}
