package main

import (
	"fmt"
	"path/filepath"
	"slices"
	"strings"

	"offplumb/plots/page"
	"offplumb/sim/table"
)

// methodSection says how it was computed, with what tolerances, by which models
// and how far they hold.
func (j *job) methodSection() page.Section {
	out := page.Section{Name: "Method, models and their limits"}
	var sources []string
	trust := page.Table{Name: "How far to trust the models", Fixed: true, Columns: headings(4, "model", "checked against", "range", "known error")}
	for i := range statements {
		s := &statements[i]
		if !s.used(j) {
			continue
		}
		if s.topic != "" {
			out.List = append(out.List, page.Item{Of: s.topic, Words: strings.TrimSpace(s.how + " " + unquoted(s.holds))})
		}
		if s.against != "" {
			trust.Rows = append(trust.Rows, []page.Cell{{Text: s.topic}, {Text: s.against}, {Text: s.within}, {Text: s.off}})
		}
		sources = append(sources, s.sources...)
	}
	out.Tables = []page.Table{j.solverTable(), trust, sourceTable(sources)}
	return out
}

// unquoted drops the marks that the README sets keys in.
func unquoted(s string) string { return strings.ReplaceAll(s, "`", "") }

func (j *job) solverTable() page.Table {
	r := j.solver(j.model())
	t := page.Table{Name: "Solver", Fixed: true, Columns: headings(1, "tolerance or count", "value")}
	for _, row := range [][2]string{
		{"relative tolerance of each step, of what forces do", table.Exact(float64(r.Relative))},
		{"absolute tolerance of the position", table.Exact(float64(r.Position)) + " m"},
		{"absolute tolerance of the velocity", table.Exact(float64(r.Velocity)) + " m/s"},
		{"longest time of a release", given(float64(r.MaxTime)) + " s"},
		{"integration steps, all releases", fmt.Sprint(r.Steps)},
		{"steps rejected and taken anew", fmt.Sprint(r.Rejected)},
		{"seed of the samples", fmt.Sprint(j.flags.seed)},
	} {
		t.Rows = append(t.Rows, []page.Cell{{Text: row[0]}, {Text: row[1]}})
	}
	return t
}

func sourceTable(sources []string) page.Table {
	t := page.Table{Name: "Published sources that this run rests on", Fixed: true, Columns: headings(1, "source"),
		Words: "A source marked \"from memory\" was not at hand when the program was written."}
	for i, s := range sources {
		if !slices.Contains(sources[:i], s) {
			t.Rows = append(t.Rows, []page.Cell{{Text: s}})
		}
	}
	return t
}

// scenarioSection gives what was read, so that the run can be done again.
func (j *job) scenarioSection() page.Section {
	out := page.Section{Name: "Scenario", Text: j.Scenario.Text}
	t := page.Table{Name: "Files read", Fixed: true, Columns: headings(2, "file", "SHA-256")}
	for _, in := range j.Inputs {
		t.Rows = append(t.Rows, []page.Cell{{Text: filepath.Base(in.Name)}, {Text: in.SHA256}})
	}
	out.Tables = []page.Table{t}
	for _, s := range j.flags.sets {
		out.List = append(out.List, page.Item{Of: "Set on the command line", Words: s})
	}
	for _, s := range j.flags.only {
		out.List = append(out.List, page.Item{Of: "Run only", Words: s})
	}
	return out
}
