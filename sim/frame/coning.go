package frame

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// Coning says how the axial direction precesses about a direction that is
// fixed in the inertial frame. The zero value does not.
type Coning struct {
	HalfAngle float64 // rad, between the two
	Period    float64 // s, of one round; negative: against positive spin
	// Phase is the angle from spinward zero, rad, toward which the fixed
	// direction leans from the axis, seen in the habitat at t = 0.
	Phase float64
}

// Still says whether there is none.
func (c Coning) Still() bool { return c.HalfAngle == 0 }

// rate is that of the precession, rad/s.
func (c Coning) rate() float64 {
	if c.Still() {
		return 0
	}
	return 2 * math.Pi / c.Period
}

// about is the fixed direction, in inertial components.
func (c Coning) about() r3.Vec {
	sin, cos := math.Sincos(c.HalfAngle)
	s, k := math.Sincos(c.Phase)
	return r3.Vec{X: sin * k, Y: sin * s, Z: cos}
}

// Turning is a spin that may change and an axis that may cone. The habitat's
// axial direction n goes round the fixed direction k evenly, at the rate p, and
// the habitat turns about n such that the part of its angular velocity along n
// is the spin s(t): what a rate gyro along the axis reads. So with q = s - p
// cos(half angle), the rate of the turn about n relative to the plane of k and
// n,
//
//	R(t)    = rot(k, p t) rot(z, integral of q),  R(0) = 1
//	omega   = p k + q n
//	omega'  = s' n + q p k x n
//
// (Goldstein, Classical Mechanics, sections 4.9 and 5.6, with the angular
// velocity of Euler's angles, whose nutation is none here; from memory). With a
// half angle of nothing it is the spin alone, whatever the period.
//
// Its frame coincides with the inertial one at t = 0.
type Turning struct {
	rates  Rates
	coning Coning

	p    float64 // rad/s, of the precession
	slow float64 // rad/s, p cos(half angle)
	side float64 // rad/s, p sin(half angle)
	k    r3.Vec
}

// NewMotion makes the motion of a spin rate and a coning.
func NewMotion(r Rates, c Coning) Motion {
	if r.Steady() && c.Still() {
		_, spin, _ := r.At(0)
		return Steady{Spin: spin}
	}
	t := Turning{rates: r, coning: c, p: c.rate(), k: r3.Vec{Z: 1}}
	if !c.Still() {
		sin, cos := math.Sincos(c.HalfAngle)
		t.k, t.slow, t.side = c.about(), t.p*cos, t.p*sin
	}
	return &t
}

// axis gives the axial direction, in inertial components.
func (m *Turning) axis(t float64) r3.Vec {
	if m.p == 0 {
		return r3.Vec{Z: 1}
	}
	return rotated(r3.Vec{Z: 1}, m.k, m.p*t)
}

// rotated turns v about the unit vector k (Rodrigues' formula).
func rotated(v, k r3.Vec, by float64) r3.Vec {
	sin, cos := math.Sincos(by)
	out := r3.Add(r3.Scale(cos, v), r3.Scale(sin, r3.Cross(k, v)))
	return r3.Add(out, r3.Scale((1-cos)*r3.Dot(k, v), k))
}

// At implements [Motion].
func (m *Turning) At(t float64) Attitude {
	angle, spin, accel := m.rates.At(t)
	sin, cos := math.Sincos(angle - m.slow*t)
	a := Attitude{X: r3.Vec{X: cos, Y: sin}, Y: r3.Vec{X: -sin, Y: cos}, Z: r3.Vec{Z: 1}}
	if m.p == 0 {
		a.Omega, a.Alpha = r3.Vec{Z: spin}, r3.Vec{Z: accel}
		return a
	}
	by := m.p * t
	a.X, a.Y, a.Z = rotated(a.X, m.k, by), rotated(a.Y, m.k, by), rotated(a.Z, m.k, by)
	q := spin - m.slow
	a.Omega = r3.Add(r3.Scale(m.p, m.k), r3.Scale(q, a.Z))
	a.Alpha = r3.Add(r3.Scale(accel, a.Z), r3.Scale(q*m.p, r3.Cross(m.k, a.Z)))
	return a
}

// Omega implements [Motion].
func (m *Turning) Omega(t float64) r3.Vec {
	_, spin, _ := m.rates.At(t)
	if m.p == 0 {
		return r3.Vec{Z: spin}
	}
	return r3.Add(r3.Scale(m.p, m.k), r3.Scale(spin-m.slow, m.axis(t)))
}

// Bounds implements [Motion]: |omega|^2 = s^2 + (p sin)^2 and |omega'|^2 = s'^2
// + (q p sin)^2.
func (m *Turning) Bounds(t0, t1 float64) (omega, alpha float64) {
	rate, accel := m.rates.Peak(t0, t1)
	if m.p == 0 {
		return rate, accel
	}
	return math.Hypot(rate, m.side), math.Hypot(accel, (rate+math.Abs(m.slow))*m.side)
}

// Stretch implements [Motion]. What is at rest in the habitat sees the fixed
// direction go round at the rate q, and its loads with it.
func (m *Turning) Stretch(t float64) Stretch {
	out := Stretch{Pace: math.Inf(1)}
	end, over := m.rates.stretch(t)
	out.End, out.Pace = end, over*changePace
	if m.p == 0 {
		return out
	}
	last := t
	if !math.IsInf(out.End, 1) {
		last = out.End
	}
	rate, _ := m.rates.Peak(t, last)
	if math.IsInf(out.Pace, 1) { // a steady rate: the swing is even
		_, spin, _ := m.rates.At(t)
		if q := math.Abs(spin - m.slow); q > 0 {
			out.Pace, out.Period = 1/q, 2*math.Pi/q
		}
		return out
	}
	out.Pace = math.Min(out.Pace, 1/(rate+math.Abs(m.slow)))
	return out
}

// changePace is the pace of a change of the spin, as a share of its length: of
// the smooth law, rate and acceleration change by as much as their peaks within
// three times that.
const changePace = 0.125

// Rates is the spin as a function of time.
func (m *Turning) Rates() *Rates { return &m.rates }
