package main

import (
	"fmt"
	"path"
	"path/filepath"
	"runtime"
	"slices"
	"strings"
	"testing"
)

const columnsPage = "../../sim/measure/COLUMNS.md"

// dictionary is a sort of table and its columns.
type dictionary struct {
	of, file, title string
	fields          []packageField
}

// TestReadmeColumnsPage holds the page of the columns against the tables that
// the frozen scenarios give, which are of every sort.
func TestReadmeColumnsPage(t *testing.T) {
	if runtime.GOARCH != "amd64" {
		t.Skip("held for one architecture, as the other pages are")
	}
	scenarios, err := filepath.Glob(filepath.Join(frozenDir, "*.toml"))
	if err != nil {
		t.Fatal(err)
	}
	var all []dictionary
	for _, scenario := range scenarios {
		out := ran(t, scenario)
		var pkg packageFile
		var record struct{ Files []entry }
		unmarshalFile(t, filepath.Join(out, "datapackage.json"), &pkg)
		unmarshalFile(t, filepath.Join(out, runFile), &record)
		for i := range pkg.Resources {
			r := &pkg.Resources[i]
			n := slices.IndexFunc(record.Files, func(e entry) bool { return e.File == r.Path })
			if n < 0 {
				t.Fatalf("%s is not in %s", r.Path, runFile)
			}
			all = noted(all, &record.Files[n], r)
		}
	}
	slices.SortStableFunc(all, func(a, b dictionary) int { return strings.Compare(a.file, b.file) })
	same(t, columnsPage, []byte(columnsText(all)))
}

// noted adds a table to the dictionary of its sort. Columns with a dot in
// their name are the scenario's own: those of the first table stand for all.
func noted(all []dictionary, e *entry, r *packageTable) []dictionary {
	at := slices.IndexFunc(all, func(d dictionary) bool { return d.of == e.Of })
	if at < 0 {
		return append(all, dictionary{e.Of, pattern(e), strings.TrimPrefix(r.Title, e.Name+": "), r.Schema.Fields})
	}
	d := &all[at]
	last := -1 // where the column before stands
	for _, f := range r.Schema.Fields {
		n := slices.IndexFunc(d.fields, func(o packageField) bool { return o.Name == f.Name })
		if n < 0 && !strings.Contains(f.Name, ".") {
			n = last + 1
			d.fields = slices.Insert(d.fields, n, f)
		}
		last = max(last, n)
	}
	return all
}

// pattern is a file's name, with NAME for that of what it is about.
func pattern(e *entry) string {
	dir, file := path.Split(e.File)
	if dir == "" {
		return file
	}
	ending := ".csv"
	for _, tail := range []string{"-summary.csv", "-contour.csv", "-changes.csv", "-footprint.csv", "-reach.csv"} {
		if strings.HasSuffix(file, tail) {
			ending = tail
		}
	}
	return dir + "NAME" + ending
}

func columnsText(all []dictionary) string {
	var b strings.Builder
	b.WriteString(`# The columns of every table

Made from the program: ` + "`go test ./cmd/offplumb -run Readme -update`" + ` rewrites this page. Each run has the same words for its own tables
in ` + "`datapackage.json`" + `. A limit names a column as ` + "`landings.offset`" + `: the table, a dot, and the column without its unit.

Names end in their unit. Numbers have the fewest digits that give the same double back, and a missing value is an empty
field (RFC 4180, UTF-8, one header row). Columns with a dot in their name are a scenario's own, and these are examples.

`)
	for _, d := range all {
		fmt.Fprintf(&b, "- [`%s`](#%s)\n", d.file, anchor(d.file))
	}
	for _, d := range all {
		fmt.Fprintf(&b, "\n## %s\n\n%s\n\n| column | unit | meaning |\n| --- | --- | --- |\n", d.file, d.title)
		for _, f := range d.fields {
			unit := f.Unit
			if unit == "" && f.Type == "string" {
				unit = "text"
			}
			fmt.Fprintf(&b, "| `%s` | %s | %s |\n", f.Name, unit, strings.ReplaceAll(f.Description, "|", `\|`))
		}
	}
	return b.String()
}

// anchor is the link to a heading, as those who show Markdown make it.
func anchor(heading string) string {
	return strings.Map(func(r rune) rune {
		if r >= 'a' && r <= 'z' || r >= '0' && r <= '9' || r == '-' {
			return r
		}
		return -1
	}, strings.ToLower(heading))
}
