package plots

import (
	"math"

	"gonum.org/v1/plot/vg"
)

// kindPens and kindTints say how structure is drawn.
var (
	kindPens  = [kindCount]pen{Hull: penHull, Deck: penDeck, Fixture: penFixture}
	kindTints = [kindCount]ink{Hull: inkSolid, Deck: inkSolid, Fixture: inkTint}
)

// structure draws outlines: tints first, so that none covers a line.
func (v view) structure(p *pad, outlines []Outline) {
	for _, o := range outlines {
		if o.Closed {
			p.fill(kindTints[o.Kind], linePath(clipPolygon(v.win, v.flatPath(o.Path)), true))
		}
	}
	for _, o := range outlines {
		v.edges(p, kindPens[o.Kind], o)
	}
}

// edges draws the lines of an outline.
func (v view) edges(p *pad, n pen, o Outline) {
	for _, s := range o.Path {
		if s.Bare {
			continue
		}
		v.segment(p, n, s)
		if o.Kind == Hull && !o.Closed && s.Radius > 0 && len(n.dashes) == 0 {
			v.hatch(p, s)
		}
	}
}

// hatch draws the short strokes that mark the solid side of a hull line: the outside
// of the arc, since people stand within.
func (v view) hatch(p *pad, s Segment) {
	const pitch, deep = 7.0, 5.0 // pt
	a := v.arc(s.Centre, s.Radius, s.Start, s.End)
	for _, part := range a.inside(v.win) {
		n := int(part.r.Points() * math.Abs(part.end-part.start) / pitch)
		for i := range n {
			q := part.at((float64(i) + 0.5) / float64(n))
			out := part.start + (float64(i)+0.5)/float64(n)*(part.end-part.start)
			v.strokeLine(p, penHatch, []vg.Point{q, q.Add(heading(out - math.Pi/4).Scale(deep))})
		}
	}
}

// shy makes the labels keep off structure.
func (v view) shy(pl *placer, outlines []Outline) {
	for _, o := range outlines {
		for _, s := range o.Path {
			if !s.Bare {
				pl.polyline(priceThin, v.flatPath([]Segment{s})...)
			}
		}
	}
}

// outlineNames asks for the outlines' names, each once, along its longest visible line.
func (s stage) outlineNames(outlines []Outline) {
	seen := map[string]bool{}
	for _, o := range outlines {
		if o.Name == "" || seen[o.Name] {
			continue
		}
		if line := s.v.longest(o); line != nil {
			seen[o.Name] = true
			s.nameLine(line, o.Name)
		}
	}
}

// longest is the longest visible line of o, nil if none is worth a name.
func (v view) longest(o Outline) (best []vg.Point) {
	most := 12.0 // pt
	for _, s := range o.Path {
		if s.Bare {
			continue
		}
		for _, part := range clipLine(v.win, v.flatPath([]Segment{s})) {
			if l := pageLength(part); l > most {
				most, best = l, part
			}
		}
	}
	return best
}

func pageLength(pts []vg.Point) float64 {
	sum := 0.0
	for i := 1; i < len(pts); i++ {
		d := pts[i].Sub(pts[i-1])
		sum += math.Hypot(d.X.Points(), d.Y.Points())
	}
	return sum
}

// alongLine is the point at distance d along the polyline.
func alongLine(pts []vg.Point, d float64) vg.Point {
	for i := 1; i < len(pts); i++ {
		step := pts[i].Sub(pts[i-1])
		l := math.Hypot(step.X.Points(), step.Y.Points())
		if l >= d && l > 0 {
			return pts[i-1].Add(step.Scale(vg.Length(d / l)))
		}
		d -= l
	}
	return pts[len(pts)-1]
}
