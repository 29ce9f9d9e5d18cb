package geom

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// Beside says what a moving sphere may run into.
type Beside struct {
	Wide float64 // m, radius of the sphere
	Thin float64 // m, the depth that counts as nothing
	// Slop is how far, in m, the sphere may be from what it touches. What it
	// reaches into by more than that counts, whatever else it touches. Another
	// place of a group that it slides on counts from a gap of Slop on: the
	// sphere, kept on the nearest place of all, would never reach into it.
	Slop float64
	// Back says that time is counted backward, from a contact: as the sphere
	// parts from it then, its rate counts from a gap of nothing on.
	Back bool
	// On are the patches that the sphere slides on. Neither they count nor what
	// goes on from them without an edge.
	On []Patch
	// Grazed are the patches that the sphere touches without being pressed on
	// them. They, and what goes on from them, count from a gap of more than
	// twice Thin on, since along a gap of nothing there is no telling how soon
	// it closes.
	Grazed []Patch
}

// counter decides which pieces count at one place.
type counter struct {
	*Beside
	in    *Interior
	p     r3.Vec
	touch [mostTouched]contact // on, then grazed, once they are known
	known int                  // how many; -1: not known
}

// mostTouched is how many patches are told apart.
const mostTouched = 8

func (b *Beside) counter(in *Interior, p r3.Vec) counter {
	return counter{Beside: b, in: in, p: p, known: -1}
}

// joinShare is how near a piece must be, as a share of the sphere's radius, to
// count as going on from one that the sphere slides on. The next piece of a
// floor is that near when its seam is about a sixth of the radius away; of what
// leans over at less than 80 deg, the end that a wall hides is never.
const joinShare = 1.0 / 64

// counts says at which distance a piece i that is d away counts; infinite if
// it does not.
func (c *counter) counts(i int, d float64) float64 {
	if c.known < 0 {
		c.learn()
	}
	on := min(len(c.On), mostTouched)
	for k := 0; k < c.known; k++ {
		if k >= on && d > c.Wide+2*c.Thin {
			break
		}
		if i != c.touch[k].piece && d > c.Wide+joinShare*math.Max(c.Wide, lift) {
			continue // what joins at a distance may not, nearer by
		}
		if i == c.touch[k].piece || d >= c.Wide-c.Slop && c.in.joins(c.p, c.Wide, i, &c.touch[k]) {
			return math.Inf(1)
		}
	}
	for k := range c.On {
		if c.On[k].Piece < 0 && c.On[k].Group == c.in.pieces[i].Group {
			return d - c.Slop
		}
	}
	return d
}

// learn finds what the sphere touches.
func (c *counter) learn() {
	c.known = 0
	for _, list := range [2][]Patch{c.On, c.Grazed} {
		for _, t := range list {
			if c.known == mostTouched {
				return
			}
			i := c.in.nearestOn(c.p, t)
			_, n, _ := c.in.pieces[i].Solid.Nearest(c.p)
			c.touch[c.known] = contact{i, n}
			c.known++
		}
	}
}

// DistBeside gives the distance (m) from p to the nearest solid that counts;
// infinite where there is none.
//
// Law: but for jumps, it changes by no more than p does.
func (in *Interior) DistBeside(p r3.Vec, b *Beside) float64 {
	if b.all() {
		return in.Dist(p)
	}
	best := math.Inf(1)
	c := b.counter(in, p)
	in.tree.each(in.pieces, p, &best, func(i int, d float64) float64 {
		if d-c.Slop < best {
			return math.Min(best, c.counts(i, d))
		}
		return best
	})
	return best
}

// TimeBeside gives a time (s), at most limit, during which no gap between the
// sphere and what counts surely closes, nor one of less than twice Thin
// changes by more than Thin: the sphere being at p with the velocity v (m/s)
// and an acceleration that never exceeds acc (m/s^2).
//
// A gap closes no faster than the sphere moves. Along a solid of which the
// free side is convex, or hollow with a known curvature, its present rate
// tells more: the distance to a convex solid is a convex function of place, so
// that its second derivative in time is at least -acc, and that to one of
// hollow curvature k at least -acc - k v^2.
func (in *Interior) TimeBeside(p, v r3.Vec, acc, limit float64, b *Beside) float64 {
	speed := norm(v)
	if b.all() {
		return in.timeTo(p, v, speed, acc, limit, b)
	}
	reach := func(t float64) float64 { return b.Wide + b.Slop + speed*t + acc*t*t/2 }
	c := b.counter(in, p)
	best, bound := limit, reach(limit)
	in.tree.each(in.pieces, p, &bound, func(i int, d float64) float64 {
		if within(math.Max(d-b.Wide-b.Slop, b.Thin), speed, acc) >= best {
			return bound
		}
		gap := math.Max(c.counts(i, d)-b.Wide, b.Thin)
		if math.IsInf(gap, 1) {
			return bound
		}
		t := within(gap, speed, acc)
		t = math.Max(t, b.aimed(in.pieces[i].Solid, p, v, gap, speed, acc, best))
		best = math.Min(best, t)
		return reach(best)
	})
	return best
}

