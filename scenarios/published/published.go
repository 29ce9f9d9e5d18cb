// Package published holds the program against figures that were published
// outside of it: each check is a scenario in the format's own words, run as any
// other, and a figure that somebody printed.
//
// The checks are those that the program can run by itself. Its tests try more:
// other drag laws, independent integrators, laws of motion over random
// habitats.
//
// [Checks] lists them, a group after another; [Run] computes them, and a
// [Result] is a check beside what the program gives. Each names its source and
// how far it was seen. A tolerance follows from the digits that the source
// prints, or from how far measurements of the same thing lie apart, never from
// what the program happens to give. CHECKS.md is what offplumb selfcheck
// prints of them.
package published

import (
	"context"
	"fmt"
	"math"

	"offplumb/scenarios"
	"offplumb/sim/study"
)

// Check is a published figure and how the program comes to its own.
type Check struct {
	Group  string // what is checked
	Source string // who printed the figure; "from memory" and the like say how it was seen
	Name   string // which figure

	Unit      string
	Published float64 // in the unit
	Tolerance float64 // in the unit: what the source's precision or the model's known limit allows

	toml  string // the scenario; "": none is needed
	value func(*ran) float64
}

// Result is a check and what the program gives.
type Result struct {
	Check
	Computed float64 // in the unit; NaN where there was an error
	Err      error
}

// Difference is the computed figure less the published one.
func (r *Result) Difference() float64 { return r.Computed - r.Published }

// Held says whether the difference is within the tolerance.
func (r *Result) Held() bool { return r.Err == nil && math.Abs(r.Difference()) <= r.Tolerance }

// Checks lists the checks, those of a group one after another.
func Checks() []Check {
	var out []Check
	for _, group := range [][]Check{drops(), pucks(), catches(), small(), beads(), wheels(), radii(), people(), airs(), spheres(), raindrops(), globes(), rebounds(), energies()} {
		out = append(out, group...)
	}
	return out
}

// Run runs the checks, in order. It stops early, with the context's error,
// when the context ends.
func Run(ctx context.Context, checks []Check) ([]Result, error) {
	out := make([]Result, 0, len(checks))
	var last *ran
	for _, c := range checks {
		if err := ctx.Err(); err != nil {
			return nil, err
		}
		r := Result{Check: c, Computed: math.NaN()}
		if last == nil || last.toml != c.toml {
			last, r.Err = fly(ctx, c.toml)
		}
		if r.Err == nil {
			r.Computed, r.Err = last.take(c.value)
		}
		if r.Err != nil {
			last = nil
		}
		out = append(out, r)
	}
	return out, nil
}

// ran is a scenario that was run.
type ran struct {
	toml string
	*study.Prepared
	results []study.Result
}

// fly runs a scenario; of no text, none.
func fly(ctx context.Context, toml string) (*ran, error) {
	if toml == "" {
		return &ran{}, nil
	}
	sc, err := scenarios.Load("check.toml", []byte(toml), scenarios.Options{})
	if err != nil {
		return nil, err
	}
	p, problems := study.Prepare(sc.Model)
	if len(problems) > 0 {
		return nil, sc.Problems(problems)
	}
	results, err := p.Run(ctx, study.Options{Workers: 1})
	if err != nil {
		return nil, fmt.Errorf("running the check: %w", err)
	}
	return &ran{toml: toml, Prepared: p, results: results}, nil
}

// take works a figure out.
func (r *ran) take(value func(*ran) float64) (float64, error) {
	x := value(r)
	if math.IsNaN(x) {
		return x, fmt.Errorf("the scenario gives no value")
	}
	return x, nil
}
