package geom

import "math"

// Seg is a piece of an outline in the plane across the axis, x outward through
// spinward zero and y spinward there, in m: a straight line from A to B, or an
// arc about Centre of the given radius from angle Phi0 to Phi1 (rad).
type Seg struct {
	Arc        bool
	A, B       [2]float64
	Centre     [2]float64
	Radius     float64
	Phi0, Phi1 float64
	Bare       bool // no face: the solid goes on in another piece
}

// Outline is the section of one solid.
type Outline struct {
	Surface SurfaceID // that of its first face
	Segs    []Seg
}

// Section implements [Solid].
func (s *Sector) Section(z float64) []Seg {
	if z < s.Z0 || z > s.Z1 {
		return nil
	}
	p0, p1 := s.Phi0, s.Phi1
	if s.Whole {
		p0, p1 = 0, 2*math.Pi
	}
	segs := []Seg{{Arc: true, Radius: s.R1, Phi0: p0, Phi1: p1}}
	if !s.Whole {
		segs = append(segs, end(onAngle2(p1, s.R1), onAngle2(p1, s.R0), s.open1))
	}
	if s.R0 > 0 {
		segs = append(segs, Seg{Arc: true, Radius: s.R0, Phi0: p1, Phi1: p0})
	}
	if !s.Whole {
		segs = append(segs, end(onAngle2(p0, s.R0), onAngle2(p0, s.R1), s.open0))
	}
	return segs
}

func line(a, b [2]float64) Seg { return Seg{A: a, B: b} }

// end is the end of a sector, bare where it goes on.
func end(a, b [2]float64, bare bool) Seg { return Seg{A: a, B: b, Bare: bare} }

func onAngle2(phi, r float64) [2]float64 {
	sin, cos := math.Sincos(phi)
	return [2]float64{r * cos, r * sin}
}

// Section gives the outlines of all solids that a plane of constant axial
// place z (m) cuts.
func (in *Interior) Section(z float64) []Outline {
	var out []Outline
	for i := range in.pieces {
		if segs := in.pieces[i].Solid.Section(z); segs != nil {
			out = append(out, Outline{Surface: in.pieces[i].Faces[0], Segs: segs})
		}
	}
	return out
}
