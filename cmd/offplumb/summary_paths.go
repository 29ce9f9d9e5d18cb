package main

import (
	"math"
	"strings"

	"offplumb/sim/measure"
	"offplumb/sim/model"
	"offplumb/sim/table"
)

func (j *job) sumPaths(b *strings.Builder) {
	rows := [][]string{{"crew path", "person", "takes", "gravity at feet", "at head", "weight", "side load up to", "friction demand up to", "clearance"}}
	for i := range j.paths {
		if p := &j.paths[i]; !p.skipped {
			rows = append(rows, p.row())
		}
	}
	if len(rows) > 1 {
		block(b, "Crew paths", rows, 2, "crew/")
	}
	for i := range j.paths {
		if p := &j.paths[i]; !p.skipped {
			for _, words := range measure.Ladders(j.model(), p.plan, p.loads) {
				b.WriteString(wrapped("  "+words+".", "    "))
			}
		}
	}
}

func (p *pathResult) row() []string {
	nan := math.NaN()
	feet, head, weight := newRange(), newRange(), newRange()
	side, friction := nan, nan
	for i := range p.loads {
		l := &p.loads[i]
		feet.add(l.GravityFeet / model.StandardGravity)
		head.add(l.GravityHead / model.StandardGravity)
		weight.add(l.Weight)
		side = math.Max(orZero(side), math.Hypot(l.SideSpinward, l.SideAxial))
		if math.IsNaN(l.FrictionDemand) {
			friction = math.Inf(1)
		} else {
			friction = math.Max(orZero(friction), l.FrictionDemand)
		}
	}
	demand := table.Fixed(friction, 2)
	if math.IsInf(friction, 1) {
		demand = "none: no weight"
	}
	return []string{p.plan.Path.Name, p.plan.Crew.Name, withUnit(p.plan.Duration(), "s"), feet.String() + " g", head.String() + " g",
		weight.String() + " N", withUnit(side, "N"), demand, withUnit(p.clearance.Gap, "m")}
}
