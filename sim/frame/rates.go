package frame

import (
	"math"
	"sort"
)

// Change is a change of the spin rate about the axis.
type Change struct {
	Start  float64 // s
	Over   float64 // s, how long it takes
	To     float64 // rad/s, the rate after it
	Linear bool    // the rate changes steadily, instead of by 3u^2 - 2u^3 of the share u of the time
}

// End is when the change is over, s.
func (c Change) End() float64 { return c.Start + c.Over }

// Rates is a spin rate as a function of time: it is steady but for its
// changes. Angle, rate and acceleration are closed forms, so that the angle is
// exact whenever it is asked for. The zero value does not turn.
type Rates struct {
	pieces []piece // in order of time; the first one reaches back without end
}

// piece is a stretch with one law. With the share u of its time that is gone by,
// of a change by d over the time T
//
//	rate  = r0 + d (3u^2 - 2u^3)      or r0 + d u
//	angle = a0 + r0 T u + d T (u^3 - u^4/2)  or a0 + r0 T u + d T u^2/2
type piece struct {
	start, over     float64 // s; over is 0 where the rate is steady
	angle, rate, by float64 // rad and rad/s at the start, and the change, rad/s
	linear          bool
}

// NewRates makes the rates of a first one (rad/s) and changes in order of
// time, none of which begins before the last is over. A change to the rate that
// there is changes nothing.
func NewRates(first float64, changes []Change) Rates {
	last := piece{start: 0, rate: first}
	out := []piece{last}
	for _, c := range changes {
		if c.To == last.rate {
			continue
		}
		angle, _, _ := last.at(c.Start)
		ramp := piece{start: c.Start, over: c.Over, angle: angle, rate: last.rate, by: c.To - last.rate, linear: c.Linear}
		angle, _, _ = ramp.at(c.End())
		last = piece{start: c.End(), angle: angle, rate: c.To}
		out = append(out, ramp, last)
	}
	return Rates{out}
}

// at gives angle, rate and acceleration by the law of the piece.
func (p *piece) at(t float64) (angle, rate, accel float64) {
	t -= p.start
	if p.over == 0 {
		return p.angle + p.rate*t, p.rate, 0
	}
	u := t / p.over
	if p.linear {
		return p.angle + p.rate*t + p.by*t*u/2, p.rate + p.by*u, p.by / p.over
	}
	return p.angle + p.rate*t + p.by*t*u*u*(1-u/2), p.rate + p.by*u*u*(3-2*u), p.by / p.over * 6 * u * (1 - u)
}

// peak gives the greatest magnitudes of rate and acceleration between two
// times within the piece. The rate has them at its ends, the acceleration at the
// ends or in the middle of the change.
func (p *piece) peak(t0, t1 float64) (rate, accel float64) {
	_, r0, a0 := p.at(t0)
	_, r1, a1 := p.at(t1)
	rate, accel = math.Max(math.Abs(r0), math.Abs(r1)), math.Max(math.Abs(a0), math.Abs(a1))
	if mid := p.start + p.over/2; p.over > 0 && !p.linear && t0 < mid && mid < t1 {
		accel = math.Abs(p.by) / p.over * 1.5
	}
	return rate, accel
}

// index gives the piece under way at a time, the later one at a joint.
func (r *Rates) index(t float64) int {
	return max(0, sort.Search(len(r.pieces), func(i int) bool { return r.pieces[i].start > t })-1)
}

// At gives the angle gone round since t = 0 (rad), the rate (rad/s) and its
// derivative (rad/s^2) at a time (s).
func (r *Rates) At(t float64) (angle, rate, accel float64) {
	switch len(r.pieces) {
	case 0:
		return 0, 0, 0
	case 1:
		return r.pieces[0].at(t)
	}
	return r.pieces[r.index(t)].at(t)
}

// Peak gives the greatest magnitudes of the rate (rad/s) and of its derivative
// (rad/s^2) over the times t0 to t1 (s); where the derivative jumps between
// them, or at t1, those of both sides.
func (r *Rates) Peak(t0, t1 float64) (rate, accel float64) {
	for i, from := r.index(t0), t0; i < len(r.pieces); i++ {
		end := t1
		if i+1 < len(r.pieces) {
			end = math.Min(t1, r.pieces[i+1].start)
		}
		most, grows := r.pieces[i].peak(from, end)
		rate, accel = math.Max(rate, most), math.Max(accel, grows)
		if i+1 == len(r.pieces) || r.pieces[i+1].start > t1 {
			break
		}
		from = r.pieces[i+1].start
	}
	return rate, accel
}

// stretch gives the end (s, infinite for the last) of the piece under way, and
// how long its change takes, infinite where the rate is steady.
func (r *Rates) stretch(t float64) (end, over float64) {
	end, over = math.Inf(1), math.Inf(1)
	if len(r.pieces) < 2 {
		return end, over
	}
	i := r.index(t)
	if i+1 < len(r.pieces) {
		end = r.pieces[i+1].start
	}
	if r.pieces[i].over > 0 {
		over = r.pieces[i].over
	}
	return end, over
}

// Steady says whether the rate never changes.
func (r *Rates) Steady() bool { return len(r.pieces) < 2 }

// Settled is when the last change is over, s; 0 where there is none.
func (r *Rates) Settled() float64 {
	if r.Steady() {
		return 0
	}
	return r.pieces[len(r.pieces)-1].start
}
