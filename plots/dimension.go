package plots

import (
	"math"

	"gonum.org/v1/plot/vg"
)

// deckLine is the deck under a side view, along which offsets are measured: an arc
// about the axis, or a straight line.
type deckLine struct {
	v      view
	radius float64 // m; 0 for a flat deck
}

// at is the page point at arc s (m) along the deck and off pt below it.
func (d deckLine) at(s, off float64) vg.Point {
	if d.radius == 0 {
		return d.v.pt(Point{s, 0}).Sub(xy(0, off))
	}
	return onCircle(d.v.pt(Point{0, d.radius}), d.v.len(d.radius)+vg.Length(off), s/d.radius-math.Pi/2)
}

// slope is the direction of growing s on the page, rad.
func (d deckLine) slope(s float64) float64 {
	if d.radius == 0 {
		return 0
	}
	return s / d.radius
}

// foot is the arc (m) at which the plumb line through p meets the deck. It cannot know
// laps: the result is in (-pi R, pi R].
func (d deckLine) foot(p Point) float64 {
	if d.radius == 0 {
		return p.X
	}
	return math.Atan2(p.X, d.radius-p.Y) * d.radius
}

// place is the point of the deck at arc s, m.
func (d deckLine) place(s float64) Point {
	if d.radius == 0 {
		return Point{s, 0}
	}
	half := math.Sin(s / d.radius / 2) // 1 - cos would lose a flat arc's height
	return Point{d.radius * math.Sin(s/d.radius), 2 * d.radius * half * half}
}

// lap is how far outward, pt, a dimension that goes round the deck moves in each turn.
const lap = 9.0

// run is the polyline from arc s0 to s1 at off pt below the deck; beyond one turn it
// is a spiral, so that laps show.
func (d deckLine) run(s0, s1, off float64) []vg.Point {
	n, grow := 1, 0.0
	if d.radius > 0 {
		turns := math.Abs(s1-s0) / (2 * math.Pi * d.radius)
		n = min(720, 2+int(turns*360))
		if r := d.v.len(d.radius).Points(); r > maxArcRadius {
			n = 2 + int(math.Sqrt(math.Abs(s1-s0)*d.v.perM*math.Abs(s1-s0)/d.radius/8/flatness))
		}
		if turns > 0.97 {
			grow = lap * turns
		}
	}
	pts := make([]vg.Point, n+1)
	for i := range pts {
		u := float64(i) / float64(n)
		pts[i] = d.at(s0+u*(s1-s0), off+u*grow)
	}
	return pts
}

// dimension is a dimension line along a deck, from arc s0 to s1 (m), with a text.
type dimension struct {
	s0, s1 float64
	text   string
	ink    ink
	tops   [2]Point // where its extension lines begin, m
	oneWay bool     // a motion: one arrow, at s1
}

// dimensioner stacks dimension lines below a deck so that none meets another.
type dimensioner struct {
	deck  deckLine
	win   vg.Rectangle
	below float64 // pt below the deck from which rows begin
	taken []vg.Rectangle
	texts []vg.Rectangle
}

const (
	dimFirst = 15.0 // pt from the deck to the first dimension line
	dimPitch = 14.0
	dimArrow = 6.5
	dimTail  = 12.0 // what sticks out beyond arrows that come from outside
	dimMost  = 12   // rows tried
)

// place is where a dimension goes: its row and the box of its text.
type dimPlace struct {
	off    float64
	box    vg.Rectangle
	inside bool // the text interrupts the line
}

// fits finds the first row with room for d, and takes it; false if there is none.
func (m *dimensioner) fits(d dimension) (dimPlace, bool) {
	for row := range dimMost {
		for _, place := range m.variants(d, m.below+dimFirst+dimPitch*float64(row)) {
			cover := m.cover(d, place)
			if m.free(cover) {
				m.taken = append(m.taken, cover...)
				m.texts = append(m.texts, place.box)
				return place, true
			}
		}
	}
	return dimPlace{}, false
}

// variants are the ways to set a text at a dimension line: in it, or beyond either end.
func (m *dimensioner) variants(d dimension, off float64) []dimPlace {
	w := textWidth(d.text, sizeLabel, false)
	lo, hi := math.Min(d.s0, d.s1), math.Max(d.s0, d.s1)
	span := (hi - lo) * m.deck.v.perM
	var out []dimPlace
	if span > w+3*dimArrow {
		mid := m.deck.run(lo, hi, off)
		c := alongLine(mid, pageLength(mid)/2)
		out = append(out, dimPlace{off: off, box: textBox(c, w, 0.5), inside: true})
	}
	tail := 0.0
	if span < 2*dimArrow+4 {
		tail = dimTail
	}
	for _, side := range []float64{math.Copysign(1, d.s1-d.s0), -math.Copysign(1, d.s1-d.s0)} {
		end := hi
		if side < 0 {
			end = lo
		}
		c := m.deck.at(end+side*(tail+5)/m.deck.v.perM, off)
		out = append(out, dimPlace{off: off, box: textBox(c, w, 0.5-0.5*side)})
	}
	return append(out, m.beneath(d, off, w))
}

