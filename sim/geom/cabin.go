package geom

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// Cabin is a box room at the end of an arm. Its floor is a plane across the
// radius through its middle, and its walls stand upright on that. Places in it
// are those about a shaft: u spinward, v axial, w out from the axis.
type Cabin struct {
	Name      string     // prefixes the names of its surfaces; "" for the habitat's own room
	Phi, Z    float64    // rad and m, of its middle
	Floor     Deck       // R0 is the distance of its middle from the axis, R1 that of its outer face
	Size      [3]float64 // m, clear: spinward, axial, up
	Thickness float64    // m, of ceiling and walls
	Passages  []Passage  // those that may open into its ceiling or floor
}

// ceiling gives the place w of the ceiling.
func (c *Cabin) ceiling() float64 { return c.Floor.R0 - c.Size[2] }

// Span is [Torus.Span] for a cabin: the passage may run at an angle to the
// cabin's middle line.
func (c *Cabin) Span(phi, z, h float64) (Span, bool) {
	turn := math.Remainder(phi-c.Phi, 2*math.Pi)
	sin, cos := math.Sincos(turn)
	side := math.Abs(sin)
	if cos <= 0 || math.Abs(z-c.Z)+h > c.Size[1]/2 {
		return Span{}, false
	}
	s := Span{(c.ceiling() + h*side) / cos, (c.Floor.R0 - h*side) / cos}
	room := c.Size[0]/2 - h*cos
	if side > 0 {
		s.To = math.Min(s.To, room/side)
	}
	return s, room >= 0 && s.From < s.To
}

// AddCabin adds the hull of a box room and the room itself. Floor, ceiling and
// walls reach past each other by their thickness, so that nothing gapes.
func (b *Builder) AddCabin(c Cabin) {
	at, f := ShaftAt(c.Phi, c.Z), &c.Floor
	t, half := c.Thickness, [2]float64{c.Size[0] / 2, c.Size[1] / 2}
	b.addCabinFloor(&c)
	over := plate{Shaft: at, rect: rect{u: [2]float64{-half[0] - t, half[0] + t}, v: [2]float64{-half[1] - t, half[1] + t}},
		w: [2]float64{c.ceiling() - t, c.ceiling()}, restitution: math.NaN(), friction: math.NaN(),
		top: surfaceOf(c.Name, "ceiling outside"), under: surfaceOf(c.Name, "ceiling"), edge: surfaceOf(c.Name, "ceiling")}
	b.addPierced(&over, &c)
	wall := func(name string, u, v [2]float64) {
		id := b.Surface(surfaceOf(c.Name, name), math.NaN(), math.NaN())
		b.Add(at.block(u, v, [2]float64{c.ceiling() - t, f.R1}), id, id, id, id, id, id)
	}
	wall("spinward wall", [2]float64{half[0], half[0] + t}, [2]float64{-half[1] - t, half[1] + t})
	wall("antispinward wall", [2]float64{-half[0] - t, -half[0]}, [2]float64{-half[1] - t, half[1] + t})
	wall("bulkhead -axial", [2]float64{-half[0], half[0]}, [2]float64{-half[1] - t, -half[1]})
	wall("bulkhead +axial", [2]float64{-half[0], half[0]}, [2]float64{half[1], half[1] + t})
	b.AddSpace(&cabinSpace{Shaft: at, half: half, ceiling: c.ceiling(), floor: f.R1, wall: t})
}

// addCabinFloor adds the floor with its openings.
func (b *Builder) addCabinFloor(c *Cabin) {
	f, t := &c.Floor, c.Thickness
	under := plate{Shaft: ShaftAt(c.Phi, c.Z), w: [2]float64{f.R0, f.R1}, restitution: f.Restitution, friction: f.Friction,
		rect: rect{u: [2]float64{-c.Size[0]/2 - t, c.Size[0]/2 + t}, v: [2]float64{-c.Size[1]/2 - t, c.Size[1]/2 + t}},
		top:  f.Inner, under: f.Outer, edge: f.Edge}
	for _, o := range f.Openings {
		r := c.opening(o)
		r.name = rimName(o)
		under.holes = append(under.holes, r)
	}
	b.addPierced(&under, c)
	for _, o := range f.Openings {
		b.furnish(&under, c.opening(o), o)
	}
}

// opening gives where an opening is cut: its middle lies where the radius at
// its angle meets the floor.
func (c *Cabin) opening(o Opening) rect {
	u, v := c.Floor.R0*math.Tan(o.Phi-c.Phi), o.Z-c.Z
	return rect{u: [2]float64{u - o.Spinward/2, u + o.Spinward/2}, v: [2]float64{v - o.Axial/2, v + o.Axial/2}}
}

// furnish adds the lid and the coaming of an opening in a flat floor.
func (b *Builder) furnish(floor *plate, r rect, o Opening) {
	w, thick := floor.w, floor.w[1]-floor.w[0]
	if o.Closed {
		lid := plate{Shaft: floor.Shaft, rect: r, w: w, restitution: floor.restitution, friction: floor.friction,
			top: o.Name + " lid", under: o.Name + " lid underside", edge: o.Name + " lid"}
		b.addPlate(&lid)
	}
	if o.Coaming == 0 {
		return
	}
	id := b.Surface(o.Name+" coaming", floor.restitution, floor.friction)
	add := func(u, v [2]float64) {
		b.Add(floor.block(u, v, [2]float64{w[0] - o.Coaming, w[0]}), id, id, id, id, id, id)
	}
	v := [2]float64{r.v[0] - thick, r.v[1] + thick}
	add([2]float64{r.u[0] - thick, r.u[0]}, v)
	add([2]float64{r.u[1], r.u[1] + thick}, v)
	add(r.u, [2]float64{r.v[0] - thick, r.v[0]})
	add(r.u, [2]float64{r.v[1], r.v[1] + thick})
}

// addPierced adds the floor or ceiling of a cabin with the mouths of passages.
func (b *Builder) addPierced(s *plate, c *Cabin) {
	type corner struct {
		p *Passage
		Span
	}
	var corners []corner
	for i := range c.Passages {
		if at, ok := s.pierce(&c.Passages[i], c.Phi); ok && c.Passages[i].Round {
			corners = append(corners, corner{&c.Passages[i], at})
		}
	}
	b.addPlate(s)
	for _, k := range corners {
		b.addCollar(k.p, k.From, k.To)
	}
}

// cabinSpace is the free space of a box room.
type cabinSpace struct {
	Shaft
	half                 [2]float64
	ceiling, floor, wall float64 // w of the ceiling and of the floor's outer face; m
}

// Beyond implements [Space].
func (c *cabinSpace) Beyond(p r3.Vec) float64 {
	q := c.local(p)
	level := math.Max(math.Abs(q.X)-c.half[0]-c.wall, math.Abs(q.Y)-c.half[1]-c.wall)
	return math.Max(level, math.Max(q.Z-c.floor, c.ceiling-c.wall-q.Z))
}

// Holds implements [Space]. The floor's thickness counts as within, for
// openings in it.
func (c *cabinSpace) Holds(p r3.Vec) bool {
	q := c.local(p)
	return math.Abs(q.X) <= c.half[0] && math.Abs(q.Y) <= c.half[1] && q.Z >= c.ceiling && q.Z <= c.floor
}
