package main

import (
	"fmt"
	"strings"

	"offplumb/plots"
	"offplumb/sim/measure"
	"offplumb/sim/table"
)

// wentOut lists the tracked releases that went outside the hull, with their
// figures.
func (j *job) wentOut() (which []int, rows []measure.Outside) {
	for i := range j.results {
		if !j.tracked(i) {
			continue
		}
		if row, ok := measure.OutsideOf(j.model(), j.results[i].Track); ok {
			which, rows = append(which, i), append(rows, row)
		}
	}
	return which, rows
}

// outsideTables are those of what is followed outside.
func outsideTables(j *job) (out []task) {
	which, rows := j.wentOut()
	if len(which) == 0 {
		return nil
	}
	out = append(out, tableTask("outside.csv", "outside", "", "A row for each release that went outside the hull.", measure.OutsideTable(rows)))
	var names table.Namer
	for i := range j.results {
		name := names.Name(j.Lets[i].Release.Name)
		if t := j.results[i].Track; j.tracked(i) && t.Left >= 0 {
			late := func() *table.Table { return measure.OutsideSampleTable(measure.OutsideSamples(j.model(), t)) }
			out = append(out, lateTask("outside/"+name+".csv", "outside", j.Lets[i].Release.Name, "Outside the hull: a row for each output step.", late, measure.OutsideSampleTable(nil)))
		}
	}
	return out
}

// outsideFigures are the charts of distance against time.
func outsideFigures(j *job) (out []drawing) {
	var names table.Namer
	for i := range j.results {
		name := names.Name(j.Lets[i].Release.Name)
		if t := j.results[i].Track; j.tracked(i) && t.Left >= 0 && t.End > t.Left {
			out = append(out, drawing{file: name + "-outside", of: "outside", name: j.Lets[i].Release.Name, make: func() (*plots.Figure, error) { return j.outsideChart(i) }})
		}
	}
	return out
}

// mostOutside bounds the points of a chart.
const mostOutside = 2000

func (j *job) outsideChart(i int) (*plots.Figure, error) {
	m, t := j.model(), j.results[i].Track
	row, _ := measure.OutsideOf(m, t)
	rows := measure.OutsideSamples(m, t)
	spec := plots.StackChartSpec{Title: j.Lets[i].Release.Name + ": how far away it is outside", Spin: m.Habitat.Spin, Axis: "time since the release, s", Notes: outsideSentence(&row)}
	var distance, gap []float64
	every := 1 + len(rows)/mostOutside
	for k := 0; k < len(rows); k++ {
		if s := &rows[k]; k%every == 0 || k == len(rows)-1 {
			spec.X = append(spec.X, s.Time)
			distance, gap = append(distance, s.Distance), append(gap, s.Gap)
		}
	}
	spec.Panels = []plots.PanelSpec{
		{Title: "distance from where it was let go, m", Curves: []plots.CurveSpec{{Y: distance}}},
		{Title: "gap to the nearest surface, m", Curves: []plots.CurveSpec{{Y: gap}}}}
	spec.Desc = described("Distance against time outside the hull. %s", spec.Notes)
	return plots.StackChart(spec)
}

// outsideSentence tells how a release went outside.
func outsideSentence(o *measure.Outside) string {
	s := fmt.Sprintf("It is outside from %s s on, at first with %s m/s seen in the inertial frame.", table.Round(o.Left, 3), table.Round(o.LeftSpeed, 3))
	if o.AgainTo != "" {
		s += fmt.Sprintf(" What comes round again passes it at %s m, %q, at %s s.", table.Round(o.Again, 3), o.AgainTo, table.Round(o.AgainTime, 3))
	}
	switch {
	case o.Swept != "":
		s += fmt.Sprintf(" %q meets it at %s s with %s m/s.", o.Swept, table.Round(o.SweptTime, 3), table.Round(o.SweptHit, 3))
	default:
		s += fmt.Sprintf(" At the end it is %s m from where it was let go.", table.Round(o.Distance, 3))
	}
	return s
}

// sumOutside tells what went outside.
func (j *job) sumOutside(b *strings.Builder) {
	which, rows := j.wentOut()
	if len(which) == 0 {
		return
	}
	b.WriteString("\nOutside the hull\n")
	for i := range rows {
		if i == rowsShown {
			fmt.Fprintf(b, "  and %d more in outside.csv\n", len(rows)-i)
			break
		}
		b.WriteString(wrapped("  "+rows[i].Release+": "+outsideSentence(&rows[i]), "    "))
	}
}

// outside says whether releases are followed there.
func (j *job) outside() bool { return j.model().Solver.Outside.Follow }
