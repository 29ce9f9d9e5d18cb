package measure

import (
	"math"

	"offplumb/sim/table"
)

// Slope is how the landing of a release changes with one number of it: its
// derivatives, each for one of the number's unit (SI, of angles a degree). NaN:
// there is none, and Note says why.
type Slope struct {
	Release string
	Input   string  // the number, by its key: at.height
	Unit    string  // of it
	Step    float64 // by which it was changed up and down, in the unit

	Offset, Deflection, Axial float64 // m
	Time                      float64 // s
	Speed                     float64 // m/s
	Note                      string
}

// Moves is how far, in m, the landing shifts for one of the unit.
func (s *Slope) Moves() float64 { return math.Hypot(s.Offset, s.Axial) }

// slopeColumns are those of sensitivity.csv.
var slopeColumns = []column[Slope]{
	{key: "release", meaning: "name of the release", text: func(s *Slope) string { return s.Release }},
	{key: "input", meaning: "number of the release that changes, by its key in the scenario", text: func(s *Slope) string { return s.Input }},
	{key: "unit", meaning: "unit of the input: the derivatives are for one of it", text: func(s *Slope) string { return s.Unit }},
	{key: "d_offset", unit: metre, meaning: "change of the deck offset for one unit of the input, spinward positive", num: func(s *Slope) float64 { return s.Offset }},
	{key: "d_deflection", unit: metre, meaning: "change of the apparent deflection for one unit of the input", num: func(s *Slope) float64 { return s.Deflection }},
	{key: "d_axial", unit: metre, meaning: "change of the axial distance from release to landing for one unit of the input", num: func(s *Slope) float64 { return s.Axial }},
	{key: "d_time", unit: second, meaning: "change of the time of the landing for one unit of the input", num: func(s *Slope) float64 { return s.Time }},
	{key: "d_speed", unit: speedUnit, meaning: "change of the speed at the landing for one unit of the input", num: func(s *Slope) float64 { return s.Speed }},
	{key: "step", meaning: "by how much the input was changed up and down for the difference, in its unit", num: func(s *Slope) float64 { return s.Step }},
	{key: "note", meaning: "why there are no derivatives", text: func(s *Slope) string { return s.Note }},
}

// SlopeTable is sensitivity.csv: a row for each release and input.
func SlopeTable(rows []Slope) *table.Table { return fill(slopeColumns, rows) }
