package model

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/frame"
)

// Ambient is gravity that does not come from turning: of the planet or moon on
// which the habitat stands. It stays as it is in the inertial frame, whose axes
// are those of the habitat at time 0. The zero value is none.
type Ambient struct {
	Strength  float64 // m/s^2; of a central pull at the habitat's origin
	Direction r3.Vec  // unit, inertial: x outward and y spinward at spinward zero, z axial
	Distance  float64 // m, from the habitat's origin to the centre; 0: the pull is uniform
}

// Lead sets the direction by its parts outward, spinward and axial, of any
// length; false where there is none.
func (g *Ambient) Lead(d [3]float64) bool {
	size := math.Max(math.Abs(d[0]), math.Max(math.Abs(d[1]), math.Abs(d[2])))
	if !(size > 0) {
		return false
	}
	g.Direction = r3.Unit(r3.Vec{X: d[0] / size, Y: d[1] / size, Z: d[2] / size})
	return true
}

// None says that there is no pull.
func (g Ambient) None() bool { return g.Strength == 0 }

// Central says whether the pull is toward a centre, by the inverse square of
// the distance (Newton's law).
func (g Ambient) Central() bool { return g.Distance > 0 }

// Centre is where a central pull leads, m, inertial.
func (g Ambient) Centre() r3.Vec { return r3.Scale(g.Distance, g.Direction) }

// Accel gives the acceleration, m/s^2 in inertial components, of a body at an
// inertial state; the time does not matter.
//
// Law: it is the gradient of -Potential.
func (g Ambient) Accel(_ float64, s frame.State) r3.Vec {
	if !g.Central() {
		return r3.Scale(g.Strength, g.Direction)
	}
	to := r3.Sub(g.Centre(), s.Pos)
	share := g.Distance / r3.Norm(to)
	return r3.Scale(g.Strength*share*share*share/g.Distance, to)
}

// Potential is the potential energy of the pull by mass, m^2/s^2, at an
// inertial place (m): none at the habitat's origin for a uniform pull, none far
// away for a central one.
func (g Ambient) Potential(pos r3.Vec) float64 {
	if !g.Central() {
		return -g.Strength * r3.Dot(g.Direction, pos)
	}
	return -g.Strength * g.Distance * g.Distance / r3.Norm(r3.Sub(g.Centre(), pos))
}

// axial says whether the pull is the same in the habitat however it has turned
// about its axis.
func (g Ambient) axial() bool { return g.Direction.X == 0 && g.Direction.Y == 0 }

// Swings says whether what is at rest in the habitat feels the ambient pull go
// round.
func (m *Model) Swings() bool {
	if m.Ambient.None() || m.Ambient.axial() && !m.Cones() {
		return false
	}
	omega, _ := m.Motion.Bounds(0, math.Max(0, m.Settled()))
	return omega > 0
}

// pulled is the motion of a habitat in which the ambient pull goes round: what
// rests there feels it come back once in a turn.
type pulled struct{ frame.Motion }

// Stretch implements [frame.Motion]. Of a steady spin the loads come back with
// the turn. Where the axis cones too they need not come back.
func (p pulled) Stretch(t float64) frame.Stretch {
	s := p.Motion.Stretch(t)
	last := t
	if !math.IsInf(s.End, 1) {
		last = s.End
	}
	omega, _ := p.Motion.Bounds(t, last)
	if omega == 0 {
		return s
	}
	s.Period = 0
	if math.IsInf(s.Pace, 1) {
		s.Period = 2 * math.Pi / omega
	}
	s.Pace = math.Min(s.Pace, 1/omega)
	return s
}

// ambient checks the ambient gravity against the habitat.
func (c *checker) ambient() {
	g := c.m.Ambient
	if g.None() || !g.Central() {
		return
	}
	at := frame.PolarOf(g.Centre())
	for k := range centreLooks {
		at.Phi = 2 * math.Pi * float64(k) / centreLooks
		if c.m.Interior.Beyond(at.Vec()) <= 0 {
			c.fault("habitat.ambient_gravity.central.distance", "wants a centre that stays outside the hull all round",
				"puts the centre of gravity inside the habitat, which turns about it: got %.6g m", g.Distance)
			return
		}
	}
}

// centreLooks is at how many angles the place of a centre of gravity is held
// against the hull: a room that it passes is wider than a degree, or far off.
const centreLooks = 360

// AmbientAt is the ambient gravity at a point (m) at a time (s), m/s^2, both in
// habitat components.
func (m *Model) AmbientAt(t float64, pos r3.Vec) r3.Vec {
	if m.Ambient.None() {
		return r3.Vec{}
	}
	a := m.Motion.At(t)
	return a.In(m.Ambient.Accel(t, frame.State{Pos: a.Out(pos)}))
}
