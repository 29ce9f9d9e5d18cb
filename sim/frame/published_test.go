package frame_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/frame"
)

// standardGravity is the conventional g, m/s^2.
const standardGravity = 9.80665

// rpm is one turn a minute, rad/s.
const rpm = 2 * math.Pi / 60

// TestPuckOnTurntable is the puck of Taylor, Classical Mechanics, problems
// 9.20 and 9.24: on a turntable of 1 rad/s, from x = 1 m with the velocity
// given relative to it. The table holds to its six decimals.
func TestPuckOnTurntable(t *testing.T) {
	const half = 0.5e-6
	table := frame.Steady{Spin: 1}
	for _, c := range []struct {
		vx, vy   float64
		one, two [2]float64 // m, after 1 s and 2 s
	}{
		{0, 1, [2]float64{2.223244, 0.239134}, [2]float64{3.221043, -2.573885}},
		{0, 0, [2]float64{1.381773, -0.301169}, [2]float64{1.402448, -1.741591}},
		{0, -1, [2]float64{0.540302, -0.841471}, [2]float64{-0.416147, -0.909297}},
		{-0.5, -0.5, [2]float64{0.690887, -0.150584}, [2]float64{0.909297, -0.416147}},
	} {
		start := table.At(0)
		from := start.ToInertial(frame.State{Pos: r3.Vec{X: 1}, Vel: r3.Vec{X: c.vx, Y: c.vy}})
		line := straight{from.Pos, from.Vel}
		for i, want := range [][2]float64{c.one, c.two} {
			got := line.seen(table, float64(i+1))
			if math.Abs(got.X-want[0]) > half || math.Abs(got.Y-want[1]) > half || got.Z != 0 {
				t.Errorf("puck with (%g, %g) m/s is at %v after %d s, want %v", c.vx, c.vy, got, i+1, want)
			}
		}
	}
}

// TestThrowCaughtByThrower is a throw along a diameter of a platform 60 m
// across at 1 rpm, caught half a turn later. By arithmetic: 2 m/s outside,
// (-2, -pi) m/s for the thrower, sqrt(4 + pi^2) = 3.724 m/s.
func TestThrowCaughtByThrower(t *testing.T) {
	platform := frame.Steady{Spin: rpm}
	start, caught := platform.At(0), platform.At(30)
	thrown := frame.State{Pos: r3.Vec{X: 30}, Vel: r3.Vec{X: -2}}
	s := start.ToHabitat(thrown)
	if off(s.Vel, r3.Vec{X: -2, Y: -math.Pi}) > spreads*epsilon*4 || math.Abs(r3.Norm(s.Vel)-3.724) > 0.5e-3 {
		t.Errorf("thrown with %v, %g m/s", s.Vel, r3.Norm(s.Vel))
	}
	end := straight{thrown.Pos, thrown.Vel}.at(30)
	if got := caught.ToHabitat(end).Pos; off(got, r3.Vec{X: 30}) > spreads*epsilon*30 {
		t.Errorf("after half a turn it is at %v", got)
	}
}

// gravity gives the apparent gravity (m/s^2) at rest at r (m) from the axis.
func gravity(spin, r float64) float64 {
	a := frame.Steady{Spin: spin}.At(0)
	p := a.Apparent(frame.State{Pos: r3.Vec{X: r}})
	return p.Sum().X
}

// spinFor gives the spin (rad/s) at which that is g (m/s^2): it grows with the
// square of the spin.
func spinFor(g, r float64) float64 { return math.Sqrt(g / gravity(1, r)) }

// TestSpinOfHabitat holds the spins that give a gravity against printed ones,
// to half of their last digit.
func TestSpinOfHabitat(t *testing.T) {
	for _, c := range []struct {
		g, r       float64 // m/s^2, m
		want, half float64 // rad/s
		source     string
	}{
		{10, 40, 0.5, 0.05, "Taylor, Classical Mechanics, problem 9.2"},
		{3, 60, 2.14 * rpm, 0.005 * rpm, "Serway, Physics for Scientists and Engineers, wheel 120 m across"},
		{9.8, 100, 2.99 * rpm, 0.005 * rpm, "OpenStax University Physics, 200 m across (answer from memory)"},
	} {
		if got := spinFor(c.g, c.r); math.Abs(got-c.want) > c.half {
			t.Errorf("%s: %g rad/s gives %g m/s^2 at %g m, printed %g +- %g", c.source, got, c.g, c.r, c.want, c.half)
		}
		if got := gravity(spinFor(c.g, c.r), c.r); math.Abs(got-c.g) > 8*epsilon*c.g {
			t.Errorf("%s: at that spin gravity is %g, want %g", c.source, got, c.g)
		}
	}
}

// TestHeadFeelsLess is Taylor, Classical Mechanics, problem 9.2: at 0.5 rad/s
// feet at 40 m feel 10 m/s^2, a head at 38 m 5 % less, both exactly.
func TestHeadFeelsLess(t *testing.T) {
	if feet, head := gravity(0.5, 40), gravity(0.5, 38); feet != 10 || head != 9.5 {
		t.Errorf("feet feel %g, the head %g m/s^2", feet, head)
	}
}

// TestRimSpeed is OpenStax University Physics, 200 m across at 9.80 m/s^2: the
// rim moves with 31.3 m/s.
func TestRimSpeed(t *testing.T) {
	a := frame.Steady{Spin: spinFor(9.8, 100)}.At(0)
	if v := r3.Norm(a.ToInertial(frame.State{Pos: r3.Vec{X: 100}}).Vel); math.Abs(v-31.3) > 0.05 {
		t.Errorf("the rim moves with %g m/s", v)
	}
}

// TestRadiusForOneG holds radii against those in the abstract of Globus &
// Hall, Space Settlement Population Rotation Tolerance (2017), rounded to 1 m.
func TestRadiusForOneG(t *testing.T) {
	for _, c := range []struct{ turns, want float64 }{{1, 894}, {2, 224}, {4, 56}, {6, 25}, {10, 9}} {
		r := standardGravity / gravity(c.turns*rpm, 1)
		if math.Abs(r-c.want) > 0.5 {
			t.Errorf("%g rpm: 1 g at %g m, printed %g", c.turns, r, c.want)
		}
	}
}
