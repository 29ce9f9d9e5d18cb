package plots

import (
	"math"

	"gonum.org/v1/plot/vg"
)

// crewPath is a path view at work. Its track is the way of the feet.
type crewPath struct {
	scene
	spec PathViewSpec
	perN float64 // pt/N of the arrows; 0 if there is none
	barN float64 // N, length of the bar that gives their scale
}

const (
	longestPush = 42.0 // pt, the arrow of the greatest force
	shortPush   = 1.5  // pt; less is lost under the mark of the feet
	leastForce  = 1e-6 // N; less is what the digits of a weightless place leave
	pathEdge    = 24.0 // pt kept free around a path, for names
	ringWorth   = 0.25 // the whole ring may shrink the way to this; it halves one of wholeFrom on the deck
	bodyRoom    = 0.25 // of the person, kept free around the path
)

// arrange chooses what is shown, and finds places for all of it.
func (s *crewPath) arrange() {
	must := s.roundRing(s.shown())
	s.forceScale()
	s.lay(must)
	s.bareDeck()
	s.obstacles()
	s.names()
	s.lost = s.pl.solve()
}

// shown is what the view must show: the way and the persons, and the foot of the start
// if that does not spoil the scale.
func (s *crewPath) shown() area {
	var a area
	a.add(s.spec.Way...)
	for _, st := range s.spec.Stations {
		a.add(st.Feet, st.Head)
	}
	a.grow(bodyRoom * s.spec.tallest())
	if size := a.size(); math.Max(size.X, size.Y) < 1e-9 {
		a.grow(0.5)
	}
	foot := a
	foot.add(Point{})
	return better(a, foot)
}

// roundRing is a with the whole ring if the way goes far round it; but not if that goes
// near the axis only, where it would be lost in the ring.
func (s *crewPath) roundRing(a area) area {
	ring := a
	ring.addArc(Point{0, s.radius}, s.radius, 0, 2*math.Pi)
	s.whole = s.gone(a) > wholeFrom && fit(ring.size(), 1, 1) >= ringWorth*fit(a.size(), 1, 1)
	if s.whole {
		return ring
	}
	return a
}

// forceScale makes the greatest force the longest arrow, and picks a round bar below it.
func (s *crewPath) forceScale() {
	most := 0.0
	for _, st := range s.spec.Stations {
		most = math.Max(most, st.Force.norm())
	}
	if most >= leastForce {
		s.perN, s.barN = longestPush/most, roundBelow(most)
	}
}

// lay makes the sheet, with as much paper around must as the arrows want: what that is
// depends on the scale, which depends on it, so that it is done again.
func (s *crewPath) lay(must area) {
	f := frame{left: longestPush, right: longestPush, top: longestPush, bottom: longestPush}
	for range 3 {
		f.left, f.right, f.top, f.bottom = f.left+pathEdge, f.right+pathEdge, f.top+pathEdge, f.bottom+pathEdge
		s.stage = newStage(sheetPlan{title: s.head.title, notes: s.head.notes, strip: true}, must, f)
		f = s.beyond(must)
	}
	s.deck = deckLine{v: s.v, radius: s.radius}
}

// beyond is how far the arrows reach out of a, pt.
func (s *crewPath) beyond(a area) (f frame) {
	lo, hi := s.v.pt(a.min), s.v.pt(a.max)
	for _, st := range s.spec.Stations {
		tip := s.v.pt(st.Feet).Add(s.arrow(st))
		f.left, f.bottom = math.Max(f.left, (lo.X-tip.X).Points()), math.Max(f.bottom, (lo.Y-tip.Y).Points())
		f.right, f.top = math.Max(f.right, (tip.X-hi.X).Points()), math.Max(f.top, (tip.Y-hi.Y).Points())
	}
	return f
}

// arrow is the force at a station on the page.
func (s *crewPath) arrow(st PathStation) vg.Point {
	return xy(st.Force.X*s.perN, st.Force.Y*s.perN)
}

// bareDeck stands in for the structure where the caller gives none.
func (s *crewPath) bareDeck() {
	if len(s.outlines) > 0 {
		return
	}
	deck := Outline{Kind: Deck, Path: Circle(Point{0, s.radius}, s.radius)}
	if s.radius == 0 {
		a := s.v.shown()
		deck.Path = []Segment{Line(Point{a.min.X, 0}, Point{a.max.X, 0})}
	}
	s.outlines = []Outline{deck}
}

// headRadius is that of the dot for a head, pt: true to scale where it can be seen so.
func (s *crewPath) headRadius() float64 {
	const size, least, most = 0.1, 1.7, 3.5 // m, pt, pt
	return math.Max(least, math.Min(most, size*s.v.perM))
}

// plumb is the plumb line of the start down to the deck; nil for a start on the deck.
func (s *crewPath) plumb() []vg.Point {
	const least = 6.0 // pt
	line := s.v.pts([]Point{s.spec.Way[0], {}})
	if pageLength(line) < least {
		return nil
	}
	return line
}

// end is the page point at which the way ends, and the direction in which; false for a
// way that is too short to have one.
func (s *crewPath) end() (tip vg.Point, dir float64, ok bool) {
	way := s.v.pts(s.spec.Way)
	dir, ok = lastWay(way)
	return way[len(way)-1], dir, ok
}
