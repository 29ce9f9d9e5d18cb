package main

import (
	"fmt"
	"math"

	"offplumb/plots"
	"offplumb/sim/air"
	"offplumb/sim/flight"
	"offplumb/sim/model"
	"offplumb/sim/table"
)

const (
	// reynoldsRange is up to where the law of Clift and Gauvin holds: beyond it
	// the drag of a smooth sphere drops.
	reynoldsRange = 3e5
	// slipMatters is the share of slip in thin air from which it is told: what the
	// law is good for.
	slipMatters = 0.06
)

// bodies are those of the scenario and of its lists, each once.
func (j *job) bodies() []model.Body {
	out := append([]model.Body(nil), j.model().Bodies...)
	seen := map[model.Body]bool{}
	for _, b := range out {
		seen[b] = true
	}
	for i := range j.Lets {
		if b := j.Lets[i].Body; b.Mass > 0 && !seen[b] {
			seen[b] = true
			out = append(out, b)
		}
	}
	return out
}

// warnAir tells of the air what was left out, and where its laws end.
func warnAir(j *job) {
	m := j.model()
	if m.Air.Vacuum() || !j.flew() {
		return
	}
	var thin, swims, dust []string
	most, lift, slip, bound := 0.0, 0.0, 0.0, 0.0
	drags := false
	for _, b := range j.bodies() {
		if b.Diameter == 0 {
			continue
		}
		drags = true
		if share := m.BuoyancyLeftOut(b); share > 0 {
			swims, lift = append(swims, b.Name), math.Max(lift, share)
		}
		if share := m.AirAt(m.Habitat.CeilingRadius).SlipShare(m.AirTemperature(), b.Diameter); share > slipMatters && b.DragCoefficient == 0 {
			thin, slip = append(thin, b.Name), math.Max(slip, share)
		}
		if q := flight.QuickOf(m, b); q.Drifts() {
			dust, bound, most = append(dust, b.Name), math.Max(bound, q.Bound()), math.Max(most, q.Relaxation)
		}
	}
	if share := m.LayersLeftOut(); drags && share > 0 {
		j.note("air", "its density would be %s %% less at the %s than at the floor; stratified = true takes that into account", table.Round(100*share, 2), innermost(m))
	}
	if len(swims) > 0 {
		j.note("air", "the air displaced has up to %s %% of the mass of these bodies, which is left out; buoyancy = true takes it into account: %s", table.Round(100*lift, 2), someNames(swims))
	}
	if len(dust) > 0 {
		j.note("air", "drift like dust, at the velocity at which drag balances all else, after up to %s s; their way is off by %s %% at most, and they stay where they touch: %s",
			table.Round(most, 2), table.Round(100*bound, 2), someNames(dust))
	}
	if len(thin) > 0 {
		j.note("air", "are so small for this air that slip, which is not modelled, lowers their drag by up to %s %% (Knudsen number %s; the law takes it as 0): %s",
			table.Round(100*slip, 2), table.Round(slip/1.257, 2), someNames(thin))
	}
	j.warnReynolds()
}

func innermost(m *model.Model) string {
	if m.Habitat.CeilingRadius > 0 {
		return "ceiling"
	}
	return "axis"
}

// warnReynolds tells of releases that are faster than the law of drag holds
// for, at their release or landing.
func (j *job) warnReynolds() {
	m := j.model()
	var fast []string
	most := 0.0
	for i := range j.results {
		r, let := &j.results[i], &j.Lets[i]
		if !r.Finished() || let.Body.DragCoefficient > 0 || let.Body.Mass <= 0 {
			continue
		}
		v := let.Local.Vel
		speed := math.Sqrt(v.X*v.X + v.Y*v.Y + v.Z*v.Z)
		if r.Landing.Outcome == flight.Landed {
			speed = math.Max(speed, r.Landing.Speed)
		}
		if d := m.Weather.Draft; d != nil {
			speed += d.Fastest()
		}
		if re := m.Air.Density * let.Body.Diameter * speed / m.Air.Viscosity; re > reynoldsRange {
			fast, most = append(fast, r.Landing.Release), math.Max(most, re)
		}
	}
	if len(fast) > 0 {
		j.note("air", "reach a Reynolds number of %s, beyond %.0e, up to which the law of drag holds; the drag may be less than half: %s", table.Round(most, 2), reynoldsRange, someNames(fast))
	}
}

