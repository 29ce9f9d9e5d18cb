package model

import (
	"fmt"
	"math"

	"offplumb/sim/frame"
)

// FloorName is the name of the reference floor.
const FloorName = "floor"

// checker gathers the problems of a scenario.
type checker struct {
	m        *Model
	problems []Problem
}

func (c *checker) fault(key, hint, format string, args ...any) {
	c.problems = append(c.problems, Problem{Key: key, Msg: fmt.Sprintf(format, args...), Hint: hint})
}

// New checks a scenario as a whole and makes its motion and its interior. The
// scenario's Decks are those of the file; the model's begin with the reference
// floor. With any problem the model is nil.
func New(in Model) (*Model, []Problem) {
	m := in
	m.Warnings = append([]Warning(nil), in.Warnings...)
	c := &checker{m: &m}
	m.index()
	c.habitat()
	c.turning()
	c.weather()
	c.decks(in.Decks)
	if len(c.problems) > 0 {
		return nil, c.problems
	}
	c.interior()
	c.ambient()
	if len(c.problems) > 0 {
		return nil, c.problems
	}
	c.releases()
	c.paths()
	c.spacings()
	c.scatters()
	c.landingMaps()
	c.throws()
	if len(c.problems) > 0 {
		return nil, c.problems
	}
	return &m, nil
}

func (m *Model) index() {
	m.bodyIndex = make(map[string]int, len(m.Bodies))
	for i := range m.Bodies {
		m.bodyIndex[m.Bodies[i].Name] = i
	}
}

func (c *checker) habitat() {
	c.roomShape("habitat", &c.m.Habitat.Room)
	for i := range c.m.Rooms {
		c.roomShape(fmt.Sprintf("room[%d]", i), &c.m.Rooms[i])
	}
}

func (c *checker) decks(file []Deck) {
	m := c.m
	m.Decks = []Deck{m.Habitat.floor()}
	for i := range file {
		d := file[i]
		key := fmt.Sprintf("deck[%d]", i)
		if d.Name == FloorName {
			c.floorDeck(key, d)
			continue
		}
		if m.Habitat.Shape == Cabin {
			c.fault(key, "a box fixture can stand for one", "a cabin has no further decks")
			continue
		}
		c.deckExtent(key, &d)
		c.openings(key, &d)
		m.Decks = append(m.Decks, d)
	}
}

// floorDeck takes the reference floor's surface and openings from a deck
// named "floor".
func (c *checker) floorDeck(key string, d Deck) {
	if d.Radius != 0 || d.Height != 0 {
		c.fault(key, "leave radius and height out, or give the deck another name",
			`a deck named "floor" is the reference floor, whose radius is habitat.floor_radius`)
		return
	}
	f := &c.m.Decks[0]
	f.Friction, f.Restitution, f.Openings = d.Friction, d.Restitution, append([]Opening(nil), d.Openings...)
	if d.Thickness > 0 {
		f.Thickness = d.Thickness
	}
	if most := c.m.Habitat.FloorRadius - 2*c.m.Habitat.TubeRadius; c.m.Habitat.Shape == Torus && f.Thickness >= most {
		c.fault(key+".thickness", "", "wants less than %.6g m, so that the hull keeps off the axis, got %g m", most, f.Thickness)
	}
	if h := &c.m.Habitat; len(d.Openings) > 0 && (h.Shape == Sphere || h.Shape == Torus && !h.FlatFloor) {
		c.fault(key+".opening[0]", "a cylinder, a cabin or a torus with flat_floor can have openings", "the floor of a tube or sphere has no openings")
		return
	}
	c.openings(key, f)
}

func (c *checker) deckExtent(key string, d *Deck) {
	h := &c.m.Habitat
	radiusKey := key + ".radius"
	if d.Radius == 0 {
		d.Radius, radiusKey = h.FloorRadius-d.Height, key+".height"
	}
	low := math.Max(h.CeilingRadius, 0)
	z0, z1 := h.Ends()
	within := "between the bulkheads"
	if h.Shape == Torus {
		low = h.torus().Ring() - h.TubeRadius
	}
	if d.Radius >= h.FloorRadius || d.Radius <= low {
		c.fault(radiusKey, "", "deck %q lies outside the habitat: wants a radius between %g m and %g m, got %g m",
			d.Name, low, h.FloorRadius, d.Radius)
		return
	}
	if h.Shape != Cylinder {
		half := h.halfWidth(d.Radius, d.Thickness)
		z0, z1, within = h.Axial-half, h.Axial+half, "within the hull, which at this radius ends"
	}
	if !d.HasAxial {
		d.Axial = [2]float64{z0, z1}
	}
	if d.Axial[0] >= d.Axial[1] || d.Axial[0] < z0 || d.Axial[1] > z1 {
		c.fault(key+".axial", "", "wants an extent %s at %g m and %g m, smaller first, got %g m to %g m",
			within, z0, z1, d.Axial[0], d.Axial[1])
	}
	if !d.Whole {
		c.deckArc(key, d)
	}
}