// all says whether everything counts.
func (b *Beside) all() bool { return len(b.On) == 0 && len(b.Grazed) == 0 }

// timeTo is TimeBeside where everything counts.
func (in *Interior) timeTo(p, v r3.Vec, speed, acc, limit float64, b *Beside) float64 {
	t := &in.tree
	if len(t.nodes) == 0 {
		return limit
	}
	best, near := limit, b.Wide+speed*limit+acc*limit*limit/2
	var stack [treeDepth]int
	top := 1
	for top > 0 {
		top--
		n := &t.nodes[stack[top]]
		if n.left != 0 {
			stack[top], stack[top+1] = t.sorted(n, p)
			top += 2
			continue
		}
		if len(t.nodes) > 1 && n.box.Dist(p) > near {
			continue
		}
		for _, k := range t.order[n.first:n.last] {
			s := in.pieces[k].Solid
			gap := max(s.Dist(p)-b.Wide, b.Thin)
			sure := within(gap, speed, acc)
			if sure >= best {
				continue
			}
			best = min(best, max(sure, b.aimed(s, p, v, gap, speed, acc, best)))
			near = b.Wide + speed*best + acc*best*best/2
		}
	}
	return best
}

// within gives the time to travel the way d (m), starting at a speed and never
// accelerating by more than acc.
func within(d, speed, acc float64) float64 { return 2 * d / (speed + math.Sqrt(speed*speed+2*acc*d)) }

// smooth is a solid that knows how its distance bends around a point.
type smooth interface {
	Solid
	// bends gives a distance (m) around p within which the solid's distance is
	// smooth, and, less than that, how far its middle line of curvature is off:
	// at the distance x from p no principal curvature is below -1/(hollow - x).
	// hollow is infinite for a convex solid.
	bends(p r3.Vec) (around, hollow float64)
}

// aimed is the time that a gap to a smooth solid surely takes to close, as far
// as that can be told up to most; 0 for a solid that is not.
func (b *Beside) aimed(solid Solid, p, v r3.Vec, gap, speed, acc, most float64) float64 {
	s, ok := solid.(smooth)
	if !ok {
		return 0
	}
	around, hollow := s.bends(p)
	if around == 0 {
		return 0
	}
	_, n, _ := s.Nearest(p)
	rate := r3.Dot(v, n)
	if gap < 2*b.Thin && !b.Back {
		rate = -math.Abs(rate) // not to pass over the moment when it has opened
	}
	if math.IsInf(hollow, 1) {
		return closes(gap, rate, acc, most)
	}
	return hollowCloses(gap, rate, speed, acc, around, hollow, most)
}

// closes gives how long, at most most, a gap with a rate takes to close under
// the acceleration -acc.
func closes(gap, rate, acc, most float64) float64 {
	if rate <= 0 && gap <= math.MaxFloat64 {
		return min(most, within(gap, -rate, acc))
	}
	if acc == 0 || gap > math.MaxFloat64 {
		return most
	}
	return min(most, (rate+math.Sqrt(rate*rate+2*acc*gap))/acc)
}

// bends implements smooth: a block is convex.
func (b *Block) bends(r3.Vec) (around, hollow float64) { return math.Inf(1), math.Inf(1) }

// bends implements smooth. The inner face of a sector is hollow with the
// radius of the place; beyond the axis, and beyond the half plane opposite to
// the sector's middle, another part of it may be as near.
func (s *Sector) bends(p r3.Vec) (around, hollow float64) {
	if s.Whole && s.R0 == 0 {
		return math.Inf(1), math.Inf(1)
	}
	r := fromAxis(p)
	around = r / 2
	if !s.Whole {
		off := math.Abs(math.Remainder(math.Atan2(p.Y, p.X)-(s.Phi0+s.Phi1)/2, 2*math.Pi))
		around = min(around, r*math.Sin(min(math.Pi/2, math.Pi-off)))
	}
	return around, r
}
