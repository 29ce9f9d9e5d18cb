package plots

import (
	"math"
	"strconv"

	"gonum.org/v1/plot/vg"
)

// listEntry names a line of a view in the list beside it.
type listEntry struct {
	number       int
	words, under string
	key          pen
}

// maxUnder bounds the lines of small type under a name.
const maxUnder = 3

// paintEntries draws a list into a column, and leaves out what has no room.
func paintEntries(p *pad, column vg.Rectangle, list []listEntry) {
	const left = numberWide + keySample + 5
	x, y := column.Min.X.Points(), column.Max.Y.Points()
	wide := (column.Max.X - column.Min.X).Points() - left
	for _, e := range list {
		words := wrap(clean(e.words), wide, sizeLabel, false, 2)
		under := wrap(clean(e.under), wide, sizeNote, false, maxUnder)
		if y-float64(len(words))*entryPitch-float64(len(under))*underPitch < column.Min.Y.Points() {
			return
		}
		p.text(text{s: strconv.Itoa(e.number), at: xy(x+numberWide-6, y-entryPitch+2), along: 1, size: sizeLabel, bold: true, ink: inkText})
		key := xy(x+numberWide, y-entryPitch+2+0.3*sizeLabel)
		p.line(e.key, key, key.Add(xy(keySample, 0)))
		for _, l := range words {
			y -= entryPitch
			p.text(text{s: l, at: xy(x+left, y+2), size: sizeLabel, ink: inkText})
		}
		for _, l := range under {
			y -= underPitch
			p.text(text{s: l, at: xy(x+left, y+2), size: sizeNote, ink: inkSoft})
		}
		y -= 2 * entryGap
	}
}

// label finds places for the numbers, and the names of structure.
func (s *several) label() {
	s.v.shy(s.pl, s.spec.Outlines)
	for i, t := range s.tracks {
		s.pl.polyline(priceStrong, s.v.pts(t.at)...)
		for _, q := range s.ends(i) {
			s.pl.mark(s.v.pt(q), ringRadius)
		}
	}
	for i := range s.tracks {
		l := label{s: strconv.Itoa(i + 1), size: sizeLabel, bold: true, ink: inkText, clear: ringRadius + 1, need: true}
		ends := s.ends(i)
		l.at = s.v.pt(ends[0])
		for _, q := range ends[1:] {
			if !within(s.win, l.at) {
				l.at = s.v.pt(q)
			}
		}
		s.pl.add(l)
	}
	s.plumbName()
	s.timeLabels(s.ticks[0], s.step, 0)
	if s.axisShown() {
		at := s.v.pt(Point{0, s.spec.Deck})
		s.pl.mark(at, spinArrowRadius)
		s.pl.add(label{s: "spin axis", size: sizeNote, ink: inkSoft, at: at, clear: spinArrowRadius + 2, want: toRight})
	}
	s.outlineNames(s.spec.Outlines)
	s.lost = s.pl.solve()
}

func (s *several) plumbName() {
	words := "plumb line"
	if len(s.plumbs()) > 1 {
		words = "plumb lines"
	}
	for _, line := range s.plumbs() {
		s.pl.polyline(pricePlumb, s.v.pts(line)...)
	}
	s.nameLine(s.v.pts(s.plumbs()[0]), words)
}

// plumbs are the plumb lines of the releases, each once.
func (s *several) plumbs() (out [][]Point) {
	var at []Point
	for _, t := range s.tracks {
		foot := s.foot(t.at[0])
		known := -1
		for k, f := range at {
			if f.dist(foot)*s.v.perM < 1 {
				known = k
			}
		}
		switch {
		case known < 0:
			at, out = append(at, foot), append(out, []Point{t.at[0], foot})
		case t.at[0].dist(foot) > out[known][0].dist(out[known][1]):
			out[known][0] = t.at[0] // the highest hangs the longest line
		}
	}
	return out
}

func (s *several) axisShown() bool {
	return s.spec.Deck > 0 && within(grow(s.win, -spinArrowRadius), s.v.pt(Point{0, s.spec.Deck}))
}

func (s *several) paint(p *pad) {
	v := s.v
	v.structure(p, s.spec.Outlines)
	if len(s.spec.Outlines) == 0 && s.spec.Deck > 0 {
		v.strokeArc(p, penDeck, v.arc(Point{0, s.spec.Deck}, s.spec.Deck, -1.5*math.Pi, 0.5*math.Pi))
	}
	p.rect(s.win, penFrame)
	for _, line := range s.plumbs() {
		v.strokeLine(p, penPlumb, v.pts(line))
	}
	if s.axisShown() {
		p.axisMark(v.pt(Point{0, s.spec.Deck}))
		p.spinArrow(v.pt(Point{0, s.spec.Deck}), spinArrowRadius, s.spec.Spin)
	}
	for i, t := range s.tracks {
		t.draw(p, v, i)
		p.timeMarks(s.ticks[i])
	}
	for i := range s.tracks {
		s.paintMarks(p, i)
	}
	s.pl.draw(p)
	paintEntries(p, s.side, s.list)
	s.drawStrip(p, "spinward", "up", spinStatement(s.spec.Spin)+s.marksSay()+notNamed(s.lost))
	s.sheet.draw(p)
}

// marksSay tells what the marks across the tracks are.
func (s *several) marksSay() string {
	if s.step == 0 {
		return ""
	}
	return " A mark each " + tickText(s.step, s.step) + " s."
}

func (s *several) paintMarks(p *pad, i int) {
	show := func(q *Point, mark func(vg.Point, ink)) {
		if q != nil && within(s.win, s.v.pt(*q)) {
			mark(s.v.pt(*q), seriesInk(i))
		}
	}
	t := s.spec.Tracks[i]
	if body := s.v.len(t.Body).Points(); body >= 4 {
		for _, q := range s.ends(i)[:len(s.ends(i))-2] {
			s.v.circle(p, penBody, q, t.Body)
		}
	}
	show(&s.tracks[i].at[0], p.ring)
	show(t.Rest, p.square)
	show(t.Landing, p.dot)
}
