package plots

import (
	"math"
	"strconv"
	"strings"

	"gonum.org/v1/plot/vg"
)

// shifts are the laps by which copies of something between arcs lo and hi show.
func (s *plan) shifts(lo, hi float64) []float64 {
	c := s.spec.circumference()
	if c == 0 {
		return []float64{0}
	}
	a := s.v.shown()
	from := math.Max(a.min.X, s.deck.min.X)
	to := math.Min(a.max.X, s.deck.max.X)
	if !s.wholeRound() {
		from, to = a.min.X, a.max.X // beyond the seam the deck goes on
	}
	var out []float64
	first := math.Ceil((from - hi) / c)
	for k := first; lo+k*c <= to && len(out) < mostCopies; k++ {
		out = append(out, k*c)
	}
	return out
}

// wholeRound reports whether the whole of a round deck is in the window.
func (s *plan) wholeRound() bool {
	a := s.v.shown()
	return s.spec.Round && a.max.X-a.min.X >= s.spec.circumference()
}

// field is the part of the window in which things on the deck are drawn.
func (s *plan) field() vg.Rectangle {
	r := s.win
	if s.wholeRound() {
		r.Min.X = s.v.pt(s.deck.min).X
		r.Max.X = s.v.pt(s.deck.max).X
	}
	return r
}

// planMark is a landing, or a release that does not land, with the numbers of all at that place.
type planMark struct {
	at      vg.Point
	numbers []string
}

// marks are the places that get numbers: those closer than a mark is wide share one label.
func (s *plan) marks() (marks []planMark) {
	const apart = 5.0 // pt
	for i, r := range s.spec.Releases {
		at, ok := s.end(r)
		if !ok || i >= s.numbered {
			continue
		}
		joined := false
		for j := range marks {
			d := at.Sub(marks[j].at)
			if math.Hypot(d.X.Points(), d.Y.Points()) < apart {
				marks[j].numbers = append(marks[j].numbers, strconv.Itoa(i+1))
				joined = true
				break
			}
		}
		if !joined {
			marks = append(marks, planMark{at, []string{strconv.Itoa(i + 1)}})
		}
	}
	return marks
}

// end is the page point of a landing, or of the release if that is not in view; false
// if neither is.
func (s *plan) end(r PlanRelease) (vg.Point, bool) {
	places := []Point{r.At}
	if r.Landing != nil {
		places = []Point{*r.Landing, r.At}
	}
	for _, p := range places {
		for _, dx := range s.shifts(p.X, p.X) {
			if q := s.v.pt(p.add(Point{dx, 0})); within(grow(s.field(), 0.1), q) {
				return q, true
			}
		}
	}
	return vg.Point{}, false
}

// label finds places for numbers and names.
func (s *plan) label() {
	for i, r := range s.spec.Releases {
		for _, line := range s.arrows(r) {
			s.pl.polyline(pricePlumb, line...)
			if i < s.numbered {
				s.pl.mark(line[0], ringRadius)
			}
		}
	}
	for _, m := range s.marks() {
		s.pl.mark(m.at, dotRadius)
		s.pl.add(label{s: strings.Join(m.numbers, ", "), size: sizeLabel, bold: true, ink: inkText, at: m.at, clear: 4, need: true})
	}
	for _, shape := range s.shapes() {
		s.pl.polyline(priceThin, shape.path...)
		words := shape.name
		if shape.closed {
			words += " (closed)"
		}
		if len(shape.path) > 0 {
			s.nameLine(shape.path, words)
		}
	}
	s.labelPaths()
	lost := s.pl.solve()
	if len(s.spec.Paths) > 0 {
		s.lost = lost
	}
}

// arrows are the visible pieces of the line from a release to its landing, on the page.
func (s *plan) arrows(r PlanRelease) (out [][]vg.Point) {
	if r.Landing == nil {
		return nil
	}
	lo, hi := math.Min(r.At.X, r.Landing.X), math.Max(r.At.X, r.Landing.X)
	for _, dx := range s.shifts(lo, hi) {
		d := Point{dx, 0}
		out = append(out, clipLine(s.field(), s.v.pts([]Point{r.At.add(d), r.Landing.add(d)}))...)
	}
	return out
}

// planShape is the outline of an opening or a fixture, on the page.
type planShape struct {
	name            string
	path            []vg.Point // closed
	opening         bool
	coaming, closed bool
}

// shapes are the openings and fixtures that show, with their copies beyond the seam.
func (s *plan) shapes() (out []planShape) {
	add := func(shape planShape, pts []Point) {
		var a area
		a.add(pts...)
		if !a.some {
			return
		}
		for _, dx := range s.shifts(a.min.X, a.max.X) {
			shape.path = nil
			for i := range len(pts) + 1 {
				shape.path = append(shape.path, s.v.pt(pts[i%len(pts)].add(Point{dx, 0})))
			}
			out = append(out, shape)
		}
	}
	for _, f := range s.spec.Fixtures {
		add(planShape{name: f.Name}, f.Path)
	}
	for _, o := range s.spec.Openings {
		h := o.Size.scale(0.5)
		c := o.Centre
		add(planShape{name: o.Name, opening: true, coaming: o.Coaming, closed: o.Closed},
			[]Point{c.sub(h), c.add(Point{h.X, -h.Y}), c.add(h), c.add(Point{-h.X, h.Y})})
	}
	return out
}
