package published

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/frame"
	"offplumb/sim/measure"
)

const degree = math.Pi / 180

// landing is the landing of the first release.
func (r *ran) landing() *measure.Landing { return &r.results[0].Landing }

// local is the first release's state in the habitat, at a time since the
// release (s).
func (r *ran) local(time float64) frame.State {
	t := r.results[0].Track
	a := r.Model.Motion.At(t.Begin + time)
	return a.ToHabitat(t.At(time))
}

// drop is a scenario of a point let go in vacuum.
func drop(radius, height float64, spin string) string {
	return fmt.Sprintf(`
format = 1
habitat = { floor_radius = "%.17g m", %s }
air = { none = true }
[[release]]
name = "drop"
at = { height = "%.17g m" }
until = "landing"
`, radius, spin, height)
}

// drops are those of a point in vacuum: the arc by the radius is the involute
// function of the angle whose cosine is that of the radii of release and floor.
func drops() (out []Check) {
	const gears, handbook = "ISO 21771:2007, worked gear sheet", "Machinery's Handbook, involute functions (from memory)"
	for _, c := range []struct {
		deg, inv, tol float64
		source        string
	}{
		{21.2990642859, 0.0181260949, 1e-9, gears},
		{23.8707609654, 0.0259052382, 1e-9, gears},
		{20, 0.014904, 5e-7, "general gear tables"},
		{14.5, 0.0055448, 5e-8, handbook},
		{15, 0.0061498, 5e-8, handbook},
		{25, 0.0299753, 5e-8, handbook},
		{30, 0.0537515, 5e-8, handbook},
		{45, 0.2146018366, 5e-11, "exact: 1 - pi/4"},
	} {
		const radius = 20
		out = append(out, Check{Group: "A drop in vacuum lands the involute function of acos(r0/R) behind, in radii of the floor", Source: c.source,
			Name: fmt.Sprintf("inv(%.12g deg)", c.deg), Published: c.inv, Tolerance: c.tol,
			toml:  drop(radius, radius*(1-math.Cos(c.deg*degree)), `spin = "0.5 rad/s"`),
			value: func(r *ran) float64 { return -r.landing().Offset / radius }})
	}
	return out
}

// pucks slide without friction on a turntable: free flight, seen from it.
func pucks() (out []Check) {
	for _, c := range []struct{ vx, vy, x1, y1, x2, y2 float64 }{
		{0, 1, 2.223244, 0.239134, 3.221043, -2.573885},
		{0, 0, 1.381773, -0.301169, 1.402448, -1.741591},
		{0, -1, 0.540302, -0.841471, -0.416147, -0.909297},
		{-0.5, -0.5, 0.690887, -0.150584, 0.909297, -0.416147},
	} {
		toml := fmt.Sprintf(`
format = 1
habitat = { floor_radius = "6 m", spin = "1 rad/s" }
air = { none = true }
[[release]]
name = "puck"
at = { radius = "1 m" }
velocity = { spinward = "%g m/s", up = "%g m/s" }
until = "2 s"
`, c.vy, -c.vx)
		for i, want := range []float64{c.x1, c.y1, c.x2, c.y2} {
			time, axis := float64(1+i/2), []string{"x", "y"}[i%2]
			out = append(out, Check{Group: "A puck without friction on a turntable, let go at x = 1 m",
				Source: "Taylor, Classical Mechanics, problems 9.20 and 9.24 (seen; numbers from eq. 9.72)",
				Name:   fmt.Sprintf("%s at %g s, v0 = (%g, %g) m/s", axis, time, c.vx, c.vy), Unit: "m", Published: want, Tolerance: 5e-7,
				toml: toml, value: func(r *ran) float64 {
					p := r.local(time).Pos
					return []float64{p.X, p.Y}[i%2]
				}})
		}
	}
	return out
}

