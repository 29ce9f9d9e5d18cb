// Package frame carries motion between the inertial frame, in which flight is
// integrated, and the frame of the turning habitat, in which people live.
//
// Habitat frame: +z is the axial direction, x points outward through spinward
// zero and y spinward there. An [Attitude] is the habitat's orientation and
// its angular velocity and acceleration at one instant; a [Motion] gives them
// as functions of time: [Steady], or by [NewMotion] one whose spin changes and
// whose axis cones. Nothing that uses a Motion may assume that the angular
// velocity is steady or that it lies along z.
//
// The kinematics are the textbook ones: Goldstein, Classical Mechanics,
// section 4.10 (the Coriolis effect), and Taylor, Classical Mechanics,
// sections 9.4 and 9.5 (both from memory).
package frame

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// Motion is how the habitat turns.
type Motion interface {
	// At gives the attitude at time t (s).
	At(t float64) Attitude
	// Omega gives the angular velocity at time t (s), rad/s, in inertial
	// components: At(t).Omega, without the cost of the orientation.
	Omega(t float64) r3.Vec
	// Bounds gives bounds on |omega| (rad/s) and |domega/dt| (rad/s^2) over
	// the times t0 to t1 (s).
	Bounds(t0, t1 float64) (omega, alpha float64)
	// Stretch tells how the motion goes on from time t (s).
	Stretch(t float64) Stretch
}

// Stretch is a stretch of time in which a motion follows one smooth law.
type Stretch struct {
	End float64 // s, when the next one begins, with a kink; infinite: never
	// Pace is a time, in s, in which what is at rest in the habitat may feel its
	// loads change by as much as they are; infinite: they stay as they are.
	Pace float64
	// Period is that of loads that come back in the habitat, s; 0: they do not,
	// or stay as they are.
	Period float64
}

// Steady says whether loads at rest stay as they are for good.
func (s Stretch) Steady() bool { return math.IsInf(s.End, 1) && math.IsInf(s.Pace, 1) }

// Attitude is the habitat's orientation and turning at one instant. All
// vectors are in inertial components.
//
// Law: X, Y, Z are orthonormal and right-handed to rounding.
type Attitude struct {
	X, Y, Z r3.Vec // the habitat's axes, unit vectors
	Omega   r3.Vec // angular velocity, rad/s
	Alpha   r3.Vec // its time derivative, rad/s^2
}

// Steady is a constant spin about the axial direction, positive when the
// floor moves spinward. Its frame coincides with the inertial one at t = 0.
type Steady struct {
	Spin float64 // rad/s
}

// At implements [Motion].
func (s Steady) At(t float64) Attitude {
	sin, cos := math.Sincos(s.Spin * t)
	return Attitude{
		X:     r3.Vec{X: cos, Y: sin},
		Y:     r3.Vec{X: -sin, Y: cos},
		Z:     r3.Vec{Z: 1},
		Omega: r3.Vec{Z: s.Spin},
	}
}

// Omega implements [Motion].
func (s Steady) Omega(float64) r3.Vec { return r3.Vec{Z: s.Spin} }

// Bounds implements [Motion].
func (s Steady) Bounds(_, _ float64) (omega, alpha float64) { return math.Abs(s.Spin), 0 }

// Stretch implements [Motion].
func (s Steady) Stretch(float64) Stretch { return Stretch{End: math.Inf(1), Pace: math.Inf(1)} }

// In gives the habitat components of a vector in inertial components.
func (a *Attitude) In(v r3.Vec) r3.Vec {
	return r3.Vec{X: r3.Dot(a.X, v), Y: r3.Dot(a.Y, v), Z: r3.Dot(a.Z, v)}
}

// Out gives the inertial components of a vector in habitat components.
func (a *Attitude) Out(v r3.Vec) r3.Vec {
	return r3.Add(r3.Add(r3.Scale(v.X, a.X), r3.Scale(v.Y, a.Y)), r3.Scale(v.Z, a.Z))
}

// State is a position (m) and a velocity (m/s), in the inertial or the
// habitat frame.
type State struct {
	Pos, Vel r3.Vec
}

// ToHabitat gives the state seen in the habitat: position by the rotation,
// velocity v' = v - omega x r (Taylor, Classical Mechanics, eq. 9.30; from
// memory).
//
// Law: ToInertial(ToHabitat(s)) = s to rounding.
func (a *Attitude) ToHabitat(s State) State {
	rel := r3.Sub(s.Vel, r3.Cross(a.Omega, s.Pos))
	return State{Pos: a.In(s.Pos), Vel: a.In(rel)}
}

// ToInertial is the inverse of [Attitude.ToHabitat].
func (a *Attitude) ToInertial(s State) State {
	pos := a.Out(s.Pos)
	return State{Pos: pos, Vel: r3.Add(a.Out(s.Vel), r3.Cross(a.Omega, pos))}
}

// Apparent holds the apparent accelerations of a body, m/s^2, in habitat
// components.
type Apparent struct {
	Centrifugal r3.Vec // -omega x (omega x r)
	Coriolis    r3.Vec // -2 omega x v'
	Euler       r3.Vec // -domega/dt x r
}

// Sum is their resultant, m/s^2.
func (p Apparent) Sum() r3.Vec { return r3.Add(r3.Add(p.Centrifugal, p.Coriolis), p.Euler) }

// Apparent gives the apparent accelerations at a state in habitat components
// (Taylor, Classical Mechanics, eq. 9.34 and problem 9.11 for the Euler term;
// from memory).
//
// Law: for a body under no force the acceleration seen in the habitat equals
// their sum.
func (a *Attitude) Apparent(s State) Apparent {
	w, al := a.In(a.Omega), a.In(a.Alpha)
	return Apparent{
		Centrifugal: r3.Scale(-1, r3.Cross(w, r3.Cross(w, s.Pos))),
		Coriolis:    r3.Scale(-2, r3.Cross(w, s.Vel)),
		Euler:       r3.Scale(-1, r3.Cross(al, s.Pos)),
	}
}
