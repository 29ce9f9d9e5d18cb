package model

import (
	"offplumb/sim/geom"
)

// interior builds the habitat's surfaces: the hull of its own room, further
// decks and rooms, passages, fixtures.
func (c *checker) interior() {
	m := c.m
	b := &geom.Builder{}
	rooms := c.hulls()
	shafts, keys := c.shafts(rooms)
	rooms[0].add(b, shafts)
	for i := 1; i < len(m.Decks); i++ {
		d := c.geomDeck(&m.Decks[i])
		d.Holes = floorMouths(&m.Decks[i], shafts)
		b.AddDeck(d)
	}
	for i := range rooms[1:] {
		rooms[1+i].add(b, shafts)
	}
	walls := make([]wallRange, len(shafts))
	for i, s := range shafts {
		walls[i].from = b.Len()
		b.AddPassage(s)
		walls[i].to = b.Len()
	}
	if len(shafts) > 0 {
		c.blocked(b.SoFar(), shafts, keys, walls)
	}
	for i := range m.Fixtures {
		c.fixture(b, i)
	}
	m.Interior = b.Build()
}

// geomDeck gives a deck as the geometry wants it, without the mouths of
// passages.
func (c *checker) geomDeck(d *Deck) geom.Deck {
	out := geom.Deck{Shell: geom.Shell{Name: d.Name, R0: d.Radius, R1: d.Radius + d.Thickness, Whole: d.Whole,
		Z0: d.Axial[0], Z1: d.Axial[1], Restitution: d.Restitution, Friction: d.Friction,
		Inner: d.Name, Outer: d.Name + " underside", Edge: d.Name + " edge"}}
	if !d.Whole {
		out.Phi0, out.Phi1 = d.From.Angle(d.Radius), d.To.Angle(d.Radius)
	}
	for i := range d.Openings {
		o := &d.Openings[i]
		out.Openings = append(out.Openings, geom.Opening{Name: o.Name, Phi: d.middle(o), Z: o.Axial,
			Spinward: o.Size[0], Axial: o.Size[1], Coaming: o.Coaming, Closed: o.Closed})
	}
	return out
}
