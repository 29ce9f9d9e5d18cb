package motion

import (
	"fmt"
	"math"

	"offplumb/plots"
)

// moves are what sets parts of a drawing in motion: markup put into them. Without any the
// drawing stands still at the end of the film.
type moves struct {
	body, ghost, mask string
	spinOuter, spin   string // of the turning habitat; spinOuter only where turnMatrix would lose digits
	reveal            func(*Event) string
}

func (m *moves) revealed(e *Event) string {
	if m.reveal == nil {
		return ""
	}
	return m.reveal(e)
}

// drawBoard draws the habitat frame.
func (s *show) drawBoard(b *sheet, m moves) {
	v := s.board
	b.taken = nil
	b.frame(s.id + "-b")
	moving, fixed := v.structure(s.bare())
	b.WriteString(fixed + moving)
	s.axis(b, v)
	b.put(`<path class="f-plumb" d="%s"/>`, s.plumbLine(v))
	differs := s.differs()
	if differs {
		b.put(`<path class="f-uniform" d="%s"/>`, s.uniformLine())
	}
	s.drawMotion(b, v, onBoard, m, s.id+"-bm")
	if differs {
		x, y := v.at(s.uniform[len(s.uniform)-1])
		b.put(`<g class="f-ghost" transform="translate(%s %s)">%s<circle r="%s"/></g>`, num(x), num(y), m.ghost, num(s.bodySize(v)))
	}
	s.drawBody(b, v, onBoard, m)
	b.shut()
	s.boardLabels(b, m, differs)
}

func (s *show) uniformLine() string {
	var d path
	var pts []plots.Point
	for _, p := range s.uniform {
		x, y := s.board.at(p)
		pts = append(pts, plots.Point{X: x, Y: y})
	}
	for i, p := range plots.Thin(pts, 0.1) {
		d.op("ML"[min(i, 1)], p.X, p.Y)
	}
	return d.String()
}

// drawMotion draws the path gone and the marks on it.
func (s *show) drawMotion(b *sheet, v view, of func(spot) plots.Point, m moves, mask string) {
	b.put(`<path class="f-ahead"/>`)
	if m.mask != "" {
		b.put(`<mask id="%s" maskUnits="userSpaceOnUse" x="0" y="0" width="%s" height="%s">%s</mask>`, mask, num(viewWidth), num(viewHeight), m.mask)
		b.put(`<g mask="url(#%s)">`, mask)
	} else {
		b.put(`<g>`)
	}
	for phase, d := range s.runs(v, of) {
		if m.mask == "" || d.Len() > 0 {
			b.put(`<path class="f-trail f-%s" d="%s"/>`, phaseNames[phase], d.String())
		}
	}
	b.put(`</g>`)
	for _, k := range marked {
		if e := s.shown(k); e != nil {
			b.put(`<g class="f-mark-%d">%s`, k, m.revealed(e))
			s.mark(b, v, of, e, "")
			b.put(`</g>`)
		}
	}
}

func (s *show) drawBody(b *sheet, v view, of func(spot) plots.Point, m moves) {
	x, y := v.at(of(s.spots[len(s.spots)-1]))
	b.put(`<g class="f-body" transform="translate(%s %s)">%s<circle r="%s"/></g>`, num(x), num(y), m.body, num(s.bodySize(v)))
}

// drawBeyond draws the inertial frame, in which the habitat turns.
func (s *show) drawBeyond(b *sheet, m moves) {
	v := s.beyond
	b.taken = nil
	b.frame(s.id + "-i")
	moving, fixed := v.structure(s.bare())
	b.WriteString(fixed)
	b.put(`<path class="f-plumb f-past" d="%s"/>`, s.plumbLine(v))
	turn := v.turn(s.film.Spin * s.reel.end)
	if m.spinOuter != "" {
		b.put(`<g>%s`, m.spinOuter)
	}
	b.put(`<g class="f-turn" transform="%s">%s%s%s`, turn, m.spin, moving, s.ticks(v))
	b.put(`<path class="f-plumb" d="%s"/>`, s.plumbLine(v))
	x, y := v.at(s.spots[0].board)
	b.circle("f-ring f-past", x, y, ringSize)
	b.put(`</g>`)
	if m.spinOuter != "" {
		b.put(`</g>`)
	}
	s.axis(b, v)
	s.drawMotion(b, v, outside, m, s.id+"-im")
	s.drawBody(b, v, outside, m)
	b.shut()
	s.beyondLabels(b)
}

