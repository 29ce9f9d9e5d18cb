package measure

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/flight"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// Ground is the floor beneath a release, to which its places and offsets
// refer: a deck about the axis, or the flat floor of a cabin.
type Ground struct {
	Flat   *model.Flat // nil for a deck about the axis
	Name   string
	Radius float64 // m, of the deck, or of the middle of a flat floor
	Start  model.Place
}

// GroundOf gives the ground of a track.
func GroundOf(m *model.Model, t *flight.Track) Ground {
	return GroundAt(m, t.Start.Polar, t.Start.Deck)
}

// GroundAt gives the ground of a place whose deck beneath is known.
func GroundAt(m *model.Model, p frame.Polar, deck int) Ground {
	g := Ground{Start: model.Place{Polar: p, Deck: deck}, Name: m.Decks[deck].Name, Radius: m.Decks[deck].Radius}
	if f := m.FlatBeneath(p.Vec()); f != nil && !m.IsOutside(p.Vec()) {
		g.Flat, g.Name, g.Radius = f, f.Name, f.Radius
	}
	return g
}

// Foot is the distance (m) from the axis of the foot of the plumb line, which
// is the radius, at an angle (rad).
func (g *Ground) Foot(phi float64) float64 {
	if g.Flat == nil {
		return g.Radius
	}
	return g.Radius / math.Cos(phi-g.Flat.Phi)
}

// Offset gives the way (m) along the ground from plumb under the release to
// plumb under a body that has gone round by an angle (rad).
func (g *Ground) Offset(round float64) float64 {
	if g.Flat == nil {
		return g.Radius * round
	}
	from := g.Start.Phi - g.Flat.Phi
	return g.Radius * (math.Tan(from+round) - math.Tan(from))
}

// Place gives arc or straight length, axial place and height (m) of a point
// in habitat components that has gone round by an angle (rad).
func (g *Ground) Place(pos r3.Vec, round float64) (spinward, axial, height float64) {
	if g.Flat != nil {
		return g.Flat.Place(pos)
	}
	return g.Radius * (g.Start.Phi + round), pos.Z, g.Radius - math.Hypot(pos.X, pos.Y)
}

// Split gives the local components of a vector in habitat components, at an
// angle (rad).
func (g *Ground) Split(v r3.Vec, phi float64) (spinward, axial, up float64) {
	if g.Flat != nil {
		return g.Flat.Local().Split(v)
	}
	return frame.LocalAt(phi).Split(v)
}

// stand describes a point in habitat components by what is beneath it: its
// place, with height and axial place from there, the name, and the arc or
// straight length.
func stand(m *model.Model, pos r3.Vec) (p model.Place, name string, arc float64) {
	p = m.PlaceOf(pos)
	if f := m.FlatBeneath(pos); f != nil {
		s, a, h := f.Place(pos)
		p.Z, p.Height = a, h
		return p, f.Name, s
	}
	return p, m.Decks[p.Deck].Name, m.Arc(p)
}
