package model

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/geom"
)

// shafts checks the passages and gives those that can be built, with their
// keys.
func (c *checker) shafts(rooms []housed) (out []geom.Passage, keys []string) {
	for i := range c.m.Passages {
		key := fmt.Sprintf("passage[%d]", i)
		if p, ok := c.shaft(key, &c.m.Passages[i], rooms); ok {
			out, keys = append(out, p), append(keys, key)
		}
	}
	return out, keys
}

// size gives the width of a passage and the key that says it.
func (p *Passage) size() (width float64, key string) {
	if p.Width > 0 {
		return p.Width, ".width"
	}
	return p.Diameter, ".diameter"
}

// shaft runs a passage on into the rooms at both ends until the whole of its
// section is inside.
func (c *checker) shaft(key string, p *Passage, rooms []housed) (geom.Passage, bool) {
	width, wide := p.size()
	out := geom.Passage{Name: p.Name, Phi: p.Spinward.Angle(p.FromRadius), Z: p.Axial, From: p.FromRadius, To: p.ToRadius,
		Width: width, Round: p.Width == 0, Wall: c.thickest(p)}
	if p.FromRadius >= p.ToRadius {
		c.fault(key+".to_radius", "", "wants more than from_radius, %g m, got %g m", p.FromRadius, p.ToRadius)
		return out, false
	}
	inner, outer := endRoom(rooms, &out, p.FromRadius, true), endRoom(rooms, &out, p.ToRadius, false)
	switch {
	case inner == nil:
		c.fault(key+".from_radius", nextHull(rooms, &out, p.FromRadius), "reaches no room: there is none at %g m from the axis", p.FromRadius)
	case outer == nil:
		c.fault(key+".to_radius", nextHull(rooms, &out, p.ToRadius), "reaches no room: there is none at %g m from the axis", p.ToRadius)
	case width >= 2*p.FromRadius:
		c.fault(key+wide, "", "wants less than twice from_radius, got %g m", width)
	default:
		return out, c.fit(key, wide, &out, inner, outer)
	}
	return out, false
}

// thickest gives the thickness of the walls of a passage: that of the thickest
// hull or deck that it may pierce, so that they fill what its mouths leave
// open.
func (c *checker) thickest(p *Passage) float64 {
	wall := DefaultThickness
	for i := range c.m.Decks {
		d := &c.m.Decks[i]
		if i == 0 || p.ToRadius > d.Radius && p.FromRadius < d.Radius+d.Thickness {
			wall = math.Max(wall, d.Thickness)
		}
	}
	return wall
}

// endRoom gives the room in which an end of a passage lies, r (m) from the
// axis, or in the hull that the passage leads through; nil for none; of several the one whose hull is next
// along the passage.
func endRoom(rooms []housed, p *geom.Passage, r float64, inner bool) *housed {
	var best *housed
	var next float64
	for i := range rooms {
		s, ok := rooms[i].Span(p.Phi, p.Z, 0)
		if inner {
			s.To += DefaultThickness
		} else {
			s.From -= DefaultThickness
		}
		slack := levelSlack * r
		if !ok || r < s.From-slack || r > s.To+slack {
			continue
		}
		if best == nil || inner && s.To < next || !inner && s.From > next {
			best, next = &rooms[i], s.To
			if !inner {
				next = s.From
			}
		}
	}
	return best
}

// nextHull tells where the room nearest to an end of a passage begins or ends.
func nextHull(rooms []housed, p *geom.Passage, r float64) string {
	hint, least := "", math.Inf(1)
	for i := range rooms {
		s, ok := rooms[i].Span(p.Phi, p.Z, 0)
		if !ok {
			continue
		}
		for _, at := range []float64{s.From, s.To} {
			if d := math.Abs(at - r); d < least {
				hint, least = fmt.Sprintf("there the hull of %s is %.6g m from the axis", rooms[i].title(), at), d
			}
		}
	}
	return hint
}

