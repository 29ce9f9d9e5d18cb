package measure

import (
	"offplumb/sim/crew"
	"offplumb/sim/model"
)

// Load is what a person feels and exerts at one instant, with its place for
// the tables. SI units.
type Load struct {
	crew.Loads
	Leg         string
	Arc, Height float64
}

// LoadSeries gives the loads along a path at the output step, its end last,
// and the step taken.
func LoadSeries(m *model.Model, p *crew.Plan) ([]Load, float64) {
	times, step := Times(p.Duration(), m.Output.Step)
	deck := m.Decks[p.Deck].Radius
	out := make([]Load, len(times))
	for i, t := range times {
		l := p.Loads(m, t)
		out[i] = Load{Loads: l, Leg: p.LegName(l.Feet.Leg), Arc: deck * l.Feet.Phi, Height: deck - l.Feet.R}
	}
	return out, step
}
