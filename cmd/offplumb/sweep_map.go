package main

import (
	"fmt"
	"math"
	"slices"

	"offplumb/plots"
)

// maps are the shaded maps of a sweep over two numbers, one for each measure, where
// the second number has more values than lines can show.
func (s *sweepResult) maps(j *job, file string) (out []drawing) {
	if len(s.Keys) != 2 || s.Keys[0].Words() || s.Keys[1].Words() || len(s.Keys[1].Values) <= curvesDrawn {
		return nil
	}
	along, up := ascending(s.Keys[0].Values), ascending(s.Keys[1].Values)
	for pick := range s.Picks {
		spec, ok := s.contours(j, along, up, pick)
		if !ok || len(out) == panelsDrawn {
			continue
		}
		name := file + "-map"
		if len(out) > 0 {
			name = fmt.Sprintf("%s-%d", name, len(out)+1)
		}
		out = append(out, drawing{file: name, of: "sweep map", name: s.Name, make: func() (*plots.Figure, error) { return plots.ContourChart(spec) }})
	}
	return out
}

// ascending gives the order of values, without those that are there already.
func ascending(values []float64) []int {
	order := make([]int, len(values))
	for i := range order {
		order[i] = i
	}
	slices.SortStableFunc(order, func(a, b int) int { return compareGap(values[a], values[b]) })
	return slices.CompactFunc(order, func(a, b int) bool { return values[a] == values[b] })
}

// contours lays out the map of a measure; false where it has nothing to tell apart.
func (s *sweepResult) contours(j *job, along, up []int, pick int) (plots.ContourChartSpec, bool) {
	first, second, p := &s.Keys[0], &s.Keys[1], &s.Picks[pick]
	spec := plots.ContourChartSpec{Title: fmt.Sprintf("%s: %s over %s", s.Name, p.String(), s.over()), Spin: j.model().Habitat.Spin, Spins: s.spins(),
		AxisX: first.Name + comma(first.Unit), AxisY: second.Name + comma(second.Unit), Of: p.String() + comma(p.Unit()), Unit: p.Unit(),
		Notes: "Shades and lines: linear between the points of the sweep."}
	for _, i := range along {
		spec.X = append(spec.X, first.Values[i])
	}
	low, high := math.Inf(1), math.Inf(-1)
	for _, k := range up {
		spec.Y = append(spec.Y, second.Values[k])
		for _, i := range along {
			x := p.In(s.value(i*len(second.Values)+k, pick))
			if !(math.Abs(x) < mostDrawn) {
				x = math.NaN()
			} else {
				low, high = math.Min(low, x), math.Max(high, x)
			}
			spec.Values = append(spec.Values, x)
		}
	}
	if slices.ContainsFunc(spec.Values, math.IsNaN) {
		spec.Notes += " Without shade: a point about it has no value; the table says why."
	}
	spec.Desc = described("Map of a measure over two keys. Sweep %s.", s.sentence())
	return spec, len(along) > 1 && len(up) > 1 && high-low > leastSpread*math.Max(math.Abs(low), math.Abs(high))
}

// leastSpread is the spread of a measure, as a share of its size, below which a map
// of it would show roundings.
const leastSpread = 1e-6
