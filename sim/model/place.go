package model

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/frame"
)

// levelSlack is how far outward of a deck's surface, as a share of its
// radius, a place still counts as standing on it: a thousand roundings, so
// that a station of height 0 lies on its own deck.
const levelSlack = 2e-13

// Place is a station resolved.
type Place struct {
	frame.Polar         // habitat coordinates
	Deck        int     // index of the deck that its height is above
	Height      float64 // m, above that deck
}

// DeckNamed gives the index of a deck; the empty name is the reference floor.
func (m *Model) DeckNamed(name string) (int, bool) {
	if name == "" {
		return 0, true
	}
	for i := range m.Decks {
		if m.Decks[i].Name == name {
			return i, true
		}
	}
	return 0, false
}

// Resolve finds the place of a station. An error says what is wrong with the
// station, without its key.
func (m *Model) Resolve(s Station) (Place, error) {
	z := s.Axial
	if s.Room != "" {
		return m.inRoom(s)
	}
	if s.HasRadius {
		p := frame.Polar{R: s.Radius, Phi: s.Spinward.Angle(s.Radius), Z: z}
		d := m.DeckBeneath(p)
		return Place{Polar: p, Deck: d, Height: m.Above(d, p)}, nil
	}
	d, ok := m.DeckNamed(s.Deck)
	if !ok {
		return Place{}, fmt.Errorf("no deck named %q", s.Deck)
	}
	if f := m.FlatDeck(d); f != nil {
		pos := f.Point(f.Along(s.Spinward), z-f.Z, s.Height)
		return Place{Polar: frame.PolarOf(pos), Deck: d, Height: s.Height}, nil
	}
	r := m.Decks[d].Radius
	p := frame.Polar{R: r - s.Height, Phi: s.Spinward.Angle(r), Z: z}
	return Place{Polar: p, Deck: d, Height: s.Height}, nil
}

// inRoom finds the place of a station in a further room: from the middle of
// its floor, along it and above it.
func (m *Model) inRoom(s Station) (Place, error) {
	r := m.RoomNamed(s.Room)
	if r == nil {
		return Place{}, fmt.Errorf("no room named %q", s.Room)
	}
	if r.Shape == Cabin {
		f := r.flat()
		return m.PlaceOf(f.Point(f.Along(s.Spinward), s.Axial, s.Height)), nil
	}
	p := frame.Polar{R: r.FloorRadius - s.Height, Phi: s.Spinward.Angle(r.FloorRadius), Z: r.Axial + s.Axial}
	d := m.DeckBeneath(p)
	return Place{Polar: p, Deck: d, Height: m.Above(d, p)}, nil
}

// RoomNamed finds a further room, nil where there is none.
func (m *Model) RoomNamed(name string) *Room {
	for i := range m.Rooms {
		if m.Rooms[i].Name == name {
			return &m.Rooms[i]
		}
	}
	return nil
}

// DeckBeneath gives the deck next outward along the radius through a place,
// openings counted as closed; the reference floor where there is none.
func (m *Model) DeckBeneath(p frame.Polar) int {
	best := 0
	for i := 1; i < len(m.Decks); i++ {
		d := &m.Decks[i]
		if d.Radius*(1+levelSlack) >= p.R && d.Radius < m.Decks[best].Radius && d.Covers(p.Phi, p.Z) {
			best = i
		}
	}
	return best
}

// PlaceOf describes a point (m, habitat components) by the deck beneath it.
func (m *Model) PlaceOf(pos r3.Vec) Place {
	p := frame.PolarOf(pos)
	d := m.DeckBeneath(p)
	return Place{Polar: p, Deck: d, Height: m.Above(d, p)}
}

// Arc gives the place's arc on its deck, m, in (-pi R, pi R]; on a flat deck
// the straight length from its middle.
func (m *Model) Arc(p Place) float64 {
	if f := m.FlatDeck(p.Deck); f != nil {
		s, _, _ := f.Place(p.Vec())
		return s
	}
	return m.Decks[p.Deck].Radius * frame.WrapAngle(p.Phi)
}

// Covers says whether the deck, its openings counted as closed, lies under
// the angle phi (rad) and the axial place z (m).
func (d *Deck) Covers(phi, z float64) bool {
	if z < d.Axial[0] || z > d.Axial[1] {
		return false
	}
	if d.Whole {
		return true
	}
	from, to := d.From.Angle(d.Radius), d.To.Angle(d.Radius)
	over := math.Mod(phi-from, 2*math.Pi)
	if over < 0 {
		over += 2 * math.Pi
	}
	return over <= to-from
}

// middle gives the angle (rad) of the middle of an opening.
func (d *Deck) middle(o *Opening) float64 {
	if d.Flat && !o.Spinward.IsAngle {
		return math.Atan2(o.Spinward.Value, d.Radius)
	}
	return o.Spinward.Angle(d.Radius)
}

// OpeningAt gives the open opening at an angle (rad) and an axial place (m) of
// the deck, or nil.
func (d *Deck) OpeningAt(phi, z float64) *Opening {
	for i := range d.Openings {
		o := &d.Openings[i]
		half := math.Asin(math.Min(1, o.Size[0]/(2*d.Radius)))
		across := math.Abs(frame.WrapAngle(phi - d.middle(o)))
		if d.Flat {
			half, across = o.Size[0]/2, d.Radius*math.Abs(math.Tan(phi)-math.Tan(d.middle(o)))
		}
		if !o.Closed && across <= half && math.Abs(z-o.Axial) <= o.Size[1]/2 {
			return o
		}
	}
	return nil
}

// Gravity is the part of the apparent gravity at rest that comes from turning,
// at a distance r (m) from the axis, under the steady spin that the habitat begins with, m/s^2.
func (m *Model) Gravity(r float64) float64 { return m.Habitat.Spin * m.Habitat.Spin * r }

// BodyOf gives the body of a release: a point without mass where it names
// none.
func (m *Model) BodyOf(r *Release) Body {
	if r.Own != nil {
		return *r.Own
	}
	if i, ok := m.bodyIndex[r.Body]; ok {
		return m.Bodies[i]
	}
	return Body{Restitution: DefaultRestitution, Friction: DefaultFriction}
}

// CrewOf gives the person of a path.
func (m *Model) CrewOf(p *Path) Crew {
	for i := range m.Crews {
		if m.Crews[i].Name == p.Crew {
			return m.Crews[i]
		}
	}
	return Crew{}
}

// PathNamed finds a crew path.
func (m *Model) PathNamed(name string) (*Path, bool) {
	for i := range m.Paths {
		if m.Paths[i].Name == name {
			return &m.Paths[i], true
		}
	}
	return nil, false
}
