package model

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/frame"
	"offplumb/sim/geom"
)

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

func (c *checker) outsideFault(key string, f *Fixture) {
	c.fault(key, "", "fixture %q stands outside the habitat", f.Name)
}

// box adds a straight box whose underside is tangent to the circle through
// its middle, so that on a curved floor its ends reach into the floor and
// leave no gap.
func (c *checker) box(b *geom.Builder, key string, f *Fixture) {
	s, err := c.m.footing(f.At)
	if err != nil {
		c.fault(key+".at"+f.At.key(), "", "%v", err)
		return
	}
	up := func(share float64) r3.Vec { return s.at(0, 0, share*f.Size[2]) }
	if s.flat == nil && s.R <= f.Size[2] || s.height < -TouchSlack || !b.Inside(up(inset)) || !b.Inside(up(0.5)) {
		c.outsideFault(key+".at", f)
		return
	}
	l := s.local
	sin, cos := math.Sincos(f.Turn)
	block := &geom.Block{Centre: up(0.5), Along: l.Vec(cos, sin, 0), Across: l.Vec(-sin, cos, 0), Up: l.Up,
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
			c.outsideFault(key+[]string{".from", ".to"}[i], f)
			return
		}
	}
	b.Add(&geom.Capsule{A: at[0], B: at[1], Radius: f.Diameter / 2}, b.Surface(f.Name, f.Restitution, f.Friction))
}

// wall adds a wall on a deck along one direction, axial or spinward, in up to
// three parts around its doorway.
func (c *checker) wall(b *geom.Builder, key string, f *Fixture) {
	from, err := c.m.footing(f.From)
	to, err2 := c.m.footing(f.To)
	if err != nil || err2 != nil {
		c.fault(key, "", "both ends want to be places on a deck")
		return
	}
	along, axial := to.along(&from), to.Z-from.Z
	switch {
	case from.floor != to.floor:
		c.fault(key+".to", "", "wants both ends on one deck")
	case (math.Abs(along) > TouchSlack) == (math.Abs(axial) > TouchSlack):
		c.fault(key+".to", "", "a wall runs axially or spinward: wants ends that differ in one of them")
	case f.Height >= from.radius:
		c.fault(key+".height", "", "wants less than the deck's radius, %g m", from.radius)
	default:
		w := wallLine{from: from, length: math.Max(math.Abs(along), math.Abs(axial)), axial: math.Abs(axial) > math.Abs(along)}
		w.back = along < 0 || axial < 0
		c.wallParts(b, key, f, w)
	}
}

// wallLine is where a wall runs.
type wallLine struct {
	from   footing
	length float64
	axial  bool
	back   bool // toward antispinward or -axial
}

func (c *checker) wallParts(b *geom.Builder, key string, f *Fixture, w wallLine) {
	defer b.Together()()
	for i, u := range []float64{inset, 1 - inset} {
		if !b.Inside(w.point(u*w.length, inset*f.Height)) {
			c.outsideFault(key+[]string{".from", ".to"}[i], f)
			return
		}
	}
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

// point gives the point u (m) along the wall and h (m) above the deck.
func (w *wallLine) point(u, h float64) r3.Vec {
	if w.back {
		u = -u
	}
	h -= w.from.height
	if w.axial {
		return w.from.at(0, u, h)
	}
	return w.from.at(u, 0, h)
}

// solid is the part of the wall from u0 to u1 (m along it) and from h0 to h1
// (m above the deck): a straight slab where the wall runs axially or the floor
// is flat, a piece of a ring where it runs round.
func (w *wallLine) solid(f *Fixture, u0, u1, h0, h1 float64) geom.Solid {
	s, r := &w.from, w.from.radius
	if !w.axial && s.flat == nil {
		if w.back {
			u0, u1 = -u1, -u0
		}
		return &geom.Sector{R0: r - h1, R1: r - h0, Phi0: s.Phi + u0/r, Phi1: s.Phi + u1/r, Z0: s.Z - f.Thickness/2, Z1: s.Z + f.Thickness/2}
	}
	half := [3]float64{f.Thickness / 2, (u1 - u0) / 2, (h1 - h0) / 2}
	if !w.axial {
		half[0], half[1] = half[1], half[0]
	}
	return &geom.Block{Centre: w.point((u0+u1)/2, (h0+h1)/2), Along: s.local.Spinward, Across: s.local.Axial, Up: s.local.Up, Half: half}
}

// footing is a station as what stands there has it: the floor beneath, and the
// directions on it.
type footing struct {
	Place
	floor  string  // its name
	radius float64 // m, of the floor, of its middle where it is flat
	height float64 // m, above the floor
	flat   *Flat   // nil: it is curved
	local  frame.Local
}

// footing resolves a station for something that stands there.
func (m *Model) footing(s Station) (footing, error) {
	p, err := m.Resolve(s)
	if err != nil {
		return footing{}, err
	}
	d := &m.Decks[p.Deck]
	out := footing{Place: p, floor: d.Name, radius: d.Radius, height: p.Height, flat: m.FlatDeck(p.Deck), local: frame.LocalAt(p.Phi)}
	if r := m.RoomNamed(s.Room); r != nil {
		out.floor, out.radius, out.height = r.Name+" "+FloorName, r.FloorRadius, r.FloorRadius-p.R
		if r.Shape == Cabin {
			out.flat = r.flat()
		}
	}
	if out.flat != nil {
		out.local = out.flat.Local()
		_, _, out.height = out.flat.Place(p.Vec())
	}
	return out, nil
}

// at gives the point (m, habitat components) at the lengths from the station:
// round the axis on a curved floor, straight on a flat one, and up.
func (s *footing) at(spinward, axial, up float64) r3.Vec {
	if s.flat != nil {
		return r3.Add(s.Vec(), s.local.Vec(spinward, axial, up))
	}
	return frame.Polar{R: s.R - up, Phi: s.Phi + spinward/s.radius, Z: s.Z + axial}.Vec()
}

// along gives how far (m) s lies spinward of another station on its floor.
func (s *footing) along(other *footing) float64 {
	if s.flat == nil {
		return other.radius * (s.Phi - other.Phi)
	}
	a, _, _ := s.flat.Place(s.Vec())
	b, _, _ := s.flat.Place(other.Vec())
	return a - b
}
