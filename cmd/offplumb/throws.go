package main

import (
	"context"
	"fmt"
	"math"
	"strings"

	"offplumb/sim/measure"
	"offplumb/sim/study"
	"offplumb/sim/table"
)

// runThrows solves the throw studies that are asked for.
func (j *job) runThrows(ctx context.Context, p *progress) error {
	m := j.model()
	j.throws = make([]*study.Throws, len(m.Throws))
	for i := range m.Throws {
		t := &m.Throws[i]
		if !j.wanted(t.Name) {
			continue
		}
		found, err := j.ThrowTo(ctx, t, study.Options{Workers: j.flags.jobs, Done: func(done, of int) { p.tell("targets of "+t.Name, done, of) }})
		if ctx.Err() != nil {
			return context.Cause(ctx)
		}
		if err != nil {
			return fmt.Errorf("throw_to %q: %w", t.Name, err)
		}
		j.throws[i] = found
	}
	return nil
}

// thrown gives the rows of a throw study, if it ran.
func (j *job) thrown(i int) ([]measure.Throw, bool) {
	if i >= len(j.throws) || j.throws[i] == nil {
		return nil, false
	}
	return j.throws[i].Rows(), true
}

// throwTables are the tables of the throw studies.
func throwTables(j *job) []task {
	var out []task
	var names table.Namer
	for i := range j.model().Throws {
		name := j.model().Throws[i].Name
		file := "throws/" + names.Name(name) + ".csv"
		if rows, ok := j.thrown(i); ok {
			out = append(out, tableTask(file, "throws", name, "A row for each throw that reaches the target.", measure.ThrowTable(rows)))
		}
	}
	return out
}

// sumThrows tells each throw in words.
func sumThrows(j *job, b *strings.Builder) {
	head := false
	for _, s := range j.throws {
		if s == nil {
			continue
		}
		if !head {
			b.WriteString("\nThrows\n")
			head = true
		}
		b.WriteString(wrapped("  "+s.Of.Name+": "+throwAsked(s)+".", "    "))
		for k, line := range throwLines(s) {
			if k == rowsShown {
				fmt.Fprintf(b, "    and more in throws/\n")
				break
			}
			b.WriteString(wrapped("    "+line, "      "))
		}
	}
}

// warnThrows notes what the reader of a throw study must know.
func warnThrows(j *job) {
	for _, s := range j.throws {
		if s == nil {
			continue
		}
		none, blocked, slower, off := 0, 0, 0, 0.0
		for i := range s.Aims {
			a := &s.Aims[i]
			if len(a.Throws) == 0 {
				none++
			}
			if s.Of.Least && a.Falling && len(a.Throws) > 0 && a.LeastTime >= s.Longest*(1-1e-9) {
				slower++
			}
			for k := range a.Throws {
				if t := &a.Throws[k].Throw; t.Outcome != measure.ThrowArrives {
					blocked++
				} else {
					off = math.Max(off, t.Miss)
				}
			}
		}
		of := "study." + s.Of.Name
		if none > 0 && s.Of.Table() {
			j.note(of, "%s of %d without a throw that gets there", count(none, "distance"), len(s.Aims))
		} else if none > 0 {
			j.note(of, "%s", noThrowWords(s, &s.Aims[0]))
		}
		if blocked > 0 {
			j.note(of, "%s would get there, but something is in the way first", count(blocked, "throw"))
		}
		if slower > 0 {
			j.note(of, "throws that take the longest time looked at, %s, are slower yet than the slowest listed; a greater longest finds more", withUnit(s.Longest, "s"))
		}
		if off > s.Slack {
			j.note(of, "flown again, a throw is %s off its target when it should be there, more than the %s that the tolerances should leave", withUnit(off, "m"), withUnit(s.Slack, "m"))
		}
	}
}

type throwRecord struct {
	Study     string           `json:"study"`
	Longest   number           `json:"longest_s"`
	Slack     number           `json:"miss_tolerance_m"`
	Solutions []solutionRecord `json:"solutions"`
}

type solutionRecord struct {
	Distance  number `json:"distance_m"`
	Style     string `json:"style,omitempty"`
	Outcome   string `json:"outcome"`
	Surface   string `json:"surface,omitempty"`
	Speed     number `json:"speed_m_s"`
	Heading   number `json:"heading_deg"`
	Elevation number `json:"elevation_deg"`
	Time      number `json:"time_s"`
	Arrival   number `json:"arrival_speed_m_s"`
	Least     number `json:"least_speed_m_s"`
}

// throwRecords are the throw studies for run.json.
func (j *job) throwRecords() (out []throwRecord) {
	for i, s := range j.throws {
		rows, ok := j.thrown(i)
		if !ok {
			continue
		}
		r := throwRecord{Study: s.Of.Name, Longest: number(s.Longest), Slack: number(s.Slack), Solutions: []solutionRecord{}}
		for k := range rows {
			t := &rows[k]
			r.Solutions = append(r.Solutions, solutionRecord{number(t.Distance), t.Style, t.Outcome, t.Surface, number(t.Speed), number(degreesOf(t.Heading)),
				number(degreesOf(t.Elevation)), number(t.Time), number(t.ArriveSpeed), number(t.Least)})
		}
		out = append(out, r)
	}
	return out
}
