package crew_test

import (
	"math"
	"testing"

	"offplumb/sim/crew"
	"offplumb/sim/model"
)

// inward gives the motion of the feet of a radial climb toward the axis.
func inward(p *crew.Plan, t float64) (speed, accel float64) {
	f := p.At(t)
	return -f.VR, -f.AR
}

// ends are ways with a speed and ramps: long enough to reach the speed, just
// so, and too short.
var ends = []struct{ way, speed, ramp float64 }{{6, 1.2, 0.5}, {0.6, 1.2, 0.5}, {0.3, 1.2, 0.5}, {3, 0.4, 2}}

// TestSteadyRamps tries that the speed of a trapezoid grows and falls at one
// rate, of speed by ramp, and is steady between; and that the peak of a way too
// short is what two ramps make of it.
func TestSteadyRamps(t *testing.T) {
	for _, c := range ends {
		_, p := plan(t, 18, 0.5, rigger(), model.Station{}, model.Leg{Kind: model.Climb, Distance: c.way, Speed: c.speed, Ramp: c.ramp, Trapezoid: true})
		peak := math.Min(c.speed, c.way/c.ramp)
		total := c.way/peak + c.ramp
		if math.Abs(p.Duration()-total) > 8*epsilon*total {
			t.Errorf("%+v: takes %.17g s, want %.17g", c, p.Duration(), total)
		}
		for k := 1.0; k < 1000; k++ {
			at := total * k / 1000
			rate, from := 0.0, peak
			switch {
			case at < c.ramp:
				rate, from = peak/c.ramp, peak/c.ramp*at
			case at > total-c.ramp:
				rate, from = -peak/c.ramp, peak/c.ramp*(total-at)
			}
			if v, a := inward(p, at); math.Abs(v-from) > 64*epsilon*peak || math.Abs(a-rate) > 64*epsilon*peak/c.ramp && math.Abs(at-c.ramp) > 1e-9 && math.Abs(at-total+c.ramp) > 1e-9 {
				t.Fatalf("%+v: after %g s %.17g m/s and %.17g m/s^2, want %.17g and %.17g", c, at, v, a, from, rate)
			}
		}
	}
}

// TestSmoothRamps tries that the acceleration of a smooth way is continuous,
// none at both ends of a ramp, 3/2 of speed by ramp at its middle: it changes
// by 6 speed by ramp^2 a second at most.
func TestSmoothRamps(t *testing.T) {
	const steps = 4000
	for _, c := range ends {
		_, p := plan(t, 18, 0.5, rigger(), model.Station{}, model.Leg{Kind: model.Climb, Distance: c.way, Speed: c.speed, Ramp: c.ramp})
		peak, total := math.Min(c.speed, c.way/c.ramp), p.Duration()
		last := 0.0
		for k := 0.0; k <= steps; k++ {
			_, a := inward(p, total*k/steps)
			if math.Abs(a-last) > 6*peak/(c.ramp*c.ramp)*total/steps*(1+1e-9) {
				t.Fatalf("%+v: after %g s the acceleration jumps from %g to %g m/s^2", c, total*k/steps, last, a)
			}
			last = a
		}
		if last != 0 {
			t.Errorf("%+v: ends with %g m/s^2", c, last)
		}
		if _, a := inward(p, c.ramp/2); math.Abs(a-1.5*peak/c.ramp) > 64*epsilon*peak/c.ramp {
			t.Errorf("%+v: the middle of the ramp has %.17g m/s^2, want %.17g", c, a, 1.5*peak/c.ramp)
		}
	}
}

// TestProfileOfRising tries that standing up and sitting down take a steady
// profile too.
func TestProfileOfRising(t *testing.T) {
	for _, kind := range []model.LegKind{model.StandUp, model.SitDown} {
		for _, steady := range []bool{false, true} {
			leg := model.Leg{Kind: kind, Distance: 0.6, Speed: 1, Ramp: 0.45, Trapezoid: steady}
			_, p := plan(t, 18, 0.5, rigger(), model.Station{}, leg)
			f := p.At(0.45 / 4)
			u, share := 0.25, 0.25
			if !steady {
				share = u * u * (3 - 2*u)
			}
			want := share
			if kind == model.SitDown {
				want = -share
			}
			if got := -f.Body(1).Vel.X; math.Abs(got-want) > 16*epsilon {
				t.Errorf("leg %d, steady %t: a quarter of the ramp has %.17g m/s upward, want %.17g", kind, steady, got, want)
			}
		}
	}
}

// TestNoRamp tries a way without ramps: at its speed from end to end.
func TestNoRamp(t *testing.T) {
	for _, steady := range []bool{false, true} {
		_, p := plan(t, 18, 0.5, rigger(), model.Station{}, model.Leg{Kind: model.Climb, Distance: 3, Speed: 0.5, Trapezoid: steady})
		if p.Duration() != 6 {
			t.Errorf("takes %g s, want 6", p.Duration())
		}
		if v, a := inward(p, 1); v != 0.5 || a != 0 {
			t.Errorf("goes at %g m/s and %g m/s^2, want 0.5 and none", v, a)
		}
	}
}
