package main

import (
	"fmt"
	"html/template"
	"math"
	"slices"
	"strings"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/plots/page"
	"offplumb/sim/flight"
	"offplumb/sim/measure"
	"offplumb/sim/model"
	"offplumb/sim/table"
)

func (j *job) habitatSection(s *shelf) page.Section {
	figures := measure.HabitatOf(j.model(), 0, 0)
	out := page.Section{Name: "Habitat", Words: []string{spinLine(j.model()), turningWords(j.model())}, Files: j.filesOf("", "decks", "habitat", "spin")}
	if j.model().SpinChanges() {
		out.Tables = []page.Table{changeOfSpinTable(j.model())}
	}
	out.Tables = append(out.Tables, reported(measure.DeckTable(j.decks), "Decks", "decks.csv"), single(measure.HabitatTable(figures), "The habitat as a whole"))
	var beside []page.File
	out.Figures, beside = s.take("", "spin")
	out.Files = append(out.Files, beside...)
	return out
}

// single turns a table of one row on its side: what, how much, meaning what.
func single(t *table.Table, name string) page.Table {
	out := page.Table{Name: name, Fixed: true, Columns: []page.Column{{Name: "figure"}, {Name: "value", Number: true}, {Name: "what it is"}}}
	for i := range t.Columns {
		c := &t.Columns[i]
		cell := shown(c, t.Rows[0][i])
		cell.Text += spaced(headed(c).Unit)
		out.Rows = append(out.Rows, []page.Cell{{Text: headed(c).Name}, cell, {Text: headed(c).Meaning}})
	}
	return out
}

func (j *job) releaseSection(s *shelf, films map[int]template.HTML) page.Section {
	out := page.Section{Name: "Releases"}
	tracked := 0
	for i := range j.results {
		if !j.tracked(i) || j.inSeries(j.Lets[i].Release.Name) {
			continue
		}
		if tracked++; tracked <= cardsInReport {
			out.Cards = append(out.Cards, j.releaseCard(i, s, films[i]))
		}
	}
	if t := j.landingTable(); len(t.Rows) > 0 {
		out.Tables = []page.Table{t}
	}
	out.Cards = append(listCards(j, s), out.Cards...)
	shared, files := s.take(anyName, "apparent deflection", "deck plan")
	out.Figures = shared
	out.Words = j.leftOut(s, tracked, len(files))
	if j.showsReleases() {
		out.Files = append(j.filesOf("", "landings", "rests", "sensitivity", "clearance", "outside"), files...)
	}
	return out
}

// showsReleases says whether the report has a part on releases: those of let-go
// series stand with the studies.
func (j *job) showsReleases() bool {
	return slices.ContainsFunc(j.landings, func(l measure.Landing) bool { return !j.inSeries(l.Release) }) ||
		slices.ContainsFunc(j.streams, func(s streamResult) bool { return s.ran })
}

// leftOut says what of the releases stands in files only.
func (j *job) leftOut(s *shelf, tracked, files int) (out []string) {
	if tracked > cardsInReport {
		out = append(out, fmt.Sprintf("Of %d releases with tracks the first %d have a card here.", tracked, cardsInReport))
	}
	without := files
	for i := range s.list {
		if s.taken[i] && s.svg[i] == nil {
			without++
		}
	}
	if without > 0 {
		out = append(out, fmt.Sprintf("To keep the page light it holds at most %d figures of a kind, those about a limit that is broken or near before others; "+
			"the others are files beside it, and the cards lead to them.", figuresInReport))
	}
	return out
}

func (j *job) landingTable() page.Table {
	t := page.Table{Name: "Landings", Columns: headings(2, "release", "outcome", "off plumb", j.causes(), "axially", "after", "at speed", "with energy")}
	for i := range j.landings {
		l := &j.landings[i]
		if j.inSeries(l.Release) {
			continue
		}
		texts := landingRow(l)
		values := []float64{0, 0, l.Offset, l.Deflection, l.OffsetAxial, l.Time, l.Speed, l.Energy}
		row := make([]page.Cell, len(texts))
		for k := range texts {
			row[k] = page.Cell{Text: texts[k], Value: values[k]}
		}
		row[0].To = "release." + l.Release
		t.Rows = append(t.Rows, row)
	}
	return bounded(t, "landings.csv")
}

