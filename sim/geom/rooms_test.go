package geom_test

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/geom"
)

// spanned is a room that says where a passage is inside of it.
type spanned interface {
	Span(phi, z, h float64) (geom.Span, bool)
}

// join gives a passage from one room to another, further out: its walls run on
// until the whole of its section is inside both.
func join(name string, phi, z, width float64, round bool, inner, outer spanned) geom.Passage {
	p := geom.Passage{Name: name, Phi: phi, Z: z, Width: width, Round: round, Wall: wall}
	a, ok := inner.Span(phi, z, width/2)
	b, ok2 := outer.Span(phi, z, width/2)
	if !ok || !ok2 {
		panic("the passage does not fit")
	}
	p.From, p.To = math.Hypot(a.To, width/2), b.From
	return p
}

// hubRoom is a cylindrical hub.
func hubRoom(r float64) geom.Cylinder {
	return geom.Cylinder{Name: "hub", Floor: whole("hub floor", r, -5, 5), Thickness: wall}
}

func torusRoom(r, tube float64, flat bool) geom.Torus {
	return geom.Torus{Floor: whole("floor", r, 0, 0), Z: 0.3, Tube: tube, Flat: flat, Thickness: wall}
}

// tube is a hub and a torus, joined by spokes: one along the middle of the
// tube and one aside of it, the first of the given section and the second of
// the other. The floor of a flat one has a hatch with a coaming and a plain
// one.
func tube(flat, round bool) *world {
	hub, ring := hubRoom(3), torusRoom(18, 2.5, flat)
	for i, z := range []float64{0.3, 0.9} {
		p := join("spoke "+string(rune('A'+i)), 0.4+2.2*float64(i), z, 1.6, round != (i == 1), &hub, &ring)
		hub.Floor.Holes = append(hub.Floor.Holes, p.FloorMouth(hub.Floor.R0))
		ring.Passages = append(ring.Passages, p)
	}
	if flat {
		ring.Floor.Openings = []geom.Opening{
			{Name: "hold", Phi: 2, Z: 0.5, Spinward: 1.2, Axial: 0.8},
			{Name: "drain", Phi: 2.5, Z: 0.2, Spinward: 0.6, Axial: 0.8, Coaming: 0.3},
		}
	}
	rail := &geom.Capsule{A: polar(17, 1, -0.5), B: polar(17, 1.2, 1), Radius: 0.03}
	return &world{rooms: []geom.Cylinder{hub}, tori: []geom.Torus{ring}, passages: ring.Passages, posts: []*geom.Capsule{rail}}
}

// rays is a spherical hub in a ring with a ceiling, joined by spokes.
func rays(round bool) *world {
	ball := geom.Ball{Floor: whole("hub floor", 4, 0, 0), Z: 0.5, Thickness: wall}
	ring := geom.Cylinder{Floor: whole("floor", 18, -7, 7), Ceiling: 12.8, Thickness: wall}
	for i, z := range []float64{0.5, 1.5, -0.6} {
		p := join("spoke "+string(rune('A'+i)), 0.4+2.1*float64(i), z, 1+0.8*float64(i%2), round != (i == 1), &ball, &ring)
		ring.Mouths = append(ring.Mouths, p.CeilingMouth(ring.Ceiling, wall))
		ball.Passages = append(ball.Passages, p)
	}
	return &world{rooms: []geom.Cylinder{ring}, balls: []geom.Ball{ball}, passages: ball.Passages}
}

// arms is a hub with cabins at the ends of arms, one of which opens aside of
// its cabin's middle, at a slant.
func arms(round bool) *world {
	hub := hubRoom(3)
	w := &world{}
	for i, aside := range []float64{0, 0.06} {
		name := "cabin " + string(rune('A'+i))
		c := geom.Cabin{Name: name, Phi: 0.7 + 3*float64(i), Z: 0.2, Size: [3]float64{5, 4, 2.5}, Thickness: wall, Floor: whole(name+" floor", 16, 0, 0)}
		p := join("arm "+string(rune('A'+i)), c.Phi+aside, 0.5, 1.2, round != (i == 1), &hub, &c)
		hub.Floor.Holes = append(hub.Floor.Holes, p.FloorMouth(hub.Floor.R0))
		c.Passages = []geom.Passage{p}
		if i == 0 {
			c.Floor.Openings = []geom.Opening{
				{Name: "hatch", Phi: c.Phi + 0.05, Z: 0.6, Spinward: 0.8, Axial: 1, Coaming: 0.2},
				{Name: "trap", Phi: c.Phi - 0.06, Z: 0.1, Spinward: 0.8, Axial: 0.6, Closed: true},
				{Name: "well", Phi: c.Phi - 0.05, Z: -1, Spinward: 0.7, Axial: 0.6},
			}
		}
		w.cabins, w.passages = append(w.cabins, c), append(w.passages, p)
	}
	w.rooms = []geom.Cylinder{hub}
	return w
}

