package geom_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/geom"
)

// depthIn gives how far p lies from the hull of the room that it is in, if the
// hull had no mouths; negative outside.
func depthIn(room any, p r3.Vec) float64 {
	r := math.Hypot(p.X, p.Y)
	switch c := room.(type) {
	case *geom.Cylinder:
		d := math.Min(c.Floor.R0-r, math.Min(p.Z-c.Floor.Z0, c.Floor.Z1-p.Z))
		if c.Ceiling > 0 {
			d = math.Min(d, r-c.Ceiling)
		}
		return d
	case *geom.Torus:
		d := c.Tube - math.Hypot(r-c.Ring(), p.Z-c.Z)
		if c.Flat {
			d = math.Min(d, c.Floor.R0-r)
		}
		return d
	case *geom.Ball:
		return c.Floor.R0 - dist(p, r3.Vec{Z: c.Z})
	case *geom.Cabin:
		at := geom.ShaftAt(c.Phi, c.Z)
		u, v, w := about(&at, p)
		h := c.Floor.R0 - w
		return math.Min(math.Min(h, c.Size[2]-h), math.Min(c.Size[0]/2-math.Abs(u), c.Size[1]/2-math.Abs(v)))
	}
	return math.Inf(-1)
}

// clearOf gives the distance from p to the hulls of all rooms that it is in.
func (w *world) clearOf(p r3.Vec) float64 {
	best := math.Inf(-1)
	for i := range w.rooms {
		best = math.Max(best, depthIn(&w.rooms[i], p))
	}
	for i := range w.tori {
		best = math.Max(best, depthIn(&w.tori[i], p))
	}
	for i := range w.balls {
		best = math.Max(best, depthIn(&w.balls[i], p))
	}
	for i := range w.cabins {
		best = math.Max(best, depthIn(&w.cabins[i], p))
	}
	return best
}

// aside are places in the section of a shaft, as shares of half its width.
var aside = [][2]float64{{0, 0}, {0.99, 0}, {-0.99, 0}, {0, 0.99}, {0, -0.99}, {0.5, -0.5}, {0.7, 0.7}, {-0.99, 0.99}, {0.99, -0.99}}

// TestShaftsClear moves down each shaft along lines beside its middle: between
// its ends the nearest matter is always its own wall, at its true distance. No
// hull that it pierces shows.
func TestShaftsClear(t *testing.T) {
	for _, w := range shaped() {
		in := w.build()
		eachLine(w.world, func(p *geom.Passage, at *geom.Shaft, u, v, gap float64) {
			for x := innerEnd(p); x <= p.To; x += 0.01 {
				if d := in.Dist(shaftPoint(at, u, v, x)); math.Abs(d-gap) > slack(worldSize) {
					t.Fatalf("%s, %s: %g m out, %g and %g m aside: Dist is %g m, want %g", w.name, p.Name, x, u, v, d, gap)
				}
			}
		})
	}
}

// eachLine calls test with lines along each shaft, u and v (m) aside of its
// middle, and their distance from its wall.
func eachLine(w *world, test func(p *geom.Passage, at *geom.Shaft, u, v, gap float64)) {
	for i := range w.passages {
		p := &w.passages[i]
		at, h := geom.ShaftAt(p.Phi, p.Z), p.Width/2
		for _, a := range aside {
			from := math.Max(math.Abs(a[0]), math.Abs(a[1]))
			if p.Round {
				from = math.Hypot(a[0], a[1])
			}
			if from < 1 {
				test(p, &at, a[0]*h, a[1]*h, h*(1-from))
			}
		}
	}
}

// TestShaftsOpenIntoRooms goes on along the same lines into the rooms at both
// ends: nothing is nearer than the ends of the walls, which lie behind, or than
// the hull of the room.
func TestShaftsOpenIntoRooms(t *testing.T) {
	for _, w := range shaped() {
		in := w.build()
		eachLine(w.world, func(p *geom.Passage, at *geom.Shaft, u, v, gap float64) {
			for past := 0.0; past <= 0.8; past += 0.01 {
				for _, x := range []float64{innerEnd(p) - past, p.To + past} {
					q := shaftPoint(at, u, v, x)
					want := math.Min(math.Hypot(gap, past), w.clearOf(q))
					if d := in.Dist(q); d < want-slack(worldSize) {
						t.Fatalf("%s, %s: %g m past its end at %g m, %g and %g m aside: Dist is %g m, want %g", w.name, p.Name, past, x, u, v, d, want)
					}
				}
			}
		})
	}
}

