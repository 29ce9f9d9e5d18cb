package main

import (
	"fmt"
	"slices"
	"strings"

	"offplumb/plots"
	"offplumb/sim/table"
)

// streamFigures are the plans of the long lists, one for each deck that rows are
// over.
func streamFigures(j *job) []drawing {
	var out []drawing
	var names table.Namer
	for i := range j.streams {
		s := &j.streams[i]
		for _, deck := range s.tally.decks() {
			out = append(out, drawing{file: "list-" + names.Name(strings.TrimSuffix(s.of.File, ".csv")+" "+deck), of: "release list", name: s.of.File,
				make: func() (*plots.Figure, error) { return j.streamPlan(s, deck) }})
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
	spec.Deck.Notes = fromAbove(m.FlatDeck(d)) + " A mark for each landing of a release from over this deck, plumb under it, whatever it lands on." + s.thinned()
	if f := m.FlatDeck(d); f != nil {
		j.flatSheet(&spec.Deck, f)
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
