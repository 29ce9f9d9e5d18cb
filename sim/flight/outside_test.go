package flight_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/air"
	"offplumb/sim/flight"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// hatched is a ring with an outer hatch, whose releases are followed outside.
func hatched(spin float64) model.Model {
	in := ring(10, spin)
	in.Habitat.Length = 6
	in.Decks = []model.Deck{{Name: model.FloorName, Friction: model.None, Restitution: model.None,
		Openings: []model.Opening{{Name: "hatch", Size: [2]float64{2, 2}}}}}
	in.Bodies = []model.Body{{Name: "b", Mass: 1, Diameter: 0.1}}
	in.Solver.Outside = model.Outside{Follow: true, Distance: 60}
	return in
}

// TestLeavesAlongTangent lets a body go over an outer hatch in vacuum: it flies
// straight on at omega r, and is lost where it is as far as stated from its
// place in the habitat, which by the time t has gone round to
// r (cos omega t, sin omega t).
func TestLeavesAlongTangent(t *testing.T) {
	const r, spin = 9.9, 0.4
	in := hatched(spin)
	in.Releases = []model.Release{{Name: "out", Body: "b", At: model.Station{Height: 10 - r}}}
	_, track := one(t, in, flight.Setup{})
	if track.Outcome != flight.Lost || len(track.Impacts) > 0 {
		t.Fatalf("%v after %d impacts, want lost after none", track.Outcome, len(track.Impacts))
	}
	away := func(time float64) float64 {
		sin, cos := math.Sincos(spin * time)
		return math.Hypot(r-r*cos, spin*r*time-r*sin)
	}
	if d := away(track.End); math.Abs(d-60) > 1e-9 {
		t.Errorf("it is lost %.12g m away, want 60", d)
	}
	// The centre passes the outer face, 50 mm below the floor, at
	// (omega t r)^2 = (R + 0.05)^2 - r^2.
	if want := math.Sqrt(10.05*10.05-r*r) / (spin * r); math.Abs(track.Left-want) > 1e-7 {
		t.Errorf("it leaves at %.12g s, want %.12g", track.Left, want)
	}
	want := r3.Vec{X: r, Y: spin * r * track.End}
	if off := r3.Norm(r3.Sub(track.Last.Pos, want)); off > 1e-11 {
		t.Errorf("it is %g m off the tangent", off)
	}
	in.Solver.Outside = model.Outside{}
	if _, track = one(t, in, flight.Setup{}); track.Outcome != flight.Lost || math.Abs(track.End*spin*r-math.Sqrt(10.05*10.05-r*r)) > 1e-7 || track.Left != -1 {
		t.Errorf("not followed, it ends as %v at %g s", track.Outcome, track.End)
	}
}

// TestNoAirOutside tries that drag ends at the hull, so that a body goes
// straight on from there, and that it acts before.
func TestNoAirOutside(t *testing.T) {
	in := hatched(0.4)
	in.Air = air.FromPressure(air.DefaultPressure, air.DefaultTemperature)
	in.Bodies[0].Mass, in.Bodies[0].Diameter = 0.01, 0.2
	in.Releases = []model.Release{{Name: "out", Body: "b", At: model.Station{Height: 0.5}}}
	_, track := one(t, in, flight.Setup{})
	if track.Outcome != flight.Lost || !(track.Left > 0) {
		t.Fatalf("%v, left at %g s", track.Outcome, track.Left)
	}
	left := track.At(track.Left)
	if slower := r3.Norm(track.First.Vel) - r3.Norm(left.Vel); math.Abs(slower) < 1e-3 {
		t.Errorf("within, drag changes its speed by %g m/s only", slower)
	}
	for _, share := range []float64{0.1, 0.5, 0.9} {
		time := track.Left + share*(track.End-track.Left)
		at := track.At(time)
		if off := r3.Norm(r3.Sub(at.Vel, left.Vel)); off > 1e-12*r3.Norm(left.Vel) {
			t.Errorf("outside its velocity changes by %g m/s", off)
		}
	}
}

// TestArmSweepsUp lets a body go beside a box that stands out from the hub, the
// way that the arm comes: seen from outside it goes straight on at omega r
// while the arm comes round, so that the arm's face, which lies along a radius
// at a distance w from it, meets the body's surface where its place in the
// habitat, r (cos, sin) of phi - omega t with r and phi those of the tangent,
// has come to w + a from the middle line.
func TestArmSweepsUp(t *testing.T) {
	const spin, wide, r, aside = 0.5, 0.1, 6.0, 1.5
	in := ring(2, spin)
	in.Habitat.Length = 4
	in.Rooms = []model.Room{{Name: "cabin", Shape: model.Cabin, FloorRadius: 14, Size: [3]float64{6, 4, 2.4}}}
	in.Passages = []model.Passage{{Name: "arm", FromRadius: 2, ToRadius: 11.6, Width: 1.2}}
	in.Bodies = []model.Body{{Name: "b", Mass: 1, Diameter: 2 * wide}}
	in.Solver.Outside = model.Outside{Follow: true, Distance: 100}
	in.Releases = []model.Release{{Name: "ahead", Body: "b", Until: model.Until{Kind: model.UntilLanding},
		At: model.Station{HasRadius: true, Radius: r, Spinward: model.Arc{Value: aside}}}}
	m, track := one(t, in, flight.Setup{})
	hit := track.Landing()
	if hit == nil || hit.Surface != "arm spinward wall" || track.Left != 0 {
		t.Fatalf("it meets %+v, left at %g s", hit, track.Left)
	}
	seen := func(time float64) r3.Vec {
		return frame.SeenAt(m.Motion, time, r3.Add(track.First.Pos, r3.Scale(time, track.First.Vel)))
	}
	face := 0.6 + model.DefaultThickness + wide
	lo, hi := 0.0, 3.0
	for range 60 {
		if mid := (lo + hi) / 2; seen(mid).Y > face {
			lo = mid
		} else {
			hi = mid
		}
	}
	if math.Abs(hit.Time-hi) > 1e-6 {
		t.Errorf("it is met after %.9g s, want %.9g", hit.Time, hi)
	}
}
