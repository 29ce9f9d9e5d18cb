package main

import (
	"fmt"
	"math"
	"strings"

	"offplumb/plots/page"
	"offplumb/sim/measure"
	"offplumb/sim/table"
)

// doubts is what the numerical error of some landings comes to.
type doubts struct {
	most   measure.Numerical // the greatest of each
	of     string            // whose error of place is the greatest
	known  int
	unsure named // landings of which it is unsure what they touch
}

func (d *doubts) add(l *measure.Landing) {
	e := &l.Error
	if e.Unsure != "" {
		d.unsure.add(unsureWords(l))
	}
	if math.IsNaN(e.Place) {
		return
	}
	if d.known++; d.known == 1 || e.Place > d.most.Place {
		d.of, d.most.Place = l.Release, e.Place
	}
	d.most.Time, d.most.Speed = math.Max(d.most.Time, e.Time), math.Max(d.most.Speed, e.Speed)
}

// unsureWords name both things that a landing may touch.
func unsureWords(l *measure.Landing) string {
	surface := l.Surface
	if surface == "" {
		surface = "nothing"
	}
	return fmt.Sprintf("%s (%s, or %s)", l.Release, surface, l.Error.Unsure)
}

// doubts gathers those of all landings, rows of long lists included.
func (j *job) doubts() doubts {
	var out doubts
	for i := range j.landings {
		out.add(&j.landings[i])
	}
	for i := range j.streams {
		if s := &j.streams[i]; s.ran {
			out.join(&s.tally.doubts)
		}
	}
	return out
}

func (d *doubts) join(o *doubts) {
	if o.known > 0 && (d.known == 0 || o.most.Place > d.most.Place) {
		d.of, d.most.Place = o.of, o.most.Place
	}
	d.most.Time, d.most.Speed = math.Max(d.most.Time, o.most.Time), math.Max(d.most.Speed, o.most.Speed)
	d.known += o.known
}

// notable is the numerical error, in m, from which on the summary names whose it
// is: more than a design is drawn to.
const notable = 1e-4

// sumDoubts tells the numerical error of the landings in a line.
func sumDoubts(j *job, b *strings.Builder) {
	d := j.doubts()
	if d.known == 0 {
		return
	}
	words := fmt.Sprintf("Numerical error of the landings: at most %s m and %s s", tiny(d.most.Place), tiny(d.most.Time))
	if d.most.Place >= notable {
		words += fmt.Sprintf(", the greatest that of %s; smaller tolerances ([solver]) make it less", d.of)
	}
	b.WriteString(wrapped("  "+words+".", "    "))
}

// tiny writes an error, with a digit, rounded up.
func tiny(x float64) string {
	if x <= 0 || math.IsNaN(x) || math.IsInf(x, 0) {
		return table.Exact(x)
	}
	place := math.Pow(10, math.Floor(math.Log10(x)))
	s := fmt.Sprintf("%.0e", math.Ceil(x/place*(1-1e-12))*place)
	return strings.NewReplacer("e-0", "e-", "e+00", "", "e+0", "e").Replace(s)
}

// errorFacts tell the numerical error of a landing.
func errorFacts(l *measure.Landing) []page.Fact {
	switch e := &l.Error; {
	case e.Unsure != "":
		return []page.Fact{{Name: "Numerical error", Value: "unsure: it touches " + l.Surface + ", or " + e.Unsure}}
	case !math.IsNaN(e.Place):
		return []page.Fact{{Name: "Numerical error", Value: fmt.Sprintf("at most %s m, %s s, %s m/s", tiny(e.Place), tiny(e.Time), tiny(e.Speed))}}
	}
	return nil
}

// warnDoubts notes landings of which it is unsure what they touch, and verdicts
// that the numerical error could change.
func warnDoubts(j *job) {
	d := j.doubts()
	if d.unsure.count > 0 {
		j.note("releases", "first touch one thing, or with looser tolerances another, so near do they pass; take either as possible: %s", d.unsure.words())
	}
	for i := range j.streams {
		s := &j.streams[i]
		if n := &s.tally.doubts.unsure; n.count > 0 {
			j.note("release_list."+s.of.File, "first touch one thing, or with looser tolerances another, so near do they pass; take either as possible: %s", n.words())
		}
	}
	for i := range j.verdicts {
		if v := &j.verdicts[i]; v.Doubtful() {
			j.note("limit."+v.Limit, "%s, but %s", v.Verdict, v.Note())
		}
	}
}
