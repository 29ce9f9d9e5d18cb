package flight

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/integrator"
	"offplumb/sim/frame"
	"offplumb/sim/geom"
)

const (
	// probe is the way, in m, over which a surface's normal is differenced for
	// its curvature: a hundred thousandth of a body's size, where rounding
	// (1e-16 of the habitat's size, over probe) and truncation are both far
	// below what contact models are good for.
	probe = 1e-5
	// regain is the rate, 1/s, at which a body in contact is brought back onto
	// its surface from the drift of the integration (Baumgarte 1972; from
	// memory). Slow, since a fast one would govern the steps; what is left at
	// the end of a phase is taken away at once.
	regain = 0.5
	// creep is the speed, in m/s, below which a sliding body counts as having
	// stopped: it would come to rest within a nanometre.
	creep = 1e-5
	// rollCreep is the same of a rolling one, which nothing but air slows.
	rollCreep = 1e-3
	// level is the share of the normal force that may pull a rolling body
	// along while it counts as at rest.
	level = 1e-6
)

// dims is the size of the state in contact: place, velocity, spin.
const dims = 9

// slide is a body in contact with one to three groups of surfaces, as a system
// of equations in the habitat frame. Its state is the place from the start of
// the phase (m), the velocity (m/s), and the spin relative to the habitat
// (rad/s), which only a rolling body has.
//
//	q'' = A + sum N_i n_i + f
//
// with A the apparent accelerations and drag, and N_i such that the gaps stay
// (see balance). A body that does not roll has f = -sum(mu N) v/|v|. One that
// rolls, a solid sphere of inertia 2/5 m a^2, has the contact point's velocity
// u = v - a W x n, and
//
//	W' = -5/(2a) n x f - omega x W - domega/dt
//	f  = -mu N u/|u| while it slips, else such that u stays 0:
//	f  = 2/7 (a (-omega x W - domega/dt) x n + a W x n' - A), across n
//
// (Newton-Euler equations; Goldstein, Classical Mechanics, chapter 5, from
// memory). In a corner a rolling body slides like any other.
type slide struct {
	flier   *Flier
	begin   float64 // s, habitat time at t = 0
	origin  r3.Vec  // m, the place at the start of the phase
	touched []geom.Touch
	mu      [mostContacts]float64
	rolls   bool // one contact, and the body rolls
	slips   bool // it rolls, and its contact point moves

	push [mostContacts]push
	// Of the last derivative.
	acc   r3.Vec // whole acceleration
	drive r3.Vec // pull across the normals
	grip  r3.Vec // friction by mass
	vel   r3.Vec
}

// Dim implements [integrator.System].
func (s *slide) Dim() int { return dims }

// Deriv implements [integrator.System].
func (s *slide) Deriv(t float64, y, dy []float64) {
	spin := s.eval(t, y)
	v := s.vel
	acc := r3.Add(s.acc, s.recall(y))
	dy[0], dy[1], dy[2] = v.X, v.Y, v.Z
	dy[3], dy[4], dy[5] = acc.X, acc.Y, acc.Z
	dy[6], dy[7], dy[8] = spin.X, spin.Y, spin.Z
}

func vec(y []float64) r3.Vec { return r3.Vec{X: y[0], Y: y[1], Z: y[2]} }

// eval works out forces and accelerations at a state, and gives the rate of
// the spin.
func (s *slide) eval(t float64, y []float64) r3.Vec {
	q, v, w := r3.Add(s.origin, vec(y)), vec(y[3:]), vec(y[6:])
	a := s.flier.m.Motion.At(s.begin + t)
	pull := s.flier.pull(&a, s.begin+t, frame.State{Pos: q, Vel: v})
	n := len(s.touched)
	p := s.push[:n]
	var turn r3.Vec
	for i := range p {
		c, rate := s.flier.bend(q, v, s.touched[i].Group)
		p[i] = push{normal: c.Normal, closing: r3.Dot(v, rate), mu: s.mu[i]}
		s.touched[i].Contact = c
		turn = rate
	}
	balance(p, pull)
	s.vel, s.drive = v, pull
	for i := range p {
		s.drive = r3.Add(s.drive, r3.Scale(p[i].force, p[i].normal))
	}
	if !s.rolls {
		s.grip = friction(p, v, s.drive)
		s.acc = r3.Add(s.drive, s.grip)
		return r3.Vec{}
	}
	return s.roll(&a, p[0], v, w, turn)
}

// friction is the acceleration by sliding friction; of a body that stands,
// against what drives it, which it cannot exceed.
func friction(p []push, v, drive r3.Vec) r3.Vec {
	grip := 0.0
	for i := range p {
		grip += p[i].mu * math.Max(0, p[i].force)
	}
	if speed := r3.Norm(v); speed > 0 {
		return r3.Scale(-grip/speed, v)
	}
	if d := r3.Norm(drive); d > 0 {
		return r3.Scale(-math.Min(1, grip/d), drive)
	}
	return r3.Vec{}
}

