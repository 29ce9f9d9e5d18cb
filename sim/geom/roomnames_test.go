package geom_test

import (
	"math"
	"testing"

	"offplumb/sim/geom"
)

// TestNamesOfTorus tries the surfaces of both kinds of torus, from inside and
// outside.
func TestNamesOfTorus(t *testing.T) {
	round, flat := tube(false, false).build(), tube(true, false).build()
	ring, flatRing := 15.5, 16.0 // of the middle of the tube, which is at 0.3 m
	on := func(r, rho, deg, phi float64) named {
		sin, cos := math.Sincos(deg * math.Pi / 180)
		return named{at: polar(r+rho*cos, phi, 0.3+rho*sin)}
	}
	for _, c := range []struct {
		in   *geom.Interior
		ring float64
		rho  float64
		deg  float64
		want string
	}{
		{round, ring, 2.4, 0, "floor"}, {round, ring, 2.4, 80, "floor"}, {round, ring, 2.4, -80, "floor"}, {round, ring, 2.6, 20, "floor underside"},
		{round, ring, 2.4, 100, "ceiling"}, {round, ring, 2.4, 180, "ceiling"}, {round, ring, 2.6, 200, "ceiling outside"},
		{flat, flatRing, 2.4, 100, "ceiling"}, {flat, flatRing, 2.4, 200, "ceiling"}, {flat, flatRing, 2.6, 180, "ceiling outside"},
		{flat, flatRing, 2.4, 70, "wall +axial"}, {flat, flatRing, 2.4, -70, "wall -axial"},
		{flat, flatRing, 2.6, 70, "wall +axial outside"}, {flat, flatRing, 2.6, -70, "wall -axial outside"},
		{flat, flatRing, 1.9, 0, "floor"}, {flat, flatRing, 2.2, 0, "floor underside"}, {flat, flatRing, 2.3, 33, "floor"},
	} {
		n := on(c.ring, c.rho, c.deg, 3.5)
		n.want = c.want
		n.check(t, c.in)
	}
}

// TestNamesOfFlatFloor tries the rims of the openings in the flat floor of a
// torus.
func TestNamesOfFlatFloor(t *testing.T) {
	in := tube(true, false).build()
	for _, n := range []named{
		{polar(18.02, 2+0.55/18, 0.5), "hold rim"}, {polar(18.02, 2, 0.87), "hold rim"}, {polar(18.02, 2, 0.13), "hold rim"},
		{polar(17.8, 2.5+0.28/17.7, 0.2), "drain coaming"}, {polar(17.8, 2.5-0.37/17.7, 0.2), "drain coaming"}, {polar(17.65, 2.5, 0.62), "drain coaming"},
	} {
		n.check(t, in)
	}
}

func TestNamesOfBall(t *testing.T) {
	in := rays(false).build()
	for _, n := range []named{
		{polar(3.9, 1.4, 0.5), "hub floor"}, {polar(0, 0, 4.4), "hub floor"}, {polar(0.1, 2, -3.4), "hub floor"}, {polar(2, 1.4, 3.9), "hub floor"},
		{polar(4.2, 1.4, 0.5), "hub floor underside"}, {polar(0, 0, 4.7), "hub floor underside"}, {polar(12.9, 1.4, 0), "ceiling"},
	} {
		n.check(t, in)
	}
}

// TestNamesOfCabin tries the six sides of a cabin at angle 0.7 and axial 0.2,
// and the openings in its floor.
func TestNamesOfCabin(t *testing.T) {
	in := arms(false).build()
	at := geom.ShaftAt(0.7, 0.2)
	hatch, well := 16*math.Tan(0.05), -16*math.Tan(0.05)
	for _, c := range []struct {
		u, v, h float64
		want    string
	}{
		{0.2, 0.1, 0.1, "cabin A floor"}, {0, 0.1, -0.15, "cabin A floor underside"}, {1.6, 0.3, 2.4, "cabin A ceiling"}, {1.6, 0.3, 2.65, "cabin A ceiling outside"},
		{2.4, 0, 1.2, "cabin A spinward wall"}, {2.65, 0, 1.2, "cabin A spinward wall"}, {-2.4, 0, 1.2, "cabin A antispinward wall"},
		{0, 1.9, 1.2, "cabin A bulkhead +axial"}, {0, -1.9, 1.2, "cabin A bulkhead -axial"}, {0, -2.2, 1.2, "cabin A bulkhead -axial"},
		{hatch + 0.47, 0.4, 0.1, "hatch coaming"}, {hatch + 0.42, 0.4, 0.3, "hatch coaming"}, {hatch, 0.4 - 0.45, -0.02, "hatch coaming"},
		{-16 * math.Tan(0.06), -0.1, 0.05, "trap lid"}, {-16 * math.Tan(0.06), -0.1, -0.1, "trap lid underside"},
		{well + 0.3, -1.2, -0.02, "well rim"}, {well, -1.2 + 0.25, -0.02, "well rim"}, {well, -1.2 - 0.25, -0.02, "well rim"},
	} {
		(&named{shaftPoint(&at, c.u, c.v, 16-c.h), c.want}).check(t, in)
	}
}

