package main

import (
	"fmt"
	"io"
	"math"
	"strings"

	"offplumb/sim/flight"
	"offplumb/sim/measure"
	"offplumb/sim/model"
	"offplumb/sim/table"
)

// rowsShown bounds the rows of each table of the summary; the files have all.
const rowsShown = 40

// summary prints what came out, for people.
func (j *job) summary(w io.Writer) error {
	var b strings.Builder
	b.WriteString(j.Title + "\n" + spinLine(j.model()) + "\n")
	if words := turningWords(j.model()); words != "" {
		b.WriteString(wrapped(words, ""))
	}
	if words := ambientWords(j.model()); words != "" {
		b.WriteString(wrapped(words+" "+feltWords(j.model()), ""))
	}
	j.sumLandings(&b)
	sumStreams(j, &b)
	sumDoubts(j, &b)
	j.sumStories(&b)
	j.sumOutside(&b)
	j.sumPaths(&b)
	j.sumStudies(&b)
	sumScatter(j, &b)
	sumSweeps(j, &b)
	sumMaps(j, &b)
	sumThrows(j, &b)
	j.sumLimits(&b)
	if len(j.notes) > 0 {
		b.WriteString("\nWarnings\n")
		for _, n := range j.notes {
			b.WriteString(wrapped("- "+n.Of+": "+n.Msg, "  "))
		}
	}
	b.WriteString("\n" + wrapped("Caution: "+caution, ""))
	fmt.Fprintf(&b, "\nWritten to %s: %s.\n", j.out, j.written())
	_, err := io.WriteString(w, calm(b.String()))
	return err
}

func spinLine(m *model.Model) string {
	h := &m.Habitat
	way := "the floor moves spinward"
	if h.Spin < 0 {
		way = "negative, so the floor moves antispinward"
	}
	if h.Spin == 0 {
		if m.SpinChanges() {
			return "No spin at the beginning."
		}
		return "No spin."
	}
	return fmt.Sprintf("Spin %s rpm (%s); floor at %s m: %s g, rim speed %s m/s.", table.Round(rpm(h.Spin), 3), way,
		given(h.FloorRadius), table.Round(m.Gravity(h.FloorRadius)/model.StandardGravity, 3), table.Round(h.Spin*h.FloorRadius, 3))
}

// block appends a headed table, its first columns to the left.
func block(b *strings.Builder, head string, rows [][]string, left int, rest string) {
	right := make([]bool, len(rows[0]))
	for i := left; i < len(right); i++ {
		right[i] = true
	}
	more := ""
	if over := len(rows) - 1 - rowsShown; over > 0 {
		rows = rows[:1+rowsShown]
		more = fmt.Sprintf("  and %d more in %s\n", over, rest)
	}
	b.WriteString("\n" + head + "\n")
	for _, line := range table.Align(rows, right) {
		b.WriteString("  " + line + "\n")
	}
	b.WriteString(more)
}

func (j *job) sumLandings(b *strings.Builder) {
	if len(j.landings) == 0 {
		return
	}
	rows := [][]string{{"release", "outcome", "off plumb", j.causes(), "axially", "after", "at speed", "with energy"}}
	for i := range j.landings {
		if !j.inSeries(j.landings[i].Release) {
			rows = append(rows, landingRow(&j.landings[i]))
		}
	}
	if len(rows) == 1 {
		return
	}
	block(b, "Landings", rows, 2, "landings.csv")
}

// inSeries says whether a release belongs to a let-go series, which has a line
// of its own.
func (j *job) inSeries(release string) bool { return j.serial[release] }

func landingRow(l *measure.Landing) []string {
	axial := "-"
	if math.Abs(l.OffsetAxial) > leastShown {
		axial = withUnit(l.OffsetAxial, "m")
	}
	return []string{l.Release, ending(l), way(l.Offset), way(l.Deflection), axial,
		withUnit(l.Time, "s"), withUnit(l.Speed, "m/s"), withUnit(l.Energy, "J")}
}

// ending says how a release ended.
func ending(l *measure.Landing) string {
	switch l.Outcome {
	case flight.Landed:
		s := "on " + l.Surface
		if len(l.FellThrough) > 0 {
			s += ", through " + strings.Join(l.FellThrough, ", ")
		}
		return s
	case flight.Lost:
		if l.Away > 0 {
			return fmt.Sprintf("lost outside, %s m away", table.Round(l.Away, 3))
		}
		return fmt.Sprintf("lost, leaving the hull at %s deg, axial %s m", table.Fixed(l.Place.Phi*180/math.Pi, 1), table.Fixed(l.Place.Z, 1))
	}
	return "no landing"
}

// sumStories tells what came after the landing, a line a release.
func (j *job) sumStories(b *strings.Builder) {
	var lines []string
	for i := range j.rests {
		if r := &j.rests[i]; !j.inSeries(r.Release) && r.Outcome != flight.Landed && (r.Outcome != flight.TimeUp || r.Impacts > 0 || r.Slid > 0) {
			lines = append(lines, wrapped("  "+r.Release+": "+r.Story+".", "    "))
		}
	}
	if len(lines) == 0 {
		return
	}
	b.WriteString("\nHow they went\n")
	for i, line := range lines {
		if i == rowsShown {
			fmt.Fprintf(b, "  and %d more in rests.csv\n", len(lines)-rowsShown)
			break
		}
		b.WriteString(line)
	}
}

func (j *job) sumLimits(b *strings.Builder) {
	if len(j.verdicts) == 0 {
		return
	}
	rows := [][]string{{"limit", "verdict", "found", "allowed", "of", "source"}}
	for i := range j.verdicts {
		rows = append(rows, limitRow(&j.verdicts[i]))
	}
	block(b, "Limits", rows, len(rows[0]), "limits.csv")
}

func limitRow(v *measure.Verdict) []string {
	found := v.Found
	if found == "" {
		found = sigfig(v.Value, 3) + spaced(v.Unit)
		if !math.IsNaN(v.At) {
			found += " at " + table.Round(v.At, 3) + " s"
		}
	}
	if note := v.Note(); note != "" {
		found += ", " + note
	}
	source := v.Source
	if source == "" {
		source = "no source stated"
	}
	return []string{v.Limit, strings.ToUpper(v.Verdict[:1]) + v.Verdict[1:], found, allowed(v), v.Of, source}
}

func allowed(v *measure.Verdict) string {
	low, high := given(v.Min), given(v.Max)
	none := func(x float64) bool { return math.IsNaN(x) || math.IsInf(x, 0) }
	switch {
	case none(v.Min) && none(v.Max):
		return "-"
	case none(v.Min):
		return "at most " + high + spaced(v.Unit)
	case none(v.Max):
		return "at least " + low + spaced(v.Unit)
	}
	return low + " to " + high + spaced(v.Unit)
}

// written counts what is in the folder.
func (j *job) written() string {
	tables, figures, report := len(j.resources), len(j.files)-len(j.resources), ""
	if !j.flags.noReport {
		figures, report = figures-1, ", "+reportFile
	}
	s := count(tables, "table")
	if figures > 0 {
		s += ", " + count(figures, "figure")
	}
	return s + report + ", datapackage.json, run.json"
}
