package plots

import (
	"fmt"
	"math"
	"strconv"

	"gonum.org/v1/plot/vg"
)

// planEntry is a line of the list beside a plan.
type planEntry struct {
	number, words string
	under         string // a second line, in small type
}

const (
	entryPitch = sizeLabel * lineHeight
	underPitch = sizeNote * lineHeight
	entryGap   = 3.0
	numberWide = 18.0 // pt
)

// list makes the list of releases: with their offsets, if there is room for them.
func (s *plan) list() {
	high := (s.side.Max.Y - s.side.Min.Y).Points()
	n := len(s.spec.Releases)
	under := float64(n)*(entryPitch+underPitch+entryGap) <= high
	fits := int(high / entryPitch)
	for i, r := range s.spec.Releases {
		if !under && i == fits-1 && n > fits {
			s.entries = append(s.entries, planEntry{words: fmt.Sprintf("and %d more, without a number", n-i)})
			return
		}
		s.numbered = i + 1
		e := planEntry{number: strconv.Itoa(i + 1), words: clip(clean(r.Name), planColumn-numberWide, sizeLabel, false)}
		if under {
			e.under = clip(landed(r), planColumn-numberWide, sizeNote, false)
		}
		s.entries = append(s.entries, e)
	}
}

// landed says how far from plumb a release landed, and on what.
func landed(r PlanRelease) string {
	if r.Landing == nil {
		return "no landing"
	}
	d := r.Landing.sub(r.At)
	words := signedLength(d.X)
	if axial := signif(d.Y, dimDigits); math.Abs(d.Y) > 1e-3*math.Abs(d.X) && axial != "0" {
		sign := "+"
		if d.Y < 0 {
			sign = ""
		}
		words += ", " + sign + length(d.Y) + " axial"
	}
	if on := clean(r.Surface); on != "" {
		words = on + ": " + words
	}
	return words
}

func (s *plan) paint(p *pad) {
	s.paintGrid(p)
	s.paintDeck(p)
	for _, shape := range s.shapes() {
		s.paintShape(p, shape)
	}
	p.rect(s.win, penFrame)
	s.paintPaths(p)
	for _, r := range s.spec.Releases {
		s.paintRelease(p, r)
	}
	s.pl.draw(p)
	s.paintList(p)
	s.drawStrip(p, "spinward", "+axial", spinStatement(s.spec.Spin)+s.cropStatement()+s.hairStatement()+notNamed(s.lost))
	s.sheet.draw(p)
}

// cropStatement says what part of the deck is shown.
func (s *plan) cropStatement() string {
	if !s.cropped {
		return ""
	}
	at := func(v float64) string { return tickText(v, 0.1) }
	words := fmt.Sprintf(" Cropped: the deck goes from %s to %s m spinward", at(s.deck.min.X), at(s.deck.max.X))
	if s.spec.Round {
		words = " Cropped: the deck is " + length(s.spec.circumference()) + " round"
	}
	if s.spec.From.Y != s.spec.To.Y {
		words += fmt.Sprintf(", and goes from %s to %s m axially", at(s.deck.min.Y), at(s.deck.max.Y))
	}
	return words + "."
}

// hairStatement says that a landing cannot be told from its release at this scale.
func (s *plan) hairStatement() string {
	for _, r := range s.spec.Releases[:s.numbered] {
		if r.Landing != nil && r.Landing.dist(r.At)*s.v.perM < hairWidth && r.Landing.dist(r.At) > 0 {
			return " Marks on one another: the list has the distance."
		}
	}
	return ""
}

// paintGrid draws the hairlines of the axes and their numbers.
func (s *plan) paintGrid(p *pad) {
	for _, t := range s.xTicks {
		x := s.v.pt(Point{t.Value, 0}).X
		p.line(penGrid, vg.Point{X: x, Y: s.win.Min.Y}, vg.Point{X: x, Y: s.win.Max.Y})
		p.text(text{s: t.Label + " m", at: vg.Point{X: x, Y: s.win.Min.Y - sizeTick - 2}, along: 0.5, size: sizeTick, ink: inkText})
	}
	for _, t := range s.yTicks {
		y := s.v.pt(Point{0, t.Value}).Y
		p.line(penGrid, vg.Point{X: s.win.Min.X, Y: y}, vg.Point{X: s.win.Max.X, Y: y})
		p.text(text{s: t.Label + " m", at: vg.Point{X: s.win.Min.X - 4, Y: y - sizeTick*capHeight/2}, along: 1, size: sizeTick, ink: inkText})
	}
}