// beneath sets a text of width w under its line, moved sideways as far as the window asks.
func (m *dimensioner) beneath(d dimension, off, w float64) dimPlace {
	const drop = 9.0 // pt
	c := m.deck.at((d.s0+d.s1)/2, off+drop)
	lo, hi := m.win.Min.X.Points()+w/2+4, m.win.Max.X.Points()-w/2-4
	c.X = vg.Length(math.Max(lo, math.Min(hi, c.X.Points())))
	for _, q := range m.deck.run(d.s0, d.s1, off) {
		if math.Abs((q.X - c.X).Points()) < w/2+2 {
			c.Y = min(c.Y, q.Y-drop) // a line that rises or falls must clear all of the text
		}
	}
	return dimPlace{off: off, box: textBox(c, w, 0.5)}
}

// textBox is the box of a text of width w whose middle line passes through c.
func textBox(c vg.Point, w, along float64) vg.Rectangle {
	lo := c.Sub(xy(along*w, sizeLabel*capHeight/2+sizeLabel*tailDepth))
	return vg.Rectangle{Min: lo, Max: lo.Add(xy(w, sizeLabel*(capHeight+tailDepth)))}
}

// cover is the paper that a dimension takes.
func (m *dimensioner) cover(d dimension, at dimPlace) []vg.Rectangle {
	out := []vg.Rectangle{grow(at.box, 2)}
	for _, q := range m.deck.run(d.s0, d.s1, at.off) {
		out = append(out, grow(vg.Rectangle{Min: q, Max: q}, 4))
	}
	if m.deck.radius == 0 || len(out) < 5 {
		a, b := m.deck.at(d.s0, at.off), m.deck.at(d.s1, at.off)
		r := vg.Rectangle{Min: xy(min(a.X, b.X).Points(), min(a.Y, b.Y).Points()), Max: xy(max(a.X, b.X).Points(), max(a.Y, b.Y).Points())}
		out = append(out, grow(r, 4))
	}
	return out
}

func (m *dimensioner) free(cover []vg.Rectangle) bool {
	text := cover[0]
	if !within(m.win, text.Min) || !within(m.win, text.Max) || m.onDeck(text) {
		return false
	}
	for _, a := range cover {
		for _, b := range m.taken {
			if overlap(a, b) {
				return false
			}
		}
	}
	return true
}

// onDeck reports whether a text lies on the deck, as a level one does where the deck is steep.
func (m *dimensioner) onDeck(text vg.Rectangle) bool {
	if text.Max.X <= text.Min.X+4 { // no text
		return false
	}
	if m.deck.radius == 0 {
		return text.Max.Y > m.deck.at(0, 0).Y
	}
	c, r := m.deck.v.pt(Point{0, m.deck.radius}), m.deck.v.len(m.deck.radius)
	near := nearest(text, c)
	return math.Hypot((near.X-c.X).Points(), (near.Y-c.Y).Points()) < r.Points()
}

// draw draws a dimension: extension lines, line, arrows, text.
func (m *dimensioner) draw(p *pad, d dimension, at dimPlace) {
	run := m.deck.run(d.s0, d.s1, at.off)
	v := m.deck.v
	for i, s := range []float64{d.s0, d.s1} {
		end := m.deck.at(s, at.off+3)
		if i == 1 {
			end = run[len(run)-1].Add(m.deck.at(s, 3).Sub(m.deck.at(s, 0)))
		}
		v.strokeLine(p, penExt, []vg.Point{v.pt(d.tops[i]), end})
	}
	m.line(p, at, run)
	m.arrows(p, d, at, run)
	p.text(text{s: d.text, at: at.box.Min.Add(xy(0, tailDepth*sizeLabel)), size: sizeLabel, halo: true, ink: d.ink})
}

// line draws the dimension line, leaving out what its text interrupts.
func (m *dimensioner) line(p *pad, at dimPlace, run []vg.Point) {
	if !at.inside {
		m.deck.v.strokeLine(p, penDim, run)
		return
	}
	const gap = 3 // pt
	left, right := m.win, m.win
	left.Max.X, right.Min.X = at.box.Min.X-gap, at.box.Max.X+gap
	for _, side := range []vg.Rectangle{left, right} {
		for _, part := range clipLine(side, run) {
			p.line(penDim, thinPage(part)...)
		}
	}
}

// arrows draws the arrowheads, from outside where there is no room within.
func (m *dimensioner) arrows(p *pad, d dimension, at dimPlace, run []vg.Point) {
	way := math.Copysign(1, d.s1-d.s0)
	first, last := run[0], run[len(run)-1]
	a0, a1 := m.deck.slope(d.s0), m.deck.slope(d.s1)
	if way < 0 {
		a0, a1 = a0+math.Pi, a1+math.Pi
	}
	if d.oneWay {
		m.arrow(p, last, a1, dimArrow)
		return
	}
	if pageLength(run) >= 2*dimArrow+4 {
		m.arrow(p, first, a0+math.Pi, dimArrow)
		m.arrow(p, last, a1, dimArrow)
		return
	}
	m.arrow(p, first, a0, dimArrow)
	m.arrow(p, last, a1+math.Pi, dimArrow)
	m.deck.v.strokeLine(p, penDim, []vg.Point{first, first.Sub(heading(a0).Scale(dimTail))})
	m.deck.v.strokeLine(p, penDim, []vg.Point{last, last.Add(heading(a1).Scale(dimTail))})
}

// arrow draws an arrowhead, if its tip is in the window.
func (m *dimensioner) arrow(p *pad, tip vg.Point, way, size float64) {
	if within(m.win, tip) {
		p.arrow(inkText, tip, way, size)
	}
}
