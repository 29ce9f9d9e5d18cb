package geom_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/geom"
)

// TestSolidLipschitz tries |Dist(p) - Dist(q)| <= |p - q|, within, without and
// across the boundary, on steps from a micron to ten metres.
func TestSolidLipschitz(t *testing.T) {
	rng := random(t, 1)
	for _, s := range randomShapes(rng, 15, 2) {
		for range 400 {
			p := s.point(rng)
			q := toward(p, decades(rng, 1e-6, 10), direction(rng))
			if rng.IntN(4) == 0 {
				q = s.point(rng)
			}
			got, most := math.Abs(s.solid.Dist(p)-s.solid.Dist(q)), dist(p, q)
			if got > most+slack(s.size+r3.Norm(p)+most) {
				t.Fatalf("%+v: Dist changes by %.17g from %v to %v, %.17g apart", s.solid, got, p, q, most)
			}
		}
	}
}

// TestSolidDistExact holds Dist against samples of the boundary: no sample is
// nearer, and one is as near as the reach of the samples allows.
func TestSolidDistExact(t *testing.T) {
	rng := random(t, 2)
	for _, s := range randomShapes(rng, 2, 0.3) {
		for range 40 {
			p := s.point(rng)
			d := s.solid.Dist(p)
			if d <= 0 {
				continue // within, it may be a bound
			}
			near := s.cover.nearest(p)
			if tol := slack(s.size + r3.Norm(p)); d > near+tol || d < near-s.cover.reach-tol {
				t.Fatalf("%+v: Dist(%v) = %.17g, nearest sample %.17g, reach %g", s.solid, p, d, near, s.cover.reach)
			}
		}
	}
}

// TestSolidDistAtEdges does the same from close to edges and corners, where
// the samples lie closer and the bound is as much tighter.
func TestSolidDistAtEdges(t *testing.T) {
	rng := random(t, 3)
	tried := 0
	for _, s := range randomShapes(rng, 2, 0.3) {
		edges := s.cover.edges
		for range 40 {
			q := edges[rng.IntN(len(edges))]
			p := toward(q, decades(rng, 1e-3, 0.05), direction(rng))
			point, _, _ := s.solid.Nearest(p)
			d := s.solid.Dist(p)
			if d <= 0 || (&cover{points: edges}).nearest(point) > s.cover.edgeReach {
				continue // nearest to a face
			}
			tried++
			near := (&cover{points: edges}).nearest(p)
			if tol := slack(s.size + r3.Norm(p)); d > near+tol || d < near-s.cover.edgeReach-tol {
				t.Fatalf("%+v: Dist(%v) = %.17g, nearest edge sample %.17g, reach %g", s.solid, p, d, near, s.cover.edgeReach)
			}
		}
	}
	if tried < 100 {
		t.Errorf("only %d places were nearest to an edge", tried)
	}
}

// TestSolidNearest tries that the nearest point lies on the boundary at the
// distance Dist, and that the normal is a unit vector that leads from it to p,
// or out from it if p is within.
func TestSolidNearest(t *testing.T) {
	rng := random(t, 4)
	for _, s := range randomShapes(rng, 15, 2) {
		for range 200 {
			p := s.point(rng)
			d := s.solid.Dist(p)
			q, n, face := s.solid.Nearest(p)
			tol := slack(s.size + r3.Norm(p))
			switch {
			case math.Abs(s.solid.Dist(q)) > tol:
				t.Fatalf("%+v: Nearest(%v) = %v, which is %g off the surface", s.solid, p, q, s.solid.Dist(q))
			case math.Abs(dist(p, q)-math.Abs(d)) > tol:
				t.Fatalf("%+v: Nearest(%v) is %.17g away, Dist says %.17g", s.solid, p, dist(p, q), d)
			case math.Abs(r3.Norm(n)-1) > 8*epsilon:
				t.Fatalf("%+v: the normal at %v is %.17g long", s.solid, p, r3.Norm(n))
			case r3.Norm(r3.Sub(r3.Sub(p, q), r3.Scale(d, n))) > 2*tol:
				t.Fatalf("%+v: %v is not %g along the normal %v from %v", s.solid, p, d, n, q)
			case offFace(s.solid, face, q) > tol:
				t.Fatalf("%+v: %v, nearest to %v, is %g off face %d", s.solid, q, p, offFace(s.solid, face, q), face)
			}
		}
	}
}

