package plots

import (
	"errors"
	"fmt"
)

// LoadsChartSpec is what LoadsChart draws: what a crew member feels along a crew path,
// in panels above one another with one time axis. Each slice has the length of Time, or
// is nil; a NaN or an infinity is a gap. A panel without any finite value is left out.
type LoadsChartSpec struct {
	Title, Desc, Notes string // Desc is for readers who cannot see the figure; Notes may be empty

	Spin         float64   // rad/s; negative: the floor moves antispinward
	Time         []float64 // s, never decreasing; at least two different
	Legs         []LegSpan // in order of time
	GravityFeet  []float64 // g, apparent gravity at the feet
	GravityWaist []float64 // g
	GravityHead  []float64 // g
	Weight       []float64 // N
	SideSpinward []float64 // N, side load, spinward positive
	SideAxial    []float64 // N, side load, +axial positive
	Friction     []float64 // friction demand, a ratio
	HeadCross    []float64 // rad/s², cross-coupled angular acceleration of the head
}

// LegSpan is a leg of a crew path.
type LegSpan struct {
	Name     string
	From, To float64 // s
}

func (s LoadsChartSpec) check() error {
	for i, t := range s.Time {
		if !finite(t) || i > 0 && t < s.Time[i-1] {
			return fmt.Errorf("time %d, %g s, is not finite or runs back", i, t)
		}
	}
	if n := len(s.Time); n < 2 || s.Time[n-1] == s.Time[0] {
		return errors.New("wants at least two different times")
	}
	if err := checkValues("time", len(s.Time), s.Time); err != nil {
		return err
	}
	for _, l := range s.Legs {
		if !finite(l.From) || !finite(l.To) || l.To < l.From {
			return fmt.Errorf("leg %q runs from %g s to %g s", l.Name, l.From, l.To)
		}
	}
	for _, c := range s.columns() {
		if err := checkValues(c.name, len(s.Time), c.y); err != nil {
			return err
		}
	}
	return nil
}

// columns are all the columns, by the panels they go to.
func (s LoadsChartSpec) columns() []loadColumn {
	return []loadColumn{
		{0, "feet", s.GravityFeet}, {0, "waist", s.GravityWaist}, {0, "head", s.GravityHead},
		{1, "", s.Weight},
		{2, "spinward", s.SideSpinward}, {2, "axial", s.SideAxial},
		{3, "", s.Friction},
		{4, "", s.HeadCross},
	}
}

type loadColumn struct {
	panel int
	name  string
	y     []float64
}

var loadTitles = [...]string{
	"apparent gravity, g",
	"weight, N",
	"side load, N, spinward and +axial positive",
	"friction demand, side load over weight",
	"cross-coupled angular acceleration of the head, rad/s²",
}

// mostFriction bounds the panel of friction demand, which runs off to infinity where
// the weight goes to zero: no dry contact gives more (common practice, no source).
const mostFriction = 2.0

// LoadsChart draws the loads along a crew path. It is an error if the times are not in
// order, a slice has another length than Time, or no panel has a finite value.
func LoadsChart(spec LoadsChartSpec) (*Figure, error) {
	head := headline{spec.Title, spec.Desc, spec.Notes, spec.Spin}
	if err := errors.Join(head.check(), spec.check()); err != nil {
		return nil, fmt.Errorf("loads chart: %w", err)
	}
	panels := spec.panels()
	if len(panels) == 0 {
		return nil, errors.New("loads chart: no panel has a finite value")
	}
	c := newLoads(spec, panels)
	return newFigure(spec.Title, spec.Desc, c.w, c.h, c.paint)
}

// panels are those with something to show.
func (s LoadsChartSpec) panels() (out []*panel) {
	for i, title := range loadTitles {
		q := &panel{title: title}
		if i == 3 {
			q.most = mostFriction
		}
		for _, c := range s.columns() {
			if _, _, ok := span(c.y); c.panel == i && ok {
				q.curves = append(q.curves, curve{c.name, s.Time, c.y, seriesPen(len(q.curves)), false})
			}
		}
		if len(q.curves) > 0 {
			out = append(out, q)
		}
	}
	return out
}
