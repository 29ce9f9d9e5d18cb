package frame_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/integrate/quad"
	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/frame"
)

// TestAngleIsIntegralOfRate holds the closed form of the angle against the
// quadrature of the rate, a polynomial of the third degree at most between the
// joints: four nodes are exact.
func TestAngleIsIntegralOfRate(t *testing.T) {
	r := changing()
	joints := []float64{-3, 0, 1, 5, 6, 11, 20}
	sum := 0.0
	from, _, _ := r.At(joints[0])
	for i := 1; i < len(joints); i++ {
		for _, share := range []float64{0.3, 1} {
			to := joints[i-1] + share*(joints[i]-joints[i-1])
			part := quad.Fixed(func(t float64) float64 { _, w, _ := r.At(t); return w }, joints[i-1], to, 4, nil, 0)
			angle, _, _ := r.At(to)
			if off := math.Abs(angle - from - sum - part); off > 64*epsilon*(1+math.Abs(angle)) {
				t.Errorf("%g s: angle %g is %.3g off the integral", to, angle, off)
			}
			if share == 1 {
				sum += part
			}
		}
	}
}

// TestRatesAtJoints tries rate and acceleration where changes begin, peak and
// end: the middle of a smooth one has 3/2 of the mean acceleration.
func TestRatesAtJoints(t *testing.T) {
	r := changing()
	for _, c := range []struct{ at, rate, accel float64 }{
		{-1, 0.2, 0}, {1, 0.2, 0}, {3, 0.65, 0.9 / 4 * 1.5}, {5, 1.1, 0}, {5.5, 1.1, 0},
		{6, 1.1, -1.8 / 5}, {8.5, 0.2, -1.8 / 5}, {11, -0.7, 0}, {50, -0.7, 0},
	} {
		_, rate, accel := r.At(c.at)
		if math.Abs(rate-c.rate) > 8*epsilon || math.Abs(accel-c.accel) > 8*epsilon {
			t.Errorf("at %g s: %g rad/s, %g rad/s^2; want %g, %g", c.at, rate, accel, c.rate, c.accel)
		}
	}
	if r.Settled() != 11 {
		t.Errorf("settled at %g s", r.Settled())
	}
	// The middle of a change is within the stretch, not at its ends.
	if _, accel := r.Peak(2.9, 3.3); math.Abs(accel-0.3375) > 8*epsilon {
		t.Errorf("peak %g rad/s^2", accel)
	}
}

// TestNoChangeIsSteady tries that changes to the rate that there is, and a
// coning of no angle, leave the steady spin itself.
func TestNoChangeIsSteady(t *testing.T) {
	same := []frame.Change{{Start: 2, Over: 3, To: 0.7}, {Start: 9, Over: 0.1, To: 0.7, Linear: true}}
	if m := frame.NewMotion(frame.NewRates(0.7, same), frame.Coning{Period: 5, Phase: 2}); m != (frame.Steady{Spin: 0.7}) {
		t.Errorf("%#v", m)
	}
	// And one that is not nothing begins as the steady spin does.
	m := frame.NewMotion(frame.NewRates(0.7, []frame.Change{{Start: 30, Over: 1, To: 0}}), frame.Coning{})
	for _, at := range []float64{0, 1, 17, 29.9} {
		if a, b := m.At(at), (frame.Steady{Spin: 0.7}).At(at); a != b {
			t.Errorf("%g s: %+v, steady %+v", at, a, b)
		}
	}
}

// TestConingOfNoAngle tries that the spin's meaning does not hang on the
// precession: as the half angle goes to nothing the motion becomes the spin.
func TestConingOfNoAngle(t *testing.T) {
	const tiny = 1e-9
	m := frame.NewMotion(frame.NewRates(0.7, nil), frame.Coning{HalfAngle: tiny, Period: 3, Phase: 1})
	for _, at := range []float64{0, 2, 40} {
		a, b := m.At(at), (frame.Steady{Spin: 0.7}).At(at)
		// An axis leans by up to twice the angle, and omega by p times that.
		if off(a.X, b.X) > 4*tiny || off(a.Z, b.Z) > 4*tiny || off(a.Omega, b.Omega) > 10*tiny {
			t.Errorf("%g s: %+v, steady %+v", at, a, b)
		}
	}
}

