package main

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"offplumb/sim/table"
)

// top lists things by their number, the most first, as "floor 93 % (930)".
func (t *tally) top(kind string, names []string, of int) string {
	list := slices.Clone(names)
	slices.SortStableFunc(list, func(a, b string) int { return t.counts[counted{kind, b}] - t.counts[counted{kind, a}] })
	words := []string{}
	for i, name := range list {
		if i == namesTold {
			words = append(words, fmt.Sprintf("and %d more", len(list)-i))
			break
		}
		n := t.counts[counted{kind, name}]
		words = append(words, fmt.Sprintf("%s %d (%s)", name, n, percent(float64(n)/float64(of))))
	}
	return strings.Join(words, ", ")
}

// sentence tells a long list.
func (s *streamResult) sentence() string {
	t := &s.tally
	words := fmt.Sprintf("%s: %s", s.of.File, count(t.rows, "row"))
	if t.rows == 0 {
		return words
	}
	if t.landed < t.rows {
		words += ", " + t.top("outcome", t.outcomes, t.rows)
	}
	if t.landed > 0 {
		words += ". First touch: " + t.top("surface", t.surfaces, t.rows)
	}
	if len(t.passed) > 0 {
		words += ". Fallen through: " + t.top("opening", t.passed, t.rows)
	}
	if t.offset.lowName != "" {
		words += fmt.Sprintf(". Off plumb from %s (%s) to %s (%s)", way(t.offset.low), t.offset.lowName, way(t.offset.high), t.offset.highName)
	}
	if t.energy.highName != "" {
		words += fmt.Sprintf(". Greatest impact energy: %s (%s)", withUnit(t.energy.high, "J"), t.energy.highName)
	}
	return words
}

// sumStreams tells the long lists.
func sumStreams(j *job, b *strings.Builder) {
	head := false
	for i := range j.streams {
		s := &j.streams[i]
		if !s.ran {
			continue
		}
		if !head {
			b.WriteString("\nLong release lists\n")
			head = true
		}
		b.WriteString(wrapped("  "+s.sentence()+".", "    "))
	}
}

// warnStreams notes what the reader of a long list must know.
func warnStreams(j *job) {
	for i := range j.streams {
		s := &j.streams[i]
		if n := &s.tally.late; n.count > 0 {
			j.note("release_list."+s.of.File, "still move after the longest time, %s s: %s", table.Round(j.model().Solver.MaxTime, 4), n.words())
		}
		if n := &s.tally.stuck; n.count > 0 {
			j.note("release_list."+s.of.File, "are stuck, wedged between surfaces or in a motion that the model cannot resolve: %s", n.words())
		}
	}
}

// listRecord is a long list in run.json.
type listRecord struct {
	File     string        `json:"file"`
	Rows     int           `json:"rows"`
	Landed   int           `json:"landed"`
	Outcomes []shareRecord `json:"outcomes"`
	Surfaces []shareRecord `json:"surfaces"`
	Openings []shareRecord `json:"openings"`

	ErrorPlace number `json:"greatest_error_m"`
	ErrorTime  number `json:"greatest_error_s"`
	ErrorSpeed number `json:"greatest_error_m_s"`
}

func (j *job) listRecords() (out []listRecord) {
	for i := range j.streams {
		s := &j.streams[i]
		if !s.ran {
			continue
		}
		t := &s.tally
		shares := func(kind string, names []string) []shareRecord {
			out := []shareRecord{}
			for _, name := range names {
				n := t.counts[counted{kind, name}]
				out = append(out, shareRecord{Name: name, Count: n, Share: number(float64(n) / float64(t.rows)), Low: number(math.NaN()), High: number(math.NaN())})
			}
			return out
		}
		out = append(out, listRecord{s.of.File, t.rows, t.landed, shares("outcome", t.outcomes), shares("surface", t.surfaces), shares("opening", t.passed),
			number(t.doubts.most.Place), number(t.doubts.most.Time), number(t.doubts.most.Speed)})
	}
	return out
}
