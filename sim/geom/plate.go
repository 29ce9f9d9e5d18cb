package geom

import (
	"math"
	"slices"

	"gonum.org/v1/gonum/spatial/r3"
)

// rect is a rectangle of places about a shaft, and the name of the faces of
// the hole that it is.
type rect struct {
	name string
	u, v [2]float64 // m
}

// plate is a flat floor or ceiling: matter over a rectangle, from w[0] to w[1],
// with rectangular holes.
type plate struct {
	Shaft
	rect
	w                     [2]float64 // m from the axis
	restitution, friction float64    // of its surfaces; NaN: the body's
	top, under, edge      string     // names of its faces: toward the axis, away from it, its sides
	holes                 []rect
}

// block gives the block between places about a shaft.
func (s *Shaft) block(u, v, w [2]float64) *Block {
	return &Block{Centre: s.point(r3.Vec{X: (u[0] + u[1]) / 2, Y: (v[0] + v[1]) / 2, Z: (w[0] + w[1]) / 2}),
		Along: s.Spin, Across: r3.Vec{Z: 1}, Up: r3.Scale(-1, s.Out),
		Half: [3]float64{(u[1] - u[0]) / 2, (v[1] - v[0]) / 2, (w[1] - w[0]) / 2}}
}

// addPlate adds the blocks that are left of a plate around its holes: bands
// between the axial places at which holes begin or end, each cut where its
// holes are.
func (b *Builder) addPlate(s *plate) {
	defer b.Together()()
	vs := []float64{s.v[0], s.v[1]}
	for _, h := range s.holes {
		vs = append(vs, clamp(h.v[0], s.v[0], s.v[1]), clamp(h.v[1], s.v[0], s.v[1]))
	}
	slices.Sort(vs)
	vs = slices.Compact(vs)
	for i := 1; i < len(vs); i++ {
		v := [2]float64{vs[i-1], vs[i]}
		left := []span{{from: s.u[0], to: s.u[1], atFrom: s.edge, atTo: s.edge}}
		for _, h := range s.holes {
			if h.v[0] < v[1] && h.v[1] > v[0] {
				left = without(left, h.u, h.name)
			}
		}
		for _, l := range left {
			b.addPart(s, l, v)
		}
	}
}

// without takes a hole out of stretches.
func without(spans []span, hole [2]float64, name string) []span {
	var next []span
	for _, s := range spans {
		if hole[1] <= s.from || hole[0] >= s.to {
			next = append(next, s)
			continue
		}
		if hole[0] > s.from {
			next = append(next, span{from: s.from, to: hole[0], atFrom: s.atFrom, atTo: name})
		}
		if hole[1] < s.to {
			next = append(next, span{from: hole[1], to: s.to, atFrom: name, atTo: s.atTo})
		}
	}
	return next
}

// addPart adds one block of a plate.
func (b *Builder) addPart(s *plate, l span, v [2]float64) {
	name := func(n string) SurfaceID { return b.Surface(n, s.restitution, s.friction) }
	faces := make([]SurfaceID, blockFaces)
	faces[BlockTop], faces[BlockUnderside] = name(s.top), name(s.under)
	faces[BlockAntispinward], faces[BlockSpinward] = name(l.atFrom), name(l.atTo)
	faces[BlockMinusAxial], faces[BlockPlusAxial] = name(s.edge), name(s.edge)
	b.Add(s.block([2]float64{l.from, l.to}, v, s.w), faces...)
	added := &b.in.pieces[len(b.in.pieces)-1]
	for _, h := range s.holes {
		if h.v[1] == v[0] {
			added.rims = append(added.rims, s.rim(BlockMinusAxial, h, name(h.name)))
		}
		if h.v[0] == v[1] {
			added.rims = append(added.rims, s.rim(BlockPlusAxial, h, name(h.name)))
		}
	}
}

// rim gives a hole's part of a face by the angles under which it is seen from
// the axis at the middle of the plate's thickness.
func (s *plate) rim(face int, h rect, id SurfaceID) rim {
	phi, w := math.Atan2(s.Out.Y, s.Out.X), (s.w[0]+s.w[1])/2
	a, b := math.Atan2(h.u[0], w), math.Atan2(h.u[1], w)
	return rim{face: face, phi: phi + (a+b)/2, half: (b - a) / 2, id: id}
}

// pierce cuts the mouth of a passage into the plate where it crosses it, which
// stands across the radius at the angle phi: the rectangle around the slanting
// section. Beside it the hole is wider than the shaft by the plate's thickness
// times the sine of the angle between them at most, and so within its walls.
// For a round shaft it gives the stretch over which collars must fill the
// corners.
func (s *plate) pierce(p *Passage, phi float64) (Span, bool) {
	sin, cos := math.Sincos(p.Phi - phi)
	mid := (s.w[0] + s.w[1]) / 2
	h := rect{name: p.mouthName(), u: [2]float64{math.Inf(1), math.Inf(-1)}, v: [2]float64{p.Z - s.Z - p.Width/2, p.Z - s.Z + p.Width/2}}
	if cos <= 0 || !p.crosses(mid/cos) || math.Abs(mid*sin/cos) >= s.u[1] || math.Abs(p.Z-s.Z) >= s.v[1] {
		return Span{}, false
	}
	for _, w := range s.w {
		h.u[0] = math.Min(h.u[0], (w*sin-p.Width/2)/cos)
		h.u[1] = math.Max(h.u[1], (w*sin+p.Width/2)/cos)
	}
	out := Span{math.Inf(1), math.Inf(-1)}
	for _, u := range h.u {
		for _, w := range s.w {
			out.From, out.To = math.Min(out.From, u*sin+w*cos), math.Max(out.To, u*sin+w*cos)
		}
	}
	s.holes = append(s.holes, h)
	return out, true
}
