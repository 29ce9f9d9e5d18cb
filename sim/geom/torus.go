package geom

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// FlatShare places the tube of a torus with a flat floor: the middle of the
// tube lies this share of its radius above the floor, which so is 1.2 tube
// radii wide, and the ceiling 1.8 above it.
const FlatShare = 0.8

// Torus is a room in a tube that is bent round the axis. Its floor is the
// outer half of the tube; a flat one, a cylinder about the axis, cuts the tube
// off. The inner half is its ceiling; beside a flat floor the tube is walls.
type Torus struct {
	Name      string    // prefixes the names of its surfaces; "" for the habitat's own room
	Floor     Deck      // R0 is its radius, the outermost of the room; openings in a flat floor only
	Z         float64   // m, axial place of its middle
	Tube      float64   // m, radius of the tube
	Flat      bool      // it has a flat floor
	Thickness float64   // m, of the tube
	Passages  []Passage // those that may open into it
}

// Ring gives the radius (m) of the circle of the tube's middle.
func (t *Torus) Ring() float64 {
	if t.Flat {
		return t.Floor.R0 - FlatShare*t.Tube
	}
	return t.Floor.R0 - t.Tube
}

// HalfWidth gives half the axial extent of the room (m) at the distance r (m)
// from the axis, 0 outside.
func (t *Torus) HalfWidth(r float64) float64 {
	if t.Flat && r > t.Floor.R0 {
		return 0
	}
	return chord(t.Tube, r-t.Ring())
}

// Span gives where along the middle line of a passage at the angle phi (rad)
// and the axial place z (m) its whole section, of half the width h (m), is
// inside the room; false where it fits nowhere.
func (t *Torus) Span(_, z, h float64) (Span, bool) {
	dz := math.Abs(z-t.Z) + h
	if dz > t.Tube {
		return Span{}, false
	}
	e := chord(t.Tube, dz)
	s := Span{t.Ring() - e, chord(t.Ring()+e, h)}
	if t.Flat {
		s.To = math.Min(s.To, chord(t.Floor.R0, h))
	}
	return s, s.From < s.To || h == 0
}

// AddTorus adds the hull of a torus and the room itself.
func (b *Builder) AddTorus(t Torus) {
	v := Vault{Ring: t.Ring(), Z: t.Z, Inner: t.Tube, Outer: t.Tube + t.Thickness, Whole: true}
	if t.Flat {
		b.addFlatFloor(&t)
	}
	name := func(s string) string { return surfaceOf(t.Name, s) }
	half := func(t0, t1 float64, inner, outer string) *vaultShell {
		s := &vaultShell{Vault: v, restitution: math.NaN(), friction: math.NaN(), inner: inner, outer: outer, edge: outer}
		s.Theta0, s.Theta1 = t0, t1
		return s
	}
	shells := []*vaultShell{half(math.Pi/2, 3*math.Pi/2, name("ceiling"), name("ceiling outside"))}
	if t.Flat {
		edge := math.Acos(FlatShare)
		shells = append(shells, half(-math.Pi/2, -edge, name("wall -axial"), name("wall -axial outside")),
			half(edge, math.Pi/2, name("wall +axial"), name("wall +axial outside")))
	} else {
		s := half(-math.Pi/2, math.Pi/2, t.Floor.Inner, t.Floor.Outer)
		s.restitution, s.friction = t.Floor.Restitution, t.Floor.Friction
		shells = append(shells, s)
	}
	b.addVaults(shells, t.Passages)
	b.AddSpace(&tubeSpace{ring: v.Ring, z: t.Z, inner: v.Inner, outer: v.Outer, floor: t.Floor.R0, under: t.Floor.R1, flat: t.Flat})
}

// addVaults adds vaults that together are one body, with the mouths of
// passages.
func (b *Builder) addVaults(shells []*vaultShell, passages []Passage) {
	type corner struct {
		p *Passage
		Span
	}
	var corners []corner
	done := b.Together()
	for _, s := range shells {
		for i := range passages {
			if at, ok := s.pierce(&passages[i]); ok && passages[i].Round {
				corners = append(corners, corner{&passages[i], at})
			}
		}
		b.addVault(s)
	}
	done()
	for _, c := range corners {
		b.addCollar(c.p, c.From, c.To)
	}
}

// addFlatFloor adds the flat floor of a torus. It reaches on beneath the tube
// by its thickness, so that nothing gapes where they meet.
func (b *Builder) addFlatFloor(t *Torus) {
	d := t.Floor
	half := t.HalfWidth(d.R0)
	d.Whole, d.Z0, d.Z1 = true, t.Z-half-t.Thickness, t.Z+half+t.Thickness
	for i := range t.Passages {
		if p := &t.Passages[i]; p.crosses(d.R0) && math.Abs(p.Z-t.Z)+p.Width/2 < half {
			d.Holes = append(d.Holes, p.FloorMouth(d.R0))
		}
	}
	b.AddDeck(d)
}

// surfaceOf puts the name of a room before that of a surface.
func surfaceOf(room, surface string) string {
	if room == "" {
		return surface
	}
	return room + " " + surface
}

// tubeSpace is the free space of a torus.
type tubeSpace struct {
	ring, z, inner, outer, floor, under float64
	flat                                bool
}

func (t *tubeSpace) place(p r3.Vec) (r, rho float64) {
	r = math.Hypot(p.X, p.Y)
	return r, math.Hypot(r-t.ring, p.Z-t.z)
}

// Beyond implements [Space].
func (t *tubeSpace) Beyond(p r3.Vec) float64 {
	r, rho := t.place(p)
	if t.flat {
		return math.Max(rho-t.outer, r-t.under)
	}
	return rho - t.outer
}

// Holds implements [Space]. A flat floor's thickness counts as within, for
// openings in it.
func (t *tubeSpace) Holds(p r3.Vec) bool {
	r, rho := t.place(p)
	return rho <= t.inner && (!t.flat || r <= t.under)
}
