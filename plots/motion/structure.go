package motion

import (
	"math"
	"strconv"
	"strings"

	"offplumb/plots"
)

// mostRadius is the radius, in units of a drawing, up to which arcs are drawn as such:
// renderers keep coordinates in 32 bits, and at this radius err by 5e-4 units. Flatter arcs
// become polylines near the drawing.
const mostRadius = 5000.0

// beyondEdge is how far outside of a drawing a polyline is kept, in its widths: what the
// turning of the habitat brings in meanwhile.
const beyondEdge = 4.0

// smallest is the size, in units of a drawing, below which a piece of structure is left out.
const smallest = 0.35

var kindNames = []string{plots.Hull: "hull", plots.Deck: "deck", plots.Fixture: "fixture"}

// path builds the d of an SVG path. Coordinates have two decimals: a hundredth of a unit.
type path struct{ strings.Builder }

func num(v float64) string {
	s := strconv.FormatFloat(v, 'f', 2, 64)
	s = strings.TrimSuffix(strings.TrimRight(s, "0"), ".")
	if s == "-0" || s == "" {
		return "0"
	}
	return s
}

func (p *path) op(c byte, vs ...float64) {
	p.WriteByte(c)
	for i, v := range vs {
		if i > 0 {
			p.WriteByte(' ')
		}
		p.WriteString(num(v))
	}
}

// structure gives the structure as SVG: tints first, so that none covers a line. Of what turns
// about the axis in itself, fixed is true.
func (v view) structure(outlines []plots.Outline) (moving, fixed string) {
	var tints, lines, rings [3]path
	var far [2][3]path // of rings of which only a part is near: tints and lines
	for _, o := range outlines {
		if v.size(o) < smallest {
			continue
		}
		if v.wholeRing(o) && v.largest(o) <= mostRadius {
			v.trace(&rings[o.Kind], o, true, true)
			continue
		}
		if v.wholeRing(o) {
			v.trace(&far[0][o.Kind], o, false, true)
			v.trace(&far[1][o.Kind], o, true, false)
			continue
		}
		v.trace(&tints[o.Kind], o, false, true)
		v.trace(&lines[o.Kind], o, true, false)
	}
	var m, f strings.Builder
	for k, name := range kindNames {
		if rings[k].Len() > 0 {
			f.WriteString(`<path class="tint-` + name + ` line-` + name + `" fill-rule="evenodd" d="` + rings[k].String() + `"/>`)
		}
		if far[0][k].Len() > 0 {
			f.WriteString(`<path class="tint-` + name + `" d="` + far[0][k].String() + `"/><path class="line-` + name + `" d="` + far[1][k].String() + `"/>`)
		}
		if tints[k].Len() > 0 {
			m.WriteString(`<path class="tint-` + name + `" d="` + tints[k].String() + `"/>`)
		}
	}
	for k, name := range kindNames {
		if lines[k].Len() > 0 {
			m.WriteString(`<path class="line-` + name + `" d="` + lines[k].String() + `"/>`)
		}
	}
	return m.String(), f.String()
}

// size is the extent of an outline, in units, to a factor of two.
func (v view) size(o plots.Outline) float64 {
	var b box
	for _, s := range o.Path {
		if s.Radius > 0 {
			b.add(onArc(s, s.Start), onArc(s, (s.Start+s.End)/2), onArc(s, s.End))
			continue
		}
		b.add(s.From, s.To)
	}
	return math.Max(b.x1-b.x0, b.y1-b.y0) * v.perM
}

// largest is the greatest radius of an outline's arcs, in units.
func (v view) largest(o plots.Outline) (r float64) {
	for _, s := range o.Path {
		r = math.Max(r, s.Radius*v.perM)
	}
	return r
}

// wholeRing says whether an outline is a ring about the axis, which looks the same however it turns.
func (v view) wholeRing(o plots.Outline) bool {
	arcs := 0
	for _, s := range o.Path {
		switch {
		case s.Radius > 0 && s.Centre.X == 0 && s.Centre.Y == 0 && math.Abs(s.End-s.Start) >= 2*math.Pi*(1-1e-12):
			arcs++
		case !s.Bare:
			return false
		}
	}
	return arcs > 0
}