// offFace gives how far (m) a point lies from the plane or cylinder of a face.
func offFace(s geom.Solid, face int, q r3.Vec) float64 {
	if b, ok := s.(*geom.Block); ok {
		at := [...]r3.Vec{b.Up, b.Along, b.Across}[face/2] // faces come in pairs, the one at + first
		sign := float64(1 - 2*(face%2))
		half := [...]float64{b.Half[2], b.Half[0], b.Half[1]}[face/2]
		return math.Abs(r3.Dot(r3.Sub(q, b.Centre), at) - sign*half)
	}
	c, ok := s.(*geom.Sector)
	if !ok {
		return offFurther(s, face, q)
	}
	r := math.Hypot(q.X, q.Y)
	plane := func(phi float64) float64 { return math.Abs(q.Y*math.Cos(phi) - q.X*math.Sin(phi)) }
	switch face {
	case geom.SectorInner:
		return math.Abs(r - c.R0)
	case geom.SectorOuter:
		return math.Abs(r - c.R1)
	case geom.SectorAntispinward:
		return plane(c.Phi0)
	case geom.SectorSpinward:
		return plane(c.Phi1)
	case geom.SectorMinusAxial:
		return math.Abs(q.Z - c.Z0)
	case geom.SectorPlusAxial:
		return math.Abs(q.Z - c.Z1)
	}
	return math.Inf(1)
}

// The step of the central differences (m), and the least distance and radius
// at which they are taken (m).
const (
	diffStep  = 1e-6
	diffLeast = 0.05
)

// TestSolidNormalIsGradient holds normals against central differences of Dist,
// away from the seams where the nearest point jumps. The normal turns at most
// by 1/diffLeast a metre, and may begin to do so within the step: that is the
// first part of the tolerance; rounding over the step is the second.
func TestSolidNormalIsGradient(t *testing.T) {
	rng := random(t, 5)
	tried, seams := 0, 0
	for _, s := range randomShapes(rng, 15, 2) {
		for range 100 {
			p := s.point(rng)
			if math.Abs(s.solid.Dist(p)) < diffLeast || math.Hypot(p.X, p.Y) < diffLeast {
				continue
			}
			tried++
			grad, jump := gradientOf(p, s.size, func(p r3.Vec) (float64, r3.Vec) {
				q, _, _ := s.solid.Nearest(p)
				return s.solid.Dist(p), q
			})
			if jump {
				seams++
				continue
			}
			_, n, _ := s.solid.Nearest(p)
			tol := diffStep/diffLeast + slack(s.size+r3.Norm(p))/diffStep
			if r3.Norm(r3.Sub(grad, n)) > 2*tol {
				t.Fatalf("%+v: at %v normal %v, gradient %v", s.solid, p, n, grad)
			}
		}
	}
	if seams > tried/50 {
		t.Errorf("%d of %d places lay at seams", seams, tried)
	}
}

// gradientOf gives the central differences of a distance, and whether the
// nearest point jumps within them: elsewhere it moves at most R/r times as far
// as p.
func gradientOf(p r3.Vec, size float64, nearest func(p r3.Vec) (d float64, q r3.Vec)) (g r3.Vec, jump bool) {
	along := func(e r3.Vec) float64 {
		da, qa := nearest(toward(p, diffStep, e))
		db, qb := nearest(toward(p, -diffStep, e))
		if dist(qa, qb) > 4*diffStep*(1+size/math.Hypot(p.X, p.Y)) {
			jump = true
		}
		return (da - db) / (2 * diffStep)
	}
	g = r3.Vec{X: along(r3.Vec{X: 1}), Y: along(r3.Vec{Y: 1}), Z: along(r3.Vec{Z: 1})}
	return g, jump
}

// TestSolidBounds tries that the box holds the boundary, touches it on every
// side, and is never farther off than the solid.
func TestSolidBounds(t *testing.T) {
	rng := random(t, 6)
	for _, s := range randomShapes(rng, 4, 0.4) {
		box := s.solid.Bounds()
		tol := slack(2 * s.size)
		lo, hi := s.cover.points[0], s.cover.points[0]
		for _, q := range s.cover.points {
			if box.Dist(q) > tol {
				t.Fatalf("%+v: the box %v leaves out %v", s.solid, box, q)
			}
			lo = r3.Vec{X: math.Min(lo.X, q.X), Y: math.Min(lo.Y, q.Y), Z: math.Min(lo.Z, q.Z)}
			hi = r3.Vec{X: math.Max(hi.X, q.X), Y: math.Max(hi.Y, q.Y), Z: math.Max(hi.Z, q.Z)}
		}
		loose := math.Max(widestOf(r3.Sub(lo, box.Min)), widestOf(r3.Sub(box.Max, hi)))
		if loose > s.cover.reach+tol {
			t.Errorf("%+v: the box %v is %g wider than the solid", s.solid, box, loose)
		}
		for range 100 {
			if p := s.point(rng); s.solid.Dist(p) > 0 && box.Dist(p) > s.solid.Dist(p)+slack(s.size+r3.Norm(p)) {
				t.Fatalf("%+v: box is %.17g from %v, the solid %.17g", s.solid, box.Dist(p), p, s.solid.Dist(p))
			}
		}
	}
}

func widestOf(v r3.Vec) float64 { return math.Max(v.X, math.Max(v.Y, v.Z)) }
