package main

import (
	"fmt"
	"math"
	"slices"

	"offplumb/plots"
	"offplumb/sim/measure"
	"offplumb/sim/model"
	"offplumb/sim/table"
)

// mapFigures are the figures of the landing maps: for each deck the landings and
// the worst of them, for each thing to be reached from where it is.
func mapFigures(j *job) []drawing {
	var out []drawing
	var names table.Namer
	for i := range j.maps {
		s := &j.maps[i]
		file := "map-" + names.Name(s.of.Name)
		if s.land == nil {
			continue
		}
		name := s.of.Name
		var decks table.Namer
		for k := range s.land.Decks {
			d := &s.land.Decks[k]
			base := file + "-" + decks.Name(d.Name)
			if d.Landings > 0 {
				out = append(out, drawing{file: base + "-landings", of: "landing map", name: name, make: func() (*plots.Figure, error) { return j.mapLandings(s, d) }})
			}
			out = append(out, drawing{file: base + "-worst", of: "landing map, worst", name: name, make: func() (*plots.Figure, error) { return j.mapWorst(s, d) }})
		}
		var goals table.Namer
		for g := range s.of.Goals {
			base := file + "-reaches-" + goals.Name(s.of.Goals[g].Name)
			if s.land.Goals[g].Count > 0 && s.land.Patches[0].Count() > 0 {
				out = append(out, drawing{file: base, of: "landing map, reach", name: name, make: func() (*plots.Figure, error) { return j.mapReach(s, g) }})
			}
		}
	}
	return out
}

// mapSheet is the plan of a deck, by the name that landings have it by.
func (j *job) mapSheet(name string) plots.DeckPlanSpec {
	m := j.model()
	spec := plots.DeckPlanSpec{Spin: m.Habitat.Spin}
	if d, ok := m.DeckNamed(name); ok && m.FlatDeck(d) == nil {
		j.deckSheet(&spec, &m.Decks[d], d)
		spec.Paths = nil
		return spec
	}
	if f := j.flatNamed(name); f != nil {
		j.flatSheet(&spec, f)
	}
	return spec
}

// mapLandings draws how the landings spread over a deck.
func (j *job) mapLandings(s *mapResult, d *measure.MapDeck) (*plots.Figure, error) {
	shades := s.land.MeanDensity(d)
	for i := range shades.Values {
		shades.Values[i] *= 100
	}
	spec := plots.MapPlanSpec{Deck: j.mapSheet(d.Name), Of: "landings: % of all flights, for each m²",
		Layers: s.layers(d, shades, doublings(shades.Values), "%/m²")}
	spec.Deck.Title = fmt.Sprintf("%s: landings on the plan of %q", s.of.Name, d.Name)
	spec.Words = s.beside(d)
	j.finishMap(s, d, "shades are means over a step", &spec)
	return plots.MapPlan(spec)
}

// mapWorst draws the worst energy on a deck, or the worst speed of what has no
// mass.
func (j *job) mapWorst(s *mapResult, d *measure.MapDeck) (*plots.Figure, error) {
	unit, of := "J", "worst impact energy, J"
	get := func(t *measure.Strike) float64 { return t.Energy }
	if math.IsNaN(s.land.Worst.Energy) {
		unit, of = "m/s", "worst impact speed, m/s"
		get = func(t *measure.Strike) float64 { return t.Speed }
	}
	worst := -1
	for i := range d.Cells {
		if d.Cells[i].Touches > 0 && (worst < 0 || d.Cells[i].Worst.Speed > d.Cells[worst].Worst.Speed) {
			worst = i
		}
	}
	shades := s.land.WorstNear(d, get)
	spec := plots.MapPlanSpec{Deck: j.mapSheet(d.Name), Of: of, Layers: s.layers(d, shades, evenSteps(shades.Values), unit)}
	if worst >= 0 {
		w := &d.Cells[worst].Worst
		spec.Mark, spec.MarkWords = &plots.Point{X: w.Spinward, Y: w.Axial}, "worst: "+withUnit(get(w), unit)
		at, height, v := s.land.Start(d.Cells[worst].From)
		spec.Words = append(spec.Words, fmt.Sprintf("worst: %s at %s, on %s", withUnit(get(w), unit), withUnit(w.Speed, "m/s"), w.Surface),
			fmt.Sprintf("let go at %s, %s above %s", s.placeWords(at.Spinward, at.Axial), withUnit(height, "m"), at.Deck))
		if s.of.Speed > 0 {
			spec.Words = append(spec.Words, fmt.Sprintf("with %s m/s spinward, %s axially, %s up", table.Fixed(v.X, 2), table.Fixed(v.Y, 2), table.Fixed(v.Z, 2)))
		}
	}
	spec.Deck.Title = fmt.Sprintf("%s: worst impact at each place of %q", s.of.Name, d.Name)
	spec.Words = append(spec.Words, s.ways())
	j.finishMap(s, d, "those between landings have the worst within a step", &spec)
	return plots.MapPlan(spec)
}

