package measure

import (
	"math"
	"slices"

	"offplumb/sim/flight"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// passParts is into how many parts an integration step is cut to look for
// passings of a deck. In free flight the distance from the axis grows or
// falls along a whole step but for one turning point, so that a passing is
// missed only together with the return, when both lie in one part.
const passParts = 8

// fallParts is the same under ambient gravity, where the distance from the axis
// may rise and fall within a step: one that holds a whole fall.
const fallParts = 64

// FellThrough names the openings within which a track crossed the surface of
// their deck outward up to a time (s since the release), in the order of their
// decks and their passing, each once.
func FellThrough(m *model.Model, t *flight.Track, until float64) []string {
	var out []string
	var knots []float64
	for i := range m.Decks {
		if len(m.Decks[i].Openings) == 0 {
			continue
		}
		if knots == nil {
			knots = t.Knots()
		}
		for k := 1; k < len(knots) && knots[k-1] < until; k++ {
			out = passings(m, t, &m.Decks[i], knots[k-1], math.Min(knots[k], until), out)
		}
	}
	return out
}

// partsOf is into how many parts a stretch of a track is cut. An axis that cones
// goes round itself meanwhile.
func partsOf(m *model.Model, t *flight.Track, t0, t1 float64) float64 {
	if !m.Ambient.None() {
		return fallParts
	}
	if !m.Cones() {
		return passParts
	}
	omega, _ := m.Motion.Bounds(t.Begin+t0, t.Begin+t1)
	return math.Max(passParts, math.Ceil(omega*(t1-t0)/turnStep))
}

func passings(m *model.Model, t *flight.Track, d *model.Deck, t0, t1 float64, out []string) []string {
	if !m.Cones() && m.Ambient.None() && staysWithin(m, t, d.Radius, t0, t1) {
		return out
	}
	before, parts := t0, partsOf(m, t, t0, t1)
	for k := 1.0; k <= parts; k++ {
		now := t0 + (t1-t0)*k/parts
		if where(m, t, before).R <= d.Radius && where(m, t, now).R > d.Radius {
			p := where(m, t, crossing(m, t, d.Radius, before, now))
			if o := d.OpeningAt(p.Phi, p.Z); o != nil && !slices.Contains(out, o.Name) {
				out = append(out, o.Name)
			}
		}
		before = now
	}
	return out
}

// staysWithin says that a step of free flight that ends within a radius (m) does
// not pass it outward: where the distance from the axis neither grows nor falls,
// drag, of air that turns with the habitat, has no part along the radius, and
// the motion across it bends the distance upward. So it has no greatest value
// inside a step.
func staysWithin(m *model.Model, t *flight.Track, r, t0, t1 float64) bool {
	return t.Phases[t.PhaseAt(t0+(t1-t0)/2)].Kind == flight.Free && where(m, t, t1).R <= r
}

// crossing halves the stretch from a to b until it is one rounding wide.
func crossing(m *model.Model, t *flight.Track, r, a, b float64) float64 {
	for {
		mid := a + (b-a)/2
		if mid <= a || mid >= b {
			return b
		}
		if where(m, t, mid).R > r {
			b = mid
		} else {
			a = mid
		}
	}
}

// where gives the place of a track's centre in the habitat at a time.
func where(m *model.Model, t *flight.Track, time float64) frame.Polar {
	a := m.Motion.At(t.Begin + time)
	return frame.PolarOf(a.In(t.At(time).Pos))
}
