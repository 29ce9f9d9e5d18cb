package flight_test

import (
	"fmt"
	"testing"

	"offplumb/sim/air"
	"offplumb/sim/flight"
	"offplumb/sim/model"
)

// whole flies a release again and again, and tells its integration steps.
func whole(b *testing.B, in model.Model) {
	b.Helper()
	m, problems := model.New(in)
	if len(problems) > 0 {
		b.Fatal(problems)
	}
	let, problem := flight.Release(m, &m.Releases[0], nil)
	if problem.Msg != "" {
		b.Fatal(problem)
	}
	f := flight.NewFlier(m)
	steps := 0
	b.ReportAllocs()
	for b.Loop() {
		track, err := f.Fly(&let)
		if err != nil {
			b.Fatal(err)
		}
		steps = track.Work.Steps
	}
	b.ReportMetric(float64(steps), "steps/op")
}

// BenchmarkSpokeFall is a wrench let go in a spoke 40 m long: it slides out
// along the wall, falls to the floor and slides to rest.
func BenchmarkSpokeFall(b *testing.B) {
	in := ring(60, 0.4)
	in.Air = air.FromPressure(air.DefaultPressure, air.DefaultTemperature)
	in.Habitat.CeilingRadius, in.Habitat.Length = 50, 10
	in.Rooms = []model.Room{{Name: "hub", FloorRadius: 3, Length: 8}}
	in.Passages = []model.Passage{{Name: "spoke", FromRadius: 3, ToRadius: 50, Width: 1.6}}
	in.Bodies = []model.Body{{Name: "wrench", Mass: 1.4, Diameter: 0.06, Restitution: 0.35, Friction: 0.4}}
	in.Releases = []model.Release{{Name: "wrench", Body: "wrench", At: model.Station{HasRadius: true, Radius: 10}}}
	whole(b, in)
}

// nut is a nut dropped in a ring of 20 m: it bounces to rest.
func nut() model.Model {
	in := ring(20, 0.6)
	in.Air = air.FromPressure(air.DefaultPressure, air.DefaultTemperature)
	in.Habitat.Length = 14
	in.Bodies = []model.Body{{Name: "nut", Mass: 0.011, Diameter: 0.016, Restitution: 0.6, Friction: 0.3}}
	in.Releases = []model.Release{{Name: "nut", Body: "nut", At: model.Station{Height: 2}, Start: pushed(1, 0.5, 0)}}
	return in
}

// BenchmarkBouncingNut is the nut in the bare ring.
func BenchmarkBouncingNut(b *testing.B) { whole(b, nut()) }

// BenchmarkFixtures is the same among few and many boxes.
func BenchmarkFixtures(b *testing.B) {
	for _, n := range []int{10, 1000} {
		b.Run(fmt.Sprint(n), func(b *testing.B) {
			in := nut()
			for i := range n {
				at := model.Station{Spinward: model.Arc{Value: 1 + 124*float64(i)/float64(n)}, Axial: float64(i%7) - 6.5}
				in.Fixtures = append(in.Fixtures, model.Fixture{Name: fmt.Sprint("box ", i), Kind: model.Box, At: at,
					Size: [3]float64{0.1, 0.1, 0.1}, Friction: model.None, Restitution: model.None})
			}
			whole(b, in)
		})
	}
}

// BenchmarkHour is what goes on for the hour that a release may take: a ball
// that rolls round the ring, along a bulkhead that it touches or far from it,
// and a body that slides without friction.
func BenchmarkHour(b *testing.B) {
	for _, c := range []struct {
		name  string
		body  model.Body
		axial float64
	}{
		{"rolling", model.Body{Mass: 1, Diameter: 0.1, Friction: 0.5, Rolls: true}, 0},
		{"rolling along the bulkhead", model.Body{Mass: 1, Diameter: 0.1, Friction: 0.5, Rolls: true}, 6.95},
		{"near the bulkhead", model.Body{Mass: 1, Diameter: 0.1}, 6.949},
		{"sliding", model.Body{Mass: 1, Diameter: 0.1}, 0},
	} {
		b.Run(c.name, func(b *testing.B) {
			in := ring(20, 0.6)
			in.Habitat.Length = 14
			c.body.Name = "b"
			in.Bodies = []model.Body{c.body}
			in.Releases = []model.Release{{Name: "r", Body: "b", At: model.Station{Height: 0.05, Axial: c.axial}, Start: pushed(3, 0, 0)}}
			whole(b, in)
		})
	}
}
