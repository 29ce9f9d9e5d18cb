package main

import (
	"fmt"
	"math"
	"strings"

	"offplumb/plots"
	"offplumb/scenarios"
	"offplumb/sim/measure"
	"offplumb/sim/table"
)

// letGoSeries is a let-go series and what it gave.
type letGoSeries struct {
	name string
	rows []measure.LetGo
}

// letGo gathers the let-go series.
func (j *job) letGo() {
	j.serial = map[string]bool{}
	for _, name := range measure.SeriesNames(j.model()) {
		s := letGoSeries{name: name}
		for i := range j.results {
			if r := &j.results[i]; r.Track != nil && j.Lets[i].Release.Series == name {
				j.serial[r.Landing.Release] = true
				s.rows = append(s.rows, measure.LetGoOf(r.Track, &r.Rest, r.Events))
			}
		}
		if len(s.rows) > 0 {
			j.letgo = append(j.letgo, s)
		}
	}
}

// worst gives the row of the fastest impact; nil without one.
func (s *letGoSeries) worst() *measure.LetGo {
	var out *measure.LetGo
	for i := range s.rows {
		if r := &s.rows[i]; !math.IsNaN(r.Worst.Speed) && (out == nil || r.Worst.Speed > out.Worst.Speed) {
			out = r
		}
	}
	return out
}

func (s *letGoSeries) sentence() string {
	w := s.worst()
	if w == nil {
		return fmt.Sprintf("%s: %d releases, no impact", s.name, len(s.rows))
	}
	return fmt.Sprintf("%s: %s; the worst, let go %s along the path, %s from the axis, meets %s at %s with %s", s.name,
		count(len(s.rows), "release"), withUnit(w.Along, "m"), withUnit(w.Radius, "m"), w.Worst.Surface, withUnit(w.Worst.Speed, "m/s"), withUnit(w.Worst.Energy, "J"))
}

// sumStudies tells the let-go series and the platforms.
func (j *job) sumStudies(b *strings.Builder) {
	if len(j.letgo) > 0 {
		b.WriteString("\nLet-go series\n")
		for i := range j.letgo {
			b.WriteString(wrapped("  "+j.letgo[i].sentence()+".", "    "))
		}
	}
	head := false
	for i, rows := range j.spacings {
		if rows == nil {
			continue
		}
		if !head {
			b.WriteString("\nPlatforms\n")
			head = true
		}
		b.WriteString(wrapped("  "+j.platformWords(i, rows)+".", "    "))
	}
}

func (j *job) platformWords(i int, rows []measure.Platform) string {
	s := &j.model().Spacings[i]
	places := make([]string, len(rows))
	for k := range rows {
		places[k] = table.Fixed(rows[k].Radius, 2)
	}
	return fmt.Sprintf("%s: %s in %s keep every contact of %s below %s m/s: at %s m from the axis", s.Name, count(len(rows), "platform"),
		s.Passage, s.Body, given(s.MaxSpeed), strings.Join(places, ", "))
}

// studyTables are the tables of let-go series and platforms.
func (j *job) studyTables() []task {
	var out []task
	var names table.Namer
	for i := range j.letgo {
		s := &j.letgo[i]
		out = append(out, tableTask("letgo/"+names.Name(s.name)+".csv", "let-go series", s.name, "A row for each release of a let-go series.", measure.LetGoTable(s.rows)))
	}
	var places table.Namer
	for i, rows := range j.spacings {
		name := j.model().Spacings[i].Name
		file := "platforms/" + places.Name(name) + ".csv"
		if rows != nil {
			out = append(out, tableTask(file, "platforms", name, "A row for each platform, outermost first.", measure.PlatformTable(rows)))
		}
	}
	return out
}

// studyFigures are the figures of let-go series.
func (j *job) studyFigures() []drawing {
	var out []drawing
	var names table.Namer
	for i := range j.letgo {
		s := &j.letgo[i]
		file := "letgo-" + names.Name(s.name)
		if n := len(s.rows); n > 1 && s.rows[n-1].Along > s.rows[0].Along {
			out = append(out, drawing{file: file, of: "let-go series", name: s.name, make: func() (*plots.Figure, error) { return j.letGoChart(s) }})
		}
		shown := j.seriesShown(s.name, scenarios.MostTogether)
		title := fmt.Sprintf("%s: %d of %d, from the release to where each ends", s.name, len(shown), len(s.rows))
		out = append(out, drawing{file: file + "-side", of: "side view of a let-go series", name: s.name, make: func() (*plots.Figure, error) { return j.togetherView(title, shown) }})
	}
	return out
}

func (j *job) letGoChart(s *letGoSeries) (*plots.Figure, error) {
	spec := plots.StackChartSpec{Title: s.name + ": where along the path a fall hits how hard", Spin: j.model().Habitat.Spin,
		Axis:  "way along the path where it is let go, m",
		Notes: "First: the first touch. Arrival: the first touch of what it comes to rest on. Worst: the fastest impact of all. Energy without spin."}
	var first, arrival, worst, energy, radius []float64
	for i := range s.rows {
		r := &s.rows[i]
		spec.X = append(spec.X, r.Along)
		first, arrival, worst = append(first, r.First.Speed), append(arrival, r.Arrival.Speed), append(worst, r.Worst.Speed)
		energy, radius = append(energy, r.Worst.Energy), append(radius, r.Radius)
	}
	speeds := plots.PanelSpec{Title: "speed of contact, m/s", Curves: []plots.CurveSpec{{Name: "worst", Y: worst}, {Name: "arrival", Y: arrival}, {Name: "first", Y: first}}}
	for i := range j.Limits {
		l := j.Limits[i].Limit
		if l.Max != nil && l.Max.Unit == "m/s" && j.Limits[i].Judges(s.name) {
			speeds.Levels = append(speeds.Levels, plots.Level{Name: l.Name, Value: l.Max.SI})
		}
	}
	spec.Panels = []plots.PanelSpec{speeds,
		{Title: "energy of the fastest impact, J", Curves: []plots.CurveSpec{{Y: energy}}},
		{Title: "distance from the axis where it is let go, m", Curves: []plots.CurveSpec{{Y: radius}}}}
	spec.Desc = described("%s.", s.sentence())
	return plots.StackChart(spec)
}
