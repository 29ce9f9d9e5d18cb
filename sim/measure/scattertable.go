package measure

import (
	"fmt"
	"math"

	"offplumb/sim/table"
)

// SummaryRow is a row of scatter/NAME-summary.csv. Value, Low and High are in
// Unit.
type SummaryRow struct {
	Figure, Of       string
	Value, Low, High float64
	Count            float64
	Unit             string
}

var summaryColumns = []column[SummaryRow]{
	{key: "figure", meaning: "what is told", text: func(r *SummaryRow) string { return r.Figure }},
	{key: "of", meaning: "measure, surface, opening or reason", text: func(r *SummaryRow) string { return r.Of }},
	{key: "value", meaning: "its value, in the unit of the row", num: func(r *SummaryRow) float64 { return r.Value }},
	{key: "low", meaning: "low end of its 95 % confidence interval, that of independent samples; those of a Latin hypercube and Halton points vary less", num: func(r *SummaryRow) float64 { return r.Low }},
	{key: "high", meaning: "high end of that interval", num: func(r *SummaryRow) float64 { return r.High }},
	{key: "count", meaning: "how many samples it is about", num: func(r *SummaryRow) float64 { return r.Count }},
	{key: "unit", meaning: "unit of the row; empty: a ratio or a number of samples", text: func(r *SummaryRow) string { return r.Unit }},
}

// ScatterTable is scatter/NAME-summary.csv.
func ScatterTable(s *Scattered) *table.Table {
	var rows []SummaryRow
	nan := math.NaN()
	add := func(figure, of string, value, low, high float64, count int, unit string) {
		rows = append(rows, SummaryRow{figure, of, value, low, high, float64(count), unit})
	}
	shares := func(figure string, list []Share) {
		for _, h := range list {
			add(figure, h.Name, h.Share, h.Low, h.High, h.Count, "")
		}
	}
	add("samples", "", float64(s.Samples), nan, nan, s.Samples, "")
	add("flown", "", float64(s.Flown), nan, nan, s.Flown, "")
	add("landed", "", float64(s.Landed), nan, nan, s.Landed, "")
	shares("left_out", s.LeftOut)
	shares("probability_of_surface", s.Surfaces)
	shares("probability_through", s.Openings)
	shares("probability_of_outcome", s.Outcomes)
	for i := range s.Spreads {
		rows = append(rows, s.Spreads[i].rows()...)
	}
	for _, c := range s.Covariance {
		add("covariance", c.A+", "+c.B, c.Value, nan, nan, s.Landed, c.unit)
	}
	return fill(summaryColumns, append(rows, s.shapeRows()...))
}

func (s *Spreading) rows() []SummaryRow {
	nan, n, u := math.NaN(), float64(s.Count), s.unit.name
	out := []SummaryRow{
		{"mean", s.Key, s.Mean, s.Mean - s.Error, s.Mean + s.Error, n, u},
		{"standard_deviation", s.Key, s.Std, nan, nan, n, u},
		{"least", s.Key, s.Min, nan, nan, n, u},
	}
	for k, p := range levels {
		out = append(out, SummaryRow{fmt.Sprintf("quantile_%02.0f", 100*p), s.Key, s.Quantiles[k], nan, nan, n, u})
	}
	return append(out, SummaryRow{"greatest", s.Key, s.Max, nan, nan, n, u})
}

// shapeRows tell the ellipse and the contour.
func (s *Scattered) shapeRows() (out []SummaryRow) {
	nan := math.NaN()
	add := func(figure, of string, value float64, unit string) {
		out = append(out, SummaryRow{figure, of, value, nan, nan, float64(s.Landed), unit})
	}
	if e := s.Ellipse; e != nil {
		add("ellipse_95_centre", "plan_spinward", e.Spinward, "m")
		add("ellipse_95_centre", "plan_axial", e.Axial, "m")
		add("ellipse_95_semi_axis", "major", e.Major, "m")
		add("ellipse_95_semi_axis", "minor", e.Minor, "m")
		add("ellipse_95_angle", "major axis, from spinward toward +axial", e.Angle*180/math.Pi, "deg")
		add("ellipse_95_holds", "share of the landings", e.Inside, "")
	}
	if c := s.Contour; c != nil {
		add("contour_95_area", "", c.Area, "m^2")
		add("contour_95_pieces", "", float64(len(c.Pieces)), "")
		add("contour_95_holds", "share of the landings", c.Inside, "")
	}
	return out
}
