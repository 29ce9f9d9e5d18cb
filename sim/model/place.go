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
		return Place{}, fmt.Errorf("no room named %q that a station can stand in", s.Room)
	}
	if s.HasRadius {
		p := frame.Polar{R: s.Radius, Phi: s.Spinward.Angle(s.Radius), Z: z}
		d := m.DeckBeneath(p)
		return Place{Polar: p, Deck: d, Height: m.Decks[d].Radius - s.Radius}, nil
	}
	d, ok := m.DeckNamed(s.Deck)
	if !ok {
		return Place{}, fmt.Errorf("no deck named %q", s.Deck)
	}
	r := m.Decks[d].Radius
	p := frame.Polar{R: r - s.Height, Phi: s.Spinward.Angle(r), Z: z}
	return Place{Polar: p, Deck: d, Height: s.Height}, nil
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
	return Place{Polar: p, Deck: d, Height: m.Decks[d].Radius - p.R}
}

// Arc gives the place's arc on its deck, m, in (-pi R, pi R].
func (m *Model) Arc(p Place) float64 { return m.Decks[p.Deck].Radius * frame.WrapAngle(p.Phi) }

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

// OpeningAt gives the open opening at an angle (rad) and an axial place (m) of
// the deck, or nil.
func (d *Deck) OpeningAt(phi, z float64) *Opening {
	for i := range d.Openings {
		o := &d.Openings[i]
		half := math.Asin(math.Min(1, o.Size[0]/(2*d.Radius)))
		across := math.Abs(frame.WrapAngle(phi - o.Spinward.Angle(d.Radius)))
		if !o.Closed && across <= half && math.Abs(z-o.Axial) <= o.Size[1]/2 {
			return o
		}
	}
	return nil
}

// Gravity is the apparent gravity at rest at a distance r (m) from the axis
// under steady spin, m/s^2.
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
