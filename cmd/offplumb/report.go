package main

import (
	"bytes"
	"context"
	"fmt"
	"html/template"
	"io"
	"path/filepath"
	"slices"
	"strings"

	"offplumb/plots/motion"
	"offplumb/plots/page"
	"offplumb/sim/model"
	"offplumb/sim/table"
)

// reportFile is the report's name in the output folder.
const reportFile = "report.html"

// What the report holds at most, so that it stays light: a page of this many
// figures and rows is about 3 MB and opens within a second. The files have all.
const (
	figuresInReport = 40  // of each kind of figure
	cardsInReport   = 200 // of releases
	rowsInReport    = 500 // of each table
)

// putReport writes the report into the stage, once the figures are there.
func (j *job) putReport(ctx context.Context, st *stage) error {
	s, err := j.shelve(ctx, st)
	if err != nil {
		return err
	}
	films, err := j.films(ctx)
	if err != nil {
		return err
	}
	var b bytes.Buffer
	if err := page.Write(&b, j.report(s, films)); err != nil {
		return err
	}
	return st.file(reportFile, func(w io.Writer) error { _, err := b.WriteTo(w); return err })
}

// report fills the page. films are the players, of the releases that have one.
func (j *job) report(s *shelf, films map[int]template.HTML) *page.Report {
	r := &page.Report{Title: j.Title, Question: j.Question, Notes: j.Notes, Block: j.titleBlock(), Caution: caution, Program: programName + " " + version}
	r.Sections = append(r.Sections, j.verdictSection())
	if len(j.notes) > 0 {
		r.Sections = append(r.Sections, j.warningSection())
	}
	r.Sections = append(r.Sections, j.habitatSection(s))
	releases := func(s *shelf) page.Section { return j.releaseSection(s, films) }
	for _, make := range []func(*shelf) page.Section{releases, j.pathSection, j.studySection, askedSection} {
		if sec := make(s); len(sec.Cards)+len(sec.Tables)+len(sec.Figures)+len(sec.Files) > 0 {
			r.Sections = append(r.Sections, sec)
		}
	}
	if rest := s.rest(); len(rest) > 0 {
		r.Sections = append(r.Sections, page.Section{Name: "Further figures", Figures: rest})
	}
	r.Sections = append(r.Sections, j.methodSection(), j.scenarioSection())
	if len(films) > 0 {
		r.Styles, r.Scripts = []template.CSS{motion.Style()}, []template.JS{motion.Script()}
	}
	return r
}

// titleBlock is what identifies the run, as on a drawing.
func (j *job) titleBlock() []page.Fact {
	m := j.model()
	h := &m.Habitat
	air := "none"
	if !m.Air.Vacuum() {
		air = table.Round(m.Air.Density, 3) + " kg/m³"
	}
	block := []page.Fact{{Name: "Spin", Value: spinShort(m)}}
	block = append(block, turningFacts(m)...)
	block = append(block, []page.Fact{
		{Name: "Floor, from the axis", Value: given(h.FloorRadius) + " m"},
		{Name: "Gravity on the floor", Value: table.Round(m.Gravity(h.FloorRadius)/model.StandardGravity, 3) + " g"},
		{Name: "Rim speed", Value: table.Round(h.Spin*h.FloorRadius, 3) + " m/s"},
		{Name: "Air", Value: air},
		{Name: "Scenario", Value: filepath.Base(j.Scenario.Name)},
		{Name: "SHA-256, first digits", Value: j.Inputs[0].SHA256[:12]},
		{Name: "Written by", Value: programName + " " + version},
	}...)
	if words := ambientFact(m); words != "" {
		block = slices.Insert(block, 1, page.Fact{Name: "Ambient gravity", Value: words})
		for i := range block {
			if block[i].Name == "Gravity on the floor" {
				block[i].Name += ", by the spin"
			}
		}
	}
	return block
}

func spinShort(m *model.Model) string {
	spin, when := m.Habitat.Spin, ""
	if m.SpinChanges() {
		when = " at the beginning"
	}
	switch {
	case spin > 0:
		return table.Round(rpm(spin), 3) + " rpm" + when + ": the floor moves spinward"
	case spin < 0:
		return table.Round(rpm(spin), 3) + " rpm" + when + ": the floor moves antispinward"
	}
	return "none" + when
}

// askedSection holds the figures that the scenario asks for.
func askedSection(s *shelf) page.Section {
	out := page.Section{Name: "Figures asked for"}
	out.Figures, out.Files = s.asked()
	return out
}

func (j *job) verdictSection() page.Section {
	out := page.Section{Name: "Verdicts"}
	if len(j.Limits) == 0 {
		out.Words = []string{"The scenario sets no limits, so there is nothing to judge. The program has none of its own."}
		return out
	}
	out.Lead = j.tally()
	if len(j.verdicts) > 0 {
		out.Tables, out.Files = []page.Table{j.limitTable()}, j.filesOf("", "limits")
	}
	return out
}

// ranks order the verdicts, the gravest first.
var ranks = []struct {
	verdict string
	mark    page.Mark
}{{"broken", page.Strong}, {"near", page.Uneasy}, {"held", page.Calm}}

// tally counts the verdicts.
func (j *job) tally() string {
	var words []string
	for _, r := range ranks {
		n := 0
		for i := range j.verdicts {
			if j.verdicts[i].Verdict == r.verdict {
				n++
			}
		}
		words = append(words, fmt.Sprintf("%d %s", n, r.verdict))
	}
	s := fmt.Sprintf("Of %s: %s.", count(len(j.verdicts), "limit"), strings.Join(words, ", "))
	if len(j.unjudged) > 0 {
		s += " Not judged, since what they are about did not run or kept no track: " + strings.Join(j.unjudged, "; ") + "."
	}
	return s
}

func (j *job) limitTable() page.Table {
	t := page.Table{Name: "Limits", Words: "Each is judged at the worst that was found, the gravest verdict first."}
	for _, name := range []string{"limit", "verdict", "found", "allowed", "of", "source"} {
		t.Columns = append(t.Columns, page.Column{Name: name})
	}
	for _, r := range ranks {
		for i := range j.verdicts {
			v := &j.verdicts[i]
			if v.Verdict != r.verdict {
				continue
			}
			row := make([]page.Cell, 0, len(t.Columns))
			for _, text := range limitRow(v) {
				row = append(row, page.Cell{Text: text})
			}
			row[1].Mark, row[4].To = r.mark, j.cardOf(v.Of)
			t.Rows = append(t.Rows, row)
		}
	}
	return bounded(t, "limits.csv")
}

// cardOf gives the key of the card that tells about the subject of a limit: a
// release of a let-go series has none of its own.
func (j *job) cardOf(subject string) string {
	name, ok := strings.CutPrefix(subject, "release.")
	if i, found := j.model().ReleaseNamed(name); ok && found && j.Lets[i].Release.Series != "" {
		return "study." + j.Lets[i].Release.Series
	}
	return subject
}

// bounded cuts a table to what the report holds.
func bounded(t page.Table, file string) page.Table {
	if over := len(t.Rows) - rowsInReport; over > 0 {
		t.Rows = t.Rows[:rowsInReport]
		t.Rest = fmt.Sprintf("The first %d rows; %d more are in %s.", rowsInReport, over, file)
	}
	return t
}

func (j *job) warningSection() page.Section {
	out := page.Section{Name: "Warnings"}
	for _, n := range j.notes {
		out.List = append(out.List, page.Item{Of: n.Of, Words: n.Msg})
	}
	return out
}