// paintDeck draws the deck's edges. The seam of a round deck is no edge, and dashed.
func (s *plan) paintDeck(p *pad) {
	if !s.deck.some {
		return
	}
	a, shown := s.deck, s.v.shown()
	if s.spec.Round && !s.wholeRound() {
		a.min.X, a.max.X = shown.min.X, shown.max.X
	}
	side := penDeck
	if s.spec.Round {
		side = penGhost
	}
	if s.spec.From.Y != s.spec.To.Y {
		s.v.strokeLine(p, penDeck, s.v.pts([]Point{a.min, {a.max.X, a.min.Y}}))
		s.v.strokeLine(p, penDeck, s.v.pts([]Point{{a.min.X, a.max.Y}, a.max}))
	}
	s.v.strokeLine(p, side, s.v.pts([]Point{a.min, {a.min.X, a.max.Y}}))
	s.v.strokeLine(p, side, s.v.pts([]Point{{a.max.X, a.min.Y}, a.max}))
}

// paintShape draws an opening, crossed out if one can fall through it, or a fixture.
func (s *plan) paintShape(p *pad, shape planShape) {
	field := s.field()
	fill, edge := inkTint, penFixture
	if shape.opening {
		fill, edge = inkPaper, penDeck
		if shape.closed {
			fill = inkSolid
		}
	}
	p.fill(fill, linePath(clipPolygon(field, shape.path), true))
	s.line(p, edge, shape.path)
	if !shape.opening {
		return
	}
	if shape.coaming {
		s.line(p, edge, outward(shape.path))
	}
	if !shape.closed {
		s.line(p, penExt, []vg.Point{shape.path[0], shape.path[2]})
		s.line(p, penExt, []vg.Point{shape.path[1], shape.path[3]})
	}
}

// line draws the part of a polyline within the field.
func (s *plan) line(p *pad, n pen, pts []vg.Point) {
	for _, part := range clipLine(s.field(), pts) {
		p.line(n, part...)
	}
}

// outward is a rectangle's path, a little larger: the second line of a coaming.
func outward(path []vg.Point) []vg.Point {
	const off = 2.2 // pt
	mid := path[0].Add(path[2]).Scale(0.5)
	out := make([]vg.Point, len(path))
	for i, q := range path {
		d := q.Sub(mid)
		out[i] = q.Add(xy(math.Copysign(off, d.X.Points()), math.Copysign(off, d.Y.Points())))
	}
	return out
}

// paintRelease draws a release, its landing and the arrow between them.
func (s *plan) paintRelease(p *pad, r PlanRelease) {
	const clear = ringRadius + 1.5
	thin := pen{ink: seriesInk(0), width: 0.8}
	lines := s.arrows(r)
	for i, line := range lines {
		a, b := line[0], line[len(line)-1]
		d := b.Sub(a)
		l := math.Hypot(d.X.Points(), d.Y.Points())
		if l == 0 {
			continue
		}
		s.line(p, thin, line)
		if i == len(lines)-1 || l > 30 {
			tip := a.Add(d.Scale(vg.Length(math.Max(0.5, 1-clear/l))))
			p.arrow(seriesInk(0), tip, math.Atan2(d.Y.Points(), d.X.Points()), math.Min(6, l/2))
		}
	}
	s.each(r.At, func(q vg.Point) { p.ring(q, seriesInk(0)) })
	if r.Landing != nil {
		s.each(*r.Landing, func(q vg.Point) { p.dot(q, seriesInk(0)) })
	}
}

// each calls mark at every visible copy of a place.
func (s *plan) each(at Point, mark func(vg.Point)) {
	for _, dx := range s.shifts(at.X, at.X) {
		if q := s.v.pt(at.add(Point{dx, 0})); within(grow(s.field(), 0.1), q) {
			mark(q)
		}
	}
}

func (s *plan) paintList(p *pad) {
	x, y := s.side.Min.X.Points(), s.side.Max.Y.Points()
	for _, e := range s.entries {
		y -= entryPitch
		p.text(text{s: e.number, at: xy(x+numberWide-6, y+2), along: 1, size: sizeLabel, bold: true, ink: inkText})
		p.text(text{s: e.words, at: xy(x+numberWide, y+2), size: sizeLabel, ink: inkText})
		if e.under != "" {
			y -= underPitch
			p.text(text{s: e.under, at: xy(x+numberWide, y+2), size: sizeNote, ink: inkSoft})
			y -= entryGap
		}
	}
}
