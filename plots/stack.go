package plots

import (
	"errors"
	"fmt"
)

// StackChartSpec is what StackChart draws: panels above one another with one axis along.
type StackChartSpec struct {
	Title, Desc, Notes string // Desc is for readers who cannot see the figure; Notes may be empty

	Spin   float64   // rad/s; negative: the floor moves antispinward
	Spins  string    // stands in place of what is said of the spin, where it varies; may be empty
	Axis   string    // what runs along, with its unit
	X      []float64 // never decreasing; at least two different
	Legs   []LegSpan // stretches of X with names, in their order
	Named  bool      // the stretches say it all: no numbers stand along
	Panels []PanelSpec
}

// PanelSpec is a panel of a StackChart. One without any finite value is left out.
type PanelSpec struct {
	Title  string // what runs up, with its unit
	Most   float64
	Curves []CurveSpec
	Levels []Level
}

// CurveSpec is a line of a panel; Y has the length of X, and a NaN is a gap.
type CurveSpec struct {
	Name string
	Y    []float64
}

// Level is a line across a panel, such as a limit.
type Level struct {
	Name  string
	Value float64 // in the unit of the panel
}

// LegSpan is a stretch of the axis along, such as a leg of a crew path.
type LegSpan struct {
	Name     string
	From, To float64 // in the unit of the axis
}

func (s StackChartSpec) check() error {
	for i, x := range s.X {
		if !finite(x) || i > 0 && x < s.X[i-1] {
			return fmt.Errorf("value %d along, %g, is not finite or runs back", i, x)
		}
	}
	if n := len(s.X); n < 2 || s.X[n-1] == s.X[0] {
		return errors.New("wants at least two different values along")
	}
	if err := checkValues("along", len(s.X), s.X); err != nil {
		return err
	}
	for _, l := range s.Legs {
		if !finite(l.From) || !finite(l.To) || l.To < l.From {
			return fmt.Errorf("leg %q runs from %g to %g", l.Name, l.From, l.To)
		}
	}
	for _, p := range s.Panels {
		if err := p.check(len(s.X)); err != nil {
			return err
		}
	}
	return nil
}

func (p PanelSpec) check(n int) error {
	for _, c := range p.Curves {
		if err := checkValues(p.Title+" "+c.Name, n, c.Y); err != nil {
			return err
		}
	}
	for _, l := range p.Levels {
		if err := checkValues(l.Name, 1, []float64{l.Value}); err != nil || !finite(l.Value) {
			return fmt.Errorf("level %q of %g cannot be drawn", l.Name, l.Value)
		}
	}
	return nil
}

// StackChart draws panels above one another. It is an error if the values along are not
// in order, a curve has another length, or no panel has a finite value.
func StackChart(spec StackChartSpec) (*Figure, error) {
	head := headline{spec.Title, spec.Desc, spec.Notes, spec.Spin}
	if err := errors.Join(head.check(), spec.check()); err != nil {
		return nil, fmt.Errorf("chart: %w", err)
	}
	panels := spec.panels()
	if len(panels) == 0 {
		return nil, errors.New("chart: no panel has a finite value")
	}
	c := newLoads(spec, panels)
	return newFigure(spec.Title, spec.Desc, c.w, c.h, c.paint)
}

// panels are those with something to show.
func (s StackChartSpec) panels() (out []*panel) {
	for _, p := range s.Panels {
		q := &panel{title: p.Title, most: p.Most, levels: p.Levels, named: s.Named}
		for _, c := range p.Curves {
			if _, _, ok := span(c.Y); ok {
				q.curves = append(q.curves, curve{c.Name, s.X, c.Y, seriesPen(len(q.curves)), false})
			}
		}
		if len(q.curves) > 0 {
			out = append(out, q)
		}
	}
	return out
}
