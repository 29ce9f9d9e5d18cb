package study

import (
	"fmt"

	"offplumb/sim/crew"
	"offplumb/sim/flight"
	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// Prepared is a scenario ready to run: its crew paths and releases worked
// out, its limits matched with what they judge.
type Prepared struct {
	Model  *model.Model
	Plans  []*crew.Plan // of each crew path
	Lets   []flight.Let // of each release
	Limits []measure.Criterion

	keep []bool // of each release: its track is wanted
}

// Prepare works out the crew paths and the start of every release, and checks
// the limits. The problems have keys from the root of the scenario.
func Prepare(m *model.Model) (*Prepared, []model.Problem) {
	p := &Prepared{Model: m}
	problems := p.plans()
	if len(problems) == 0 {
		problems = p.lets()
	}
	limits, more := measure.Criteria(m)
	p.Limits = limits
	if problems = append(problems, more...); len(problems) > 0 {
		return nil, problems
	}
	p.keep = make([]bool, len(p.Lets))
	for i := range p.Lets {
		p.keep[i] = !p.Lets[i].Release.NoTrack // those of a series are needed for its table
	}
	for i := range p.Limits {
		p.Limits[i].NeedTracks(p.keep)
	}
	return p, nil
}

func (p *Prepared) plans() (problems []model.Problem) {
	for i := range p.Model.Paths {
		plan, faults := crew.NewPlan(p.Model, &p.Model.Paths[i])
		problems = append(problems, under(fmt.Sprintf("crew_path[%d]", i), faults...)...)
		p.Plans = append(p.Plans, plan)
	}
	return problems
}

func (p *Prepared) lets() (problems []model.Problem) {
	for i := range p.Model.Releases {
		r := &p.Model.Releases[i]
		let, fault := flight.Release(p.Model, r, p.carrier(r))
		if fault.Msg != "" {
			problems = append(problems, under(fmt.Sprintf("release[%d]", i), fault)...)
		}
		p.Lets = append(p.Lets, let)
	}
	return problems
}

// carrier is the plan that carries a release, or nil.
func (p *Prepared) carrier(r *model.Release) *crew.Plan {
	if r.Carried == nil {
		return nil
	}
	for i := range p.Model.Paths {
		if p.Model.Paths[i].Name == r.Carried.Path {
			return p.Plans[i]
		}
	}
	return nil
}

// under puts problems below a key.
func under(key string, problems ...model.Problem) []model.Problem {
	for i := range problems {
		problems[i].Key = key + "." + problems[i].Key
	}
	return problems
}