// TestSpaces tries which places are inside the rooms, and how far others are
// beyond their hulls.
func TestSpaces(t *testing.T) {
	inch := wall
	for _, c := range []struct {
		name   string
		in     *geom.Interior
		r, z   float64
		inside bool
		beyond float64
	}{
		{"torus", tube(false, false).build(), 15.5, 0.3, true, -2.5 - inch},
		{"torus", tube(false, false).build(), 18.55, 0.3, false, 0.5},
		{"torus", tube(false, false).build(), 15.5, 3.3, false, 0.45},
		{"torus", tube(false, false).build(), 17.9, 1.5, false, math.Hypot(2.4, 1.2) - 2.55},
		{"flat torus", tube(true, false).build(), 17.9, 1.5, true, -0.15},
		{"flat torus", tube(true, false).build(), 18.04, 0.3, true, -0.01},
		{"flat torus", tube(true, false).build(), 18.25, 0.3, false, 0.2},
		{"ball", rays(false).build(), 0, 4.4, true, -0.15},
		{"ball", rays(false).build(), 0, 4.65, false, 0.1},
		{"cabin", arms(false).build(), 15.9, 0.2, true, -0.15},
		{"cabin", arms(false).build(), 13.4, -1, false, 0.05},
		{"cabin", arms(false).build(), 15, 2.35, false, 0.1},
	} {
		p := polar(c.r, 0.7, c.z)
		if c.name != "cabin" {
			p = polar(c.r, 3.6, c.z)
		}
		if got := c.in.Inside(p); got != c.inside {
			t.Errorf("%s: r %g, z %g is inside: %t", c.name, c.r, c.z, got)
		}
		if got := c.in.Beyond(p); math.Abs(got-c.beyond) > slack(worldSize) {
			t.Errorf("%s: r %g, z %g is %g m beyond the hull, want %g", c.name, c.r, c.z, got, c.beyond)
		}
	}
}

// TestNoWayOutOfRooms follows random walks that keep clear of all matter: from
// inside a closed hull none leads out.
func TestNoWayOutOfRooms(t *testing.T) {
	for i, w := range shaped() {
		for k := range w.tori {
			w.tori[k].Floor.Openings = nil
		}
		for k := range w.cabins {
			w.cabins[k].Floor.Openings = nil
		}
		in := w.build()
		rng := random(t, 200+uint64(i))
		for range 60 {
			pass := &w.passages[rng.IntN(len(w.passages))]
			p := polar(between(rng, innerEnd(pass), pass.To), pass.Phi, pass.Z)
			for range 300 {
				p = toward(p, between(rng, 0, 1)*in.Dist(p), direction(rng))
				if in.Beyond(p) > 0 || !in.Inside(p) && in.Dist(p) > slack(worldSize) {
					t.Fatalf("%s: a walk in free space led out, to %v, %g m beyond the hull", w.name, p, in.Beyond(p))
				}
			}
		}
	}
}

// TestCornersAreOfTwoGroups tries that a ball in a concave corner touches two
// bodies of matter, and one at a seam of a hull only one.
func TestCornersAreOfTwoGroups(t *testing.T) {
	cabin := geom.ShaftAt(0.7, 0.2)
	flat, round, ball, cab := tube(true, false).build(), tube(false, false).build(), rays(true).build(), arms(true).build()
	for _, c := range []struct {
		name  string
		in    *geom.Interior
		touch []geom.Touch
		want  int
	}{
		{"cabin, floor", cab, cab.Touching(shaftPoint(&cabin, 1, 0, 15.9), 0.11, nil), 1},
		{"cabin, floor and wall", cab, cab.Touching(shaftPoint(&cabin, 2.4, 0, 15.9), 0.11, nil), 2},
		{"cabin, corner", cab, cab.Touching(shaftPoint(&cabin, 2.4, 1.9, 15.9), 0.11, nil), 3},
		{"flat torus, floor and wall", flat, flat.Touching(polar(17.9, 3.5, 0.3+math.Sqrt(2.4*2.4-1.9*1.9)), 0.11, nil), 2},
		{"torus, seam of floor and ceiling", round, round.Touching(polar(15.5, 3.5, 2.7), 0.11, nil), 1},
		{"ball, seam of a band", ball, ball.Touching(polar(math.Sqrt(3.9*3.9-0.16), 1.5, 0.9), 0.11, nil), 1},
	} {
		if len(c.touch) != c.want {
			t.Errorf("%s: touches %d bodies, want %d", c.name, len(c.touch), c.want)
		}
	}
}
