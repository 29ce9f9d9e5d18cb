package flight_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/air"
	"offplumb/sim/flight"
	"offplumb/sim/frame"
	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// weight is uniform gravity, m/s^2, with a vector of its own.
type weight r3.Vec

// Accel implements [flight.Field].
func (w weight) Accel(float64, frame.State) r3.Vec { return r3.Vec(w) }

// lawOf makes a drag law of a drag coefficient as a function of the Reynolds
// number.
type lawOf func(re float64) float64

// CdRe implements [air.Law].
func (l lawOf) CdRe(re float64) float64 {
	if re == 0 {
		return 24
	}
	return re * l(re)
}

// stokes is Stokes' law (1851).
func stokes(re float64) float64 { return 24 / re }

// barati is the fit of Barati, Neyshabouri & Ahmadi 2014 for Re < 2e5.
func barati(re float64) float64 {
	return 5.4856e9*math.Tanh(4.3774e-9/re) + 0.0709*math.Tanh(700.6574/re) +
		0.3894*math.Tanh(74.1539/re) - 0.1198*math.Tanh(7429.0843/re) +
		1.7174*math.Tanh(9.9851/(re+2.3384)) + 0.4744
}

// standardG is standard gravity, m/s^2.
const standardG = 9.80665

// column is a habitat that stands still, so wide that its floor is flat
// beneath a release at a height (m), with the sphere of a diameter (m) and a
// mass (kg) thrown down at a speed (m/s).
func column(a air.Air, height, diameter, mass, down float64) model.Model {
	in := ring(1e4, 0)
	in.Air = a
	in.Bodies = []model.Body{{Name: "b", Mass: mass, Diameter: diameter}}
	in.Releases = []model.Release{{Name: "fall", Body: "b", At: model.Station{Height: height},
		Start: model.Start{Kind: model.Velocity, VUp: -down}, Until: model.Until{Kind: model.UntilLanding}}}
	return in
}

// sphereMass is the mass, kg, of a sphere of a diameter (m) and a density
// (kg/m^3).
func sphereMass(diameter, density float64) float64 {
	return density * math.Pi / 6 * math.Pow(diameter, 3)
}

// TestSphereFallsAsLibrary holds falls with drag and buoyancy to the
// documented test values of the general-purpose library fluids (C. Bell): a
// sphere of 1 mm and 2200 kg/m^3 in air of 1.2 kg/m^3 and 1.78e-5 Pa s. The
// Stokes values are closed forms. The Barati ones come of an integrator with a
// tolerance of 1.5e-8, and its way is the sum by trapezoids of 999 speeds,
// which lies dt^2/12 times the change of the acceleration (130 m/s^2), 2.7e-6 m
// or 3.5e-7 of it, too high.
func TestSphereFallsAsLibrary(t *testing.T) {
	const d, density = 1e-3, 2200.0
	a := air.Air{Density: 1.2, Viscosity: 1.78e-5}
	for _, c := range []struct {
		name        string
		law         air.Law
		down, time  float64
		speed, way  float64
		tol, tolWay float64 // relative
	}{
		{"Barati", lawOf(barati), 30, 0.5, 9.686465044, 7.829454644, 3e-8, 4e-7},
		{"Stokes", lawOf(stokes), 0, 0.1, 0.9730274844, 0.0487694640, 1e-8, 1e-8},
	} {
		in := column(a, 100, d, sphereMass(d, density), c.down)
		in.Releases[0].Until = model.Until{Kind: model.UntilDuration, Duration: c.time}
		_, track := one(t, in, flight.Setup{Law: c.law, Fields: []flight.Field{weight{X: standardG * (1 - a.Density/density)}}})
		speed, way := r3.Norm(track.Last.Vel), r3.Norm(r3.Sub(track.Last.Pos, track.First.Pos))
		if math.Abs(speed/c.speed-1) > c.tol || math.Abs(way/c.way-1) > c.tolWay {
			t.Errorf("%s: after %g s %.11g m/s and %.11g m, documented %.10g and %.10g", c.name, c.time, speed, way, c.speed, c.way)
		}
	}
}

