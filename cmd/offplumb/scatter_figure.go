package main

import (
	"fmt"
	"math"
	"slices"

	"offplumb/plots"
	"offplumb/sim/flight"
	"offplumb/sim/measure"
	"offplumb/sim/table"
)

func degreesOf(rad float64) float64 { return rad * 180 / math.Pi }

// scatterFigures are the figures of the scatters.
func scatterFigures(j *job) []drawing {
	var out []drawing
	var names table.Namer
	for i := range j.scatters {
		s := &j.scatters[i]
		file := "scatter-" + names.Name(s.of.Name)
		if s.cloud != nil && s.sum.Landed > 0 {
			out = append(out, drawing{file: file, of: "scatter", name: s.of.Name, make: func() (*plots.Figure, error) { return j.scatterPlan(s) }})
		}
	}
	return out
}

// scatterPlan draws the landings on the plan of the floor beneath the release.
func (j *job) scatterPlan(s *scatterResult) (*plots.Figure, error) {
	m := j.model()
	at, _ := m.ReleaseNamed(s.of.Of)
	let := &j.Lets[at]
	d := m.DeckBeneath(let.Place.Polar)
	g := measure.GroundAt(m, let.Place.Polar, d)
	spec := plots.ScatterPlanSpec{Foot: footOn(&g, let), Landed: s.sum.Landed}
	deck := &spec.Deck
	deck.Title, deck.Spin = fmt.Sprintf("%s: landings on the plan of %q", s.of.Name, g.Name), m.Habitat.Spin
	deck.Notes = fromAbove(g.Flat) + " A mark for each landing, plumb under it, whatever it lands on. " +
		"Dashed: the ellipse that would hold 95 % of a normal distribution. Heavy line: the smallest area that holds 95 % of these landings, by their density, smoothed. Shares with their 95 % confidence intervals."
	if f := g.Flat; f != nil {
		j.flatSheet(deck, f)
	} else {
		j.deckSheet(deck, &m.Decks[d], d)
	}
	on := func(x, y float64) plots.Point { return plots.Point{X: spec.Foot.X + x, Y: spec.Foot.Y + y} }
	median := on(s.sum.Median[0], s.sum.Median[1])
	spec.Median = &median
	spec.Groups = s.groups(on)
	s.outlines(&spec, on)
	spec.Words = s.beside()
	deck.Desc = described("Plan of %q with the landings of a scatter. %s", g.Name, s.sentence(j.flags.seed))
	return plots.ScatterPlan(spec)
}

// footOn is the foot of a release's plumb line on the plan of its ground.
func footOn(g *measure.Ground, let *flight.Let) plots.Point {
	if f := g.Flat; f != nil {
		return plots.Point{X: f.Radius * math.Tan(let.Place.Phi-f.Phi), Y: let.Place.Z - f.Z}
	}
	return plots.Point{X: g.Radius * let.Place.Phi, Y: let.Place.Z}
}

// groupsDrawn bounds the surfaces that have a mark of their own.
const groupsDrawn = 4

// groups sorts the first landings by what they are on, the surface touched most
// often first.
func (s *scatterResult) groups(on func(x, y float64) plots.Point) []plots.ScatterGroup {
	surfaces := slices.Clone(s.sum.Surfaces)
	slices.SortStableFunc(surfaces, func(a, b measure.Share) int { return b.Count - a.Count })
	var out []plots.ScatterGroup
	index := map[string]int{}
	for i := range surfaces {
		if i == groupsDrawn && len(surfaces) > groupsDrawn+1 {
			out = append(out, plots.ScatterGroup{Name: "other surfaces"})
		}
		if len(out) <= groupsDrawn && (len(out) == 0 || out[len(out)-1].Name != "other surfaces") {
			out = append(out, plots.ScatterGroup{Name: "on " + shareWords(&surfaces[i])})
		}
		index[surfaces[i].Name] = len(out) - 1
	}
	drawn := 0
	for i, f := range s.cloud.Fates {
		if f != measure.ShotLanded || drawn == plots.MostDots {
			continue
		}
		g := &out[index[s.cloud.Surface(i)]]
		g.Places = append(g.Places, on(s.cloud.Spinward[i], s.cloud.Axial[i]))
		drawn++
	}
	return out
}

// outlines gives the ellipse and the contour.
func (s *scatterResult) outlines(spec *plots.ScatterPlanSpec, on func(x, y float64) plots.Point) {
	c := s.sum.Contour
	if e := s.ellipse(); e != nil {
		spec.Ellipse = &plots.PlanEllipse{Centre: on(e.Spinward, e.Axial), Major: e.Major, Minor: e.Minor, Angle: e.Angle}
	}
	if c == nil {
		return
	}
	spec.Line = c.Line
	for _, piece := range c.Pieces {
		path := make([]plots.Point, len(piece))
		for k, p := range piece {
			path[k] = on(p[0], p[1])
		}
		spec.Contour = append(spec.Contour, path)
	}
}

// beside are the figures that stand beside the plan.
func (s *scatterResult) beside() []string {
	var out []string
	for i := range s.sum.Openings {
		if o := &s.sum.Openings[i]; o.Count > 0 || len(s.sum.Openings) == 1 {
			out = append(out, "through "+shareWords(o))
		}
	}
	out = append(out, "median: "+s.median()+" of plumb")
	if e := s.ellipse(); e != nil {
		out = append(out, fmt.Sprintf("95 %% ellipse: semi-axes %s and %s, at %s deg; holds %s", withUnit(e.Major, "m"), withUnit(e.Minor, "m"), table.Fixed(degreesOf(e.Angle), 1), percent(e.Inside)))
	}
	if c := s.sum.Contour; c != nil && !c.Line {
		out = append(out, fmt.Sprintf("95 %% contour: %s m², holds %s", sigfig(c.Area, 3), percent(c.Inside)))
	}
	if e := s.sum.Spread("energy"); e.Count > 0 {
		out = append(out, fmt.Sprintf("energy: median %s, 95 %% below %s", withUnit(e.Median(), "J"), withUnit(e.High(), "J")))
	}
	words := count(s.sum.Samples, "sample")
	if n := s.sum.Samples - s.sum.Flown; n > 0 {
		words += fmt.Sprintf(", %d left out", n)
	}
	return append(out, words)
}
