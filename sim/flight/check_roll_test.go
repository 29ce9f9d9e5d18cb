package flight_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/flight"
	"offplumb/sim/model"
)

// table is a habitat whose end bulkhead serves as a level table, with a gravity
// toward -axial beside what the spin does. The ball touches it at the distance r
// (m) from the axis.
func table(spin, r, friction float64, start model.Start) model.Model {
	in := ring(40, spin)
	in.Habitat.Length = 4
	in.Bodies = []model.Body{{Name: "ball", Mass: 0.2, Diameter: 0.06, Restitution: 0, Friction: friction, Rolls: true}}
	in.Releases = []model.Release{{Name: "ball", Body: "ball", At: model.Station{HasRadius: true, Radius: r, Axial: -2 + 0.03}, Start: start,
		Until: model.Until{Kind: model.UntilDuration, Duration: 8}}}
	return in
}

// TestBallOnTurntable: a solid sphere that rolls without slip on a level
// turntable moves, seen from outside, on a circle, which it goes round at 2/7
// of the table's rate, whatever its speed (Weltner, Am. J. Phys. 47 (1979) 984;
// from memory). Let go at rest on the table at the distance r from its centre
// it has the speed omega r, so that its circle has the radius 7/2 r.
func TestBallOnTurntable(t *testing.T) {
	const r, friction = 1.3, 0.9
	for _, spin := range []float64{0.8, -1.1} {
		_, track := one(t, table(spin, r, friction, model.Start{}), flight.Setup{Fields: []flight.Field{weight{Z: -standardG}}})
		if len(track.Phases) != 1 || track.Phases[0].Kind != flight.Roll {
			t.Fatal(kinds(track))
		}
		for _, time := range []float64{0.5, 2, 5, 8} {
			sin, cos := math.Sincos(2.0 / 7 * spin * time)
			want := r3.Vec{X: r - 3.5*r*(1-cos), Y: 3.5 * r * sin, Z: -2 + 0.03}
			got := track.At(time)
			// Some tens of steps of 1e-9, of a way of some metres.
			if off := r3.Norm(r3.Sub(got.Pos, want)); off > 1e-7 {
				t.Errorf("spin %g: %v after %g s, %.3g m off the circle", spin, got.Pos, time, off)
			}
			if off := r3.Norm(got.Vel)/(math.Abs(spin)*r) - 1; math.Abs(off) > 1e-8 {
				t.Errorf("spin %g: the speed changes by %.3g after %g s", spin, off, time)
			}
		}
	}
}

// TestBallDownPlane: a solid sphere that rolls down a plane without slip has
// 5/7 of the acceleration of one that slides without friction (Goldstein,
// Classical Mechanics, chapter 5; from memory). The plane is the bulkhead, with
// gravity aslant.
func TestBallDownPlane(t *testing.T) {
	for _, c := range []struct{ angle, friction float64 }{{0.1, 0.1}, {0.4, 0.2}, {0.8, 0.4}} {
		sin, cos := math.Sincos(c.angle)
		in := table(0, 30, c.friction, model.Start{})
		in.Releases[0].Until.Duration = 1
		_, track := one(t, in, flight.Setup{Fields: []flight.Field{weight{Y: standardG * sin, Z: -standardG * cos}}})
		if len(track.Phases) != 1 || track.Phases[0].Kind != flight.Roll {
			t.Fatalf("%g rad: %s", c.angle, kinds(track))
		}
		got, want := track.At(1).Pos.Y, 0.5*5.0/7*standardG*sin
		if math.Abs(got/want-1) > 1e-8 {
			t.Errorf("%g rad: %.12g m in a second, want %.12g", c.angle, got, want)
		}
	}
	// Too steep for its friction, mu < 2/7 tan(angle), it slips all the way.
	in := table(0, 30, 0.1, model.Start{})
	in.Releases[0].Until.Duration = 1
	sin, cos := math.Sincos(0.5)
	_, track := one(t, in, flight.Setup{Fields: []flight.Field{weight{Y: standardG * sin, Z: -standardG * cos}}})
	if got, want := track.At(1).Pos.Y, 0.5*standardG*(sin-0.1*cos); len(track.Phases) != 1 || track.Phases[0].Kind != flight.Slide || math.Abs(got/want-1) > 1e-8 {
		t.Errorf("slipping: %.12g m in a second, want %.12g: %s", got, want, kinds(track))
	}
}

// TestBallBeginsToRoll: a ball that is thrown without spin onto a level floor
// slides for the time 2 v/(7 mu g), and then rolls on at 5/7 of its speed
// (Goldstein, as above; bowling).
func TestBallBeginsToRoll(t *testing.T) {
	for _, c := range []struct{ speed, friction float64 }{{3, 0.1}, {8, 0.5}} {
		in := table(0, 20, c.friction, model.Start{Kind: model.Velocity, VSpinward: c.speed})
		in.Releases[0].Until.Duration = 2
		_, track := one(t, in, flight.Setup{Fields: []flight.Field{weight{Z: -standardG}}})
		if len(track.Phases) != 2 || track.Phases[0].Kind != flight.Slide || track.Phases[1].Kind != flight.Roll {
			t.Fatal(kinds(track))
		}
		// The slide counts as over at a slip of 10 um/s, of some m/s.
		if got, want := track.Phases[1].T0, 2*c.speed/(7*c.friction*standardG); math.Abs(got/want-1) > 1e-5 {
			t.Errorf("%g m/s: begins to roll after %.9g s, want %.9g", c.speed, got, want)
		}
		if got, want := track.At(2).Vel.Y, 5.0/7*c.speed; math.Abs(got/want-1) > 1e-8 {
			t.Errorf("%g m/s: rolls on at %.12g m/s, want %.12g", c.speed, got, want)
		}
	}
}
