package plots

import (
	"errors"
	"math"

	"gonum.org/v1/plot"
)

// plan is a deck plan at work.
type plan struct {
	stage
	spec     DeckPlanSpec
	deck     area // its bounds, as far as it has any
	cropped  bool
	xTicks   []plot.Tick
	yTicks   []plot.Tick
	entries  []planEntry
	numbered int      // releases that are listed, and have their number at the mark
	lost     []string // names without a place, where paths have names
}

const (
	planColumn = 165.0 // pt, beside the window
	planWorth  = 0.55  // the whole deck may shrink what matters to this
	mostCopies = 12    // laps of an arrow that are drawn
)

// arrange chooses what is shown, and finds places for all of it.
func (s *plan) arrange() error {
	s.deck = s.bounds()
	must := s.matters()
	switch {
	case !must.some && !s.deck.some:
		return errors.New("there is nothing to draw: no extent, no opening, no release, no path")
	case !must.some:
		must = s.deck
	case !s.deck.some:
		must = s.padded(must)
	default:
		must = s.choose(must, s.padded(must))
	}
	column := 0.0
	if len(s.spec.Releases) > 0 {
		column = planColumn
	}
	f := frame{left: 12, right: 12, top: 12, bottom: 12, numbersLeft: 34, numbersLow: 13, down: true}
	for range 2 { // the second time with room for the numbers at the left
		s.stage = newStage(sheetPlan{title: s.spec.Title, notes: s.spec.Notes, side: column, strip: true}, must, f)
		s.number()
		for _, t := range s.yTicks {
			f.numbersLeft = math.Max(f.numbersLeft, textWidth(t.Label+" m", sizeTick, false)+8)
		}
	}
	s.list()
	s.label()
	return nil
}

// bounds is the deck's extent; for an unbounded one, that of what is on it.
func (s *plan) bounds() (a area) {
	from, to := s.spec.From, s.spec.To
	if c := s.spec.circumference(); c > 0 {
		from.X, to.X = -c/2, c/2
	}
	if from.Y == to.Y {
		for _, q := range s.all() {
			from.Y, to.Y = math.Min(from.Y, q.Y), math.Max(to.Y, q.Y)
		}
		room := math.Max(0.1*(to.X-from.X)/2, (to.Y-from.Y)*0.2)
		from.Y, to.Y = from.Y-room, to.Y+room
	}
	if from == to {
		return a
	}
	a.add(from, to)
	return a
}

// all are the places of all that is on the deck.
func (s *plan) all() (out []Point) {
	for _, o := range s.spec.Openings {
		out = append(out, o.Centre.sub(o.Size.scale(0.5)), o.Centre.add(o.Size.scale(0.5)))
	}
	for _, f := range s.spec.Fixtures {
		out = append(out, f.Path...)
	}
	for _, r := range s.spec.Releases {
		out = append(out, r.At)
		if r.Landing != nil {
			out = append(out, *r.Landing)
		}
	}
	for i := range s.spec.Paths {
		out = append(out, s.way(i)...)
	}
	return out
}

// matters is the part of the plan with the releases, landings and paths. Without any it is
// empty. A landing more than half a lap away would shrink the others to dots: its arrow
// runs out of the window, unless all are like that, and the whole deck is shown.
func (s *plan) matters() (a area) {
	c := s.spec.circumference()
	near := s.addWays(&a) || len(s.spec.Releases)+len(s.spec.Paths) == 0
	for _, r := range s.spec.Releases {
		a.add(r.At)
		switch {
		case r.Landing == nil:
			near = true
		case c == 0 || math.Abs(r.Landing.X-r.At.X) <= c/2:
			near = true
			a.add(*r.Landing)
		}
	}
	if !near {
		a.add(s.deck.min, s.deck.max)
	}
	return a
}

// padded is a with room around it, and with the openings and fixtures that it touches.
func (s *plan) padded(a area) area {
	size := a.size()
	room := 0.15 * math.Max(size.X, size.Y)
	if room == 0 {
		room = 1.5
	}
	a.grow(room)
	near := a
	touch := func(pts ...Point) {
		var b area
		b.add(pts...)
		if b.some && b.min.X < a.max.X && b.max.X > a.min.X && b.min.Y < a.max.Y && b.max.Y > a.min.Y &&
			b.size().norm() < a.size().norm() {
			near.add(b.min, b.max)
		}
	}
	for _, o := range s.spec.Openings {
		touch(o.Centre.sub(o.Size.scale(0.5)), o.Centre.add(o.Size.scale(0.5)))
	}
	for _, f := range s.spec.Fixtures {
		touch(f.Path...)
	}
	if s.deck.some { // no more empty paper beyond an edge than a margin
		near.min.Y = math.Max(near.min.Y, math.Min(s.deck.min.Y, a.min.Y+room))
		near.max.Y = math.Min(near.max.Y, math.Max(s.deck.max.Y, a.max.Y-room))
	}
	return near
}

// choose is the whole deck if that costs little scale, else the part that matters.
func (s *plan) choose(matters, part area) area {
	whole := s.deck
	if s.spec.circumference() == 0 {
		whole.add(matters.min, matters.max)
	}
	const w, h = 1.2, 1.0
	if fit(whole.size(), w, h) >= planWorth*fit(part.size(), w, h) {
		return whole
	}
	// Axially the deck is shown to its edges if they are near: people look for them.
	tall := part
	tall.add(Point{part.min.X, s.deck.min.Y}, Point{part.max.X, s.deck.max.Y})
	if fit(tall.size(), w, h) >= planWorth*fit(part.size(), w, h) {
		return tall
	}
	return part
}

// number makes the numbers of the axes, and notes whether the deck is cropped.
func (s *plan) number() {
	a, w, h := s.v.shown(), (s.win.Max.X - s.win.Min.X).Points(), (s.win.Max.Y - s.win.Min.Y).Points()
	s.xTicks = roundTicker{n: max(2, int(w/55))}.Ticks(a.min.X, a.max.X)
	s.yTicks = roundTicker{n: max(3, int(h/30))}.Ticks(a.min.Y, a.max.Y)
	tiny := a.size().norm() * 1e-9
	s.cropped = s.deck.some && (s.deck.min.X < a.min.X-tiny || s.deck.max.X > a.max.X+tiny || s.deck.min.Y < a.min.Y-tiny || s.deck.max.Y > a.max.Y+tiny)
}
