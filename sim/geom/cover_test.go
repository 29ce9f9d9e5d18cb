package geom_test

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/geom"
)

// cover is a set of points of a boundary such that no point of the boundary is
// farther than reach from one of them.
// Edges among them hold the points of edges, with a reach of their own.
type cover struct {
	points, edges    []r3.Vec
	reach, edgeReach float64 // m
}

// edgeFiner is how much closer edges are sampled than faces: rims and mouths
// are where a distance goes wrong first.
const edgeFiner = 20

// nearest gives the distance from p to the nearest point of the set.
func (c *cover) nearest(p r3.Vec) float64 {
	best := math.Inf(1)
	for i := range c.points {
		best = math.Min(best, r3.Norm2(r3.Sub(p, c.points[i])))
	}
	return math.Sqrt(best)
}

// patch samples a face given over the unit square, whose sides are at most u
// and v long (m), edges more closely.
func (c *cover) patch(u, v, step float64, at func(i, j float64) r3.Vec) {
	n, m := cells(u, step), cells(v, step)
	for i := range n + 1 {
		for j := range m + 1 {
			c.points = append(c.points, at(float64(i)/float64(n), float64(j)/float64(m)))
		}
	}
	c.reach = math.Max(c.reach, math.Hypot(u/float64(n), v/float64(m))/2)
	for _, side := range []float64{0, 1} {
		c.edge(u, step/edgeFiner, func(i float64) r3.Vec { return at(i, side) })
		c.edge(v, step/edgeFiner, func(j float64) r3.Vec { return at(side, j) })
	}
}

// edge samples a line given over the unit interval, at most u long (m).
func (c *cover) edge(u, step float64, at func(i float64) r3.Vec) {
	n := cells(u, step)
	for i := range n + 1 {
		q := at(float64(i) / float64(n))
		c.points, c.edges = append(c.points, q), append(c.edges, q)
	}
	c.edgeReach = math.Max(c.edgeReach, u/float64(n)/2)
}

func cells(length, step float64) int { return int(math.Ceil(length / step)) }

// coverSector samples the boundary of a sector of finite length.
func coverSector(s *geom.Sector, step float64) cover {
	var c cover
	phi0, phi1 := s.Phi0, s.Phi1
	if s.Whole {
		phi0, phi1 = 0, 2*math.Pi
	}
	phi := func(i float64) float64 { return phi0 + i*(phi1-phi0) }
	r := func(i float64) float64 { return s.R0 + i*(s.R1-s.R0) }
	z := func(i float64) float64 { return s.Z0 + i*(s.Z1-s.Z0) }
	arc := s.R1 * (phi1 - phi0)
	for _, radius := range []float64{s.R0, s.R1} {
		if radius > 0 {
			c.patch(arc, s.Z1-s.Z0, step, func(i, j float64) r3.Vec { return polar(radius, phi(i), z(j)) })
		}
	}
	for _, end := range []float64{s.Z0, s.Z1} {
		c.patch(arc, s.R1-s.R0, step, func(i, j float64) r3.Vec { return polar(r(j), phi(i), end) })
	}
	if s.Whole {
		return c
	}
	for _, side := range []float64{phi0, phi1} {
		c.patch(s.R1-s.R0, s.Z1-s.Z0, step, func(i, j float64) r3.Vec { return polar(r(i), side, z(j)) })
	}
	return c
}

// coverBlock samples the boundary of a block.
func coverBlock(b *geom.Block, step float64) cover {
	var c cover
	axes := [3]r3.Vec{b.Along, b.Across, b.Up}
	for axis := range axes {
		k, l := (axis+1)%3, (axis+2)%3
		for _, sign := range []float64{-1, 1} {
			mid := toward(b.Centre, sign*b.Half[axis], axes[axis])
			c.patch(2*b.Half[k], 2*b.Half[l], step, func(i, j float64) r3.Vec {
				return toward(toward(mid, (2*i-1)*b.Half[k], axes[k]), (2*j-1)*b.Half[l], axes[l])
			})
		}
	}
	return c
}
