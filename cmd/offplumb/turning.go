package main

import (
	"fmt"
	"math"
	"strings"

	"offplumb/plots"
	"offplumb/sim/flight"
	"offplumb/sim/frame"
	"offplumb/sim/measure"
	"offplumb/sim/model"
	"offplumb/sim/table"
)

// turningTables are those of a habitat whose turning changes.
func turningTables(j *job) []task {
	if !j.model().Unsteady() {
		return nil
	}
	return []task{tableTask("spin.csv", "spin", "", "How the habitat turns: a row for each instant.", measure.TurningTable(j.Turnings(j.results)))}
}

// turningFigures are its figures.
func turningFigures(j *job) []drawing {
	if !j.model().Unsteady() {
		return nil
	}
	return []drawing{{file: "spin", of: "spin", make: func() (*plots.Figure, error) { return j.spinChart() }}}
}

// spinChart draws the spin and what it does on the floor against time.
func (j *job) spinChart() (*plots.Figure, error) {
	m := j.model()
	spec := plots.StackChartSpec{Title: "How the habitat turns, and what something at rest on the floor feels", Spin: m.Habitat.Spin,
		Spins: turningWords(m), Axis: "time, s",
		Notes: fmt.Sprintf("On the floor at %s m, spinward 0, axial 0. Tilt: where a plumb bob hangs, from the deck's normal.", given(m.Habitat.FloorRadius))}
	var spin, weight, euler, along, across []float64
	for _, t := range j.Turnings(j.results) {
		spec.X = append(spec.X, t.Time)
		spin, weight, euler = append(spin, rpm(t.Spin)), append(weight, t.Gravity/model.StandardGravity), append(euler, t.Euler)
		along, across = append(along, t.TiltSpinward*180/math.Pi), append(across, t.TiltAxial*180/math.Pi)
	}
	spec.Panels = []plots.PanelSpec{
		{Title: "spin, rpm", Curves: []plots.CurveSpec{{Y: spin}}},
		{Title: "apparent gravity, g", Curves: []plots.CurveSpec{{Y: weight}}},
		{Title: "Euler acceleration, m/s²", Curves: []plots.CurveSpec{{Y: euler}}},
		{Title: "tilt, deg", Curves: []plots.CurveSpec{{Name: "spinward", Y: along}, {Name: "axial", Y: across}}},
	}
	spec.Desc = described("Spin rate, apparent gravity, Euler acceleration and tilt on the floor against time. %s", spec.Spins)
	return plots.StackChart(spec)
}

// turningWords says in a sentence or two how the spin changes and the axis
// cones; "" where neither does.
func turningWords(m *model.Model) string {
	var out []string
	if m.SpinChanges() {
		out = append(out, "The spin changes: "+changeWords(m)+".")
	}
	if c := m.Habitat.Coning; m.Cones() {
		out = append(out, fmt.Sprintf("The axis cones: half angle %s deg, once in %s s%s.", given(c.HalfAngle*180/math.Pi), given(math.Abs(c.Period)), against(c.Period)))
	}
	return strings.Join(out, " ")
}

// against says which way an axis cones, where it is the less usual one.
func against(period float64) string {
	if period < 0 {
		return ", against positive spin"
	}
	return ""
}

// changesShown bounds the changes told one by one.
const changesShown = 4

func changeWords(m *model.Model) string {
	from := m.Habitat.Spin
	var out []string
	for i, c := range m.Habitat.Changes {
		if i == changesShown {
			return strings.Join(out, ", ") + fmt.Sprintf(", and %d more, to %s rpm at last", len(m.Habitat.Changes)-i, given(rpm(m.SpinAt(m.Settled()))))
		}
		out = append(out, fmt.Sprintf("%s to %s rpm between %s and %s s", given(rpm(from)), given(rpm(c.To)), given(c.Start), given(c.End())))
		from = c.To
	}
	return strings.Join(out, ", ")
}

// meanwhile says, for the notes of a figure of one release, what the spin was
// at its release and at its end, and that the axis cones; "" of a steady one.
func (j *job) meanwhile(t *flight.Track, end float64) string {
	m := j.model()
	s := ""
	if from, to := m.SpinAt(t.Begin), m.SpinAt(t.Begin+end); m.SpinChanges() && from != to {
		s += fmt.Sprintf(" The spin changes meanwhile, from %s to %s rpm.", table.Round(rpm(from), 3), table.Round(rpm(to), 3))
	}
	if m.Cones() {
		s += fmt.Sprintf(" The axis cones, half angle %s deg; what leans out of the view is projected.", given(m.Habitat.Coning.HalfAngle*180/math.Pi))
	}
	return s
}

// fastest is the greatest turning rate while a track lasts, rad/s.
func (j *job) fastest(t *flight.Track, end float64) float64 {
	omega, _ := j.model().Motion.Bounds(t.Begin, t.Begin+end)
	return omega
}

// turnedAt is the angle (rad) by which the habitat is turned in the view from
// outside at a time (s): laps count. Where the axis cones, it is that at which
// the radius at phi (rad) is seen.
func turnedAt(m *model.Model, t, phi float64) float64 {
	turned := m.Turned(t)
	if !m.Cones() {
		return turned
	}
	a := m.Motion.At(t)
	out := a.Out(frame.Polar{R: 1, Phi: phi}.Vec())
	return frame.Unwind(math.Atan2(out.Y, out.X)-phi, turned)
}

// spinRecord is a change of the spin in run.json, coningRecord the coning: by
// the keys of the scenario.
type spinRecord struct {
	Start number `json:"start_s"`
	Over  number `json:"over_s"`
	To    number `json:"to_rad_s"`
	Ramp  string `json:"ramp"`
}

type coningRecord struct {
	HalfAngle number `json:"half_angle_deg"`
	Period    number `json:"period_s"`
	Phase     number `json:"phase_deg"`
}

// habitatOf is the habitat in run.json; what it says of gravity and spin is of
// the time before any change.
func habitatOf(m *model.Model) habitatRecord {
	h := &m.Habitat
	out := habitatRecord{Spin: number(h.Spin), Radius: number(h.FloorRadius), Gravity: number(m.Gravity(h.FloorRadius))}
	for _, c := range h.Changes {
		out.Changes = append(out.Changes, spinRecord{number(c.Start), number(c.Over), number(c.To), rampWords(c.Linear)})
	}
	if c := h.Coning; m.Cones() {
		out.Coning = &coningRecord{number(degreesOf(c.HalfAngle)), number(c.Period), number(degreesOf(c.Phase))}
	}
	return out
}
