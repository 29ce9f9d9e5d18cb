package geom

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// Shaft is the middle line of a passage: outward along a radius. Places about
// it are given as (u, v, w): spinward, axial, and out from the axis, in m.
type Shaft struct {
	Spin, Out r3.Vec  // unit, the directions of u and w
	Z         float64 // m
}

// ShaftAt gives the shaft at the angle phi (rad) and the axial place z (m).
func ShaftAt(phi, z float64) Shaft {
	sin, cos := math.Sincos(phi)
	return Shaft{Spin: r3.Vec{X: -sin, Y: cos}, Out: r3.Vec{X: cos, Y: sin}, Z: z}
}

func (s *Shaft) local(p r3.Vec) r3.Vec {
	return r3.Vec{X: r3.Dot(s.Spin, p), Y: p.Z - s.Z, Z: r3.Dot(s.Out, p)}
}

// turn gives the direction of a local vector.
func (s *Shaft) turn(v r3.Vec) r3.Vec {
	return r3.Add(r3.Add(r3.Scale(v.X, s.Spin), r3.Vec{Z: v.Y}), r3.Scale(v.Z, s.Out))
}

func (s *Shaft) point(q r3.Vec) r3.Vec { return r3.Add(s.turn(q), r3.Vec{Z: s.Z}) }

// bounds gives the box around a block of local places.
func (s *Shaft) bounds(lo, hi r3.Vec) Box {
	var box Box
	for i := range 8 {
		q := lo
		if i&1 != 0 {
			q.X = hi.X
		}
		if i&2 != 0 {
			q.Y = hi.Y
		}
		if i&4 != 0 {
			q.Z = hi.Z
		}
		c := s.point(q)
		if i == 0 {
			box = Box{Min: c, Max: c}
		}
		box = box.Union(Box{Min: c, Max: c})
	}
	return box
}

// rectangle is the outline of the places from u0 to u1 and w0 to w1.
func (s *Shaft) rectangle(u0, u1, w0, w1 float64) []Seg {
	if u0 >= u1 {
		return nil
	}
	at := func(u, w float64) [2]float64 {
		p := s.point(r3.Vec{X: u, Z: w})
		return [2]float64{p.X, p.Y}
	}
	a, b, c, d := at(u0, w0), at(u1, w0), at(u1, w1), at(u0, w1)
	return []Seg{line(a, b), line(b, c), line(c, d), line(d, a)}
}

// sides puts a stretch of u on the spinward or the antispinward side.
func sides(spinward bool, u0, u1 float64) (float64, float64) {
	if spinward {
		return u0, u1
	}
	return -u1, -u0
}

// Pipe is one half, split along its length, of the wall of a round shaft. Its
// faces are those of a sector about the shaft's middle line.
type Pipe struct {
	Shaft
	Bore, Outer float64 // m, inner and outer radius
	From, To    float64 // m, from the axis
	Spinward    bool    // the half at u > 0, else that at u < 0
}

// sector is the pipe in local places.
func (p *Pipe) sector() Sector {
	s := Sector{R0: p.Bore, R1: p.Outer, Phi0: -math.Pi / 2, Phi1: math.Pi / 2, Z0: p.From, Z1: p.To}
	if !p.Spinward {
		s.Phi0, s.Phi1 = math.Pi/2, 3*math.Pi/2
	}
	return s
}

// Dist implements [Solid].
func (p *Pipe) Dist(at r3.Vec) float64 {
	s := p.sector()
	return s.Dist(p.local(at))
}

// Nearest implements [Solid].
func (p *Pipe) Nearest(at r3.Vec) (point, normal r3.Vec, face int) {
	s := p.sector()
	point, normal, face = s.Nearest(p.local(at))
	return p.point(point), p.turn(normal), face
}

// Bounds implements [Solid].
func (p *Pipe) Bounds() Box {
	u0, u1 := sides(p.Spinward, 0, p.Outer)
	return p.bounds(r3.Vec{X: u0, Y: -p.Outer, Z: p.From}, r3.Vec{X: u1, Y: p.Outer, Z: p.To})
}

// Section implements [Solid].
func (p *Pipe) Section(z float64) []Seg {
	u0, u1 := sides(p.Spinward, chord(p.Bore, z-p.Z), chord(p.Outer, z-p.Z))
	return p.rectangle(u0, u1, p.From, p.To)
}

// chord gives half the chord of a circle at the distance h from its middle; 0
// beyond it.
func chord(r, h float64) float64 { return math.Sqrt(math.Max(0, (r-h)*(r+h))) }

