package main

import (
	"fmt"
	"math"

	"offplumb/sim/frame"
	"offplumb/sim/model"
	"offplumb/sim/table"
)

// ambientWords says in a sentence what pulls beside the spin; "" where nothing
// does.
func ambientWords(m *model.Model) string {
	g := m.Ambient
	switch {
	case g.None():
		return ""
	case g.Central():
		return fmt.Sprintf("Ambient gravity: %s m/s² at the habitat's origin, toward a centre %s m away, %s.", given(g.Strength), given(g.Distance), toward(m))
	}
	return fmt.Sprintf("Ambient gravity: %s m/s², %s.", given(g.Strength), toward(m))
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
