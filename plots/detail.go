package plots

import (
	"math"
	"strings"

	"gonum.org/v1/plot/vg"
)

// detail draws the landing again, enlarged, in the column beside a view at whose scale
// the offset is a hair.
type detail struct {
	closeUp
	v       view
	caption []string
	dims    dimensioner
	dim     dimension
	at      dimPlace
	pl      *placer
	spot    vg.Point // where it lies in the view, pt
	round   float64  // radius of the circle around the spot, pt
	column  vg.Rectangle
}

// closeUp is what a detail shows. Its places are in m from the foot of the plumb line at
// the landing, y up along it.
type closeUp struct {
	landing  Point
	top      Point // of the plumb line
	offset   float64
	body     float64
	outlines []Outline
	track    track
	turned   bool // against the view
}

const (
	detailWidth = 150.0 // pt
	detailHigh  = 170.0
	detailShare = 0.34 // of the width, taken by the offset
	maxCaption  = 8    // lines
)

// newDetail takes the upper part of the column of s, for what lies at spot. words are what
// the view itself could not draw.
func newDetail(s *scene, spot vg.Point, c closeUp, words []string) *detail {
	high := math.Min(detailHigh, (s.sheet.side.Max.Y-s.sheet.side.Min.Y).Points()-maxCaption*sizeNote*lineHeight)
	box := vg.Rectangle{Min: vg.Point{X: s.sheet.side.Min.X, Y: s.sheet.side.Max.Y - vg.Length(high)}, Max: s.sheet.side.Max}
	perM := detailWidth * detailShare / math.Abs(c.landing.X)
	at := box.Min.Add(xy(detailWidth/2, high*0.55))
	d := &detail{closeUp: c, column: s.sheet.side, spot: spot, round: math.Max(7, s.ghost()+3)}
	d.v = look(box, perM, Point{c.landing.X / 2, c.landing.Y}, at, false)
	text := "Detail of the landing, " + signif(perM/s.v.perM, 2) + " times the size in the view: " + strings.Join(words, ", ") + "."
	if c.turned {
		text += " It is turned, so that the plumb line at landing is upright."
	}
	d.caption = wrap(text, detailWidth, sizeNote, false, maxCaption)
	d.pl = &placer{bounds: box}
	d.label()
	return d
}

func (d *detail) label() {
	v, land := d.v, d.landing
	level := v
	level.origin = v.pt(Point{0, land.Y})
	d.dims = dimensioner{deck: deckLine{v: level}, win: v.win}
	d.dim = dimension{s0: 0, s1: land.X, text: length(math.Abs(d.offset)), ink: inkText, tops: [2]Point{{}, {land.X, 0}}}
	d.at, _ = d.dims.fits(d.dim)
	for _, t := range d.dims.texts {
		d.pl.text(t)
	}
	d.pl.text(vg.Rectangle{Min: v.win.Min, Max: v.win.Min.Add(xy(detailWidth, 22))}) // the scale bar's
	d.pl.polyline(priceStrong, v.pts(d.track.at)...)
	d.pl.polyline(pricePlumb, v.pt(Point{0, land.Y}), v.pt(d.top))
	d.pl.mark(v.pt(land), dotRadius+1)
	out := xy(land.X*v.perM, 0)
	d.pl.add(label{s: "landing", size: sizeNote, ink: inkText, at: v.pt(land), clear: 4, want: out, need: true})
	d.pl.add(label{s: "plumb line", size: sizeNote, ink: inkSoft, at: v.pt(Point{0, land.Y}).Add(xy(0, 30)), clear: 2, want: out.Scale(-1)})
	d.pl.solve()
}

func (d *detail) paint(p *pad) {
	v, land := d.v, d.landing
	v.structure(p, d.outlines)
	p.rect(v.win, penFrame)
	v.strokeLine(p, penPlumb, v.pts([]Point{d.top, {}}))
	d.track.draw(p, v, 0)
	v.circle(p, penBody, land, d.body)
	d.dims.draw(p, d.dim, d.at)
	p.dot(v.pt(land), seriesInk(0))
	v.scaleBar(p, v.win.Min.Add(xy(10, 7)), 60)
	d.pl.draw(p)
	y := v.win.Min.Y.Points() - 10
	for i, l := range d.caption {
		p.text(text{s: l, at: xy(d.column.Min.X.Points(), y-float64(i)*sizeNote*lineHeight), size: sizeNote, ink: inkText})
	}
	p.stroke(penDim, p.circlePath(d.spot, vg.Length(d.round)))
	p.line(penLeader, d.pointer()...)
}

// pointer is the line from the circle in the view to the detail.
func (d *detail) pointer() []vg.Point {
	to := d.v.win.Min
	way := to.Sub(d.spot)
	return []vg.Point{d.spot.Add(way.Scale(vg.Length(d.round / math.Hypot(way.X.Points(), way.Y.Points())))), to}
}
