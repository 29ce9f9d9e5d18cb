package plots

import (
	"errors"
	"fmt"
	"math"
)

// DeckPlanSpec is what DeckPlan draws: one deck unrolled, seen from above. Places are
// in m: X is arc along the deck, spinward, Y is axial.
type DeckPlanSpec struct {
	Title, Desc, Notes string // Desc is for readers who cannot see the figure; Notes may be empty

	Spin     float64       // rad/s; negative: the floor moves antispinward
	Radius   float64       // m; 0 for a flat deck
	Round    bool          // the deck goes all the way round: the arcs of From and To are not looked at
	From, To Point         // m, corners of the deck with the least and the greatest coordinates; axial 0 to 0 is unbounded
	Openings []PlanOpening // openings in this deck
	Fixtures []PlanFixture // what stands on it
	Releases []PlanRelease // in the order of their numbers
	Paths    []PlanPath    // crew paths on it; may be empty
}

// PlanOpening is an opening of a deck.
type PlanOpening struct {
	Name    string
	Centre  Point // m
	Size    Point // m, spinward and axial
	Coaming bool  // a rim stands around it
	Closed  bool  // a lid is in it
}

// PlanFixture is the footprint of a fixture.
type PlanFixture struct {
	Name string
	Path []Point // m, corners in order; the path closes itself
}

// PlanRelease is a release over a deck and where it lands. Arcs run on: a landing one
// lap spinward lies one circumference beyond the release.
type PlanRelease struct {
	Name    string
	At      Point  // m, foot of the plumb line
	Landing *Point // m; nil if it does not land
	Surface string // what it lands on; may be empty
}

// PlanPath is the way of the feet of a crew path, in order of time. Arcs run on, as those
// of a landing do.
type PlanPath struct {
	Name   string
	Points []Point // m; one for a path that stays over its place
}

func (s DeckPlanSpec) check() error {
	if err := checkSizes(s.Radius); err != nil {
		return err
	}
	switch {
	case s.Radius < 0:
		return fmt.Errorf("the deck's radius is %g m", s.Radius)
	case s.Round && s.Radius == 0:
		return errors.New("a deck that goes round wants a radius")
	case !sane(s.From) || !sane(s.To) || s.From.Y > s.To.Y || !s.Round && s.From.X > s.To.X:
		return fmt.Errorf("the deck runs from (%g, %g) m to (%g, %g) m", s.From.X, s.From.Y, s.To.X, s.To.Y)
	}
	for _, o := range s.Openings {
		if !sane(o.Centre) || !sane(o.Size) || o.Size.X <= 0 || o.Size.Y <= 0 {
			return fmt.Errorf("opening %q: (%g, %g) m wide cannot be drawn", o.Name, o.Size.X, o.Size.Y)
		}
	}
	for _, f := range s.Fixtures {
		if err := checkPlaces(f.Path); err != nil {
			return fmt.Errorf("fixture %q: %w", f.Name, err)
		}
	}
	for _, r := range s.Releases {
		if err := checkPlaces([]Point{r.At}, r.Landing); err != nil {
			return fmt.Errorf("release %q: %w", r.Name, err)
		}
	}
	return checkPaths(s.Paths)
}

func checkPaths(paths []PlanPath) error {
	for _, p := range paths {
		if len(p.Points) == 0 {
			return fmt.Errorf("path %q has no points", p.Name)
		}
		if err := checkPlaces(p.Points); err != nil {
			return fmt.Errorf("path %q: %w", p.Name, err)
		}
	}
	return nil
}

// DeckPlan draws a deck unrolled, with what was released over it and where that landed.
// A deck that is long for its breadth is cropped to what matters, and the figure says so.
func DeckPlan(spec DeckPlanSpec) (*Figure, error) {
	head := headline{spec.Title, spec.Desc, spec.Notes, spec.Spin}
	if err := errors.Join(head.check(), spec.check()); err != nil {
		return nil, fmt.Errorf("deck plan: %w", err)
	}
	p := plan{spec: spec}
	if err := p.arrange(); err != nil {
		return nil, fmt.Errorf("deck plan: %w", err)
	}
	return newFigure(spec.Title, spec.Desc, p.w, p.h, p.paint)
}

// circumference is the arc of a lap, m; 0 if the deck has no laps.
func (s DeckPlanSpec) circumference() float64 {
	if !s.Round {
		return 0
	}
	return 2 * math.Pi * s.Radius
}
