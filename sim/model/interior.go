package model

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/frame"
	"offplumb/sim/geom"
)

// interior builds the habitat's surfaces: the hull of its own room, further
// decks and rooms, passages, fixtures.
func (c *checker) interior() {
	m := c.m
	b := &geom.Builder{}
	shafts := c.shafts()
	floor := c.geomDeck(&m.Decks[0], shafts)
	c.room(b, &m.Habitat.Room, "", floor, shafts)
	for i := 1; i < len(m.Decks); i++ {
		b.AddDeck(c.geomDeck(&m.Decks[i], shafts))
	}
	for i := range m.Rooms {
		c.furtherRoom(b, i, shafts)
	}
	for _, s := range shafts {
		b.AddPassage(s)
	}
	for i := range m.Fixtures {
		c.fixture(b, i)
	}
	m.Interior = b.Build()
}

// room adds the hull of a cylindrical room.
func (c *checker) room(b *geom.Builder, r *Room, prefix string, floor geom.Deck, shafts []geom.Passage) {
	if r.Shape != Cylinder {
		key := "habitat.shape"
		c.fault(key, `use shape = "cylinder"`, "this version knows cylindrical rooms only")
		return
	}
	cyl := geom.Cylinder{Name: prefix, Floor: floor, Ceiling: r.CeilingRadius, Thickness: DefaultThickness}
	for i := range shafts {
		p := &shafts[i]
		if r.CeilingRadius > 0 && p.To > r.CeilingRadius-cyl.Thickness && p.From < r.CeilingRadius && within(p.Z, floor.Z0, floor.Z1) {
			cyl.Mouths = append(cyl.Mouths, p.CeilingMouth(r.CeilingRadius, cyl.Thickness))
		}
	}
	b.AddCylinder(cyl)
}

func within(z, z0, z1 float64) bool { return z >= z0 && z <= z1 }

func (c *checker) furtherRoom(b *geom.Builder, i int, shafts []geom.Passage) {
	r := &c.m.Rooms[i]
	key := fmt.Sprintf("room[%d]", i)
	if r.Shape != Cylinder {
		c.fault(key+".shape", `use shape = "cylinder"`, "this version knows cylindrical rooms only")
		return
	}
	d := Deck{Name: r.Name + " " + FloorName, Radius: r.FloorRadius, Thickness: DefaultThickness, Whole: true,
		Axial: [2]float64{math.Inf(-1), math.Inf(1)}, Friction: None, Restitution: None}
	if r.Length > 0 {
		d.Axial = [2]float64{r.Axial - r.Length/2, r.Axial + r.Length/2}
	}
	c.room(b, r, r.Name, c.geomDeck(&d, shafts), shafts)
}

// geomDeck gives a deck as the geometry wants it, with the mouths of the
// passages that cross it.
func (c *checker) geomDeck(d *Deck, shafts []geom.Passage) geom.Deck {
	out := geom.Deck{Shell: geom.Shell{Name: d.Name, R0: d.Radius, R1: d.Radius + d.Thickness, Whole: d.Whole,
		Z0: d.Axial[0], Z1: d.Axial[1], Restitution: d.Restitution, Friction: d.Friction,
		Inner: d.Name, Outer: d.Name + " underside", Edge: d.Name + " edge"}}
	if !d.Whole {
		out.Phi0, out.Phi1 = d.From.Angle(d.Radius), d.To.Angle(d.Radius)
	}
	for i := range d.Openings {
		o := &d.Openings[i]
		out.Openings = append(out.Openings, geom.Opening{Name: o.Name, Phi: o.Spinward.Angle(d.Radius), Z: o.Axial,
			Spinward: o.Size[0], Axial: o.Size[1], Coaming: o.Coaming, Closed: o.Closed})
	}
	for i := range shafts {
		p := &shafts[i]
		if p.To > d.Radius && p.From < d.Radius+d.Thickness && within(p.Z, d.Axial[0], d.Axial[1]) {
			out.Holes = append(out.Holes, p.FloorMouth(d.Radius))
		}
	}
	return out
}

