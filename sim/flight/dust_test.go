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

// dusty is a ring in which a grain of quartz of a diameter (m) is let go.
func dusty(d, height, duration float64) model.Model {
	in := ring(18, 0.5445)
	in.Air = air.FromPressure(air.DefaultPressure, air.DefaultTemperature)
	in.Bodies = []model.Body{{Name: "grain", Mass: sphereMass(d, 2000), Diameter: d}}
	in.Releases = []model.Release{{Name: "grain", Body: "grain", At: model.Station{Height: height}}}
	if duration > 0 {
		in.Releases[0].Until = model.Until{Kind: model.UntilDuration, Duration: duration}
	}
	return in
}

// habitatAt is a track's state in the habitat.
func habitatAt(m *model.Model, track *flight.Track, time float64) frame.State {
	a := m.Motion.At(track.Begin + time)
	return a.ToHabitat(track.At(time))
}

// TestDriftKeepsItsBound holds the drift of dust to the full equations, at both
// ends of its range, with and without a draft, buoyancy, a throw, a change of the
// spin, and little room: no state differs by more than the bound that is told.
func TestDriftKeepsItsBound(t *testing.T) {
	type change func(in *model.Model)
	draft := func(in *model.Model) { in.Weather.Draft = profile(t, 1) }
	cases := []struct {
		name    string
		d, time float64
		changes []change
	}{
		{name: "still air", d: 12e-6, time: 3},
		{name: "small", d: 4e-6, time: 0.3},
		{name: "draft", d: 4e-6, time: 0.3, changes: []change{draft}},
		{name: "thrown", d: 12e-6, time: 1, changes: []change{func(in *model.Model) {
			in.Releases[0].Start = model.Start{Kind: model.Velocity, VSpinward: 3, VUp: 2}
		}}},
		{name: "not turning", d: 12e-6, time: 1, changes: []change{func(in *model.Model) { in.Releases[0].Start.Kind = model.Still }}},
		{name: "in a draft with buoyancy", d: 4.5e-6, time: 0.3, changes: []change{draft, func(in *model.Model) {
			in.Weather.Buoyant, in.Air = true, air.Air{Density: 60, Viscosity: 1.8e-5}
		}}},
		{name: "while the spin changes", d: 8e-6, time: 2, changes: []change{func(in *model.Model) {
			in.Habitat.Changes = []frame.Change{{Start: 0.5, Over: 1.9, To: 0.2}}
		}}},
	}
	for _, c := range cases {
		in := dusty(c.d, 1.5, c.time)
		for _, f := range c.changes {
			f(&in)
		}
		in.Solver.RelTol, in.Solver.PosTol, in.Solver.VelTol = 1e-12, 1e-15, 1e-15
		m, track := one(t, in, flight.Setup{})
		_, full := one(t, in, flight.Setup{Full: true})
		q := flight.QuickOf(m, track.Body)
		if !q.Drifts() || len(full.Phases) != 1 && c.name != "while the spin changes" || track.Work.Steps >= full.Work.Steps {
			t.Errorf("%s: %+v, steps %d and %d", c.name, q, track.Work.Steps, full.Work.Steps)
		}
		way := 0.0
		for i := 1; i <= 20; i++ {
			time := c.time * float64(i) / 20
			a, b := habitatAt(m, track, time), habitatAt(m, full, time)
			way += r3.Norm(b.Vel) * c.time / 20
			off, fast := r3.Norm(r3.Sub(a.Pos, b.Pos)), r3.Norm(r3.Sub(a.Vel, b.Vel))
			// Rounding of the inertial place, 20 m in size, is there too.
			if off > q.Bound()*way+1e-13 || fast > q.Bound()*r3.Norm(b.Vel)+1e-13 {
				t.Errorf("%s: after %g s %.2g m and %.2g m/s off, bound %.2g of %.2g m and %.2g m/s", c.name, time, off, fast, q.Bound(), way, r3.Norm(b.Vel))
				break
			}
		}
	}
}

