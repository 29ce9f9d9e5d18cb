package measure

import (
	"math"

	"offplumb/sim/table"
)

// unit is how a quantity is printed: the ending of its column's name, its
// unit in words, the SI value of one of it, and the SI unit of its dimension.
type unit struct {
	suffix, name string
	scale        float64
	si           string
}

// of gives an SI value in the unit.
func (u unit) of(si float64) float64 {
	if u.scale == 0 {
		return si
	}
	return si / u.scale
}

// The units of the columns; a column without one is a ratio.
var (
	metre      = unit{"_m", "m", 1, "m"}
	second     = unit{"_s", "s", 1, "s"}
	perSecond  = unit{"_1_s", "1/s", 1, "rad/s"}
	speedUnit  = unit{"_m_s", "m/s", 1, "m/s"}
	accelUnit  = unit{"_m_s2", "m/s^2", 1, "m/s^2"}
	degreeRate = unit{"_deg_s", "deg/s", math.Pi / 180, "rad/s"}
	degree     = unit{"_deg", "deg", math.Pi / 180, "rad"}
	gravity    = unit{"_g", "g", 9.80665, "m/s^2"}
	turns      = unit{"_rpm", "rpm", math.Pi / 30, "rad/s"}
	newton     = unit{"_N", "N", 1, "N"}
	joule      = unit{"_J", "J", 1, "J"}
	watt       = unit{"_W", "W", 1, "W"}
	radPerSec2 = unit{"_rad_s2", "rad/s^2", 1, "rad/s^2"}
)

// column is one column of a table whose rows are made from a T. A number is
// in SI and printed in the column's unit; text has its own function.
type column[T any] struct {
	key     string // the name without its unit
	unit    unit
	meaning string
	num     func(*T) float64
	text    func(*T) string
	partly  bool // rows that it says nothing about have no value, and count in no limit
	pulled  bool // it tells of ambient gravity, and is left out without any
	later   bool // it tells of the time after a last change of the spin, and is left out without one
}

// header gives the column as the table package wants it.
func (c *column[T]) header() table.Column {
	h := table.Column{Name: c.key + c.unit.suffix, Unit: c.unit.name, Scale: c.unit.scale, Meaning: c.meaning, Kind: table.Number}
	if c.text != nil {
		h.Kind = table.Text
	}
	return h
}

// headers gives the columns of a table.
func headers[T any](cols []column[T]) []table.Column {
	out := make([]table.Column, len(cols))
	for i := range cols {
		out[i] = cols[i].header()
	}
	return out
}

// fill makes a table of rows.
func fill[T any](cols []column[T], rows []T) *table.Table {
	t := &table.Table{Columns: headers(cols), Rows: make([][]table.Cell, 0, len(rows))}
	for i := range rows {
		t.Add(cells(cols, &rows[i])...)
	}
	return t
}

func cells[T any](cols []column[T], row *T) []table.Cell {
	out := make([]table.Cell, len(cols))
	cellsInto(out, cols, row)
	return out
}

func cellsInto[T any](out []table.Cell, cols []column[T], row *T) {
	for i := range cols {
		if c := &cols[i]; c.text != nil {
			out[i] = table.Str(c.text(row))
		} else {
			out[i] = table.Num(c.num(row))
		}
	}
}

// liner writes the lines of rows one by one, as those of a table of them.
type liner[T any] struct {
	cols    []column[T]
	columns []table.Column
	cells   []table.Cell // of a row
}

func newLiner[T any](cols []column[T]) liner[T] {
	return liner[T]{cols, headers(cols), make([]table.Cell, len(cols))}
}

func (l *liner[T]) line(dst []byte, row *T) []byte {
	cellsInto(l.cells, l.cols, row)
	return table.AppendRow(dst, l.columns, l.cells)
}
