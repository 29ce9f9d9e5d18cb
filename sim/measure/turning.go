package measure

import (
	"math"
	"sort"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/frame"
	"offplumb/sim/model"
	"offplumb/sim/table"
)

// Turning is how the habitat turns at one instant, and what that does to
// something at rest on the reference floor, at spinward zero and axial zero. SI
// units.
type Turning struct {
	Time                    float64
	Spin, Turned            float64 // rad/s, rad
	Gravity, Euler          float64 // m/s^2, magnitudes
	TiltSpinward, TiltAxial float64 // rad, where a plumb bob hangs; NaN: no gravity
	Friction                float64 // side by weight: the friction that holds it; NaN: no weight
}

// mostTurnings bounds the rows of spin.csv but for those about kinks.
const mostTurnings = 2000

// Turnings gives how the habitat turns from time 0 to a later one (s): at the
// output step, or a whole multiple of it, and just before and at each kink.
func Turnings(m *model.Model, end float64) []Turning {
	step := m.Output.Step * math.Max(1, math.Ceil(end/m.Output.Step/mostTurnings))
	times, _ := Times(end, step)
	for at := m.Motion.Stretch(0).End; at < end; at = m.Motion.Stretch(at).End {
		times = append(times, math.Nextafter(at, 0), at)
	}
	sort.Float64s(times)
	var out []Turning
	for i, t := range times {
		if i == 0 || t > times[i-1] {
			out = append(out, TurningAt(m, t))
		}
	}
	return out
}

// TurningAt gives how the habitat turns at a time, s.
func TurningAt(m *model.Model, t float64) Turning {
	a := m.Motion.At(t)
	p := a.Apparent(frame.State{Pos: r3.Vec{X: m.Habitat.FloorRadius}})
	whole := r3.Add(p.Sum(), m.AmbientAt(t, r3.Vec{X: m.Habitat.FloorRadius}))
	out := Turning{Time: t, Spin: m.SpinAt(t), Turned: m.Turned(t), Euler: r3.Norm(p.Euler), Gravity: r3.Norm(whole),
		TiltSpinward: math.NaN(), TiltAxial: math.NaN(), Friction: math.NaN()}
	s, z, up := frame.LocalAt(0).Split(whole)
	if out.Gravity > 0 {
		out.TiltSpinward, out.TiltAxial = math.Atan2(s, -up), math.Atan2(z, -up)
	}
	if up < 0 {
		out.Friction = math.Hypot(s, z) / -up
	}
	return out
}

// turningColumns are those of spin.csv.
var turningColumns = []column[Turning]{
	{key: "time", unit: second, meaning: "time of the scenario", num: func(t *Turning) float64 { return t.Time }},
	{key: "spin", unit: turns, meaning: "spin rate, positive: the floor moves spinward; where the axis cones, the part of the angular velocity along it", num: func(t *Turning) float64 { return t.Spin }},
	{key: "turned", unit: degree, meaning: "angle by which the habitat has turned since time 0", num: func(t *Turning) float64 { return t.Turned }},
	{key: "gravity", unit: gravity, meaning: "apparent gravity at rest on the reference floor, ambient gravity included, at spinward and axial zero", num: func(t *Turning) float64 { return t.Gravity }},
	{key: "a_euler", unit: accelUnit, meaning: "magnitude of the Euler acceleration there", num: func(t *Turning) float64 { return t.Euler }},
	{key: "tilt_spinward", unit: degree, partly: true, meaning: "angle from the deck's normal at which a plumb bob there hangs spinward; empty without gravity", num: func(t *Turning) float64 { return t.TiltSpinward }},
	{key: "tilt_axial", unit: degree, partly: true, meaning: "angle from the deck's normal at which it hangs toward +axial", num: func(t *Turning) float64 { return t.TiltAxial }},
	{key: "friction_demand", partly: true, meaning: "side load by weight of what is at rest there: the friction that holds it; empty without weight", num: func(t *Turning) float64 { return t.Friction }},
}

// TurningTable is spin.csv: how the habitat turns, a row for each instant.
func TurningTable(rows []Turning) *table.Table { return fill(turningColumns, rows) }
