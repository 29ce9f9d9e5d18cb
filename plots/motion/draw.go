package motion

import (
	"fmt"
	"html"
	"math"
	"strings"

	"offplumb/plots"
)

// sheet writes SVG. Looks are classes, whose rules stand in look.go.
type sheet struct {
	strings.Builder
	taken []rect // by labels
}

func (b *sheet) put(format string, args ...any) { fmt.Fprintf(&b.Builder, format, args...) }

func (b *sheet) text(class string, x, y float64, words string) {
	b.put(`<text class="%s" x="%s" y="%s">%s</text>`, class, num(x), num(y), html.EscapeString(words))
}

func (b *sheet) circle(class string, x, y, r float64) {
	b.put(`<circle class="%s" cx="%s" cy="%s" r="%s"/>`, class, num(x), num(y), num(r))
}

// frame begins a drawing: what is drawn until shut is cut at its edge.
func (b *sheet) frame(id string) {
	b.put(`<clipPath id="%s"><rect width="%s" height="%s" rx="3"/></clipPath><g clip-path="url(#%s)">`, id, num(viewWidth), num(viewHeight), id)
	b.put(`<rect class="f-ground" width="%s" height="%s"/>`, num(viewWidth), num(viewHeight))
}

func (b *sheet) shut() {
	b.put(`</g><rect class="f-frame" x="0.5" y="0.5" width="%s" height="%s" rx="3"/>`, num(viewWidth-1), num(viewHeight-1))
}

// Sizes of what is drawn, units.
const (
	leastBody = 4.2
	textSize  = 11.0
	ringSize  = 4.0
)

// bodySize is the radius of the body on a drawing: true where it can be seen.
func (s *show) bodySize(v view) float64 { return math.Max(leastBody, s.film.Body*v.perM) }

// scaleBar draws the bar at the foot of a drawing, and what the length of a unit is.
func (b *sheet) scaleBar(v view) {
	l := nice(110 / v.perM)
	w, x, y := l*v.perM, viewWidth-14, viewHeight-12.0
	b.put(`<path class="f-bar" d="M%s %sv-6m0 3h%sm0 -3v6"/>`, num(x-w), num(y+1), num(w))
	b.text("f-label f-mid", x-w/2, y-5, length(l, 2))
}

// compass draws the directions of a habitat view.
func (b *sheet) compass() {
	x, y := 14.0, viewHeight-12.0
	b.put(`<path class="f-bar" d="M%s %sv-22m-2.5 6l2.5 -6l2.5 6m-2.5 16h24m-6 -2.5l6 2.5l-6 2.5"/>`, num(x), num(y))
	b.text("f-label", x+28, y+3.5, "spinward")
	b.text("f-label", x+6, y-16, "up")
}

// plumbLine is the d of the release's plumb line, from the body to the floor.
func (s *show) plumbLine(v view) string {
	x0, y0 := v.at(s.spots[0].board)
	x1, y1 := v.at(s.film.plumb(s.film.foot()))
	return fmt.Sprintf("M%s %sL%s %s", num(x0), num(y0), num(x1), num(y1))
}

// ticks are short lines below the deck beneath, by which its turning is seen.
func (s *show) ticks(v view) string {
	if s.film.Flat {
		return ""
	}
	const apart, long, most = 26.0, 5.0, 400
	r := s.film.Radius
	step := 2 * math.Pi / 12
	for _, k := range []float64{2, 3, 6, 15, 30, 60, 150, 300, 600, 1500, 3000, 6000, 15000, 30000, 60000, 150000, 300000, 600000, 1500000} {
		if next := 2 * math.Pi / (12 * k); next*r*v.perM >= apart {
			step = next
		}
	}
	half := math.Min(math.Pi, beyondEdge*viewWidth/(r*v.perM))
	n := min(most, int(half/step))
	var d path
	mid := math.Round((math.Atan2(v.cy, v.cx)+math.Pi/2)/step)*step - math.Pi/2
	for k := -n; k <= n; k++ {
		if k == n && half == math.Pi {
			break // the first again
		}
		sin, cos := math.Sincos(mid + float64(k)*step)
		x0, y0 := v.at(plots.Point{X: r * cos, Y: r * sin})
		d.op('M', x0, y0)
		d.op('l', long*cos, -long*sin)
	}
	return `<path class="f-tick" d="` + d.String() + `"/>`
}

// bare is the deck beneath where no structure is given.
func (s *show) bare() []plots.Outline {
	if len(s.film.Outlines) > 0 {
		return s.film.Outlines
	}
	if s.film.Flat {
		r, w := s.film.Radius, 10*s.film.Radius
		return []plots.Outline{{Path: []plots.Segment{plots.Line(plots.Point{X: -w, Y: -r}, plots.Point{X: w, Y: -r})}}}
	}
	return []plots.Outline{{Path: plots.Circle(plots.Point{}, s.film.Radius)}}
}

