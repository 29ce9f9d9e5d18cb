package main

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"offplumb/plots"
	"offplumb/scenarios"
	"offplumb/sim/flight"
	"offplumb/sim/measure"
	"offplumb/sim/model"
	"offplumb/sim/table"
)

// askedFigures are the figures that the scenario asks for. What did not run, as
// under --only, is left out of them, and a figure of nothing else is not drawn.
func (j *job) askedFigures() []drawing {
	var out []drawing
	var names table.Namer
	for _, f := range j.Figures {
		file := "figure-" + names.Name(f.Name)
		made := j.asked(f)
		for n := range made {
			d := &made[n]
			d.file, d.name, d.asked = file, f.Name, true
			if n > 0 {
				d.file = fmt.Sprintf("%s-%d", file, n+1)
			}
		}
		out = append(out, made...)
	}
	return out
}

// asked makes the drawings of one figure, less their file names.
func (j *job) asked(f *scenarios.Figure) (out []drawing) {
	add := func(of string, make func() (*plots.Figure, error)) { out = append(out, drawing{of: of, make: make}) }
	releases, paths := j.ranReleases(f), j.ranPaths(f)
	switch f.Kind {
	case "side":
		if len(releases) > 0 {
			add("side view", func() (*plots.Figure, error) { return j.togetherView(f.Name, releases) })
		}
	case "deflection":
		if len(releases) > 0 {
			add("apparent deflection", func() (*plots.Figure, error) { return j.deflectionChart(f.Name, releases) })
		}
	case "loads":
		if len(paths) > 0 {
			add("loads", func() (*plots.Figure, error) { return j.loadsTogether(f.Name, paths) })
		}
	case "plan":
		for _, p := range j.plansOf(releases, paths) {
			add("deck plan", func() (*plots.Figure, error) { return j.deckPlan(f.Name, p) })
		}
	case "inertial":
		for _, i := range releases {
			add("inertial view", func() (*plots.Figure, error) { return j.inertialView(i) })
		}
	case "stack":
		for _, i := range releases {
			add("both views", func() (*plots.Figure, error) { return j.bothViews(i) })
		}
	case "path":
		for _, i := range paths {
			add("crew path", func() (*plots.Figure, error) { return j.pathView(i) })
		}
	default:
		out = j.askedStudies(f)
	}
	return out
}

// askedStudies are the usual figures of the studies, or of the habitat, that a
// figure is of.
func (j *job) askedStudies(f *scenarios.Figure) (out []drawing) {
	k, ok := studyKinds[f.Kind]
	if !ok {
		return nil
	}
	all, names := k.all(j), f.Studies
	if f.Kind == "spin" {
		names = []string{""}
	}
	for _, name := range names {
		for _, d := range all {
			if d.name == name && slices.Contains(k.of, d.of) {
				out = append(out, d)
			}
		}
	}
	return out
}

// studyKinds say, for each kind of figure of studies, where its drawings come
// from and which of them it shows.
var studyKinds = map[string]struct {
	all func(*job) []drawing
	of  []string
}{
	"scatter":     {scatterFigures, []string{"scatter"}},
	"sweep":       {sweepFigures, []string{"sweep", "sweep map"}},
	"let_go":      {(*job).studyFigures, []string{"let-go series"}},
	"throws":      {throwFigures, []string{"throws"}},
	"throw_table": {throwFigures, []string{"throw table"}},
	"landing_map": {mapFigures, []string{"landing map", "landing map, worst", "landing map, reach"}},
	"spin":        {turningFigures, []string{"spin"}},
}

// ranReleases are the releases of a figure that were flown. A let-go series gives
// as many as there is room for.
func (j *job) ranReleases(f *scenarios.Figure) []int {
	var out []int
	for _, i := range f.Releases {
		r := &j.results[i]
		if r.Track != nil && r.Landing.Time > 0 && (f.Kind != "deflection" || r.Landing.Uniform.Lands) {
			out = append(out, i)
		}
	}
	if f.Kind == "side" {
		room := max(2, (scenarios.MostTogether-len(out))/max(1, len(f.Studies)))
		for _, name := range f.Studies {
			out = append(out, j.seriesShown(name, room)...)
		}
	}
	return out
}

