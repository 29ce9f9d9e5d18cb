package plots

import (
	"fmt"
	"math"
	"strings"

	"gonum.org/v1/plot/vg"
)

// scatterPlan is the plan of a scatter at work.
type scatterPlan struct {
	plan
	of    ScatterPlanSpec
	lines []sideLine
}

// sideLine is a line of the text beside a plan.
type sideLine struct {
	words string
	group int  // whose mark stands before it; -1: none
	gap   bool // stands before it
	soft  bool
}

var (
	penContour = pen{ink: inkText, width: 1.3}
	penEllipse = pen{ink: inkText, width: 0.9, dashes: []vg.Length{5, 2.5}}
)

func (s *scatterPlan) arrange() {
	must := s.matters()
	if c := s.spec.circumference(); c > 0 && must.size().X > c { // landings of several laps lie on one
		must.min.X, must.max.X = -c/2, c/2
	}
	s.deck = s.bounds()
	if s.spec.From.Y == s.spec.To.Y { // no bulkheads: as far as there is something
		all := must
		all.grow(0.2 * all.size().norm())
		s.deck.add(Point{s.deck.min.X, all.min.Y}, Point{s.deck.max.X, all.max.Y})
	}
	must = s.choose(must, s.padded(must))
	f := frame{left: 12, right: 12, top: 12, bottom: 12, numbersLeft: 34, numbersLow: 13, down: true}
	for range 2 { // the second time with room for the numbers at the left
		s.stage = newStage(sheetPlan{title: s.spec.Title, notes: s.spec.Notes + s.drawn(), side: planColumn, strip: true}, must, f)
		s.number()
		for _, t := range s.yTicks {
			f.numbersLeft = math.Max(f.numbersLeft, textWidth(t.Label+" m", sizeTick, false)+8)
		}
	}
	s.write()
	s.label()
}

// drawn says that landings are left out for their number.
func (s *scatterPlan) drawn() string {
	n := 0
	for _, g := range s.of.Groups {
		n += len(g.Places)
	}
	if n >= s.of.Landed {
		return ""
	}
	return fmt.Sprintf(" The first %d of %d landings are drawn.", n, s.of.Landed)
}

// write makes the text beside the plan, as far as there is room: with gaps between its
// pieces, without, and then without the last.
func (s *scatterPlan) write() {
	add := func(words string, group int) {
		for k, l := range wrap(strings.ReplaceAll(clean(words), " -", " "+minus), planColumn-numberWide, sizeLabel, false, 3) {
			line := sideLine{words: l, group: -1}
			if k == 0 {
				line.group, line.gap = group, group < 0
			}
			s.lines = append(s.lines, line)
		}
	}
	for i, g := range s.of.Groups {
		add(g.Name, i)
	}
	for _, w := range s.of.Words {
		add(w, -1)
	}
	high := (s.side.Max.Y - s.side.Min.Y).Points()
	if s.height() > high {
		for i := range s.lines {
			s.lines[i].gap = false
		}
	}
	if fits := int(high / entryPitch); len(s.lines) > fits {
		s.lines = append(s.lines[:max(0, fits-1)], sideLine{words: "and more in the tables", group: -1, soft: true})
	}
}

// height is that of the text beside the plan, pt.
func (s *scatterPlan) height() float64 {
	h := entryPitch * float64(len(s.lines))
	for _, l := range s.lines {
		if l.gap {
			h += lineGap
		}
	}
	return h
}

// lineGap stands before a piece of the text beside the plan, pt.
const lineGap = 5.0

// label finds places for the names.
func (s *scatterPlan) label() {
	if s.of.Median != nil {
		s.each(*s.of.Median, func(q vg.Point) {
			s.pl.mark(q, crossArm)
			s.pl.add(label{s: "median", size: sizeLabel, ink: inkText, at: q, clear: crossArm + 1, need: true})
		})
	}
	s.eachFoot(func(q vg.Point) {
		s.pl.mark(q, ringRadius)
		s.pl.add(label{s: "plumb foot", size: sizeLabel, ink: inkText, at: q, clear: ringRadius + 1, need: true})
	})
	name := "95 % contour"
	if s.of.Line {
		name = "shortest stretch with 95 %"
	}
	for _, c := range s.of.Contour {
		name = s.nameOnce(s.closed(c), name, priceStrong)
	}
	if e := s.of.Ellipse; e != nil {
		s.nameOnce(e.outline(), "95 % ellipse", pricePlumb)
	}
	s.plan.label()
}

// eachFoot calls do with each copy of the foot that shows.
func (s *scatterPlan) eachFoot(do func(vg.Point)) {
	if !s.of.NoFoot {
		s.each(s.of.Foot, do)
	}
}

// nameOnce keeps labels off a line and names the first copy of it that shows. It gives
// the name if that is still to be given.
func (s *scatterPlan) nameOnce(line []Point, name string, price float64) string {
	s.laps(line, func(page []vg.Point) {
		s.pl.polyline(price, page...)
		if name != "" && len(clipLine(s.win, page)) > 0 {
			s.nameLine(page, name)
			name = ""
		}
	})
	return name
}

