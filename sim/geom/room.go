package geom

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// Cylinder is a room about the axis, between an optional ceiling and a floor,
// and between end bulkheads where it has them.
type Cylinder struct {
	Name      string  // prefixes the names of its surfaces; "" for the habitat's own room
	Floor     Deck    // R0 is its radius; its Z0 and Z1 are the room's ends, infinite for none
	Ceiling   float64 // m; 0: none
	Thickness float64 // m, of ceiling and bulkheads
	Mouths    []Hole  // cut through the ceiling
}

// AddCylinder adds the hull of a cylindrical room and the room itself.
func (b *Builder) AddCylinder(c Cylinder) {
	b.AddDeck(c.Floor)
	f := &c.Floor
	none := math.NaN()
	if c.Ceiling > 0 {
		b.AddShell(Shell{Name: c.Name, R0: math.Max(0, c.Ceiling-c.Thickness), R1: c.Ceiling, Whole: true, Z0: f.Z0, Z1: f.Z1,
			Restitution: none, Friction: none, Inner: c.surface("ceiling outside"), Outer: c.surface("ceiling"),
			Edge: c.surface("ceiling"), Holes: c.Mouths})
	}
	if !math.IsInf(f.Z0, 0) {
		b.addBulkhead(&c, "bulkhead -axial", f.Z0-c.Thickness, f.Z0)
	}
	if !math.IsInf(f.Z1, 0) {
		b.addBulkhead(&c, "bulkhead +axial", f.Z1, f.Z1+c.Thickness)
	}
	b.AddSpace(&cylinderSpace{r0: c.Ceiling, r1: f.R0, outer: f.R1, z0: f.Z0, z1: f.Z1, wall: c.Thickness})
}

func (c *Cylinder) surface(name string) string {
	return surfaceOf(c.Name, name)
}

// addBulkhead closes an end of the room, from its ceiling to the outer face of
// its floor.
func (b *Builder) addBulkhead(c *Cylinder, name string, z0, z1 float64) {
	id := b.Surface(c.surface(name), math.NaN(), math.NaN())
	r0 := math.Max(0, c.Ceiling-c.Thickness)
	b.Add(&Sector{R0: r0, R1: c.Floor.R1, Whole: true, Z0: z0, Z1: z1}, id, id, id, id, id, id)
}

// cylinderSpace is the free space of a cylindrical room.
type cylinderSpace struct {
	r0, r1, outer, z0, z1, wall float64
}

// Beyond implements [Space].
func (c *cylinderSpace) Beyond(p r3.Vec) float64 {
	r := fromAxis(p)
	out := max(r-c.outer, c.z0-c.wall-p.Z, p.Z-c.z1-c.wall)
	if c.r0 > 0 {
		out = max(out, c.r0-c.wall-r)
	}
	return out
}

// Holds implements [Space]. The floor's thickness counts as within, for
// openings in it.
func (c *cylinderSpace) Holds(p r3.Vec) bool {
	r := math.Hypot(p.X, p.Y)
	return r >= c.r0 && r <= c.outer && p.Z >= c.z0 && p.Z <= c.z1
}

// Span is [Torus.Span] for a cylindrical room.
func (c *Cylinder) Span(_, z, h float64) (Span, bool) {
	s := Span{c.Ceiling, chord(c.Floor.R0, h)}
	return s, z-h >= c.Floor.Z0 && z+h <= c.Floor.Z1 && s.From < s.To
}
