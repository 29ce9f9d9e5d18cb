package motion

import (
	"math"

	"offplumb/plots"
)

// The two drawings have one size, in units of a viewBox: a phone shows one of about this
// width, a desk both side by side.
const (
	viewWidth  = 420.0
	viewHeight = 320.0
	viewEdge   = 30.0 // kept free round what must be seen, for labels
	viewFoot   = 44.0 // and at the foot, for the scale bar
)

// view maps m about the axis onto a drawing.
type view struct {
	perM   float64 // units a metre
	cx, cy float64 // m, the place in the middle
}

func (v view) at(p plots.Point) (x, y float64) {
	return viewWidth/2 + (p.X-v.cx)*v.perM, (viewHeight-viewFoot+viewEdge)/2 - (p.Y-v.cy)*v.perM
}

// box is a rectangle that grows, m.
type box struct {
	x0, y0, x1, y1 float64
	some           bool
}

func (b *box) add(pts ...plots.Point) {
	for _, p := range pts {
		if !b.some {
			*b = box{p.X, p.Y, p.X, p.Y, true}
		}
		b.x0, b.x1 = math.Min(b.x0, p.X), math.Max(b.x1, p.X)
		b.y0, b.y1 = math.Min(b.y0, p.Y), math.Max(b.y1, p.Y)
	}
}

func (b *box) grow(d float64) { b.x0, b.y0, b.x1, b.y1 = b.x0-d, b.y0-d, b.x1+d, b.y1+d }

func (b box) perM() float64 {
	w, h := viewWidth-2*viewEdge, viewHeight-viewEdge-viewFoot
	return math.Min(w/math.Max(b.x1-b.x0, 1e-9), h/math.Max(b.y1-b.y0, 1e-9))
}

func (b box) view() view {
	return view{perM: b.perM(), cx: (b.x0 + b.x1) / 2, cy: (b.y0 + b.y1) / 2}
}

// with is b with more in it, unless that makes the drawing smaller by more than a factor.
func (b box) with(factor float64, pts ...plots.Point) box {
	more := b
	more.add(pts...)
	if more.perM()*factor < b.perM() {
		return b
	}
	return more
}

// ring are the four ends of a circle about the axis.
func ring(r float64) []plots.Point {
	return []plots.Point{{X: r}, {X: -r}, {Y: r}, {Y: -r}}
}

// least is the smallest extent that a drawing shows, as a part of the body's height and size:
// what barely moves is not shown as if it flew.
func (b *box) least(f *Film, start plots.Point) {
	d := math.Max(f.Body*3, 1e-4)
	b.add(plots.Point{X: start.X - d, Y: start.Y - d}, plots.Point{X: start.X + d, Y: start.Y + d})
}

// Rooms of a drawing: what would make the motion this much smaller is left out of it.
const (
	shyOfFoot    = 2.2 // the foot of the plumb line, the uniform-gravity path
	shyOfAxis    = 1.5
	shyOfWhole   = 2.0
	wholeFrom    = 2.2 // rad gone round, from which the whole ring is shown
	boardedWhole = 1.6
)

// boardView shows the motion in the habitat frame, its plumb line and the floor below.
func (s *show) boardView() view {
	var b box
	round := 0.0
	for i, p := range s.spots {
		b.add(p.board)
		if i > 0 {
			round += math.Atan2(cross(s.spots[i-1].board, p.board), dot(s.spots[i-1].board, p.board))
		}
		s.gone = math.Max(s.gone, math.Abs(round))
	}
	b.least(s.film, s.spots[0].board)
	b = b.with(shyOfFoot, s.film.plumb(s.film.foot()))
	b = b.with(shyOfFoot, s.uniform...)
	b.grow(s.film.Body)
	if s.gone > wholeFrom {
		b.add(ring(s.film.Radius)...)
	}
	b = b.with(boardedWhole, ring(s.film.Radius)...)
	return b.view()
}

// beyondView shows the motion in the inertial frame, and how far the floor moves meanwhile.
func (s *show) beyondView() view {
	var b box
	start, foot := s.spots[0].board, s.film.plumb(s.film.foot())
	for _, p := range s.spots {
		b.add(p.beyond)
	}
	turn := math.Abs(s.film.Spin * s.reel.end)
	for k := 0.0; k <= 24; k++ {
		a := s.film.Spin * s.reel.end * k / 24
		b.add(spun(foot, a), spun(start, a))
	}
	b.least(s.film, start)
	b.grow(s.film.Body)
	if turn > wholeFrom || s.gone > wholeFrom {
		b.add(ring(s.film.Radius)...)
	}
	b = b.with(shyOfAxis, plots.Point{})
	b = b.with(shyOfWhole, ring(s.film.Radius)...)
	return b.view()
}

func cross(a, b plots.Point) float64 { return a.X*b.Y - a.Y*b.X }
func dot(a, b plots.Point) float64   { return a.X*b.X + a.Y*b.Y }

func spun(p plots.Point, a float64) plots.Point {
	sin, cos := math.Sincos(a)
	return plots.Point{X: cos*p.X - sin*p.Y, Y: sin*p.X + cos*p.Y}
}
