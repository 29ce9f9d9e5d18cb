package flight_test

import (
	"math"
	"testing"

	"offplumb/sim/flight"
	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// ring is a habitat without air, of radius r (m) and spin (rad/s).
func ring(r, spin float64) model.Model {
	return model.Model{
		Habitat: model.Habitat{Room: model.Room{FloorRadius: r}, Spin: spin},
		Solver:  model.Solver{RelTol: model.DefaultRelTol, PosTol: model.DefaultPosTol, VelTol: model.DefaultVelTol, MaxTime: model.DefaultMaxTime},
		Output:  model.Output{Step: model.DefaultStep},
	}
}

// one flies the model's first release.
func one(t *testing.T, in model.Model, setup flight.Setup) (*model.Model, *flight.Track) {
	t.Helper()
	m, problems := model.New(in)
	for _, p := range problems {
		t.Fatalf("%s: %s", p.Key, p.Msg)
	}
	let, problem := flight.Release(m, &m.Releases[0], nil)
	if problem.Msg != "" {
		t.Fatalf("%s: %s", problem.Key, problem.Msg)
	}
	track, err := flight.NewFlierWith(m, setup).Fly(&let)
	if err != nil {
		t.Fatal(err)
	}
	return m, track
}

func dropFrom(r, spin, height, diameter float64) model.Model {
	in := ring(r, spin)
	in.Bodies = []model.Body{{Name: "b", Mass: 1, Diameter: diameter}}
	in.Releases = []model.Release{{Name: "drop", Body: "b", At: model.Station{Height: height}, Until: model.Until{Kind: model.UntilLanding}}}
	return in
}

// Published check A1: a drop in vacuum lands R inv(phi) against the spin after
// tan(phi)/omega, cos(phi) = r0/(R - a).
func TestDropFollowsInvolute(t *testing.T) {
	deg := math.Pi / 180
	for _, c := range []struct {
		phi, inv, tol float64
		source        string
	}{
		{21.2990642859 * deg, 0.0181260949, 1e-9, "ISO 21771:2007, worked gear sheet"},
		{23.8707609654 * deg, 0.0259052382, 1e-9, "ISO 21771:2007, worked gear sheet"},
		{20 * deg, 0.014904, 5e-7, "general gear tables"},
		{14.5 * deg, 0.0055448, 5e-8, "Machinery's Handbook, involute functions (from memory)"},
		{15 * deg, 0.0061498, 5e-8, "Machinery's Handbook (from memory)"},
		{25 * deg, 0.0299753, 5e-8, "Machinery's Handbook (from memory)"},
		{30 * deg, 0.0537515, 5e-8, "Machinery's Handbook (from memory)"},
		{45 * deg, 1 - math.Pi/4, 1e-12, "exact"},
	} {
		for _, spin := range []float64{0.5, -0.5} {
			for _, d := range []float64{0, 0.06} {
				const r = 20.0
				in := dropFrom(r, spin, r-(r-d/2)*math.Cos(c.phi), d)
				m, track := one(t, in, flight.Setup{})
				l := measure.Land(m, track)
				want := -math.Copysign(r*c.inv, spin)
				if got := l.Offset; math.Abs(got-want) > c.tol*r {
					t.Errorf("%s: spin %g, diameter %g: offset %.12g m, want %.12g", c.source, spin, d, got, want)
				}
				if got, want := l.Time, math.Tan(c.phi)/0.5; math.Abs(got-want) > 1e-10 {
					t.Errorf("%s: time %.12g s, want %.12g", c.source, got, want)
				}
				if l.Deflection != l.Offset {
					t.Errorf("%s: a drop's deflection %g is not its offset %g", c.source, l.Deflection, l.Offset)
				}
			}
		}
	}
}
