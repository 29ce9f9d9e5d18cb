package frame

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// Seen gives the state that an inertial state s has in the habitat at time t
// (s): that of [Attitude.ToHabitat] at m.At(t), to the bit but for the sign of
// a zero. A steady spin, which the search for contacts asks for at each look,
// spares what it has no use for.
func Seen(m Motion, t float64, s State) State {
	if w, ok := m.(Steady); ok {
		sin, cos := math.Sincos(w.Spin * t)
		return State{Pos: turned(sin, cos, s.Pos), Vel: turned(sin, cos, w.Relative(&s))}
	}
	a := m.At(t)
	return a.ToHabitat(s)
}

// Relative is the velocity relative to the habitat, m/s, in inertial components.
func (w Steady) Relative(s *State) r3.Vec {
	return r3.Vec{X: s.Vel.X + w.Spin*s.Pos.Y, Y: s.Vel.Y - w.Spin*s.Pos.X, Z: s.Vel.Z}
}

// SeenAt is the place of Seen.
func SeenAt(m Motion, t float64, pos r3.Vec) r3.Vec {
	if w, ok := m.(Steady); ok {
		sin, cos := math.Sincos(w.Spin * t)
		return turned(sin, cos, pos)
	}
	a := m.At(t)
	return a.In(pos)
}

// turned gives the components along axes turned by an angle about z.
func turned(sin, cos float64, v r3.Vec) r3.Vec {
	return r3.Vec{X: cos*v.X + sin*v.Y, Y: cos*v.Y - sin*v.X, Z: v.Z}
}
