package flight

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/frame"
	"offplumb/sim/geom"
)

const (
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
// (see balance). The friction f is that of rub.
type slide struct {
	flier  *Flier
	begin  float64 // s, habitat time at t = 0
	origin r3.Vec  // m, the place at the start of the phase
	groups []geom.Group
	mu     [mostContacts]float64
	slips  bool // it rolls, and its contact point moves

	// Of the last derivative.
	vel, acc r3.Vec // acc without what brings the body back
	push     [mostContacts]push
	gap      [mostContacts]float64 // m, of the centre
	rub      rubbing
}

// Dim implements [integrator.System].
func (s *slide) Dim() int { return dims }

// Deriv implements [integrator.System].
func (s *slide) Deriv(t float64, y, dy []float64) {
	s.eval(t, y)
	v, acc, spin := s.vel, r3.Add(s.rub.acc, s.recall()), s.rub.spin
	dy[0], dy[1], dy[2] = v.X, v.Y, v.Z
	dy[3], dy[4], dy[5] = acc.X, acc.Y, acc.Z
	dy[6], dy[7], dy[8] = spin.X, spin.Y, spin.Z
}

func vec(y []float64) r3.Vec { return r3.Vec{X: y[0], Y: y[1], Z: y[2]} }

// place is where a state is, m.
func (s *slide) place(y []float64) r3.Vec { return r3.Add(s.origin, vec(y)) }

// eval works out forces and accelerations at a state.
func (s *slide) eval(t float64, y []float64) {
	f := s.flier
	q, v, w := s.place(y), vec(y[3:]), vec(y[6:])
	a := f.m.Motion.At(s.begin + t)
	pull := f.pull(&a, s.begin+t, frame.State{Pos: q, Vel: v})
	p := s.push[:len(s.groups)]
	for i, g := range s.groups {
		p[i], s.gap[i] = f.pushOf(q, v, g, s.mu[i])
	}
	balance(p, pull)
	s.vel, s.rub = v, f.rub(&a, p, pull, v, w, s.slips)
}

// recall is what brings the body back onto its surfaces.
func (s *slide) recall() r3.Vec {
	var out r3.Vec
	for i := range s.groups {
		n := s.push[i].normal
		off := s.gap[i] - s.flier.wide
		out = r3.Add(out, r3.Scale(-2*regain*r3.Dot(s.vel, n)-regain*regain*off, n))
	}
	return out
}

// slip is the velocity (m/s) of the contact point at a state, at the last
// normal that was worked out.
func (s *slide) slip(y []float64) r3.Vec {
	return s.flier.slipOf(vec(y[3:]), vec(y[6:]), s.push[0].normal)
}

// rubbing is what friction does to a body in contact.
type rubbing struct {
	acc  r3.Vec  // m/s^2, whole acceleration of the body
	spin r3.Vec  // rad/s^2, rate of its spin
	need float64 // m/s^2, friction by mass that rolling without slip takes
	most float64 // m/s^2, friction by mass that there is
}

// rub gives the friction of contacts whose normal forces are known. A body
// that does not roll has f = -sum(mu N) v/|v|. One that rolls, a solid sphere
// of inertia 2/5 m a^2, has the contact point's velocity u = v - a W x n, and
//
//	W' = -5/(2a) n x f - omega x W - domega/dt
//	f  = -mu N u/|u| while it slips, else such that u stays 0:
//	f  = 2/7 (a (-omega x W - domega/dt) x n + a W x n' - A), across n
//
// (Newton-Euler equations; Goldstein, Classical Mechanics, chapter 5, from
// memory). In a corner a rolling body slides like any other. Where slip as good
// as vanishes there is no telling its direction: the friction is then what
// keeps it so, as far as there is enough.
func (f *Flier) rub(a *frame.Attitude, p []push, pull, v, w r3.Vec, slips bool) rubbing {
	drive, most := pull, 0.0
	for i := range p {
		drive = r3.Add(drive, r3.Scale(p[i].force, p[i].normal))
		most += p[i].mu * math.Max(0, p[i].force)
	}
	out := rubbing{most: most}
	if !f.rolls(len(p)) {
		out.acc = r3.Add(drive, against(v, drive, most))
		return out
	}
	n := p[0].normal
	carried := f.carried(a, w)
	u := f.slipOf(v, w, n)
	want := r3.Scale(f.wide, r3.Add(r3.Cross(carried, n), r3.Cross(w, p[0].turn)))
	want = r3.Sub(r3.Sub(want, drive), r3.Scale(regain, u))
	grip := r3.Scale(2.0/7, r3.Sub(want, r3.Scale(r3.Dot(want, n), n)))
	out.need = r3.Norm(grip)
	if speed := r3.Norm(u); slips && speed > creep {
		grip = r3.Scale(-most/speed, u)
	} else if slips && out.need > most {
		grip = r3.Scale(most/out.need, grip)
	}
	out.acc = r3.Add(drive, grip)
	out.spin = r3.Add(r3.Scale(-2.5/f.wide, r3.Cross(n, grip)), carried)
	return out
}

// carried is the rate at which the spin of a body without torque changes in
// the habitat frame, rad/s^2.
func (f *Flier) carried(a *frame.Attitude, w r3.Vec) r3.Vec {
	return r3.Scale(-1, r3.Add(r3.Cross(a.In(a.Omega), w), a.In(a.Alpha)))
}

// against is the friction of a body that slides with the velocity v, of the
// size most (m/s^2); of one that stands, against what drives it, which it
// cannot exceed.
func against(v, drive r3.Vec, most float64) r3.Vec {
	if speed := r3.Norm(v); speed > 0 {
		return r3.Scale(-most/speed, v)
	}
	if d := r3.Norm(drive); d > 0 {
		return r3.Scale(-math.Min(1, most/d), drive)
	}
	return r3.Vec{}
}
