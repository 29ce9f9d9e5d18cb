package flight_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/flight"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// moon is the strength of the Moon's gravity, m/s^2.
const moon = 1.62

// TestProjectileInUniformGravity holds a throw in a habitat that does not turn
// to the parabola of the schoolbooks: over a level floor the range of a throw
// at an angle e above it is v^2 sin(2e)/g after 2 v sin(e)/g (Galilei 1638;
// any textbook). The floor is a cylinder so wide that it is flat.
func TestProjectileInUniformGravity(t *testing.T) {
	const speed, elevation, radius = 7.0, 0.6, 1e6
	in := ring(radius, 0)
	in.Ambient = model.Ambient{Strength: moon, Direction: r3.Vec{X: 1}}
	in.Bodies = []model.Body{{Name: "b", Mass: 1}}
	in.Releases = []model.Release{{Name: "throw", Body: "b", At: model.Station{Height: 0},
		Start: model.Start{Kind: model.Thrown, Speed: speed, Heading: math.Pi / 2, Elevation: elevation}, Until: model.Until{Kind: model.UntilLanding}}}
	_, track := one(t, in, flight.Setup{})
	hit := track.Landing()
	if hit == nil {
		t.Fatal("it does not land")
	}
	sin, cos := math.Sincos(elevation)
	// The roundings of places at this radius, over the speed of landing.
	tol := 1e-15 * radius / (speed * sin)
	if want := 2 * speed * sin / moon; math.Abs(hit.Time-want) > 30*tol {
		t.Errorf("it lands after %.15g s, want %.15g", hit.Time, want)
	}
	if want := 2 * speed * speed * sin * cos / moon; math.Abs(hit.State.Pos.Z-want) > 30*tol*speed {
		t.Errorf("it lands %.15g m away, want %.15g", hit.State.Pos.Z, want)
	}
}

// TestFrictionAngleOnBulkhead puts a body on an end bulkhead, where a pull along
// the axis weighs it down and the spin drags it outward: it stays up to the
// radius where omega^2 r = mu g (Coulomb), and not beyond.
func TestFrictionAngleOnBulkhead(t *testing.T) {
	const spin, mu, wide = 0.3, 0.4, 0.02
	edge := mu * moon / (spin * spin)
	for _, c := range []struct {
		at    float64
		stays bool
	}{{edge * (1 - 1e-6), true}, {edge * (1 + 1e-6), false}} {
		in := ring(20, spin)
		in.Habitat.Length = 6
		in.Ambient = model.Ambient{Strength: moon, Direction: r3.Vec{Z: -1}}
		in.Bodies = []model.Body{{Name: "b", Mass: 1, Diameter: 2 * wide, Friction: mu}}
		in.Releases = []model.Release{{Name: "lies", Body: "b", At: model.Station{HasRadius: true, Radius: c.at, Axial: -3 + wide}}}
		_, track := one(t, in, flight.Setup{})
		moved := r3.Norm(r3.Sub(lastOf(track, in), track.Local.Pos))
		if c.stays != (moved < 1e-6) || track.Outcome != flight.Rested {
			t.Errorf("at %.9g of the edge it moves %g m: %v", c.at/edge, moved, track.Outcome)
		}
	}
}

// lastOf is the place at the end of a track, habitat components.
func lastOf(track *flight.Track, in model.Model) r3.Vec {
	a := frame.Steady{Spin: in.Habitat.Spin}.At(track.Begin + track.End)
	return a.In(track.Last.Pos)
}

// TestRestSlidesWhenPullTurns lets a body lie on the floor of a habitat that
// turns about a level axis: in its frame the pull goes round at the spin rate.
// At the lowest place, at time 0, it weighs omega^2 R + g; after the angle a the
// normal force is omega^2 R + g cos a and the side load g sin a, and friction
// gives way where that is mu times the normal force:
//
//	sin(a - b) = sin(b) omega^2 R/g,  b = atan(mu)
func TestRestSlidesWhenPullTurns(t *testing.T) {
	const radius, spin, mu, wide = 10.0, 0.2, 0.5, 0.05
	for _, way := range []float64{1, -1} {
		in := ring(radius, way*spin)
		in.Ambient = model.Ambient{Strength: moon, Direction: r3.Vec{X: 1}}
		in.Bodies = []model.Body{{Name: "b", Mass: 1, Diameter: 2 * wide, Friction: mu}}
		in.Releases = []model.Release{{Name: "lies", Body: "b", At: model.Station{Height: wide}, Until: model.Until{Kind: model.UntilDuration, Duration: 30}}}
		_, track := one(t, in, flight.Setup{})
		b := math.Atan(mu)
		slips := (b + math.Asin(math.Sin(b)*spin*spin*(radius-wide)/moon)) / spin
		if len(track.Phases) < 2 || track.Phases[0].Kind != flight.Rest || track.Phases[1].Kind != flight.Slide {
			t.Fatalf("spin %g: it does not rest and slide: %v", way*spin, track.Phases)
		}
		// The place is known to the slack of a touch, 1e-8 of it.
		if got := track.Phases[0].T1; math.Abs(got-slips) > 1e-7*slips {
			t.Errorf("spin %g: it begins to slide at %.9g s, want %.9g", way*spin, got, slips)
		}
	}
}