// shafts checks the passages and gives those that can be built.
func (c *checker) shafts() []geom.Passage {
	var out []geom.Passage
	for i := range c.m.Passages {
		p := &c.m.Passages[i]
		key := fmt.Sprintf("passage[%d]", i)
		switch {
		case p.Width == 0:
			c.fault(key, "give width for a square section", "this version knows passages of square section only")
		case p.FromRadius >= p.ToRadius:
			c.fault(key+".to_radius", "", "wants more than from_radius, %g m, got %g m", p.FromRadius, p.ToRadius)
		case !c.reaches(p.FromRadius, p.Axial):
			c.fault(key+".from_radius", "", "reaches no room: there is none at %g m from the axis", p.FromRadius)
		case !c.reaches(p.ToRadius, p.Axial):
			c.fault(key+".to_radius", "", "reaches no room: there is none at %g m from the axis", p.ToRadius)
		case p.Width >= 2*p.FromRadius:
			c.fault(key+".width", "", "wants less than twice from_radius, got %g m", p.Width)
		default:
			out = append(out, geom.Passage{Name: p.Name, Phi: p.Spinward.Angle(p.FromRadius), Z: p.Axial,
				From: p.FromRadius, To: p.ToRadius, Width: p.Width, Wall: DefaultThickness})
		}
	}
	return out
}

// reaches says whether a place lies in a room or on its floor or ceiling.
func (c *checker) reaches(r, z float64) bool {
	in := func(room *Room) bool {
		half := math.Inf(1)
		if room.Length > 0 {
			half = room.Length / 2
		}
		slack := levelSlack * r
		return r <= room.FloorRadius+slack && r >= room.CeilingRadius-slack && math.Abs(z-room.Axial) <= half
	}
	if in(&c.m.Habitat.Room) {
		return true
	}
	for i := range c.m.Rooms {
		if in(&c.m.Rooms[i]) {
			return true
		}
	}
	return false
}

func (c *checker) fixture(b *geom.Builder, i int) {
	f := &c.m.Fixtures[i]
	key := fmt.Sprintf("fixture[%d]", i)
	switch f.Kind {
	case Box:
		c.box(b, key, f)
	case Wall:
		c.wall(b, key, f)
	case Post:
		c.post(b, key, f)
	}
}

// inset is by what share of its length the ends of a fixture are drawn in
// before they are looked for in the rooms: they may stand on the very hull.
const inset = 1e-6

// post adds a post or rail between two stations, its rounded ends about them.
func (c *checker) post(b *geom.Builder, key string, f *Fixture) {
	var at [2]r3.Vec
	for i, s := range []*Station{&f.From, &f.To} {
		p, err := c.m.Resolve(*s)
		if err != nil {
			c.fault(key+[]string{".from", ".to"}[i]+s.key(), "", "%v", err)
			return
		}
		at[i] = p.Vec()
	}
	d := r3.Sub(at[1], at[0])
	if r3.Norm(d) <= TouchSlack {
		c.fault(key+".to", "", "wants a place apart from the other end")
		return
	}
	for i, u := range []float64{inset, 1 - inset} {
		if !b.Inside(r3.Add(at[0], r3.Scale(u, d))) {
			c.fault(key+[]string{".from", ".to"}[i], "", "fixture %q stands outside the habitat", f.Name)
			return
		}
	}
	b.Add(&geom.Capsule{A: at[0], B: at[1], Radius: f.Diameter / 2}, b.Surface(f.Name, f.Restitution, f.Friction))
}

// box adds a straight box whose underside is tangent to the circle through
// its middle, so that on a curved floor its ends reach into the floor and
// leave no gap.
func (c *checker) box(b *geom.Builder, key string, f *Fixture) {
	p, err := c.m.Resolve(f.At)
	if err != nil {
		c.fault(key+".at", "", "%v", err)
		return
	}
	if z0, z1 := c.m.Habitat.Ends(); p.R <= f.Size[2] || p.R > c.m.Decks[0].Radius || p.Z < z0 || p.Z > z1 {
		c.fault(key+".at", "", "fixture %q stands outside the habitat", f.Name)
		return
	}
	l := frame.LocalAt(p.Phi)
	sin, cos := math.Sincos(f.Turn)
	mid := p.Polar
	mid.R -= f.Size[2] / 2
	block := &geom.Block{Centre: mid.Vec(), Along: l.Vec(cos, sin, 0), Across: l.Vec(-sin, cos, 0), Up: l.Up,
		Half: [3]float64{f.Size[0] / 2, f.Size[1] / 2, f.Size[2] / 2}}
	id := func(side string) geom.SurfaceID { return b.Surface(f.Name+" "+side, f.Restitution, f.Friction) }
	b.Add(block, id("top"), id("underside"), id(facing(cos, sin)), id(facing(-cos, -sin)), id(facing(-sin, cos)), id(facing(sin, -cos)))
}

