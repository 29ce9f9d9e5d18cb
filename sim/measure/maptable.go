package measure

import (
	"iter"
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/table"
)

// perSquareMetre is the unit of a density.
var perSquareMetre = unit{"_1_m2", "1/m^2", 1, "1/m^2"}

// cellRow is a cell as a row.
type cellRow struct {
	c                     *LandMap
	deck                  *MapDeck
	cell                  *MapCell
	spinward, axial, area float64
	from                  Spot
	height                float64
	v                     r3.Vec
}

func (c *LandMap) row(d *MapDeck, cell *MapCell) cellRow {
	r := cellRow{c: c, deck: d, cell: cell}
	r.spinward, r.axial, r.area = c.middle(d, cell)
	nan := math.NaN()
	r.from, r.height, r.v = Spot{Spinward: nan, Axial: nan}, nan, r3.Vec{X: nan, Y: nan, Z: nan}
	if cell.From >= 0 {
		r.from, r.height, r.v = c.Start(cell.From)
	}
	return r
}

var cellColumns = []column[cellRow]{
	{key: "deck", meaning: "deck, or flat floor, beneath the landings", text: func(r *cellRow) string { return r.deck.Name }},
	{key: "spinward", unit: metre, meaning: "arc on that deck, of the cell's middle", num: func(r *cellRow) float64 { return r.spinward }},
	{key: "axial", unit: metre, meaning: "axial place of the cell's middle", num: func(r *cellRow) float64 { return r.axial }},
	{key: "landings", meaning: "how many flights land plumb over the cell, on whatever surface", num: func(r *cellRow) float64 { return float64(r.cell.Landings) }},
	{key: "share", meaning: "share of all flights that land there", num: func(r *cellRow) float64 { return float64(r.cell.Landings) / float64(r.c.Flights) }},
	{key: "density", unit: perSquareMetre, meaning: "that share for each square metre", num: func(r *cellRow) float64 { return r.c.Density(r.deck, r.cell) }},
	{key: "worst_energy", unit: joule, meaning: "greatest energy of a landing; of maps until rest, of any impact", num: func(r *cellRow) float64 { return r.cell.Worst.Energy }},
	{key: "worst_speed", unit: speedUnit, meaning: "speed of that one, the greatest", num: func(r *cellRow) float64 { return r.cell.Worst.Speed }},
	{key: "worst_normal_speed", unit: speedUnit, meaning: "greatest speed along the normal of a surface; it may be that of another flight", num: func(r *cellRow) float64 {
		if r.cell.Touches == 0 {
			return math.NaN()
		}
		return r.cell.Normal
	}},
	{key: "worst_surface", meaning: "surface that the one of the greatest energy touches", text: func(r *cellRow) string { return r.cell.Worst.Surface }},
	{key: "from_deck", meaning: "where that one is let go: the deck beneath", text: func(r *cellRow) string { return r.from.Deck }},
	{key: "from_spinward", unit: metre, meaning: "its arc on that deck", num: func(r *cellRow) float64 { return r.from.Spinward }},
	{key: "from_axial", unit: metre, meaning: "its axial place", num: func(r *cellRow) float64 { return r.from.Axial }},
	{key: "from_height", unit: metre, meaning: "its height above that deck", num: func(r *cellRow) float64 { return r.height }},
	{key: "from_v_spinward", unit: speedUnit, meaning: "its velocity spinward, relative to the habitat", num: func(r *cellRow) float64 { return r.v.X }},
	{key: "from_v_axial", unit: speedUnit, meaning: "its velocity toward +axial", num: func(r *cellRow) float64 { return r.v.Y }},
	{key: "from_v_up", unit: speedUnit, meaning: "its velocity up: toward the axis, or along the normal of a flat floor", num: func(r *cellRow) float64 { return r.v.Z }},
	{key: "mean_time", unit: second, meaning: "mean time of the landings", num: func(r *cellRow) float64 { return r.cell.Time / float64(r.cell.Landings) }},
	{key: "impacts", meaning: "landings, and of maps until rest the impacts after them", num: func(r *cellRow) float64 { return float64(r.cell.Touches) }},
	{key: "rests", meaning: "how many come to rest there, of maps until rest", num: func(r *cellRow) float64 { return float64(r.cell.Rests) }},
}

// CellColumns are those of maps/NAME.csv.
func CellColumns() []table.Column { return headers(cellColumns) }

// Rows gives the rows of maps/NAME.csv.
func (c *LandMap) Rows() iter.Seq[[]table.Cell] {
	return func(yield func([]table.Cell) bool) {
		for i := range c.Decks {
			d := &c.Decks[i]
			for k := range d.Cells {
				r := c.row(d, &d.Cells[k])
				if !yield(cells(cellColumns, &r)) {
					return
				}
			}
		}
	}
}

