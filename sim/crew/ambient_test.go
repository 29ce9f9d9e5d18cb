package crew_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/model"
)

// TestStandingUnderAmbient holds what somebody who stands feels to the sum of
// the centrifugal part and the ambient pull: along the axis it leans the bob by
// atan(g/(omega^2 r)); across it, at the lowest place, it adds up.
func TestStandingUnderAmbient(t *testing.T) {
	const radius, spin, g = 12.0, 0.6, 1.62
	for _, c := range []struct {
		name        string
		pull        r3.Vec
		feet, axial float64 // m/s^2 at the feet; axial part by mass
	}{
		{"along the axis", r3.Vec{Z: -1}, math.Hypot(spin*spin*radius, g), -g},
		{"down at the lowest place", r3.Vec{X: 1}, spin*spin*radius + g, 0},
	} {
		m, plan := plan(t, radius, spin, rigger(), model.Station{}, model.Leg{Kind: model.Stand, Duration: 1})
		m.Ambient = model.Ambient{Strength: g, Direction: c.pull}
		l := plan.Loads(m, 0)
		if math.Abs(l.GravityFeet-c.feet) > 1e-12 {
			t.Errorf("%s: feet feel %.15g m/s^2, want %.15g", c.name, l.GravityFeet, c.feet)
		}
		if want := c.axial * plan.Crew.Mass; math.Abs(l.SideAxial-want) > 1e-10 {
			t.Errorf("%s: the side load is %.12g N, want %.12g", c.name, l.SideAxial, want)
		}
		waist := spin * spin * (radius - plan.Crew.Waist*plan.Crew.Stature)
		if want := math.Abs(c.axial) / (waist + g*c.pull.X); math.Abs(l.FrictionDemand-want) > 1e-12 {
			t.Errorf("%s: the friction demand is %.12g, want %.12g", c.name, l.FrictionDemand, want)
		}
		if want := math.Atan2(c.axial, waist+g*c.pull.X); math.Abs(l.TiltAxial-want) > 1e-12 {
			t.Errorf("%s: the bob leans %.12g rad, want %.12g", c.name, l.TiltAxial, want)
		}
	}
}