// closed repeats the first corner of an outline.
func (s *scatterPlan) closed(c []Point) []Point {
	if s.of.Line || len(c) == 0 {
		return c
	}
	return append(c[:len(c):len(c)], c[0])
}

// laps calls do with each copy of a line that shows, on the page.
func (s *scatterPlan) laps(line []Point, do func([]vg.Point)) {
	var a area
	a.add(line...)
	if !a.some {
		return
	}
	for _, dx := range s.shifts(a.min.X, a.max.X) {
		moved := make([]Point, len(line))
		for i, p := range line {
			moved[i] = p.add(Point{dx, 0})
		}
		do(s.v.pts(moved))
	}
}

func (s *scatterPlan) paint(p *pad) {
	s.paintGrid(p)
	s.paintDeck(p)
	for _, shape := range s.shapes() {
		s.paintShape(p, shape)
	}
	for i := len(s.of.Groups) - 1; i >= 0; i-- {
		s.paintDots(p, i)
	}
	for _, c := range s.of.Contour {
		s.laps(s.closed(c), func(line []vg.Point) { s.line(p, penContour, line) })
	}
	if e := s.of.Ellipse; e != nil {
		s.laps(e.outline(), func(line []vg.Point) { s.line(p, penEllipse, line) })
	}
	p.rect(s.win, penFrame)
	s.eachFoot(func(q vg.Point) { p.ring(q, inkText) })
	if s.of.Median != nil {
		s.each(*s.of.Median, p.plus)
	}
	s.pl.draw(p)
	s.paintLines(p)
	s.drawStrip(p, "spinward", "+axial", spinStatement(s.spec.Spin)+s.cropStatement())
	s.sheet.draw(p)
}

const (
	dotHalf  = 0.75 // pt, of the mark of a landing among many
	markHalf = 1.3  // pt, of the marks that are lines
	crossArm = 5.0  // pt, of the median
)

// plus is the mark of the median.
func (p *pad) plus(at vg.Point) {
	for _, n := range []pen{{ink: inkPaper, width: 3}, {ink: inkText, width: 1.3}} {
		p.line(n, at.Sub(xy(crossArm, 0)), at.Add(xy(crossArm, 0)))
		p.line(n, at.Sub(xy(0, crossArm)), at.Add(xy(0, crossArm)))
	}
}

// paintDots draws the landings of a group, in one path.
func (s *scatterPlan) paintDots(p *pad, group int) {
	var at []vg.Point
	for _, d := range s.of.Groups[group].Places {
		s.each(d, func(q vg.Point) { at = append(at, q) })
	}
	p.dots(group, at)
}

// strokes are the marks of the groups behind the first, as lines from the middle: a
// slanted cross, an upright one, a diamond, a dash.
var strokes = [][][]vg.Point{
	{{xy(-1, -1), xy(1, 1)}, {xy(-1, 1), xy(1, -1)}},
	{{xy(-1.2, 0), xy(1.2, 0)}, {xy(0, -1.2), xy(0, 1.2)}},
	{{xy(-1.2, 0), xy(0, 1.2), xy(1.2, 0), xy(0, -1.2), xy(-1.2, 0)}},
	{{xy(-1.4, 0), xy(1.4, 0)}},
}

// dots draws the mark of a group at many places: a square for the first group.
func (p *pad) dots(group int, at []vg.Point) {
	if len(at) == 0 {
		return
	}
	var path vg.Path
	if group == 0 {
		for _, q := range at {
			path.Move(q.Add(xy(-dotHalf, -dotHalf)))
			path.Line(q.Add(xy(dotHalf, -dotHalf)))
			path.Line(q.Add(xy(dotHalf, dotHalf)))
			path.Line(q.Add(xy(-dotHalf, dotHalf)))
			path.Close()
		}
		p.fill(seriesInk(group), path)
		return
	}
	for _, q := range at {
		for _, line := range strokes[(group-1)%len(strokes)] {
			path.Move(q.Add(line[0].Scale(markHalf)))
			for _, to := range line[1:] {
				path.Line(q.Add(to.Scale(markHalf)))
			}
		}
	}
	p.stroke(pen{ink: seriesInk(group), width: 0.6}, path)
}

func (s *scatterPlan) paintLines(p *pad) {
	x, y := s.side.Min.X.Points(), s.side.Max.Y.Points()
	for _, l := range s.lines {
		if l.gap {
			y -= lineGap
		}
		y -= entryPitch
		if l.group >= 0 {
			p.dots(l.group, []vg.Point{xy(x+numberWide/2, y+2+sizeLabel*capHeight/2)})
		}
		ink := inkText
		if l.soft {
			ink = inkSoft
		}
		p.text(text{s: l.words, at: xy(x+numberWide, y+2), size: sizeLabel, ink: ink})
	}
}
