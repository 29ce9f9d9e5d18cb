package plots

import (
	"math"

	"gonum.org/v1/plot/vg"
)

// Marks differ in shape, so that grey prints tell them apart: a release is an open
// circle, a landing a full one, a resting place an open square, the axis a cross in a circle.

const (
	ringRadius = 3.0 // pt
	dotRadius  = 2.6
	squareHalf = 2.9
)

// ring is the mark of a release.
func (p *pad) ring(at vg.Point, c ink) {
	path := p.circlePath(at, ringRadius)
	p.fill(inkPaper, path)
	p.stroke(pen{ink: c, width: 1.2}, path)
}

// dot is the mark of a landing.
func (p *pad) dot(at vg.Point, c ink) {
	p.fill(inkPaper, p.circlePath(at, dotRadius+0.9))
	p.fill(c, p.circlePath(at, dotRadius))
}

// square is the mark of a resting place.
func (p *pad) square(at vg.Point, c ink) {
	r := vg.Rectangle{Min: at.Sub(xy(squareHalf, squareHalf)), Max: at.Add(xy(squareHalf, squareHalf))}
	p.fillRect(r, inkPaper)
	p.rect(r, pen{ink: c, width: 1.2})
}

// axisMark is the spin axis, seen end on.
func (p *pad) axisMark(at vg.Point) {
	const r, arm = 3.0, 6.0
	p.line(penAxis, at.Sub(xy(arm, 0)), at.Add(xy(arm, 0)))
	p.line(penAxis, at.Sub(xy(0, arm)), at.Add(xy(0, arm)))
	p.stroke(penAxis, p.circlePath(at, r))
}

// spinArrow is an arrow round the axis, the way that the habitat turns.
func (p *pad) spinArrow(at vg.Point, r, spin float64) {
	if spin == 0 {
		return
	}
	way := math.Copysign(1, spin)
	start, end := math.Pi/2-way*0.9, math.Pi/2+way*1.1
	p.stroke(penBody, p.arcPath(at, vg.Length(r), start, end))
	p.arrow(inkText, onCircle(at, vg.Length(r), end+way*0.12), end+way*(math.Pi/2+0.12), 6)
}
