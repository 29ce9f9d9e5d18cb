package main

import (
	"context"
	"fmt"
	"math"
	"strings"

	"offplumb/sim/measure"
	"offplumb/sim/model"
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

// throwAsked says what a study looks for.
func throwAsked(s *study.Throws) string {
	words := throwsOf(s.Of.Body)
	switch {
	case s.Of.Time > 0:
		words += " that take " + withUnit(s.Of.Time, "s")
	case s.Of.Least:
		words += ", the slowest that reach"
	default:
		words += " at " + withUnit(s.Of.Speed, "m/s")
	}
	if s.Of.Time == 0 {
		words += ", up to " + withUnit(s.Longest, "s") + " in flight"
	}
	if s.Of.Leaves > 0 {
		words += ", thrown at " + withUnit(s.Of.Leaves, "s")
	}
	if s.Of.Target.Path != "" {
		words += fmt.Sprintf(", to a point of the person on %q", s.Of.Target.Path)
	}
	return words
}

func throwsOf(body string) string {
	if body == "" {
		return "throws of a point"
	}
	return fmt.Sprintf("throws of %q", body)
}

func throwLines(s *study.Throws) []string {
	var out []string
	for i := range s.Aims {
		a := &s.Aims[i]
		lead := ""
		if s.Of.Table() {
			lead = distanceWords(s.Of, a.Distance) + ": "
		}
		if len(a.Throws) == 0 {
			out = append(out, lead+noThrowWords(s, a))
		}
		for k := range a.Throws {
			if s.Of.Table() {
				out = append(out, lead+shortThrow(&a.Throws[k].Throw))
			} else {
				out = append(out, throwWords(&a.Throws[k].Throw))
			}
		}
	}
	return out
}

// distanceWords says how far off a target of a table is, and which way.
func distanceWords(t *model.ThrowTo, d float64) string {
	switch {
	case t.Along == model.Spinward:
		return way(d)
	case d < 0:
		return withUnit(-d, "m") + " toward -axial"
	}
	return withUnit(d, "m") + " toward +axial"
}

// noThrowWords says that nothing reaches, and what would.
func noThrowWords(s *study.Throws, a *study.Aimed) string {
	if math.IsNaN(a.Least) || math.IsInf(a.Least, 0) {
		words := "no throw was found that gets there"
		if a.Most > 0 {
			words += ", of up to " + withUnit(a.Most, "m/s") + " and within " + withUnit(math.Max(s.Longest, s.Of.Time), "s")
		}
		return words + "."
	}
	if s.Of.Least {
		return fmt.Sprintf("no throw is slower than those that take a little more time, up to %s; one of that time takes %s.", withUnit(s.Longest, "s"), withUnit(a.Least, "m/s"))
	}
	if a.Least < s.Of.Speed {
		return fmt.Sprintf("no throw at that speed gets there within %s; slower ones do, the slowest at %s, in flight for %s.",
			withUnit(s.Longest, "s"), withUnit(a.Least, "m/s"), withUnit(a.LeastTime, "s"))
	}
	return fmt.Sprintf("out of reach at %s within %s; the least speed that gets there is %s, in flight for %s.",
		withUnit(s.Of.Speed, "m/s"), withUnit(s.Longest, "s"), withUnit(a.Least, "m/s"), withUnit(a.LeastTime, "s"))
}

// throwWords tells a throw so that someone can make it.
func throwWords(t *measure.Throw) string {
	words := fmt.Sprintf("%d %s: at %s point %s", t.Solution, t.Style, withUnit(t.Speed, "m/s"), pointWords(t.Heading, t.Elevation))
	if lead := leadWords(t); lead != "" {
		words += ", " + lead
	}
	words += "; " + endWords(t)
	words += fmt.Sprintf(". Highest %s. It passes %s off for each degree of heading, %s of elevation, %s for each 0.1 m/s.", withUnit(t.Height, "m"),
		withUnit(t.PerHeading*math.Pi/180, "m"), withUnit(t.PerElev*math.Pi/180, "m"), withUnit(t.PerSpeed*0.1, "m"))
	return words
}

// shortThrow tells a throw of a table.
func shortThrow(t *measure.Throw) string {
	words := fmt.Sprintf("%s, at %s point %s", t.Style, withUnit(t.Speed, "m/s"), pointWords(t.Heading, t.Elevation))
	if lead := leadWords(t); lead != "" {
		words += ", " + lead
	}
	return words + "; " + endWords(t) + "."
}

// endWords says how a throw ends.
func endWords(t *measure.Throw) string {
	switch t.Outcome {
	case measure.ThrowHits:
		return fmt.Sprintf("it would take %s, but hits %s first, after %s, %s high on %q at %s, axial %s", withUnit(t.Time, "s"), t.Surface, withUnit(t.HitTime, "s"),
			withUnit(t.Hit.Height, "m"), t.Hit.Deck, way(t.Hit.Spinward), withUnit(t.Hit.Axial, "m"))
	case measure.ThrowLost:
		return fmt.Sprintf("it would take %s, but leaves the habitat after %s", withUnit(t.Time, "s"), withUnit(t.HitTime, "s"))
	}
	return fmt.Sprintf("it arrives after %s at %s", withUnit(t.Time, "s"), withUnit(t.ArriveSpeed, "m/s"))
}

// levelAngle is the angle, rad, below which a direction counts as level, or
// straight along: less than a hand can hold.
const levelAngle = 0.05 * math.Pi / 180

// pointWords says where to point.
func pointWords(heading, elevation float64) string {
	up := "level"
	if math.Abs(elevation) > math.Pi/2-levelAngle {
		return upDown(elevation, "straight up", "straight down")
	}
	if math.Abs(elevation) >= levelAngle {
		up = degWords(math.Abs(elevation)) + upDown(elevation, " up", " down")
	}
	return headingWords(heading) + ", " + up
}

func upDown(x float64, up, down string) string {
	if x < 0 {
		return down
	}
	return up
}

func degWords(rad float64) string { return table.Fixed(degreesOf(rad), 1) + " deg" }

// headingWords names a heading by the nearest of the four directions, and how
// far it is turned from that.
func headingWords(h float64) string {
	axial, along := upDown(h, "+axial", "-axial"), "spinward"
	from := math.Abs(h)
	if from > math.Pi/2 {
		from, along = math.Pi-from, "antispinward"
	}
	if from > math.Pi/4 {
		from, along, axial = math.Pi/2-from, axial, along
	}
	if from < levelAngle {
		return along
	}
	return along + " turned " + degWords(from) + " toward " + axial
}

// steep is the elevation, rad, of a line to a target beyond which a turn to
// the side says little: the lead is told as one angle.
const steep = 75 * math.Pi / 180

// leadWords says how far from the line to the target to point.
func leadWords(t *measure.Throw) string {
	if math.IsNaN(t.Lead) {
		return ""
	}
	if math.Abs(t.SightElev) > steep || math.Abs(t.LeadHeading) > math.Pi/2 {
		return degWords(t.Lead) + " from where it is seen"
	}
	var words []string
	if math.Abs(t.LeadUp) >= levelAngle {
		words = append(words, degWords(math.Abs(t.LeadUp))+upDown(t.LeadUp, " above", " below"))
	}
	if math.Abs(t.LeadHeading) >= levelAngle {
		words = append(words, degWords(math.Abs(t.LeadHeading))+" "+sideWords(t.SightHead, t.LeadHeading))
	}
	switch {
	case len(words) == 0:
		return "straight at it"
	case math.Abs(t.LeadHeading) < levelAngle:
		return words[0] + " where it is seen"
	}
	return strings.Join(words, " and ") + " of where it is seen"
}

// sideWords names the side to which a turn leads someone who looks along a
// heading.
func sideWords(look, turn float64) string {
	sin, cos := math.Sincos(look)
	sign := math.Copysign(1, turn)
	if math.Abs(sin) >= math.Abs(cos) {
		return upDown(-sin*sign, "spinward", "antispinward")
	}
	return upDown(cos*sign, "+axial", "-axial")
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
