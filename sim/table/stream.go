package table

import (
	"bytes"
	"encoding/csv"
	"io"
	"iter"
)

// StreamCSV writes rows as they come, by RFC 4180: one header row, fields
// separated by commas, lines ended by CR LF. It keeps no row.
func StreamCSV(w io.Writer, columns []Column, rows iter.Seq[[]Cell]) error {
	var out []byte
	for i := range columns {
		out = appendText(out, columns[i].Name, i == 0)
	}
	out = append(out, lineEnd...)
	for row := range rows {
		if out = AppendRow(out, columns, row); len(out) >= flushAt {
			if _, err := w.Write(out); err != nil {
				return err
			}
			out = out[:0]
		}
	}
	_, err := w.Write(out)
	return err
}

// flushAt is how many bytes of a table are gathered before they are written.
const flushAt = 32 << 10

const lineEnd = "\r\n"

// AppendRow appends a row of a table as StreamCSV writes it.
func AppendRow(dst []byte, columns []Column, row []Cell) []byte {
	for i := range row {
		if c := &columns[i]; c.Kind == Text {
			dst = appendText(dst, guard(row[i].Text), i == 0)
		} else {
			dst = c.appendNumber(appendText(dst, "", i == 0), row[i])
		}
	}
	return append(dst, lineEnd...)
}

// appendText appends a field, with a comma before it unless it is the first of
// its row. One that may want quotes is left to the CSV writer of the standard
// library.
func appendText(dst []byte, s string, first bool) []byte {
	if !first {
		dst = append(dst, ',')
	}
	switch plain, comma := isPlain(s); {
	case plain && comma:
		return append(append(append(dst, '"'), s...), '"')
	case plain:
		return append(dst, s...)
	}
	var b bytes.Buffer
	out := csv.NewWriter(&b)
	out.UseCRLF = true
	_ = out.Write([]string{s}) // into memory: it cannot fail
	out.Flush()
	return append(dst, bytes.TrimSuffix(b.Bytes(), []byte(lineEnd))...)
}

// isPlain says that a text surely wants no quotes unless for a comma: it has
// letters, digits and a few signs of ASCII only, and blanks but not at its start.
func isPlain(s string) (plain, comma bool) {
	for i := range len(s) {
		c := s[i]
		comma = comma || c == ','
		if !(c == ',' || c >= 'a' && c <= 'z' || c >= 'A' && c <= 'Z' || c >= '0' && c <= '9' || c == ' ' && i > 0 || c == '_' || c == '-' || c == '.' || c == ';' || c == '/') {
			return false, comma
		}
	}
	return true, comma
}