// TestDustSettles holds the settling of dust through 1.5 m to Stokes' law (1851)
// in the growing weight, r' = tau omega^2 r, with the terms that it leaves out: the
// drag of Clift and Gauvin is more by a share of 0.15 Re^0.687, less than that at
// the floor, and the Coriolis acceleration takes (2 omega tau)^2. It lands once,
// and stays.
func TestDustSettles(t *testing.T) {
	for _, d := range []float64{1e-6, 3e-6, 10e-6, 15e-6} {
		in := dusty(d, 1.5, 0)
		in.Solver.MaxTime = 1e6
		m, track := one(t, in, flight.Setup{})
		tau := 2000 * d * d / (18 * m.Air.Viscosity)
		want := math.Log((18-d/2)/16.5) / (tau * 0.5445 * 0.5445)
		re := m.Air.Density * d * tau * 0.5445 * 0.5445 * 18 / m.Air.Viscosity
		late := track.End/want - 1
		if track.Outcome != flight.Rested || len(track.Impacts) != 1 || late < -1e-7 || late > 0.15*math.Pow(re, 0.687)+math.Pow(2*0.5445*tau, 2)+1e-7 {
			t.Errorf("%g um: %s after %g s, by Stokes %g s, Re %.2g, late by %.2g", d*1e6, order(track), track.End, want, re, late)
		}
		// At steps of a few tau it would be 20,000 to 4e9: it is one a rad of turning.
		if track.Work.Steps > 1000+int(0.5445*track.End) {
			t.Errorf("%g um: %d steps", d*1e6, track.Work.Steps)
		}
	}
}

// TestDustSticks tries that dust stays where it touches: on a wall into which it
// is thrown, under a ceiling to which a draft carries it, and at its release.
func TestDustSticks(t *testing.T) {
	in := dusty(10e-6, 1, 0)
	in.Habitat.CeilingRadius = 16
	in.Weather.Draft = air.UniformDraft(0, 0, 0.1)
	m, track := one(t, in, flight.Setup{})
	if r := math.Hypot(end(m, track).Pos.X, end(m, track).Pos.Y); track.Outcome != flight.Rested || track.Landing().Surface != "ceiling" || math.Abs(r-16-5e-6) > 1e-8 {
		t.Errorf("carried up: %s at %g m", order(track), r)
	}
	in = dusty(10e-6, 5e-6, 0)
	if _, track = one(t, in, flight.Setup{}); track.Outcome != flight.Rested || track.End != 0 {
		t.Errorf("on the floor: %s", order(track))
	}
	in = dusty(10e-6, 1e-5, 0)
	in.Releases[0].Start = model.Start{Kind: model.Velocity, VUp: -1}
	in.Releases[0].Until.Kind = model.UntilLanding
	if _, track = one(t, in, flight.Setup{}); track.Outcome != flight.Landed || len(track.Impacts) != 1 || track.End > 1e-4 {
		t.Errorf("thrown at the floor: %s", order(track))
	}
}

// TestQuickIsDustOnly tries which bodies drift: none of a size that bounces.
func TestQuickIsDustOnly(t *testing.T) {
	m := must(t, dusty(10e-6, 1, 0))
	for _, c := range []struct {
		d, density float64
		want       bool
	}{{10e-6, 1000, true}, {17e-6, 2000, true}, {30e-6, 1000, false}, {1e-3, 1000, false}, {0.06, 1000, false}, {0, 1, false}} {
		b := model.Body{Mass: sphereMass(math.Max(c.d, 1e-3), c.density), Diameter: c.d}
		if c.d > 0 {
			b.Mass = sphereMass(c.d, c.density)
		}
		if got := flight.QuickOf(m, b); got.Drifts() != c.want {
			t.Errorf("%g um of %g kg/m^3: %+v", c.d*1e6, c.density, got)
		}
	}
	// Relaxation by hand, of water in air: rho d^2/(18 mu) is 3.1e-4 s.
	if got := flight.QuickOf(m, model.Body{Mass: sphereMass(1e-5, 1000), Diameter: 1e-5}).Relaxation; math.Abs(got-1e-7/(18*m.Air.Viscosity)) > 1e-15 {
		t.Errorf("relaxation %g s", got)
	}
}

// TestDustCoasts tries that a coast of dust is its flight.
func TestDustCoasts(t *testing.T) {
	in := dusty(8e-6, 1.5, 3)
	in.Weather.Draft = air.UniformDraft(0.1, 0.2, 0.05)
	in.Releases[0].Start = model.Start{Kind: model.Velocity, VSpinward: 3, VUp: 2}
	m, track := one(t, in, flight.Setup{})
	let, problem := flight.Release(m, &m.Releases[0], nil)
	if problem.Msg != "" {
		t.Fatal(problem)
	}
	for _, time := range []float64{0.005, 3} {
		s, err := flight.NewFlier(m).Coast(&let, time)
		want := track.At(time)
		if off := r3.Norm(r3.Sub(s.Pos, want.Pos)); err != nil || off > 1e-8 || r3.Norm(r3.Sub(s.Vel, want.Vel)) > 1e-8 {
			t.Errorf("after %g s: %v, want %v (%v)", time, s, want, err)
		}
	}
}
