package flight

import (
	"math"
	"math/bits"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/frame"
	"offplumb/sim/geom"
)

const (
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
// (see balance). The friction f is that of rub. What the gaps drift by is taken
// away between steps (see tidy): a force that did it would govern their length.
type slide struct {
	flier  *Flier
	begin  float64 // s, habitat time at t = 0
	last   float64 // s, habitat time of the last instant of the stretch of the habitat's motion, after which loads may jump
	origin r3.Vec  // m, the place at the start of the phase
	on     []geom.Patch
	mu     [mostContacts]float64
	slips  bool         // it rolls, and its contact point moves
	grazed []geom.Patch // touched without pressure
	walls  []push       // space for what of that is near

	// Of the last evaluation, which the events at the end of a step share.
	known bool
	when  float64
	state [dims]float64
	vel   r3.Vec
	push  [mostContacts]push
	rub   rubbing
}

// Dim implements [integrator.System].
func (s *slide) Dim() int { return dims }

// Deriv implements [integrator.System].
func (s *slide) Deriv(t float64, y, dy []float64) {
	s.eval(t, y)
	v, acc, spin := s.vel, s.rub.acc, s.rub.spin
	dy[0], dy[1], dy[2] = v.X, v.Y, v.Z
	dy[3], dy[4], dy[5] = acc.X, acc.Y, acc.Z
	dy[6], dy[7], dy[8] = spin.X, spin.Y, spin.Z
}

func vec(y []float64) r3.Vec { return r3.Vec{X: y[0], Y: y[1], Z: y[2]} }

// local gives a state in the habitat.
func (s *slide) local(_ float64, y []float64) frame.State {
	return frame.State{Pos: s.place(y), Vel: vec(y[3:])}
}

// place is where a state is, m.
func (s *slide) place(y []float64) r3.Vec { return r3.Add(s.origin, vec(y)) }

// eval works out forces and accelerations at a state.
func (s *slide) eval(t float64, y []float64) {
	if s.known && s.when == t && s.state == [dims]float64(y) {
		return
	}
	s.known, s.when, s.state = true, t, [dims]float64(y)
	f := s.flier
	q, v, w := s.place(y), vec(y[3:]), vec(y[6:])
	time := math.Min(s.begin+t, s.last)
	a := f.m.Motion.At(time)
	pull := f.pull(&a, time, frame.State{Pos: q, Vel: v})
	p := s.push[:len(s.on)]
	for i, g := range s.on {
		p[i], _ = f.pushOf(q, v, g, s.mu[i])
	}
	balance(p, pull)
	s.vel = v
	s.rub = f.rub(&a, p, s.fences(q, pull), pull, v, w, s.slips)
}

// fences are the contacts of a rolling body that it grazes.
func (s *slide) fences(q, pull r3.Vec) []push {
	out := s.walls[:0]
	if !s.flier.rolls(len(s.on)) {
		return out
	}
	for _, g := range s.grazed {
		if p, gap := s.flier.pushOf(q, s.vel, g, 0); gap <= s.flier.wide+2*thin {
			p.noise = noise(pull, s.vel)
			out = append(out, p)
		}
	}
	s.walls = out
	return out
}

// slip is the velocity (m/s) of the contact point at a state, at the last
// normal that was worked out.
func (s *slide) slip(y []float64) r3.Vec {
	return s.flier.slipOf(vec(y[3:]), vec(y[6:]), s.push[0].normal)
}

// rubbing is what friction does to a body in contact.
type rubbing struct {
	drive r3.Vec  // m/s^2, acceleration but for friction
	acc   r3.Vec  // m/s^2, whole acceleration of the body
	spin  r3.Vec  // rad/s^2, rate of its spin
	need  float64 // m/s^2, friction by mass that rolling without slip takes
	most  float64 // m/s^2, friction by mass that there is
}

// rub gives the friction of contacts whose normal forces are known. A body
// that does not roll has f = -sum(mu N) v/|v|; for one that does see roll.
func (f *Flier) rub(a *frame.Attitude, p, walls []push, pull, v, w r3.Vec, slips bool) rubbing {
	out := rubbing{drive: pull}
	for i := range p {
		out.drive = r3.Add(out.drive, r3.Scale(p[i].force, p[i].normal))
		out.most += p[i].mu * math.Max(0, p[i].force)
	}
	if f.rolls(len(p)) {
		f.roll(&out, a, p[0], walls, pull, v, w, slips)
	} else {
		out.acc = r3.Add(out.drive, against(v, out.drive, out.most))
	}
	return out
}

// roll works out a body that rolls, a solid sphere of inertia 2/5 m a^2: with
// the contact point's velocity u = v - a W x n,
//
//	W' = -5/(2a) n x f - omega x W - domega/dt
//	f  = -mu N u/|u| while it slips, else such that u stays 0:
//	f  = 2/7 (a (-omega x W - domega/dt) x n + a W x n' - A), across n
//
// (Newton-Euler equations; Goldstein, Classical Mechanics, chapter 5, from
// memory). In a corner a rolling body slides like any other. Where slip as good
// as vanishes there is no telling its direction: the friction is then what
// keeps it so, as far as there is enough.
//
// Walls are what the body touches without being pressed there by its weight,
// such as a bulkhead that it rolled against. Where its friction on the floor
// drives it into one, that gives way with a normal force, which is small and
// taken to be without friction.
func (f *Flier) roll(out *rubbing, a *frame.Attitude, p push, walls []push, pull, v, w r3.Vec, slips bool) {
	u := f.slipOf(v, w, p.normal)
	carried := f.carried(a, w)
	var grip r3.Vec
	if speed := r3.Norm(u); slips && speed > creep {
		out.acc, grip = skid(p, walls, pull, r3.Scale(-1/speed, u))
		out.most = r3.Norm(grip)
	} else {
		want := r3.Scale(f.wide, r3.Add(r3.Cross(carried, p.normal), r3.Cross(w, p.turn)))
		out.acc, grip = clutch(p, walls, pull, want)
		if out.need = r3.Norm(grip); slips && out.need > out.most {
			out.acc, grip = skid(p, walls, pull, r3.Scale(1/out.need, grip))
		}
	}
	out.spin = r3.Add(r3.Scale(-2.5/f.wide, r3.Cross(p.normal, grip)), carried)
}

// skid gives acceleration and friction of a rolling body that slips: the
// friction has the direction dir.
func skid(p push, walls []push, pull, dir r3.Vec) (acc, grip r3.Vec) {
	p.answer = r3.Add(p.normal, r3.Scale(p.mu, dir))
	for i := range walls {
		walls[i].answer = walls[i].normal
	}
	return fend(p, walls, pull)
}

// clutch gives acceleration and friction of one that does not, for which the
// contact point is to gain what want (m/s^2) tells.
func clutch(p push, walls []push, pull, want r3.Vec) (acc, grip r3.Vec) {
	free := r3.Scale(rollShare, p.along(r3.Sub(want, pull)))
	for i := range walls {
		walls[i].answer = r3.Sub(walls[i].normal, r3.Scale(rollShare, p.along(walls[i].normal)))
	}
	acc, grip = fend(p, walls, r3.Add(pull, free))
	return acc, r3.Add(free, grip)
}

// along gives the part of v along a contact's surface.
func (p *push) along(v r3.Vec) r3.Vec { return r3.Sub(v, r3.Scale(r3.Dot(v, p.normal), p.normal)) }

// fend finds the normal forces of a floor and of the walls that give way to
// what drives the body into them, and gives the acceleration, and the part of
// it that is not along normals.
func fend(floor push, walls []push, base r3.Vec) (acc, rest r3.Vec) {
	var space [mostContacts]push
	for size := 0; size < mostContacts; size++ {
		for set := 0; set < 1<<len(walls); set++ {
			if bits.OnesCount(uint(set)) != size {
				continue
			}
			all := append(space[:0], floor)
			for i := range walls {
				if set&(1<<i) != 0 {
					all = append(all, walls[i])
				}
			}
			if !balance(all, base) || pulls(all[1:]) {
				continue
			}
			if acc, rest = sum(all, base); !closes(walls, set, acc) {
				return acc, rest
			}
		}
	}
	all := append(space[:0], floor)
	balance(all, base)
	return sum(all, base)
}

// pulls says whether one of the normal forces would have to pull.
func pulls(p []push) bool {
	for i := range p {
		if p[i].force < 0 {
			return true
		}
	}
	return false
}

// closes says whether the gap to a wall that is not of the set closes.
func closes(walls []push, set int, acc r3.Vec) bool {
	for i := range walls {
		if set&(1<<i) == 0 && r3.Dot(walls[i].normal, acc)+walls[i].closing < -walls[i].noise {
			return true
		}
	}
	return false
}

// sum gives the acceleration by contacts whose normal forces are known, and the
// part of theirs that is not along their normals.
func sum(all []push, base r3.Vec) (acc, rest r3.Vec) {
	acc = base
	for i := range all {
		acc = r3.Add(acc, r3.Scale(all[i].force, all[i].answer))
		rest = r3.Add(rest, r3.Scale(all[i].force, r3.Sub(all[i].answer, all[i].normal)))
	}
	return acc, rest
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
