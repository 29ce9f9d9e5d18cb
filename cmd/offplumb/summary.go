package main

import (
	"fmt"
	"io"
	"math"
	"strconv"
	"strings"

	"offplumb/sim/flight"
	"offplumb/sim/measure"
	"offplumb/sim/model"
	"offplumb/sim/table"
)

// rowsShown bounds the rows of each table of the summary; the files have all.
const rowsShown = 40

// textWidth is how wide running text of the summary is, in characters.
const textWidth = 100

// summary prints what came out, for people.
func (j *job) summary(w io.Writer) error {
	var b strings.Builder
	b.WriteString(j.Title + "\n" + spinLine(j.model()) + "\n")
	if words := turningWords(j.model()); words != "" {
		b.WriteString(wrapped(words, ""))
	}
	j.sumLandings(&b)
	sumStreams(j, &b)
	sumDoubts(j, &b)
	j.sumStories(&b)
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
	_, err := io.WriteString(w, b.String())
	return err
}

// rpm is a spin rate (rad/s) in revolutions a minute.
func rpm(spin float64) float64 { return spin * 30 / math.Pi }

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
	rows := [][]string{{"release", "outcome", "off plumb", "of it by the spin", "axially", "after", "at speed", "with energy"}}
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
		return fmt.Sprintf("lost, leaving the hull at %s deg, axial %s m", table.Fixed(l.Place.Phi*180/math.Pi, 1), table.Fixed(l.Place.Z, 1))
	}
	return "no landing"
}

// leastShown is the least magnitude shown, in SI: what is below, no reader
// cares for.
const leastShown = 5e-7

// sigfig rounds to significant digits.
func sigfig(x float64, digits int) string {
	if math.Abs(x) < leastShown {
		x = 0
	}
	return table.Round(x, digits)
}

// given writes a number as someone gave it, without zeros at its end.
func given(x float64) string {
	rounded, _ := strconv.ParseFloat(strconv.FormatFloat(x, 'g', 6, 64), 64)
	return strconv.FormatFloat(rounded, 'f', -1, 64)
}

// smaller are the units for small values of some units: each a thousandth of
// the one before.
var smaller = map[string][]string{"m": {"m", "mm"}, "J": {"J", "mJ", "uJ"}, "m/s": {"m/s", "mm/s"}}

// smallFrom is the magnitude below which a smaller unit is taken.
const smallFrom = 0.0099995

func withUnit(x float64, unit string) string {
	if math.IsNaN(x) {
		return "-"
	}
	units := smaller[unit]
	for k := 1; k < len(units) && math.Abs(x) < smallFrom && math.Abs(x) >= leastShown; k++ {
		x, unit = 1000*x, units[k]
	}
	return sigfig(x, 3) + " " + unit
}

// way says how far and which way along the deck.
func way(x float64) string {
	switch {
	case math.IsNaN(x):
		return "-"
	case math.Abs(x) < leastShown:
		return "0 m"
	case x > 0:
		return withUnit(x, "m") + " spinward"
	}
	return withUnit(-x, "m") + " antispinward"
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

func (j *job) sumPaths(b *strings.Builder) {
	rows := [][]string{{"crew path", "person", "takes", "gravity at feet", "at head", "weight", "side load up to", "friction demand up to", "clearance"}}
	for i := range j.paths {
		if p := &j.paths[i]; !p.skipped {
			rows = append(rows, p.row())
		}
	}
	if len(rows) > 1 {
		block(b, "Crew paths", rows, 2, "crew/")
	}
	for i := range j.paths {
		if p := &j.paths[i]; !p.skipped {
			for _, words := range measure.Ladders(j.model(), p.plan, p.loads) {
				b.WriteString(wrapped("  "+words+".", "    "))
			}
		}
	}
}

func (p *pathResult) row() []string {
	nan := math.NaN()
	feet, head, weight := newRange(), newRange(), newRange()
	side, friction := nan, nan
	for i := range p.loads {
		l := &p.loads[i]
		feet.add(l.GravityFeet / model.StandardGravity)
		head.add(l.GravityHead / model.StandardGravity)
		weight.add(l.Weight)
		side = math.Max(orZero(side), math.Hypot(l.SideSpinward, l.SideAxial))
		if math.IsNaN(l.FrictionDemand) {
			friction = math.Inf(1)
		} else {
			friction = math.Max(orZero(friction), l.FrictionDemand)
		}
	}
	demand := table.Fixed(friction, 2)
	if math.IsInf(friction, 1) {
		demand = "none: no weight"
	}
	return []string{p.plan.Path.Name, p.plan.Crew.Name, withUnit(p.plan.Duration(), "s"), feet.String() + " g", head.String() + " g",
		weight.String() + " N", withUnit(side, "N"), demand, withUnit(p.clearance.Gap, "m")}
}

func orZero(x float64) float64 {
	if math.IsNaN(x) {
		return 0
	}
	return x
}

// extent is the least and the greatest of some values.
type extent struct{ low, high float64 }

func newRange() *extent { return &extent{math.Inf(1), math.Inf(-1)} }

func (r *extent) add(x float64) { r.low, r.high = math.Min(r.low, x), math.Max(r.high, x) }

// String gives one value where both round to the same.
func (r *extent) String() string {
	low, high := sigfig(r.low, 3), sigfig(r.high, 3)
	if low == high {
		return low
	}
	return low + " to " + high
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

func spaced(unit string) string {
	if unit == "" {
		return ""
	}
	return " " + unit
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

// wrapped breaks running text, with an indent from the second line on.
func wrapped(text, indent string) string {
	var b strings.Builder
	col := 0
	for i, word := range strings.Fields(text) {
		switch n := len([]rune(word)); {
		case i == 0:
			lead := text[:len(text)-len(strings.TrimLeft(text, " "))]
			b.WriteString(lead)
			col = n + len(lead)
		case col+1+n > textWidth:
			b.WriteString("\n" + indent)
			col = len(indent) + n
		default:
			b.WriteByte(' ')
			col += 1 + n
		}
		b.WriteString(word)
	}
	return b.String() + "\n"
}
