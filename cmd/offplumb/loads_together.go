package main

import (
	"fmt"
	"math"

	"offplumb/plots"
	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// comparedLoads are the panels in which crew paths are compared.
var comparedLoads = []struct {
	title string
	most  float64
	of    func(l *measure.Load) float64
}{
	{"apparent gravity at the feet, g", 0, func(l *measure.Load) float64 { return l.GravityFeet / model.StandardGravity }},
	{"weight, N", 0, func(l *measure.Load) float64 { return l.Weight }},
	{"side load, N, spinward positive", 0, func(l *measure.Load) float64 { return l.SideSpinward }},
	{"friction demand, side load over weight", plots.MostFriction, func(l *measure.Load) float64 { return l.FrictionDemand }},
	{"cross-coupled angular acceleration of the head, rad/s²", 0, func(l *measure.Load) float64 { return l.HeadCross }},
}

// loadsTogether draws the loads of crew paths in one chart, each from its own start.
func (j *job) loadsTogether(title string, which []int) (*plots.Figure, error) {
	if len(which) == 1 {
		return j.loadsChart(which[0])
	}
	spec := plots.StackChartSpec{Title: title, Spin: j.model().Habitat.Spin, Axis: "time since the start of each, s",
		Notes: "Loads are what the person exerts on the structure, at the waist. "}
	longest, words := 0.0, ""
	times := make([][]float64, len(which))
	for n, i := range which {
		p := &j.paths[i]
		for k := range p.loads {
			times[n] = append(times[n], p.loads[k].Time-p.loads[0].Time)
		}
		longest = math.Max(longest, times[n][len(times[n])-1])
		row := p.row()
		words += fmt.Sprintf(" %s, %s: weight %s, side load up to %s, friction demand up to %s.", row[0], row[1], row[5], row[6], row[7])
	}
	spec.X = []float64{0, longest}
	for _, q := range comparedLoads {
		panel := plots.PanelSpec{Title: q.title, Most: q.most}
		for n, i := range which {
			p := &j.paths[i]
			c := plots.CurveSpec{Name: p.plan.Path.Name, X: times[n]}
			for k := range p.loads {
				c.Y = append(c.Y, q.of(&p.loads[k]))
			}
			panel.Curves = append(panel.Curves, c)
		}
		spec.Panels = append(spec.Panels, panel)
	}
	spec.Desc = described("Loads along several crew paths, compared.%s", words)
	return plots.StackChart(spec)
}

// loadPanels maps the columns that limits may name to the panels of a loads
// chart, and the SI value of the panel's unit.
var loadPanels = map[string]struct {
	panel int
	scale float64
}{
	"gravity_feet": {plots.PanelGravity, model.StandardGravity}, "gravity_waist": {plots.PanelGravity, model.StandardGravity},
	"gravity_head": {plots.PanelGravity, model.StandardGravity}, "weight": {plots.PanelWeight, 1},
	"side_spinward": {plots.PanelSide, 1}, "side_axial": {plots.PanelSide, 1},
	"friction_demand": {plots.PanelFriction, 1}, "head_cross": {plots.PanelHead, 1},
}

// loadLimits draws the limits of a path into its chart.
func (j *job) loadLimits(spec *plots.LoadsChartSpec, path string) {
	for i := range j.Limits {
		c := &j.Limits[i]
		at, ok := loadPanels[c.Key]
		if c.Table != "crew" || !ok || !c.About(path) {
			continue
		}
		add := func(q *model.Quantity, sign float64, words string) {
			if q != nil {
				spec.Limits[at.panel] = append(spec.Limits[at.panel], plots.Level{Name: c.Limit.Name + words, Value: sign * q.SI / at.scale})
			}
		}
		add(c.Limit.Max, 1, "")
		add(c.Limit.Min, 1, "")
		add(c.Limit.MaxAbs, 1, "")
		add(c.Limit.MaxAbs, -1, "")
		add(c.Limit.WarnMax, 1, ", near")
		add(c.Limit.WarnMin, 1, ", near")
	}
}
