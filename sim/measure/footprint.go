package measure

import (
	"math"
	"slices"

	"offplumb/sim/table"
)

// Footprint is the outline of all landings on a deck: that of the cells that
// were landed in, with the cells between two of one row, then of one column, that
// are at most a step apart, since between two places a step apart are others. Loops are
// closed; those around holes run clockwise, with spinward to the right and
// +axial up. m.
//
// Law: every landing lies in it, to a millionth of a cell, and its area is that
// of its cells.
type Footprint struct {
	Deck  string
	Loops [][][2]float64
	Area  float64 // m^2, holes less
	Cells int
}

// Footprints gives the footprint on each deck.
func (c *LandMap) Footprints() []Footprint {
	out := make([]Footprint, 0, len(c.Decks))
	for i := range c.Decks {
		d := &c.Decks[i]
		var at [][2]int32
		for k := range d.Cells {
			if d.Cells[k].Landings > 0 {
				at = append(at, [2]int32{d.Cells[k].I, d.Cells[k].J})
			}
		}
		at = c.joined(at)
		f := Footprint{Deck: d.Name, Loops: c.Outlines(d, at), Cells: len(at)}
		for _, loop := range f.Loops {
			f.Area += shoelace(loop)
		}
		if len(at) > 0 {
			out = append(out, f)
		}
	}
	return out
}

// FootprintArea is the area of the footprints on all decks, m^2.
func (c *LandMap) FootprintArea() (sum float64) {
	for _, f := range c.Footprints() {
		sum += f.Area
	}
	return sum
}

// Outlines traces some cells of a deck, on its plan, m.
func (c *LandMap) Outlines(d *MapDeck, cells [][2]int32) (out [][][2]float64) {
	for _, loop := range Outlines(cells) {
		path := make([][2]float64, len(loop))
		for k, p := range loop {
			x, y := c.Edges(d, p[0], p[1])
			path[k] = [2]float64{x[0], y[0]}
		}
		out = append(out, path)
	}
	return out
}

// joined adds the cells between two of a row, then those between two of a column
// of what there is then, that are at most a step apart: places a step apart lie
// up to one cell more than that apart by their cells. It gives them by spinward,
// then axial.
func (c *LandMap) joined(cells [][2]int32) [][2]int32 {
	most := int32(math.Min(math.Floor(c.Map.Step/c.Map.Cell+edgeSlack), math.MaxInt16)) + 1
	return bridged(bridged(cells, 0, most), 1, most)
}

// bridged adds the cells between two of a line along one way that are no further
// apart than most, and sorts all.
func bridged(cells [][2]int32, way int, most int32) [][2]int32 {
	line := slices.Clone(cells)
	slices.SortFunc(line, func(a, b [2]int32) int {
		if a[1-way] != b[1-way] {
			return int(a[1-way]) - int(b[1-way])
		}
		return int(a[way]) - int(b[way])
	})
	out := line
	for i := 1; i < len(line); i++ {
		if line[i][1-way] != line[i-1][1-way] || line[i][way]-line[i-1][way] > most {
			continue
		}
		for at := line[i-1]; at[way]+1 < line[i][way]; {
			at[way]++
			out = append(out, at)
		}
	}
	slices.SortFunc(out, func(a, b [2]int32) int {
		if a[0] != b[0] {
			return int(a[0]) - int(b[0])
		}
		return int(a[1]) - int(b[1])
	})
	return slices.Compact(out)
}

type footRow struct {
	polygon, corner float64
	deck, ring      string
	at              [2]float64
}

var footColumns = []column[footRow]{
	{key: "polygon", meaning: "number of the closed outline", num: func(r *footRow) float64 { return r.polygon }},
	{key: "corner", meaning: "number of the corner; the last is joined to the first", num: func(r *footRow) float64 { return r.corner }},
	{key: "deck", meaning: "deck, or flat floor, on whose plan it lies", text: func(r *footRow) string { return r.deck }},
	{key: "spinward", unit: metre, meaning: "arc on that deck", num: func(r *footRow) float64 { return r.at[0] }},
	{key: "axial", unit: metre, meaning: "axial place", num: func(r *footRow) float64 { return r.at[1] }},
	{key: "ring", meaning: "outline, or the outline of a hole", text: func(r *footRow) string { return r.ring }},
}

// FootprintTable is maps/NAME-footprint.csv.
func FootprintTable(list []Footprint) *table.Table {
	var rows []footRow
	n := 0
	for i := range list {
		for _, loop := range list[i].Loops {
			ring := "outline"
			if shoelace(loop) < 0 {
				ring = "hole"
			}
			n++
			for k, p := range loop {
				rows = append(rows, footRow{float64(n), float64(k + 1), list[i].Deck, ring, p})
			}
		}
	}
	return fill(footColumns, rows)
}
