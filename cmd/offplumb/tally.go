package main

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"offplumb/plots"
	"offplumb/sim/flight"
	"offplumb/sim/measure"
	"offplumb/sim/model"
	"offplumb/sim/study"
	"offplumb/sim/table"
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

// streamFigures are the plans of the long lists, one for each deck that rows are
// over.
func streamFigures(j *job) []drawing {
	var out []drawing
	var names table.Namer
	for i := range j.streams {
		s := &j.streams[i]
		for _, deck := range s.tally.decks() {
			out = append(out, drawing{"list-" + names.Name(strings.TrimSuffix(s.of.File, ".csv")+" "+deck), "deck plan", s.of.File,
				func() (*plots.Figure, error) { return j.streamPlan(s, deck) }})
		}
	}
	return out
}

// decks names what dots are over, in the order in which they came.
func (t *tally) decks() (out []string) {
	for i := range t.dots {
		if !slices.Contains(out, t.dots[i].ground) {
			out = append(out, t.dots[i].ground)
		}
	}
	return out
}

func (j *job) streamPlan(s *streamResult, deck string) (*plots.Figure, error) {
	m := j.model()
	spec := plots.ScatterPlanSpec{NoFoot: true}
	d := -1
	var order []string
	places := map[string][]plots.Point{}
	for i := range s.tally.dots {
		p := &s.tally.dots[i]
		if p.ground != deck {
			continue
		}
		if d = p.deck; places[p.surface] == nil {
			order = append(order, p.surface)
		}
		places[p.surface] = append(places[p.surface], p.at)
		spec.Landed++
	}
	slices.SortStableFunc(order, func(a, b string) int { return len(places[b]) - len(places[a]) })
	for i, name := range order {
		if i >= groupsDrawn {
			g := &spec.Groups[groupsDrawn-1]
			g.Name, g.Places = "on other surfaces", append(g.Places, places[name]...)
			continue
		}
		spec.Groups = append(spec.Groups, plots.ScatterGroup{Name: fmt.Sprintf("on %s", name), Places: places[name]})
	}
	spec.Deck.Title, spec.Deck.Spin = fmt.Sprintf("%s: landings on the plan of %q", s.of.File, deck), m.Habitat.Spin
	spec.Deck.Notes = "Deck unrolled, seen from above by someone who stands on it. A mark for each landing of a release from over this deck, plumb under it, whatever it lands on." + s.thinned()
	if f := m.FlatDeck(d); f != nil {
		spec.Deck.From, spec.Deck.To = plots.Point{X: -f.Size[0] / 2, Y: -f.Size[1] / 2}, plots.Point{X: f.Size[0] / 2, Y: f.Size[1] / 2}
	} else {
		j.deckSheet(&spec.Deck, &m.Decks[d], d)
	}
	spec.Deck.Desc = described("Plan of %q with the landings of a release list. %s.", deck, s.sentence())
	return plots.ScatterPlan(spec)
}

// thinned says which rows are drawn.
func (s *streamResult) thinned() string {
	if s.tally.every == 1 {
		return ""
	}
	return fmt.Sprintf(" Of %d rows every %s is drawn.", s.tally.rows, ordinal(s.tally.every))
}

// ordinal writes a number as a place in a row.
func ordinal(n int) string {
	ending := "th"
	if n/10%10 != 1 {
		switch n % 10 {
		case 1:
			ending = "st"
		case 2:
			ending = "nd"
		case 3:
			ending = "rd"
		}
	}
	return fmt.Sprint(n) + ending
}

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
