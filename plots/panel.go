package plots

import (
	"fmt"
	"math"

	"gonum.org/v1/plot"
	"gonum.org/v1/plot/vg"
)

// curve is a line of a panel; a NaN or an infinity is a gap.
type curve struct {
	name string
	x, y []float64
	pen  pen
	end  bool // its last point is marked
}

// panel is a diagram of curves over axes of two different quantities.
type panel struct {
	title  string // what runs up, with its unit
	curves []curve
	most   float64 // greatest value shown; 0 for no bound
	levels []Level // lines across, such as limits
	unit   float64 // size of the unit printed up the axis; 0 for 1
	named  bool    // no numbers along: stretches with names stand for them
	bare   bool    // no numbers at the left: they stand at a neighbour

	win            vg.Rectangle
	x0, x1, y0, y1 float64
	xTicks, yTicks []plot.Tick
	pl             *placer
}

// maxValue bounds what a panel shows: beyond it, an input is a slip.
const maxValue = 1e15

func checkValues(name string, n int, values []float64) error {
	if values != nil && len(values) != n {
		return fmt.Errorf("%s: %d values for %d moments", name, len(values), n)
	}
	for i, v := range values {
		if finite(v) && math.Abs(v) > maxValue {
			return fmt.Errorf("%s: value %d, %g, cannot be drawn", name, i, v)
		}
	}
	return nil
}

// span is the range of the finite values; false if there are none.
func span(values ...[]float64) (lo, hi float64, ok bool) {
	lo, hi = math.Inf(1), math.Inf(-1)
	for _, list := range values {
		for _, v := range list {
			if finite(v) {
				lo, hi = math.Min(lo, v), math.Max(hi, v)
			}
		}
	}
	return lo, hi, lo <= hi
}

// scaleUp chooses the range up the axis, zero included: what is compared is amounts.
func (q *panel) scaleUp() {
	lo, hi := 0.0, 0.0
	for _, c := range q.curves {
		if a, b, ok := span(c.y); ok {
			lo, hi = math.Min(lo, a), math.Max(hi, b)
		}
	}
	for _, l := range q.levels {
		lo, hi = math.Min(lo, l.Value), math.Max(hi, l.Value)
	}
	if q.most > 0 && hi > q.most {
		hi = q.most
	}
	if lo == hi {
		hi = 1
	}
	q.y0, q.y1 = roundOut(lo, hi, q.stepsUp())
}

// stepsUp is the number of steps that a panel has room for; at least 2.
func (q *panel) stepsUp() int {
	const pitch = 20 // pt
	return max(2, int((q.win.Max.Y-q.win.Min.Y).Points()/pitch))
}

// set puts the panel into win with the range x0 to x1 along.
func (q *panel) set(win vg.Rectangle, x0, x1 float64) {
	const pitch = 52 // pt
	q.win, q.x0, q.x1 = win, x0, x1
	q.scaleUp()
	if !q.named {
		q.xTicks = roundTicker{n: max(2, int((win.Max.X-win.Min.X).Points()/pitch))}.Ticks(x0, x1)
	}
	q.yTicks = roundTicker{n: q.stepsUp(), unit: q.unit}.Ticks(q.y0, q.y1)
	q.pl = &placer{bounds: win}
}

// leftNeed is the width of the widest number at the left axis, pt.
func (q *panel) leftNeed() float64 {
	w := 0.0
	for _, t := range q.yTicks {
		w = math.Max(w, textWidth(t.Label, sizeTick, false))
	}
	return w
}

func (q *panel) pt(x, y float64) vg.Point {
	w, h := q.win.Max.X-q.win.Min.X, q.win.Max.Y-q.win.Min.Y
	return q.win.Min.Add(vg.Point{X: w * vg.Length((x-q.x0)/(q.x1-q.x0)), Y: h * vg.Length((y-q.y0)/(q.y1-q.y0))})
}

// pieces are the parts of a curve between its gaps, clipped to the panel.
func (q *panel) pieces(c curve) (out [][]vg.Point) {
	var run []vg.Point
	flush := func() {
		if len(run) == 1 { // a moment between two gaps still shows
			run = append(run, run[0].Add(xy(0.8, 0)))
		}
		if len(run) > 1 {
			for _, part := range clipLine(q.win, run) {
				out = append(out, thinPage(part))
			}
		}
		run = nil
	}
	for i := range c.x {
		if !finite(c.x[i]) || !finite(c.y[i]) {
			flush()
			continue
		}
		run = append(run, q.pt(c.x[i], c.y[i]))
	}
	flush()
	return out
}

