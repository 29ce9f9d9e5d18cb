package study

import (
	"fmt"
	"strconv"

	"offplumb/sim/crew"
	"offplumb/sim/model"
)

// MaxSeries bounds the releases of one let-go series.
const MaxSeries = 10_000

// atEnd is the share of a path within which a release of a series is the one
// at its end: above the roundings of its length, below any stretch.
const atEnd = 1e-9

// Expand puts the releases of each let-go series in the place of the one that
// declares it: one at each stretch of the path, or of the time, from its start
// to its end, in order. It gives the releases, and for each the index of the one
// that it comes from. A path with faults is left to Prepare.
func Expand(m *model.Model, in []model.Release) (out []model.Release, from []int, problems []model.Problem) {
	for i := range in {
		r := &in[i]
		if r.Carried == nil || r.Carried.Every == 0 {
			out, from = append(out, *r), append(from, i)
			continue
		}
		series, problem := series(m, r)
		if problem.Msg != "" {
			problems = append(problems, under(fmt.Sprintf("release[%d]", i), problem)...)
		}
		for k := range series {
			out, from = append(out, series[k]), append(from, i)
		}
	}
	return out, from, problems
}

func series(m *model.Model, r *model.Release) ([]model.Release, model.Problem) {
	path, ok := m.PathNamed(r.Carried.Path)
	if !ok {
		return nil, model.Problem{}
	}
	plan, faults := crew.NewPlan(m, path)
	if len(faults) > 0 {
		return nil, model.Problem{}
	}
	whole, unit := plan.Length(), "m"
	if r.Carried.ByTime {
		whole, unit = plan.Duration(), "s"
	}
	if whole/r.Carried.Every > MaxSeries {
		return nil, model.Problem{Key: "carried.every", Msg: fmt.Sprintf("gives more than %d releases along %.6g %s", MaxSeries, whole, unit)}
	}
	var out []model.Release
	for k := 0; ; k++ {
		at := float64(k) * r.Carried.Every
		last := at >= whole*(1-atEnd)
		if last {
			at = whole
		}
		out = append(out, one(plan, r, at, unit))
		if last {
			return out, model.Problem{}
		}
	}
}

// one is the release of a series at a place along the path (m) or a time (s).
func one(plan *crew.Plan, r *model.Release, at float64, unit string) model.Release {
	c := *r.Carried
	c.Every, c.Time = 0, at
	if unit == "m" {
		c.Time = plan.TimeAlong(at)
	}
	out := *r
	out.Carried, out.Series = &c, r.Name
	out.Along = plan.At(c.Time).Along
	out.Name = fmt.Sprintf("%s at %s %s", r.Name, strconv.FormatFloat(at, 'g', 6, 64), unit)
	return out
}
