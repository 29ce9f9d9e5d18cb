package published

import (
	"fmt"
	"math"
)

// rebounds are of balls with the restitution that the middle of the rule's
// band implies.
func rebounds() (out []Check) {
	const group = "Rebound of a ball with the restitution of its rules, e = sqrt(h2/h1)"
	for _, c := range []struct {
		source                    string
		from, low, high, diameter float64 // m
	}{
		{"ITF, rules of tennis (seen)", 2.54, 1.35, 1.47, 0.067},
		{"ITTF, table tennis ball (at second hand)", 0.305, 0.24, 0.26, 0.04},
		{"FIFA Quality football (seen)", 2, 1.15, 1.65, 0.22},
	} {
		middle := (c.low + c.high) / 2
		out = append(out, Check{Group: group, Source: c.source, Name: fmt.Sprintf("rise after a drop of %g m", c.from), Unit: "m",
			Published: middle, Tolerance: (c.high - c.low) / 2, toml: bounce(c.from, c.diameter, math.Sqrt(middle/c.from)),
			value: func(r *ran) float64 { return r.rise(c.diameter / 2) }})
	}
	return append(out, Check{Group: group, Source: "FIFA Quality football (seen)", Name: "speed on the plate after 2 m", Unit: "m/s",
		Published: 6.25, Tolerance: 0.15, toml: bounce(2, 0.22, math.Sqrt(0.7)), value: func(r *ran) float64 { return r.landing().Speed }})
}

// bounce is a scenario of a ball dropped where gravity is all but uniform.
func bounce(from, diameter, restitution float64) string {
	return fmt.Sprintf(`
format = 1
habitat = { floor_radius = "2300 km", floor_gravity = "1 g" }
air = { none = true }
body = [{ name = "ball", mass = "0.1 kg", diameter = "%.17g m", restitution = %.17g }]
[[release]]
name = "ball"
body = "ball"
at = { height = "%.17g m" }
until = "3 s"
`, diameter, restitution, from+diameter/2)
}

// rise is how high (m) the first release rises between its first two impacts,
// for a body of a radius (m).
func (r *ran) rise(radius float64) float64 {
	t := r.results[0].Track
	if len(t.Impacts) < 2 {
		return math.NaN()
	}
	top := math.Inf(-1)
	const looks = 2000 // of them the best misses the top by g (T/looks)^2/8, less than a micrometre
	for k := range looks + 1 {
		time := t.Impacts[0].Time + (t.Impacts[1].Time-t.Impacts[0].Time)*float64(k)/looks
		p := r.local(time).Pos
		top = math.Max(top, r.Model.Habitat.FloorRadius-math.Hypot(p.X, p.Y)-radius)
	}
	return top
}

// energies are those of test drops of helmets.
func energies() []Check {
	const group = "Energy of a test drop"
	toml := fall(1, 0, 5, 9.80665, "none = true")
	return []Check{
		{Group: group, Source: "EN 397, helmets (seen)", Name: "5.0 kg from 1 m", Unit: "J", Published: 49, Tolerance: 0.5, toml: toml, value: func(r *ran) float64 { return r.landing().Energy }},
		{Group: group, Source: "EN 397, helmets (seen)", Name: "its speed", Unit: "m/s", Published: 4.43, Tolerance: 0.005, toml: toml, value: func(r *ran) float64 { return r.landing().Speed }},
		{Group: group, Source: "ANSI/ISEA Z89.1, helmets (at second hand)", Name: "3.6 kg at 5.5 m/s", Unit: "J", Published: 54.5, Tolerance: 0.5,
			toml: fall(5.5*5.5/2/9.80665, 0, 3.6, 9.80665, "none = true"), value: func(r *ran) float64 { return r.landing().Energy }},
	}
}
