package plots

import (
	"math"

	"gonum.org/v1/plot/vg"
)

// cost prices a candidate for label i, infinite where it may not stand, and gives it
// its leader. A price above limit need not be exact.
func (pl *placer) cost(cand *placedLabel, i int, limit float64) float64 {
	gaps := xy(wordGap, textGap)
	room := vg.Rectangle{Min: cand.box.Min.Sub(gaps), Max: cand.box.Max.Add(gaps)}
	if !within(pl.bounds, room.Min) || !within(pl.bounds, room.Max) || pl.covered(room, i) {
		return math.Inf(1)
	}
	near := nearest(cand.box, cand.at)
	gap := near.Sub(cand.at)
	dist := math.Hypot(gap.X.Points(), gap.Y.Points())
	sum := math.Max(0, dist-cand.clear)
	if dist > cand.clear+leaderFrom {
		stop := cand.at.Add(gap.Scale(vg.Length(cand.clear / dist)))
		cand.leader = []vg.Point{near, stop}
		sum += 4 + pl.leaderCost(cand.leader, i)
	}
	if want := math.Hypot(cand.want.X.Points(), cand.want.Y.Points()); want > 0 {
		mid := cand.box.Min.Add(cand.box.Max).Scale(0.5).Sub(cand.at)
		l := math.Hypot(mid.X.Points(), mid.Y.Points())
		if l > 0 {
			sum += priceTurn * (1 - mid.Dot(cand.want).Points()/(want*l))
		}
	}
	if sum >= limit {
		return sum
	}
	return sum + pl.coverCost(room)
}

// covered reports whether room overlaps a text, or a leader of another label runs through it.
func (pl *placer) covered(room vg.Rectangle, i int) bool {
	for _, r := range pl.fixed {
		if overlap(room, r) {
			return true
		}
	}
	for j, o := range pl.labels {
		if j == i || !o.ok {
			continue
		}
		if overlap(room, o.box) || len(o.leader) > 0 && crosses(room, o.leader[0], o.leader[1]) {
			return true
		}
	}
	return false
}

func (pl *placer) coverCost(room vg.Rectangle) float64 {
	sum := 0.0
	for _, m := range pl.marks {
		if overlap(room, m) {
			sum += priceMark
		}
	}
	for _, l := range pl.lines {
		if crosses(room, l.a, l.b) {
			sum += l.price
		}
	}
	return sum
}

// leaderCost prices a leader; it may not run through a text.
func (pl *placer) leaderCost(leader []vg.Point, i int) float64 {
	sum := 0.0
	for _, r := range pl.fixed {
		if crosses(r, leader[0], leader[1]) {
			return math.Inf(1)
		}
	}
	for j, o := range pl.labels {
		if j == i || !o.ok {
			continue
		}
		if crosses(o.box, leader[0], leader[1]) {
			return math.Inf(1)
		}
		if len(o.leader) > 0 && meet(leader[0], leader[1], o.leader[0], o.leader[1]) {
			sum += priceCross
		}
	}
	for _, l := range pl.lines {
		switch {
		case l.price < priceThin || !meet(leader[0], leader[1], l.a, l.b):
		case l.price >= priceStrong:
			sum += priceCross
		default:
			sum += priceOver
		}
	}
	return sum
}

func nearest(r vg.Rectangle, p vg.Point) vg.Point {
	return vg.Point{X: max(r.Min.X, min(r.Max.X, p.X)), Y: max(r.Min.Y, min(r.Max.Y, p.Y))}
}

// crosses reports whether the segment a-b has a part in r, by the bounds on its
// parameter of Liang & Barsky, ACM Transactions on Graphics 3 (1984) 1-22 (from memory).
func crosses(r vg.Rectangle, a, b vg.Point) bool {
	from, to := vg.Length(0), vg.Length(1)
	within := func(lo, hi, p, d vg.Length) bool {
		if d == 0 {
			return p >= lo && p <= hi
		}
		u, w := (lo-p)/d, (hi-p)/d
		from, to = max(from, min(u, w)), min(to, max(u, w))
		return from <= to
	}
	return within(r.Min.X, r.Max.X, a.X, b.X-a.X) && within(r.Min.Y, r.Max.Y, a.Y, b.Y-a.Y)
}

// meet reports whether the segments a-b and c-d cross.
func meet(a, b, c, d vg.Point) bool {
	side := func(p, q, r vg.Point) vg.Length { return (q.X-p.X)*(r.Y-p.Y) - (q.Y-p.Y)*(r.X-p.X) }
	return side(a, b, c)*side(a, b, d) < 0 && side(c, d, a)*side(c, d, b) < 0
}
