package main

import (
	"math"

	"offplumb/plots"
	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// flatSheet fills in a flat floor: its extent, its openings and what stands on it.
func (j *job) flatSheet(spec *plots.DeckPlanSpec, f *model.Flat) {
	m := j.model()
	spec.From, spec.To = plots.Point{X: -f.Size[0] / 2, Y: -f.Size[1] / 2}, plots.Point{X: f.Size[0] / 2, Y: f.Size[1] / 2}
	if d := &m.Decks[0]; d.Flat && f.Name == d.Name {
		for i := range d.Openings {
			o := &d.Openings[i]
			spec.Openings = append(spec.Openings, plots.PlanOpening{Name: o.Name, Centre: plots.Point{X: f.Along(o.Spinward), Y: o.Axial - f.Z},
				Size: plots.Point{X: o.Size[0], Y: o.Size[1]}, Coaming: o.Coaming > 0, Closed: o.Closed})
		}
	}
	for i := range m.Fixtures {
		b := &m.Fixtures[i]
		switch b.Kind {
		case model.Box:
			if at, ok := j.onFlat(b.At, f); ok {
				spec.Fixtures = append(spec.Fixtures, plots.PlanFixture{Name: b.Name, Path: rectangle(at, b.Size[0], b.Size[1], b.Turn)})
			}
		case model.Wall:
			from, ok := j.onFlat(b.From, f)
			to, ok2 := j.onFlat(b.To, f)
			if ok && ok2 {
				mid := plots.Point{X: (from.X + to.X) / 2, Y: (from.Y + to.Y) / 2}
				along, across := to.X-from.X, to.Y-from.Y
				spec.Fixtures = append(spec.Fixtures, plots.PlanFixture{Name: b.Name, Path: rectangle(mid, math.Hypot(along, across), b.Thickness, math.Atan2(across, along))})
			}
		}
	}
}

// fromAbove says how a plan looks at a deck or at a flat floor.
func fromAbove(f *model.Flat) string {
	if f != nil {
		return "Flat floor, seen from above by someone who stands on it."
	}
	return "Deck unrolled, seen from above by someone who stands on it."
}

// onFlat gives the place of a station on a flat floor; false where it stands
// over something else.
func (j *job) onFlat(at model.Station, f *model.Flat) (plots.Point, bool) {
	p, err := j.model().Resolve(at)
	if err != nil {
		return plots.Point{}, false
	}
	name, s, z := measure.Stand(j.model(), p)
	return plots.Point{X: s, Y: z}, name == f.Name
}

// rectangle gives the corners of one of a size (m), turned from spinward toward
// +axial by an angle (rad).
func rectangle(at plots.Point, long, wide, turn float64) (out []plots.Point) {
	sin, cos := math.Sincos(turn)
	for _, c := range [][2]float64{{1, 1}, {-1, 1}, {-1, -1}, {1, -1}} {
		along, across := c[0]*long/2, c[1]*wide/2
		out = append(out, plots.Point{X: at.X + along*cos - across*sin, Y: at.Y + along*sin + across*cos})
	}
	return out
}

// flatNamed finds a flat floor: that of the habitat or of a cabin.
func (j *job) flatNamed(name string) *model.Flat {
	m := j.model()
	if f := m.FlatDeck(0); f != nil && f.Name == name {
		return f
	}
	for i := range m.Rooms {
		if f := m.Rooms[i].CabinFloor(); f != nil && f.Name == name {
			return f
		}
	}
	return nil
}

// groundOfPath is the floor that a crew path starts on.
func (j *job) groundOfPath(i int) measure.Ground {
	p := j.paths[i].plan
	if f := p.Flat; f != nil {
		return measure.Ground{Flat: f, Name: f.Name, Radius: f.Radius}
	}
	d := &j.model().Decks[p.Deck]
	return measure.Ground{Name: d.Name, Radius: d.Radius}
}
