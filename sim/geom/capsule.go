package geom

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// Capsule is a post or rail: all that is no farther than Radius from the line
// from A to B. Its ends are half balls about A and B. It has one face, 0.
type Capsule struct {
	A, B   r3.Vec  // m
	Radius float64 // m
}

// axis gives the point of the middle line that is nearest to p.
func (c *Capsule) axis(p r3.Vec) r3.Vec {
	d := r3.Sub(c.B, c.A)
	if l := r3.Norm2(d); l > 0 {
		return r3.Add(c.A, r3.Scale(clamp(r3.Dot(r3.Sub(p, c.A), d)/l, 0, 1), d))
	}
	return c.A
}

// Dist implements [Solid].
func (c *Capsule) Dist(p r3.Vec) float64 { return r3.Norm(r3.Sub(p, c.axis(p))) - c.Radius }

// Nearest implements [Solid]. The normal is that from the middle line, which
// is as good at the surface as anywhere; on the line it is any.
func (c *Capsule) Nearest(p r3.Vec) (point, normal r3.Vec, face int) {
	q := c.axis(p)
	normal = r3.Sub(p, q)
	if r := r3.Norm(normal); r > 0 {
		normal = r3.Scale(1/r, normal)
	} else {
		normal = across(r3.Sub(c.B, c.A))
	}
	return r3.Add(q, r3.Scale(c.Radius, normal)), normal, 0
}

// across gives a unit vector at right angles to d, any where d vanishes.
func across(d r3.Vec) r3.Vec {
	if math.Abs(d.X) > math.Abs(d.Z) {
		return r3.Unit(r3.Vec{X: -d.Y, Y: d.X})
	}
	if d.Z == 0 && d.Y == 0 {
		return r3.Vec{X: 1}
	}
	return r3.Unit(r3.Vec{Y: -d.Z, Z: d.Y})
}

// Bounds implements [Solid].
func (c *Capsule) Bounds() Box {
	a := r3.Vec{X: c.Radius, Y: c.Radius, Z: c.Radius}
	return Box{Min: r3.Sub(c.A, a), Max: r3.Add(c.A, a)}.Union(Box{Min: r3.Sub(c.B, a), Max: r3.Add(c.B, a)})
}

// ellipseParts is into how many straight pieces each half of the ellipse in
// the outline of a slanting capsule is divided: they cut inside by no more than
// 1 - cos(pi/96), 0.054 %, of its half axis.
const ellipseParts = 48

// Section implements [Solid]. The outline is made of arcs of the balls at the
// ends and of two sides between them: straight where the capsule lies in the
// plane, else parts of an ellipse.
func (c *Capsule) Section(z float64) []Seg {
	a, b := c.A, c.B
	if a.Z > b.Z {
		a, b = b, a
	}
	length := r3.Norm(r3.Sub(b, a))
	level := math.Hypot(b.X-a.X, b.Y-a.Y)
	if level == 0 {
		return circle(a, c.Radius, z-clamp(z, a.Z, b.Z))
	}
	s := slant{a: a, b: b, wide: c.Radius, length: length, x: [2]float64{(b.X - a.X) / level, (b.Y - a.Y) / level},
		dh: level / length, dz: (b.Z - a.Z) / length, zeta: z - a.Z}
	return s.outline()
}

// circle is the outline of a ball about m at the height h above its middle.
func circle(m r3.Vec, radius, h float64) []Seg {
	if math.Abs(h) >= radius {
		return nil
	}
	return []Seg{{Arc: true, Centre: [2]float64{m.X, m.Y}, Radius: math.Sqrt(radius*radius - h*h), Phi1: 2 * math.Pi}}
}

// slant is a capsule that a plane cuts at a slant or along, rising from a to
// b. In the plane x is the level direction from a to b and y that at its left.
// A side has the points
//
//	x = t dh - wide s dz,  y = -+ wide sqrt(1 - s^2),  s = (zeta - t dz)/(wide dh)
//
// t being the way along the middle line and s the sine of the angle round it.
type slant struct {
	a, b         r3.Vec
	wide, length float64
	x            [2]float64
	dh, dz       float64 // level and rising part of the direction
	zeta         float64 // of the plane, above a
}

func (s *slant) outline() []Seg {
	s0, s1 := s.zeta/(s.wide*s.dh), (s.zeta-s.length*s.dz)/(s.wide*s.dh) // at t = 0 and length
	if s1 >= 1 {
		return circle(s.b, s.wide, s.zeta-s.length*s.dz)
	}
	if s0 <= -1 {
		return circle(s.a, s.wide, s.zeta)
	}
	sines, ts := [2]float64{math.Min(s0, 1), math.Max(s1, -1)}, [2]float64{0, s.length}
	if s0 > 1 {
		ts[0] = (s.zeta - s.wide*s.dh) / s.dz
	}
	if s1 < -1 {
		ts[1] = (s.zeta + s.wide*s.dh) / s.dz
	}
	right, left := s.side(sines, ts, -1), s.side(sines, ts, 1)
	var out []Seg
	for i := 1; i < len(right); i++ {
		out = append(out, line(right[i-1], right[i]))
	}
	if s1 > -1 {
		out = append(out, s.end(s.b, s.zeta-s.length*s.dz, 1))
	}
	for i := len(left) - 1; i > 0; i-- {
		out = append(out, line(left[i], left[i-1]))
	}
	if s0 < 1 {
		out = append(out, s.end(s.a, s.zeta, -1))
	}
	return out
}

// side gives points along a side, from the sines and ways at its ends.
func (s *slant) side(sines, ts [2]float64, sign float64) [][2]float64 {
	n, span := ellipseParts, sines[1]-sines[0]
	if s.dz == 0 {
		n = 1
	}
	psi0, psi1 := math.Asin(sines[0]), math.Asin(sines[1])
	var out [][2]float64
	for k := range n + 1 {
		u := float64(k) / float64(n)
		if span < -1e-6 && k > 0 && k < n { // else it is straight
			u = (math.Sin(psi0+(psi1-psi0)*u) - sines[0]) / span
		}
		sine := sines[0] + u*span
		x := (ts[0]+u*(ts[1]-ts[0]))*s.dh - s.wide*sine*s.dz
		y := sign * s.wide * math.Sqrt(math.Max(0, (1-sine)*(1+sine)))
		out = append(out, [2]float64{s.a.X + x*s.x[0] - y*s.x[1], s.a.Y + x*s.x[1] + y*s.x[0]})
	}
	return out
}

// end is the arc of the ball at an end, h below the plane: what lies beyond
// the plane across the middle line there.
func (s *slant) end(m r3.Vec, h, sign float64) Seg {
	r := math.Sqrt(math.Max(0, s.wide*s.wide-h*h))
	half := math.Acos(clamp(-sign*h*s.dz/(r*s.dh), -1, 1))
	phi := math.Atan2(sign*s.x[1], sign*s.x[0])
	return Seg{Arc: true, Centre: [2]float64{m.X, m.Y}, Radius: r, Phi0: phi - half, Phi1: phi + half}
}
