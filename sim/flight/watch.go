package flight

import (
	"math"
	"math/bits"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/frame"
)

// A body at rest in a habitat whose turning changes is watched until the
// changes are over, or its time is: friction must hold it at each instant.
const (
	// watchShare is how often, as a share of the pace of the motion, it is asked
	// whether friction holds. Over that the pull hardly bends, so that between two
	// looks what friction has to spare has one least value, which is sought.
	watchShare = 0.125
	// mostWatched bounds the looks at one stretch of a motion.
	mostWatched = 200_000
	// goldenLooks narrows a least value to 1e-9 of the time between two looks.
	goldenLooks = 45
)

// smoothUntil gives, in s from now, when the stretch of the habitat's motion
// that is under way ends, infinite for the last, and the last instant before
// that (s, habitat time). The end lies in the next stretch whatever the rounding.
func (f *Flier) smoothUntil(t *Track, now *moving) (span, last float64) {
	end := f.m.Motion.Stretch(t.Begin + now.t).End
	return f.spanFrom(t, now.t), math.Nextafter(end, 0)
}

// spanFrom gives the same span from a time, s since the release.
func (f *Flier) spanFrom(t *Track, now float64) float64 {
	end := f.m.Motion.Stretch(t.Begin + now).End
	span := end - (t.Begin + now)
	for t.Begin+(now+span) < end {
		span += math.Nextafter(end, math.Inf(1)) - end
	}
	return span
}

// longestStep is the longest step in contact from a habitat time on, s: the
// habitat turns by stepTurn at most, and loads change by little.
func (f *Flier) longestStep(from float64) float64 {
	s := f.m.Motion.Stretch(from)
	to := from
	if !math.IsInf(s.End, 1) {
		to = s.End
	}
	omega, _ := f.m.Motion.Bounds(from, to)
	return math.Min(stepTurn/math.Max(omega, slowest), stepTurn*s.Pace)
}

// keeper is a body at rest on contacts.
type keeper struct {
	f   *Flier
	q   r3.Vec
	all []push
}

func (k *keeper) pull(at float64) r3.Vec {
	a := k.f.m.Motion.At(at)
	return k.f.pull(&a, at, frame.State{Pos: k.q})
}

// lost says whether friction does not hold the body at a habitat time, s.
func (k *keeper) lost(at float64) bool { return holds(k.all, k.pull(at)) == nil }

// spare is by how much, in m/s^2, friction can hold the body at a habitat time:
// on the subset of its contacts that does so best.
func (k *keeper) spare(at float64) float64 {
	pull := k.pull(at)
	best := math.Inf(-1)
	for set := 1; set < 1<<len(k.all); set++ {
		if bits.OnesCount(uint(set)) > mostContacts {
			continue
		}
		sub := subset(k.all, members(set, len(k.all)))
		if !balance(sub, pull) {
			continue
		}
		left, grip, least := pull, 0.0, math.Inf(1)
		for i := range sub {
			left = r3.Add(left, r3.Scale(sub[i].force, sub[i].normal))
			grip += sub[i].mu * sub[i].force
			least = math.Min(least, sub[i].force)
		}
		best = math.Max(best, math.Min(grip-r3.Norm(left), least))
	}
	return best
}

// until gives the first habitat time between two at which friction does not
// hold the body any more; infinite if there is none.
func (k *keeper) until(from, to float64) float64 {
	for from < to {
		s := k.f.m.Motion.Stretch(from)
		end := math.Min(s.End, to)
		if k.lost(from) {
			return from
		}
		if at := k.within(s, from, math.Min(end, watched(s, from))); !math.IsInf(at, 1) {
			return at
		}
		from = end
	}
	return math.Inf(1)
}

// watched is up to when a stretch has to be watched, s: loads that come back
// are watched for one round.
func watched(s frame.Stretch, from float64) float64 {
	switch {
	case math.IsInf(s.Pace, 1):
		return from
	case s.Period > 0:
		return from + s.Period
	}
	return s.End
}

// within searches one stretch.
func (k *keeper) within(s frame.Stretch, from, to float64) float64 {
	n := math.Min(mostWatched, math.Ceil((to-from)/(watchShare*s.Pace)))
	at := func(i float64) float64 { return math.Min(from+(to-from)*i/n, math.Nextafter(s.End, 0)) }
	before, last := math.Inf(1), k.spare(from)
	for i := 1.0; i <= n; i++ {
		now := k.spare(at(i))
		if i > 1 && last < before && last <= now {
			if low := k.least(at(i-2), at(i)); k.lost(low) {
				return k.first(at(i-2), low)
			}
		}
		if k.lost(at(i)) {
			return k.first(at(i-1), at(i))
		}
		before, last = last, now
	}
	return math.Inf(1)
}

// least finds the least spare friction between two times by golden section
// (Kiefer 1953).
func (k *keeper) least(a, b float64) float64 {
	const share = 0.6180339887498949
	u, v := b-share*(b-a), a+share*(b-a)
	fu, fv := k.spare(u), k.spare(v)
	for range goldenLooks {
		if fu < fv {
			b, v, fv = v, u, fu
			u = b - share*(b-a)
			fu = k.spare(u)
		} else {
			a, u, fu = u, v, fv
			v = a + share*(b-a)
			fv = k.spare(v)
		}
	}
	if fu < fv {
		return u
	}
	return v
}

// first halves the stretch from a, when friction holds, to b, when it does not,
// until it is one rounding wide.
func (k *keeper) first(a, b float64) float64 {
	for {
		mid := a + (b-a)/2
		if mid <= a || mid >= b {
			return b
		}
		if k.lost(mid) {
			b = mid
		} else {
			a = mid
		}
	}
}

// waits lets a body that friction holds rest until it does not hold any more;
// false if it does so for good, or to the end of the body's time.
func (f *Flier) waits(t *Track, now *moving, all []push, surface string) bool {
	from := t.Begin + now.t
	if f.m.Motion.Stretch(from).Steady() {
		return false
	}
	k := &keeper{f: f, q: now.q, all: all}
	at := k.until(from, t.Begin+f.longest(t.Release))
	if math.IsInf(at, 1) {
		return false
	}
	until := at - t.Begin
	for t.Begin+until < at {
		until += math.Nextafter(at, math.Inf(1)) - at
	}
	now.v, now.w = r3.Vec{}, r3.Vec{}
	t.add(Phase{Kind: Rest, local: true, base: frame.State{Pos: now.q}, T0: now.t, T1: until, Surface: surface})
	now.t = until
	return true
}