func onArc(s plots.Segment, a float64) plots.Point {
	sin, cos := math.Sincos(a)
	return plots.Point{X: s.Centre.X + s.Radius*cos, Y: s.Centre.Y + s.Radius*sin}
}

// trace adds an outline to a path, as drawn lines or as an area to be tinted.
func (v view) trace(p *path, o plots.Outline, drawn, tinted bool) {
	pen := pencil{v: v, p: p}
	for _, s := range o.Path {
		switch {
		case s.Bare && drawn:
			pen.lift()
		case s.Bare && v.largest(o) > mostRadius && v.wholeRing(o):
			// The arcs' ends far away bound the tint.
		case s.Radius > 0 && math.Abs(s.End-s.Start) >= 2*math.Pi*(1-1e-12):
			if !drawn {
				pen.circle(s)
				continue
			}
			pen.lift()
			pen.circle(s)
			pen.lift()
		case s.Radius > 0:
			pen.arc(s)
		default:
			pen.to(s.From)
			pen.to(s.To)
		}
	}
	if tinted && !drawn && pen.down {
		p.WriteByte('Z')
	}
}

// pencil draws along segments, without lifting where one begins at the end of the last.
type pencil struct {
	v    view
	p    *path
	down bool
	x, y float64
}

func (d *pencil) lift() { d.down = false }

func (d *pencil) to(q plots.Point) {
	const far = 1e5 // units: a line's end out there is as good as any
	x, y := d.v.at(q)
	d.xy(math.Max(-far, math.Min(far, x)), math.Max(-far, math.Min(far, y)))
}

func (d *pencil) xy(x, y float64) {
	const same = 0.004
	switch {
	case !d.down:
		d.p.op('M', x, y)
	case math.Abs(x-d.x) > same || math.Abs(y-d.y) > same:
		d.p.op('L', x, y)
	}
	d.down, d.x, d.y = true, x, y
}

func (d *pencil) arc(s plots.Segment) {
	r := s.Radius * d.v.perM
	if r > mostRadius {
		d.flat(s)
		return
	}
	// Two arcs at most half a turn each: an A command takes no more surely.
	mid := (s.Start + s.End) / 2
	d.to(onArc(s, s.Start))
	for _, a := range []float64{mid, s.End} {
		x, y := d.v.at(onArc(s, a))
		sweep := 0.0
		if s.End < s.Start {
			sweep = 1
		}
		d.p.op('A', r, r, 0, 0, sweep, x, y)
		d.x, d.y = x, y
	}
}

func (d *pencil) circle(s plots.Segment) {
	if s.Radius*d.v.perM > mostRadius {
		// The seam goes to the far side.
		turn := math.Copysign(math.Pi, s.End-s.Start)
		mid := d.toward(s)
		s.Start, s.End = mid-turn, mid+turn
		d.flat(s)
		return
	}
	d.arc(s)
	d.p.WriteByte('Z')
}

// toward is the angle at which the drawing's middle is seen from an arc's centre.
func (d *pencil) toward(s plots.Segment) float64 {
	return math.Atan2(d.v.cy-s.Centre.Y, d.v.cx-s.Centre.X)
}

// flat draws the part of a large arc near the drawing as a polyline.
func (d *pencil) flat(s plots.Segment) {
	const parts = 96
	lo, hi := math.Min(s.Start, s.End), math.Max(s.Start, s.End)
	half := math.Min(math.Pi, beyondEdge*viewWidth/(s.Radius*d.v.perM))
	mid := d.toward(s)
	mid += 2 * math.Pi * math.Ceil((lo-half-mid)/(2*math.Pi))
	a, b := math.Max(lo, mid-half), math.Min(hi, mid+half)
	if a >= b {
		// None of it is near: its ends stand for it, and bound the tint.
		d.to(onArc(s, s.Start))
		d.to(onArc(s, s.End))
		return
	}
	if s.End < s.Start {
		a, b = b, a
	}
	for k := 0; k <= parts; k++ {
		x, y := d.v.at(onArc(s, a+(b-a)*float64(k)/parts))
		d.xy(x, y)
	}
}
