package plots

import (
	"errors"
	"fmt"
	"math"
	"slices"
)

// ScatterPlanSpec is what ScatterPlan draws: where the samples of a scatter landed on
// the plan of a deck. Places are in m, as those of the deck are.
type ScatterPlanSpec struct {
	Deck    DeckPlanSpec   // with the title; its Releases and Paths are not looked at
	Foot    Point          // of the plumb line under the release
	NoFoot  bool           // there is no single release: Foot is not looked at
	Median  *Point         // of the landings; nil without any
	Groups  []ScatterGroup // at most MostDots places in all
	Landed  int            // how many landings there are, drawn or not
	Ellipse *PlanEllipse   // nil: none
	Contour [][]Point      // closed outlines; of one with Line a stretch
	Line    bool           // the contour is a stretch of a line
	Words   []string       // figures, beside the plan
}

// ScatterGroup is landings of one kind, such as those on one surface.
type ScatterGroup struct {
	Name   string // with its figures
	Places []Point
}

// PlanEllipse is an ellipse on a plan.
type PlanEllipse struct {
	Centre       Point   // m
	Major, Minor float64 // m, semi-axes
	Angle        float64 // rad, of the major axis, from spinward toward +axial
}

// MostDots is how many landings can be drawn: more would run into one another. The first
// samples stand for the others; every second or third would not, of samples that are
// spread by a rule.
const MostDots = 3000

func (s ScatterPlanSpec) check() error {
	if err := s.Deck.check(); err != nil {
		return err
	}
	if err := checkPlaces([]Point{s.Foot}, s.Median); err != nil {
		return err
	}
	n := 0
	for _, g := range s.Groups {
		if err := checkPlaces(g.Places); err != nil {
			return fmt.Errorf("group %q: %w", g.Name, err)
		}
		n += len(g.Places)
	}
	if n > MostDots {
		return fmt.Errorf("%d landings are too many to draw", n)
	}
	for _, c := range s.Contour {
		if err := checkPlaces(c); err != nil {
			return fmt.Errorf("contour: %w", err)
		}
	}
	if e := s.Ellipse; e != nil && (!sane(e.Centre) || !sane(Point{e.Major, e.Minor}) || !finite(e.Angle) || e.Major < 0 || e.Minor < 0) {
		return errors.New("the ellipse cannot be drawn")
	}
	return nil
}

// ScatterPlan draws the landings of a scatter on the plan of a deck at true scale: a
// mark each, shapes telling groups apart, the ellipse and the contour as lines.
func ScatterPlan(spec ScatterPlanSpec) (*Figure, error) {
	d := &spec.Deck
	d.Releases, d.Paths = nil, nil
	head := headline{d.Title, d.Desc, d.Notes, d.Spin}
	if err := errors.Join(head.check(), spec.check()); err != nil {
		return nil, fmt.Errorf("plan of a scatter: %w", err)
	}
	s := scatterPlan{plan: plan{spec: spec.Deck}, of: spec}
	s.arrange()
	return newFigure(d.Title, d.Desc, s.w, s.h, s.paint)
}

// outline gives the ellipse as a closed polyline.
func (e *PlanEllipse) outline() []Point {
	const corners = 96 // within 0.05 % of the major axis of the curve
	out := make([]Point, corners+1)
	for i := range out {
		sin, cos := math.Sincos(2 * math.Pi * float64(i) / corners)
		out[i] = Point{e.Major * cos, e.Minor * sin}.turned(e.Angle).add(e.Centre)
	}
	return out
}

// shownShare is the share of the landings that the plan must show, along each axis: a
// few far off would shrink the others to a spot.
const shownShare = 0.99

// matters is the part of the plan with the foot, the outlines and nearly all landings.
func (s *scatterPlan) matters() (a area) {
	if !s.of.NoFoot {
		a.add(s.of.Foot)
	}
	if e := s.of.Ellipse; e != nil {
		a.add(e.outline()...)
	}
	for _, c := range s.of.Contour {
		a.add(c...)
	}
	var x, y []float64
	for _, g := range s.of.Groups {
		for _, p := range g.Places {
			x, y = append(x, p.X), append(y, p.Y)
		}
	}
	if len(x) > 0 {
		slices.Sort(x)
		slices.Sort(y)
		low := int(float64(len(x)) * (1 - shownShare) / 2)
		high := len(x) - 1 - low
		a.add(Point{x[low], y[low]}, Point{x[high], y[high]})
	}
	return a
}
