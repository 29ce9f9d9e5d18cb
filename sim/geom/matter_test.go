package geom_test

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/geom"
)

// What is solid and what is free, said again in the plain words of the
// scenario, apart from how the interior divides it into pieces.

// solid says whether there is matter at p.
func (w *world) solid(p r3.Vec) bool {
	for i := range w.rooms {
		if w.hull(&w.rooms[i], p) {
			return true
		}
	}
	for i := range w.decks {
		if deckSolid(&w.decks[i], p) {
			return true
		}
	}
	for i := range w.passages {
		if inWalls(&w.passages[i], p) {
			return true
		}
	}
	for _, b := range w.blocks {
		if inBlock(b, p) {
			return true
		}
	}
	return w.furtherSolid(p)
}

// turnFrom gives the angle from the direction phi to p, in (-pi, pi].
func turnFrom(phi float64, p r3.Vec) float64 {
	x, y := math.Cos(phi), math.Sin(phi)
	return math.Atan2(x*p.Y-y*p.X, x*p.X+y*p.Y)
}

// hull says whether p lies in the floor, ceiling or bulkheads of a room.
func (w *world) hull(c *geom.Cylinder, p r3.Vec) bool {
	r, f := math.Hypot(p.X, p.Y), &c.Floor
	if deckSolid(f, p) {
		return true
	}
	inner := math.Max(0, c.Ceiling-c.Thickness)
	if c.Ceiling > 0 && r >= inner && r <= c.Ceiling && p.Z >= f.Z0 && p.Z <= f.Z1 && !inHoles(c.Mouths, p) {
		return true
	}
	ends := p.Z >= f.Z0-c.Thickness && p.Z <= f.Z0 || p.Z >= f.Z1 && p.Z <= f.Z1+c.Thickness
	return ends && r >= inner && r <= f.R1
}

func inHoles(holes []geom.Hole, p r3.Vec) bool {
	for _, h := range holes {
		if math.Abs(turnFrom(h.Phi, p)) < h.Half && p.Z > h.Z0 && p.Z < h.Z1 {
			return true
		}
	}
	return false
}

// deckSolid says whether p lies in a deck, a lid or a coaming.
func deckSolid(d *geom.Deck, p r3.Vec) bool {
	r := math.Hypot(p.X, p.Y)
	off := turnFrom((d.Phi0+d.Phi1)/2, p)
	extent := p.Z >= d.Z0 && p.Z <= d.Z1 && (d.Whole || math.Abs(off) <= (d.Phi1-d.Phi0)/2)
	open := inHoles(d.Holes, p)
	for _, o := range d.Openings {
		phi, z := math.Abs(turnFrom(o.Phi, p)), math.Abs(p.Z-o.Z)
		if phi < math.Asin(o.Spinward/2/d.R0) && z < o.Axial/2 {
			if o.Closed {
				return r >= d.R0 && r <= d.R1
			}
			open = true
		}
		if inCoaming(&o, d.R0, d.R1-d.R0, r, phi, z) {
			return true
		}
	}
	return extent && !open && r >= d.R0 && r <= d.R1
}

// inCoaming says whether a place lies in the rim that stands round an opening
// of a deck at the radius r0: between the clear width and that width and the
// rim's thickness, both measured at its top.
func inCoaming(o *geom.Opening, r0, thick, r, phi, z float64) bool {
	top := r0 - o.Coaming
	if r < top || r > r0 || o.Coaming == 0 {
		return false
	}
	in, out := math.Asin(o.Spinward/2/top), math.Asin((o.Spinward/2+thick)/top)
	return phi <= out && z <= o.Axial/2+thick && (phi >= in || z >= o.Axial/2)
}

// inWalls says whether p lies in the walls of a shaft.
func inWalls(s *geom.Passage, p r3.Vec) bool {
	across, along := alongShaft(s, p)
	x0 := math.Sqrt(s.From*s.From - s.Width*s.Width/4)
	return along >= x0 && along <= s.To && across >= s.Width/2 && across <= s.Width/2+s.Wall
}

// alongShaft gives how far p lies from the middle line of a shaft, across its
// square or round section, and along it from the axis.
func alongShaft(s *geom.Passage, p r3.Vec) (across, along float64) {
	phi := turnFrom(s.Phi, p)
	r := math.Hypot(p.X, p.Y)
	if u, v := r*math.Sin(phi), p.Z-s.Z; s.Round {
		return math.Hypot(u, v), r * math.Cos(phi)
	}
	return math.Max(math.Abs(r*math.Sin(phi)), math.Abs(p.Z-s.Z)), r * math.Cos(phi)
}

func inBlock(b *geom.Block, p r3.Vec) bool {
	d := r3.Sub(p, b.Centre)
	return math.Abs(r3.Dot(d, b.Along)) <= b.Half[0] && math.Abs(r3.Dot(d, b.Across)) <= b.Half[1] && math.Abs(r3.Dot(d, b.Up)) <= b.Half[2]
}
