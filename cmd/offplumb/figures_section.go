package main

import (
	"math"
	"strings"

	"offplumb/plots"
	"offplumb/sim/geom"
)

// section gives the outlines of the structure at an axial place (m), turned
// by an angle (rad) and moved by a vector (m).
func (j *job) section(z, turn float64, by plots.Point) []plots.Outline {
	m := j.model()
	var out []plots.Outline
	for _, o := range m.Interior.Section(z) {
		name := strings.TrimSuffix(m.Interior.Surface(o.Surface).Name, " outside")
		p := plots.Outline{Name: name, Kind: j.kindOf(name), Closed: true}
		for _, s := range o.Segs {
			p.Path = append(p.Path, carried(s, turn, by))
		}
		p.Path = sealed(p.Path, by)
		out = append(out, p)
	}
	return out
}

// carried turns and moves a piece of an outline.
func carried(s geom.Seg, turn float64, by plots.Point) plots.Segment {
	sin, cos := math.Sincos(turn)
	at := func(p [2]float64) plots.Point {
		return plots.Point{X: cos*p[0] - sin*p[1] + by.X, Y: sin*p[0] + cos*p[1] + by.Y}
	}
	if s.Arc {
		return plots.Arc(at(s.Centre), s.Radius, s.Phi0+turn, s.Phi1+turn)
	}
	l := plots.Line(at(s.A), at(s.B))
	l.Bare = s.Bare
	return l
}

// sealed joins the two circles of a whole ring by seams that are not drawn.
func sealed(path []plots.Segment, centre plots.Point) []plots.Segment {
	if len(path) != 2 || path[0].Radius == 0 || path[1].Radius == 0 {
		return path
	}
	return plots.Sector(centre, path[1].Radius, path[0].Radius, path[0].Start, path[0].End)
}

// kindOf tells structure by the name of its first surface.
func (j *job) kindOf(name string) plots.Kind {
	m := j.model()
	for i := range m.Fixtures {
		if f := m.Fixtures[i].Name; name == f || strings.HasPrefix(name, f+" ") {
			return plots.Fixture
		}
	}
	for i := 1; i < len(m.Decks); i++ {
		if d := m.Decks[i].Name; name == d || strings.HasPrefix(name, d+" ") {
			return plots.Deck
		}
	}
	return plots.Hull
}
