package main

import (
	"math"

	"offplumb/plots"
	"offplumb/sim/crew"
	"offplumb/sim/frame"
	"offplumb/sim/measure"
	"offplumb/sim/model"
	"offplumb/sim/table"
)

const (
	// wayPoints is about how many points a drawn crew path has.
	wayPoints = 300
	// persons is how often the person is drawn along it.
	persons = 8
)

// pathView draws a crew path from the side, with the person and the force on
// the structure at some places.
func (j *job) pathView(i int) (*plots.Figure, error) {
	p := &j.paths[i]
	m := j.model()
	deck, first := m.Decks[p.plan.Deck].Radius, p.loads[0].Feet.Phi
	if f := p.plan.Flat; f != nil {
		deck, first = f.Radius, f.Phi
	}
	name := p.plan.Path.Name
	spec := plots.PathViewSpec{Title: name + ": the way of " + p.plan.Crew.Name + " and the force on the structure", Spin: m.Habitat.Spin, Deck: deck,
		Outlines: j.section(p.loads[0].Feet.Z, -math.Pi/2-first, plots.Point{Y: deck}),
		Notes:    "Habitat frame. Arrows: what the person, with what is carried, exerts on the structure, sideways along the axis left out."}
	for _, k := range spread(len(p.loads), wayPoints) {
		f := &p.loads[k].Feet
		spec.Way = append(spec.Way, onSide(deck, f.R, f.Phi-first))
	}
	for _, k := range spread(len(p.loads), persons) {
		spec.Stations = append(spec.Stations, station(&p.loads[k], p.plan.Crew.Head*p.plan.Crew.Stature, deck, first))
	}
	if c := p.clearance; !math.IsInf(c.Gap, 1) {
		f := p.plan.At(c.Time)
		spec.Near = &plots.PathNear{T: c.Time, At: onSide(deck, f.R, f.Phi-first), Gap: c.Gap, Surface: c.Surface}
	}
	row := p.row()
	spec.Desc = described("Side view of the crew path %s, which takes %s, with weight %s and side load up to %s; the least clearance is %s.",
		row[0], row[2], row[5], row[6], row[8])
	return plots.PathView(spec)
}

// station is the person at one moment, in the page of a path view.
func station(l *measure.Load, head, deck, first float64) plots.PathStation {
	at := frame.PolarOf(l.Feet.Body(head).Pos)
	turn := l.Feet.Phi - first
	sin, cos := math.Sincos(turn)
	if l.Feet.OnFlat() {
		sin, cos = 0, 1
	}
	return plots.PathStation{T: l.Time, Leg: l.Leg, Feet: onSide(deck, l.Feet.R, turn),
		Head:  onSide(deck, at.R, turn+frame.WrapAngle(at.Phi-l.Feet.Phi)),
		Force: plots.Point{X: cos*l.SideSpinward + sin*l.Weight, Y: sin*l.SideSpinward - cos*l.Weight}}
}

// spread picks indices evenly, the ends among them.
func spread(n, want int) []int {
	if n <= want {
		want = n
	}
	var out []int
	for k := range want {
		i := 0
		if want > 1 {
			i = k * (n - 1) / (want - 1)
		}
		out = append(out, i)
	}
	return out
}

// pathFigures are those of the crew paths.
func (j *job) pathFigures() []drawing {
	var out []drawing
	var names table.Namer
	for i := range j.paths {
		p := &j.paths[i]
		name := names.Name(p.plan.Path.Name)
		if p.skipped {
			continue
		}
		out = append(out, drawing{file: "loads-" + name, of: "loads", name: p.plan.Path.Name, make: func() (*plots.Figure, error) { return j.loadsChart(i) }},
			drawing{file: "path-" + name, of: "crew path", name: p.plan.Path.Name, make: func() (*plots.Figure, error) { return j.pathView(i) }})
	}
	return out
}

// planPaths gives the ways of the crew paths that start on a deck, or on a flat
// floor.
func (j *job) planPaths(deck int, flat *model.Flat) []plots.PlanPath {
	var which []int
	for i := range j.paths {
		if p := &j.paths[i]; !p.skipped && walksOn(p.plan, deck, flat) && p.roams() {
			which = append(which, i)
		}
	}
	return j.waysOf(which)
}

// waysOf gives the ways of crew paths on a plan.
func (j *job) waysOf(which []int) []plots.PlanPath {
	var out []plots.PlanPath
	for _, i := range which {
		p := &j.paths[i]
		way := plots.PlanPath{Name: p.plan.Path.Name}
		for _, k := range spread(len(p.loads), wayPoints) {
			way.Points = append(way.Points, plots.Point{X: p.loads[k].Arc, Y: p.loads[k].Axial})
		}
		out = append(out, way)
	}
	return out
}

// walksOn says whether a path starts on a deck, or on a flat floor.
func walksOn(p *crew.Plan, deck int, flat *model.Flat) bool {
	if flat == nil || p.Flat == nil {
		return p.Deck == deck && flat == nil && p.Flat == nil
	}
	return flat.Name == p.Flat.Name
}

// leastWay is the way, in m, below which a crew path is a point on a plan.
const leastWay = 0.05

// roams says whether a crew path goes anywhere on a deck plan.
func (p *pathResult) roams() bool {
	for i := range p.loads {
		l := &p.loads[i]
		if math.Hypot(l.Arc-p.loads[0].Arc, l.Axial-p.loads[0].Axial) > leastWay {
			return true
		}
	}
	return false
}
