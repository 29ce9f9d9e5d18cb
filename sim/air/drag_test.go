package air_test

import (
	"math"
	"testing"

	"offplumb/sim/air"
)

// sphere is the program's law as a drag coefficient.
func sphere(re float64) float64 { return air.CliftGauvin{}.CdRe(re) / re }

// fitAccuracy is how far a fit of the standard drag curve may lie from another
// or from a table of it: the measurements behind them scatter by that much.
const fitAccuracy = 0.10

// TestStandardDragCurve holds the program's law to tabulated standard drag
// curves of a smooth sphere, for 1 < Re < 5e4.
func TestStandardDragCurve(t *testing.T) {
	const course = "table of a university course (IUP)"
	const clouds = "Pruppacher & Klett, Microphysics of Clouds and Precipitation, table 10.1 (at second hand)"
	for _, c := range []struct {
		re, cd float64
		source string
	}{
		{3.02, 10.86, course}, {7.015, 5.623, course}, {15.49, 3.388, course}, {57.54, 1.479, course},
		{144.5, 0.9204, course}, {264.9, 0.7194, course}, {512.9, 0.5623, course}, {1000, 0.4786, course},
		{1862, 0.4365, course}, {3162, 0.4074, course}, {4764, 0.3890, course}, {8375, 0.3981, course},
		{15560, 0.4395, course}, {26480, 0.4571, course}, {34670, 0.4775, course},
		{10, 4.29, clouds}, {30, 2.11, clouds}, {57, 1.51, clouds}, {100, 1.10, clouds}, {300, 0.63, clouds},
	} {
		if got := sphere(c.re); math.Abs(got/c.cd-1) > fitAccuracy {
			t.Errorf("%s: Re %g: drag coefficient %.4g, want %g within 10 %%", c.source, c.re, got, c.cd)
		}
	}
}

// TestOtherLawsAsPrinted tries that the laws which the tests supply are what
// their authors meant, by the documented values at Re = 200 of the library
// fluids (C. Bell), to half the last digit.
func TestOtherLawsAsPrinted(t *testing.T) {
	for _, c := range []struct {
		name string
		law  func(re float64) float64
		want float64
	}{
		{"Clift", clift, 0.77563},
		{"Morrison", morrison, 0.76773},
		{"Barati", barati, 0.76822},
		{"Haider-Levenspiel", haiderLevenspiel, 0.79596},
	} {
		if got := c.law(200); math.Abs(got-c.want) > 5e-6 {
			t.Errorf("%s: %.7g at Re 200, want %g", c.name, got, c.want)
		}
	}
}

// TestAgreesWithOtherLaws holds the program's law to three others over the
// range in which they all fit the standard drag curve.
func TestAgreesWithOtherLaws(t *testing.T) {
	for _, c := range []struct {
		name     string
		law      func(re float64) float64
		from, to float64
	}{
		{"Barati", barati, 1, 5e4},
		{"Haider-Levenspiel", haiderLevenspiel, 1, 5e4},
		{"Morrison", morrison, 10, 1e4},
	} {
		for re := c.from * 1.01; re < c.to; re *= 1.07 {
			if got, want := sphere(re), c.law(re); math.Abs(got/want-1) > fitAccuracy {
				t.Errorf("Re %.4g: drag coefficient %.4g, %s has %.4g", re, got, c.name, want)
			}
		}
	}
}

// TestCreepingFlow tries Stokes' law as the limit of slow motion: Cd Re tends
// to 24, and the force of a sphere to 3 pi mu D v (Stokes 1851).
func TestCreepingFlow(t *testing.T) {
	law := air.CliftGauvin{}
	if got := law.CdRe(0); got != 24 {
		t.Errorf("Cd Re at rest is %g, want 24", got)
	}
	const d = 1e-4
	room := air.FromPressure(air.DefaultPressure, air.DefaultTemperature)
	drag := air.NewDrag(room, nil, d, air.SphereArea(d))
	stokes := 3 * math.Pi * room.Viscosity * d
	for _, re := range []float64{0, 1e-9, 1e-6, 1e-4} {
		speed := re * room.Viscosity / (room.Density * d)
		// The law exceeds Stokes' by 0.15 Re^0.687 and, far less, by the second term.
		above := 0.16 * math.Pow(re, 0.687)
		if got := drag.PerVelocity(speed)/stokes - 1; got < -1e-14 || got > above+1e-14 {
			t.Errorf("Re %g: drag is %.3g above Stokes' law, want from 0 to %.3g", re, got, above)
		}
	}
}

// TestConstantCoefficient tries the force of a body of known drag
// coefficient, rho Cd A v^2/2, whatever the diameter given.
func TestConstantCoefficient(t *testing.T) {
	room := air.Air{Density: 1.1, Viscosity: 1.8e-5}
	for _, d := range []float64{0.01, 0.3} {
		drag := air.NewDrag(room, air.Constant(0.8), d, 0.04)
		for _, v := range []float64{0, 0.2, 7} {
			want := 0.5 * 1.1 * 0.8 * 0.04 * v * v
			if got := drag.PerVelocity(v) * v; math.Abs(got-want) > 1e-14*want {
				t.Errorf("diameter %g m, %g m/s: force %.15g N, want %.15g", d, v, got, want)
			}
		}
	}
}

// settled gives the speed, m/s, at which drag balances a weight (N).
func settled(d air.Drag, weight float64) float64 {
	lo, hi := 0.0, 1e3
	for range 200 {
		if mid := (lo + hi) / 2; d.PerVelocity(mid)*mid < weight {
			lo = mid
		} else {
			hi = mid
		}
	}
	return lo
}

// TestRaindrops holds the terminal velocity of water drops in still air to
// Gunn & Kinzer 1949, J. Meteorol. 6:243 (at second hand), up to the size at
// which drops flatten: 5 %, of which 1 % is theirs and the rest that of a
// sphere's law for a drop that turns over inside.
func TestRaindrops(t *testing.T) {
	const water, gravity = 998.2, 9.80665
	room := air.FromPressure(101325, 293.15)
	for _, c := range []struct{ mm, cms float64 }{
		{0.3, 117}, {0.4, 162}, {0.5, 206}, {0.6, 247}, {0.8, 327}, {1.0, 403}, {1.2, 464},
	} {
		d := c.mm * 1e-3
		drag := air.NewDrag(room, nil, d, air.SphereArea(d))
		got := settled(drag, (water-room.Density)*math.Pi/6*d*d*d*gravity)
		if want := c.cms * 0.01; math.Abs(got/want-1) > 0.05 {
			t.Errorf("drop of %g mm falls at %.4g m/s, measured %g", c.mm, got, want)
		}
	}
}
