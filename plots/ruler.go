package plots

import (
	"math"

	"gonum.org/v1/plot/vg"
)

// timeRuler is a line of time with the ticks of the tracks that it stands beside. It is
// drawn as they are: one strong line, dashed where the body does not fly.
type timeRuler struct {
	box      vg.Rectangle
	from, to float64 // s
	track    track
	step     float64
	landing  bool
	marks    []float64
	pl       *placer
}

const (
	rulerInset = 16.0 // pt, left and right of the line
	rulerLine  = 19.0 // pt, of the line above the foot of its box
)

// newRuler lays a ruler over a track that ends at its landing, if it has one.
func newRuler(t track, landing *Point, step float64, box vg.Rectangle) timeRuler {
	r := timeRuler{box: box, from: t.t[0], to: t.t[len(t.t)-1], track: t, step: step, landing: landing != nil}
	if r.to <= r.from {
		r.to = r.from + 1
	}
	r.marks, _ = t.marks(step)
	r.pl = &placer{bounds: box}
	r.label()
	return r
}

func (r *timeRuler) at(t float64) vg.Point {
	lo, hi := r.box.Min.X.Points()+rulerInset, r.box.Max.X.Points()-rulerInset
	return xy(lo+(hi-lo)*(t-r.from)/(r.to-r.from), r.box.Min.Y.Points()+rulerLine)
}

// ends are the texts over the two ends.
func (r *timeRuler) end() string {
	words := "the end, "
	if r.landing {
		words = "landing, "
	}
	return words + seconds(r.track.t[len(r.track.t)-1])
}

func (r *timeRuler) label() {
	last := r.at(r.to)
	r.pl.polyline(priceStrong, r.at(r.from), last)
	const below = sizeNote + 6.0
	free := math.Inf(-1)
	for _, t := range append([]float64{r.from}, r.marks...) {
		words := tickText(t, math.Max(r.step, 1e-9)) + " s"
		w := textWidth(words, sizeNote, false)
		c := r.at(t)
		lo := c.X.Points() - w/2
		if lo < free || c.X.Points()+w/2 > r.box.Max.X.Points() {
			continue
		}
		free = lo + w + 4
		r.pl.labels = append(r.pl.labels, placedLabel{ok: true, label: label{s: words, size: sizeNote, ink: inkText},
			box: vg.Rectangle{Min: xy(lo, c.Y.Points()-below-tailDepth*sizeNote), Max: xy(lo+w, c.Y.Points()-below+capHeight*sizeNote)}})
	}
}

func (r *timeRuler) paint(p *pad) {
	for _, run := range r.track.runs() {
		p.line(trackPen(0, run.ph[0]), r.at(run.t[0]), r.at(run.t[len(run.t)-1]))
	}
	for _, t := range r.marks {
		p.line(penTick, r.at(t).Sub(xy(0, 3.2)), r.at(t).Add(xy(0, 3.2)))
	}
	p.ring(r.at(r.from), seriesInk(0))
	if r.landing {
		p.dot(r.at(r.to), seriesInk(0))
	}
	r.pl.draw(p)
	above := xy(0, 7)
	p.text(text{s: "release", at: xy(r.box.Min.X.Points()+rulerInset-ringRadius, (r.at(r.from).Add(above)).Y.Points()), size: sizeNote, ink: inkText})
	p.text(text{s: "time since the release", at: r.at((r.from + r.to) / 2).Add(above), along: 0.5, size: sizeNote, ink: inkSoft})
	p.text(text{s: r.end(), at: r.at(r.to).Add(above).Add(xy(dotRadius, 0)), along: 1, size: sizeNote, ink: inkText})
}
