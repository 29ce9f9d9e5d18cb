package published

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// The Earth as a habitat that turns slowly, far out from the axis of which a
// site stands on its surface, with ambient gravity toward a centre of the axis.
// What falls comes nearer to the axis and drifts spinward, which is east.
const (
	siderealRate = 7.292e-5 // rad/s
	earthRadius  = 6.371e6  // m
	surfaceG     = 9.81     // m/s^2, where a source gives none
)

// site is a place on the Earth, on the meridian of spinward zero, whose plumb
// line has the angle of the latitude with the equator: gravity leads to a point
// of the axis such that, less the centrifugal part, it weighs surfaceG along
// the plumb line.
type site struct {
	at, up   r3.Vec  // m, habitat components; and the plumb line
	strength float64 // m/s^2, at the Earth's radius from the centre
}

func newSite(latitude float64) site {
	sin, cos := math.Sincos(latitude)
	outward := siderealRate * siderealRate * earthRadius
	whole := r3.Vec{X: -(surfaceG + outward) * cos, Z: -surfaceG * sin}
	from := r3.Scale(-earthRadius/(surfaceG+outward), whole) // from the centre, which is at axial -R
	return site{at: r3.Sub(from, r3.Vec{Z: earthRadius}), up: r3.Vec{X: cos, Z: sin},
		strength: r3.Norm(whole) * r3.Norm2(from) / (earthRadius * earthRadius)}
}

// toml is a scenario of a point let go at a height (m) over the site with a
// speed (m/s) up the plumb line. The room is a ring that the fall stays within.
func (s *site) toml(height, up, time float64, gravity string) string {
	from := r3.Add(s.at, r3.Scale(height, s.up))
	return fmt.Sprintf(`
format = 1
habitat = { floor_radius = "%.17g m", ceiling_radius = "%.17g m", spin = "%g rad/s", ambient_gravity = { %s } }
air = { none = true }
[[release]]
name = "fall"
at = { radius = "%.17g m", axial = "%.17g m" }
velocity = { up = "%.17g m/s", axial = "%.17g m/s" }
until = "%g s"
`, s.at.X+1e5, s.at.X-1e5, siderealRate, gravity, from.X, from.Z, -up*s.up.X, up*s.up.Z, time)
}

// central is the pull of the Earth.
func (s *site) central() string {
	return fmt.Sprintf(`central = { strength = "%.17g m/s^2", distance = "%.17g m", direction = "-axial" }`, s.strength, earthRadius)
}

// drift is how far east of the plumb line the point is, m, when it is level
// with the site again.
func (s *site) drift(r *ran) float64 {
	off := func(time float64) r3.Vec { return r3.Sub(r.local(time).Pos, s.at) }
	lo, hi := 0.01, r.results[0].Track.End // a throw from the ground is up by then
	if r3.Dot(off(lo), s.up) <= 0 || r3.Dot(off(hi), s.up) > 0 {
		return math.NaN()
	}
	for range 60 {
		if mid := (lo + hi) / 2; r3.Dot(off(mid), s.up) > 0 {
			lo = mid
		} else {
			hi = mid
		}
	}
	return off(hi).Y
}

// falls are bodies that fall down towers and shafts of the turning Earth, and
// one that is thrown up.
func falls() (out []Check) {
	for _, c := range []struct {
		source, name           string
		latitude, height, up   float64 // rad, m, m/s
		published, tol, factor float64 // in mm, or m by the factor
		unit                   string
	}{
		{"Kibble & Berkshire, Classical Mechanics, eq. 5.23: about 16 mm", "100 m at 45 deg", 45 * degree, 100, 0, 16, 0.5, 1e3, "mm"},
		{"UCSD Physics 110B notes: about 1.9 cm", "100 m at 32 deg", 32 * degree, 100, 0, 19, 0.5, 1e3, "mm"},
		{"Holton, An Introduction to Dynamic Meteorology, problem 1.8 (at second hand)", "5 km at the equator", 0, 5000, 0, 7.8, 0.05, 1, "m"},
		{"Reich 1831, Freiberg, theory, to 1 % (at second hand)", "158.5 m at Freiberg", (50 + 53.0/60 + 12.5/3600) * degree, 158.5, 0, 27.5, 0.275, 1e3, "mm"},
		{"Hall 1902, Harvard, theory (part, and the latitude, from memory)", "23 m at Harvard", 42.38 * degree, 23, 0, 1.79, 0.005, 1e3, "mm"},
		{"university problem set (statement seen)", "thrown up at 50 m/s at 45 deg, west", 45 * degree, 0, 50, 89.3, 0.05, -1e3, "mm"},
	} {
		s := newSite(c.latitude)
		time := 1.01 * (c.up + math.Sqrt(c.up*c.up+2*surfaceG*c.height)) / surfaceG
		out = append(out, Check{Group: "Drift, east, of what falls on the turning Earth", Source: c.source, Name: c.name, Unit: c.unit, Published: c.published, Tolerance: c.tol,
			toml: s.toml(c.height, c.up, time, s.central()), value: func(r *ran) float64 { return c.factor * s.drift(r) }})
	}
	return append(out, fixedPull())
}

// fixedPull is a fall under gravity of fixed direction: the plumb line turns
// away from it, which adds half as much again.
func fixedPull() Check {
	s := newSite(0)
	pull := fmt.Sprintf(`uniform = { strength = "%.17g m/s^2", direction = "inward" }`, surfaceG+siderealRate*siderealRate*earthRadius)
	return Check{Group: "Drift, east, of what falls on the turning Earth", Source: "Kibble & Berkshire, eq. 5.23, times 3/2 (derived)",
		Name: "100 m at the equator, gravity of fixed direction", Unit: "mm", Published: 33.0, Tolerance: 0.05,
		toml: s.toml(100, 0, 5, pull), value: func(r *ran) float64 { return 1e3 * s.drift(r) }}
}
