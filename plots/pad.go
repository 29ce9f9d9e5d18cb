package plots

import (
	"image/color"
	"math"

	"gonum.org/v1/plot/font"
	"gonum.org/v1/plot/vg"
)

// backend is the kind of canvas under a pad: they differ in arcs, halos and characters.
type backend int

const (
	onSVG backend = iota
	onPNG
	onPDF
)

// haloVariant marks a text that wants a halo for the SVG post-processing, which finds
// it as the font-variant that the SVG canvas writes out.
const haloVariant = "halo"

// haloWidth is how far a halo reaches around the letters, pt.
const haloWidth = 1.3

// pad draws on a canvas in the terms of the figure language.
type pad struct {
	canvas vg.Canvas
	kind   backend
}

func xy(x, y float64) vg.Point { return vg.Point{X: vg.Length(x), Y: vg.Length(y)} }

func (p *pad) use(n pen) {
	p.canvas.SetColor(inks[n.ink].light)
	p.canvas.SetLineWidth(n.width)
	p.canvas.SetLineDash(n.dashes, 0)
}

func (p *pad) stroke(n pen, path vg.Path) {
	if len(path) < 2 {
		return
	}
	p.use(n)
	p.canvas.Stroke(path)
}

func (p *pad) fill(c ink, path vg.Path) {
	if len(path) < 3 {
		return
	}
	p.canvas.SetColor(inks[c].light)
	p.canvas.Fill(path)
}

// line draws the polyline through pts.
func (p *pad) line(n pen, pts ...vg.Point) { p.stroke(n, linePath(pts, false)) }

func linePath(pts []vg.Point, closed bool) vg.Path {
	if len(pts) < 2 {
		return nil
	}
	var path vg.Path
	path.Move(pts[0])
	for _, q := range pts[1:] {
		path.Line(q)
	}
	if closed {
		path.Close()
	}
	return path
}

// arcPath is a path along an arc: a true arc in SVG, else Bezier cubics, because the
// PDF canvas strokes an arc as a path of its own.
func (p *pad) arcPath(c vg.Point, r vg.Length, start, end float64) vg.Path {
	var path vg.Path
	path.Move(onCircle(c, r, start))
	if p.kind == onSVG {
		const most = 2 * math.Pi / 3 // an SVG arc whose ends meet is not drawn
		n := 1 + int(math.Abs(end-start)/most)
		da := (end - start) / float64(n)
		for i := range n {
			path.Arc(c, r, start+da*float64(i), da)
		}
		return path
	}
	n := 1 + int(math.Abs(end-start)/(math.Pi/4))
	da := (end - start) / float64(n)
	k := r * vg.Length(4.0/3.0*math.Tan(da/4)) // the usual cubic through a circular arc; 4e-6 r off
	for i := range n {
		a0, a1 := start+da*float64(i), start+da*float64(i+1)
		p0, p1 := onCircle(c, r, a0), onCircle(c, r, a1)
		path.CubeTo(p0.Add(heading(a0+math.Pi/2).Scale(k)), p1.Sub(heading(a1+math.Pi/2).Scale(k)), p1)
	}
	return path
}

func heading(a float64) vg.Point { return xy(math.Cos(a), math.Sin(a)) }

func onCircle(c vg.Point, r vg.Length, a float64) vg.Point { return c.Add(heading(a).Scale(r)) }

func (p *pad) circlePath(c vg.Point, r vg.Length) vg.Path {
	path := p.arcPath(c, r, 0, 2*math.Pi)
	path.Close()
	return path
}

// pdfBold is how far, as a share of its size, bold type is drawn again beside itself on the PDF canvas,
// which puts one face only into a file, whatever it is asked for.
const pdfBold = 0.04

// face is the type face for a text. On SVG, variant carries the wish for a halo.
func (p *pad) face(size float64, bold, halo bool) font.Face {
	f := face(size, bold && p.kind != onPDF)
	if halo && p.kind == onSVG {
		f.Font.Variant = haloVariant
	}
	return f
}

// text is a line of type; at is on the baseline, and along runs from 0, text begins at
// at, to 1, text ends there.
type text struct {
	s     string
	at    vg.Point
	along float64
	size  float64
	bold  bool
	halo  bool
	ink   ink
}

func (p *pad) text(t text) {
	if t.s == "" {
		return
	}
	at := xy(t.at.X.Points()-t.along*textWidth(t.s, t.size, t.bold), t.at.Y.Points())
	s := t.s
	if p.kind == onPDF {
		s = toCodePage(s)
	}
	f := p.face(t.size, t.bold, t.halo)
	if t.halo && p.kind != onSVG {
		p.halo(f, at, s)
	}
	p.canvas.SetColor(inks[t.ink].light)
	p.canvas.FillString(f, at, s)
	if t.bold && p.kind == onPDF {
		p.canvas.FillString(f, at.Add(xy(pdfBold*t.size, 0)), s)
	}
}

// halo draws s in paper colour around at, where the canvas cannot stroke text.
func (p *pad) halo(f font.Face, at vg.Point, s string) {
	p.canvas.SetColor(inks[inkPaper].light)
	for i := range 12 {
		p.canvas.FillString(f, onCircle(at, haloWidth, float64(i)*math.Pi/6), s)
	}
}

func (p *pad) rect(r vg.Rectangle, n pen) { p.stroke(n, r.Path()) }

func (p *pad) fillRect(r vg.Rectangle, c ink) { p.fill(c, r.Path()) }

// arrow draws an arrowhead with its tip at tip, pointing along dir (rad).
func (p *pad) arrow(c ink, tip vg.Point, dir, size float64) {
	const half = 0.16 // rad; slim, as on drawings
	path := linePath([]vg.Point{
		tip, tip.Sub(heading(dir - half).Scale(vg.Length(size))), tip.Sub(heading(dir + half).Scale(vg.Length(size))),
	}, true)
	p.fill(c, path)
}

// codePage lists the characters of code page 1252 from 0x80 to 0x9F; 0 where it has none.
var codePage = [32]rune{
	'€', 0, '‚', 'ƒ', '„', '…', '†', '‡', 'ˆ', '‰', 'Š', '‹', 'Œ', 0, 'Ž', 0,
	0, '‘', '’', '“', '”', '•', '–', '—', '˜', '™', 'š', '›', 'œ', 0, 'ž', 'Ÿ',
}

// toCodePage encodes s for the PDF canvas, which takes bytes of code page 1252.
func toCodePage(s string) string {
	out := make([]byte, 0, len(s))
	for _, r := range s {
		out = append(out, codePageByte(r))
	}
	return string(out)
}

func codePageByte(r rune) byte {
	switch {
	case r < 0x80 || r >= 0xA0 && r <= 0xFF:
		return byte(r)
	case r == '\u2212': // minus
		return 0x96 // en dash
	case r == '\u03BC': // Greek mu
		return 0xB5 // micro sign
	}
	for i, c := range codePage {
		if c == r {
			return byte(0x80 + i)
		}
	}
	return '?'
}

// paperColour is the background for charts, which gonum's plots draw themselves.
func paperColour() color.Color { return inks[inkPaper].light }
