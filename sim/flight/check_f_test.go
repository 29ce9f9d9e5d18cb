package flight_test

import (
	"fmt"
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/flight"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// Published check F22: balls with the restitution that the rules of their game
// imply (e = sqrt(h2/h1), the middle of the band), dropped where gravity is all
// but uniform, rebound within the band.
func TestReboundBands(t *testing.T) {
	for _, c := range []struct {
		name               string
		drop, low, high, d float64 // m
	}{
		{"tennis ball (ITF, rules of tennis)", 2.54, 1.35, 1.47, 0.067},
		{"table tennis ball (ITTF)", 0.305, 0.24, 0.26, 0.04},
		{"football (FIFA Quality)", 2, 1.15, 1.65, 0.22},
	} {
		e := math.Sqrt((c.low + c.high) / 2 / c.drop)
		m, track := fromFile(t, fmt.Sprintf(`
format = 1
[habitat]
floor_radius = "2300 km"
floor_gravity = "1 g"
[air]
none = true
[[body]]
name = "ball"
mass = "0.1 kg"
diameter = "%.17g m"
restitution = %.17g
[[release]]
name = "ball"
body = "ball"
at = { height = "%.17g m" }
until = "3 s"
`, c.d, e, c.drop+c.d/2))
		if len(track.Impacts) < 2 {
			t.Fatalf("%s: %s", c.name, kinds(track))
		}
		top := 0.0
		for k := 0.0; k <= 1000; k++ {
			time := track.Impacts[0].Time + (track.Impacts[1].Time-track.Impacts[0].Time)*k/1000
			top = math.Max(top, m.Decks[0].Radius-frame.PolarOf(local(m, track, time).Pos).R-c.d/2)
		}
		if top < c.low || top > c.high || math.Abs(top/c.drop-e*e) > 1e-5 {
			t.Errorf("%s rebounds %.6g m from %g m, want %g to %g", c.name, top, c.drop, c.low, c.high)
		}
	}
}

// down is a gravity along the axis.
type down float64

func (g down) Accel(float64, frame.State) r3.Vec { return r3.Vec{Z: -float64(g)} }

// A solid sphere that rolls on a turntable goes round a circle at 2/7 of the
// table's rate, seen from outside (Weltner, American Journal of Physics 47,
// 1979; from memory). The table is an end bulkhead, under gravity along the
// axis.
func TestBallOnTurntable(t *testing.T) {
	const spin, a, r0 = 0.8, 0.1, 1.0
	in := ring(20, spin)
	in.Habitat.Length = 10
	in.Bodies = []model.Body{{Name: "ball", Mass: 1, Diameter: 2 * a, Friction: 1, Rolls: true}}
	in.Releases = []model.Release{{Name: "ball", Body: "ball", Until: model.Until{Kind: model.UntilDuration, Duration: 12},
		At: model.Station{Radius: r0, HasRadius: true, Axial: -5 + a}}}
	_, track := one(t, in, flight.Setup{Fields: []flight.Field{down(9.8)}})
	if k := track.Phases[0].Kind; k != flight.Roll {
		t.Fatalf("begins with %v: %s", k, kinds(track))
	}
	// v = 2/7 spin x (r - c), and at first v = spin x r: c = -5/2 r0.
	centre := r3.Vec{X: -2.5 * r0}
	for time := 1.0; time <= 12; time++ {
		sin, cos := math.Sincos(2.0 / 7 * spin * time)
		want := r3.Add(centre, r3.Scale(3.5*r0, r3.Vec{X: cos, Y: sin}))
		got := track.At(time).Pos
		got.Z = 0
		if off := r3.Norm(r3.Sub(got, want)); off > 1e-6 {
			t.Errorf("after %g s at %v, want %v: %.3g m off", time, got, want, off)
		}
	}
}

// A sphere that slides onto a floor rolls in the end at 5/7 of its speed, or,
// started with friction to spare, at once (textbook).
func TestSlidingBecomesRolling(t *testing.T) {
	in := ring(20, 1e-9) // all but no spin: gravity along the axis presses it on a bulkhead
	in.Habitat.Length = 10
	in.Bodies = []model.Body{{Name: "ball", Mass: 1, Diameter: 0.2, Friction: 0.3, Rolls: true}}
	in.Releases = []model.Release{{Name: "ball", Body: "ball", Until: model.Until{Kind: model.UntilDuration, Duration: 2},
		At: model.Station{Radius: 1, HasRadius: true, Axial: -4.9}, Start: model.Start{Kind: model.Velocity, VSpinward: 2}}}
	_, track := one(t, in, flight.Setup{Fields: []flight.Field{down(9.8)}})
	if len(track.Phases) < 2 || track.Phases[0].Kind != flight.Slide || track.Phases[1].Kind != flight.Roll {
		t.Fatalf("goes %s", kinds(track))
	}
	if got, want := track.Phases[0].T1, 2*2.0/(7*0.3*9.8); math.Abs(got-want) > 1e-4*want {
		t.Errorf("rolls after %.8g s, want %.8g", got, want)
	}
	if got := r3.Norm(track.At(1.5).Vel); math.Abs(got-2*5.0/7) > 1e-4 {
		t.Errorf("rolls at %.8g m/s, want 5/7 of 2", got)
	}
}
