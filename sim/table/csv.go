package table

import (
	"io"
	"math"
	"slices"
	"strconv"
	"strings"
)

// Exact writes a number with the fewest digits that give the same double
// back. A missing value (NaN) is empty, and negative zero is zero. Infinities,
// which no table should hold, are spelt inf and -inf.
func Exact(x float64) string { return string(appendExact(nil, x)) }

func appendExact(dst []byte, x float64) []byte {
	switch {
	case math.IsNaN(x):
		return dst
	case math.IsInf(x, 1):
		return append(dst, "inf"...)
	case math.IsInf(x, -1):
		return append(dst, "-inf"...)
	case x == 0:
		return append(dst, '0')
	}
	return strconv.AppendFloat(dst, x, 'g', -1, 64)
}

// WriteCSV writes the table as StreamCSV does.
func (t *Table) WriteCSV(w io.Writer) error {
	return StreamCSV(w, t.Columns, slices.Values(t.Rows))
}

func (c *Column) appendNumber(dst []byte, cell Cell) []byte {
	x := c.value(cell)
	if c.Kind == Integer && x == math.Trunc(x) && math.Abs(x) < 1<<53 {
		return strconv.AppendInt(dst, int64(x), 10) // an exponent is no integer to readers of tables
	}
	return appendExact(dst, x)
}

// guard keeps a text from being taken for a formula by a spreadsheet, which
// starts one at = + - @, a tab or a line end: a name may come from someone
// else's list. It puts an apostrophe before it, as spreadsheets do for text.
// A text that is a number, or that only starts with a word such as "+axial
// side", is none.
func guard(s string) string {
	if s == "" || !strings.ContainsRune("=+-@\t\r\n", rune(s[0])) {
		return s
	}
	if _, err := strconv.ParseFloat(s, 64); err == nil {
		return s
	}
	if s[0] == '+' || s[0] == '-' {
		if rest := strings.TrimLeft(s, "+-"); isWords(rest) {
			return s
		}
	}
	return "'" + s
}

// isWords says whether a text holds letters, digits and spaces only, which no
// spreadsheet makes a formula with effects of.
func isWords(s string) bool {
	for _, r := range s {
		if !(r == ' ' || r >= '0' && r <= '9' || r >= 'a' && r <= 'z' || r >= 'A' && r <= 'Z') {
			return false
		}
	}
	return true
}