// finishMap adds what all maps of a deck have.
func (j *job) finishMap(s *mapResult, d *measure.MapDeck, between string, spec *plots.MapPlanSpec) {
	for i := range s.feet {
		if s.feet[i].Deck == d.Name {
			spec.Footprint = onPaper(s.feet[i].Loops)
		}
	}
	spec.Region = j.mapRegion(s, d.Name)
	spec.Deck.Notes = fromAbove(j.flatNamed(d.Name)) + fmt.Sprintf(" Squares of %s m, by the place plumb under each landing, whatever it lands on%s. "+
		"Strong line: the footprint of all landings.", given(s.of.Cell), s.between(between))
	if len(spec.Region) > 0 {
		spec.Deck.Notes += " Dashed: where things are let go."
	}
	spec.Deck.Desc = described("Map of %q. %s", d.Name, s.sentence())
}

// between says what a figure shows between landings, where cells are smaller
// than the step.
func (s *mapResult) between(words string) string {
	if s.of.Cell >= s.of.Step*(1-1e-9) {
		return ""
	}
	return fmt.Sprintf("; %s, %s m", words, given(s.of.Step))
}

func onPaper(loops [][][2]float64) (out [][]plots.Point) {
	for _, loop := range loops {
		path := make([]plots.Point, len(loop))
		for k, p := range loop {
			path[k] = plots.Point{X: p[0], Y: p[1]}
		}
		out = append(out, path)
	}
	return out
}

// mapRegion outlines where things are let go, as far as a deck is beneath.
func (j *job) mapRegion(s *mapResult, deck string) (out [][]plots.Point) {
	for i := range s.land.Patches {
		p := &s.land.Patches[i]
		var path []plots.Point
		for _, c := range p.Corners(j.model()) {
			at, ok := j.planned(c, deck, path)
			if !ok {
				path = nil
				break
			}
			path = append(path, at)
		}
		if path != nil {
			out = append(out, path)
		}
	}
	return out
}

// planned is where a place stands on the plan of the deck beneath it; false
// where that is another. Arcs run on from those before.
func (j *job) planned(c model.Place, deck string, before []plots.Point) (plots.Point, bool) {
	name, s, a := measure.Stand(j.model(), c)
	if name != deck {
		return plots.Point{}, false
	}
	if d, ok := j.model().DeckNamed(deck); ok && j.model().FlatDeck(d) == nil && len(before) > 0 {
		lap := 2 * math.Pi * j.model().Decks[d].Radius
		s -= lap * math.Round((s-before[len(before)-1].X)/lap)
	}
	return plots.Point{X: s, Y: a}, true
}

// leastBand is the share of the cells that the band below a level must have for
// the level's outline to bear its value: others run beside another one.
const leastBand = 0.04

// layers outlines where the values of cells are at least some levels.
func (s *mapResult) layers(d *measure.MapDeck, of measure.Shades, levels []float64, unit string) (out []plots.MapLayer) {
	before := 0
	for i, level := range levels {
		var cells [][2]int32
		for k, x := range of.Values {
			if x >= level {
				cells = append(cells, of.Cells[k])
			}
		}
		layer := plots.MapLayer{Label: bandWords(levels, i, of.Values, unit), Outlines: onPaper(s.land.Outlines(d, cells))}
		if float64(before-len(cells)) >= leastBand*float64(len(of.Cells)) {
			layer.Short = given(level) + " " + unit
		}
		out, before = append(out, layer), len(cells)
	}
	return out
}

// beside are the figures beside a map of landings.
func (s *mapResult) beside(d *measure.MapDeck) []string {
	c := s.land
	out := []string{fmt.Sprintf("over %s: %s of all flights", d.Name, percent(float64(d.Landings)/float64(c.Flights)))}
	for i := range s.feet {
		if f := &s.feet[i]; f.Deck == d.Name {
			out = append(out, fmt.Sprintf("footprint: %s m²", sigfig(f.Area, 3)))
		}
	}
	for i := range c.Openings {
		if o := &c.Openings[i]; o.Count > 0 || len(c.Openings) == 1 {
			out = append(out, "through "+o.Name+": "+percent(o.Share))
		}
	}
	surfaces := surfaceShares(c)
	slices.SortStableFunc(surfaces, func(a, b measure.Share) int { return b.Count - a.Count })
	for i := range min(len(surfaces), groupsDrawn) {
		out = append(out, "first on "+surfaces[i].Name+": "+percent(surfaces[i].Share))
	}
	out = append(out, s.ways())
	if n := c.SkippedPlaces(); n > 0 {
		out = append(out, fmt.Sprintf("%s left out", count(n, "place")))
	}
	return out
}