// catches is a throw along a diameter that meets its thrower half a turn
// later.
func catches() []Check {
	toml := fmt.Sprintf(`
format = 1
habitat = { floor_radius = "40 m", spin = "1 rpm" }
air = { none = true }
[[release]]
name = "throw"
at = { radius = "30 m" }
velocity = { spinward = "%.17g m/s", up = "2 m/s" }
until = "30 s"
`, -math.Pi)
	c := Check{Group: "A throw along a diameter is caught by its thrower half a turn later", Source: "university problem set on rotating frames, author not named (statement seen, answer derived)", toml: toml}
	var out []Check
	for _, f := range []struct {
		name, unit     string
		published, tol float64
		value          func(*ran) float64
	}{
		{"speed as the thrower sees it", "m/s", 3.724, 5e-4, func(r *ran) float64 { return r3.Norm(r.local(0).Vel) }},
		{"inertial speed", "m/s", 2, 5e-4, func(r *ran) float64 { return r3.Norm(r.results[0].Track.First.Vel) }},
		{"distance from the thrower after half a turn", "m", 0, 1e-9, func(r *ran) float64 { return r3.Norm(r3.Sub(r.local(30).Pos, r.local(0).Pos)) }},
	} {
		c.Name, c.Unit, c.Published, c.Tolerance, c.value = f.name, f.unit, f.published, f.tol, f.value
		out = append(out, c)
	}
	return out
}

// small are drops from 1.5 m.
func small() (out []Check) {
	for _, c := range []struct{ radius, published float64 }{{895, 0.05800}, {224, 0.11655}, {56, 0.23815}, {9, 0.69875}} {
		out = append(out, Check{Group: "Deflection of a drop from 1.5 m", Source: "closed form, R inv(acos(1 - h/R)); (2 sqrt 2/3) h sqrt(h/R) for small heights (derived)",
			Name: fmt.Sprintf("R = %g m", c.radius), Unit: "m", Published: c.published, Tolerance: 5e-6,
			toml: drop(c.radius, 1.5, `floor_gravity = "1 g"`), value: func(r *ran) float64 { return -r.landing().Deflection }})
	}
	return out
}

// beadAside is how far (m) the bead's centre line lies antispinward of the
// radial one: away from the other wall, so that it stays only if it is pressed
// to the side that the Coriolis acceleration tells.
const beadAside = 0.5

// bead is a scenario of a ball let go against the antispinward wall of a turning
// spoke, at rest, 8 m out along it.
func bead(friction float64) string {
	const out = 8.0
	return fmt.Sprintf(`
format = 1
habitat = { floor_radius = "60 m", ceiling_radius = "50 m", length = "10 m", spin = "0.6 rad/s" }
air = { none = true }
room = [{ name = "hub", floor_radius = "3 m", length = "8 m" }]
passage = [{ name = "spoke", from_radius = "3 m", to_radius = "50 m", width = "1.1 m" }]
body = [{ name = "bead", mass = "0.3 kg", diameter = "0.1 m", restitution = 0, friction = %g }]
[[release]]
name = "bead"
body = "bead"
at = { radius = "%.17g m", spinward = "%.17g rad" }
`, friction, math.Hypot(out, beadAside), math.Atan2(-beadAside, out))
}

// beads are pressed on the wall of a turning spoke and slide out along it. With
// the centre line beside the radial one by b, x - mu b follows the closed form
// of one that is on it (derived).
func beads() (out []Check) {
	const spin, r0 = 0.6, 8
	c := Check{Group: "A bead on a turning rod, from rest", Source: "Kleppner & Kolenkow, An Introduction to Mechanics (statement seen)", toml: bead(0)}
	c.Name, c.Published, c.Tolerance = "r/r0 at omega t = 1.31695790", 2, 2e-8
	c.value = func(r *ran) float64 { return r.local(1.31695790/spin).Pos.X / r0 }
	out = append(out, c)
	c.Name, c.Published, c.Tolerance = "speed there, by omega r0", 1.73205081, 2e-8
	c.value = func(r *ran) float64 { return r.local(1.31695790/spin).Vel.X / (spin * r0) }
	out = append(out, c)
	c.Source = "exponents omega(-mu +- sqrt(1 + mu^2)), textbook form (derived)"
	for _, f := range []struct{ mu, published float64 }{{0, 3.76219569}, {0.1, 3.40854002}, {0.3, 2.87474581}} {
		c.Name, c.Published, c.toml = fmt.Sprintf("r/r0 at omega t = 2, friction %g", f.mu), f.published, bead(f.mu)
		c.value = func(r *ran) float64 {
			b := f.mu * beadAside
			return (r.local(2/spin).Pos.X - b) / (r0 - b)
		}
		out = append(out, c)
	}
	return out
}