// The faces of a collar.
const (
	CollarBore  = iota // toward the middle line
	CollarSide         // at Half from it, along u or v
	CollarSeam         // toward the other half
	CollarInner        // at From
	CollarOuter        // at To
	collarFaces
)

// Collar is one half of a square plate around a round shaft, with a hole as
// wide as the shaft: it fills the corners of the mouth that is cut for it.
type Collar struct {
	Shaft
	Bore, Half float64 // m, radius of the hole and half the side of the square; Bore < Half
	From, To   float64 // m, from the axis
	Spinward   bool    // the half at u > 0, else that at u < 0
}

// fold gives the local place of p with u counted away from the other half.
func (c *Collar) fold(p r3.Vec) r3.Vec {
	q := c.local(p)
	if !c.Spinward {
		q.X = -q.X
	}
	return q
}

// flat gives the point of the plate's section nearest to the place (u, v)
// outside of it: that of the half square, or, where that lies in the hole, the
// point of the rim.
func (c *Collar) flat(u, v float64) (nu, nv float64) {
	nu, nv = clamp(u, 0, c.Half), clamp(v, -c.Half, c.Half)
	r := math.Hypot(nu, nv)
	switch {
	case r >= c.Bore:
		return nu, nv
	case u <= 0:
		return 0, math.Copysign(c.Bore, v)
	}
	return nu * c.Bore / r, nv * c.Bore / r
}

// depths gives how deep a place lies beneath each face; positive within.
func (c *Collar) depths(q r3.Vec) [collarFaces]float64 {
	return [collarFaces]float64{math.Hypot(q.X, q.Y) - c.Bore, c.Half - math.Max(q.X, math.Abs(q.Y)), q.X, q.Z - c.From, c.To - q.Z}
}

// Dist implements [Solid].
func (c *Collar) Dist(p r3.Vec) float64 {
	q := c.fold(p)
	least := math.Inf(1)
	for _, d := range c.depths(q) {
		least = math.Min(least, d)
	}
	if least >= 0 {
		return -least
	}
	u, v := c.flat(q.X, q.Y)
	w := q.Z - clamp(q.Z, c.From, c.To)
	return math.Sqrt((q.X-u)*(q.X-u) + (q.Y-v)*(q.Y-v) + w*w)
}

// Nearest implements [Solid].
func (c *Collar) Nearest(p r3.Vec) (point, normal r3.Vec, face int) {
	q := c.fold(p)
	depth := c.depths(q)
	face, out := CollarBore, 0
	for f, d := range depth {
		if d < depth[face] {
			face = f
		}
		if d < 0 {
			out++
		}
	}
	n := c.normal(face, q)
	near := r3.Add(q, r3.Scale(depth[face], n))
	if out > 0 {
		u, v := c.flat(q.X, q.Y)
		near = r3.Vec{X: u, Y: v, Z: clamp(q.Z, c.From, c.To)}
	}
	// Above one face alone, unless its nearest point is on an edge all the same.
	flat := out == 1 && !(face == CollarSeam && math.Abs(q.Y) < c.Bore) && !(face == CollarSide && q.X > c.Half && math.Abs(q.Y) > c.Half)
	near, n = nearestOf(q, near, n, out == 0 || flat)
	if !c.Spinward {
		near.X, n.X = -near.X, -n.X
	}
	return c.point(near), c.turn(n), face
}

// normal is that of a face, away from the solid, in folded places.
func (c *Collar) normal(face int, q r3.Vec) r3.Vec {
	switch face {
	case CollarBore:
		if r := math.Hypot(q.X, q.Y); r > 0 {
			return r3.Vec{X: -q.X / r, Y: -q.Y / r}
		}
		return r3.Vec{Y: -1}
	case CollarSide:
		if math.Abs(q.Y) > q.X {
			return r3.Vec{Y: math.Copysign(1, q.Y)}
		}
		return r3.Vec{X: 1}
	case CollarSeam:
		return r3.Vec{X: -1}
	case CollarInner:
		return r3.Vec{Z: -1}
	}
	return r3.Vec{Z: 1}
}

// Bounds implements [Solid].
func (c *Collar) Bounds() Box {
	u0, u1 := sides(c.Spinward, 0, c.Half)
	return c.bounds(r3.Vec{X: u0, Y: -c.Half, Z: c.From}, r3.Vec{X: u1, Y: c.Half, Z: c.To})
}

// Section implements [Solid].
func (c *Collar) Section(z float64) []Seg {
	v := z - c.Z
	if math.Abs(v) > c.Half {
		return nil
	}
	u0, u1 := sides(c.Spinward, chord(c.Bore, v), c.Half)
	return c.rectangle(u0, u1, c.From, c.To)
}
