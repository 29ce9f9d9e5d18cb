package flight

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// aims tells how far ahead a contact is looked for, in steps to come; what is
// left is then shared out evenly.
const aims = 3

// overshoot is the share of the time to a contact by which a step goes beyond
// where it is expected: more than the guess is off by.
const overshoot = 0.01

// Aim implements [integrator.Aimed]: the last steps before a contact share the
// way evenly, and the last one ends shortly after it.
func (g *apart) Aim(t float64, y, dy []float64, next float64) float64 {
	if !g.touch || t+aims*next < g.due {
		return math.Inf(1)
	}
	left := g.guess(t, y, dy)
	g.due = t + left
	if n := math.Ceil(left * (1 + overshoot) / next); n < aims {
		return t + left*(1+overshoot)/max(n, 1)
	}
	return math.Inf(1)
}

// mends is how often a guess is corrected by the gap at the place to which it
// leads.
const mends = 1

// guess is how long (s) the body takes to touch what it is nearest to, by its
// velocity and acceleration in the habitat; infinite where it does not seem to.
func (g *apart) guess(t float64, y, dy []float64) float64 {
	gap := g.Value(t, y)
	c := g.f.m.Interior.Contact(g.seen.local)
	a := g.f.free.forces.motion.At(g.f.free.begin + t)
	s := a.ToHabitat(depart(&g.f.free.base, t, y))
	w, acc := a.In(a.Omega), a.In(vec(dy[3:]))
	acc = r3.Sub(acc, r3.Cross(w, r3.Add(r3.Scale(2, s.Vel), r3.Cross(w, s.Pos))))
	rate, fall := r3.Dot(s.Vel, c.Normal), -r3.Dot(acc, c.Normal)
	time := falls(gap, rate, fall)
	for k := 0; k < mends && rate < fall*time && time < math.MaxFloat32; k++ {
		at := r3.Add(s.Pos, r3.Scale(time, r3.Add(s.Vel, r3.Scale(time/2, acc))))
		time = max(0, time+(g.f.m.Interior.Dist(at)-g.f.wide)/(fall*time-rate))
	}
	return time
}

// falls gives when gap + rate t - fall t^2/2 reaches 0; infinite for never.
func falls(gap, rate, fall float64) float64 {
	root := rate*rate + 2*fall*gap
	switch {
	case root < 0 || rate >= 0 && fall <= 0:
		return math.Inf(1)
	case rate <= 0:
		return 2 * gap / (math.Sqrt(root) - rate)
	}
	return (rate + math.Sqrt(root)) / fall
}
