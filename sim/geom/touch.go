package geom

import (
	"gonum.org/v1/gonum/spatial/r3"
)

// Patch is what a sphere has a contact with: the whole of a group, wherever it
// is nearest, or one of its pieces, where the sphere touches the group at
// several places, as in the corner of an opening.
type Patch struct {
	Group Group
	Piece int // -1: the whole group
}

// Within says whether a contact with the patch is one with q.
func (p Patch) Within(q Patch) bool {
	return p.Group == q.Group && (p.Piece == q.Piece || q.Piece < 0)
}

// Touch is a contact with a patch.
type Touch struct {
	Patch
	Contact
}

// ContactOn gives the nearest point of a patch.
func (in *Interior) ContactOn(p r3.Vec, c Patch) Contact {
	if c.Piece < 0 {
		return in.ContactIn(p, c.Group)
	}
	return in.contactOf(c.Piece, p, in.pieces[c.Piece].Solid.Dist(p))
}

// nearestOn gives the piece of a patch that is nearest.
func (in *Interior) nearestOn(p r3.Vec, c Patch) int {
	if c.Piece >= 0 {
		return c.Piece
	}
	at, _ := in.nearestIn(p, c.Group)
	return at
}

const (
	// lift is how high, in m, a point is held over what it touches when it is
	// asked what else is in its way: a wall stands higher than that, and the
	// next piece of the floor does not.
	lift = 1e-5
	// seam is how near to one piece, in m, the nearest point of another one
	// lies where the two join without an edge between.
	seam = 1e-6
)

// contact is a piece that a sphere touches.
type contact struct {
	piece  int
	normal r3.Vec
}

// joins says whether a sphere of the radius wide (m) at p that touches the
// contact c has no contact of its own with piece i: it goes on from the piece
// of c, or is hidden by it.
func (in *Interior) joins(p r3.Vec, wide float64, i int, c *contact) bool {
	if i == c.piece {
		return true
	}
	if wide < lift {
		p = r3.Add(p, r3.Scale(lift-wide, c.normal))
	}
	q, _, _ := in.pieces[i].Solid.Nearest(p)
	return in.pieces[c.piece].Solid.Dist(q) <= seam
}

// Touching appends to dst the contacts of a sphere at p with what is within
// reach (m), its radius and a little more; those nearest first. Pieces that
// join without an edge between count once.
func (in *Interior) Touching(p r3.Vec, reach float64, dst []Touch) []Touch {
	from := len(dst)
	in.tree.within(in.pieces, p, reach, func(i int, d float64) {
		dst = append(dst, Touch{Patch{in.pieces[i].Group, i}, in.contactOf(i, p, d)})
	})
	near := dst[from:]
	for i := range near {
		for k := i; k > 0 && before(&near[k], &near[k-1]); k-- {
			near[k], near[k-1] = near[k-1], near[k]
		}
	}
	near = in.distinct(p, reach, near)
	for i := range near {
		if alone(near, i) {
			near[i].Piece = -1
		}
	}
	return dst[:from+len(near)]
}

func before(a, b *Touch) bool {
	if a.Gap != b.Gap {
		return a.Gap < b.Gap
	}
	return a.Piece < b.Piece
}

// distinct drops the touches that join another one. Of two that join each
// other the farther goes.
func (in *Interior) distinct(p r3.Vec, wide float64, list []Touch) []Touch {
	drop := make([]bool, len(list))
	for i := range list {
		for k := range list {
			if i == k || drop[k] || !in.joins(p, wide, list[i].Piece, &contact{list[k].Piece, list[k].Normal}) {
				continue
			}
			if k < i || !in.joins(p, wide, list[k].Piece, &contact{list[i].Piece, list[i].Normal}) {
				drop[i] = true
				break
			}
		}
	}
	out := list[:0]
	for i := range list {
		if !drop[i] {
			out = append(out, list[i])
		}
	}
	return out
}

// alone says whether touch i is the only one with its group.
func alone(list []Touch, i int) bool {
	for k := range list {
		if k != i && list[k].Group == list[i].Group {
			return false
		}
	}
	return true
}
