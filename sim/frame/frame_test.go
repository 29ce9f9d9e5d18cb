package frame_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/frame"
)

// spreads bounds the rounding of a state that is carried to the other frame
// and back, in epsilons of its size: two times three products and sums for
// each component, and the axes themselves are orthonormal to a few only.
const spreads = 32

// size is what the roundings of a state are relative to: its position (m), and
// its velocity with that of the turning frame there (m/s).
func size(a *frame.Attitude, s frame.State) (pos, vel float64) {
	return r3.Norm(s.Pos), r3.Norm(s.Vel) + r3.Norm(a.Omega)*r3.Norm(s.Pos)
}

func same(t *testing.T, at float64, a *frame.Attitude, got, want frame.State) {
	t.Helper()
	pos, vel := size(a, want)
	if off(got.Pos, want.Pos) > spreads*epsilon*pos || off(got.Vel, want.Vel) > spreads*epsilon*vel {
		t.Fatalf("t = %g: %+v comes back as %+v", at, want, got)
	}
}

// TestRoundTrip tries ToInertial(ToHabitat(s)) = s and the other way round.
func TestRoundTrip(t *testing.T) {
	eachMotion(t, 500, func(t *testing.T, rng *rand.Rand, m frame.Motion, at float64) {
		a := m.At(at)
		s := frame.State{Pos: vec(rng, 900), Vel: vec(rng, 30)}
		same(t, at, &a, a.ToInertial(a.ToHabitat(s)), s)
		same(t, at, &a, a.ToHabitat(a.ToInertial(s)), s)
		v := vec(rng, 5)
		if off(a.In(a.Out(v)), v) > spreads*epsilon*r3.Norm(v) || off(a.Out(a.In(v)), v) > spreads*epsilon*r3.Norm(v) {
			t.Fatalf("t = %g: %v comes back as %v and %v", at, v, a.In(a.Out(v)), a.Out(a.In(v)))
		}
	})
}

// TestLengthsKept tries that a rotation keeps lengths and angles.
func TestLengthsKept(t *testing.T) {
	eachMotion(t, 100, func(t *testing.T, rng *rand.Rand, m frame.Motion, at float64) {
		a := m.At(at)
		v, w := vec(rng, 5), vec(rng, 5)
		if got, want := r3.Dot(a.In(v), a.In(w)), r3.Dot(v, w); math.Abs(got-want) > spreads*epsilon*r3.Norm(v)*r3.Norm(w) {
			t.Fatalf("t = %g: %v . %v turns from %g to %g", at, v, w, want, got)
		}
	})
}

// TestRestsInHabitat tries that what rests in the habitat moves with omega x r
// outside, and what rests outside moves with -omega x r in the habitat.
func TestRestsInHabitat(t *testing.T) {
	eachMotion(t, 100, func(t *testing.T, rng *rand.Rand, m frame.Motion, at float64) {
		a := m.At(at)
		p := vec(rng, 50)
		tol := spreads * epsilon * r3.Norm(p) * (1 + r3.Norm(a.Omega))
		if s := a.ToInertial(frame.State{Pos: p}); off(s.Vel, r3.Cross(a.Omega, s.Pos)) > tol {
			t.Fatalf("t = %g: %v, at rest in the habitat, moves with %v", at, p, s.Vel)
		}
		if s := a.ToHabitat(frame.State{Pos: p}); off(s.Vel, r3.Scale(-1, r3.Cross(a.In(a.Omega), s.Pos))) > tol {
			t.Fatalf("t = %g: %v, at rest outside, moves with %v in the habitat", at, p, s.Vel)
		}
	})
}

// straight is a body under no force.
type straight struct{ start, vel r3.Vec }

func (l straight) at(t float64) frame.State {
	return frame.State{Pos: r3.Add(l.start, r3.Scale(t, l.vel)), Vel: l.vel}
}

