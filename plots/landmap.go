package plots

import (
	"errors"
	"fmt"
)

// MapPlanSpec is what MapPlan draws: a figure of each place of a deck, such as how many
// things land there, on the plan of the deck. Places are in m, as those of the deck are.
type MapPlanSpec struct {
	Deck      DeckPlanSpec // with the title; its Releases and Paths are not looked at
	Of        string       // what is shown, with its unit, above the bar of shades
	Layers    []MapLayer   // at most MostLayers, from the least: each lies within the one before
	Footprint [][]Point    // closed outlines; drawn as the strong line
	Strong    string       // its name; empty: footprint
	Region    [][]Point    // closed outlines of where things are let go
	Mark      *Point       // what stands out; nil: nothing
	MarkWords string
	Words     []string // figures, beside the plan
}

// MapLayer is where a figure has at least some value. Outlines are closed, those around
// holes run the other way round.
type MapLayer struct {
	Label    string // of its shade: from where to where, with the unit
	Short    string // of its outline: the least value; empty: not named
	Outlines [][]Point
}

// MostLayers is how many shades can be told apart, in grey too.
const MostLayers = 6

func (s MapPlanSpec) check() error {
	if err := s.Deck.check(); err != nil {
		return err
	}
	if len(s.Layers) == 0 || len(s.Layers) > MostLayers {
		return fmt.Errorf("%d shades cannot be drawn", len(s.Layers))
	}
	for _, l := range s.Layers {
		if err := checkLoops(l.Outlines); err != nil {
			return fmt.Errorf("shade %q: %w", l.Label, err)
		}
	}
	return errors.Join(checkLoops(s.Footprint), checkLoops(s.Region), checkPlaces(nil, s.Mark))
}

func checkLoops(loops [][]Point) error {
	for _, l := range loops {
		if err := checkPlaces(l); err != nil {
			return err
		}
	}
	return nil
}

// MapPlan draws a map of a deck at true scale: shades, with the outlines of their steps
// as lines that bear their value, the footprint of all as one strong line, and where
// things were let go as a dashed one.
func MapPlan(spec MapPlanSpec) (*Figure, error) {
	d := &spec.Deck
	d.Releases, d.Paths = nil, nil
	head := headline{d.Title, d.Desc, d.Notes, d.Spin}
	if err := errors.Join(head.check(), spec.check()); err != nil {
		return nil, fmt.Errorf("map of a deck: %w", err)
	}
	s := mapPlan{scatterPlan: scatterPlan{plan: plan{spec: spec.Deck}, of: ScatterPlanSpec{Deck: spec.Deck, Words: spec.Words}}, of: spec}
	s.arrange()
	return newFigure(d.Title, d.Desc, s.w, s.h, s.paint)
}

// must is the part of the plan with all that the map shows.
func (s *mapPlan) must() (a area) {
	for _, loops := range [][][]Point{s.of.Layers[0].Outlines, s.of.Footprint, s.of.Region} {
		for _, l := range loops {
			a.add(l...)
		}
	}
	if s.of.Mark != nil {
		a.add(*s.of.Mark)
	}
	return a
}
