package published

import (
	"fmt"
	"math"

	"offplumb/sim/measure"
	"offplumb/sim/model"
)

const rpm = 2 * math.Pi / 60 // rad/s

// wheel is a scenario of a habitat alone.
func wheel(radius float64, spin string) string {
	return fmt.Sprintf("format = 1\nhabitat = { floor_radius = \"%g m\", %s }\n", radius, spin)
}

func (r *ran) habitat() measure.HabitatFigure { return measure.HabitatOf(r.Model, 0, 0) }

// wheels are the spin rates of printed examples.
func wheels() []Check {
	turns := func(r *ran) float64 { return r.habitat().Spin / rpm }
	rate := func(r *ran) float64 { return r.habitat().Spin }
	const serway = "Serway, Physics for Scientists and Engineers (seen)"
	const openStax = "OpenStax University Physics (statement seen, answer from memory)"
	out := []Check{
		{Source: "Taylor, Classical Mechanics, problem 9.2 (seen)", Name: "R = 40 m, 10 m/s^2", Unit: "rad/s", Published: 0.5, Tolerance: 1e-12, toml: wheel(40, `floor_gravity = "10 m/s^2"`), value: rate},
		{Source: serway, Name: "120 m across, 3.00 m/s^2", Unit: "rpm", Published: 2.14, Tolerance: 0.005, toml: wheel(60, `floor_gravity = "3 m/s^2"`), value: turns},
		{Source: serway, Name: "110 m across, 3.00 m/s^2", Unit: "rpm", Published: 2.23, Tolerance: 0.005, toml: wheel(55, `floor_gravity = "3 m/s^2"`), value: turns},
		{Source: serway, Name: "21 m across, 1 g", Unit: "rad/s", Published: 0.966, Tolerance: 0.0005, toml: wheel(10.5, `floor_gravity = "9.8 m/s^2"`), value: rate},
		{Source: openStax, Name: "200 m across, 9.80 m/s^2", Unit: "rpm", Published: 2.99, Tolerance: 0.005, toml: wheel(100, `floor_gravity = "9.8 m/s^2"`), value: turns},
		{Source: openStax, Name: "its rim speed", Unit: "m/s", Published: 31.3, Tolerance: 0.05, toml: wheel(100, `floor_gravity = "9.8 m/s^2"`), value: func(r *ran) float64 { return r.habitat().RimSpeed }},
	}
	for i := range out {
		out[i].Group = "Spin rate for a gravity"
	}
	return out
}

// radii give 1 g at whole spin rates; they are printed to 1 m.
func radii() (out []Check) {
	for _, c := range []struct{ turns, radius float64 }{{1, 894}, {2, 224}, {4, 56}, {6, 25}, {10, 9}} {
		out = append(out, Check{Group: "Radius for 1 g", Source: "Globus & Hall, Space Settlement Population Rotation Tolerance, 2017, abstract (seen)",
			Name: fmt.Sprintf("%g rpm", c.turns), Unit: "m", Published: c.radius, Tolerance: 0.5, toml: wheel(c.radius, fmt.Sprintf(`spin = "%g rpm"`, c.turns)),
			// Gravity grows with the radius.
			value: func(r *ran) float64 { return c.radius * model.StandardGravity / r.habitat().Gravity }})
	}
	return out
}

// people are what standing people feel.
func people() []Check {
	const taylor, benson = "Taylor, Classical Mechanics, problem 9.2 (seen)", "Benson, Guedry, Parker & Reschke, J. Vestib. Res. 7 (1997) 453 (seen; radius of the feet derived)"
	standing := func(radius float64, spin string, head float64) string {
		return fmt.Sprintf(`
format = 1
habitat = { floor_radius = "%[1]g m", %[2]s }
crew = [{ name = "person", mass = "75 kg", stature = "%[3]g m", head = 1, waist = 0.5 }]
[[crew_path]]
name = "stands"
crew = "person"
start = { }
legs = [{ stand = "1 s" }]
`, radius, spin, head)
	}
	feel := func(of func(feet, head float64) float64) func(*ran) float64 {
		return func(r *ran) float64 {
			l := r.Plans[0].Loads(r.Model, 0.5)
			return of(l.GravityFeet, l.GravityHead)
		}
	}
	out := []Check{
		{Source: taylor, Name: "head 2 m above a floor of 40 m: less by", Unit: "%", Published: 5, Tolerance: 1e-9, toml: standing(40, `floor_gravity = "10 m/s^2"`, 2),
			value: feel(func(feet, head float64) float64 { return 100 * (1 - head/feet) })},
		{Source: benson, Name: "ears 0.5 m beyond the axis, at 2.077 rad/s", Unit: "g", Published: 0.22, Tolerance: 0.005, toml: standing(0.818, `spin = "2.077 rad/s"`, 1.318),
			value: feel(func(_, head float64) float64 { return head / model.StandardGravity })},
		{Source: benson, Name: "feet 0.818 m from it", Unit: "g", Published: 0.36, Tolerance: 0.005, toml: standing(0.818, `spin = "2.077 rad/s"`, 1.318),
			value: feel(func(feet, _ float64) float64 { return feet / model.StandardGravity })},
	}
	for i := range out {
		out[i].Group = "What a standing person feels"
	}
	return out
}
