package plots

import (
	"errors"
	"fmt"
	"math"

	"gonum.org/v1/plot/vg"
)

// ContourChartSpec is what ContourChart draws: a quantity over two others.
type ContourChartSpec struct {
	Title, Desc, Notes string // Desc is for readers who cannot see the figure; Notes may be empty

	Spin         float64 // rad/s; negative: the floor moves antispinward
	Spins        string  // stands in place of what is said of the spin, where it varies; may be empty
	AxisX, AxisY string  // what runs along and up, with its unit
	X, Y         []float64
	Of           string    // what is shown, with its unit, above the bar of shades
	Unit         string    // of its values; may be empty
	Values       []float64 // Values[j*len(X)+i] at X[i], Y[j]; a NaN is a gap
}

func (s ContourChartSpec) check() error {
	for _, axis := range [][]float64{s.X, s.Y} {
		if len(axis) < 2 {
			return errors.New("wants at least two values each way")
		}
		for i, v := range axis {
			if !finite(v) || math.Abs(v) > maxValue || i > 0 && v <= axis[i-1] {
				return fmt.Errorf("value %d of an axis, %g, cannot be drawn or runs back", i, v)
			}
		}
	}
	if err := checkValues(s.Of, len(s.X)*len(s.Y), s.Values); err != nil {
		return err
	}
	if lo, hi, ok := span(s.Values); !ok || !(hi-lo > nothing*math.Max(math.Abs(lo), math.Abs(hi))) {
		return errors.New("has no two different values")
	}
	return nil
}

// ContourChart draws a quantity over two others: shades, a step of each apart by a
// contour line that bears its value, so that it can be read in grey too. It is an error
// if the values along an axis are not in order, or the quantity is the same throughout.
func ContourChart(spec ContourChartSpec) (*Figure, error) {
	head := headline{spec.Title, spec.Desc, spec.Notes, spec.Spin}
	if err := errors.Join(head.check(), spec.check()); err != nil {
		return nil, fmt.Errorf("contour chart: %w", err)
	}
	c := &contourChart{spec: spec, field: gridField{spec.X, spec.Y, spec.Values}}
	c.arrange()
	return newFigure(spec.Title, spec.Desc, c.w, c.h, c.paint)
}

// contourChart is one at work.
type contourChart struct {
	sheet
	spec   ContourChartSpec
	field  gridField
	panel  panel
	low    float64   // the least value
	high   float64   // the greatest
	levels []float64 // of the contour lines
	step   float64   // between them
	lines  [][][]vg.Point
}

const (
	contourHigh   = 250.0 // pt, of the window
	contourColumn = 110.0 // pt, beside it
	namedFrom     = 60.0  // pt: a shorter line bears no value, unless it is the longest of its level
)

func (c *contourChart) arrange() {
	c.low, c.high, _ = span(c.spec.Values)
	for n := MostLayers; n > 0 && (c.levels == nil || len(c.levels) > MostLayers-1); n-- {
		c.levels = nil
		var ticks []float64
		ticks, c.step = Ticks(c.low, c.high, n)
		for _, t := range ticks {
			if inner := 0.02 * c.step; t > c.low+inner && t < c.high-inner {
				c.levels = append(c.levels, t)
			}
		}
	}
	plan := sheetPlan{title: c.spec.Title, notes: c.spec.Notes, side: contourColumn, strip: true}
	w, h := plan.room()
	c.sheet = plan.lay(w, math.Min(h, contourHigh))
	q := &c.panel
	q.title = clean(c.spec.AxisY)
	left := 0.0
	for range 2 { // the second time with room for the numbers at the left
		win := vg.Rectangle{Min: c.win.Min.Add(xy(left, axisBelow)), Max: c.win.Max.Sub(xy(8, titleAbove))}
		q.set(win, c.spec.X[0], c.spec.X[len(c.spec.X)-1])
		q.y0, q.y1 = c.spec.Y[0], c.spec.Y[len(c.spec.Y)-1]
		q.yTicks = roundTicker{n: q.stepsUp()}.Ticks(q.y0, q.y1)
		left = q.leftNeed() + 6
	}
	c.trace()
}

