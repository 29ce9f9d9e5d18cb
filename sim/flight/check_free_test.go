package flight_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/flight"
	"offplumb/sim/frame"
	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// epsilon is the distance from 1 to the next float64.
const epsilon = 0x1p-52

// random gives a generator with a fixed seed, which a failure prints.
func random(t testing.TB, stream uint64) *rand.Rand {
	t.Helper()
	const seed = 0x70facade
	t.Cleanup(func() {
		if t.Failed() {
			t.Logf("random numbers of PCG(%#x, %d)", seed, stream)
		}
	})
	return rand.New(rand.NewPCG(seed, stream))
}

// between gives a number from lo to hi.
func between(rng *rand.Rand, lo, hi float64) float64 { return lo + (hi-lo)*rng.Float64() }

// TestThrowCaughtByThrower is published check A3, a university problem set on
// rotating frames (author not named; statement seen, answer derived): on a
// platform 60 m across that turns once a minute, a ball crosses along the
// diameter at 2.000 m/s in the inertial frame, and its thrower has come round
// to the other end when it gets there. Seen by the thrower it starts with
// (-2, -pi) m/s, 3.724 m/s, and comes back to where it was thrown.
func TestThrowCaughtByThrower(t *testing.T) {
	const r, half = 30.0, 30.0 // m, s
	spin := 2 * math.Pi / 60
	in := ring(40, spin)
	in.Releases = []model.Release{{Name: "throw", At: model.Station{HasRadius: true, Radius: r},
		Start: model.Start{Kind: model.Velocity, VSpinward: -math.Pi, VUp: 2},
		Until: model.Until{Kind: model.UntilDuration, Duration: half}}}
	m, track := one(t, in, flight.Setup{})
	if got := r3.Norm(track.Local.Vel); math.Abs(got-3.724) > 5e-4 {
		t.Errorf("thrown at %.6g m/s, want 3.724", got)
	}
	if got := r3.Norm(track.First.Vel); math.Abs(got-2) > 8*epsilon {
		t.Errorf("inertial speed %.16g m/s, want 2", got)
	}
	if track.Outcome != flight.TimeUp || track.End != half {
		t.Fatalf("ends by %v after %g s", track.Outcome, track.End)
	}
	a := m.Motion.At(half)
	// Roundings of a position of 30 m that passed through two frames.
	if back := a.ToHabitat(track.Last); r3.Norm(r3.Sub(back.Pos, track.Local.Pos)) > 32*epsilon*r {
		t.Errorf("comes back to %v, thrown from %v", back.Pos, track.Local.Pos)
	}
	if mid := track.At(half / 2); r3.Norm(mid.Pos) > 8*epsilon*r {
		t.Errorf("passes %v half way, want the axis", mid.Pos)
	}
}

// TestPuckOnTurntable is published check A2: Taylor, Classical Mechanics,
// problems 9.20 and 9.24 (seen), a puck without friction on a turntable of
// Omega = 1, let go at x = 1; numbers recomputed from eq. 9.72, to half their
// last digit.
func TestPuckOnTurntable(t *testing.T) {
	for _, c := range []struct{ vx, vy, x1, y1, x2, y2 float64 }{
		{0, 1, 2.223244, 0.239134, 3.221043, -2.573885},
		{0, 0, 1.381773, -0.301169, 1.402448, -1.741591},
		{0, -1, 0.540302, -0.841471, -0.416147, -0.909297},
		{-0.5, -0.5, 0.690887, -0.150584, 0.909297, -0.416147},
	} {
		in := ring(6, 1)
		in.Releases = []model.Release{{Name: "puck", At: model.Station{HasRadius: true, Radius: 1},
			Start: model.Start{Kind: model.Velocity, VSpinward: c.vy, VUp: -c.vx},
			Until: model.Until{Kind: model.UntilDuration, Duration: 2}}}
		m, track := one(t, in, flight.Setup{})
		for i, want := range []r3.Vec{{X: c.x1, Y: c.y1}, {X: c.x2, Y: c.y2}} {
			time := float64(i + 1)
			a := m.Motion.At(time)
			got := a.In(track.At(time).Pos)
			if math.Abs(got.X-want.X) > 5e-7 || math.Abs(got.Y-want.Y) > 5e-7 || got.Z != 0 {
				t.Errorf("v0 = (%g, %g): after %g s at %.7f, want %.6f", c.vx, c.vy, time, got, want)
			}
		}
	}
}

