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