// outward is a torus with a round passage from its floor on to a cabin.
func outward(flat, round bool) *world {
	ring := torusRoom(10, 2.2, flat)
	c := geom.Cabin{Name: "pod", Phi: -1, Z: 0.3, Size: [3]float64{3, 2, 2.2}, Thickness: wall, Floor: whole("pod floor", 15, 0, 0)}
	p := join("trunk", -1, 0.4, 0.9, round, &ring, &c)
	ring.Passages, c.Passages = []geom.Passage{p}, []geom.Passage{p}
	return &world{tori: []geom.Torus{ring}, cabins: []geom.Cabin{c}, passages: []geom.Passage{p}}
}

// shaped are the interiors of the shapes beside cylinders.
func shaped() []namedWorld {
	return []namedWorld{
		{"torus", tube(false, false)}, {"torus, round", tube(false, true)}, {"flat torus", tube(true, false)}, {"flat torus, round", tube(true, true)},
		{"sphere", rays(false)}, {"sphere, round", rays(true)}, {"cabins", arms(false)}, {"cabins, round", arms(true)},
		{"outward", outward(false, true)}, {"outward, flat", outward(true, false)}, {"round spokes", roundWheel()},
	}
}

// roundWheel is the wheel with round spokes, the first very wide.
func roundWheel() *world {
	w := wheel(3)
	for i := range w.passages {
		p := &w.passages[i]
		p.Round = true
		if i == 0 {
			p.Width = 4
		}
		w.rooms[1].Floor.Holes[i] = p.FloorMouth(3)
		w.rooms[0].Mouths[i] = p.CeilingMouth(12.8, wall)
	}
	return w
}

// What is solid of these rooms, said again in plain words.

// inShafts says whether p is in the clear section of a passage, between its
// ends.
func (w *world) inShafts(p r3.Vec) bool {
	for i := range w.passages {
		s := &w.passages[i]
		across, along := alongShaft(s, p)
		if across < s.Width/2 && along > innerEnd(s) && along < s.To {
			return true
		}
	}
	return false
}

func innerEnd(s *geom.Passage) float64 { return math.Sqrt(s.From*s.From - s.Width*s.Width/4) }

// furtherSolid says whether there is matter of these rooms at p.
func (w *world) furtherSolid(p r3.Vec) bool {
	clear := w.inShafts(p)
	for i := range w.tori {
		if t := &w.tori[i]; t.Flat && inFlatFloor(t, p) && !clear || !clear && inTube(t, p) {
			return true
		}
	}
	for i := range w.balls {
		b := &w.balls[i]
		rho := dist(p, r3.Vec{Z: b.Z})
		if !clear && rho >= b.Floor.R0 && rho <= b.Floor.R0+wall {
			return true
		}
	}
	for i := range w.cabins {
		if cabinSolid(&w.cabins[i], p, clear) {
			return true
		}
	}
	for _, c := range w.posts {
		u := math.Min(1, math.Max(0, r3.Dot(r3.Sub(p, c.A), r3.Sub(c.B, c.A))/r3.Norm2(r3.Sub(c.B, c.A))))
		if dist(p, r3.Add(r3.Scale(1-u, c.A), r3.Scale(u, c.B))) <= c.Radius {
			return true
		}
	}
	return w.inCollars(p)
}

func inTube(t *geom.Torus, p r3.Vec) bool {
	ring := t.Floor.R0 - t.Tube
	if t.Flat {
		ring = t.Floor.R0 - 0.8*t.Tube
	}
	r, z := math.Hypot(p.X, p.Y)-ring, p.Z-t.Z
	rho := math.Hypot(r, z)
	if t.Flat && r > 0.8*rho { // beyond the rays to the corners of the floor
		return false
	}
	return rho >= t.Tube && rho <= t.Tube+wall
}

// inFlatFloor says whether p is in the floor, its lids or coamings: it is 1.2
// tube radii wide, and reaches on by its thickness at each side.
func inFlatFloor(t *geom.Torus, p r3.Vec) bool {
	d := t.Floor
	d.Z0, d.Z1 = t.Z-0.6*t.Tube-wall, t.Z+0.6*t.Tube+wall
	return deckSolid(&d, p)
}

