package main

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"offplumb/plots"
	"offplumb/sim/table"
)

const (
	// curvesDrawn bounds the lines of one panel: as many as can be told apart.
	curvesDrawn = 6
	// panelsDrawn bounds the panels of one figure.
	panelsDrawn = 6
	// mostDrawn is the greatest magnitude that a figure shows.
	mostDrawn = 1e12
)

// sweepFigures are the figures of the sweeps: a panel for each measure, in it a
// line for each thing that it is of, or for each value of the second key.
func sweepFigures(j *job) []drawing {
	var out []drawing
	var names table.Namer
	for i := range j.sweeps {
		s := &j.sweeps[i]
		file := "sweep-" + names.Name(s.Name)
		if s.points == nil {
			continue
		}
		spec, ok := s.chart(j)
		if !ok {
			continue
		}
		maps := s.maps(j, file)
		for n := 0; n*panelsDrawn < len(spec.Panels); n++ {
			part := spec
			part.Panels = spec.Panels[n*panelsDrawn : min(len(spec.Panels), (n+1)*panelsDrawn)]
			name := file
			if n > 0 {
				name = fmt.Sprintf("%s-%d", file, n+1)
			}
			out = append(out, drawing{file: name, of: "sweep", name: s.Name, make: func() (*plots.Figure, error) { return plots.StackChart(part) }})
		}
		out = append(out, maps...)
	}
	return out
}

// chart lays out the panels; false where there is nothing to draw.
func (s *sweepResult) chart(j *job) (plots.StackChartSpec, bool) {
	if s.Variants != nil {
		return s.variantChart(j)
	}
	k := &s.Keys[0]
	if k.Words() {
		return plots.StackChartSpec{}, false
	}
	order := make([]int, len(k.Values))
	for i := range order {
		order[i] = i
	}
	slices.SortStableFunc(order, func(a, b int) int { return int(math.Copysign(1, k.Values[a]-k.Values[b])) })
	spec := plots.StackChartSpec{Title: s.Name + ": sweep over " + s.over(), Spin: j.model().Habitat.Spin, Axis: k.Name + comma(k.Unit)}
	for _, i := range order {
		spec.X = append(spec.X, k.Values[i])
	}
	if spec.X[0] == spec.X[len(order)-1] {
		return spec, false
	}
	for first := 0; first < len(s.Picks); {
		next := first + 1
		for next < len(s.Picks) && len(s.Keys) == 1 && s.Picks[next].Measure == s.Picks[first].Measure {
			next++
		}
		if p, ok := s.panel(order, first, next); ok {
			spec.Panels = append(spec.Panels, p)
		}
		first = next
	}
	spec.Spins = s.spins()
	if n, _ := s.impossible(); n > 0 {
		spec.Notes = fmt.Sprintf("Gaps: %s that cannot be; the table says why.", count(n, "point"))
	}
	if len(s.Keys) > 1 && len(s.Keys[1].Texts) > curvesDrawn {
		spec.Notes = strings.TrimSpace(fmt.Sprintf("Lines for %d of the %d values of %s; the table %s all. ", curvesDrawn, len(s.Keys[1].Texts), s.Keys[1].Last(), s.others()) + spec.Notes)
	}
	spec.Desc = described("Sweep %s.", s.sentence())
	return spec, len(spec.Panels) > 0
}

// others names what shows all values of the second key.
func (s *sweepResult) others() string {
	if s.Keys[1].Words() {
		return "has"
	}
	return "and the maps have"
}

// over names the keys by their last parts.
func (s *sweepResult) over() string {
	words := make([]string, len(s.Keys))
	for i := range s.Keys {
		words[i] = s.Keys[i].Last()
	}
	return strings.Join(words, " and ")
}

func comma(unit string) string {
	if unit == "" {
		return ""
	}
	return ", " + unit
}

// spins says that the spin varies, where it does.
func (s *sweepResult) spins() string {
	r := newRange()
	for i := range s.points {
		if s.points[i].Fault == nil {
			r.add(rpm(s.points[i].Spin))
		}
	}
	if !(r.low < r.high) {
		return ""
	}
	text := fmt.Sprintf("The spin varies, %s to %s rpm.", drawnMinus(given(r.low)), drawnMinus(given(r.high)))
	if r.low < 0 {
		text += " At negative spin the floor moves antispinward."
	}
	return text
}

// panel draws the picks of one measure; false where none has a value, or there
// are too many to be told apart.
func (s *sweepResult) panel(order []int, first, next int) (plots.PanelSpec, bool) {
	p := &s.Picks[first]
	out := plots.PanelSpec{Title: p.Measure + comma(p.Unit())}
	if next-first > curvesDrawn {
		return out, false
	}
	if next == first+1 && p.Of != "" {
		out.Title = p.String() + comma(p.Unit())
	}
	any := false
	add := func(name string, pick, offset, stride int) {
		c := plots.CurveSpec{Name: name}
		for _, i := range order {
			x := s.Picks[pick].In(s.value(i*stride+offset, pick))
			if !(math.Abs(x) < mostDrawn) {
				x = math.NaN()
			}
			any = any || !math.IsNaN(x)
			c.Y = append(c.Y, x)
		}
		out.Curves = append(out.Curves, c)
	}
	if len(s.Keys) > 1 {
		second := &s.Keys[1]
		for _, i := range spread(len(second.Texts), curvesDrawn) {
			name := second.Texts[i]
			if !second.Words() {
				name = second.Last() + " " + given(second.Values[i]) + spaced(second.Unit)
			}
			add(name, first, i, len(second.Texts))
		}
		return out, any
	}
	for i := first; i < next; i++ {
		add(s.Picks[i].Of, i, 0, 1)
	}
	if len(out.Curves) == 1 {
		out.Curves[0].Name = "" // the title names it
	}
	return out, any
}
