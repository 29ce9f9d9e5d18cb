package measure_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/flight"
	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// TestStillGoesRoundBackward tries the angle gone round of a body at rest in
// the inertial frame: -omega t, through lap after lap without a jump, at every
// sample and at odd times.
func TestStillGoesRoundBackward(t *testing.T) {
	for _, spin := range []float64{0.7, -0.7} {
		const r, height, duration = 12.0, 1.5, 100.0 // 11 laps
		in := ring(r, spin)
		in.Output.Step = 0.37
		m, track := fly(t, in, model.Release{Name: "still", At: model.Station{Height: height, Spinward: model.Arc{Value: 5}},
			Start: model.Start{Kind: model.Still}, Until: model.Until{Kind: model.UntilDuration, Duration: duration}})
		if track.Outcome != flight.TimeUp {
			t.Fatalf("spin %g: outcome %v", spin, track.Outcome)
		}
		// Some thousand hops of up to an eighth of a turn, a few roundings each.
		const tol = 4000 * epsilon * math.Pi
		for time := 0.0; time < duration; time += 1.7 {
			if got := measure.GoneRound(m, track, time); math.Abs(got+spin*time) > tol {
				t.Fatalf("spin %g: gone round %.15g rad after %g s, want %.15g", spin, got, time, -spin*time)
			}
		}
		samples, _ := measure.Samples(m, track, flight.NewForces(m, track.Body, nil))
		for _, s := range samples {
			want := -r * spin * s.Time
			if math.Abs(s.Offset-want) > r*tol || math.Abs(s.Arc-5-want) > r*tol {
				t.Fatalf("spin %g: after %g s offset %.15g m and arc %.15g m, want %.15g and that from 5 m", spin, s.Time, s.Offset, s.Arc, want)
			}
		}
	}
}

// TestLandsAfterLaps tries the offset of a body that stands still but for a
// slow way outward: it lands after laps, R omega t against the spin.
func TestLandsAfterLaps(t *testing.T) {
	const r, spin, height, slow = 12.0, 0.7, 1.5, 0.05
	in := ring(r, spin)
	l := land(t, in, model.Release{Name: "drift", At: model.Station{Height: height},
		Start: model.Start{Kind: model.Velocity, VSpinward: -spin * (r - height), VUp: -slow}})
	want := -r * spin * height / slow // 3.3 laps
	// Its way outward takes 30 s; its starting velocity is exact to an epsilon
	// of the rim's speed, 170 times its own.
	const tol = 1000 * epsilon
	if math.Abs(l.Time-height/slow) > tol*height/slow || math.Abs(l.Offset-want) > tol*-want {
		t.Errorf("lands after %.15g s with offset %.15g m, want %g and %.15g", l.Time, l.Offset, height/slow, want)
	}
	if math.Abs(l.Arc-(want+3*2*math.Pi*r)) > tol*-want {
		t.Errorf("lands at arc %.15g m, want the offset less three laps", l.Arc)
	}
}

// TestThrowsAreStraightLines tries landings of throws in vacuum, of points and
// of balls, against straight lines in the inertial frame: where these meet the
// floor, less what it has turned by, whether they pass near the axis or cross
// half the habitat.
func TestThrowsAreStraightLines(t *testing.T) {
	rng := random(t, 5)
	for range 300 {
		r, spin := between(rng, 5, 300), between(rng, 0.05, 1)*float64(1-2*rng.IntN(2))
		rim, d := math.Abs(spin)*r, between(rng, 0, 0.4)*float64(rng.IntN(2))
		r0 := between(rng, 0.3, r-d)
		v := r3.Vec{X: between(rng, -1, 1) * rim, Y: between(rng, -1, 1) * rim, Z: between(rng, -1, 1) * rim}
		l := land(t, ring(r, spin), sphere(1, d, model.Station{HasRadius: true, Radius: r0},
			model.Start{Kind: model.Velocity, VSpinward: v.Y, VAxial: v.Z, VUp: -v.X}))
		v.Y += spin * r0
		// |(r0, 0) + (vx, vy) time| = r - d/2.
		a, b, c := v.X*v.X+v.Y*v.Y, r0*v.X, (r-d/2-r0)*(r-d/2+r0)
		root := math.Sqrt(b*b + a*c)
		time := (root - b) / a
		if b > 0 {
			time = c / (root + b)
		}
		x, y := r0+v.X*time, v.Y*time
		want := r * (math.Atan2(y, x) - spin*time)
		tol := 4 * slack(math.Abs(spin)*time)
		if math.Abs(l.Time-time) > tol*time || math.Abs(l.Offset-want) > tol*r {
			t.Fatalf("R = %g m, spin %g, from %g m with %v m/s: %.17g s and %.17g m, want %.17g and %.17g", r, spin, r0, v, l.Time, l.Offset, time, want)
		}
		speed := r3.Norm(r3.Vec{X: v.X + spin*y, Y: v.Y - spin*x, Z: v.Z})
		if math.Abs(l.Speed-speed) > tol*(rim+speed) || math.Abs(l.OffsetAxial-v.Z*time) > tol*r {
			t.Fatalf("R = %g m, spin %g, from %g m with %v m/s: %.17g m/s and %.17g m axially, want %.17g and %.17g",
				r, spin, r0, v, l.Speed, l.OffsetAxial, speed, v.Z*time)
		}
	}
}