// seriesShown are releases of a let-go series, evenly spread, its ends among them.
func (j *job) seriesShown(series string, room int) (out []int) {
	var of []int
	for i := range j.results {
		if j.results[i].Track != nil && j.Lets[i].Release.Series == series {
			of = append(of, i)
		}
	}
	for _, k := range spread(len(of), room) {
		out = append(out, of[k])
	}
	return out
}

func (j *job) ranPaths(f *scenarios.Figure) (out []int) {
	for _, i := range f.Paths {
		if !j.paths[i].skipped {
			out = append(out, i)
		}
	}
	return out
}

// plansOf sorts releases and crew paths by the floors that they are over.
func (j *job) plansOf(releases, paths []int) []*plan {
	m := j.model()
	var out []*plan
	on := func(g measure.Ground, deck int) *plan {
		k := slices.IndexFunc(out, func(p *plan) bool { return p.ground.Name == g.Name })
		if k < 0 {
			k = len(out)
			out = append(out, &plan{ground: g, deck: deck, paths: []int{}})
		}
		return out[k]
	}
	for _, i := range releases {
		at := j.Lets[i].Place.Polar
		d := m.DeckBeneath(at)
		p := on(measure.GroundAt(m, at, d), d)
		p.over = append(p.over, i)
	}
	for _, i := range paths {
		p := on(j.groundOfPath(i), j.paths[i].plan.Deck)
		p.paths = append(p.paths, i)
	}
	return out
}

// togetherView draws releases in one side view, from the plumb foot of the first.
func (j *job) togetherView(title string, which []int) (*plots.Figure, error) {
	m := j.model()
	first := j.results[which[0]].Track
	s := j.sideOf(first)
	spec := plots.TogetherViewSpec{Title: title, Spin: m.Habitat.Spin, Deck: s.deck, Outlines: j.section(first.Start.Z, s.turn, s.by),
		Notes: fmt.Sprintf("Habitat frame. Apparent gravity at rest on %q%s: %s g. Open mark: release; full mark: landing; square: where it ends.", s.Name, j.spinPart(), table.Round(s.gravityG(m), 3))}
	words := ""
	for _, i := range which {
		spec.Tracks = append(spec.Tracks, j.togetherTrack(i, &s))
		words += " " + sentence(&j.results[i].Landing) + "."
		if z := j.results[i].Track.Start.Z; math.Abs(z-first.Start.Z) > leastWay && !strings.Contains(spec.Notes, "section") {
			spec.Notes += " Structure: the section at the axial place of 1."
		}
	}
	spec.Desc = described("Side view in the habitat frame, seen from the +axial end, of several releases.%s", words)
	return plots.TogetherView(spec)
}

// gravityG is the apparent gravity at rest on the ground, in g.
func (s *side) gravityG(m *model.Model) float64 {
	return m.Habitat.Spin * m.Habitat.Spin * s.Radius / model.StandardGravity
}

func (j *job) togetherTrack(i int, s *side) plots.TogetherTrack {
	r := &j.results[i]
	t, l := r.Track, &r.Landing
	out := plots.TogetherTrack{Name: l.Release, Words: landingLine(l), Body: t.Body.Diameter / 2}
	for _, at := range j.seenFrom(t, t.End) {
		at.place.Phi += t.Start.Phi - s.Start.Phi
		p := s.point(at)
		out.Track = append(out.Track, plots.TrackPoint{T: at.t, X: p.X, Y: p.Y, Phase: at.phase})
	}
	if l.Outcome == flight.Landed {
		out.Landing = landingOn(out.Track, l.Time)
	}
	if o := r.Rest.Outcome; (o == flight.Rested || o == flight.Stuck) && t.End > l.Time {
		out.Rest = landingOn(out.Track, t.End)
	}
	return out
}

// landingLine tells a landing in a line for a list.
func landingLine(l *measure.Landing) string {
	s := outcomeWords(l)
	if l.Outcome == flight.Landed {
		s += ", after " + withUnit(l.Time, "s") + " at " + withUnit(l.Speed, "m/s")
	}
	return s
}
