package main

import (
	"fmt"
	"math"
	"slices"

	"offplumb/plots/page"
	"offplumb/sim/measure"
	"offplumb/sim/model"
	"offplumb/sim/table"
)

// turningFacts are those of the title block of a habitat whose turning changes.
func turningFacts(m *model.Model) (out []page.Fact) {
	if m.SpinChanges() {
		out = append(out, page.Fact{Name: "Changes of the spin", Value: changeWords(m)})
	}
	if c := m.Habitat.Coning; m.Cones() {
		out = append(out, page.Fact{Name: "Coning of the axis", Value: fmt.Sprintf("half angle %s deg, once in %s s%s",
			given(degreesOf(c.HalfAngle)), given(math.Abs(c.Period)), against(c.Period))})
	}
	return out
}

// changeOfSpinTable lists the changes of the spin.
func changeOfSpinTable(m *model.Model) page.Table {
	t := page.Table{Name: "Changes of the spin", Columns: headings(0, "from", "to", "spin before", "spin after", "ramp"), Fixed: true}
	for i, unit := range []string{"s", "s", "rpm", "rpm", ""} {
		t.Columns[i].Unit, t.Columns[i].Number = unit, unit != ""
	}
	before := m.Habitat.Spin
	for _, c := range m.Habitat.Changes {
		row := []page.Cell{}
		for _, x := range []float64{c.Start, c.End(), rpm(before), rpm(c.To)} {
			row = append(row, page.Cell{Text: given(x), Value: x})
		}
		t.Rows = append(t.Rows, append(row, page.Cell{Text: rampWords(c.Linear)}))
		before = c.To
	}
	return bounded(t, "run.json")
}

// rampWords names the way a change of the spin goes, as the scenario does.
func rampWords(linear bool) string {
	if linear {
		return "linear"
	}
	return "smooth"
}

// listCards are those of the long release lists, whose rows have none.
func listCards(j *job, s *shelf) (out []page.Card) {
	for i := range j.streams {
		l := &j.streams[i]
		if !l.ran {
			continue
		}
		card := page.Card{Key: "release_list." + l.of.File, Kind: "Long release list", Name: l.of.File, Words: []string{untitled(l.of.File, l.sentence()) + "."}}
		card.Figures, card.Files = s.take(l.of.File, "release list")
		if l.tally.rows > 0 {
			card.Tables = []page.Table{tallyTable(&l.tally)}
		}
		out = append(out, card)
	}
	return out
}

// tallyTable is what a long list came to, by outcome, surface and opening.
func tallyTable(t *tally) page.Table {
	out := page.Table{Name: "What the rows came to", Columns: headings(2, "what", "of", "rows", "share"), Rest: "Each row is in landings.csv and rests.csv."}
	out.Columns[3].Unit = "%"
	for _, k := range []struct {
		kind, words string
		names       []string
	}{{"outcome", "outcome", t.outcomes}, {"surface", "first touch", t.surfaces}, {"opening", "fallen through", t.passed}} {
		for _, name := range k.names {
			n := t.counts[counted{k.kind, name}]
			share := 100 * float64(n) / float64(t.rows)
			out.Rows = append(out.Rows, []page.Cell{{Text: k.words}, {Text: name}, {Text: fmt.Sprint(n), Value: float64(n)}, {Text: table.Round(share, 3), Value: share}})
		}
	}
	return bounded(out, runFile)
}

// changeTable is what changed from the first variant to the others, without the
// releases that did not.
func changeTable(s *sweepResult) page.Table {
	rows := slices.DeleteFunc(s.changes(), func(c measure.Change) bool { return c.Kind() == "" })
	out := only(reported(measure.ChangeTable(rows), "What changed from the first variant", "sweeps/"), "release", "variant", "changed", "surface before", "surface after",
		"offset before", "offset after", "offset change", "speed before", "speed after", "speed change", "energy before", "energy after", "energy change", "falls through before", "falls through after")
	return withRest(out, "Releases that did not change are left out here; the file of changes has them, and more columns.")
}

func mapCards(j *job, s *shelf) (out []page.Card) {
	for i := range j.maps {
		r := &j.maps[i]
		if r.land == nil {
			continue
		}
		t := reported(measure.MapTable(r.land), "What the flights come to", "maps/")
		for _, row := range t.Rows {
			row[0].Text = spelt.Replace(row[0].Text)
		}
		out = append(out, with(j.studyCard(s, "Landing map", r.of.Name, []string{"landing map", "landing map, worst", "landing map, reach"}, fileKinds.landMap,
			untitled(r.of.Name, r.sentence())), t))
	}
	return out
}

// throwsTold bounds the throws that a card tells in words: a table to be printed
// has them all.
const throwsTold = 12

func throwCards(j *job, s *shelf) (out []page.Card) {
	for i, r := range j.throws {
		rows, ok := j.thrown(i)
		if !ok {
			continue
		}
		name := r.Of.Name
		words := []string{capital(throwAsked(r)) + "."}
		if lines := throwLines(r); len(lines) <= throwsTold {
			for _, line := range lines {
				words = append(words, capital(line))
			}
		}
		t := only(reported(measure.ThrowTable(rows), "Throws", "throws/"), "distance", "solution", "style", "outcome", "speed", "heading", "elevation", "time",
			"lead", "lead heading", "lead up", "top", "arrival speed", "miss 1deg heading", "miss 1deg elevation", "miss 1m s speed", "least speed", "surface", "hit time")
		out = append(out, with(j.studyCard(s, "Throw", name, []string{"throws", "throw table"}, fileKinds.throws, words...), withRest(t, "The file has more columns.")))
	}
	return out
}
