package plots

import "math"

// solid is how thick, on the page, pt, the solid is whose top the deck is: dimension
// lines stand below it. It is 0 where there is none, or it is too thick to stand below.
func (s *scene) solid() float64 {
	const least, most = 4, 40 // pt
	deep := 0.0
	for _, o := range s.outlines {
		if o.Closed {
			deep = math.Max(deep, s.under(o)*s.v.perM)
		}
	}
	if deep < least || deep > most {
		return 0
	}
	return deep
}

// under is how far an outline reaches below the deck, m, if its top is the deck.
func (s *scene) under(o Outline) float64 {
	if s.radius == 0 {
		return underFlat(o)
	}
	const near = 1e-6 // of the radius
	top, deep := false, 0.0
	for _, g := range o.Path {
		if g.Radius == 0 || g.Centre.dist(Point{0, s.radius}) > near*s.radius {
			continue
		}
		top = top || math.Abs(g.Radius-s.radius) < near*s.radius
		deep = math.Max(deep, g.Radius-s.radius)
	}
	if !top {
		return 0
	}
	return deep
}

func underFlat(o Outline) float64 {
	const near = 1e-6 // m
	top, deep := false, 0.0
	for _, g := range o.Path {
		if g.Radius > 0 {
			return 0
		}
		top = top || math.Abs(g.From.Y) < near && math.Abs(g.To.Y) < near
		deep = math.Max(deep, -math.Min(g.From.Y, g.To.Y))
	}
	if !top {
		return 0
	}
	return deep
}