// TestRestStaysUnderTurningPull tries that a body that friction holds all round
// is watched for a turn and then rests for good.
func TestRestStaysUnderTurningPull(t *testing.T) {
	const radius, spin, wide = 10.0, 0.6, 0.05
	in := ring(radius, spin)
	in.Ambient = model.Ambient{Strength: moon, Direction: r3.Vec{Y: 1}}
	ratio := moon / (spin * spin * (radius - wide))
	least := ratio / math.Sqrt(1-ratio*ratio) // the steepest tilt: sin(tilt) = g/(omega^2 r)
	for _, c := range []struct {
		mu    float64
		stays bool
	}{{least * 1.0001, true}, {least * 0.9999, false}} {
		in.Bodies = []model.Body{{Name: "b", Mass: 1, Diameter: 2 * wide, Friction: c.mu}}
		in.Releases = []model.Release{{Name: "lies", Body: "b", At: model.Station{Height: wide}, Until: model.Until{Kind: model.UntilDuration, Duration: 60}}}
		_, track := one(t, in, flight.Setup{})
		if stays := track.Outcome == flight.Rested && track.End == 0; stays != c.stays {
			t.Errorf("friction %.6g of the least: %v at %g s, %d phases", c.mu/least, track.Outcome, track.End, len(track.Phases))
		}
	}
}

// TestEnergyUnderAmbient tries that v^2/2 and the potential stay in sum, seen
// from outside, over flights in vacuum.
func TestEnergyUnderAmbient(t *testing.T) {
	const seed = 0xa3b1
	rng := rand.New(rand.NewPCG(seed, 7))
	for k := range 40 {
		g := randomPull(rng)
		in := ring(50, rng.Float64()-0.5)
		in.Ambient = g
		in.Releases = []model.Release{{Name: "flies", At: model.Station{HasRadius: true, Radius: 30 * rng.Float64(), Axial: 10 * rng.NormFloat64()},
			Start: model.Start{Kind: model.Velocity, VSpinward: rng.NormFloat64(), VUp: rng.NormFloat64(), VAxial: rng.NormFloat64()},
			Until: model.Until{Kind: model.UntilLanding}}}
		_, track := one(t, in, flight.Setup{})
		energy := func(s frame.State) float64 { return r3.Norm2(s.Vel)/2 + g.Potential(s.Pos) }
		first := energy(track.First)
		end := track.At(track.End)
		size := math.Abs(first) + r3.Norm2(end.Vel)
		if drift := math.Abs(energy(end) - first); drift > 1e-8*size {
			t.Errorf("PCG(%#x, 7), number %d: the energy drifts by %g of %g, %+v", seed, k, drift, size, g)
		}
	}
}

// randomPull is a uniform or a central pull.
func randomPull(rng *rand.Rand) model.Ambient {
	d := r3.Unit(r3.Vec{X: rng.NormFloat64(), Y: rng.NormFloat64(), Z: rng.NormFloat64()})
	g := model.Ambient{Strength: 0.1 + 5*rng.Float64(), Direction: d}
	if rng.IntN(2) == 0 {
		// A hull without ends reaches everywhere along the axis.
		g.Direction.Z = 0.3 * rng.NormFloat64()
		g.Direction = r3.Unit(g.Direction)
		g.Distance = 500 + 1000*rng.Float64()
	}
	return g
}

// TestMirrorUnderAmbient holds motions to the law of mirrors: with spin,
// spinward velocity and the pull's spinward part turned round, all goes as in
// a mirror.
func TestMirrorUnderAmbient(t *testing.T) {
	const seed = 0xa3b2
	rng := rand.New(rand.NewPCG(seed, 8))
	for k := range 25 {
		g := randomPull(rng)
		in := ring(12, 0.3+rng.Float64())
		in.Habitat.Length = 300
		in.Ambient = g
		in.Bodies = []model.Body{{Name: "b", Mass: 1, Diameter: 0.1, Restitution: 0.4, Friction: 0.3, Rolls: k%3 == 0}}
		speed := rng.NormFloat64()
		in.Releases = []model.Release{{Name: "goes", Body: "b", At: model.Station{Height: 1.5},
			Start: model.Start{Kind: model.Velocity, VSpinward: speed, VUp: rng.Float64(), VAxial: rng.NormFloat64()},
			Until: model.Until{Kind: model.UntilDuration, Duration: 2.5}}}
		_, track := one(t, in, flight.Setup{})
		in.Habitat.Spin *= -1
		in.Ambient.Direction.Y *= -1
		in.Releases = []model.Release{in.Releases[0]}
		in.Releases[0].Start.VSpinward *= -1
		_, other := one(t, in, flight.Setup{})
		for _, time := range []float64{0.3, 0.8, 1.7, 2.4} {
			a, b := track.At(time).Pos, other.At(time).Pos
			if off := math.Hypot(a.X-b.X, math.Hypot(a.Y+b.Y, a.Z-b.Z)); off > 1e-6 {
				t.Errorf("PCG(%#x, 8), number %d: after %g s the mirror is %g m off", seed, k, time, off)
				break
			}
		}
	}
}
