package geom

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// Group is a number of pieces that together are one body of matter: a floor
// that was cut into sectors around its openings, or a single solid. A sphere
// that slides along a group crosses the seams of its pieces unawares, because
// the group's distance, the smallest of theirs, is that of their union in free
// space.
type Group int

// group gives the group of the piece that is added next.
func (b *Builder) group() Group {
	if b.within > 0 {
		return b.groups
	}
	b.groups++
	return b.groups - 1
}

// Together puts the pieces added until its result is called into one group.
func (b *Builder) Together() func() {
	b.within++
	return func() {
		if b.within--; b.within == 0 {
			b.groups++
		}
	}
}

func grouped(pieces []Piece) [][]int {
	var out [][]int
	for i := range pieces {
		for int(pieces[i].Group) >= len(out) {
			out = append(out, nil)
		}
		out[pieces[i].Group] = append(out[pieces[i].Group], i)
	}
	return out
}

// Groups gives the pieces of each group, as indices into Pieces.
func (in *Interior) Groups() [][]int { return in.groups }

// ContactIn gives the nearest point of one group.
func (in *Interior) ContactIn(p r3.Vec, g Group) Contact {
	at, best := in.nearestIn(p, g)
	if at < 0 {
		return Contact{Gap: best, Surface: -1}
	}
	return in.contactOf(at, p, best)
}

// nearestIn gives the nearest piece of one group, and its distance (m).
func (in *Interior) nearestIn(p r3.Vec, g Group) (int, float64) {
	at, best := -1, math.Inf(1)
	for _, i := range in.groups[g] {
		if d := in.pieces[i].Solid.Dist(p); d < best {
			at, best = i, d
		}
	}
	return at, best
}

func (in *Interior) contactOf(i int, p r3.Vec, d float64) Contact {
	point, normal, face := in.pieces[i].Solid.Nearest(p)
	return Contact{Gap: d, Point: point, Normal: normal, Surface: in.pieces[i].surface(face, point)}
}
