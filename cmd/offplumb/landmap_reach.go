package main

import (
	"fmt"
	"math"

	"offplumb/plots"
	"offplumb/sim/measure"
)

// reachLevels are the shares of directions whose outlines are drawn.
var reachLevels = []float64{0.2, 0.4, 0.6, 0.8, 1}

// mapReach draws from where something is reached, on the plan of the deck
// beneath the first place: the greatest share of all heights.
func (j *job) mapReach(s *mapResult, goal int) (*plots.Figure, error) {
	c := s.land
	name := c.Goals[goal].Name
	deck, _, _ := measure.Stand(j.model(), c.Place(0))
	spec := plots.MapPlanSpec{Deck: j.mapSheet(deck), Of: "% of the directions that reach " + name}
	if len(s.of.Heights) > 1 {
		spec.Of += ", at the height with most"
	}
	most := c.MostReached(goal)
	levels := []float64{math.SmallestNonzeroFloat64}
	if s.of.Speed > 0 {
		levels = append(levels, reachLevels...)
	} else {
		spec.Of = "where a drop reaches " + name
	}
	for i, level := range levels {
		loops := j.reachLoops(s, most, level, deck)
		if len(loops) == 0 && i > 0 {
			break
		}
		spec.Layers = append(spec.Layers, plots.MapLayer{Label: shareBand(levels, i), Short: given(100*level) + " %", Outlines: loops})
	}
	spec.Region = j.mapRegion(s, deck)
	j.zoneOutline(s, goal, deck, &spec)
	spec.Words = []string{s.reach(goal), s.ways()}
	spec.Deck.Title = fmt.Sprintf("%s: from where %q is reached", s.of.Name, name)
	spec.Deck.Notes = fromAbove(j.flatNamed(deck)) + fmt.Sprintf(" Squares of %s m, each about a place where things are let go. Dashed: all such places. Without shade: not reached.", given(s.of.Step))
	spec.Deck.Desc = described("Plan of %q with the places from which %s is reached. %s.", deck, name, s.reach(goal))
	return plots.MapPlan(spec)
}

func shareBand(levels []float64, i int) string {
	switch {
	case len(levels) == 1:
		return "reaches it"
	case i == 0:
		return "below " + given(100*levels[1]) + " %"
	case levels[i] == 1:
		return "all"
	}
	return fmt.Sprintf("%s to %s %%", given(100*levels[i]), given(100*levels[i+1]))
}

// reachLoops outlines the places with at least a share, on the plan of a deck.
func (j *job) reachLoops(s *mapResult, most [][]float64, level float64, deck string) (out [][]plots.Point) {
	for i := range s.land.Patches {
		p := &s.land.Patches[i]
		var at [][2]int32
		for k, x := range most[i] {
			if x >= level {
				at = append(at, [2]int32{int32(k % p.N[0]), int32(k / p.N[0])})
			}
		}
		for _, loop := range measure.Outlines(at) {
			var path []plots.Point
			for _, q := range loop {
				place, ok := j.planned(p.Edge(j.model(), int(q[0]), int(q[1])), deck, path)
				if !ok {
					path = nil
					break
				}
				path = append(path, place)
			}
			if path != nil {
				out = append(out, path)
			}
		}
	}
	return out
}

// zoneOutline draws a zone that is to be reached as the strong line.
func (j *job) zoneOutline(s *mapResult, goal int, deck string, spec *plots.MapPlanSpec) {
	r := s.of.Goals[goal].Zone
	if r == nil {
		return
	}
	z := j.model().ZoneOf(r)
	if j.model().Decks[z.Deck].Name != deck || z.Round {
		return
	}
	spec.Strong = s.of.Goals[goal].Name
	spec.Footprint = [][]plots.Point{{{X: z.Spinward[0], Y: z.Axial[0]}, {X: z.Spinward[1], Y: z.Axial[0]}, {X: z.Spinward[1], Y: z.Axial[1]}, {X: z.Spinward[0], Y: z.Axial[1]}}}
}
