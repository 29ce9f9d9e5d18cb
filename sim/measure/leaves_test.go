package measure_test

import (
	"math"
	"testing"

	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// deg is an angle given in degrees.
func deg(x float64) model.Arc { return model.Arc{Value: x * math.Pi / 180, IsAngle: true} }

// spokes is a ring of 20 m joined to its hub by four spokes, without air.
func spokes(spin float64, round bool) model.Model {
	in := ring(20, spin)
	in.Habitat.Length, in.Habitat.CeilingRadius = 12, 16
	in.Rooms = []model.Room{{Name: "hub", FloorRadius: 4, Length: 9}}
	for i, name := range []string{"A", "B", "C", "D"} {
		p := model.Passage{Name: "spoke " + name, Spinward: deg(90 * float64(i)), Axial: 0.5, FromRadius: 4, ToRadius: 16, Width: 2}
		if round {
			p.Width, p.Diameter = 0, 2
		}
		in.Passages = append(in.Passages, p)
	}
	return in
}

// TestLeavesItsPassage tries that a body which drops out of a spoke leaves that
// spoke and not the one across the axis, at the time and with the speed of a
// drop in vacuum from r0 to the radius of the mouth: omega t = sqrt(R^2 -
// r0^2)/r0, v = omega sqrt(R^2 - r0^2).
func TestLeavesItsPassage(t *testing.T) {
	const r0, mouth = 15.2, 16.0
	for _, spin := range []float64{0.5, -0.5} {
		for _, round := range []bool{false, true} {
			for i, name := range []string{"spoke A", "spoke B", "spoke C", "spoke D"} {
				m, track := follow(t, spokes(spin, round), model.Release{Name: "r", Own: ball(0.3, 0.4),
					At: model.Station{HasRadius: true, Radius: r0, Axial: 0.5, Spinward: deg(90 * float64(i))}, Until: model.Until{Kind: model.UntilLanding}})
				events := measure.Events(m, track)
				if len(events) != 2 || events[0].Kind != measure.Leaves || events[0].Surface != name || events[1].Kind != measure.Impact {
					t.Fatalf("%s: %+v", name, events)
				}
				e := &events[0]
				way := math.Sqrt(mouth*mouth - r0*r0)
				if want := way / r0 / math.Abs(spin); math.Abs(e.Time-want) > 1e-9*want {
					t.Errorf("%s: leaves after %.12g s, want %.12g", name, e.Time, want)
				}
				if want := math.Abs(spin) * way; math.Abs(e.Speed-want) > 1e-8*want || math.Abs(e.Energy-want*want) > 1e-8*want*want {
					t.Errorf("%s: leaves at %.12g m/s with %.12g J, want %.12g and its square", name, e.Speed, e.Energy, want)
				}
				if !math.IsNaN(e.NormalSpeed) || !math.IsNaN(e.Incidence) || !math.IsNaN(e.Normal) {
					t.Errorf("%s: a leaving has no normal, but %+v", name, e)
				}
				if math.Abs(e.Place.Height-4) > 1e-9 || math.Abs(e.Place.Z-0.5) > 1e-12 {
					t.Errorf("%s: leaves at %+v", name, e.Place)
				}
			}
		}
	}
}

// TestOnlyOutwardCounts tries that a body thrown up into a spoke leaves it
// when it comes down again, once; and that one which passes the same distance
// from the axis beside the spokes leaves nothing.
func TestOnlyOutwardCounts(t *testing.T) {
	const spin = 0.3
	for _, c := range []struct {
		name  string
		at    model.Station
		start model.Start
		want  int
	}{
		{"up into the spoke", model.Station{HasRadius: true, Radius: 16.3, Axial: 0.5}, model.Start{Kind: model.Velocity, VUp: 1.4, VSpinward: 0.2}, 1},
		{"past the mouth", model.Station{HasRadius: true, Radius: 17, Axial: 0.5}, model.Start{}, 0},
	} {
		m, track := follow(t, spokes(spin, false), model.Release{Name: "r", Own: ball(0.3, 0.4), At: c.at, Start: c.start, Until: model.Until{Kind: model.UntilLanding}})
		leaves := 0
		for _, e := range measure.Events(m, track) {
			if e.Kind == measure.Leaves {
				leaves++
			}
		}
		if leaves != c.want {
			t.Errorf("%s: leaves %d times, want %d: %+v", c.name, leaves, c.want, measure.Events(m, track))
		}
	}
}

// TestCrossing tries the first passing of a distance from the axis outward
// against that of a drop in vacuum; there is none of one that it never reaches
// or from beyond which it starts.
func TestCrossing(t *testing.T) {
	const r, r0, spin = 18.0, 9.0, 0.4
	m, track := follow(t, ring(r, spin), model.Release{Name: "r", At: model.Station{HasRadius: true, Radius: r0}, Until: model.Until{Kind: model.UntilLanding}})
	for _, to := range []float64{9.001, 12, 17.9} {
		at, ok := measure.Crossing(m, track, to)
		if want := math.Sqrt(to*to-r0*r0) / r0 / spin; !ok || math.Abs(at-want) > 1e-9*want {
			t.Errorf("passes %g m after %.12g s, %t, want %.12g", to, at, ok, want)
		}
	}
	for _, to := range []float64{8, 18.1} {
		if at, ok := measure.Crossing(m, track, to); ok {
			t.Errorf("passes %g m after %g s", to, at)
		}
	}
}