// TestStokesFallClosedForm holds a fall under Stokes' law to its closed form,
// v = g tau (1 - e^(-t/tau)), along all of its dense output.
func TestStokesFallClosedForm(t *testing.T) {
	const d, density = 2e-4, 900.0
	a := air.Air{Density: 1.1, Viscosity: 1.8e-5}
	in := column(a, 100, d, sphereMass(d, density), 0)
	in.Releases[0].Until = model.Until{Kind: model.UntilDuration, Duration: 2}
	_, track := one(t, in, flight.Setup{Law: lawOf(stokes), Fields: []flight.Field{weight{X: standardG}}})
	tau := density * d * d / (18 * a.Viscosity)
	// The error of some hundred steps, each within the solver's tolerance of
	// the state that it ends with.
	tol := 100 * in.Solver.RelTol
	for time := 0.01; time < 2; time += 0.01 {
		fallen := -math.Expm1(-time / tau)
		speed, way := standardG*tau*fallen, standardG*tau*(time-tau*fallen)
		s := track.At(time)
		if math.Abs(s.Vel.X-speed) > tol*speed || math.Abs(s.Pos.X-track.First.Pos.X-way) > tol*(way+speed*time) {
			t.Errorf("after %g s %.12g m/s and %.12g m, want %.12g and %.12g", time, s.Vel.X, s.Pos.X-track.First.Pos.X, speed, way)
		}
	}
}

// TestNewtonsGlobes holds the fall of glass globes from the top of St Paul's
// in June 1710 to what was timed: Newton, Principia, book II, section VII,
// scholium, experiment 13; 220 ft, to 5 %. The globes were weighed in air, so
// that their weight is less the buoyancy already. The air is taken at
// 101325 Pa and 15 degC, London's in June; the foot and the inch as today's.
func TestNewtonsGlobes(t *testing.T) {
	const grain, inch, foot = 64.79891e-6, 0.0254, 0.3048
	a := air.FromPressure(101325, 288.15)
	for _, c := range []struct{ grains, inches, seconds float64 }{
		{510, 5.1, 8.20}, {642, 5.2, 7.70}, {599, 5.1, 7.70}, {515, 5.0, 7.95}, {483, 5.0, 8.20}, {641, 5.2, 7.70},
	} {
		d, weighed := c.inches*inch, c.grains*grain
		mass := weighed + sphereMass(d, a.Density)
		in := column(a, 220*foot+d/2, d, mass, 0)
		m, track := one(t, in, flight.Setup{Fields: []flight.Field{weight{X: standardG * weighed / mass}}})
		l := measure.Land(m, track)
		if l.Outcome != flight.Landed || math.Abs(l.Time/c.seconds-1) > 0.05 {
			t.Errorf("%g grains, %g in: %v after %.4g s, timed %g", c.grains, c.inches, l.Outcome, l.Time, c.seconds)
		}
	}
}

// TestRaindropsFall lets water drops fall through still air until they keep
// their speed, and holds it to Gunn & Kinzer 1949, J. Meteorol. 6:243 (at
// second hand), to 5 %. A hundred times their own length of fall, v^2/g,
// leaves nothing of the start.
func TestRaindropsFall(t *testing.T) {
	const water = 998.2
	a := air.FromPressure(101325, 293.15)
	for _, c := range []struct{ mm, cms float64 }{
		{0.3, 117}, {0.4, 162}, {0.5, 206}, {0.6, 247}, {0.8, 327}, {1.0, 403}, {1.2, 464},
	} {
		d, v := c.mm*1e-3, c.cms*0.01
		in := column(a, 100*v*v/standardG, d, sphereMass(d, water), 0)
		m, track := one(t, in, flight.Setup{Fields: []flight.Field{weight{X: standardG * (1 - a.Density/water)}}})
		if l := measure.Land(m, track); math.Abs(l.Speed/v-1) > 0.05 {
			t.Errorf("drop of %g mm lands at %.4g m/s, measured %g", c.mm, l.Speed, v)
		}
	}
}
