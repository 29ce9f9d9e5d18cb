package geom

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// The faces of a sector.
const (
	SectorInner        = iota // toward the axis: the top of a deck
	SectorOuter               // away from the axis: the underside
	SectorAntispinward        // at Phi0
	SectorSpinward            // at Phi1
	SectorMinusAxial          // at Z0
	SectorPlusAxial           // at Z1
	sectorFaces
)

// Sector is a piece of a thick cylinder about the axis: R0 <= r <= R1, phi
// from Phi0 to Phi1, Z0 <= z <= Z1. Z0 and Z1 may be infinite, R0 may be 0.
type Sector struct {
	R0, R1     float64 // m
	Phi0, Phi1 float64 // rad, Phi0 < Phi1 <= Phi0 + 2 pi
	Whole      bool    // the whole way round; Phi0 and Phi1 do not count
	Z0, Z1     float64 // m

	open0, open1 bool // at Phi0, Phi1 another piece goes on
}

// clamp gives the number nearest to x between lo and hi.
func clamp(x, lo, hi float64) float64 { return min(max(x, lo), hi) }

// fromAxis gives the distance (m) of a point from the axis.
func fromAxis(p r3.Vec) float64 { return math.Sqrt(p.X*p.X + p.Y*p.Y) }

// beside gives how far, in rad, the angle phi lies outside the sector: spin
// positive beyond Phi1, negative before Phi0, the nearer of the two; 0 within.
func (s *Sector) beside(phi float64) float64 {
	if s.Whole {
		return 0
	}
	half := (s.Phi1 - s.Phi0) / 2
	off := math.Remainder(phi-(s.Phi0+half), 2*math.Pi)
	if math.Abs(off) <= half {
		return 0
	}
	if off > 0 {
		return off - half
	}
	return off + half
}

// Dist implements [Solid]. For a point within the range of angles the nearest
// point has its angle; for one outside it lies on the nearer end face, since
// at any r and z the distance grows with the angle between.
func (s *Sector) Dist(p r3.Vec) float64 {
	r := fromAxis(p)
	dz := max(s.Z0-p.Z, p.Z-s.Z1)
	off := 0.0
	if !s.Whole {
		off = s.beside(math.Atan2(p.Y, p.X))
	}
	if off == 0 {
		dr := max(s.R0-r, r-s.R1)
		if s.R0 == 0 {
			dr = r - s.R1
		}
		if dr <= 0 && dz <= 0 {
			return max(dr, dz, -s.depth(p, r))
		}
		if dz <= 0 {
			return dr
		}
		dr = max(0, dr)
		return math.Sqrt(dr*dr + dz*dz)
	}
	sin, cos := math.Sincos(off)
	x, y := r*cos, r*sin
	dx := x - clamp(x, s.R0, s.R1)
	dz = max(0, dz)
	return math.Sqrt(dx*dx + y*y + dz*dz)
}

// depth gives the distance from a point within the sector to its end faces.
func (s *Sector) depth(p r3.Vec, r float64) float64 {
	if s.Whole {
		return math.Inf(1)
	}
	off := math.Remainder(math.Atan2(p.Y, p.X)-(s.Phi0+s.Phi1)/2, 2*math.Pi)
	return r * math.Sin(math.Min(math.Pi/2, (s.Phi1-s.Phi0)/2-math.Abs(off)))
}

// Nearest implements [Solid].
func (s *Sector) Nearest(p r3.Vec) (point, normal r3.Vec, face int) {
	r := fromAxis(p)
	radial, axial := r >= s.R0 && r <= s.R1, p.Z >= s.Z0 && p.Z <= s.Z1
	if s.Whole && axial && r < s.R0 && r > 0 {
		// The inner face of a whole ring: no angle need be known.
		n := r3.Vec{X: -p.X / r, Y: -p.Y / r}
		return r3.Vec{X: -s.R0 * n.X, Y: -s.R0 * n.Y, Z: p.Z}, n, SectorInner
	}
	phi := math.Atan2(p.Y, p.X)
	off := s.beside(phi)
	if off == 0 && radial && axial {
		return s.within(p, r, phi)
	}
	if off == 0 {
		q := onAngle(phi, clamp(r, s.R0, s.R1), clamp(p.Z, s.Z0, s.Z1))
		face = s.radialOrAxial(r, p.Z)
		point, normal = nearestOf(p, q, s.normal(face, phi), radial || axial)
		return point, normal, face
	}
	edge := phi - off
	sin, cos := math.Sincos(off)
	along := clamp(r*cos, s.R0, s.R1)
	q := onAngle(edge, along, clamp(p.Z, s.Z0, s.Z1))
	face = s.endOr(off, r*sin, r*cos, p.Z)
	point, normal = nearestOf(p, q, s.normal(face, edge), along == r*cos && axial)
	return point, normal, face
}

