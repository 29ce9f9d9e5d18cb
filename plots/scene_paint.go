package plots

import "gonum.org/v1/plot/vg"

// spinArrowRadius is the radius of the arrow that shows the spin about the axis, pt.
const spinArrowRadius = 13.0

// paintMotion draws what moves, its marks, the dimension lines and the labels.
func (s *scene) paintMotion(p *pad) {
	if s.axisShown() {
		at := s.v.pt(Point{0, s.radius})
		p.axisMark(at)
		p.spinArrow(at, spinArrowRadius, s.head.spin)
	}
	s.paintBodies(p)
	s.track.draw(p, s.v, 0)
	p.timeMarks(s.ticks)
	for _, d := range s.drawn {
		s.dims.draw(p, d.dimension, d.dimPlace)
	}
	s.paintMarks(p)
	s.pl.draw(p)
}

// paintBodies draws the body's outline along the way, where it is large enough to be seen.
func (s *scene) paintBodies(p *pad) {
	if s.ghost() == 0 {
		return
	}
	for _, m := range s.ticks {
		s.v.circle(p, penExt, s.track.place(m.time), s.body)
	}
	for _, q := range s.places() {
		s.v.circle(p, penBody, q, s.body)
	}
}

func (s *scene) paintMarks(p *pad) {
	show := func(q *Point, mark func(vg.Point, ink)) {
		if q != nil && within(s.win, s.v.pt(*q)) {
			mark(s.v.pt(*q), seriesInk(0))
		}
	}
	show(&s.track.at[0], p.ring)
	show(s.rest, p.square)
	show(s.landing, p.dot)
}