// trace lays the contour lines on the page and finds places for their values.
func (c *contourChart) trace() {
	q := &c.panel
	for _, level := range c.levels {
		var on [][]vg.Point
		for _, line := range c.field.lines(level) {
			page := make([]vg.Point, len(line))
			for k, p := range line {
				page[k] = q.pt(p.X, p.Y)
			}
			on = append(on, thinPage(page))
			q.pl.polyline(priceThin, page...)
		}
		c.lines = append(c.lines, on)
	}
	for i, level := range c.levels {
		longest := pageLength(longestOf(c.lines[i]))
		for _, line := range c.lines[i] {
			n := pageLength(line)
			if n < math.Min(longest, namedFrom) {
				continue
			}
			at := make([]vg.Point, 0, 5)
			for _, u := range []float64{0.5, 0.35, 0.65, 0.2, 0.8} {
				at = append(at, alongLine(line, u*n))
			}
			q.pl.add(label{s: c.valued(level), size: sizeNote, ink: inkText, clear: 1.5, at: at[0], or: at[1:]})
		}
	}
	q.pl.solve()
}

func (c *contourChart) valued(level float64) string {
	return unitAfter(tickText(level, c.step), c.spec.Unit)
}

// unitAfter adds a unit to a number.
func unitAfter(s, unit string) string {
	if unit == "" {
		return s
	}
	return s + " " + unit
}

// shade is the ink of band i: those in use are spread over all of them.
func (c *contourChart) shade(i int) ink {
	n := len(c.levels) + 1
	if n == 1 {
		return inkHeat3
	}
	return inkHeat1 + ink(math.Round(float64(i)*float64(MostLayers-1)/float64(n-1)))
}

func (c *contourChart) paint(p *pad) {
	q := &c.panel
	for i := range len(c.levels) + 1 {
		level := math.Inf(-1)
		if i > 0 {
			level = c.levels[i-1]
		}
		var path vg.Path
		for _, part := range c.field.above(level) {
			page := make([]vg.Point, len(part))
			for k, at := range part {
				page[k] = q.pt(at.X, at.Y)
			}
			path = append(path, linePath(page, true)...)
		}
		if len(path) > 0 {
			p.fill(c.shade(i), path)
		}
	}
	for _, lines := range c.lines {
		for _, line := range lines {
			p.line(penContourLine, line...)
		}
	}
	q.paint(p, true)
	at := xy((q.win.Min.X+q.win.Max.X).Points()/2, q.win.Min.Y.Points()-axisBelow+3)
	p.text(text{s: clean(c.spec.AxisX), at: at, along: 0.5, size: sizeLabel, ink: inkText})
	c.paintBar(p)
	c.say(p, StackChartSpec{Spin: c.spec.Spin, Spins: c.spec.Spins}.spin(), c.strip.Min.X.Points()-12, c.strip.Max.X.Points())
	c.sheet.draw(p)
}

var penContourLine = pen{ink: inkText, width: 0.6}

// paintBar draws the shades with their values, the greatest on top.
func (c *contourChart) paintBar(p *pad) {
	x, y := c.side.Min.X.Points()+4, c.side.Max.Y.Points()-titleAbove
	for _, l := range wrap(clean(c.spec.Of), contourColumn-4, sizeLabel, false, 4) {
		y -= entryPitch
		p.text(text{s: l, at: xy(x, y+2), size: sizeLabel, ink: inkText})
	}
	y -= 3
	for i := len(c.levels); i >= 0; i-- {
		from, to := signif(c.low, dimDigits), signif(c.high, dimDigits)
		if i > 0 {
			from = tickText(c.levels[i-1], c.step)
		}
		if i < len(c.levels) {
			to = tickText(c.levels[i], c.step)
		}
		y -= barHigh
		box := vg.Rectangle{Min: xy(x, y), Max: xy(x+barWide, y+barHigh)}
		p.fillRect(box, c.shade(i))
		p.rect(box, penStep)
		p.text(text{s: unitAfter(from+" to "+to, c.spec.Unit), at: xy(x+barWide+6, y+barHigh/2-sizeLabel*capHeight/2), size: sizeLabel, ink: inkText})
	}
}
