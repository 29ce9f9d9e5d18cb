package plots

import (
	"math"

	"gonum.org/v1/plot/vg"
)

// label is a name that wants a place near what it names.
type label struct {
	s     string
	size  float64
	bold  bool
	ink   ink
	at    vg.Point   // what it names
	or    []vg.Point // other points of what it names, as good to stand at
	clear float64    // pt kept free around at
	want  vg.Point   // preferred direction; zero for any
	need  bool       // it must be shown, however far off
	key   pen        // a sample of the named line stands before the name, if it has a width
}

// placedLabel is a label with its box and, when that stands off, its leader.
type placedLabel struct {
	label
	box    vg.Rectangle
	leader []vg.Point
	ok     bool
}

// pricedLine is a line that labels had better not cover; price is per crossing.
type pricedLine struct {
	a, b  vg.Point
	price float64
}

// Prices of places, in pt of distance that would be as bad.
const (
	priceMark   = 150.0 // covering a mark
	priceStrong = 60.0  // covering a track or a dimension line
	pricePlumb  = 25.0  // covering a plumb line or a uniform-gravity path
	priceThin   = 18.0  // covering structure
	priceTurn   = 14.0  // standing opposite to the preferred direction
	priceCross  = 35.0  // a leader across a track
	priceOver   = 8.0   // a leader across structure or a plumb line
	leaderFrom  = 9.0   // pt beyond clear at which a label gets a leader
	textGap     = 1.6   // pt kept free above and below every text
	keySample   = 17.0  // pt, length of the sample of a line before its name
	wordGap     = 4.0   // pt kept free beside it, so that two names do not read as one
)

// placer finds places for labels.
//
// Law: no box of a text overlaps another, and all lie within bounds.
type placer struct {
	bounds vg.Rectangle
	fixed  []vg.Rectangle // texts placed by others
	marks  []vg.Rectangle
	lines  []pricedLine
	labels []placedLabel
}

// text keeps the labels off a text drawn by others.
func (pl *placer) text(r vg.Rectangle) { pl.fixed = append(pl.fixed, r) }

// mark keeps the labels off a mark of radius r pt.
func (pl *placer) mark(at vg.Point, r float64) {
	pl.marks = append(pl.marks, grow(vg.Rectangle{Min: at, Max: at}, vg.Length(r)))
}

// polyline makes labels shy of a line.
func (pl *placer) polyline(price float64, pts ...vg.Point) {
	for _, part := range clipLine(pl.bounds, pts) {
		part = thinPage(part)
		for i := 1; i < len(part); i++ {
			pl.lines = append(pl.lines, pricedLine{part[i-1], part[i], price})
		}
	}
}

func (pl *placer) add(l label) {
	if l.s = clean(l.s); l.s == "" {
		return
	}
	wide := (pl.bounds.Max.X - pl.bounds.Min.X).Points()
	l.s = clip(l.s, math.Max(0.6*wide, math.Min(wide-3*wordGap, 200)), l.size, l.bold)
	pl.labels = append(pl.labels, placedLabel{label: l})
}

// solve places all labels. It returns the needed ones that found no place: those are
// then tried first, a few times over, before they are given up.
func (pl *placer) solve() (lost []string) {
	const rounds = 4
	first := map[int]bool{}
	for range rounds {
		for i := range pl.labels {
			pl.labels[i].ok = false
		}
		pl.settle(first)
		lost = nil
		for i, l := range pl.labels {
			if l.need && !l.ok {
				lost = append(lost, l.s)
				first[i] = true
			}
		}
		if lost == nil {
			break
		}
	}
	return lost
}

// settle places the labels of the set first, then those that must be shown, then the
// others, and lets each look for a better place twice more, now that all the others stand.
func (pl *placer) settle(first map[int]bool) {
	for rank := range 3 {
		for i, l := range pl.labels {
			own := 2
			if l.need {
				own = 1
			}
			if first[i] {
				own = 0
			}
			if own == rank {
				pl.place(i)
			}
		}
	}
	for range 2 {
		for i := range pl.labels {
			pl.place(i)
		}
	}
}

// place gives label i the cheapest place, all others staying where they are.
func (pl *placer) place(i int) {
	l := pl.labels[i].label
	pl.labels[i] = placedLabel{label: l}
	best, cost := placedLabel{label: l}, math.Inf(1)
	tryAt := func(box vg.Rectangle, at vg.Point) {
		cand := placedLabel{label: l, box: box, ok: true}
		cand.at = at
		if c := pl.cost(&cand, i, cost); c < cost {
			best, cost = cand, c
		}
	}
	try := func(box vg.Rectangle) { tryAt(box, l.at) }
	pl.near(l, try)
	for _, at := range l.or {
		moved := l
		moved.at = at
		pl.near(moved, func(box vg.Rectangle) { tryAt(box, at) })
	}
	if l.need && math.IsInf(cost, 1) {
		pl.anywhere(l, try)
	}
	best.label = l
	limit := math.Inf(1)
	if !l.need {
		limit = priceMark // a name that is not needed is left out before it spoils a mark
	}
	if cost < limit {
		pl.labels[i] = best
	}
}

// keyWidth is the room for the sample of the line, pt.
func (l label) keyWidth() float64 {
	if l.key.width == 0 {
		return 0
	}
	return keySample + 3
}

func (l label) extent() (w, h float64) {
	return textWidth(l.s, l.size, l.bold) + l.keyWidth(), (capHeight + tailDepth) * l.size
}

// near offers places around the label's point, at growing distances.
func (pl *placer) near(l label, try func(vg.Rectangle)) {
	w, h := l.extent()
	reach := []float64{3, 6, 11, 18, 28, 42}
	if l.need {
		reach = append(reach, 60, 85, 120)
	}
	const ways = 16
	for _, d := range reach {
		for k := range ways {
			a := 2 * math.Pi * float64(k) / ways
			c, s := math.Cos(a), math.Sin(a)
			sx, sy := square(c), square(s)
			centre := l.at.Add(xy(c*(l.clear+d)+sx*w/2, s*(l.clear+d)+sy*h/2))
			try(vg.Rectangle{Min: centre.Sub(xy(w/2, h/2)), Max: centre.Add(xy(w/2, h/2))})
		}
	}
}

// square stretches a cosine so that boxes beside a point sit fully beside it.
func square(c float64) float64 { return math.Max(-1, math.Min(1, 1.6*c)) }

// anywhere offers all places within the bounds.
func (pl *placer) anywhere(l label, try func(vg.Rectangle)) {
	w, h := l.extent()
	const step = 6
	for y := pl.bounds.Min.Y + 2; y+vg.Length(h) < pl.bounds.Max.Y; y += step {
		for x := pl.bounds.Min.X + 2; x+vg.Length(w) < pl.bounds.Max.X; x += step {
			lo := vg.Point{X: x, Y: y}
			try(vg.Rectangle{Min: lo, Max: lo.Add(xy(w, h))})
		}
	}
}

// draw draws the labels, leaders first.
func (pl *placer) draw(p *pad) {
	for _, l := range pl.labels {
		if l.ok && len(l.leader) > 0 {
			p.line(penLeader, l.leader...)
		}
	}
	for _, l := range pl.labels {
		if l.ok {
			base := l.box.Min.Add(xy(l.keyWidth(), tailDepth*l.size))
			if l.key.width > 0 {
				from := base.Add(xy(-l.keyWidth(), 0.3*l.size))
				p.line(l.key, from, from.Add(xy(keySample, 0)))
			}
			p.text(text{s: l.s, at: base, size: l.size, bold: l.bold, halo: true, ink: l.ink})
		}
	}
}
