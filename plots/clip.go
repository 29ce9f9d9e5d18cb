package plots

import (
	"math"
	"sort"

	"gonum.org/v1/plot/vg"
	"gonum.org/v1/plot/vg/draw"
)

// flatness is how far, in pt, a polyline may leave the curve it stands for: a tenth of
// the thinnest line.
const flatness = 0.04

// maxArcRadius is the largest radius, pt, drawn as a true arc. Renderers keep
// coordinates in 32 bits: at this radius they err by 1e-3 pt. Flatter arcs become polylines.
const maxArcRadius = 5000.0

func clipLine(win vg.Rectangle, pts []vg.Point) [][]vg.Point {
	c := draw.Canvas{Rectangle: win}
	return c.ClipLinesXY(pts)
}

func clipPolygon(win vg.Rectangle, pts []vg.Point) []vg.Point {
	c := draw.Canvas{Rectangle: win}
	return c.ClipPolygonXY(pts)
}

func within(win vg.Rectangle, p vg.Point) bool {
	return p.X >= win.Min.X && p.X <= win.Max.X && p.Y >= win.Min.Y && p.Y <= win.Max.Y
}

func overlap(a, b vg.Rectangle) bool {
	return a.Min.X < b.Max.X && b.Min.X < a.Max.X && a.Min.Y < b.Max.Y && b.Min.Y < a.Max.Y
}

func grow(r vg.Rectangle, d vg.Length) vg.Rectangle {
	return vg.Rectangle{Min: r.Min.Sub(vg.Point{X: d, Y: d}), Max: r.Max.Add(vg.Point{X: d, Y: d})}
}

// pageArc is an arc in page space: pt and rad.
type pageArc struct {
	c          vg.Point
	r          vg.Length
	start, end float64
}

func (a pageArc) at(u float64) vg.Point { return onCircle(a.c, a.r, a.start+u*(a.end-a.start)) }

// inside splits a into the parts within win, by its crossings with the four edges.
func (a pageArc) inside(win vg.Rectangle) []pageArc {
	cuts := append(a.crossings(win), 0, 1)
	sort.Float64s(cuts)
	var parts []pageArc
	for i := 1; i < len(cuts); i++ {
		u0, u1 := cuts[i-1], cuts[i]
		if u1-u0 < 1e-12 || !within(win, a.at((u0+u1)/2)) {
			continue
		}
		sweep := a.end - a.start
		part := pageArc{a.c, a.r, a.start + u0*sweep, a.start + u1*sweep}
		if n := len(parts); n > 0 && parts[n-1].end == part.start {
			parts[n-1].end = part.end // the cut only touched an edge
			continue
		}
		parts = append(parts, part)
	}
	return parts
}

// crossings gives the fractions along a, between 0 and 1, at which it meets the lines
// of win's edges.
func (a pageArc) crossings(win vg.Rectangle) []float64 {
	var cuts []float64
	add := func(angle float64) {
		sweep := a.end - a.start
		lap := math.Copysign(2*math.Pi, sweep)
		d := math.Mod(angle-a.start, 2*math.Pi)
		if d*sweep < 0 {
			d += lap
		}
		for ; sweep != 0 && d/sweep < 1; d += lap {
			cuts = append(cuts, d/sweep)
		}
	}
	r := a.r.Points()
	for _, x := range []vg.Length{win.Min.X, win.Max.X} {
		if c := (x - a.c.X).Points() / r; math.Abs(c) < 1 {
			add(math.Acos(c))
			add(-math.Acos(c))
		}
	}
	for _, y := range []vg.Length{win.Min.Y, win.Max.Y} {
		if s := (y - a.c.Y).Points() / r; math.Abs(s) < 1 {
			add(math.Asin(s))
			add(math.Pi - math.Asin(s))
		}
	}
	return cuts
}

// flat turns a into a polyline, fine within win and coarse outside of it, so that an
// arc of any radius costs few points.
func (a pageArc) flat(win vg.Rectangle) []vg.Point {
	pts := []vg.Point{a.at(0)}
	n := max(1, int(math.Ceil(math.Abs(a.end-a.start)/(math.Pi/4))))
	for i := range n {
		pts = a.flatten(win, float64(i)/float64(n), float64(i+1)/float64(n), pts, 0)
	}
	return pts
}

// maxHalvings bounds flatten: an arc of 1e9 pt is within flatness after 17.
const maxHalvings = 30

func (a pageArc) flatten(win vg.Rectangle, u0, u1 float64, pts []vg.Point, depth int) []vg.Point {
	p0, p1 := a.at(u0), a.at(u1)
	half := (u1 - u0) * math.Abs(a.end-a.start) / 2
	sagitta := a.r.Points() * half * half / 2
	box := vg.Rectangle{
		Min: vg.Point{X: min(p0.X, p1.X), Y: min(p0.Y, p1.Y)},
		Max: vg.Point{X: max(p0.X, p1.X), Y: max(p0.Y, p1.Y)},
	}
	if sagitta <= flatness || depth == maxHalvings || !overlap(grow(box, vg.Length(sagitta)), win) {
		return append(pts, p1)
	}
	mid := (u0 + u1) / 2
	return a.flatten(win, mid, u1, a.flatten(win, u0, mid, pts, depth+1), depth+1)
}
