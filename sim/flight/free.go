package flight

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/integrator"
	"offplumb/sim/frame"
	"offplumb/sim/geom"
)

// free is a body in flight, as a system of equations. Its state is the
// departure from uniform motion in the inertial frame, so that the tolerances
// hold for what the forces do, in a habitat of any size, and a flight without
// forces is exact:
//
//	r(t) = r0 + v0 t + y[0:3],  v(t) = v0 + y[3:6],  y' = (y[3:6], a(t, r, v))
//
// Law: seen from another inertial frame the steps are the same.
type free struct {
	base   frame.State // r0, v0: inertial, at t = 0
	begin  float64     // s, habitat time at t = 0
	last   float64     // s, habitat time of the last instant of the stretch of the habitat's motion
	forces *Forces
}

// Dim implements [integrator.System].
func (f *free) Dim() int { return 6 }

// Deriv implements [integrator.System].
func (f *free) Deriv(t float64, y, dy []float64) {
	a := f.forces.Accel(f.begin+t, depart(f.base, t, y))
	dy[0], dy[1], dy[2] = y[3], y[4], y[5]
	dy[3], dy[4], dy[5] = a.X, a.Y, a.Z
}

// local gives the state in the habitat.
func (f *free) local(t float64, y []float64) frame.State {
	a := f.forces.motion.At(f.begin + t)
	return a.ToHabitat(depart(f.base, t, y))
}

// depart gives the inertial state of a departure y from the uniform motion of
// base at the time t (s).
func depart(base frame.State, t float64, y []float64) frame.State {
	return frame.State{
		Pos: r3.Vec{X: base.Pos.X + (t*base.Vel.X + y[0]), Y: base.Pos.Y + (t*base.Vel.Y + y[1]), Z: base.Pos.Z + (t*base.Vel.Z + y[2])},
		Vel: r3.Vec{X: base.Vel.X + y[3], Y: base.Vel.Y + y[4], Z: base.Vel.Z + y[5]},
	}
}

// thin is the depth, in m, below which a touch need not be told from a miss:
// a thousandth of a millimetre.
const thin = 1e-6

// apart is how a body in flight may end: a distance that depends on its place
// in the habitat alone, with Lipschitz constant 1. It promises its rate by the
// velocity u relative to the habitat, whatever its way of turning:
//
//	|gap'| <= |u|,  u = r' - omega x r,  |u'| <= |r''| + |domega/dt| |r| + |omega| |r'|
//
// Seen in the habitat, the direction of u changes too: its rate there is within
// |u'| + |omega| |u|.
type apart struct {
	free *free
	of   func(local r3.Vec) float64
	// time, if it is not nil, gives a time (s, at most limit) during which the
	// distance surely does not vanish, at a place with a velocity and a bound on
	// the acceleration, all in the habitat.
	time func(local, vel r3.Vec, acc, limit float64) float64

	// Of the step under search.
	step         [2]float64
	omega, alpha float64
	speed, accel float64 // bounds on |y[0:3]'| and |y[0:3]''|
	rate         [6]float64
}

// Value implements [integrator.Event].
func (g *apart) Value(t float64, y []float64) float64 {
	a := g.free.forces.motion.At(g.free.begin + t)
	return g.of(a.In(depart(g.free.base, t, y).Pos))
}

// Bound implements [integrator.Bounded].
func (g *apart) Bound(s *integrator.Step, t float64, y []float64) (rate, accel, least float64) {
	if g.step != [2]float64{s.T0, s.T1} {
		g.step = [2]float64{s.T0, s.T1}
		g.omega, g.alpha = g.free.forces.motion.Bounds(g.free.begin+s.T0, g.free.begin+s.T1)
		g.speed, g.accel = s.MaxRate(0, 3), s.MaxAccel(0, 3)
	}
	s.Rate(t, g.rate[:])
	at := depart(g.free.base, t, y)
	at.Vel = r3.Add(g.free.base.Vel, vec(g.rate[:]))
	a := g.free.forces.motion.At(g.free.begin + t)
	local := a.ToHabitat(at)
	speed := r3.Norm(g.free.base.Vel) + g.speed
	reach := 0.0
	if g.alpha > 0 {
		reach = r3.Norm(at.Pos) + speed*(s.T1-t)
	}
	acc := g.accel + g.alpha*reach + g.omega*speed
	if g.time == nil {
		return r3.Norm(local.Vel), acc, thin
	}
	turned := acc + g.omega*(r3.Norm(local.Vel)+acc*(s.T1-t))
	return promise(g.of(local.Pos), g.time(local.Pos, local.Vel, turned, s.T1-t)), 0, thin
}

// inside is how far the body's centre is from the hull's outer face, within.
func inside(f *free, in *geom.Interior) *apart {
	return &apart{free: f, of: func(p r3.Vec) float64 { return -in.Beyond(p) }, step: never}
}

// never is the span of no step.
var never = [2]float64{math.Inf(1), math.Inf(-1)}