// TestSpheresPass moves spheres of 0.99 and 1.01 times the width of each
// shaft along its middle line, from half a metre inside the room at one end to
// as far inside that at the other: the one keeps clear, the other touches.
func TestSpheresPass(t *testing.T) {
	for _, w := range shaped() {
		in := w.build()
		for i := range w.passages {
			p := &w.passages[i]
			at := geom.ShaftAt(p.Phi, p.Z)
			step := stepOf * p.Width
			low := least(in, shaftPoint(&at, 0, 0, innerEnd(p)-0.5), shaftPoint(&at, 0, 0, p.To+0.5), step)
			if low-step/2 <= 0.99*p.Width/2 {
				t.Errorf("%s: a sphere of 0.99 the width comes within %g m of %s", w.name, low-0.99*p.Width/2, p.Name)
			}
			if low >= 1.01*p.Width/2 {
				t.Errorf("%s: a sphere of 1.01 the width passes %s, %g m clear", w.name, p.Name, low-1.01*p.Width/2)
			}
		}
	}
}

// TestHullsHaveNoSlits tries that at the depth of each hull there is matter
// everywhere around the shafts: all that lies within a quarter of a metre
// beside their walls, inside the hull's thickness.
func TestHullsHaveNoSlits(t *testing.T) {
	for i, w := range shaped() {
		in := w.build()
		rng := random(t, 85+uint64(i))
		tried := 0
		for range 60000 {
			p := &w.passages[rng.IntN(len(w.passages))]
			at, h := geom.ShaftAt(p.Phi, p.Z), p.Width/2+0.25
			x := between(rng, innerEnd(p)-0.1, innerEnd(p)+0.7)
			if rng.IntN(2) == 0 {
				x = between(rng, p.To-0.7, p.To+0.1)
			}
			q := shaftPoint(&at, between(rng, -h, h), between(rng, -h, h), x)
			across, _ := alongShaft(p, q)
			if across <= p.Width/2 || !w.inHull(q) {
				continue
			}
			tried++
			if d := in.Dist(q); d > slack(worldSize) {
				t.Fatalf("%s: a slit beside %s, %g m from its middle line: Dist %g at %v", w.name, p.Name, across, d, q)
			}
		}
		if tried < 500 {
			t.Errorf("%s: only %d places lay in a hull", w.name, tried)
		}
	}
}

// inHull says whether p lies in the thickness of a hull, mouths or not.
func (w *world) inHull(p r3.Vec) bool {
	r := math.Hypot(p.X, p.Y)
	for i := range w.rooms {
		c := &w.rooms[i]
		if p.Z > c.Floor.Z0 && p.Z < c.Floor.Z1 && (r > c.Floor.R0 && r < c.Floor.R1 || c.Ceiling > 0 && r < c.Ceiling && r > c.Ceiling-wall) {
			return true
		}
	}
	for i := range w.tori {
		if t := &w.tori[i]; inTube(t, p) || t.Flat && r > t.Floor.R0 && r < t.Floor.R1 && math.Abs(p.Z-t.Z) < 0.6*t.Tube {
			return true
		}
	}
	for i := range w.balls {
		if rho := dist(p, r3.Vec{Z: w.balls[i].Z}); rho > w.balls[i].Floor.R0 && rho < w.balls[i].Floor.R0+wall {
			return true
		}
	}
	for i := range w.cabins {
		c := w.cabins[i]
		c.Floor.Openings = nil
		if cabinSolid(&c, p, false) {
			return true
		}
	}
	return false
}

// TestNamesOfShafts tries the walls of each shaft from within, all along it.
// At the depth of a hull the face of its mouth is level with the wall and may
// stand for it.
func TestNamesOfShafts(t *testing.T) {
	for _, w := range shaped() {
		in := w.build()
		for i := range w.passages {
			p := &w.passages[i]
			at, h := geom.ShaftAt(p.Phi, p.Z), p.Width/2
			names := map[[2]float64]string{{0.9, 0}: "spinward wall", {-0.9, 0}: "antispinward wall", {0, 0.9}: "+axial wall", {0, -0.9}: "-axial wall"}
			for a, want := range names {
				if p.Round {
					want = "wall"
				}
				for x := innerEnd(p) + 0.01; x < p.To; x += 0.05 {
					c := in.Contact(shaftPoint(&at, a[0]*h, a[1]*h, x))
					if got := in.Surface(c.Surface).Name; got != p.Name+" "+want && got != p.Name+" mouth" {
						t.Fatalf("%s: %g m from the axis the nearest is %q, want %q of %s", w.name, x, got, want, p.Name)
					}
				}
			}
		}
	}
}
