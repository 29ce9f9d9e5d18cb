package frame

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// Polar is a place in cylindrical habitat coordinates.
type Polar struct {
	R   float64 // distance from the axis, m
	Phi float64 // angle from spinward zero, spinward positive, rad
	Z   float64 // axial, m
}

// PolarOf gives the cylindrical coordinates of a point (m) in habitat
// components, Phi in (-pi, pi].
func PolarOf(p r3.Vec) Polar {
	return Polar{R: math.Hypot(p.X, p.Y), Phi: WrapAngle(math.Atan2(p.Y, p.X)), Z: p.Z}
}

// Vec gives the point, m, in habitat components. A negative R lies across the
// axis.
func (c Polar) Vec() r3.Vec {
	sin, cos := math.Sincos(c.Phi)
	return r3.Vec{X: c.R * cos, Y: c.R * sin, Z: c.Z}
}

// Local are the directions at a place, unit vectors in habitat components:
// spinward, axial, and up (toward the axis).
type Local struct {
	Spinward, Axial, Up r3.Vec
}

// LocalAt gives the directions at the angle phi (rad).
func LocalAt(phi float64) Local {
	sin, cos := math.Sincos(phi)
	return Local{
		Spinward: r3.Vec{X: -sin, Y: cos},
		Axial:    r3.Vec{Z: 1},
		Up:       r3.Vec{X: -cos, Y: -sin},
	}
}

// Vec builds a vector from its local components.
func (l Local) Vec(spinward, axial, up float64) r3.Vec {
	return r3.Add(r3.Add(r3.Scale(spinward, l.Spinward), r3.Scale(axial, l.Axial)), r3.Scale(up, l.Up))
}

// Split gives the local components of a vector.
func (l Local) Split(v r3.Vec) (spinward, axial, up float64) {
	return r3.Dot(v, l.Spinward), r3.Dot(v, l.Axial), r3.Dot(v, l.Up)
}

// WrapAngle brings an angle (rad) into (-pi, pi].
func WrapAngle(phi float64) float64 {
	w := math.Remainder(phi, 2*math.Pi)
	if w <= -math.Pi {
		w += 2 * math.Pi
	}
	return w
}

// Unwind gives the angle congruent to phi that is nearest to near (both rad):
// it follows a place round and round without a jump.
func Unwind(phi, near float64) float64 { return near + WrapAngle(phi-near) }
