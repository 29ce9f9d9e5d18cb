package main

import (
	"fmt"
	"math"
	"strings"

	"offplumb/plots"
	"offplumb/sim/measure"
)

// changes holds the landings of the variants against those of the first. There
// are none of a variant that is impossible, and none at all if the first is.
func (s *sweepResult) changes() (out []measure.Change) {
	for i := range s.Variants {
		out = append(out, s.changesOf(i)...)
	}
	return out
}

func (s *sweepResult) changesOf(i int) []measure.Change {
	if i == 0 || !s.possible(0) || !s.possible(i) {
		return nil
	}
	return measure.Changes(s.Variants[i].Name, s.points[0].Landings, s.points[i].Landings)
}

func (s *sweepResult) possible(i int) bool {
	return s.points[i].Finished() && s.points[i].Fault == nil
}

// changeWords tells what changed, a sentence for each variant behind the first.
func (s *sweepResult) changeWords() (out []string) {
	for i := range s.Variants {
		if rows := s.changesOf(i); len(rows) > 0 {
			out = append(out, fmt.Sprintf("%s against %s: %s", s.Variants[i].Name, s.Variants[0].Name, changed(rows)))
		}
	}
	return out
}

// changed counts what changed and names the release that moved most.
func changed(rows []measure.Change) string {
	kinds := map[string]int{}
	most := -1
	for i := range rows {
		kinds[rows[i].Kind()]++
		if x := math.Abs(rows[i].Moved()); x > leastShown && (most < 0 || x > math.Abs(rows[most].Moved())) {
			most = i
		}
	}
	n := count(len(rows), "release")
	if kinds[""] == len(rows) {
		return "nothing changed of " + n
	}
	words := ""
	for _, k := range []struct{ kind, told string }{
		{"surface", "%d of %s on another surface"}, {"openings", "%d of %s through other openings"}, {"outcome", "%d of %s with another outcome"},
		{"numbers", "%d of %s on the same surface with other numbers"}, {"gone", "%d of %s gone"}, {"new", "%d of %s new"},
	} {
		if kinds[k.kind] == 0 {
			continue
		}
		if words != "" {
			words += "; "
		}
		words += fmt.Sprintf(k.told, kinds[k.kind], n)
	}
	if kinds["surface"] == 0 {
		words += "; none on another surface"
	}
	if most >= 0 {
		words += fmt.Sprintf("; the greatest change of offset: %s, by %s", rows[most].Release, way(rows[most].Moved()))
	}
	return words
}

// variantChart draws the measures of variants: a stretch along for each, in it a
// level line for each thing that a measure is of; false where there is nothing to
// draw.
func (s *sweepResult) variantChart(j *job) (plots.StackChartSpec, bool) {
	spec := plots.StackChartSpec{Title: s.Name + ": " + count(len(s.Variants), "variant") + " side by side", Spin: j.model().Habitat.Spin,
		Axis: "variants, in the order of the scenario", Named: true, Spins: s.spins(),
		Notes: "A stretch for each variant; a gap where it has no value. " + strings.Join(s.changeWords(), ". ")}
	for i := range s.Variants {
		spec.Legs = append(spec.Legs, plots.LegSpan{Name: s.Variants[i].Name, From: float64(i), To: float64(i + 1)})
		spec.X = append(spec.X, float64(i), float64(i+1), float64(i+1))
	}
	for first := 0; first < len(s.Picks); {
		next := first + 1
		for next < len(s.Picks) && s.Picks[next].Measure == s.Picks[first].Measure {
			next++
		}
		if p, ok := s.variantPanel(first, next); ok {
			spec.Panels = append(spec.Panels, p)
		}
		first = next
	}
	spec.Desc = described("Sweep %s.", s.sentence())
	return spec, len(spec.Panels) > 0
}

func (s *sweepResult) variantPanel(first, next int) (plots.PanelSpec, bool) {
	p := &s.Picks[first]
	out := plots.PanelSpec{Title: p.Measure + comma(p.Unit())}
	if next-first > curvesDrawn {
		return out, false
	}
	any := false
	for pick := first; pick < next; pick++ {
		c := plots.CurveSpec{Name: s.Picks[pick].Of}
		for i := range s.Variants {
			x := s.Picks[pick].In(s.value(i, pick))
			if !(math.Abs(x) < mostDrawn) {
				x = math.NaN()
			}
			any = any || !math.IsNaN(x)
			c.Y = append(c.Y, x, x, math.NaN())
		}
		out.Curves = append(out.Curves, c)
	}
	if next == first+1 && p.Of != "" {
		out.Title, out.Curves[0].Name = p.String()+comma(p.Unit()), ""
	}
	return out, any
}
