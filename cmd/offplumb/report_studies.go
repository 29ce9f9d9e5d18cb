package main

import (
	"slices"
	"strings"

	"offplumb/plots/page"
	"offplumb/sim/measure"
	"offplumb/sim/table"
)

// studyCards makes the cards of each kind of study, in the order of the report.
// A further kind is one more line.
var studyCards = []func(*job, *shelf) []page.Card{letGoCards, platformCards, scatterCards, sweepCards, mapCards, throwCards}

func (j *job) studySection(s *shelf) page.Section {
	out := page.Section{Name: "Studies"}
	for _, cards := range studyCards {
		out.Cards = append(out.Cards, cards(j, s)...)
	}
	return out
}

// studyCard is a card of what most studies have: sentences, the figures of some
// kinds, tables, files.
func (j *job) studyCard(s *shelf, kind, name string, of, files []string, words ...string) page.Card {
	out := page.Card{Key: "study." + name, Kind: kind, Name: name, Words: append(words, j.judgedHere("study."+name))}
	out.Figures, out.Files = s.take(name, of...)
	out.Files = append(out.Files, j.filesOf(name, files...)...)
	return out
}

// with adds tables to a card.
func with(c page.Card, tables ...page.Table) page.Card {
	c.Tables = append(c.Tables, tables...)
	return c
}

func letGoCards(j *job, s *shelf) (out []page.Card) {
	var names table.Namer
	for i := range j.letgo {
		l := &j.letgo[i]
		file := "letgo/" + names.Name(l.name) + ".csv"
		out = append(out, with(j.studyCard(s, "Let-go series", l.name, []string{"let-go series", "side view of a let-go series"}, fileKinds.letGo, untitled(l.name, l.sentence())+"."),
			reported(measure.LetGoTable(l.rows), "Releases of the series", file)))
	}
	return out
}

func platformCards(j *job, s *shelf) (out []page.Card) {
	for i, rows := range j.spacings {
		name := j.model().Spacings[i].Name
		if rows != nil {
			out = append(out, with(j.studyCard(s, "Platforms", name, nil, fileKinds.platforms, untitled(name, j.platformWords(i, rows))+"."),
				reported(measure.PlatformTable(rows), "Platforms, outermost first", "platforms/")))
		}
	}
	return out
}

func scatterCards(j *job, s *shelf) (out []page.Card) {
	for i := range j.scatters {
		if r := &j.scatters[i]; r.cloud != nil {
			out = append(out, with(j.studyCard(s, "Scatter", r.of.Name, []string{"scatter"}, fileKinds.scatter, untitled(r.of.Name, r.sentence(j.flags.seed))),
				scatterTable(r.sum)))
		}
	}
	return out
}

// scatterTable is the summary of a scatter, less what only a program wants.
func scatterTable(s *measure.Scattered) page.Table {
	t := measure.ScatterTable(s)
	t.Rows = slices.DeleteFunc(t.Rows, func(row []table.Cell) bool {
		what := row[0].Text
		return what == "covariance" || strings.HasPrefix(what, "quantile_") && !slices.Contains([]string{"quantile_05", "quantile_50", "quantile_95"}, what)
	})
	out := reported(t, "What the samples come to", "scatter/")
	for _, row := range out.Rows {
		row[0].Text = spelt.Replace(row[0].Text)
	}
	out.Rest = "Further quantiles and the covariances are in the files of scatter/."
	return out
}

func sweepCards(j *job, s *shelf) (out []page.Card) {
	for i := range j.sweeps {
		if r := &j.sweeps[i]; r.points != nil {
			card := with(j.studyCard(s, "Sweep", r.Name, []string{"sweep", "sweep map"}, fileKinds.sweep, untitled(r.Name, r.sentence())+"."), reported(r.table(), "Points", "sweeps/"))
			if r.Variants != nil {
				card = with(card, changeTable(r))
				for _, words := range r.changeWords() {
					card.Words = append(card.Words, capital(words)+".")
				}
			}
			out = append(out, card)
		}
	}
	return out
}

// untitled drops the name that a sentence of the summary starts with: the card
// bears it.
func untitled(name, words string) string {
	if head := name + ": "; len(words) > len(head) && words[:len(head)] == head {
		return capital(words[len(head):])
	}
	return words
}
