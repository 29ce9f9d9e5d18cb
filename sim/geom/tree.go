package geom

import (
	"cmp"
	"math"
	"slices"

	"gonum.org/v1/gonum/spatial/r3"
)

// leafSize is the most pieces that a leaf of the tree holds: a few distances
// cost less than another box.
const leafSize = 4

// treeDepth bounds the stack of a search: a tree that halves its pieces at
// each level holds 2^60 of them.
const treeDepth = 64

// tree is a hierarchy of boxes over the pieces. Children of node i are
// node[i].left and the one after it.
type tree struct {
	nodes []node
	order []int
}

type node struct {
	box         Box
	left        int // of an inner node; 0 for a leaf
	first, last int // of a leaf, in order
}

func newTree(pieces []Piece) tree {
	t := tree{order: make([]int, len(pieces))}
	boxes := make([]Box, len(pieces))
	for i := range pieces {
		t.order[i], boxes[i] = i, pieces[i].Solid.Bounds()
	}
	if len(pieces) > 0 {
		t.nodes = append(t.nodes, node{})
		t.split(0, boxes, 0, len(pieces))
	}
	return t
}

// split makes node i of the pieces order[first:last], halving them along the
// side where their middles lie widest apart.
func (t *tree) split(i int, boxes []Box, first, last int) {
	box := boxes[t.order[first]]
	for _, k := range t.order[first:last] {
		box = box.Union(boxes[k])
	}
	if last-first <= leafSize {
		t.nodes[i] = node{box: box, first: first, last: last}
		return
	}
	axis := widest(boxes, t.order[first:last])
	slices.SortStableFunc(t.order[first:last], func(a, b int) int {
		return cmp.Compare(middle(&boxes[a], axis), middle(&boxes[b], axis))
	})
	left := len(t.nodes)
	t.nodes = append(t.nodes, node{}, node{})
	t.nodes[i] = node{box: box, left: left}
	half := (first + last) / 2
	t.split(left, boxes, first, half)
	t.split(left+1, boxes, half, last)
}

func widest(boxes []Box, order []int) int {
	var best int
	wide := -1.0
	for axis := range 3 {
		lo, hi := math.Inf(1), math.Inf(-1)
		for _, k := range order {
			m := middle(&boxes[k], axis)
			lo, hi = math.Min(lo, m), math.Max(hi, m)
		}
		if hi-lo > wide {
			best, wide = axis, hi-lo
		}
	}
	return best
}

// middle gives the middle of a box along an axis; 0 where it is endless.
func middle(b *Box, axis int) float64 {
	lo, hi := b.Min.X, b.Max.X
	switch axis {
	case 1:
		lo, hi = b.Min.Y, b.Max.Y
	case 2:
		lo, hi = b.Min.Z, b.Max.Z
	}
	if m := (lo + hi) / 2; !math.IsNaN(m) && !math.IsInf(m, 0) {
		return m
	}
	return 0
}

// nearest gives the index of the piece nearest to p, the earlier of two at
// the same distance, and the distance; -1 and infinity where there are none.
func (t *tree) nearest(pieces []Piece, p r3.Vec) (int, float64) {
	best, at := math.Inf(1), -1
	if len(t.nodes) == 0 {
		return at, best
	}
	var stack [treeDepth]int
	top := 1
	for top > 0 {
		top--
		n := &t.nodes[stack[top]]
		if len(t.nodes) > 1 && n.box.Dist(p) > max(best, 0) {
			continue
		}
		if n.left == 0 {
			for _, k := range t.order[n.first:n.last] {
				if d := pieces[k].Solid.Dist(p); d < best || d == best && k < at {
					best, at = d, k
				}
			}
			continue
		}
		stack[top], stack[top+1] = t.sorted(n, p)
		top += 2
	}
	return at, best
}

// sorted gives the children of an inner node, that nearer to p last.
func (t *tree) sorted(n *node, p r3.Vec) (far, near int) {
	near, far = n.left, n.left+1
	if t.nodes[far].box.Dist(p) < t.nodes[near].box.Dist(p) {
		return near, far
	}
	return far, near
}

// within calls f with each piece whose distance from p is at most reach, in
// no special order.
func (t *tree) within(pieces []Piece, p r3.Vec, reach float64, f func(i int, d float64)) {
	t.each(pieces, p, &reach, func(i int, d float64) float64 {
		if d <= reach {
			f(i, d)
		}
		return reach
	})
}

// each calls f with the pieces in boxes no farther from p than bound, and sets
// bound to what f returns.
func (t *tree) each(pieces []Piece, p r3.Vec, bound *float64, f func(i int, d float64) float64) {
	if len(t.nodes) == 0 {
		return
	}
	var stack [treeDepth]int
	top := 1
	for top > 0 {
		top--
		n := &t.nodes[stack[top]]
		if n.box.Dist(p) > math.Max(*bound, 0) {
			continue
		}
		if n.left == 0 {
			for _, k := range t.order[n.first:n.last] {
				*bound = f(k, pieces[k].Solid.Dist(p))
			}
			continue
		}
		stack[top], stack[top+1] = t.sorted(n, p)
		top += 2
	}
}