// seen gives its place in the habitat.
func (l straight) seen(m frame.Motion, t float64) r3.Vec {
	a := m.At(t)
	return a.In(l.at(t).Pos)
}

// bendStep is the step (s) of the second differences.
const bendStep = 5e-3

// bend gives the second derivative of the place by five points
// (-1, 16, -30, 16, -1)/12h^2, and a bound on its error: h^4/90 times the sixth
// derivative, and 64/12 roundings of the place over h^2, of which the places
// have four each. With |d^k axis/dt^k| <= rate^k the sixth derivative is at
// most rate^6 r + 6 rate^5 v.
func (l straight) bend(m frame.Motion, t float64) (second r3.Vec, tol float64) {
	for k, c := range []float64{-1, 16, -30, 16, -1} {
		second = r3.Add(second, r3.Scale(c/(12*bendStep*bendStep), l.seen(m, t+float64(k-2)*bendStep)))
	}
	r, v := r3.Norm(l.at(t).Pos)+r3.Norm(l.vel), r3.Norm(l.vel)
	tol = math.Pow(bendStep, 4)/90*(math.Pow(rate, 6)*r+6*math.Pow(rate, 5)*v) + 4*64.0/12*epsilon*r/(bendStep*bendStep)
	return second, tol
}

// TestApparentIsAcceleration tries that for a body under no force the
// acceleration seen in the habitat equals Apparent.Sum.
func TestApparentIsAcceleration(t *testing.T) {
	eachMotion(t, 100, func(t *testing.T, rng *rand.Rand, m frame.Motion, at float64) {
		l := straight{vec(rng, 20), vec(rng, 5)}
		a := m.At(at)
		got := a.Apparent(a.ToHabitat(l.at(at))).Sum()
		if want, tol := l.bend(m, at); off(got, want) > tol {
			t.Fatalf("t = %g, %+v: apparent %v, seen %v, %.3g apart, tolerance %.3g", at, l, got, want, off(got, want), tol)
		}
	})
}

// TestApparentParts tries each part by itself, on states that have no other.
func TestApparentParts(t *testing.T) {
	eachMotion(t, 100, func(t *testing.T, rng *rand.Rand, m frame.Motion, at float64) {
		a := m.At(at)
		w := a.In(a.Omega)
		s := frame.State{Pos: vec(rng, 20), Vel: vec(rng, 5)}
		rest := a.Apparent(frame.State{Pos: s.Pos})
		moving := a.Apparent(frame.State{Vel: s.Vel})
		all := a.Apparent(s)
		if rest.Coriolis != (r3.Vec{}) || moving.Centrifugal != (r3.Vec{}) || moving.Euler != (r3.Vec{}) {
			t.Fatalf("t = %g: at rest %+v, on the axis %+v", at, rest, moving)
		}
		if off(all.Sum(), r3.Add(rest.Sum(), moving.Sum())) > spreads*epsilon*(r3.Norm(rest.Sum())+r3.Norm(moving.Sum())) {
			t.Fatalf("t = %g: %+v, its parts %+v and %+v", at, all, rest, moving)
		}
		// Coriolis acceleration does no work; the centrifugal one points away
		// from the axis and is omega^2 times the distance from it.
		if math.Abs(r3.Dot(all.Coriolis, s.Vel)) > spreads*epsilon*r3.Norm(w)*r3.Norm2(s.Vel) {
			t.Fatalf("t = %g: Coriolis %v along the velocity %v", at, all.Coriolis, s.Vel)
		}
		arm := s.Pos
		if n := r3.Norm2(w); n > 0 {
			arm = r3.Sub(s.Pos, r3.Scale(r3.Dot(s.Pos, w)/n, w))
		}
		if want := r3.Scale(r3.Norm2(w), arm); off(all.Centrifugal, want) > spreads*epsilon*r3.Norm2(w)*r3.Norm(s.Pos) {
			t.Fatalf("t = %g: centrifugal %v, want %v", at, all.Centrifugal, want)
		}
	})
}