// name finds places for the curves' names at their lines.
func (q *panel) name(need bool) {
	lines := make([][]vg.Point, len(q.curves))
	for i, c := range q.curves {
		pieces := q.pieces(c)
		lines[i] = longestOf(pieces)
		for _, part := range pieces {
			q.pl.polyline(priceStrong, part...)
		}
		if at, ok := q.last(c); ok {
			q.pl.mark(at, dotRadius)
		}
	}
	q.pl.polyline(priceThin, q.pt(q.x0, 0), q.pt(q.x1, 0))
	for _, l := range q.levels {
		if l.Value <= q.y1 {
			q.pl.polyline(priceThin, q.pt(q.x0, l.Value), q.pt(q.x1, l.Value))
			q.pl.add(label{s: l.Name, size: sizeNote, ink: inkText, clear: 2, at: q.pt(q.x0+0.02*(q.x1-q.x0), l.Value)})
		}
	}
	if beyond := q.beyond(); beyond != "" {
		q.pl.add(label{s: beyond, size: sizeNote, ink: inkText, at: q.win.Max, clear: 60, need: true})
	}
	for i, c := range q.curves {
		if at := apart(lines, i); at != nil && c.name != "" {
			q.pl.add(label{s: c.name, size: sizeNote, ink: inkText, clear: 3, need: need, at: at[0], or: at[1:], key: c.pen})
		}
	}
	q.pl.solve()
}

// apart are points of line i well away from the other lines, where a name cannot be
// taken for that of another.
func apart(lines [][]vg.Point, i int) (at []vg.Point) {
	const enough = 0.6 // of the best distance
	const most = 40    // pt: farther does not help
	if lines[i] == nil {
		return nil
	}
	var free []float64
	best := 0.0
	for _, u := range []float64{0.8, 0.92, 0.68, 0.55, 0.4, 0.25, 0.1} {
		p := alongLine(lines[i], u*pageLength(lines[i]))
		d := float64(most)
		for j, o := range lines {
			if j != i {
				d = math.Min(d, lineDistance(p, o))
			}
		}
		at, free, best = append(at, p), append(free, d), math.Max(best, d)
	}
	if best < 3 { // lines that run together are told apart by their ends
		return lines[i][len(lines[i])-1:]
	}
	kept := at[:0]
	for k, p := range at {
		if free[k] >= enough*best {
			kept = append(kept, p)
		}
	}
	return kept
}

func lineDistance(p vg.Point, line []vg.Point) float64 {
	d := math.Inf(1)
	for k := 1; k < len(line); k++ {
		a, b := line[k-1], line[k]
		d = math.Min(d, segmentDistance(p.X.Points(), p.Y.Points(), a.X.Points(), a.Y.Points(), b.X.Points(), b.Y.Points()))
	}
	return d
}

// last is the end of a curve that wants a mark there.
func (q *panel) last(c curve) (vg.Point, bool) {
	for i := len(c.x) - 1; c.end && i >= 0; i-- {
		if finite(c.x[i]) && finite(c.y[i]) {
			at := q.pt(c.x[i], c.y[i])
			return at, within(grow(q.win, 0.1), at)
		}
	}
	return vg.Point{}, false
}

func longestOf(pieces [][]vg.Point) (best []vg.Point) {
	for _, p := range pieces {
		if best == nil || pageLength(p) > pageLength(best) {
			best = p
		}
	}
	return best
}

// beyond says what the bound on the axis leaves out.
func (q *panel) beyond() string {
	most := math.Inf(-1)
	for _, c := range q.curves {
		if _, hi, ok := span(c.y); ok {
			most = math.Max(most, hi)
		}
	}
	if q.most == 0 || most <= q.most {
		return ""
	}
	return "greatest value " + signif(most, dimDigits) + ", beyond the panel"
}

// paint draws the panel; along says whether the numbers of the lower axis are wanted.
func (q *panel) paint(p *pad, along bool) {
	for _, t := range q.xTicks {
		p.line(penGrid, q.pt(t.Value, q.y0), q.pt(t.Value, q.y1))
		if along {
			p.text(text{s: t.Label, at: q.pt(t.Value, q.y0).Sub(xy(0, sizeTick+4.5)), along: 0.5, size: sizeTick, ink: inkText})
		}
	}
	for _, t := range q.yTicks {
		p.line(penGrid, q.pt(q.x0, t.Value), q.pt(q.x1, t.Value))
		if !q.bare {
			p.text(text{s: t.Label, at: q.pt(q.x0, t.Value).Sub(xy(4, sizeTick*capHeight/2)), along: 1, size: sizeTick, ink: inkText})
		}
	}
	if q.y0 <= 0 && q.y1 >= 0 {
		p.line(penAxis, q.pt(q.x0, 0), q.pt(q.x1, 0))
	}
	for _, l := range q.levels {
		if l.Value <= q.y1 {
			p.line(penUniform, q.pt(q.x0, l.Value), q.pt(q.x1, l.Value))
		}
	}
	p.rect(q.win, penFrame)
	for _, c := range q.curves {
		for _, part := range q.pieces(c) {
			p.line(c.pen, part...)
		}
	}
	for _, c := range q.curves {
		if at, ok := q.last(c); ok {
			p.dot(at, c.pen.ink)
		}
	}
	if q.title != "" {
		at := vg.Point{X: q.win.Min.X, Y: q.win.Max.Y + 4}
		p.text(text{s: q.title, at: at, size: sizeLabel, ink: inkText})
	}
	q.pl.draw(p)
}