// placeRow is a place and height as a row.
type placeRow struct {
	at     Spot
	height float64
	over   string
	above  float64
}

var placeColumns = []column[placeRow]{
	{key: "deck", meaning: "deck, or flat floor, beneath the release", text: func(r *placeRow) string { return r.at.Deck }},
	{key: "spinward", unit: metre, meaning: "arc on that deck", num: func(r *placeRow) float64 { return r.at.Spinward }},
	{key: "axial", unit: metre, meaning: "axial place", num: func(r *placeRow) float64 { return r.at.Axial }},
	{key: "height", unit: metre, meaning: "height above that deck", num: func(r *placeRow) float64 { return r.height }},
	{key: "over", meaning: "deck or fixture that it is let go over", text: func(r *placeRow) string { return r.over }},
	{key: "above", unit: metre, meaning: "height above that", num: func(r *placeRow) float64 { return r.above }},
}

// ReachColumns are those of maps/NAME-reach.csv: places, then a share for each
// goal.
func (c *LandMap) ReachColumns() []table.Column {
	out := headers(placeColumns)
	for i := range c.Map.Goals {
		out = append(out, table.Column{Name: "reaches." + c.Map.Goals[i].Name, Kind: table.Number, Meaning: "share of the directions from there that reach " + c.Map.Goals[i].Name})
	}
	return out
}

// ReachRows gives the rows of maps/NAME-reach.csv: places where the body has
// room.
func (c *LandMap) ReachRows() iter.Seq[[]table.Cell] {
	return func(yield func([]table.Cell) bool) {
		for n, free := range c.free {
			if !free {
				continue
			}
			at, height, _ := c.Start(n * len(c.Directions))
			r := placeRow{at, height, c.Patches[c.patchOf(n)].Name, c.Map.Heights[n%len(c.Map.Heights)]}
			row := cells(placeColumns, &r)
			for g := range c.Map.Goals {
				row = append(row, table.Num(c.Reached(g, n)))
			}
			if !yield(row) {
				return
			}
		}
	}
}

// patchOf gives the patch of a place and height.
func (c *LandMap) patchOf(n int) int {
	i := len(c.offsets) - 1
	for c.offsets[i] > n/len(c.Map.Heights) {
		i--
	}
	return i
}

// MapTable is maps/NAME-summary.csv.
func MapTable(c *LandMap) *table.Table {
	var rows []SummaryRow
	nan := math.NaN()
	add := func(figure, of string, value float64, count int, unit string) {
		rows = append(rows, SummaryRow{figure, of, value, nan, nan, float64(count), unit})
	}
	shares := func(figure string, list []Share) {
		for _, h := range list {
			add(figure, h.Name, h.Share, h.Count, "")
		}
	}
	add("places", "places times heights", float64(c.Places), c.Places, "")
	shares("left_out", c.Skipped)
	add("directions", "", float64(len(c.Directions)), len(c.Directions), "")
	add("flights", "", float64(c.Flights), c.Flights, "")
	add("failed", "could not be computed", float64(c.Failed), c.Failed, "")
	add("landed", "", float64(c.Landed)/float64(c.Flights), c.Landed, "")
	add("time", "time ended", float64(c.Late)/float64(c.Flights), c.Late, "")
	add("lost", "left the habitat", float64(c.Gone)/float64(c.Flights), c.Gone, "")
	for i := range c.Surfaces {
		s := &c.Surfaces[i]
		add("share_on", s.Name, s.Share.Share, s.Count, "")
		add("worst_energy_on", s.Name, s.Worst.Energy, s.Touches, "J")
		add("worst_speed_on", s.Name, s.Worst.Speed, s.Touches, "m/s")
	}
	shares("share_through", append(c.Openings[:len(c.Openings):len(c.Openings)], c.Through))
	shares("share_reaching", c.Goals)
	for i := range c.Decks {
		add("landings_over_deck", c.Decks[i].Name, float64(c.Decks[i].Landings)/float64(c.Flights), c.Decks[i].Landings, "")
	}
	for _, f := range c.Footprints() {
		add("footprint", f.Deck, f.Area, f.Cells, "m^2")
	}
	return fill(mapSummaryColumns, rows)
}

// mapSummaryColumns are those of a scatter without its intervals: the flights of
// a map are no sample.
var mapSummaryColumns = []column[SummaryRow]{
	summaryColumns[0],
	{key: "of", meaning: "surface, opening, deck, thing reached or reason", text: func(r *SummaryRow) string { return r.Of }},
	summaryColumns[2],
	{key: "count", meaning: "how many flights, of a footprint cells, of places left out places", num: func(r *SummaryRow) float64 { return r.Count }},
	{key: "unit", meaning: "unit of the row; empty: a ratio or a number", text: func(r *SummaryRow) string { return r.Unit }},
}
