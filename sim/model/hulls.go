package model

import (
	"fmt"
	"math"

	"offplumb/sim/geom"
)

// hull is a room as the geometry has it.
type hull interface {
	Span(phi, z, h float64) (geom.Span, bool)
}

// housed is a hull with what it is that of.
type housed struct {
	hull
	room  *Room
	key   string // of the room in the scenario
	floor *Deck
}

// title names a room in a message.
func (h *housed) title() string {
	if h.room.Name == "" {
		return "the habitat"
	}
	return fmt.Sprintf("room %q", h.room.Name)
}

// hulls lists the rooms, the habitat's own first.
func (c *checker) hulls() []housed {
	m := c.m
	out := []housed{c.housed(&m.Habitat.Room, "habitat", &m.Decks[0])}
	for i := range m.Rooms {
		r := &m.Rooms[i]
		floor := r.floor()
		floor.Name = r.Name + " " + FloorName
		out = append(out, c.housed(r, fmt.Sprintf("room[%d]", i), &floor))
	}
	return out
}

// floor is the floor of a room, without openings.
func (r *Room) floor() Deck {
	d := Deck{Name: FloorName, Radius: r.FloorRadius, Thickness: DefaultThickness, Whole: true, Friction: None, Restitution: None}
	d.Axial[0], d.Axial[1] = r.Ends()
	switch r.Shape {
	case Torus:
		half := r.halfWidth(r.FloorRadius, 0)
		if !r.FlatFloor {
			half = r.TubeRadius
		}
		d.Axial = [2]float64{r.Axial - half, r.Axial + half}
	case Cabin:
		half := math.Atan2(r.Size[0]/2, r.FloorRadius)
		d.Whole, d.Flat, d.From, d.To = false, true, Arc{-half, true}, Arc{half, true}
	}
	return d
}

func (c *checker) housed(r *Room, key string, floor *Deck) housed {
	h := housed{room: r, key: key, floor: floor}
	deck := c.geomDeck(floor)
	switch r.Shape {
	case Torus:
		t := r.torus()
		t.Floor = deck
		if !t.Flat {
			t.Thickness = floor.Thickness
		}
		h.hull = t
	case Sphere:
		h.hull = &geom.Ball{Floor: deck, Z: r.Axial, Thickness: floor.Thickness}
	case Cabin:
		h.hull = &geom.Cabin{Name: r.Name, Phi: r.Spinward.Angle(r.FloorRadius), Z: r.Axial, Floor: deck, Size: r.Size, Thickness: DefaultThickness}
	default:
		h.hull = &geom.Cylinder{Name: r.Name, Floor: deck, Ceiling: r.CeilingRadius, Thickness: DefaultThickness}
	}
	return h
}

// torus is the tube of a torus.
func (r *Room) torus() *geom.Torus {
	return &geom.Torus{Name: r.Name, Floor: geom.Deck{Shell: geom.Shell{R0: r.FloorRadius}}, Z: r.Axial, Tube: r.TubeRadius,
		Flat: r.FlatFloor, Thickness: DefaultThickness}
}

// add adds the hull of a room with the mouths of passages.
func (h *housed) add(b *geom.Builder, shafts []geom.Passage) {
	switch r := h.hull.(type) {
	case *geom.Torus:
		r.Passages = shafts
		b.AddTorus(*r)
	case *geom.Ball:
		r.Passages = shafts
		b.AddBall(*r)
	case *geom.Cabin:
		r.Passages = shafts
		b.AddCabin(*r)
	case *geom.Cylinder:
		r.Floor.Holes = floorMouths(h.floor, shafts)
		for i := range shafts {
			p := &shafts[i]
			if r.Ceiling > 0 && p.To > r.Ceiling-r.Thickness && p.From < r.Ceiling && within(p.Z, r.Floor.Z0, r.Floor.Z1) {
				r.Mouths = append(r.Mouths, p.CeilingMouth(r.Ceiling, r.Thickness))
			}
		}
		b.AddCylinder(*r)
	}
}

// floorMouths gives the mouths of the passages that cross a deck.
func floorMouths(d *Deck, shafts []geom.Passage) []geom.Hole {
	var out []geom.Hole
	for i := range shafts {
		if p := &shafts[i]; p.To > d.Radius && p.From < d.Radius+d.Thickness && within(p.Z, d.Axial[0], d.Axial[1]) {
			out = append(out, p.FloorMouth(d.Radius))
		}
	}
	return out
}

func within(z, z0, z1 float64) bool { return z >= z0 && z <= z1 }

// Ends gives the axial extent of the room, m; infinite without bulkheads.
func (r *Room) Ends() (from, to float64) {
	half := math.Inf(1)
	switch r.Shape {
	case Torus:
		half = r.TubeRadius
	case Sphere:
		half = r.FloorRadius
	case Cabin:
		half = r.Size[1] / 2
	default:
		if r.Length > 0 {
			half = r.Length / 2
		}
	}
	return r.Axial - half, r.Axial + half
}

// halfWidth gives half the axial extent (m) of a torus or sphere over the
// radii from r to r + thick (m), the greatest; 0 outside.
func (r *Room) halfWidth(radius, thick float64) float64 {
	if r.Shape == Sphere {
		s := geom.Ball{Floor: geom.Deck{Shell: geom.Shell{R0: r.FloorRadius}}}
		return s.HalfWidth(radius)
	}
	t := r.torus()
	// Nearest to the middle of the tube it is widest.
	return t.HalfWidth(math.Max(radius, math.Min(t.Ring(), radius+thick)))
}

// roomShape checks the measures of a room against each other.
func (c *checker) roomShape(key string, r *Room) {
	switch r.Shape {
	case Cylinder:
		if r.CeilingRadius > 0 && r.CeilingRadius >= r.FloorRadius {
			c.fault(key+".ceiling_radius", "", "wants less than floor_radius, %g m, got %g m", r.FloorRadius, r.CeilingRadius)
		}
	case Torus:
		share := 2.0
		if r.FlatFloor {
			share = 1 + geom.FlatShare
		}
		if most := (r.FloorRadius - DefaultThickness) / share; r.TubeRadius >= most {
			c.fault(key+".tube_radius", "", "wants less than %.6g m, so that the tube keeps off the axis, got %g m", most, r.TubeRadius)
		}
	case Cabin:
		if r.Size[2]+DefaultThickness >= r.FloorRadius {
			c.fault(key+".size", "", "wants a height less than floor_radius, %g m, so that the cabin keeps off the axis, got %g m", r.FloorRadius, r.Size[2])
		}
	}
	if r.Spinward.Value != 0 && r.Shape != Cabin {
		c.fault(key+".spinward", "only a cabin stands somewhere round the circle", "the room goes the whole way round")
	}
}