func (c *checker) deckArc(key string, d *Deck) {
	span := d.To.Angle(d.Radius) - d.From.Angle(d.Radius)
	if !(span > 0) {
		c.fault(key+".to", "spinward is positive: from comes before to", "wants a place spinward of from")
	}
	if span > 2*math.Pi*(1+levelSlack) {
		c.fault(key+".to", "leave from and to out for a whole circle", "wants an extent of at most a whole circle, got %.4g deg", span*180/math.Pi)
	}
	if span >= 2*math.Pi*(1-levelSlack) {
		d.Whole = true
	}
}

func (c *checker) openings(key string, d *Deck) {
	for i := range d.Openings {
		o := &d.Openings[i]
		at := fmt.Sprintf("%s.opening[%d]", key, i)
		if !d.Flat && o.Size[0] >= 2*d.Radius || !c.opens(d, o) {
			c.fault(at+".size", "", "opening %q does not fit in deck %q", o.Name, d.Name)
		}
		if o.Coaming >= d.Radius {
			c.fault(at+".coaming", "", "wants less than the deck's radius, %g m, got %g m", d.Radius, o.Coaming)
		}
		if low := 2 * (d.Radius - o.Coaming); !d.Flat && o.Coaming > 0 && o.Size[0] >= low {
			c.fault(at+".coaming", "", "the coaming of %q would stand closer to the axis than the opening is wide", o.Name)
		}
	}
}

// opens says whether an opening lies within its deck.
func (c *checker) opens(d *Deck, o *Opening) bool {
	if o.Axial-o.Size[1]/2 < d.Axial[0] || o.Axial+o.Size[1]/2 > d.Axial[1] {
		return false
	}
	if d.Whole {
		return true
	}
	if f := c.m.Habitat.flat(); d.Flat {
		return math.Abs(f.Along(o.Spinward))+o.Size[0]/2 <= f.Size[0]/2
	}
	half := math.Asin(math.Min(1, o.Size[0]/(2*d.Radius)))
	mid, from, to := o.Spinward.Angle(d.Radius), d.From.Angle(d.Radius), d.To.Angle(d.Radius)
	mid = frame.Unwind(mid, (from+to)/2)
	return mid-half >= from && mid+half <= to
}

func (c *checker) paths() {
	m := c.m
	crews := map[string]bool{}
	for i := range m.Crews {
		crews[m.Crews[i].Name] = true
	}
	for i := range m.Paths {
		p := &m.Paths[i]
		key := fmt.Sprintf("crew_path[%d]", i)
		if !crews[p.Crew] {
			c.fault(key+".crew", "", "no crew named %q", p.Crew)
		}
		if _, err := m.Resolve(p.Start); err != nil {
			c.fault(key+".start", "", "%v", err)
		}
	}
}

func (c *checker) spacings() {
	for i := range c.m.Spacings {
		s := &c.m.Spacings[i]
		key := fmt.Sprintf("platforms[%d]", i)
		p, ok := c.m.PassageNamed(s.Passage)
		if !ok {
			c.fault(key+".passage", "", "no passage named %q", s.Passage)
		}
		b, known := c.m.bodyIndex[s.Body]
		if !known {
			c.fault(key+".body", "", "no body named %q", s.Body)
		}
		if ok && known && c.m.Bodies[b].Diameter >= math.Max(p.Width, p.Diameter) {
			c.fault(key+".body", "", "body %q does not fit into %q", s.Body, s.Passage)
		}
	}
}

// PassageNamed finds a passage.
func (m *Model) PassageNamed(name string) (*Passage, bool) {
	for i := range m.Passages {
		if m.Passages[i].Name == name {
			return &m.Passages[i], true
		}
	}
	return nil, false
}