// radialOrAxial names the face for a point within the range of angles by the
// larger part of its distance.
func (s *Sector) radialOrAxial(r, z float64) int {
	dr, face := s.R0-r, SectorInner
	if r-s.R1 > dr {
		dr, face = r-s.R1, SectorOuter
	}
	return axialIf(s, z, dr, face)
}

// endOr names the face for a point beyond an end face.
func (s *Sector) endOr(off, across, along, z float64) int {
	d, face := math.Abs(across), SectorSpinward
	if off < 0 {
		face = SectorAntispinward
	}
	if s.R0-along > d {
		d, face = s.R0-along, SectorInner
	}
	if along-s.R1 > d {
		d, face = along-s.R1, SectorOuter
	}
	return axialIf(s, z, d, face)
}

func axialIf(s *Sector, z, d float64, face int) int {
	if s.Z0-z > math.Max(d, z-s.Z1) {
		return SectorMinusAxial
	}
	if z-s.Z1 > d {
		return SectorPlusAxial
	}
	return face
}

// within answers Nearest for a point in the solid: the face that it lies
// least deep beneath.
func (s *Sector) within(p r3.Vec, r, phi float64) (point, normal r3.Vec, face int) {
	depth := [sectorFaces]float64{r - s.R0, s.R1 - r, math.Inf(1), math.Inf(1), p.Z - s.Z0, s.Z1 - p.Z}
	if s.R0 == 0 && s.Whole {
		depth[SectorInner] = math.Inf(1) // else the axis is an edge, the nearest where both end faces are over a right angle off
	}
	mid := phi
	if !s.Whole {
		mid = (s.Phi0 + s.Phi1) / 2
		off, half := math.Remainder(phi-mid, 2*math.Pi), (s.Phi1-s.Phi0)/2
		depth[SectorSpinward] = r * math.Sin(math.Min(math.Pi/2, half-off))
		depth[SectorAntispinward] = r * math.Sin(math.Min(math.Pi/2, half+off))
	}
	for f := range depth {
		if depth[f] < depth[face] {
			face = f
		}
	}
	n := s.normal(face, phi)
	return r3.Add(p, r3.Scale(depth[face], n)), n, face
}

// normal is that of a face, away from the solid; that of an end face is taken
// at its own angle.
func (s *Sector) normal(face int, phi float64) r3.Vec {
	switch face {
	case SectorInner:
		return r3.Scale(-1, onAngle(phi, 1, 0))
	case SectorOuter:
		return onAngle(phi, 1, 0)
	case SectorAntispinward:
		return onAngle(s.Phi0-math.Pi/2, 1, 0)
	case SectorSpinward:
		return onAngle(s.Phi1+math.Pi/2, 1, 0)
	case SectorMinusAxial:
		return r3.Vec{Z: -1}
	}
	return r3.Vec{Z: 1}
}

// onAngle gives the point at (r, phi, z).
func onAngle(phi, r, z float64) r3.Vec {
	sin, cos := math.Sincos(phi)
	return r3.Vec{X: r * cos, Y: r * sin, Z: z}
}

// Bounds implements [Solid].
func (s *Sector) Bounds() Box {
	b := Box{Min: r3.Vec{X: -s.R1, Y: -s.R1, Z: s.Z0}, Max: r3.Vec{X: s.R1, Y: s.R1, Z: s.Z1}}
	if s.Whole {
		return b
	}
	b = Box{Min: r3.Vec{X: math.Inf(1), Y: math.Inf(1), Z: s.Z0}, Max: r3.Vec{X: math.Inf(-1), Y: math.Inf(-1), Z: s.Z1}}
	add := func(phi, r float64) {
		q := onAngle(phi, r, s.Z0)
		b = b.Union(Box{Min: q, Max: r3.Vec{X: q.X, Y: q.Y, Z: s.Z1}})
	}
	for _, r := range []float64{s.R0, s.R1} {
		add(s.Phi0, r)
		add(s.Phi1, r)
	}
	// The arc bulges past its ends where it crosses an axis.
	for k := math.Ceil(s.Phi0 / (math.Pi / 2)); k*math.Pi/2 <= s.Phi1; k++ {
		add(k*math.Pi/2, s.R1)
	}
	return b
}
