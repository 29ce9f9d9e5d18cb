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
	speed := r3.Norm(v)
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
		if s, ok := in.pieces[i].Solid.(smooth); ok {
			t = math.Max(t, c.aimed(s, gap, v, acc, best))
		}
		best = math.Min(best, t)
		return reach(best)
	})
	return best
}

// within gives the time to travel the way d (m), starting at a speed and never
// accelerating by more than acc.
func within(d, speed, acc float64) float64 { return 2 * d / (speed + math.Sqrt(speed*speed+2*acc*d)) }

// smooth is a solid that knows how its distance bends around a point.
type smooth interface {
	Solid
	// bends gives a distance (m) around p within which the solid's distance is
	// smooth with no principal curvature below -hollow (1/m).
	bends(p r3.Vec) (around, hollow float64)
}

// aimed is the time that a gap to a smooth solid surely takes to close, as far
// as that can be told up to most.
func (c *counter) aimed(s smooth, gap float64, v r3.Vec, acc, most float64) float64 {
	speed := r3.Norm(v)
	around, hollow := s.bends(c.p)
	if around == 0 {
		return 0
	}
	if !math.IsInf(around, 1) {
		most = math.Min(most, within(around, speed, acc))
	}
	if hollow > 0 && acc > 0 {
		most = math.Min(most, speed/acc) // the speed doubles at most
		acc += 4 * speed * speed * hollow
	} else {
		acc += speed * speed * hollow
	}
	_, n, _ := s.Nearest(c.p)
	rate := r3.Dot(v, n)
	if gap < 2*c.Thin {
		rate = -math.Abs(rate) // not to pass over the moment when it has opened
	}
	if rate > 0 {
		if acc == 0 {
			return most
		}
		return math.Min(most, (rate+math.Sqrt(rate*rate+2*acc*gap))/acc)
	}
	return math.Min(most, within(gap, -rate, acc))
}

// bends implements smooth: a block is convex.
func (b *Block) bends(r3.Vec) (around, hollow float64) { return math.Inf(1), 0 }

// bends implements smooth. The inner face of a sector is hollow with the
// radius of the place; beyond the axis, and beyond the half plane opposite to
// the sector's middle, another part of it may be as near.
func (s *Sector) bends(p r3.Vec) (around, hollow float64) {
	if s.Whole && s.R0 == 0 {
		return math.Inf(1), 0
	}
	r := math.Hypot(p.X, p.Y)
	around = r / 2
	if !s.Whole {
		off := math.Abs(math.Remainder(math.Atan2(p.Y, p.X)-(s.Phi0+s.Phi1)/2, 2*math.Pi))
		around = math.Min(around, r*math.Sin(math.Min(math.Pi/2, math.Pi-off)))
	}
	return around, 2 / r
}
