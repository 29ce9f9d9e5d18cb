package main

import (
	"path"
	"slices"
	"strings"

	"offplumb/plots/page"
)

// filesOf are the tables and moving pictures that were written about a thing, of
// some kinds, as run.json has them.
func (j *job) filesOf(name string, kinds ...string) (out []page.File) {
	for i := range j.files {
		e := &j.files[i]
		if (path.Ext(e.File) == ".csv" || e.Of == "moving picture") && e.Name == name && slices.Contains(kinds, e.Of) {
			out = append(out, page.File{Name: e.File, Path: e.File})
		}
	}
	return out
}

// fileKinds are the kinds of files about one thing, by what has a card.
var fileKinds = struct{ release, path, letGo, platforms, scatter, sweep, landMap, throws []string }{
	release:   []string{"moving picture", "track", "impacts", "outside"},
	path:      []string{"crew"},
	letGo:     []string{"let-go series"},
	platforms: []string{"platforms"},
	scatter:   []string{"scatter", "scatter summary", "scatter contour"},
	sweep:     []string{"sweep", "changes"},
	landMap:   []string{"landing map", "landing map summary", "landing map footprint", "landing map reach"},
	throws:    []string{"throws"},
}

// only keeps some columns of a table of the report, by their names, in the order
// of the names; it passes over those that are not there.
func only(t page.Table, names ...string) page.Table {
	var at []int
	for _, name := range names {
		if i := slices.IndexFunc(t.Columns, func(c page.Column) bool { return c.Name == name }); i >= 0 {
			at = append(at, i)
		}
	}
	pick := func(n int, get func(int)) {
		for k := range n {
			get(at[k])
		}
	}
	columns := make([]page.Column, 0, len(at))
	pick(len(at), func(i int) { columns = append(columns, t.Columns[i]) })
	rows := make([][]page.Cell, len(t.Rows))
	for r := range t.Rows {
		pick(len(at), func(i int) { rows[r] = append(rows[r], t.Rows[r][i]) })
	}
	t.Columns, t.Rows = columns, rows
	return t
}

// withRest adds where the rest of a table stands.
func withRest(t page.Table, words string) page.Table {
	t.Rest = strings.TrimSpace(t.Rest + " " + words)
	return t
}
