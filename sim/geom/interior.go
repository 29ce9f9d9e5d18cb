package geom

import (
	"math"
	"slices"

	"gonum.org/v1/gonum/spatial/r3"
)

// SurfaceID names a surface of an interior: its index in Surfaces.
type SurfaceID int

// Surface is a named surface. Restitution and Friction are its own, NaN where
// it has none and the body's hold.
type Surface struct {
	Name                  string
	Restitution, Friction float64
}

// Piece is a solid whose faces belong to surfaces: Faces[f] is that of face f.
type Piece struct {
	Solid Solid
	Faces []SurfaceID
	Group Group // what it is a part of
	rims  []rim
}

// rim is where a hole ends at a face: the angles up to half (rad) from phi
// belong to a surface of its own. Between the rims of a face another piece
// joins on, so that a point nearest to the face lies at one of them.
type rim struct {
	face      int
	phi, half float64
	id        SurfaceID
}

// surface gives the surface to which a point q of a face belongs.
func (p *Piece) surface(face int, q r3.Vec) SurfaceID {
	id, least := p.Faces[face], math.Inf(1)
	for i := range p.rims {
		if r := &p.rims[i]; r.face == face {
			off := math.Abs(math.Remainder(math.Atan2(q.Y, q.X)-r.phi, 2*math.Pi)) - r.half
			if off < least {
				id, least = r.id, off
			}
		}
	}
	return id
}

// bounded says whether a surface bounds the solid.
func (p *Piece) bounded(id SurfaceID) bool {
	return slices.Contains(p.Faces, id) || slices.ContainsFunc(p.rims, func(r rim) bool { return r.id == id })
}

// Contact is where a point is nearest to the interior's surfaces.
type Contact struct {
	Gap     float64 // m; negative within a solid
	Point   r3.Vec  // the nearest point of the surface, m
	Normal  r3.Vec  // unit, from the solid into free space
	Surface SurfaceID
}

// Space is a stretch of free space that something can be in: a room or a
// passage.
type Space interface {
	// Beyond gives how far (m) a point lies beyond the outer face of the
	// space's hull; negative inside.
	//
	// Law: |Beyond(p) - Beyond(q)| <= |p - q|.
	Beyond(p r3.Vec) float64
	// Holds says whether the point is within the space.
	Holds(p r3.Vec) bool
}

// Interior is what a habitat looks like from inside. It is immutable and may
// be used from many goroutines.
type Interior struct {
	surfaces []Surface
	pieces   []Piece
	spaces   []Space
	groups   [][]int // the pieces of each group
	tree     tree
}

// Dist gives the distance (m) from p to the nearest solid, negative within.
//
// Law: |Dist(p) - Dist(q)| <= |p - q|; in free space it is exact.
func (in *Interior) Dist(p r3.Vec) float64 {
	_, d := in.tree.nearest(in.pieces, p)
	return d
}

// Contact gives the nearest surface.
func (in *Interior) Contact(p r3.Vec) Contact {
	i, d := in.tree.nearest(in.pieces, p)
	if i < 0 {
		return Contact{Gap: math.Inf(1), Surface: -1}
	}
	point, normal, face := in.pieces[i].Solid.Nearest(p)
	return Contact{Gap: d, Point: point, Normal: normal, Surface: in.pieces[i].surface(face, point)}
}

// DistTo gives the distance (m) from p to the solids that one surface bounds.
func (in *Interior) DistTo(p r3.Vec, id SurfaceID) float64 {
	best := math.Inf(1)
	for i := range in.pieces {
		if in.pieces[i].bounded(id) {
			best = math.Min(best, in.pieces[i].Solid.Dist(p))
		}
	}
	return best
}

// Surface gives a surface; the zero ID of none is an unnamed one.
func (in *Interior) Surface(id SurfaceID) Surface {
	if id < 0 || int(id) >= len(in.surfaces) {
		return Surface{Restitution: math.NaN(), Friction: math.NaN()}
	}
	return in.surfaces[id]
}

// Surfaces gives all surfaces, in the order in which they were made.
func (in *Interior) Surfaces() []Surface { return append([]Surface(nil), in.surfaces...) }

// Inside says whether a point is within a room or passage; solids that stand
// there count as inside.
func (in *Interior) Inside(p r3.Vec) bool {
	for _, s := range in.spaces {
		if s.Holds(p) {
			return true
		}
	}
	return false
}

// Beyond gives how far (m) a point lies beyond the outer face of the whole
// hull; negative inside.
//
// Law: |Beyond(p) - Beyond(q)| <= |p - q|.
func (in *Interior) Beyond(p r3.Vec) float64 {
	best := math.Inf(1)
	for _, s := range in.spaces {
		best = math.Min(best, s.Beyond(p))
	}
	return best
}

// Pieces gives the solids, for figures and tests.
func (in *Interior) Pieces() []Piece { return in.pieces }

// Builder gathers the surfaces, solids and spaces of an interior.
type Builder struct {
	in     Interior
	named  map[string]SurfaceID
	groups Group
	within int // depth of Together
}

// Surface gives the surface of a name, making it at its first use.
// Restitution and friction are NaN for none of its own.
func (b *Builder) Surface(name string, restitution, friction float64) SurfaceID {
	if id, ok := b.named[name]; ok {
		return id
	}
	if b.named == nil {
		b.named = map[string]SurfaceID{}
	}
	id := SurfaceID(len(b.in.surfaces))
	b.named[name] = id
	b.in.surfaces = append(b.in.surfaces, Surface{Name: name, Restitution: restitution, Friction: friction})
	return id
}

// Add adds a solid with the surface of each of its faces.
func (b *Builder) Add(s Solid, faces ...SurfaceID) {
	b.in.pieces = append(b.in.pieces, Piece{Solid: s, Faces: faces, Group: b.group()})
}

// Len gives the number of solids added so far: the index of the next piece.
func (b *Builder) Len() int { return len(b.in.pieces) }

// AddSpace adds a room or passage.
func (b *Builder) AddSpace(s Space) { b.in.spaces = append(b.in.spaces, s) }

// Inside says whether a point is within a room or passage added so far.
func (b *Builder) Inside(p r3.Vec) bool { return b.in.Inside(p) }

// SoFar gives the interior of what was added until now.
func (b *Builder) SoFar() *Interior {
	in := b.in
	in.surfaces, in.pieces, in.spaces = slices.Clone(in.surfaces), slices.Clone(in.pieces), slices.Clone(in.spaces)
	in.tree = newTree(in.pieces)
	in.groups = grouped(in.pieces)
	return &in
}

// Build finishes the interior; the builder is done with.
func (b *Builder) Build() *Interior {
	in := b.in
	in.tree = newTree(in.pieces)
	in.groups = grouped(in.pieces)
	return &in
}
