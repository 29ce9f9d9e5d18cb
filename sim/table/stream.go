package table

import (
	"encoding/csv"
	"io"
	"iter"
	"slices"
)

// StreamCSV writes rows as they come, by RFC 4180: one header row, fields
// separated by commas, lines ended by CR LF. It keeps no row.
func StreamCSV(w io.Writer, columns []Column, rows iter.Seq[[]Cell]) error {
	return streamCSV(w, columns, rows, true)
}

// WriteRows writes the rows of a table as StreamCSV does, without the header
// row: more of a file that has it.
func (t *Table) WriteRows(w io.Writer) error {
	return streamCSV(w, t.Columns, slices.Values(t.Rows), false)
}

func streamCSV(w io.Writer, columns []Column, rows iter.Seq[[]Cell], head bool) error {
	out := csv.NewWriter(w)
	out.UseCRLF = true
	record := make([]string, len(columns))
	for i := range columns {
		record[i] = columns[i].Name
	}
	if head {
		if err := out.Write(record); err != nil {
			return err
		}
	}
	for row := range rows {
		for i := range row {
			record[i] = columns[i].field(row[i])
		}
		if err := out.Write(record); err != nil {
			return err
		}
	}
	out.Flush()
	return out.Error()
}
