package plots

import (
	"math"

	"gonum.org/v1/plot/vg"
)

// view is a window onto a plane of lengths, at one scale in all directions.
//
// Law: the page distance of any two points is pxPerM times their distance.
type view struct {
	perM   float64      // pt per m
	origin vg.Point     // where (0, 0) lies on the page
	down   bool         // y runs down the page: deck plans, seen from above
	win    vg.Rectangle // what is shown, pt; all that is drawn is clipped to it
}

// fit gives the scale in pt/m at which roi fills size pt, less the margins.
func fit(roi Point, w, h float64) float64 {
	return math.Min(w/math.Max(roi.X, math.SmallestNonzeroFloat64), h/math.Max(roi.Y, math.SmallestNonzeroFloat64))
}

// look makes a view in which the point at, in m, lies on the page at pt.
func look(win vg.Rectangle, perM float64, at Point, pt vg.Point, down bool) view {
	v := view{perM: perM, win: win, down: down}
	v.origin = pt.Sub(v.pt(at))
	return v
}

func (v view) pt(p Point) vg.Point {
	y := p.Y
	if v.down {
		y = -y
	}
	return v.origin.Add(xy(p.X*v.perM, y*v.perM))
}

func (v view) pts(points []Point) []vg.Point {
	out := make([]vg.Point, len(points))
	for i, p := range points {
		out[i] = v.pt(p)
	}
	return out
}

func (v view) len(m float64) vg.Length { return vg.Length(m * v.perM) }

// arc maps an arc to page space.
func (v view) arc(c Point, r, start, end float64) pageArc {
	if v.down {
		start, end = -start, -end
	}
	return pageArc{v.pt(c), v.len(r), start, end}
}

// shown is the part of the plane in the window.
func (v view) shown() area {
	var a area
	for _, q := range []vg.Point{v.win.Min, v.win.Max} {
		d := q.Sub(v.origin)
		p := Point{d.X.Points() / v.perM, d.Y.Points() / v.perM}
		if v.down {
			p.Y = -p.Y
		}
		a.add(p)
	}
	return a
}

// strokeArc draws the visible part of an arc: truly round up to maxArcRadius.
func (v view) strokeArc(p *pad, n pen, a pageArc) {
	if a.r <= 0 || a.start == a.end {
		return
	}
	if a.r > maxArcRadius {
		v.strokeLine(p, n, a.flat(v.win))
		return
	}
	for _, part := range a.inside(v.win) {
		p.stroke(n, p.arcPath(part.c, part.r, part.start, part.end))
	}
}

// strokeLine draws the visible part of a polyline, thinned to flatness.
func (v view) strokeLine(p *pad, n pen, pts []vg.Point) {
	for _, part := range clipLine(v.win, pts) {
		p.line(n, thinPage(part)...)
	}
}

func thinPage(pts []vg.Point) []vg.Point {
	keep := thinIndex(len(pts), flatness, func(i int) (x, y float64) { return pts[i].X.Points(), pts[i].Y.Points() })
	out := make([]vg.Point, len(keep))
	for i, k := range keep {
		out[i] = pts[k]
	}
	return out
}

// segment draws the visible part of a segment.
func (v view) segment(p *pad, n pen, s Segment) {
	if s.Radius > 0 {
		v.strokeArc(p, n, v.arc(s.Centre, s.Radius, s.Start, s.End))
		return
	}
	v.strokeLine(p, n, v.pts([]Point{s.From, s.To}))
}

// flatPath is the closed path as page points, for filling.
func (v view) flatPath(path []Segment) []vg.Point {
	var pts []vg.Point
	for _, s := range path {
		if s.Radius > 0 {
			pts = append(pts, v.arc(s.Centre, s.Radius, s.Start, s.End).flat(v.win)...)
			continue
		}
		pts = append(pts, v.pt(s.From), v.pt(s.To))
	}
	return pts
}

// circle draws the outline of a body of radius r m about c, if any of it shows.
func (v view) circle(p *pad, n pen, c Point, r float64) {
	v.strokeArc(p, n, v.arc(c, r, 0, 2*math.Pi))
}

// scaleBarLength picks the round length, m, that is nearest below most pt on the page.
func scaleBarLength(perM, most float64) float64 {
	return roundBelow(most / perM)
}

// scaleBar draws a bar of alternate black and white with its length, its left end at at.
func (v view) scaleBar(p *pad, at vg.Point, most float64) {
	m := scaleBarLength(v.perM, most)
	w, h := v.len(m), vg.Length(3.2)
	for i := range 4 {
		r := vg.Rectangle{Min: at.Add(vg.Point{X: w * vg.Length(i) / 4})}
		r.Max = r.Min.Add(vg.Point{X: w / 4, Y: h})
		if i%2 == 0 {
			p.fillRect(r, inkText)
		}
	}
	p.rect(vg.Rectangle{Min: at, Max: at.Add(vg.Point{X: w, Y: h})}, pen{ink: inkText, width: 0.5})
	p.text(text{s: "0", at: at.Add(xy(0, 5.5)), along: 0.5, size: sizeNote, ink: inkText})
	p.text(text{s: roundLength(m), at: at.Add(vg.Point{X: w, Y: 5.5}), along: 0.5, size: sizeNote, ink: inkText})
}