// TestDropDrawsInvolute tries that the path of a drop in the habitat frame is
// the involute of the circle through the release: a thread unwound from it,
// whose free length is the arc that it has left, omega t r0.
func TestDropDrawsInvolute(t *testing.T) {
	const r, spin, height = 20.0, 0.5, 3.0
	m, track := one(t, dropFrom(r, spin, height, 0), flight.Setup{})
	r0 := r - height
	for k := 1.0; k <= 8; k++ {
		time := track.End * k / 8
		a := m.Motion.At(time)
		got := a.In(track.At(time).Pos)
		tangent := frame.Polar{R: r0, Phi: -spin * time}.Vec()
		thread := r3.Sub(got, tangent)
		if length := r3.Norm(thread); math.Abs(length-spin*time*r0) > 32*epsilon*r {
			t.Errorf("after %g s the thread is %.17g m long, the arc %.17g", time, length, spin*time*r0)
		}
		if side := r3.Dot(thread, tangent) / r0; math.Abs(side) > 32*epsilon*r {
			t.Errorf("after %g s the thread leaves the circle's tangent by %g m", time, side)
		}
	}
}

// thrown adds a release at random to a ring: anywhere within 2 m of the axis
// and 1 m of the floor, with a velocity up to the floor's.
func thrown(rng *rand.Rand, r, spin float64) model.Model {
	in := ring(r, spin)
	v := spin * r
	in.Releases = []model.Release{{Name: "throw",
		At: model.Station{HasRadius: true, Radius: between(rng, 2, r-1), Axial: between(rng, -5, 5),
			Spinward: model.Arc{Value: between(rng, -3, 3), IsAngle: true}},
		Start: model.Start{Kind: model.Velocity, VSpinward: between(rng, -v, v), VAxial: between(rng, -v, v), VUp: between(rng, -v, v)},
		Until: model.Until{Kind: model.UntilLanding}}}
	return in
}

// TestFreeFlightInvariants tries what free flight keeps (Goldstein, Classical
// Mechanics; from memory), from the dense output: inertial momentum, angular
// momentum and, seen in the habitat, the Jacobi integral
// v'^2/2 - omega^2 r^2/2. All are straight lines but for roundings.
func TestFreeFlightInvariants(t *testing.T) {
	rng := random(t, 1)
	for range 60 {
		r, spin := between(rng, 6, 300), between(rng, 0.1, 1)
		if rng.IntN(2) == 0 {
			spin = -spin
		}
		m, track := one(t, thrown(rng, r, spin), flight.Setup{})
		moment, jacobi := r3.Cross(track.First.Pos, track.First.Vel), jacobiOf(m, track, 0, nothing)
		far := r3.Norm(track.Last.Pos) + r3.Norm(track.First.Pos)
		fast := r3.Norm(track.First.Vel) + math.Abs(spin)*far
		for k := 0.0; k <= 16; k++ {
			at := track.End * k / 16
			s := track.At(at)
			if s.Vel != track.First.Vel {
				t.Fatalf("after %g s of %g velocity %v, at the start %v", at, track.End, s.Vel, track.First.Vel)
			}
			if off := r3.Norm(r3.Sub(r3.Cross(s.Pos, s.Vel), moment)); off > 8*epsilon*far*fast {
				t.Fatalf("after %g s angular momentum is %g m^2/s off", at, off)
			}
			if off := math.Abs(jacobiOf(m, track, at, nothing) - jacobi); off > 32*epsilon*fast*fast {
				t.Fatalf("after %g s the Jacobi integral is %g m^2/s^2 off, of %g", at, off, jacobi)
			}
		}
	}
}

// nothing is the potential of no field.
func nothing(r3.Vec) float64 { return 0 }

// jacobiOf gives the Jacobi integral in a potential (m^2/s^2) that turns with
// the habitat.
func jacobiOf(m *model.Model, track *flight.Track, at float64, potential func(r3.Vec) float64) float64 {
	a := m.Motion.At(track.Begin + at)
	s := a.ToHabitat(track.At(at))
	r := math.Hypot(s.Pos.X, s.Pos.Y)
	return r3.Norm2(s.Vel)/2 - m.Habitat.Spin*m.Habitat.Spin*r*r/2 + potential(s.Pos)
}

// trough is a field that turns with the habitat: it pulls toward the habitat's
// middle, with a strength of its own along each axis.
type trough struct {
	motion frame.Motion
	pull   [3]float64 // 1/s^2
}

// Accel implements [flight.Field].
func (f *trough) Accel(t float64, s frame.State) r3.Vec {
	a := f.motion.At(t)
	p := a.In(s.Pos)
	return a.Out(r3.Vec{X: -f.pull[0] * p.X, Y: -f.pull[1] * p.Y, Z: -f.pull[2] * p.Z})
}

func (f *trough) potential(p r3.Vec) float64 {
	return (f.pull[0]*p.X*p.X + f.pull[1]*p.Y*p.Y + f.pull[2]*p.Z*p.Z) / 2
}

