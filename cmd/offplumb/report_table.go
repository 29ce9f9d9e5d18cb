package main

import (
	"math"
	"strings"

	"offplumb/plots/page"
	"offplumb/sim/table"
)

// reportDigits is how many significant digits a number of a file has in the
// report: more than a design is known to.
const reportDigits = 4

// reported is a file's table as the report shows it: rounded, without columns
// that hold nothing.
func reported(t *table.Table, name, file string) page.Table {
	out := page.Table{Name: name}
	var kept []int
	for i := range t.Columns {
		if i == 0 || holdsAny(t, i) {
			kept = append(kept, i)
			out.Columns = append(out.Columns, headed(&t.Columns[i]))
		}
	}
	for _, row := range t.Rows[:min(len(t.Rows), rowsInReport+1)] {
		cells := make([]page.Cell, len(kept))
		for k, i := range kept {
			cells[k] = shown(&t.Columns[i], row[i])
		}
		out.Rows = append(out.Rows, cells)
	}
	over := len(t.Rows) - len(out.Rows)
	out = bounded(out, file)
	if over > 0 {
		out.Rest = "The first rows; the others are in " + file + "."
	}
	return out
}

func holdsAny(t *table.Table, i int) bool {
	for _, row := range t.Rows {
		if c := row[i]; t.Columns[i].Kind == table.Text && c.Text != "" || t.Columns[i].Kind != table.Text && !math.IsNaN(c.Num) {
			return true
		}
	}
	return false
}

// headed turns a column's name into words and a unit.
func headed(c *table.Column) page.Column {
	name := strings.TrimSuffix(c.Name, unitEnding(c.Unit))
	return page.Column{Name: spelt.Replace(name), Unit: strings.ReplaceAll(c.Unit, "^2", "²"),
		Meaning: spelt.Replace(c.Meaning), Number: c.Kind != table.Text}
}

// spelt turns a column's name into words.
var spelt = strings.NewReplacer("_", " ", "coriolis", "Coriolis", "euler", "Euler")

// shown writes a cell for the report.
func shown(c *table.Column, cell table.Cell) page.Cell {
	if c.Kind == table.Text {
		return page.Cell{Text: cell.Text}
	}
	x := cell.Num
	if c.Scale != 0 {
		x /= c.Scale
	}
	digits := reportDigits
	if c.Kind == table.Integer {
		return page.Cell{Text: table.Exact(x), Value: x}
	}
	return page.Cell{Text: table.Round(x, digits), Value: x}
}

// headings are columns by their names, the first ones of words, the others of
// numbers.
func headings(words int, names ...string) []page.Column {
	out := make([]page.Column, len(names))
	for i, n := range names {
		out[i] = page.Column{Name: n, Number: i >= words}
	}
	return out
}
