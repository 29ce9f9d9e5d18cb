package table

import (
	"encoding/csv"
	"io"
	"iter"
)

// StreamCSV writes rows as they come, by RFC 4180: one header row, fields
// separated by commas, lines ended by CR LF. It keeps no row.
func StreamCSV(w io.Writer, columns []Column, rows iter.Seq[[]Cell]) error {
	out := csv.NewWriter(w)
	out.UseCRLF = true
	record := make([]string, len(columns))
	for i := range columns {
		record[i] = columns[i].Name
	}
	if err := out.Write(record); err != nil {
		return err
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
