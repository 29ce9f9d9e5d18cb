package plots

import (
	"errors"
	"fmt"
	"math"
	"strings"
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
	X    []float64 // its own places along, never decreasing; nil: those of the chart
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
		if err := c.check(p.Title+" "+c.Name, n); err != nil {
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

// check wants n values, or as many as the curve has places of its own.
func (c CurveSpec) check(name string, n int) error {
	for i, x := range c.X {
		if !finite(x) || math.Abs(x) > maxValue || i > 0 && x < c.X[i-1] {
			return fmt.Errorf("%s: value %d along, %g, cannot be drawn or runs back", name, i, x)
		}
	}
	if c.X != nil {
		n = len(c.X)
	}
	return checkValues(name, n, c.Y)
}

// StackChart draws panels above one another. It is an error if the values along are not
// in order, a curve has another length, or no panel has a finite value.
func StackChart(spec StackChartSpec) (*Figure, error) {
	head := headline{spec.Title, spec.Desc, spec.Notes, spec.Spin}
	if err := errors.Join(head.check(), spec.check()); err != nil {
		return nil, fmt.Errorf("chart: %w", err)
	}
	panels, zero := spec.panels()
	if len(panels) == 0 {
		return nil, errors.New("chart: no panel has a finite value")
	}
	if len(zero) > 0 {
		spec.Notes = strings.TrimSpace(clean(spec.Notes) + " Zero throughout, and not drawn: " + strings.Join(zero, "; ") + ".")
	}
	c := newLoads(spec, panels)
	return newFigure(spec.Title, spec.Desc, c.w, c.h, c.paint)
}

// nothing is the size of a value, in the unit of its panel, that is rounding: it is far
// below what anything can show or anyone can feel.
const nothing = 1e-9

// panels are those with something to show, and the titles of those whose lines are zero
// throughout, unless all are.
func (s StackChartSpec) panels() (out []*panel, zero []string) {
	var all []*panel
	for _, p := range s.Panels {
		q := &panel{title: p.Title, most: p.Most, levels: p.Levels, named: s.Named}
		nought := true
		for i, c := range p.Curves {
			x := s.X
			if c.X != nil {
				x = c.X
			}
			if lo, hi, ok := span(c.Y); ok { // one line has the same pen in all panels
				q.curves = append(q.curves, curve{c.Name, x, c.Y, seriesPen(i), false})
				nought = nought && math.Max(-lo, hi) < nothing
			}
		}
		if len(q.curves) == 0 {
			continue
		}
		all = append(all, q)
		if nought && len(q.levels) == 0 {
			words, _, _ := strings.Cut(clean(q.title), ",")
			zero = append(zero, words)
			continue
		}
		out = append(out, q)
	}
	if len(out) == 0 {
		return all, nil
	}
	return out, zero
}