// fit runs a passage on into the rooms at its ends.
func (c *checker) fit(key, wide string, p *geom.Passage, inner, outer *housed) bool {
	h := p.Width / 2
	a, ok := inner.Span(p.Phi, p.Z, h)
	b, ok2 := outer.Span(p.Phi, p.Z, h)
	switch {
	case !ok:
		c.fault(key+wide, "", "does not fit into %s: wants a passage that lies within its sides", inner.title())
		return false
	case !ok2:
		c.fault(key+wide, "", "does not fit into %s: wants a passage that lies within its sides", outer.title())
		return false
	}
	p.From = math.Min(p.From, math.Hypot(a.To, h))
	p.To = math.Max(p.To, b.From)
	switch {
	case p.Ends().From < a.From-levelSlack*p.From:
		c.fault(key+".from_radius", "", "reaches out of %s on its far side, %.6g m from the axis", inner.title(), a.From)
		return false
	case p.To > b.To+levelSlack*p.To:
		c.fault(key+".to_radius", "", "reaches out of %s on its far side, %.6g m from the axis", outer.title(), b.To)
		return false
	}
	if t, isTorus := inner.hull.(*geom.Torus); isTorus && t.Flat && p.To > t.Floor.R0 && math.Abs(p.Z-t.Z)+h > t.HalfWidth(t.Floor.R0) {
		c.fault(key+".axial", "", "does not lead out of %s through its flat floor, which is %.6g m wide", inner.title(), 2*t.HalfWidth(t.Floor.R0))
		return false
	}
	return true
}

// looks are the lines along which a passage is looked through, as shares of
// half its width aside of its middle: what reaches into it by more than a tenth
// of that is seen from one of them.
var looks = [][2]float64{{0, 0}, {0.9, 0}, {-0.9, 0}, {0, 0.9}, {0, -0.9}, {0.9, 0.9}, {0.9, -0.9}, {-0.9, 0.9}, {-0.9, -0.9}}

const (
	looksPerWidth = 10 // places along a line
	mostLooks     = 10_000
)

// blocked tries that nothing is in the way of the passages: the side of a room
// that one does not lead into, a wall, another passage. walls says which pieces
// are those of each.
func (c *checker) blocked(in *geom.Interior, shafts []geom.Passage, keys []string, walls []wallRange) {
	for i := range shafts {
		if id := obstacle(in, &shafts[i], walls[i]); id >= 0 {
			c.fault(keys[i], "", "runs into %q", in.Surface(id).Name)
		}
	}
}

// wallRange are the indices of the pieces that wall a passage.
type wallRange struct{ from, to int }

// obstacle gives a surface that stands in a passage, -1 for none. The walls of
// the passage themselves stand beside it.
func obstacle(in *geom.Interior, p *geom.Passage, own wallRange) geom.SurfaceID {
	w, h, at := p.Ends(), p.Width/2, geom.ShaftAt(p.Phi, p.Z)
	n := int(math.Min(mostLooks, math.Ceil(looksPerWidth*(w.To-w.From)/p.Width))) + 1
	near := beside(in, p, own)
	seen := make([]bool, n+1)
	for _, look := range looks {
		if p.Round && look[0]*look[1] != 0 {
			continue
		}
		aside := r3.Add(r3.Scale(look[0]*h, at.Spin), r3.Vec{Z: look[1] * h})
		place := func(k int) r3.Vec {
			return r3.Add(p.Point(w.From+(w.To-w.From)*float64(k)/float64(n)), aside)
		}
		clear(seen)
		mark(seen, near, place, h, (w.To-w.From)/float64(n))
		for k := range seen {
			if !seen[k] {
				continue
			}
			at := in.Contact(place(k))
			if at.Gap < h && p.Holds(at.Point, TouchSlack) {
				return at.Surface
			}
		}
	}
	return -1
}

// beside gives the solids, but for its own walls, that may come nearer to a
// line of looks in a passage than half its width.
func beside(in *geom.Interior, p *geom.Passage, own wallRange) (out []geom.Solid) {
	w, h := p.Ends(), p.Width/2
	mid, reach := p.Point((w.From+w.To)/2), (w.To-w.From)/2+(1+math.Sqrt2)*h
	for i, piece := range in.Pieces() {
		if box := piece.Solid.Bounds(); (i < own.from || i >= own.to) && box.Dist(mid) <= reach {
			out = append(out, piece.Solid)
		}
	}
	return out
}

// mark marks the places of a line from which one of the solids is nearer than h
// (m). A solid that is farther off stays so for as far as that.
func mark(seen []bool, solids []geom.Solid, place func(k int) r3.Vec, h, apart float64) {
	for _, s := range solids {
		for k := 0; k < len(seen); k++ {
			d := s.Dist(place(k)) - h
			if d < 0 {
				seen[k] = true
				continue
			}
			// One less than the places on the way, lest a rounding counts.
			k += int(math.Min(math.Max(d/apart-1, 0), float64(len(seen))))
		}
	}
}
