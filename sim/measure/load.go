package measure

import (
	"gonum.org/v1/gonum/integrate/quad"
	"offplumb/sim/crew"
	"offplumb/sim/model"
)

// Load is what a person feels and exerts at one instant, with its place for
// the tables. SI units.
type Load struct {
	crew.Loads
	Leg         string
	Arc, Height float64
	Work        float64 // J, of the support's force since the start of the path
}

// powerNodes is the order of the quadrature of the power over an output step,
// in which it is smooth but where a ramp begins or ends.
const powerNodes = 4

// LoadSeries gives the loads along a path at the output step, its end last,
// and the step taken.
func LoadSeries(m *model.Model, p *crew.Plan) ([]Load, float64) {
	times, step := Times(p.Duration(), m.Output.Step)
	deck := m.Decks[p.Deck].Radius
	out := make([]Load, len(times))
	power := func(t float64) float64 { return p.Loads(m, t).Power }
	work := 0.0
	for i, t := range times {
		if i > 0 {
			work += quad.Fixed(power, times[i-1], t, powerNodes, nil, 0)
		}
		l := p.Loads(m, t)
		out[i] = Load{Loads: l, Leg: p.LegName(l.Feet.Leg), Arc: deck * l.Feet.Phi, Height: deck - l.Feet.R, Work: work}
	}
	return out, step
}