// axis draws the spin axis, and the way that the habitat turns, where it is on the drawing.
func (s *show) axis(b *sheet, v view) {
	x, y := v.at(plots.Point{})
	if x < 0 || y < 0 || x > viewWidth || y > viewHeight {
		return
	}
	b.put(`<path class="f-axis" d="M%s %sh12m-6 -6v12"/>`, num(x-6), num(y))
	b.circle("f-axis", x, y, 3)
	b.taken = append(b.taken, rect{x - 18, y - 18, x + 18, y + 18})
	if s.film.Spin == 0 {
		return
	}
	const r = 14.0
	a0, a1, sweep := math.Pi*0.25, math.Pi*0.85, 0
	if s.film.Spin < 0 {
		a0, a1, sweep = a1, a0, 1
	}
	tip := [2]float64{x + r*math.Cos(a1), y - r*math.Sin(a1)}
	way := math.Copysign(math.Pi/2, s.film.Spin) + a1
	b.put(`<path class="f-axis" d="M%s %sA%s %s 0 0 %d %s %s"/>`, num(x+r*math.Cos(a0)), num(y-r*math.Sin(a0)), num(r), num(r), sweep, num(tip[0]), num(tip[1]))
	b.put(`<path class="f-head" d="M%s %sL%s %sL%s %sZ"/>`, num(tip[0]+6*math.Cos(way)), num(tip[1]-6*math.Sin(way)),
		num(tip[0]+3*math.Cos(way+math.Pi/2)), num(tip[1]-3*math.Sin(way+math.Pi/2)),
		num(tip[0]-3*math.Cos(way+math.Pi/2)), num(tip[1]+3*math.Sin(way+math.Pi/2)))
}

// mark draws the mark of an event where it happened.
func (s *show) mark(b *sheet, v view, of func(spot) plots.Point, e *Event, class string) {
	x, y := v.at(of(s.reel.spot(e.T)))
	switch e.Kind {
	case Release:
		b.circle("f-ring "+class, x, y, ringSize)
	case Landing:
		b.circle("f-dot "+class, x, y, ringSize-0.3)
	case Rest:
		b.put(`<rect class="f-ring %s" x="%s" y="%s" width="7.6" height="7.6"/>`, class, num(x-3.8), num(y-3.8))
	}
}

// Release, landing, rest: those with a mark on the drawings.
var marked = []Kind{Release, Landing, Rest}

// rect is an area, units.
type rect struct{ x0, y0, x1, y1 float64 }

func (r rect) meets(o rect) bool { return r.x0 < o.x1 && o.x0 < r.x1 && r.y0 < o.y1 && o.y0 < r.y1 }
func (r rect) holds(x, y float64) bool {
	return x > r.x0 && x < r.x1 && y > r.y0 && y < r.y1
}

// label writes words beside a place, where they cover least of the paths and no other label;
// none where there is no room.
func (b *sheet) label(class string, x, y, off float64, words string, paths ...[][2]float64) {
	const charWidth = 0.54 // of the size, of the fonts in use
	w, h := float64(len([]rune(words)))*textSize*charWidth, textSize
	best, least := rect{}, math.Inf(1)
	for k, dir := range [][2]float64{{1, 0}, {-1, 0}, {1, 1}, {-1, 1}, {1, -1}, {-1, -1}, {0, -1}, {0, 1}} {
		for _, far := range []float64{1, 1.8, 3} {
			cx, cy := x+dir[0]*(off*far+w/2), y+dir[1]*(off*far+h/2)
			r := rect{cx - w/2 - 2, cy - h/2 - 1, cx + w/2 + 2, cy + h/2 + 1}
			if c := b.cost(r, paths) + float64(k)*0.1 + far*0.5; c < least {
				best, least = r, c
			}
		}
	}
	const none = 1000
	if least >= none {
		return
	}
	b.taken = append(b.taken, best)
	b.text(class, best.x0+2, best.y1-3.2, words)
}

func (b *sheet) cost(r rect, paths [][][2]float64) (c float64) {
	if r.x0 < 3 || r.y0 < 3 || r.x1 > viewWidth-3 || r.y1 > viewHeight-3 {
		return math.Inf(1)
	}
	for _, t := range b.taken {
		if r.meets(t) {
			return math.Inf(1)
		}
	}
	for _, p := range paths {
		for _, q := range p {
			if r.holds(q[0], q[1]) {
				c++
			}
		}
	}
	return c
}

// dense are the places of a path, units, for labels to keep off.
func (s *show) dense(v view, of func(spot) plots.Point) (out [][2]float64) {
	for _, p := range s.spots {
		x, y := v.at(of(p))
		out = append(out, [2]float64{x, y})
	}
	return out
}

// straight are places along a straight line, units.
func straight(v view, a, b plots.Point) (out [][2]float64) {
	for k := 0.0; k <= 40; k++ {
		x, y := v.at(plots.Point{X: a.X + (b.X-a.X)*k/40, Y: a.Y + (b.Y-a.Y)*k/40})
		out = append(out, [2]float64{x, y})
	}
	return out
}
