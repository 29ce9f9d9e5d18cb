package flight

import (
	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/frame"
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
	forces Forces
}

// Dim implements [integrator.System].
func (f *free) Dim() int { return 6 }

// Deriv implements [integrator.System].
func (f *free) Deriv(t float64, y, dy []float64) {
	y, dy = y[:6], dy[:6]
	if w := &f.forces; w.plain {
		// The same, written out: most derivatives are these.
		b := &f.base
		vx, vy, vz := b.Vel.X+y[3], b.Vel.Y+y[4], b.Vel.Z+y[5]
		ux, uy := vx+w.spin*(b.Pos.Y+(t*b.Vel.Y+y[1])), vy-w.spin*(b.Pos.X+(t*b.Vel.X+y[0]))
		k := -w.perMass * w.drag.PerVelocity2(ux*ux+uy*uy+vz*vz)
		dy[0], dy[1], dy[2] = y[3], y[4], y[5]
		dy[3], dy[4], dy[5] = k*ux, k*uy, k*vz
		return
	}
	a := f.forces.Accel(f.begin+t, depart(&f.base, t, y))
	dy[0], dy[1], dy[2] = y[3], y[4], y[5]
	dy[3], dy[4], dy[5] = a.X, a.Y, a.Z
}

// local gives the state in the habitat.
func (f *free) local(t float64, y []float64) frame.State {
	return frame.Seen(f.forces.motion, f.begin+t, depart(&f.base, t, y))
}

// place gives the place in the habitat, m.
func (f *free) place(t float64, y []float64) r3.Vec {
	y = y[:3]
	return frame.SeenAt(f.forces.motion, f.begin+t, r3.Vec{X: f.base.Pos.X + (t*f.base.Vel.X + y[0]),
		Y: f.base.Pos.Y + (t*f.base.Vel.Y + y[1]), Z: f.base.Pos.Z + (t*f.base.Vel.Z + y[2])})
}

// depart gives the inertial state of a departure y from the uniform motion of
// base at the time t (s).
func depart(base *frame.State, t float64, y []float64) frame.State {
	y = y[:6]
	return frame.State{
		Pos: r3.Vec{X: base.Pos.X + (t*base.Vel.X + y[0]), Y: base.Pos.Y + (t*base.Vel.Y + y[1]), Z: base.Pos.Z + (t*base.Vel.Z + y[2])},
		Vel: r3.Vec{X: base.Vel.X + y[3], Y: base.Vel.Y + y[4], Z: base.Vel.Z + y[5]},
	}
}

// relaxation gives the time, s, in which drag takes a body's speed relative to
// the air down to about 1/e, at the start of a flight, and its acceleration,
// m/s^2; 0 where there is none.
func (f *free) relaxation() (time, accel float64) {
	if f.forces.drag.None() {
		return 0, 0
	}
	speed := norm(f.forces.relative(f.begin, f.base))
	accel = norm(f.forces.Drag(f.begin, f.base))
	if !(accel > 0) {
		return 0, 0
	}
	return speed / accel, accel
}
