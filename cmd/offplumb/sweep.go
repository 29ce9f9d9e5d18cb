package main

import (
	"context"
	"fmt"
	"math"
	"slices"
	"strings"

	"offplumb/scenarios"
	"offplumb/sim/measure"
	"offplumb/sim/study"
	"offplumb/sim/table"
)

// sweepResult is a sweep and what it gave.
type sweepResult struct {
	*scenarios.Sweep
	points []study.Point // nil: not asked for
}

// sweepShare is the work of a sweep.
type sweepShare struct {
	j *job
	*sweepResult
}

func (s *sweepShare) of() (kind, name string) { return "sweep", s.Name }
func (s *sweepShare) items() int              { return s.Points() }
func (s *sweepShare) layout() string          { return study.Layout(study.PointOutcome{}) }
func (s *sweepShare) finish()                 {}

func (s *sweepShare) compute(ctx context.Context, r span, p *progress, out *study.Packer) error {
	s.room()
	run := study.Sweep{Points: s.Points(), Picks: s.Picks, Landings: s.Variants != nil, Variant: func(i int) (*study.Prepared, error) { return s.j.Variant(s.Sweep, i) }}
	opt := study.Options{Workers: s.j.flags.jobs, Done: func(done, of int) { p.tell("points of "+s.Name, done, of) }}
	if err := run.Compute(ctx, r.from, r.to, s.points, opt); err != nil {
		return err
	}
	return packItems(out, r, func(i int) study.PointOutcome { return s.points[i].Outcome() })
}

func (s *sweepShare) restore(r span, in *study.Unpacker) error {
	s.room()
	return takeItems(in, r, func(i int, o study.PointOutcome) { s.points[i] = o.Point() })
}

// room makes room for the points.
func (s *sweepShare) room() {
	if s.points == nil {
		s.points = make([]study.Point, s.Points())
	}
}

// columns are the keys, the measures and a note.
func (s *sweepResult) columns() []table.Column {
	var out []table.Column
	for i := range s.Keys {
		k := &s.Keys[i]
		c := table.Column{Name: k.Name + unitEnding(k.Unit), Unit: k.Unit, Meaning: "value of the key " + k.Name}
		if k.Words() {
			c.Kind = table.Text
		}
		out = append(out, c)
	}
	for i := range s.Picks {
		p := &s.Picks[i]
		same := func(q int) bool { return s.Picks[q].Measure == p.Measure }
		alone := !(i > 0 && same(i-1) || i+1 < len(s.Picks) && same(i+1))
		out = append(out, p.Column(alone))
	}
	return append(out, table.Column{Name: "note", Kind: table.Text, Meaning: "why the point has no measures"})
}

// unitEndings brings a unit to the ending of a column's name.
var unitEndings = strings.NewReplacer("°C", "degC", "°", "deg", "µ", "u", "^", "", "/", "_", " ", "_")

func unitEnding(unit string) string {
	if unit == "" {
		return ""
	}
	return "_" + unitEndings.Replace(unit)
}

func (s *sweepResult) table() *table.Table {
	t := &table.Table{Columns: s.columns()}
	for i := range s.points {
		p := &s.points[i]
		if !p.Finished() {
			continue
		}
		row := make([]table.Cell, 0, len(t.Columns))
		for k, at := range s.At(i) {
			if k := &s.Keys[k]; k.Words() {
				row = append(row, table.Str(k.Texts[at]))
			} else {
				row = append(row, table.Num(k.Values[at])) // in the key's own unit
			}
		}
		for k := range s.Picks {
			row = append(row, table.Num(s.value(i, k)))
		}
		note := ""
		if p.Fault != nil {
			note = p.Fault.Error()
		}
		t.Add(append(row, table.Str(note))...)
	}
	return t
}

// value is that of a pick at a point, SI; NaN where it has none.
func (s *sweepResult) value(point, pick int) float64 {
	if v := s.points[point].Values; v != nil {
		return v[pick]
	}
	return math.NaN()
}

// impossible counts the points without measures, and gives the first; -1: none.
func (s *sweepResult) impossible() (n, first int) {
	first = -1
	for i := range s.points {
		if s.points[i].Fault == nil {
			continue
		}
		if n++; first < 0 {
			first = i
		}
	}
	return n, first
}

// sweepTables are the tables of the sweeps.
func sweepTables(j *job) []task {
	var out []task
	var names table.Namer
	for i := range j.sweeps {
		s := &j.sweeps[i]
		file := "sweeps/" + names.Name(s.Name) + ".csv"
		if s.points != nil {
			like := &table.Table{Columns: s.columns()}
			out = append(out, lateTask(file, "sweep", s.Name, "A row for each point of a sweep.", s.table, like))
			if s.Variants != nil {
				file := strings.TrimSuffix(file, ".csv") + "-changes.csv"
				out = append(out, tableTask(file, "changes", s.Name, "A row for each release and each variant behind the first: what changed.", measure.ChangeTable(s.changes())))
			}
		}
	}
	return out
}

// warnSweeps notes the points that are impossible.
func warnSweeps(j *job) {
	for i := range j.sweeps {
		s := &j.sweeps[i]
		if long := j.LongLists(); s.Variants != nil && s.points != nil && len(long) > 0 {
			j.note("sweep."+s.Name, "long release lists are left out of variants: %s", someNames(long))
		}
		if n, first := s.impossible(); n > 0 {
			j.note("sweep."+s.Name, "%s of %d without measures; the first, %s: %v", count(n, "point"), len(s.points), s.Short(first), s.points[first].Fault)
		}
	}
}

// sumSweeps tells each sweep in a sentence.
func sumSweeps(j *job, b *strings.Builder) {
	head := false
	for i := range j.sweeps {
		s := &j.sweeps[i]
		if s.points == nil {
			continue
		}
		if !head {
			b.WriteString("\nSweeps\n")
			head = true
		}
		b.WriteString(wrapped("  "+s.sentence()+".", "    "))
		for _, words := range s.changeWords() {
			b.WriteString(wrapped("  "+words+".", "    "))
		}
	}
}

// picksTold bounds the measures that a sentence tells.
const picksTold = 6

func (s *sweepResult) sentence() string {
	words := make([]string, len(s.Keys))
	for i := range s.Keys {
		k := &s.Keys[i]
		if k.Words() {
			words[i] = k.Name + " " + someNames(k.Texts)
			continue
		}
		words[i] = k.Name + " " + fromTo(slices.Min(k.Values), slices.Max(k.Values)) + spaced(k.Unit)
	}
	text := fmt.Sprintf("%s: %s, %s", s.Name, count(len(s.points), "point"), strings.Join(words, ", "))
	for k := range s.Picks {
		if k == picksTold {
			return text + fmt.Sprintf("; and %d more measures", len(s.Picks)-k)
		}
		text += "; " + s.told(k)
	}
	return text
}

// fromTo gives one value where both are the same.
func fromTo(low, high float64) string {
	if low == high {
		return given(low)
	}
	return given(low) + " to " + given(high)
}

// told gives the range of a measure.
func (s *sweepResult) told(pick int) string {
	p := &s.Picks[pick]
	r, any := newRange(), false
	for i := range s.points {
		if x := s.value(i, pick); !math.IsNaN(x) {
			r.add(p.In(x))
			any = true
		}
	}
	if !any {
		return p.String() + " has no value"
	}
	return p.String() + " " + r.String() + spaced(p.Unit())
}
