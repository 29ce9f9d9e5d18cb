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
var studyCards = []func(*job, *shelf) []page.Card{letGoCards, platformCards, scatterCards, sweepCards}

func (j *job) studySection(s *shelf) page.Section {
	out := page.Section{Name: "Studies"}
	for _, cards := range studyCards {
		out.Cards = append(out.Cards, cards(j, s)...)
	}
	return out
}

// studyCard is a card of what most studies have: sentences, the figures of one
// kind, tables.
func studyCard(s *shelf, kind, of, name, words string, tables ...page.Table) page.Card {
	out := page.Card{Key: "study." + name, Kind: kind, Name: name, Words: []string{words}, Tables: tables}
	out.Figures, out.Files = s.take(name, of)
	return out
}

func letGoCards(j *job, s *shelf) (out []page.Card) {
	var names table.Namer
	for i := range j.letgo {
		l := &j.letgo[i]
		file := "letgo/" + names.Name(l.name) + ".csv"
		out = append(out, studyCard(s, "Let-go series", "let-go series", l.name, untitled(l.name, l.sentence())+".",
			reported(measure.LetGoTable(l.rows), "Releases of the series", file)))
	}
	return out
}

func platformCards(j *job, s *shelf) (out []page.Card) {
	for i, rows := range j.spacings {
		name := j.model().Spacings[i].Name
		if rows != nil {
			out = append(out, studyCard(s, "Platforms", "platforms", name, untitled(name, j.platformWords(i, rows))+".",
				reported(measure.PlatformTable(rows), "Platforms, outermost first", "platforms/")))
		}
	}
	return out
}

func scatterCards(j *job, s *shelf) (out []page.Card) {
	for i := range j.scatters {
		if r := &j.scatters[i]; r.cloud != nil {
			out = append(out, studyCard(s, "Scatter", "scatter", r.of.Name, untitled(r.of.Name, r.sentence(j.flags.seed)),
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
			out = append(out, studyCard(s, "Sweep", "sweep", r.Name, untitled(r.Name, r.sentence())+".",
				reported(r.table(), "Points", "sweeps/")))
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
