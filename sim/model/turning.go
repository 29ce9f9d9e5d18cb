package model

import (
	"fmt"
	"math"
	"sort"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/frame"
)

const (
	// leastPeriod is the shortest period of a coning, s: what goes round a
	// thousand times a second is no habitat.
	leastPeriod = 1e-3
	// leastOver is the shortest change of the spin, s, and leastShare its least
	// share of the time before it: shorter ones are lost in the roundings of time.
	leastOver  = 1e-6
	leastShare = 1e-9
)

// turning checks how the habitat turns, and makes its motion.
func (c *checker) turning() {
	m := c.m
	order := make([]int, len(m.Habitat.Changes))
	for i := range order {
		order[i] = i
	}
	sort.SliceStable(order, func(a, b int) bool { return m.Habitat.Changes[order[a]].Start < m.Habitat.Changes[order[b]].Start })
	sorted := make([]frame.Change, len(order))
	for k, i := range order {
		sorted[k] = m.Habitat.Changes[i]
		c.change(i, sorted[k])
		if k > 0 && sorted[k].Start < sorted[k-1].End() {
			c.fault(fmt.Sprintf("habitat.spin_change[%d].start", i), "", "overlaps the change that begins at %g s and takes %g s, got %g s",
				sorted[k-1].Start, sorted[k-1].Over, sorted[k].Start)
		}
	}
	m.Habitat.Changes = sorted
	if k := m.Habitat.Coning; !k.Still() && !(math.Abs(k.Period) >= leastPeriod) {
		c.fault("habitat.coning.period", "negative: against positive spin", "wants a time of at least %g s either way, got %g s", leastPeriod, k.Period)
	}
	if len(c.problems) == 0 {
		m.turn()
	}
}

func (c *checker) change(i int, x frame.Change) {
	if x.Over < leastOver || x.Over < leastShare*x.Start {
		c.fault(fmt.Sprintf("habitat.spin_change[%d].over", i), "", "wants at least %g s, got %g s", math.Max(leastOver, leastShare*x.Start), x.Over)
	}
}

// turn makes the motion of the habitat.
func (m *Model) turn() {
	m.rates = frame.NewRates(m.Habitat.Spin, m.Habitat.Changes)
	m.Motion = frame.NewMotion(m.rates, m.Habitat.Coning)
	if m.Swings() {
		m.Motion = pulled{m.Motion}
	}
}

// SpinAt is the spin rate at a time (s), rad/s.
func (m *Model) SpinAt(t float64) float64 {
	_, rate, _ := m.rates.At(t)
	return rate
}

// Turned is the angle by which the habitat has turned at a time (s) since t =
// 0, rad, as the projection along its axis at that time shows it; with a coning
// but for terms of the square of its half angle, which come and go.
func (m *Model) Turned(t float64) float64 {
	angle, _, _ := m.rates.At(t)
	if k := m.Habitat.Coning; !k.Still() {
		angle += 2 * math.Pi * t / k.Period * (1 - math.Cos(k.HalfAngle))
	}
	return angle
}

// SpinChanges says whether the spin rate changes at all.
func (m *Model) SpinChanges() bool { return !m.rates.Steady() }

// Cones says whether the axis does.
func (m *Model) Cones() bool { return !m.Habitat.Coning.Still() }

// Unsteady says whether what is at rest feels its loads change.
func (m *Model) Unsteady() bool { return m.SpinChanges() || m.Cones() || m.Swings() }

// Settled is when the last change of the spin is over, s; 0 without any.
func (m *Model) Settled() float64 { return m.rates.Settled() }

// GravityAt is the part along the plumb line, outward, of the apparent gravity
// at rest at a place at a time (s), m/s^2.
func (m *Model) GravityAt(t float64, p frame.Polar) float64 {
	if !m.Cones() && m.Ambient.None() {
		rate := m.SpinAt(t)
		return rate * rate * p.R
	}
	_, _, up := frame.LocalAt(p.Phi).Split(m.GravityVector(t, p.Vec()))
	return -up
}

// GravityVector is the apparent gravity at rest, the ambient one included, at a point (m) at a time (s),
// m/s^2, both in habitat components.
func (m *Model) GravityVector(t float64, pos r3.Vec) r3.Vec {
	a := m.Motion.At(t)
	return r3.Add(a.Apparent(frame.State{Pos: pos}).Sum(), m.AmbientAt(t, pos))
}
