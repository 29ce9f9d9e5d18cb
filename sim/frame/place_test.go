package frame_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/frame"
)

// TestPolarRoundTrip tries PolarOf(p).Vec() = p and the range of the angle.
func TestPolarRoundTrip(t *testing.T) {
	rng := random(t, 200)
	for range 2000 {
		p := vec(rng, 900)
		c := frame.PolarOf(p)
		// The angle is rounded by 2 epsilon at most, twice.
		if off(c.Vec(), p) > 8*epsilon*r3.Norm(p) {
			t.Fatalf("%v comes back as %v", p, c.Vec())
		}
		if c.R < 0 || c.Phi <= -math.Pi || c.Phi > math.Pi {
			t.Fatalf("%v is at %+v", p, c)
		}
	}
}

// TestPolarOf tries places on the axes; the angle lies in (-pi, pi] on either
// side of the line where it jumps.
func TestPolarOf(t *testing.T) {
	tiny := math.SmallestNonzeroFloat64
	for _, c := range []struct {
		p    r3.Vec
		want frame.Polar
	}{
		{r3.Vec{X: 3, Z: 1}, frame.Polar{R: 3, Z: 1}},
		{r3.Vec{Y: 3}, frame.Polar{R: 3, Phi: math.Pi / 2}},
		{r3.Vec{Y: -3, Z: -2}, frame.Polar{R: 3, Phi: -math.Pi / 2, Z: -2}},
		{r3.Vec{X: -3}, frame.Polar{R: 3, Phi: math.Pi}},
		{r3.Vec{X: -3, Y: math.Copysign(0, -1)}, frame.Polar{R: 3, Phi: math.Pi}},
		{r3.Vec{X: -3, Y: -tiny}, frame.Polar{R: 3, Phi: math.Pi}},
		{r3.Vec{}, frame.Polar{}},
	} {
		if got := frame.PolarOf(c.p); got != c.want {
			t.Errorf("PolarOf(%v) = %+v, want %+v", c.p, got, c.want)
		}
	}
}

// TestPolarAcross tries that a negative radius lies across the axis.
func TestPolarAcross(t *testing.T) {
	rng := random(t, 201)
	for range 100 {
		c := frame.Polar{R: 5 * rng.Float64(), Phi: 12*rng.Float64() - 6, Z: 1}
		across := frame.Polar{R: -c.R, Phi: c.Phi, Z: c.Z}.Vec()
		if p := c.Vec(); across != (r3.Vec{X: -p.X, Y: -p.Y, Z: p.Z}) {
			t.Fatalf("%+v is at %v, across the axis at %v", c, p, across)
		}
	}
}

// TestLocal tries that the directions are orthonormal, that up leads to the
// axis, that +axial is on the right of who faces spinward, and that spinward is
// the way the floor moves at positive spin.
func TestLocal(t *testing.T) {
	rng := random(t, 202)
	for range 500 {
		phi := 14*rng.Float64() - 7
		l := frame.LocalAt(phi)
		p := frame.Polar{R: 2, Phi: phi}.Vec()
		if off(r3.Cross(l.Spinward, l.Up), l.Axial) > 4*epsilon || l.Axial != (r3.Vec{Z: 1}) || math.Abs(r3.Norm(l.Up)-1) > 4*epsilon {
			t.Fatalf("at %g: %+v", phi, l)
		}
		if off(r3.Scale(-0.5, p), l.Up) > 4*epsilon {
			t.Fatalf("at %g up is %v, the place %v", phi, l.Up, p)
		}
		a := frame.Steady{Spin: 0.5}.At(0)
		if v := a.ToInertial(frame.State{Pos: p}).Vel; off(v, l.Spinward) > 8*epsilon {
			t.Fatalf("at %g the floor moves with %v, spinward is %v", phi, v, l.Spinward)
		}
	}
}

// TestLocalRoundTrip tries that Split and Vec undo each other.
func TestLocalRoundTrip(t *testing.T) {
	rng := random(t, 203)
	for range 500 {
		l := frame.LocalAt(14*rng.Float64() - 7)
		v := vec(rng, 30)
		if got := l.Vec(l.Split(v)); off(got, v) > 16*epsilon*r3.Norm(v) {
			t.Fatalf("%v comes back as %v", v, got)
		}
		s, a, u := l.Split(l.Vec(v.X, v.Y, v.Z))
		if off(r3.Vec{X: s, Y: a, Z: u}, v) > 16*epsilon*r3.Norm(v) {
			t.Fatalf("parts %v come back as %g, %g, %g", v, s, a, u)
		}
	}
}

func TestWrapAngle(t *testing.T) {
	for _, c := range []struct{ phi, want float64 }{
		{0, 0}, {1, 1}, {-1, -1}, {math.Pi, math.Pi}, {-math.Pi, math.Pi}, {2 * math.Pi, 0}, {-2 * math.Pi, 0},
		{math.Nextafter(-math.Pi, 0), math.Nextafter(-math.Pi, 0)}, {3 * math.Pi, math.Pi}, {-3 * math.Pi, math.Pi},
	} {
		// A multiple of pi is rounded, by half a spacing of its own.
		if got := frame.WrapAngle(c.phi); math.Abs(got-c.want) > epsilon*math.Max(0, math.Abs(c.phi)-math.Pi) {
			t.Errorf("WrapAngle(%.17g) = %.17g, want %.17g", c.phi, got, c.want)
		}
	}
}

// TestWrapAngleLaws tries that the angle lies in (-pi, pi], that wrapping it
// again changes nothing, and that it differs by whole turns. The turns are of
// 2 pi as rounded, 2.4e-16 off each.
func TestWrapAngleLaws(t *testing.T) {
	rng := random(t, 204)
	for range 5000 {
		phi := math.Ldexp(2*rng.Float64()-1, rng.IntN(24))
		w := frame.WrapAngle(phi)
		if w <= -math.Pi || w > math.Pi || frame.WrapAngle(w) != w {
			t.Fatalf("WrapAngle(%.17g) = %.17g, and then %.17g", phi, w, frame.WrapAngle(w))
		}
		turns := (phi - w) / (2 * math.Pi)
		if math.Abs(turns-math.Round(turns)) > 4*epsilon*(1+math.Abs(turns)) {
			t.Fatalf("WrapAngle(%.17g) = %.17g, %.17g turns off", phi, w, turns)
		}
	}
}

// TestUnwind tries that the angle is congruent and the nearest: half a turn
// away at most.
func TestUnwind(t *testing.T) {
	rng := random(t, 205)
	for range 5000 {
		phi, near := 40*rng.Float64()-20, 400*rng.Float64()-200
		got := frame.Unwind(phi, near)
		turns := (got - phi) / (2 * math.Pi)
		if math.Abs(got-near) > math.Pi+epsilon*200 || math.Abs(turns-math.Round(turns)) > epsilon*200 {
			t.Fatalf("Unwind(%g, %g) = %g", phi, near, got)
		}
	}
}

// TestUnwindFollows goes round and round: the angle follows without a jump.
func TestUnwindFollows(t *testing.T) {
	for _, way := range []float64{1, -1} {
		followed := 0.0
		for i := range 1000 {
			actual := way * 0.3 * float64(i)
			p := frame.Polar{R: 7, Phi: actual}.Vec()
			followed = frame.Unwind(frame.PolarOf(p).Phi, followed)
			// Each step rounds anew, from numbers up to 300.
			if math.Abs(followed-actual) > 4*epsilon*300 {
				t.Fatalf("after %g rad the angle is %g", actual, followed)
			}
		}
	}
}
