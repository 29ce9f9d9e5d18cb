package published

import (
	"fmt"
	"math"

	"offplumb/sim/air"
	"offplumb/sim/model"
)

// airs are the air's density and viscosity.
func airs() (out []Check) {
	for _, c := range []struct{ kelvin, pascal, density, half, viscosity, half2 float64 }{
		{288.15, 101325, 1.225, 5e-4, 1.7894e-5, 5e-10},
		{275.15, 79501, 1.0066, 5e-5, 1.726e-5, 5e-9},
	} {
		check := Check{Group: "Air", Source: "US Standard Atmosphere 1976 (seen)",
			toml: wheel(20, `spin = "3 rpm"`) + fmt.Sprintf("air = { pressure = \"%g Pa\", temperature = \"%g K\" }\n", c.pascal, c.kelvin)}
		state := fmt.Sprintf(" at %g K and %g Pa", c.kelvin, c.pascal)
		check.Name, check.Unit, check.Published, check.Tolerance = "density"+state, "kg/m^3", c.density, c.half
		check.value = func(r *ran) float64 { return r.Model.Air.Density }
		out = append(out, check)
		check.Name, check.Unit, check.Published, check.Tolerance = "viscosity"+state, "Pa s", c.viscosity, c.half2
		check.value = func(r *ran) float64 { return r.Model.Air.Viscosity }
		out = append(out, check)
	}
	return out
}

// dragBand is how far measured curves of smooth spheres lie apart, as a share.
const dragBand = 0.1

// spheres are drag coefficients of smooth spheres.
func spheres() (out []Check) {
	add := func(source string, re, cd float64) {
		out = append(out, Check{Group: "Drag coefficient of a smooth sphere", Source: source, Name: fmt.Sprintf("Re %g", re), Published: cd, Tolerance: dragBand * cd,
			value: func(*ran) float64 { return air.CliftGauvin{}.CdRe(re) / re }})
	}
	for _, c := range [][2]float64{{3.02, 10.86}, {7.015, 5.623}, {15.49, 3.388}, {57.54, 1.479}, {144.5, 0.9204}, {264.9, 0.7194}, {512.9, 0.5623}, {1000, 0.4786},
		{1862, 0.4365}, {3162, 0.4074}, {4764, 0.3890}, {8375, 0.3981}, {15560, 0.4395}, {26480, 0.4571}, {34670, 0.4775}, {58880, 0.4732}} {
		add("standard drag curve, table of a university course, IUP (seen)", c[0], c[1])
	}
	for _, c := range [][2]float64{{10, 4.29}, {30, 2.11}, {57, 1.51}, {100, 1.10}, {300, 0.63}} {
		add("Pruppacher & Klett, Microphysics of Clouds and Precipitation, table 10.1 (at second hand)", c[0], c[1])
	}
	return out
}

// fall is a scenario of a sphere dropped through air where gravity is uniform,
// but for a millionth. The habitat is so wide that the spin takes no part.
func fall(height, diameter, mass, gravity float64, air string) string {
	return fmt.Sprintf(`
format = 1
habitat = { floor_radius = "2300 km", floor_gravity = "%.17g m/s^2" }
air = { %s }
body = [{ name = "ball", mass = "%.17g kg", diameter = "%.17g m" }]
[[release]]
name = "fall"
body = "ball"
at = { height = "%.17g m" }
until = "landing"
`, gravity, air, mass, diameter, height+diameter/2)
}

func sphereMass(diameter, density float64) float64 {
	return density * math.Pi / 6 * diameter * diameter * diameter
}

// raindrops fall until they keep their speed. Their weight is less the
// buoyancy.
func raindrops() (out []Check) {
	const water = 998.2 // kg/m^3 at 20 degC
	a := air.FromPressure(101325, 293.15)
	for _, c := range []struct{ mm, published float64 }{{0.3, 1.17}, {0.4, 1.62}, {0.5, 2.06}, {0.6, 2.47}, {0.8, 3.27}, {1.0, 4.03}, {1.2, 4.64}} {
		d, v := c.mm*1e-3, c.published
		out = append(out, Check{Group: "Water drops in still air", Source: "Gunn & Kinzer 1949, J. Meteorol. 6:243 (at second hand)",
			Name: fmt.Sprintf("terminal speed, %g mm", c.mm), Unit: "m/s", Published: v, Tolerance: 0.05 * v,
			toml:  fall(100*v*v/model.StandardGravity, d, sphereMass(d, water), model.StandardGravity*(1-a.Density/water), `pressure = "101325 Pa", temperature = "293.15 K"`),
			value: func(r *ran) float64 { return r.landing().Speed }})
	}
	return out
}

// globes are the glass ones of 1710, which were weighed in air. The air is
// taken at 15 degC, foot and inch as today's.
func globes() (out []Check) {
	const grain, inch, foot = 64.79891e-6, 0.0254, 0.3048
	a := air.FromPressure(101325, 288.15)
	for _, c := range []struct{ grains, inches, seconds float64 }{{510, 5.1, 8.20}, {642, 5.2, 7.70}, {599, 5.1, 7.70}, {515, 5.0, 7.95}, {483, 5.0, 8.20}, {641, 5.2, 7.70}} {
		d, weighed := c.inches*inch, c.grains*grain
		mass := weighed + sphereMass(d, a.Density)
		out = append(out, Check{Group: "Glass globes dropped 220 ft", Source: "Newton, Principia, book II, section VII, scholium, experiment 13 (seen)",
			Name: fmt.Sprintf("%g grains, %g in", c.grains, c.inches), Unit: "s", Published: c.seconds, Tolerance: 0.05 * c.seconds,
			toml:  fall(220*foot, d, mass, model.StandardGravity*weighed/mass, `pressure = "101325 Pa", temperature = "288.15 K"`),
			value: func(r *ran) float64 { return r.landing().Time }})
	}
	return out
}