// roll works out a rolling body, and gives the rate of its spin.
func (s *slide) roll(a *frame.Attitude, p push, v, w, turn r3.Vec) r3.Vec {
	wide := s.flier.wide
	omega, alpha := a.In(a.Omega), a.In(a.Alpha)
	carried := r3.Scale(-1, r3.Add(r3.Cross(omega, w), alpha))
	u := r3.Sub(v, r3.Scale(wide, r3.Cross(w, p.normal)))
	u = r3.Sub(u, r3.Scale(r3.Dot(u, p.normal), p.normal))
	if speed := r3.Norm(u); s.slips && speed > 0 {
		s.grip = r3.Scale(-p.mu*math.Max(0, p.force)/speed, u)
	} else {
		want := r3.Add(r3.Scale(wide, r3.Cross(carried, p.normal)), r3.Scale(wide, r3.Cross(w, turn)))
		want = r3.Sub(r3.Sub(want, s.drive), r3.Scale(regain, u))
		s.grip = r3.Scale(2.0/7, r3.Sub(want, r3.Scale(r3.Dot(want, p.normal), p.normal)))
	}
	s.acc = r3.Add(s.drive, s.grip)
	return r3.Add(r3.Scale(-2.5/wide, r3.Cross(p.normal, s.grip)), carried)
}

// slip is the speed (m/s) of a rolling body's contact point, at the last eval.
func (s *slide) slip(y []float64) float64 {
	n := s.push[0].normal
	u := r3.Sub(vec(y[3:]), r3.Scale(s.flier.wide, r3.Cross(vec(y[6:]), n)))
	return r3.Norm(r3.Sub(u, r3.Scale(r3.Dot(u, n), n)))
}

// recall is what brings the body back onto its surfaces.
func (s *slide) recall(y []float64) r3.Vec {
	var out r3.Vec
	v := vec(y[3:])
	for i := range s.touched {
		c := &s.touched[i]
		off := c.Gap - s.flier.wide
		out = r3.Add(out, r3.Scale(-2*regain*r3.Dot(v, c.Normal)-regain*regain*off, c.Normal))
	}
	return out
}

// pull is the acceleration, m/s^2 in habitat components, that a body free of
// contact has there.
func (f *Flier) pull(a *frame.Attitude, t float64, s frame.State) r3.Vec {
	return r3.Add(a.Apparent(s).Sum(), a.In(f.free.forces.Accel(t, a.ToInertial(s))))
}

// bend gives the contact of a group at q, and the rate at which its normal
// turns as the body moves with the velocity v.
func (f *Flier) bend(q, v r3.Vec, g geom.Group) (geom.Contact, r3.Vec) {
	in := f.m.Interior
	c := in.ContactIn(q, g)
	speed := r3.Norm(v)
	if speed == 0 {
		return c, r3.Vec{}
	}
	step := r3.Scale(probe/speed, v)
	fore, aft := in.ContactIn(r3.Add(q, step), g), in.ContactIn(r3.Sub(q, step), g)
	return c, r3.Scale(speed/(2*probe), r3.Sub(fore.Normal, aft.Normal))
}

// Events of a body in contact.

// besides is the gap to what the body does not touch yet.
type besides struct{ s *slide }

func (e besides) Value(_ float64, y []float64) float64 {
	d := e.s.flier.m.Interior.DistBeside(r3.Add(e.s.origin, vec(y)), e.s.touched)
	return math.Min(d, math.MaxFloat32) - e.s.flier.wide // where there is nothing else
}

func (e besides) Bound(s *integrator.Step, t float64, _ []float64) (rate, accel, least float64) {
	var dy [dims]float64
	s.Rate(t, dy[:])
	return r3.Norm(vec(dy[:])), s.MaxAccel(0, 3), thin
}

// parts is the normal force of one contact: it parts where that ends.
type parts struct {
	s *slide
	i int
}

func (e parts) Value(t float64, y []float64) float64 {
	e.s.eval(t, y)
	return e.s.push[e.i].force
}

// stops is the speed above that at which a body counts as having stopped.
type stops struct {
	s    *slide
	slow float64
}

func (e stops) Value(_ float64, y []float64) float64 { return r3.Norm(vec(y[3:])) - e.slow }

func (e stops) Bound(s *integrator.Step, t float64, _ []float64) (rate, accel, least float64) {
	var dy [dims]float64
	s.Rate(t, dy[:])
	return r3.Norm(vec(dy[3:])), s.MaxAccel(3, 6), e.slow / 2
}

// grips is the speed of a slipping contact point above creep.
type grips struct{ s *slide }

func (e grips) Value(t float64, y []float64) float64 {
	e.s.eval(t, y)
	return e.s.slip(y) - creep
}

// skids is what friction has left to give to a rolling body.
type skids struct{ s *slide }

func (e skids) Value(t float64, y []float64) float64 {
	e.s.eval(t, y)
	return e.s.push[0].mu*math.Max(0, e.s.push[0].force) - r3.Norm(e.s.grip)
}