func (j *job) releaseCard(i int, s *shelf, film template.HTML) page.Card {
	r := &j.results[i]
	out := page.Card{Key: "release." + r.Landing.Release, Kind: "Release", Name: r.Landing.Release,
		Words: []string{untitled(r.Landing.Release, sentence(&r.Landing)) + ".", storyOf(r.Landing.Release, &r.Rest), slopeWords(j.slopesOf(r.Landing.Release)), j.judgedHere("release." + r.Landing.Release)}}
	out.Facts = []page.Group{{Name: "Release", Facts: j.startFacts(i)}, {Name: "Landing", Facts: landingFacts(&r.Landing)}, {Name: "End", Facts: restFacts(&r.Rest)}}
	out.Motion = film
	out.Figures, out.Files = s.take(r.Landing.Release, "side view", "inertial view")
	out.Files = append(out.Files, j.filesOf(r.Landing.Release, fileKinds.release...)...)
	return out
}

// storyOf tells how it went, after the landing.
func storyOf(name string, r *measure.Rest) string {
	if r.Story == "" || r.Outcome == flight.Landed || r.Outcome == flight.TimeUp && r.Impacts == 0 && r.Slid == 0 {
		return ""
	}
	return capital(r.Story) + "."
}

// judgedHere tells the verdicts whose worst was found here.
func (j *job) judgedHere(of string) string {
	var words []string
	for i := range j.verdicts {
		if v := &j.verdicts[i]; v.Of == of {
			words = append(words, v.Limit+": "+v.Verdict)
		}
	}
	if len(words) == 0 {
		return ""
	}
	return "Limits that find their worst here: " + strings.Join(words, "; ") + "."
}

// startFacts tell what is let go, where and how.
func (j *job) startFacts(i int) []page.Fact {
	let := &j.Lets[i]
	m := j.model()
	g := measure.GroundAt(m, let.Place.Polar, m.DeckBeneath(let.Place.Polar))
	_, axial, height := g.Place(let.Local.Pos, let.Place.Phi)
	return []page.Fact{
		{Name: "Body", Value: bodyWords(&let.Body)},
		{Name: "Let go", Value: fmt.Sprintf("%s above %s, at %s deg, axial %s m", withUnit(height, "m"), g.Name, table.Fixed(degreesOf(let.Place.Phi), 1), table.Fixed(axial, 2))},
		{Name: "Moving", Value: startWords(let)},
	}
}

func bodyWords(b *model.Body) string {
	var words []string
	if b.Name != "" {
		words = append(words, b.Name)
	}
	if b.Mass > 0 {
		words = append(words, given(b.Mass)+" kg")
	}
	if b.Diameter > 0 {
		return strings.Join(append(words, given(1000*b.Diameter)+" mm"), ", ")
	}
	return strings.Join(append(words, "a point, without drag"), ", ")
}

func startWords(let *flight.Let) string {
	switch v := r3.Norm(let.Local.Vel); {
	case let.Release.Start.Kind == model.Still:
		return "at rest in the inertial frame"
	case v < leastShown:
		return "at rest in the habitat"
	default:
		words := withUnit(v, "m/s") + " in the habitat"
		if c := let.Release.Carried; c != nil {
			words += ", carried along " + c.Path
		}
		return words
	}
}

func landingFacts(l *measure.Landing) []page.Fact {
	if l.Outcome != flight.Landed {
		return []page.Fact{{Name: "Outcome", Value: ending(l)}, {Name: "After", Value: withUnit(l.Time, "s")}}
	}
	out := []page.Fact{{Name: "Lands", Value: ending(l)}, {Name: "Off plumb", Value: way(l.Offset)}, {Name: "Of it by the spin", Value: way(l.Deflection)},
		{Name: "After", Value: withUnit(l.Time, "s")}, {Name: "At speed", Value: withUnit(l.Speed, "m/s")},
		{Name: "Incidence, 0 head-on", Value: table.Fixed(degreesOf(l.Incidence), 1) + " deg"}}
	if math.Abs(l.OffsetAxial) > leastShown {
		out = slices.Insert(out, 3, page.Fact{Name: "Axially", Value: withUnit(l.OffsetAxial, "m")})
	}
	if !math.IsNaN(l.Energy) {
		out = append(out, page.Fact{Name: "With energy", Value: withUnit(l.Energy, "J")})
	}
	return append(out, errorFacts(l)...)
}