// drafty, layered, buoyant and dusty say what of the air was used.
func (j *job) drafty() bool  { return j.flew() && j.model().Weather.Draft != nil }
func (j *job) layered() bool { return j.flew() && j.model().Weather.Stratified }
func (j *job) buoyant() bool { return j.flew() && j.model().Weather.Buoyant }
func (j *job) dusty() bool {
	for _, b := range j.bodies() {
		if flight.QuickOf(j.model(), b).Drifts() {
			return j.flew()
		}
	}
	return false
}

// airFigures are those of air that is not the same everywhere.
func airFigures(j *job) []drawing {
	w := &j.model().Weather
	if !w.Stratified && (w.Draft == nil || len(w.Draft.Heights()) == 0) {
		return nil
	}
	return []drawing{{file: "air", of: "air", make: func() (*plots.Figure, error) { return plots.StackChart(airChart(j.model())) }}}
}

// airPoints is how many heights the chart has.
const airPoints = 241

// airChart draws the draft and the density by height, up to the ceiling, or a
// quarter beyond the heights of a draft that ends far below.
func airChart(m *model.Model) plots.StackChartSpec {
	w := &m.Weather
	top := m.Habitat.FloorRadius - math.Max(m.Habitat.CeilingRadius, model.DraftCore*m.Habitat.FloorRadius)
	title, words := "The density of the air by height", "density"
	spec := plots.StackChartSpec{Spin: m.Habitat.Spin, Axis: "height above the reference floor, m"}
	if w.Draft != nil {
		title, words = "The draft by height", "speeds of the draft, relative to the habitat,"
		if h := w.Draft.Heights(); len(h) > 0 && !w.Stratified {
			top = math.Min(top, 1.25*math.Max(h[len(h)-1], 0.01*top))
		}
		if w.Stratified {
			title, words = "The draft and the density of the air by height", "speeds of the draft and density of the air"
		}
		spec.Notes = "Relative to the habitat; up is toward the axis. Monotone cubics between the heights given, as at the ends beyond them."
	} else {
		spec.Notes = fmt.Sprintf("Air of %s K that turns with the habitat like a solid.", given(m.AirTemperature()))
	}
	curves := []plots.CurveSpec{{Name: "spinward"}, {Name: "axial"}, {Name: "up"}}
	var density []float64
	used := [3]bool{}
	for i := range airPoints {
		x := top * float64(i) / (airPoints - 1)
		spec.X = append(spec.X, x)
		density = append(density, m.AirAt(m.Habitat.FloorRadius-x).Density)
		if w.Draft == nil {
			continue
		}
		v, _ := w.Draft.At(x)
		for c, k := range [...]int{air.Spinward, air.Axial, air.Up} {
			curves[c].Y = append(curves[c].Y, v[k])
			used[c] = used[c] || v[k] != 0
		}
	}
	if w.Draft != nil {
		panel := plots.PanelSpec{Title: "draft, m/s"}
		for c := range curves {
			if used[c] {
				panel.Curves = append(panel.Curves, curves[c])
			}
		}
		spec.Panels = append(spec.Panels, panel)
	}
	if w.Stratified {
		spec.Panels = append(spec.Panels, plots.PanelSpec{Title: "density, kg/m³", Curves: []plots.CurveSpec{{Y: density}}})
	}
	spec.Title, spec.Desc = title, described("The %s against the height above the reference floor, from 0 to %s m.", words, table.Round(top, 3))
	return spec
}