// TestConingAsFreeTop holds attitude and angular velocity against what no
// kinematics knows: an axially symmetric body without torque, whose moments of
// inertia along and across its axis are as p cos(half angle) to the spin (Landau
// & Lifshitz, Mechanics, section 33; from memory), keeps its angular momentum,
// which points along the fixed direction, and its energy.
func TestConingAsFreeTop(t *testing.T) {
	for _, c := range []struct{ spin, half, along float64 }{{0.6, 0.2, 1.9}, {-0.5, 0.05, 1.3}, {1, 1.1, 0.4}} {
		period := 2 * math.Pi * math.Cos(c.half) / (c.along * c.spin) // of moments along : 1
		m := frame.NewMotion(frame.NewRates(c.spin, nil), frame.Coning{HalfAngle: c.half, Period: period, Phase: 0.4})
		momentum := func(at float64) (r3.Vec, float64) {
			a := m.At(at)
			w := a.In(a.Omega)
			l := r3.Vec{X: w.X, Y: w.Y, Z: c.along * w.Z}
			return a.Out(l), r3.Dot(w, l)
		}
		l0, e0 := momentum(0)
		for _, at := range []float64{1, 7, 33, 400} {
			l, e := momentum(at)
			if off(l, l0) > 1e-12 || math.Abs(e-e0) > 1e-12 {
				t.Errorf("%+v, %g s: angular momentum %v and energy %g, at first %v and %g", c, at, l, e, l0, e0)
			}
		}
		// The fixed direction leans toward the phase, 0.4 rad from spinward zero.
		lean := r3.Unit(l0)
		if c.spin < 0 {
			lean = r3.Scale(-1, lean)
		}
		sin, cos := math.Sincos(c.half)
		if off(lean, r3.Vec{X: sin * math.Cos(0.4), Y: sin * math.Sin(0.4), Z: cos}) > 1e-12 {
			t.Errorf("%+v: the fixed direction is %v", c, lean)
		}
	}
}

// TestMotionInMirror tries that a mirror along the axis, which turns spinward
// into antispinward, mirrors the motion: spin, precession and phase change
// their signs.
func TestMotionInMirror(t *testing.T) {
	m := frame.NewMotion(changing(), frame.Coning{HalfAngle: 0.3, Period: 7, Phase: 4})
	n := frame.NewMotion(frame.NewRates(-0.2, []frame.Change{{Start: 1, Over: 4, To: -1.1}, {Start: 6, Over: 5, To: 0.7, Linear: true}}),
		frame.Coning{HalfAngle: 0.3, Period: -7, Phase: -4})
	mirror := func(v r3.Vec) r3.Vec { return r3.Vec{X: v.X, Y: -v.Y, Z: v.Z} }
	for _, at := range []float64{0, 2, 6, 8, 19} {
		a, b := m.At(at), n.At(at)
		p := r3.Vec{X: 3, Y: 2, Z: 1}
		// Omega is the axis of a turn, whose sense the mirror changes.
		if off(mirror(a.Out(p)), b.Out(mirror(p))) > 64*epsilon || off(r3.Scale(-1, mirror(a.Omega)), b.Omega) > 64*epsilon {
			t.Errorf("%g s: %+v, in the mirror %+v", at, a, b)
		}
	}
}

// TestStretches tries what is told of how a motion goes on.
func TestStretches(t *testing.T) {
	spin := frame.NewMotion(changing(), frame.Coning{})
	both := frame.NewMotion(changing(), frame.Coning{HalfAngle: 0.3, Period: 7})
	inf := math.Inf(1)
	for _, c := range []struct {
		at        float64
		end, pace float64
		steady    bool
	}{{0, 1, inf, false}, {1, 5, 0.5, false}, {5, 6, inf, false}, {6, 11, 0.625, false}, {11, inf, inf, true}, {99, inf, inf, true}} {
		s := spin.Stretch(c.at)
		if s.End != c.end || s.Pace != c.pace || s.Steady() != c.steady || s.Period != 0 {
			t.Errorf("%g s: %+v", c.at, s)
		}
		s = both.Stretch(c.at)
		if s.End != c.end || s.Pace > c.pace || s.Steady() {
			t.Errorf("coning, %g s: %+v", c.at, s)
		}
	}
	// The loads come back after a round of the fixed direction in the habitat.
	s := both.Stretch(20)
	a, b := both.At(20), both.At(20+s.Period)
	if off(a.In(a.Omega), b.In(b.Omega)) > 1e-13 || off(a.In(a.Alpha), b.In(b.Alpha)) > 1e-13 {
		t.Errorf("after %g s omega is %v, was %v", s.Period, b.In(b.Omega), a.In(a.Omega))
	}
	half := both.At(20 + s.Period/2)
	if off(a.In(a.Omega), half.In(half.Omega)) < 0.1 {
		t.Error("and after half of it too")
	}
	if s := (frame.Steady{Spin: 1}).Stretch(3); !s.Steady() {
		t.Errorf("%+v", s)
	}
}
