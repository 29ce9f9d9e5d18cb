package geom

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// Ball is a spherical room about a point of the axis. All of its inside is its
// floor.
type Ball struct {
	Floor     Deck      // R0 is the room's radius; no openings
	Z         float64   // m, axial place of its middle
	Thickness float64   // m
	Passages  []Passage // those that may open into it
}

// Span is [Torus.Span] for a ball.
func (s *Ball) Span(_, z, h float64) (Span, bool) {
	dz := math.Abs(z-s.Z) + h
	e := chord(chord(s.Floor.R0, dz), h)
	return Span{0, e}, dz <= s.Floor.R0 && (e > 0 || h == 0)
}

// HalfWidth is [Torus.HalfWidth] for a ball.
func (s *Ball) HalfWidth(r float64) float64 { return chord(s.Floor.R0, r) }

// AddBall adds the hull of a spherical room and the room itself.
func (b *Builder) AddBall(s Ball) {
	f := &s.Floor
	v := Vault{Z: s.Z, Inner: f.R0, Outer: f.R0 + s.Thickness, Theta0: -math.Pi / 2, Theta1: math.Pi / 2, Whole: true}
	shell := &vaultShell{Vault: v, restitution: f.Restitution, friction: f.Friction, inner: f.Inner, outer: f.Outer, edge: f.Outer}
	b.addVaults([]*vaultShell{shell}, s.Passages)
	b.AddSpace(&ballSpace{z: s.Z, inner: v.Inner, outer: v.Outer})
}

// ballSpace is the free space of a spherical room.
type ballSpace struct{ z, inner, outer float64 }

func (s *ballSpace) rho(p r3.Vec) float64 {
	return r3.Norm(r3.Vec{X: p.X, Y: p.Y, Z: p.Z - s.z})
}

// Beyond implements [Space].
func (s *ballSpace) Beyond(p r3.Vec) float64 { return s.rho(p) - s.outer }

// Holds implements [Space].
func (s *ballSpace) Holds(p r3.Vec) bool { return s.rho(p) <= s.inner }
