package main

import (
	"fmt"
	"math"
	"strings"

	"offplumb/plots"
	"offplumb/sim/flight"
	"offplumb/sim/measure"
	"offplumb/sim/model"
	"offplumb/sim/study"
)

// tally is what stays of the rows of a long list.
type tally struct {
	rows, landed     int
	outcomes         []string
	counts           map[counted]int // of outcomes, surfaces and openings
	offset, energy   extreme
	late, stuck      named
	work             flight.Work
	dots             []dot
	every            int // row that has a dot
	surfaces, passed []string
	doubts           doubts
}

// extreme is the least and the greatest of a number, and whose it is.
type extreme struct {
	low, high         float64
	lowName, highName string
}

func (e *extreme) add(x float64, name string) {
	if math.IsNaN(x) {
		return
	}
	if e.lowName == "" || x < e.low {
		e.low, e.lowName = x, name
	}
	if e.highName == "" || x > e.high {
		e.high, e.highName = x, name
	}
}

// counted is a thing and its kind.
type counted struct{ kind, name string }

// named is how many there are of something, with the first names.
type named struct {
	count int
	first []string
}

func (n *named) add(name string) {
	if n.count++; len(n.first) < namesShown {
		n.first = append(n.first, name)
	}
}

func (n *named) words() string {
	if n.count <= len(n.first) {
		return strings.Join(n.first, "; ")
	}
	return fmt.Sprintf("%s; and %d more", strings.Join(n.first, "; "), n.count-len(n.first))
}

// dot is a row that is drawn.
type dot struct {
	ground  string
	deck    int
	surface string
	at      plots.Point // plumb under the landing
}

// newTally counts rows, of which as many as can be told apart are drawn: every
// second, third or so.
func newTally(rows int, few bool) tally {
	t := tally{counts: map[counted]int{}, every: max(1, (rows+plots.MostDots-1)/plots.MostDots)}
	if few {
		t.every = 1
	}
	return t
}

// count counts a thing of a kind, and keeps the order in which things came.
func (t *tally) count(kind, name string, order *[]string) {
	key := counted{kind, name}
	if t.counts[key]++; t.counts[key] == 1 {
		*order = append(*order, name)
	}
}

func (t *tally) add(j *job, number int, r *study.Row) {
	l := &r.Landing
	t.rows++
	t.count("outcome", l.Outcome.String(), &t.outcomes)
	if l.Outcome == flight.Landed {
		t.landed++
		t.count("surface", l.Surface, &t.surfaces)
	}
	for _, o := range l.AllThrough {
		t.count("opening", o, &t.passed)
	}
	t.offset.add(l.Offset, l.Release)
	t.doubts.add(l)
	t.energy.add(l.Energy, l.Release)
	switch {
	case r.Rest.Outcome == flight.TimeUp && r.Rest.Time >= j.model().Solver.MaxTime:
		t.late.add(l.Release)
	case r.Rest.Outcome == flight.Stuck:
		t.stuck.add(l.Release)
	}
	t.work.Steps += r.Work.Steps
	t.work.Rejected += r.Work.Rejected
	t.work.Derivs += r.Work.Derivs
	if number%t.every == 0 && l.Outcome == flight.Landed && !math.IsNaN(l.Offset) && len(t.dots) < plots.MostDots {
		t.dots = append(t.dots, dot{deck: r.Deck, ground: groundName(j.model(), r), surface: l.Surface,
			at: plots.Point{X: r.Foot[0] + l.Offset, Y: r.Foot[1] + l.OffsetAxial}})
	}
}

func groundName(m *model.Model, r *study.Row) string { return m.Decks[r.Deck].Name }

// judged gives the verdict on a limit over the scenario's releases and the rows
// of long lists, in the order of the file.
func (j *job) judged(i int, e measure.Evidence) (measure.Verdict, bool) {
	c := &j.Limits[i]
	if len(j.streams) == 0 {
		return c.Judge(e)
	}
	var out study.Judged
	from := 0
	some := func(to int) {
		v, ok := c.JudgeSome(e, from, to, from == 0)
		out.Add(study.Judged{Verdict: v, Any: ok})
		from = to
	}
	for k := range j.streams {
		s := &j.streams[k]
		some(s.of.After)
		if s.ran {
			out.Add(s.verdicts[i])
		}
	}
	some(len(j.Lets))
	return out.Verdict, out.Any
}
