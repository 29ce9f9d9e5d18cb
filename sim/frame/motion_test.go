package frame_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/diff/fd"
	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/frame"
)

// epsilon is the distance from 1 to the next float64.
const epsilon = 0x1p-52

// rate (1/s) bounds how fast the motions below turn and how fast that changes:
// the k-th time derivative of an axis is at most rate^k. The wobble's axes are
// sums of harmonics: 0.8 + 0.6 rad/s and, with weights of 0.15^n and 0.1^n at
// most, n times 0.7 and 0.9 rad/s more.
const rate = 2.5

// angle is an angle as a function of time, with its first two derivatives.
type angle func(t float64) (a, da, dda float64)

// wobble turns by one angle about z, then by one about the new x, then by one
// about the new z. It keeps to none of the ways in which a steady spin is
// simple: the angular velocity changes in size and in direction, in the
// inertial frame and in the habitat.
type wobble struct{ first, tilt, last angle }

func newWobble() wobble {
	return wobble{
		first: func(t float64) (a, da, dda float64) { return 0.5*t + 0.01*t*t, 0.5 + 0.02*t, 0.02 },
		tilt: func(t float64) (a, da, dda float64) {
			s, c := math.Sincos(0.7 * t)
			return 0.4 + 0.3*s, 0.21 * c, -0.147 * s
		},
		last: func(t float64) (a, da, dda float64) {
			s, c := math.Sincos(0.9 * t)
			return 0.6*t + 0.2*c, 0.6 - 0.18*s, -0.162 * c
		},
	}
}

// At implements [frame.Motion]. Each rotation adds its rate about its axis to
// the angular velocity, and the axes of the second and third are carried along
// by those before: du/dt = omega x u.
func (w wobble) At(t float64) frame.Attitude {
	a, da, dda := w.first(t)
	b, db, ddb := w.tilt(t)
	c, dc, ddc := w.last(t)
	u1 := r3.Vec{Z: 1}
	x, y, z := r3.Vec{X: math.Cos(a), Y: math.Sin(a)}, r3.Vec{X: -math.Sin(a), Y: math.Cos(a)}, u1
	u2 := x
	y, z = turned(y, z, b)
	u3 := z
	x, y = turned(x, y, c)
	one := r3.Scale(da, u1)
	two := r3.Add(one, r3.Scale(db, u2))
	alpha := r3.Scale(dda, u1)
	alpha = r3.Add(alpha, r3.Add(r3.Scale(ddb, u2), r3.Cross(one, r3.Scale(db, u2))))
	alpha = r3.Add(alpha, r3.Add(r3.Scale(ddc, u3), r3.Cross(two, r3.Scale(dc, u3))))
	return frame.Attitude{X: x, Y: y, Z: z, Omega: r3.Add(two, r3.Scale(dc, u3)), Alpha: alpha}
}

// turned rotates two directions by an angle from the first to the second.
func turned(p, q r3.Vec, by float64) (r3.Vec, r3.Vec) {
	s, c := math.Sincos(by)
	return r3.Add(r3.Scale(c, p), r3.Scale(s, q)), r3.Add(r3.Scale(-s, p), r3.Scale(c, q))
}

// Omega implements [frame.Motion].
func (w wobble) Omega(t float64) r3.Vec { return w.At(t).Omega }

// Bounds implements [frame.Motion], by the sums of the parts.
func (w wobble) Bounds(t0, t1 float64) (omega, alpha float64) {
	da := 0.5 + 0.02*math.Max(math.Abs(t0), math.Abs(t1))
	return da + 0.21 + 0.78, 0.02 + 0.147 + 0.162 + da*0.21 + (da+0.21)*0.78
}

// Stretch implements [frame.Motion].
func (w wobble) Stretch(float64) frame.Stretch {
	return frame.Stretch{End: math.Inf(1), Pace: 1 / rate}
}

// motion is a motion with its name.
type motion struct {
	name string
	frame.Motion
}

func motions() []motion {
	return []motion{{"steady", frame.Steady{Spin: 0.7}}, {"steady, negative", frame.Steady{Spin: -1.1}}, {"at rest", frame.Steady{}},
		{"wobble", newWobble()}, {"spin-up and reversal", frame.NewMotion(changing(), frame.Coning{})},
		{"coning", frame.NewMotion(frame.NewRates(-1.1, nil), frame.Coning{HalfAngle: 0.4, Period: 9, Phase: 1})},
		{"coning the other way", frame.NewMotion(frame.NewRates(0.8, nil), frame.Coning{HalfAngle: 1.2, Period: -11, Phase: -2})},
		{"changing and coning", frame.NewMotion(changing(), frame.Coning{HalfAngle: 0.3, Period: 7, Phase: 4})}}
}

// changing is a spin that grows smoothly, then falls steadily through zero,
// slowly enough for the bounds of rate.
func changing() frame.Rates {
	return frame.NewRates(0.2, []frame.Change{{Start: 1, Over: 4, To: 1.1}, {Start: 6, Over: 5, To: -0.7, Linear: true}})
}

// random gives a generator with a fixed seed, which a failure prints.
func random(t testing.TB, stream uint64) *rand.Rand {
	t.Helper()
	const seed = 0x0ff91a3b
	t.Cleanup(func() {
		if t.Failed() {
			t.Logf("random numbers of PCG(%#x, %d)", seed, stream)
		}
	})
	return rand.New(rand.NewPCG(seed, stream))
}

// vec gives a vector whose components are up to size.
func vec(rng *rand.Rand, size float64) r3.Vec {
	c := func() float64 { return size * (2*rng.Float64() - 1) }
	return r3.Vec{X: c(), Y: c(), Z: c()}
}