// facing names the side of a box by the direction that it faces most, for a
// normal with the given parts.
func facing(spinward, axial float64) string {
	switch {
	case math.Abs(spinward) >= math.Abs(axial)-levelSlack && spinward > 0:
		return "spinward side"
	case math.Abs(spinward) >= math.Abs(axial)-levelSlack:
		return "antispinward side"
	case axial > 0:
		return "+axial side"
	}
	return "-axial side"
}

// wall adds a wall on a deck along one direction, axial or spinward, in up to
// three parts around its doorway.
func (c *checker) wall(b *geom.Builder, key string, f *Fixture) {
	from, err := c.m.Resolve(f.From)
	to, err2 := c.m.Resolve(f.To)
	if err != nil || err2 != nil {
		c.fault(key, "", "both ends want to be places on a deck")
		return
	}
	deck := &c.m.Decks[from.Deck]
	along := math.Abs(deck.Radius * (to.Phi - from.Phi))
	axial := math.Abs(to.Z - from.Z)
	switch {
	case from.Deck != to.Deck:
		c.fault(key+".to", "", "wants both ends on one deck")
	case (along > TouchSlack) == (axial > TouchSlack):
		c.fault(key+".to", "", "a wall runs axially or spinward: wants ends that differ in one of them")
	case f.Height >= deck.Radius:
		c.fault(key+".height", "", "wants less than the deck's radius, %g m", deck.Radius)
	default:
		c.wallParts(b, key, f, wallLine{from: from, deck: deck, length: math.Max(along, axial), axial: axial > along,
			back: to.Phi < from.Phi || to.Z < from.Z})
	}
}

// wallLine is where a wall runs.
type wallLine struct {
	from   Place
	deck   *Deck
	length float64
	axial  bool
	back   bool // toward antispinward or -axial
}

func (c *checker) wallParts(b *geom.Builder, key string, f *Fixture, w wallLine) {
	id := b.Surface(f.Name, f.Restitution, f.Friction)
	part := func(u0, u1, h0, h1 float64) {
		if u1 > u0 && h1 > h0 {
			b.Add(w.solid(f, u0, u1, h0, h1), id, id, id, id, id, id)
		}
	}
	d := f.Doorway
	if d == nil {
		part(0, w.length, 0, f.Height)
		return
	}
	u0, u1 := d.At-d.Width/2, d.At+d.Width/2
	if u0 < 0 || u1 > w.length || d.Height > f.Height {
		c.fault(key+".doorway", "", "the doorway does not fit in a wall %.6g m long and %.6g m high", w.length, f.Height)
		return
	}
	part(0, u0, 0, f.Height)
	part(u0, u1, d.Height, f.Height)
	part(u1, w.length, 0, f.Height)
}

// solid is the part of the wall from u0 to u1 (m along it) and from h0 to h1
// (m above the deck): a straight slab where the wall runs axially, a piece of
// a ring where it runs round.
func (w *wallLine) solid(f *Fixture, u0, u1, h0, h1 float64) geom.Solid {
	if w.back {
		u0, u1 = -u1, -u0
	}
	r := w.deck.Radius
	if !w.axial {
		return &geom.Sector{R0: r - h1, R1: r - h0, Phi0: w.from.Phi + u0/r, Phi1: w.from.Phi + u1/r,
			Z0: w.from.Z - f.Thickness/2, Z1: w.from.Z + f.Thickness/2}
	}
	l := frame.LocalAt(w.from.Phi)
	mid := frame.Polar{R: r - (h0+h1)/2, Phi: w.from.Phi, Z: w.from.Z + (u0+u1)/2}
	return &geom.Block{Centre: mid.Vec(), Along: l.Spinward, Across: l.Axial, Up: l.Up,
		Half: [3]float64{f.Thickness / 2, (u1 - u0) / 2, (h1 - h0) / 2}}
}
