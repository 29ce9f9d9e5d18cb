// Package table holds tables: columns with a unit and a meaning each, and rows
// of numbers and text. It has the program's one CSV writer and its one number
// formatter. It knows nothing of what the tables are about.
//
// A [Column] has a name that ends in its unit, the unit, the SI value of one
// unit, and a meaning; a [Table] has columns and rows of [Cell] in SI. What is
// written is in the column's unit. [StreamCSV] writes rows as they come, for
// tables that are not to be held in memory; [WriteDataPackage] describes the
// files of a folder for other programs; a [Namer] makes file names that differ.
//
// # Laws
//
//   - A number is written with the fewest digits that give the same double
//     back, so that a table read again has the same bits; NaN is an empty field.
//   - The same table gives the same bytes.
package table

import "fmt"

// Kind is what a column holds.
type Kind int

// The kinds of columns.
const (
	Number Kind = iota // a float64, in SI in the cell, in the column's unit when printed
	Integer
	Text
)

// Column describes a column.
type Column struct {
	Name    string  // with its unit as an ending, such as time_s
	Unit    string  // in words, such as m/s; empty: none
	Scale   float64 // the SI value of one unit; 0 counts as 1
	Meaning string  // one sentence
	Kind    Kind
}

// Cell is one entry: a number or a text, by the kind of its column.
type Cell struct {
	Num  float64 // SI; NaN is a missing value
	Text string
}

// Num is a cell of a number in SI; NaN is a missing value.
func Num(x float64) Cell { return Cell{Num: x} }

// Str is a cell of text.
func Str(s string) Cell { return Cell{Text: s} }

// Table is a table in memory. Rows have as many cells as there are columns.
type Table struct {
	Columns []Column
	Rows    [][]Cell
}

// Add appends a row. It panics if its length is wrong, a mistake of the
// caller.
func (t *Table) Add(row ...Cell) {
	if len(row) != len(t.Columns) {
		panic(fmt.Sprintf("table: a row of %d cells in a table of %d columns", len(row), len(t.Columns)))
	}
	t.Rows = append(t.Rows, row)
}

// Index gives the place of a column, or -1.
func (t *Table) Index(name string) int {
	for i := range t.Columns {
		if t.Columns[i].Name == name {
			return i
		}
	}
	return -1
}

// value is a cell's number in the unit of its column.
func (c *Column) value(cell Cell) float64 {
	if c.Scale == 0 || c.Scale == 1 {
		return cell.Num
	}
	return cell.Num / c.Scale
}