func off(a, b r3.Vec) float64 { return r3.Norm(r3.Sub(a, b)) }

// eachMotion runs a test at random times of each motion.
func eachMotion(t *testing.T, times int, test func(t *testing.T, rng *rand.Rand, m frame.Motion, at float64)) {
	for i, m := range motions() {
		t.Run(m.name, func(t *testing.T) {
			rng := random(t, uint64(i))
			for range times {
				test(t, rng, m.Motion, 20*rng.Float64()-5)
			}
		})
	}
}

// TestAxesOrthonormal tries that the axes are unit vectors at right angles and
// right-handed. Each component of the wobble's comes of two rotations, four
// roundings or so each.
func TestAxesOrthonormal(t *testing.T) {
	eachMotion(t, 200, func(t *testing.T, _ *rand.Rand, m frame.Motion, at float64) {
		a := m.At(at)
		if off(r3.Cross(a.X, a.Y), a.Z) > 16*epsilon || off(r3.Cross(a.Y, a.Z), a.X) > 16*epsilon || off(r3.Cross(a.Z, a.X), a.Y) > 16*epsilon {
			t.Fatalf("t = %g: %+v", at, a)
		}
	})
}

// TestOmegaOfMotion tries that Omega(t) is At(t).Omega, and that both bounds
// hold.
func TestOmegaOfMotion(t *testing.T) {
	eachMotion(t, 200, func(t *testing.T, rng *rand.Rand, m frame.Motion, at float64) {
		a := m.At(at)
		if m.Omega(at) != a.Omega {
			t.Fatalf("t = %g: Omega is %v, in the attitude %v", at, m.Omega(at), a.Omega)
		}
		omega, alpha := m.Bounds(at-3*rng.Float64(), at+3*rng.Float64())
		if r3.Norm(a.Omega) > omega*(1+4*epsilon) || r3.Norm(a.Alpha) > alpha*(1+4*epsilon) {
			t.Fatalf("t = %g: omega %g and alpha %g exceed the bounds %g and %g", at, r3.Norm(a.Omega), r3.Norm(a.Alpha), omega, alpha)
		}
	})
}

// diffStep (s) is the step of the central differences; diffTol bounds their
// error for a unit vector: step^2/6 times the third derivative, and the
// rounding of three components, a few epsilon each, over the step.
const (
	diffStep = 1e-5
	diffTol  = diffStep*diffStep/6*rate*rate*rate + 16*epsilon/diffStep
)

func derivative(f func(t float64) r3.Vec, at float64) r3.Vec {
	s := &fd.Settings{Formula: fd.Central, Step: diffStep}
	return r3.Vec{
		X: fd.Derivative(func(t float64) float64 { return f(t).X }, at, s),
		Y: fd.Derivative(func(t float64) float64 { return f(t).Y }, at, s),
		Z: fd.Derivative(func(t float64) float64 { return f(t).Z }, at, s),
	}
}

// TestOmegaTurnsAxes holds the angular velocity against differences of the
// axes, du/dt = omega x u.
func TestOmegaTurnsAxes(t *testing.T) {
	eachMotion(t, 50, func(t *testing.T, _ *rand.Rand, m frame.Motion, at float64) {
		a := m.At(at)
		for _, axis := range []struct {
			name string
			u    r3.Vec
			of   func(t float64) r3.Vec
		}{
			{"X", a.X, func(t float64) r3.Vec { return m.At(t).X }},
			{"Y", a.Y, func(t float64) r3.Vec { return m.At(t).Y }},
			{"Z", a.Z, func(t float64) r3.Vec { return m.At(t).Z }},
		} {
			if got, want := derivative(axis.of, at), r3.Cross(a.Omega, axis.u); off(got, want) > diffTol {
				t.Fatalf("t = %g: d%s/dt is %v, omega x %s is %v", at, axis.name, got, axis.name, want)
			}
		}
	})
}

// TestAlphaIsRateOfOmega holds the angular acceleration against differences
// of the angular velocity, which is rate times a unit vector at most.
func TestAlphaIsRateOfOmega(t *testing.T) {
	eachMotion(t, 50, func(t *testing.T, _ *rand.Rand, m frame.Motion, at float64) {
		a := m.At(at)
		if got := derivative(m.Omega, at); off(got, a.Alpha) > rate*diffTol {
			t.Fatalf("t = %g: domega/dt is %v, alpha %v", at, got, a.Alpha)
		}
	})
}

// TestSteadyStart tries that the steady frame is the inertial one at t = 0, and
// that positive spin carries the floor spinward, from x toward y.
func TestSteadyStart(t *testing.T) {
	for _, spin := range []float64{0.5, -0.5} {
		s := frame.Steady{Spin: spin}
		a := s.At(0)
		want := frame.Attitude{X: r3.Vec{X: 1}, Y: r3.Vec{Y: 1}, Z: r3.Vec{Z: 1}, Omega: r3.Vec{Z: spin}}
		if off(a.X, want.X)+off(a.Y, want.Y)+off(a.Z, want.Z)+off(a.Omega, want.Omega)+r3.Norm(a.Alpha) != 0 {
			t.Errorf("at the start %+v", a)
		}
		quarter := s.At(math.Pi / 2 / math.Abs(spin))
		if off(quarter.X, r3.Vec{Y: math.Copysign(1, spin)}) > 2*epsilon {
			t.Errorf("spin %g: x points along %v after a quarter turn", spin, quarter.X)
		}
	}
}