// TestForcedFlightInvariants tries what is kept where the steps have work to
// do: in a potential that turns with the habitat the Jacobi integral, though
// energy and angular momentum are not; in one that is the same all round the
// axis the angular momentum about it as well.
func TestForcedFlightInvariants(t *testing.T) {
	rng := random(t, 2)
	for i := range 40 {
		r, spin := between(rng, 6, 60), between(rng, 0.2, 1)
		in := thrown(rng, r, spin)
		in.Releases[0].Time = between(rng, 0, 100)
		in.Solver.MaxTime = 20 // or until it lands
		f := &trough{motion: frame.Steady{Spin: spin}, pull: [3]float64{between(rng, 0, 2), between(rng, 0, 2), between(rng, 0, 2)}}
		round := i%2 == 0
		if round {
			f.pull[1] = f.pull[0]
		}
		m, track := one(t, in, flight.Setup{Fields: []flight.Field{f}})
		jacobi, moment := jacobiOf(m, track, 0, f.potential), axialMoment(track.First)
		fast := r3.Norm(track.First.Vel) + (2+spin)*r
		// Each step may err by the solver's relative tolerance of the speed.
		tol := float64(track.Work.Steps) * in.Solver.RelTol * fast
		for k := 0.0; k <= 64; k++ {
			at := track.End * k / 64
			if off := math.Abs(jacobiOf(m, track, at, f.potential) - jacobi); off > tol*fast {
				t.Fatalf("case %d: after %g s of %g the Jacobi integral is %g m^2/s^2 off, of %g; want %g", i, at, track.End, off, jacobi, tol*fast)
			}
			if off := math.Abs(axialMoment(track.At(at)) - moment); round && off > tol*r {
				t.Fatalf("case %d: after %g s angular momentum about the axis is %g m^2/s off; want %g", i, at, off, tol*r)
			}
		}
	}
}

// TestDenseOutputJoins tries that the dense output of a track has no jump
// where two steps meet, and holds their ends.
func TestDenseOutputJoins(t *testing.T) {
	rng := random(t, 3)
	for range 20 {
		in := thrown(rng, 20, 0.6)
		in.Solver.MaxTime = 20 // or until it lands
		f := &trough{motion: frame.Steady{Spin: 0.6}, pull: [3]float64{0.5, 1.5, 1}}
		_, track := one(t, in, flight.Setup{Fields: []flight.Field{f}})
		knots := track.Knots()
		if len(knots) < 5 || track.At(0) != track.First || track.At(track.End) != track.Last {
			t.Fatalf("%d knots from %+v to %+v", len(knots), track.First, track.Last)
		}
		for _, at := range knots[1 : len(knots)-1] {
			before, after := track.At(at), track.At(math.Nextafter(at, math.Inf(1)))
			if gap := r3.Norm(r3.Sub(after.Pos, before.Pos)); gap > 32*epsilon*(20+at*r3.Norm(track.First.Vel)) {
				t.Fatalf("the place jumps by %g m after %g s", gap, at)
			}
			if gap := r3.Norm(r3.Sub(after.Vel, before.Vel)); gap > 32*epsilon*100 {
				t.Fatalf("the velocity jumps by %g m/s after %g s", gap, at)
			}
		}
	}
}

func axialMoment(s frame.State) float64 { return r3.Cross(s.Pos, s.Vel).Z }

// TestSmallHeightLimit is published check A5. The deflection of a drop from
// 1.5 m, to the last digit of its closed form, and its limit for small heights,
// (2 sqrt 2/3) h sqrt(h/R), which it exceeds by 21/20 h/R and terms of higher
// order: inv(theta) = t^3/3 - t^5/5 + ..., t^2 = 2x + 3x^2 + ..., x = h/R.
func TestSmallHeightLimit(t *testing.T) {
	for _, c := range []struct{ r, exact float64 }{{895, 0.05800}, {224, 0.11655}, {56, 0.23815}, {9, 0.69875}} {
		m, track := one(t, dropFrom(c.r, 0.3, 1.5, 0), flight.Setup{})
		if got := -measure.Land(m, track).Deflection; math.Abs(got-c.exact) > 5e-6 {
			t.Errorf("R = %g m: %.7g m, want %g", c.r, got, c.exact)
		}
	}
	for _, x := range []float64{1e-2, 3e-3, 1e-3, 3e-4} {
		const r = 200.0
		m, track := one(t, dropFrom(r, 0.3, x*r, 0), flight.Setup{})
		got := -measure.Land(m, track).Deflection
		over := got/(2*math.Sqrt2/3*x*r*math.Sqrt(x)) - 1
		if math.Abs(over-1.05*x) > 2*x*x {
			t.Errorf("h/R = %g: %.3g above the limit, want %.3g", x, over, 1.05*x)
		}
	}
}