// cabinSolid says whether p is in the box around a cabin and not in it.
func cabinSolid(c *geom.Cabin, p r3.Vec, clear bool) bool {
	at := geom.ShaftAt(c.Phi, c.Z)
	u, v, w := about(&at, p)
	for _, o := range c.Floor.Openings {
		du, dv := math.Abs(u-c.Floor.R0*math.Tan(o.Phi-c.Phi)), math.Abs(v-o.Z+c.Z)
		if rim := w >= c.Floor.R0-o.Coaming && w <= c.Floor.R0; rim && o.Coaming > 0 && du <= o.Spinward/2+wall && dv <= o.Axial/2+wall && (du >= o.Spinward/2 || dv >= o.Axial/2) {
			return true
		}
		clear = clear || !o.Closed && w > c.Floor.R0 && du < o.Spinward/2 && dv < o.Axial/2
	}
	h := w - c.Floor.R0 + c.Size[2]/2
	in := math.Abs(u) < c.Size[0]/2 && math.Abs(v) < c.Size[1]/2 && math.Abs(h) < c.Size[2]/2
	return !in && !clear && math.Abs(u) <= c.Size[0]/2+wall && math.Abs(v) <= c.Size[1]/2+wall && math.Abs(h) <= c.Size[2]/2+wall
}

// inCollars says whether p is in a square plate around a round shaft: as wide
// as the walls of the shaft, and over all of the depth of the hull there.
func (w *world) inCollars(p r3.Vec) bool {
	for i := range w.passages {
		s := &w.passages[i]
		at := geom.ShaftAt(s.Phi, s.Z)
		u, v, x := about(&at, p)
		if h := s.Width / 2; !s.Round || math.Hypot(u, v) < h || math.Max(math.Abs(u), math.Abs(v)) > h+s.Wall {
			continue
		}
		for _, span := range w.collars(s) {
			if x >= span.From && x <= span.To {
				return true
			}
		}
	}
	return false
}

// collars gives over which stretches a round shaft has collars.
func (w *world) collars(s *geom.Passage) []geom.Span {
	h := s.Width / 2
	var out []geom.Span
	add := func(r0, r1 float64) {
		if x0 := math.Sqrt(r0*r0 - h*h); r1 > innerEnd(s) && x0 < s.To {
			out = append(out, geom.Span{From: x0, To: r1})
		}
	}
	for i := range w.rooms {
		c := &w.rooms[i]
		add(c.Floor.R0, c.Floor.R1)
		if c.Ceiling > 0 {
			add(c.Ceiling-wall, c.Ceiling)
		}
	}
	// The height of the mouth's edges above the middle of a room, nearest and
	// farthest.
	edges := func(z float64) (near, far float64) {
		return math.Max(0, math.Abs(s.Z-z)-h), math.Abs(s.Z-z) + h
	}
	leg := func(r, z float64) float64 { return math.Sqrt(r*r - z*z) }
	for i := range w.tori {
		t := &w.tori[i]
		near, far := edges(t.Z)
		ring, a, b := t.Ring(), t.Tube, t.Tube+wall
		add(ring-leg(b, near), ring-leg(a, far))
		if t.Flat {
			add(t.Floor.R0, t.Floor.R1)
		} else {
			add(ring+leg(a, far), ring+leg(b, near))
		}
	}
	for i := range w.balls {
		near, far := edges(w.balls[i].Z)
		add(leg(w.balls[i].Floor.R0, far), leg(w.balls[i].Floor.R0+wall, near))
	}
	for i := range w.cabins {
		out = append(out, slanting(s, &w.cabins[i])...)
	}
	return out
}

// slanting gives the stretch of a collar in a cabin's ceiling: the shaft's
// section, moved along it through the ceiling, is of this height.
func slanting(s *geom.Passage, c *geom.Cabin) []geom.Span {
	turn := s.Phi - c.Phi
	mid := (c.Floor.R0 - c.Size[2] - wall/2) / math.Cos(turn)
	if math.Abs(turn) > 0.5 || mid < innerEnd(s) || mid > s.To {
		return nil
	}
	// Half the height of the rectangle around the slanting section, seen along
	// the shaft.
	sin, cos := math.Abs(math.Sin(turn)), math.Cos(turn)
	wide := s.Width/2/cos + wall/2*sin/cos
	high := wall/2*cos + wide*sin
	return []geom.Span{{From: mid - high, To: mid + high}}
}
