package flight_test

import (
	"encoding/csv"
	"math"
	"os"
	"strconv"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/air"
	"offplumb/sim/flight"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// profile is the draft of testdata/reference/air_flights.py.
func profile(t *testing.T, sign float64) *air.Draft {
	t.Helper()
	d, err := air.NewDraft([]float64{0, 1, 2.5, 6}, [3][]float64{
		{0, sign * 0.8, sign * 1.2, sign * 0.3}, {0.2, -0.1, 0.4, 0.4}, {0, 0.15, 0.1, 0}})
	if err != nil {
		t.Fatal(err)
	}
	return d
}

// airFlight is a stored flight, and where it ends (inertial).
func airFlight(t *testing.T, name string, v map[string]float64) (model.Model, frame.State) {
	in := ring(v["floor_radius_m"], v["spin_rad_s"])
	in.Air = air.FromPressure(v["pressure_Pa"], v["temperature_K"])
	in.Weather = model.Weather{Temperature: v["temperature_K"], Stratified: v["stratified"] > 0, Buoyant: v["buoyancy"] > 0}
	if v["draft"] > 0 {
		in.Weather.Draft = profile(t, 1)
	}
	in.Bodies = []model.Body{{Name: "b", Mass: v["mass_kg"], Diameter: v["diameter_m"]}}
	in.Releases = []model.Release{{Name: name, Body: "b", At: model.Station{Radius: v["radius_m"], HasRadius: true},
		Until: model.Until{Kind: model.UntilDuration, Duration: v["time_s"]},
		Start: model.Start{Kind: model.Velocity, VSpinward: v["v_spinward_m_s"], VAxial: v["v_axial_m_s"], VUp: v["v_up_m_s"]}}}
	return in, frame.State{Pos: r3.Vec{X: v["x_m"], Y: v["y_m"], Z: v["z_m"]}, Vel: r3.Vec{X: v["vx_m_s"], Y: v["vy_m_s"], Z: v["vz_m_s"]}}
}

// airFlights reads the stored flights in air that moves.
func airFlights(t *testing.T, each func(in model.Model, want frame.State)) {
	t.Helper()
	file, err := os.Open("../../testdata/reference/air_flights.csv")
	if err != nil {
		t.Fatal(err)
	}
	defer file.Close()
	r := csv.NewReader(file)
	r.Comment = '#'
	rows, err := r.ReadAll()
	if err != nil || len(rows) < 7 {
		t.Fatal(len(rows), err)
	}
	for _, row := range rows[1:] {
		v := map[string]float64{}
		for i := 1; i < len(row); i++ {
			if v[rows[0][i]], err = strconv.ParseFloat(row[i], 64); err != nil {
				t.Fatal(err)
			}
		}
		each(airFlight(t, row[0], v))
	}
}

// away is how far two states differ, by the way from the start (m) and the speed.
func away(in *flight.Track, want frame.State) float64 {
	way := r3.Norm(r3.Sub(want.Pos, in.First.Pos))
	return math.Max(r3.Norm(r3.Sub(in.Last.Pos, want.Pos))/way, r3.Norm(r3.Sub(in.Last.Vel, want.Vel))/r3.Norm(want.Vel))
}

// airTol: some hundred steps of 1e-12, and of the script the differences over
// 1e-4 s, where they reach over a kink of the draft's slope: of 1/s^2 in 1 m/s, for
// that long.
const airTol = 1e-9

// TestAirFlightsAsReference holds flights in drafts, layers and with buoyancy
// to another integrator, another interpolation and differenced accelerations of
// the air.
func TestAirFlightsAsReference(t *testing.T) {
	airFlights(t, func(in model.Model, want frame.State) {
		in.Solver.RelTol, in.Solver.PosTol, in.Solver.VelTol = 1e-12, 1e-14, 1e-14
		if _, track := one(t, in, flight.Setup{}); !(away(track, want) <= airTol) {
			t.Errorf("%s: %.2g off", in.Releases[0].Name, away(track, want))
		}
		for what, change := range map[string]func(){
			"spin":  func() { in.Habitat.Spin *= -1 },
			"draft": func() { in.Weather.Draft = air.UniformDraft(0.01, 0.01, 0) },
			"lift":  func() { in.Weather.Buoyant = !in.Weather.Buoyant },
		} {
			saved := in
			change()
			if _, track := one(t, in, flight.Setup{}); away(track, want) < 1000*airTol {
				t.Errorf("%s: does not tell another %s", in.Releases[0].Name, what)
			}
			in = saved
		}
	})
}

// TestAddedMassLimits holds the acceleration of a sphere that moves with the air
// to beta Du/Dt, beta = 3 M/(2 m + M), 3 for a bubble (Batchelor, An Introduction
// to Fluid Dynamics, section 6.8; Maxey & Riley 1983; from memory), Du/Dt being
// omega^2 r toward the axis.
func TestAddedMassLimits(t *testing.T) {
	in := ring(20, 0.7)
	in.Air = air.FromPressure(1e5, 300)
	in.Weather.Buoyant = true
	m := must(t, in)
	for _, ratio := range []float64{1e-12, 0.14, 0.5, 1, 30} {
		b := model.Body{Diameter: 0.3}
		moved := m.Displaced(b)
		b.Mass = ratio * moved
		s := frame.State{Pos: r3.Vec{X: 12, Y: 5}, Vel: r3.Vec{X: -0.7 * 5, Y: 0.7 * 12}}
		a := flight.NewForces(m, b, nil).Accel(0, s)
		beta := 3 / (2*ratio + 1)
		if want := r3.Scale(-beta*0.49, s.Pos); r3.Norm(r3.Sub(a, want)) > 1e-13*r3.Norm(want) {
			t.Errorf("mass %g of the air's: %v, want %v", ratio, a, want)
		}
	}
}

// TestBalloonRises holds the steady rise of a balloon, in a habitat that stands
// still under a uniform gravity, to the balance of drag and buoyancy, (M - m) g =
// rho Cd A v^2/2, with the coefficient as printed.
func TestBalloonRises(t *testing.T) {
	const d, m = 0.25, 0.006
	a := air.FromPressure(101325, 293.15)
	in := column(a, 50, d, m, 0)
	in.Weather.Buoyant = true
	in.Releases[0].Until = model.Until{Kind: model.UntilDuration, Duration: 20}
	world, track := one(t, in, flight.Setup{Fields: []flight.Field{weight{X: standardG}}})
	v := -track.Last.Vel.X
	re := a.Density * v * d / a.Viscosity
	cd := 24/re*(1+0.15*math.Pow(re, 0.687)) + 0.42/(1+42500*math.Pow(re, -1.16))
	lift := (world.Displaced(world.Bodies[0]) - m) * standardG
	drag := a.Density * cd * math.Pi / 8 * d * d * v * v
	// Its inertia by drag is 0.3 s: after 20 s nothing is left of the start.
	if math.Abs(drag/lift-1) > 1e-8 || v < 0.5 {
		t.Errorf("rises at %g m/s, drag by lift %g", v, drag/lift)
	}
}

// TestBalloonGoesToTheAxis lets a balloon go: it is lighter than air, and swings
// through the axis ever less: quadratic drag damps its swings as 1/t, so that after
// 600 s, 80 turns, they are about a body's size, 2 % of where it began.
func TestBalloonGoesToTheAxis(t *testing.T) {
	in := ring(10, 0.9)
	in.Air = air.FromPressure(101325, 293.15)
	in.Weather.Buoyant = true
	in.Bodies = []model.Body{{Name: "balloon", Mass: 0.006, Diameter: 0.25}}
	in.Releases = []model.Release{{Name: "balloon", Body: "balloon", At: model.Station{Height: 1}, Until: model.Until{Kind: model.UntilDuration, Duration: 600}}}
	_, track := one(t, in, flight.Setup{})
	if r := math.Hypot(track.Last.Pos.X, track.Last.Pos.Y); track.Outcome != flight.TimeUp || r > 0.2 {
		t.Errorf("%v, %g m from the axis", track.Outcome, r)
	}
}

// TestBalloonRestsBelowCeiling lets it go under a ceiling: it meets it, stays
// pressed there, and rests, with friction, whatever the sense of the spin.
func TestBalloonRestsBelowCeiling(t *testing.T) {
	for _, spin := range []float64{0.9, -0.9} {
		for _, rolls := range []bool{false, true} {
			in := ring(10, spin)
			in.Habitat.CeilingRadius = 7.5
			in.Air = air.FromPressure(101325, 293.15)
			in.Weather.Buoyant = true
			in.Bodies = []model.Body{{Name: "balloon", Mass: 0.006, Diameter: 0.25, Friction: 0.4, Restitution: 0.5, Rolls: rolls}}
			in.Releases = []model.Release{{Name: "balloon", Body: "balloon", At: model.Station{Height: 1}}}
			m, track := one(t, in, flight.Setup{})
			r := r3.Norm(end(m, track).Pos)
			if track.Outcome != flight.Rested || math.Abs(r-7.625) > 1e-6 || track.Landing() == nil || track.Landing().Surface != "ceiling" {
				t.Errorf("spin %g rolls %v: %s, at %g m", spin, rolls, order(track), r)
			}
		}
	}
}

// TestDraftCarries tries that an axial draft brings a light body to its speed,
// and that one round the ring does so too, against what throws it outward.
func TestDraftCarries(t *testing.T) {
	in := ring(50, 0)
	in.Air = air.FromPressure(101325, 293.15)
	in.Weather.Draft = air.UniformDraft(0, 0.6, 0)
	in.Bodies = []model.Body{{Name: "fluff", Mass: 1e-6, Diameter: 0.01}}
	in.Releases = []model.Release{{Name: "fluff", Body: "fluff", At: model.Station{Height: 1}, Until: model.Until{Kind: model.UntilDuration, Duration: 30}}}
	if _, track := one(t, in, flight.Setup{}); math.Abs(track.Last.Vel.Z-0.6) > 1e-8 {
		t.Errorf("carried at %v m/s, the draft has 0.6", track.Last.Vel)
	}
}

// TestDraftInMirror tries that with the spin and the draft round the ring
// reversed a flight is the mirror image.
func TestDraftInMirror(t *testing.T) {
	in := ring(14, 0.8)
	in.Air = air.FromPressure(101325, 293.15)
	in.Weather = model.Weather{Draft: profile(t, 1), Buoyant: true}
	in.Bodies = []model.Body{{Name: "b", Mass: 0.003, Diameter: 0.1}, {Name: "grain", Mass: sphereMass(1e-5, 2000), Diameter: 1e-5}}
	for _, body := range []string{"b", "grain"} {
		in.Releases = []model.Release{{Name: "b", Body: body, At: model.Station{Height: 2, Spinward: model.Arc{Value: 3}},
			Start: model.Start{Kind: model.Velocity, VSpinward: 2, VUp: 1}, Until: model.Until{Kind: model.UntilDuration, Duration: 3}}}
		m, track := one(t, in, flight.Setup{})
		back := mirrored(in)
		back.Weather.Draft = profile(t, -1)
		n, image := one(t, back, flight.Setup{})
		a, b := end(m, track), end(n, image)
		if d := r3.Norm(r3.Sub(inMirror(a.Pos), b.Pos)); d > 1e-10 || track.Outcome != image.Outcome {
			t.Errorf("%s: the image is %g m off, %v and %v", body, d, track.Outcome, image.Outcome)
		}
	}
}