// turn is the transformation that turns a drawing about the axis by an angle, rad,
// counterclockwise. Its terms keep their digits however far away the axis is.
func (v view) turn(a float64) string {
	ax, ay := v.at(plots.Point{})
	sin, cos := math.Sincos(a)
	half := math.Sin(a / 2)
	less := 2 * half * half // 1 - cos
	return fmt.Sprintf("matrix(%.9g %.9g %.9g %.9g %.4f %.4f)", cos, -sin, sin, cos, ax*less-sin*ay, ay*less+sin*ax)
}

func (s *show) boardLabels(b *sheet, m moves, differs bool) {
	v := s.board
	b.scaleBar(v)
	b.compass()
	b.taken = append(b.taken, rect{0, viewHeight - 48, 96, viewHeight}, rect{viewWidth - 150, viewHeight - 30, viewWidth, viewHeight}, legendRoom)
	start, foot := s.spots[0].board, s.film.plumb(s.film.foot())
	paths := [][][2]float64{s.dense(v, onBoard), straight(v, start, foot), s.built(v)}
	for _, p := range s.uniform {
		x, y := v.at(p)
		paths = append(paths, [][2]float64{{x, y}})
	}
	s.markLabels(b, v, onBoard, m, paths)
	if s.visible(v, foot) && math.Hypot(start.X-foot.X, start.Y-foot.Y)*v.perM > shortLine {
		x, y := v.at(plots.Point{X: (start.X + foot.X) / 2, Y: (start.Y + foot.Y) / 2})
		b.label("f-label", x, y, 6, "plumb line", paths...)
	}
	if differs {
		x, y := v.at(s.uniform[len(s.uniform)*2/3])
		b.label("f-label", x, y, 8, "uniform gravity", paths...)
	}
}

// shortLine is the length, units, below which a line needs no name.
const shortLine = 40.0

// legendRoom is where the player states the scale of arrows.
var legendRoom = rect{0, 0, 190, 58}

// markLabels names the marks.
func (s *show) markLabels(b *sheet, v view, of func(spot) plots.Point, m moves, paths [][][2]float64) {
	for _, k := range marked {
		if e := s.shown(k); e != nil {
			x, y := v.at(of(s.reel.spot(e.T)))
			b.put(`<g class="f-mark-%d">%s`, k, m.revealed(e))
			b.label("f-label", x, y, s.bodySize(v)+5, e.Name, paths...)
			b.put(`</g>`)
		}
	}
}

// built are places along the structure, units, for labels to keep off.
func (s *show) built(v view) (out [][2]float64) {
	const apart = 8.0
	add := func(p plots.Point) {
		if x, y := v.at(p); x > 0 && y > 0 && x < viewWidth && y < viewHeight {
			out = append(out, [2]float64{x, y})
		}
	}
	for _, o := range s.bare() {
		for _, g := range o.Path {
			switch {
			case g.Bare:
			case g.Radius > 0:
				// Only the part that the drawing shows, as seen from the arc's centre.
				mid := math.Atan2(v.cy-g.Centre.Y, v.cx-g.Centre.X)
				half := math.Min(math.Pi, viewWidth/(g.Radius*v.perM))
				for a := mid - half; a <= mid+half; a += math.Max(apart/(g.Radius*v.perM), half/400) {
					if inArc(g, a) {
						add(onArc(g, a))
					}
				}
			default:
				n := math.Min(200, 1+math.Hypot(g.To.X-g.From.X, g.To.Y-g.From.Y)*v.perM/apart)
				for k := 0.0; k <= n; k++ {
					add(plots.Point{X: g.From.X + (g.To.X-g.From.X)*k/n, Y: g.From.Y + (g.To.Y-g.From.Y)*k/n})
				}
			}
		}
	}
	return out
}

// inArc says whether an arc passes an angle.
func inArc(g plots.Segment, a float64) bool {
	lo, hi := math.Min(g.Start, g.End), math.Max(g.Start, g.End)
	a += 2 * math.Pi * math.Ceil((lo-a)/(2*math.Pi))
	return a <= hi
}

func (s *show) visible(v view, p plots.Point) bool {
	x, y := v.at(p)
	return x > 0 && y > 0 && x < viewWidth && y < viewHeight
}

func (s *show) beyondLabels(b *sheet) {
	v := s.beyond
	b.scaleBar(v)
	b.taken = append(b.taken, rect{viewWidth - 150, viewHeight - 30, viewWidth, viewHeight}, legendRoom)
	start, foot := s.spots[0].board, s.film.plumb(s.film.foot())
	if math.Hypot(start.X-foot.X, start.Y-foot.Y)*v.perM < shortLine {
		return
	}
	x, y := v.at(plots.Point{X: (start.X + foot.X) / 2, Y: (start.Y + foot.Y) / 2})
	b.label("f-label", x, y, 6, "plumb line at release", s.dense(v, outside), straight(v, start, foot))
}
