package measure

import (
	"math"
	"slices"
)

// reaches says whether a flight reaches a goal.
func (c *LandMap) reaches(goal int, f *MapFlight) bool {
	g := &c.Map.Goals[goal]
	if g.Opening != "" {
		return slices.Contains(f.Through, g.Opening)
	}
	if f.Fate != ShotLanded {
		return false
	}
	hit := func(s *Spot) bool {
		if len(g.Surfaces) > 0 {
			return slices.Contains(g.Surfaces, s.Surface)
		}
		z := &c.zones[goal]
		round := 0.0
		if c.m.FlatDeck(z.Deck) == nil {
			round = 2 * math.Pi * c.m.Decks[z.Deck].Radius
		}
		return s.Deck == c.m.Decks[z.Deck].Name && z.Holds(s.Spinward, s.Axial, round)
	}
	return hit(&f.First.Spot) || f.Rest != nil && hit(f.Rest)
}

// Reached is the share of the directions from a place and height (by its
// number) that reach a goal; NaN where the body has no room.
func (c *LandMap) Reached(goal, place int) float64 {
	if !c.free[place] {
		return math.NaN()
	}
	return float64(c.reached[goal][place]) / float64(len(c.Directions))
}

// MostReached is, for each place of each patch, the greatest share of the
// directions that reach a goal, of all heights; NaN where the body has room at
// none.
func (c *LandMap) MostReached(goal int) [][]float64 {
	out := make([][]float64, len(c.Patches))
	n := 0
	for i := range c.Patches {
		out[i] = make([]float64, c.Patches[i].Count())
		for k := range out[i] {
			best := math.NaN()
			for range c.Map.Heights {
				if x := c.Reached(goal, n); !(x <= best) && !math.IsNaN(x) {
					best = x
				}
				n++
			}
			out[i][k] = best
		}
	}
	return out
}
