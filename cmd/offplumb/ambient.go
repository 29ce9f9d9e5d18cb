package main

import (
	"fmt"
	"math"

	"offplumb/sim/frame"
	"offplumb/sim/measure"
	"offplumb/sim/model"
	"offplumb/sim/table"
)

// ambientWords says in a sentence what pulls beside the spin; "" where nothing
// does.
func ambientWords(m *model.Model) string {
	if fact := ambientFact(m); fact != "" {
		return "Ambient gravity: " + fact + "."
	}
	return ""
}

// ambientFact is the same without the name.
func ambientFact(m *model.Model) string {
	g := m.Ambient
	switch {
	case g.None():
		return ""
	case g.Central():
		return fmt.Sprintf("%s m/s² at the habitat's origin, toward a centre %s m away, %s", given(g.Strength), given(g.Distance), toward(m))
	}
	return fmt.Sprintf("%s m/s², %s", given(g.Strength), toward(m))
}

// alongAxis is the share of a direction below which it counts as along the axis, or
// as across it.
const alongAxis = 1e-12

// toward says in words where the ambient pull leads, as the habitat stands at
// time 0.
func toward(m *model.Model) string {
	d := m.Ambient.Direction
	across := math.Hypot(d.X, d.Y)
	switch {
	case across < alongAxis && d.Z > 0:
		return "along the axis, toward +axial"
	case across < alongAxis:
		return "along the axis, toward -axial"
	}
	at := "across the axis"
	if math.Abs(d.Z) >= alongAxis {
		at = fmt.Sprintf("%s deg from the axis", table.Round(math.Acos(d.Z)*180/math.Pi, 3))
	}
	return fmt.Sprintf("%s, toward %s deg from spinward zero at time 0", at, table.Round(frame.WrapAngle(math.Atan2(d.Y, d.X))*180/math.Pi+0, 3))
}

// underAmbient says whether there is ambient gravity.
func (j *job) underAmbient() bool { return !j.model().Ambient.None() }

// feltWords says what is felt at rest on the reference floor under the ambient
// pull and the spin together.
func feltWords(m *model.Model) string {
	h := measure.HabitatOf(m, 0, 0)
	least, most := table.Round(h.Least/model.StandardGravity, 3), table.Round(h.Most/model.StandardGravity, 3)
	if least != most {
		least += " to " + most
	}
	return fmt.Sprintf("With it the floor has %s g, up to %s deg off its normal.", least, table.Round(h.Tilt*180/math.Pi, 3))
}

// causes heads the column of apparent deflections.
func (j *job) causes() string {
	if j.underAmbient() {
		return "of it by spin and pull"
	}
	return "of it by the spin"
}

// plumbPart and spinPart say of which part of the apparent gravity a figure
// tells; "" where it is the whole.
func (j *job) plumbPart() string {
	if j.underAmbient() {
		return ", its part along the plumb line at the release"
	}
	return ""
}

func (j *job) spinPart() string {
	if j.underAmbient() {
		return ", of the spin alone"
	}
	return ""
}
