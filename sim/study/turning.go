package study

import (
	"math"

	"offplumb/sim/measure"
)

// Turnings gives how the habitat turns as long as anything moves in it, and
// until its last change and a swing after it are over, as far as the longest
// time of a release reaches.
func (p *Prepared) Turnings(results []Result) []measure.Turning {
	m := p.Model
	end := m.Settled() + math.Max(m.Motion.Stretch(m.Settled()).Period, m.Output.Step)
	end = math.Min(end, math.Max(m.Solver.MaxTime, m.Output.Step))
	for i := range results {
		if r := &results[i]; r.done {
			end = math.Max(end, p.Lets[i].Begin+r.Rest.Time)
		}
	}
	for _, plan := range p.Plans {
		end = math.Max(end, plan.Path.Time+plan.Duration())
	}
	return measure.Turnings(m, end)
}
