package plots

import (
	"math"

	"gonum.org/v1/plot/vg"
)

var (
	penWay    = pen{ink: inkBlue, width: 1.9}
	penPerson = pen{ink: inkText, width: 0.8}
	penPush   = pen{ink: inkVermillion, width: 1.1}
)

const (
	diamondHalf = 3.4 // pt
	crossHalf   = 3.0
)

// wayHead is the arrowhead at the end of a way, wider than others: the lines are.
func (p *pad) wayHead(c ink, tip vg.Point, dir float64) {
	const half, size = 0.33, 8.5 // rad, pt
	a, b := tip.Sub(heading(dir-half).Scale(size)), tip.Sub(heading(dir+half).Scale(size))
	p.fill(c, linePath([]vg.Point{tip, a, b}, true))
}

// diamond is the mark of the start of a crew path.
func (p *pad) diamond(at vg.Point, c ink) {
	path := linePath([]vg.Point{at.Add(xy(diamondHalf, 0)), at.Add(xy(0, diamondHalf)), at.Sub(xy(diamondHalf, 0)), at.Sub(xy(0, diamondHalf))}, true)
	p.fill(inkPaper, path)
	p.stroke(pen{ink: c, width: 1.2}, path)
}

// cross is the mark of the place with the least clearance.
func (p *pad) cross(at vg.Point) {
	n := pen{ink: inkText, width: 1}
	p.line(n, at.Sub(xy(crossHalf, crossHalf)), at.Add(xy(crossHalf, crossHalf)))
	p.line(n, at.Add(xy(-crossHalf, crossHalf)), at.Add(xy(crossHalf, -crossHalf)))
}

func (s *crewPath) paint(p *pad) {
	s.v.structure(p, s.outlines)
	p.rect(s.win, penFrame)
	if s.axisShown() {
		at := s.v.pt(Point{0, s.radius})
		p.axisMark(at)
		p.spinArrow(at, spinArrowRadius, s.head.spin)
	}
	s.v.strokeLine(p, penPlumb, s.plumb())
	s.paintWay(p)
	for _, st := range s.spec.Stations {
		s.paintPerson(p, st)
	}
	for _, st := range s.spec.Stations {
		s.v.push(p, s.v.pt(st.Feet), s.arrow(st))
	}
	if n := s.spec.Near; n != nil && within(s.win, s.v.pt(n.At)) {
		p.cross(s.v.pt(n.At))
	}
	s.pl.draw(p)
	s.paintStrip(p)
	s.sheet.draw(p)
}

// paintWay draws the way of the feet, with a mark where it starts and an arrowhead where it ends.
func (s *crewPath) paintWay(p *pad) {
	s.v.strokeLine(p, penWay, s.v.pts(s.spec.Way))
	if tip, dir, ok := s.end(); ok && within(s.win, tip) {
		p.wayHead(penWay.ink, tip, dir)
	}
	if from := s.v.pt(s.spec.Way[0]); within(s.win, from) {
		p.diamond(from, penWay.ink)
	}
}

func (s *crewPath) paintPerson(p *pad, st PathStation) {
	head := s.v.pt(st.Head)
	s.v.strokeLine(p, penPerson, []vg.Point{s.v.pt(st.Feet), head})
	if within(s.win, head) {
		p.fill(inkText, p.circlePath(head, vg.Length(s.headRadius())))
	}
}

// push draws a force as an arrow from a point; one too short to be seen is left out.
func (v view) push(p *pad, from, by vg.Point) {
	l := math.Hypot(by.X.Points(), by.Y.Points())
	if l < shortPush {
		return
	}
	tip := from.Add(by)
	v.strokeLine(p, penPush, []vg.Point{from, tip})
	if within(v.win, tip) {
		p.arrow(penPush.ink, tip, math.Atan2(by.Y.Points(), by.X.Points()), math.Min(7.5, 0.7*l))
	}
}

// paintStrip draws directions, spin and both scales: that of the forces above that of lengths.
func (s *crewPath) paintStrip(p *pad) {
	from := s.cue(p, "spinward", "up", false)
	to := s.scale(p, s.v)
	if s.perN > 0 {
		to = math.Min(to, s.forceBar(p))
	}
	s.say(p, s.statement(s.said()), from, to)
}

// forceBar draws the scale of the arrows at the right of the strip and returns the page x at its left.
func (s *crewPath) forceBar(p *pad) float64 {
	long := s.barN * s.perN
	words := "force " + signif(s.barN, 1) + " N"
	y := s.strip.Min.Y.Points() + 26.5
	x := s.strip.Max.X.Points() - long
	bar := s.v
	bar.win = s.strip
	bar.push(p, xy(x, y), xy(long, 0))
	p.line(penPush, xy(x, y-2.5), xy(x, y+2.5))
	p.text(text{s: words, at: xy(x-4, y-sizeNote*capHeight/2), along: 1, size: sizeNote, ink: inkText})
	return x - 4 - textWidth(words, sizeNote, false)
}

// said is what the strip says of the picture.
func (s *crewPath) said() string {
	words := ""
	if s.perN > 0 {
		words += " Arrows: force of the person on the structure."
	}
	if turned := s.gone(s.v.shown()); turned > 2*math.Pi {
		words += " The way goes " + degrees(turned) + " round the axis."
	}
	return words
}