func restFacts(r *measure.Rest) []page.Fact {
	if r.Outcome == flight.Landed || r.Outcome == flight.Lost {
		return nil
	}
	state := map[flight.Outcome]string{flight.Rested: "at rest", flight.Stuck: "stuck", flight.TimeUp: "still moving"}[r.Outcome]
	if r.Surface != "" {
		state += " on " + r.Surface
	}
	return []page.Fact{{Name: "Outcome", Value: state}, {Name: "After", Value: withUnit(r.Time, "s")},
		{Name: "There", Value: fmt.Sprintf("%s m on %s, axial %s m", table.Fixed(r.Arc, 2), r.Deck, table.Fixed(r.Place.Z, 2))},
		{Name: "Impacts", Value: fmt.Sprint(r.Impacts)}, {Name: "Way in all", Value: withUnit(r.Path, "m")}, {Name: "Of it slid", Value: withUnit(r.Slid, "m")}}
}

// nearShown is how many surfaces a crew path's card names.
const nearShown = 8

func (j *job) pathSection(s *shelf) page.Section {
	out := page.Section{Name: "Crew paths"}
	for i := range j.paths {
		if p := &j.paths[i]; !p.skipped {
			out.Cards = append(out.Cards, j.pathCard(p, s))
		}
	}
	if len(out.Cards) > 0 {
		out.Files = j.filesOf("", "clearance", "gravity")
	}
	return out
}

func (j *job) pathCard(p *pathResult, s *shelf) page.Card {
	name, c := p.plan.Path.Name, p.plan.Crew
	out := page.Card{Key: "path." + name, Kind: "Crew path", Name: name}
	for _, words := range measure.Ladders(j.model(), p.plan, p.loads) {
		out.Words = append(out.Words, capital(words)+".")
	}
	out.Words = append(out.Words, j.judgedHere("path."+name))
	row := p.row()
	list := []page.Fact{{Name: "Person", Value: fmt.Sprintf("%s, %s kg, %s m", c.Name, given(c.Mass), given(c.Stature))}}
	for i, head := range []string{"Takes", "Gravity at the feet", "Gravity at the head", "Weight", "Side load up to", "Friction demand up to", "Clearance"} {
		list = append(list, page.Fact{Name: head, Value: row[2+i]})
	}
	out.Facts = []page.Group{{Facts: list[:4]}, {Facts: list[4:]}}
	near := slices.Clone(p.near)
	slices.SortStableFunc(near, func(a, b measure.Clearance) int { return compareGap(a.Gap, b.Gap) })
	if len(near) > 0 {
		out.Tables = append(out.Tables, nearest(near))
	}
	if len(p.gravity) > 0 {
		out.Tables = append(out.Tables, reported(measure.GravityTable(p.gravity), "Times below and above levels of apparent gravity", "gravity.csv"))
	}
	out.Figures, out.Files = s.take(name, "crew path", "loads")
	out.Files = append(out.Files, j.filesOf(name, fileKinds.path...)...)
	return out
}

func compareGap(a, b float64) int {
	switch {
	case a < b:
		return -1
	case a > b:
		return 1
	}
	return 0
}

// nearest lists the closest surfaces.
func nearest(near []measure.Clearance) page.Table {
	t := page.Table{Name: "Clearance to the nearest surfaces", Columns: headings(1, "surface", "clearance", "at")}
	for i := range near[:min(len(near), nearShown)] {
		c := &near[i]
		t.Rows = append(t.Rows, []page.Cell{{Text: c.Surface}, {Text: withUnit(c.Gap, "m"), Value: c.Gap}, {Text: withUnit(c.Time, "s"), Value: c.Time}})
	}
	if over := len(near) - nearShown; over > 0 {
		t.Rest = fmt.Sprintf("%s more in clearance.csv.", count(over, "surface"))
	}
	return t
}
