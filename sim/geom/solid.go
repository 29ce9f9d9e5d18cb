package geom

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// Solid is a body of matter.
//
// Law: |Dist(p) - Dist(q)| <= |p - q|, and outside the solid Dist is the exact
// distance to it.
type Solid interface {
	// Dist gives the distance (m) from a point to the surface, negative within.
	Dist(p r3.Vec) float64
	// Nearest gives the point of the surface nearest to p, the unit normal
	// there, away from the solid toward p, and the face that it belongs to.
	Nearest(p r3.Vec) (point, normal r3.Vec, face int)
	// Bounds gives a box that holds the solid; infinite sides are allowed.
	Bounds() Box
	// Section gives the outline that a plane of constant axial place cuts out
	// of the solid; nil where it misses.
	Section(z float64) []Seg
}

// Box is a block with its sides along the axes of the habitat, in m.
type Box struct{ Min, Max r3.Vec }

// Dist gives a lower bound on the distance (m) from p to what the box holds: 0
// within.
func (b *Box) Dist(p r3.Vec) float64 {
	dx := max(0, b.Min.X-p.X, p.X-b.Max.X)
	dy := max(0, b.Min.Y-p.Y, p.Y-b.Max.Y)
	dz := max(0, b.Min.Z-p.Z, p.Z-b.Max.Z)
	return math.Sqrt(dx*dx + dy*dy + dz*dz)
}

// Union gives the smallest box around two.
func (b Box) Union(c Box) Box {
	return Box{
		Min: r3.Vec{X: math.Min(b.Min.X, c.Min.X), Y: math.Min(b.Min.Y, c.Min.Y), Z: math.Min(b.Min.Z, c.Min.Z)},
		Max: r3.Vec{X: math.Max(b.Max.X, c.Max.X), Y: math.Max(b.Max.Y, c.Max.Y), Z: math.Max(b.Max.Z, c.Max.Z)},
	}
}

// nearestOf makes the answer of Nearest for a point at q: the normal points
// from q to p, or is that of the face where q lies flat on it, not on an edge,
// or coincides with p. Close to a face the difference p - q is all rounding.
func nearestOf(p, q, face r3.Vec, flat bool) (point, normal r3.Vec) {
	d := r3.Sub(p, q)
	n := r3.Norm(d)
	if flat || n == 0 {
		return q, face
	}
	return q, r3.Scale(1/n, d)
}

// norm is the length of a vector whose square is in range.
func norm(v r3.Vec) float64 { return math.Sqrt(v.X*v.X + v.Y*v.Y + v.Z*v.Z) }
