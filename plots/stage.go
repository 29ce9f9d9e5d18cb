package plots

import (
	"math"

	"gonum.org/v1/plot/vg"
)

// stage is a sheet with one true-scale view on it and the labels that want a place there.
type stage struct {
	sheet
	v  view
	pl *placer
}

// frame is the paper kept free around what a view must show, pt.
type frame struct {
	left, right, top, bottom float64
	numbersLeft, numbersLow  float64 // beside the window, for the numbers of axes
	down                     bool    // y runs down the page
}

func (f frame) wide() float64 { return f.left + f.right + f.numbersLeft }
func (f frame) high() float64 { return f.top + f.bottom + f.numbersLow }

const (
	leastWide = 368.0 // pt; narrower windows leave no room for the strip
	leastHigh = 150.0
	preferred = 1.15 // an upright sheet must draw this much larger to be taken
)

// newStage makes the sheet, lying or upright, on which must is drawn the larger.
func newStage(plan sheetPlan, must area, f frame) stage {
	plan.upright = false
	lying := plan.scaleFor(must, f)
	plan.upright = true
	if plan.scaleFor(must, f) <= preferred*lying {
		plan.upright = false
	}
	perM := plan.scaleFor(must, f)
	w, h := plan.room()
	size := must.size()
	winW := math.Min(w, math.Max(leastWide-plan.side, size.X*perM+f.wide()))
	winH := math.Min(h, math.Max(leastHigh, size.Y*perM+f.high()))
	if plan.part != nil {
		winW = w // all parts are of one width
	}
	s := stage{sheet: plan.lay(winW, winH)}
	s.win.Min = s.win.Min.Add(xy(f.numbersLeft, f.numbersLow))
	free := vg.Rectangle{Min: s.win.Min.Add(xy(f.left, f.bottom)), Max: s.win.Max.Sub(xy(f.right, f.top))}
	s.v = look(s.win, perM, must.centre(), free.Min.Add(free.Max).Scale(0.5), f.down)
	s.pl = &placer{bounds: s.win}
	return s
}

// scaleFor is the scale, pt/m, at which the sheet can show must.
func (s sheetPlan) scaleFor(must area, f frame) float64 {
	const least = 0.3 // of the room, whatever the paper that is to be kept free
	w, h := s.room()
	return fit(must.size(), math.Max(w-f.wide(), least*w), math.Max(h-f.high(), least*h))
}

// name asks for a label at p, m, that must be shown.
func (s stage) name(p Point, clear float64, want vg.Point, words string) {
	s.pl.add(label{s: words, size: sizeLabel, ink: inkText, at: s.v.pt(p), clear: clear, want: want, need: true})
}

// nameLine asks for the name of a line, at any place along its longest visible piece.
func (s stage) nameLine(line []vg.Point, words string) {
	const least = 12.0 // pt: shorter pieces are not worth a name
	var best []vg.Point
	for _, part := range clipLine(s.win, line) {
		if pageLength(part) > math.Max(least, pageLength(best)) {
			best = part
		}
	}
	if best == nil {
		return
	}
	at := func(u float64) vg.Point { return alongLine(best, u*pageLength(best)) }
	s.pl.add(label{s: words, size: sizeNote, ink: inkSoft, at: at(0.5), clear: 2,
		or: []vg.Point{at(0.35), at(0.65), at(0.2), at(0.8)}})
}

// timeLabels asks for the labels of time marks, clear of the outline of a body of radius ghost pt.
func (s stage) timeLabels(marks []timeMark, step, ghost float64) {
	for _, m := range marks {
		s.pl.add(label{s: tickText(m.time, step) + " s", size: sizeNote, ink: inkText, at: m.at, clear: math.Max(4, ghost+1), want: m.across})
	}
}

func (p *pad) timeMarks(marks []timeMark) {
	for _, m := range marks {
		p.line(penTick, m.at.Sub(m.across), m.at.Add(m.across))
	}
}

// drawStrip draws what stands in the strip: directions, spin, scale.
func (s stage) drawStrip(p *pad, right, other, statement string) {
	from := s.cue(p, right, other, s.v.down)
	s.say(p, statement, from, s.scale(p, s.v))
}

var (
	toRight = xy(1, 0)
	toUp    = xy(0, 1)
	toDown  = xy(0, -1)
	anyWay  = vg.Point{}
)
