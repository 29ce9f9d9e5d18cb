package plots

import (
	"errors"
	"fmt"
	"math"

	"gonum.org/v1/plot/vg"
)

// DeflectionChartSpec is what DeflectionChart draws: the apparent deflection of one or
// more releases against height and against time, in two panels with one deflection axis.
type DeflectionChartSpec struct {
	Title, Desc, Notes string // Desc is for readers who cannot see the figure; Notes may be empty

	Spin   float64            // rad/s; negative: the floor moves antispinward
	Series []DeflectionSeries // at least one with a finite point
}

// DeflectionSeries is one release; the slices have one length. A NaN is a gap.
type DeflectionSeries struct {
	Name       string
	Time       []float64 // s since the release
	Height     []float64 // m above the deck
	Deflection []float64 // m, spinward positive
	AtLanding  float64   // m, stands beside the name; 0 or NaN for none
}

func (s DeflectionChartSpec) check() error {
	some := false
	for i, d := range s.Series {
		n := len(d.Deflection)
		if len(d.Time) != n || len(d.Height) != n {
			return fmt.Errorf("series %d, %q: %d times, %d heights, %d deflections", i, d.Name, len(d.Time), len(d.Height), n)
		}
		for _, values := range [][]float64{d.Time, d.Height, d.Deflection} {
			if err := checkValues(fmt.Sprintf("series %d, %q", i, d.Name), n, values); err != nil {
				return err
			}
		}
		for j := range n {
			some = some || finite(d.Time[j]) && finite(d.Height[j]) && finite(d.Deflection[j])
		}
	}
	if !some {
		return errors.New("no series has a finite point")
	}
	return nil
}

// DeflectionChart draws apparent deflection against height, and against time. It is an
// error if no series has a finite point, or its slices differ in length.
func DeflectionChart(spec DeflectionChartSpec) (*Figure, error) {
	head := headline{spec.Title, spec.Desc, spec.Notes, spec.Spin}
	if err := errors.Join(head.check(), spec.check()); err != nil {
		return nil, fmt.Errorf("deflection chart: %w", err)
	}
	c := newDeflection(spec)
	return newFigure(spec.Title, spec.Desc, c.w, c.h, c.paint)
}

// deflection is a deflection chart at work.
type deflection struct {
	sheet
	spin    float64
	heights panel
	times   panel
}

const (
	chartHigh  = 230.0 // pt, of a panel that stands alone in its column
	axisBelow  = 25.0  // pt below a panel, for numbers and the name of the axis
	titleAbove = 15.0  // pt above a panel, for its title
)

func newDeflection(spec DeflectionChartSpec) *deflection {
	plan := sheetPlan{title: spec.Title, notes: spec.Notes, strip: true}
	w, h := plan.room()
	c := &deflection{spin: spec.Spin}
	c.sheet = plan.lay(w, math.Min(h, chartHigh+axisBelow+titleAbove))
	unit, size := lengthUnit(largest(spec.Series))
	c.heights = panel{title: "apparent deflection, " + unit + ", spinward positive", unit: size}
	c.times = panel{unit: size, bare: true}
	var heights, times [][]float64
	for i, s := range spec.Series {
		heights, times = append(heights, s.Height), append(times, s.Time)
		c.heights.curves = append(c.heights.curves, curve{s.Name, s.Height, s.Deflection, seriesPen(i), true})
		c.times.curves = append(c.times.curves, curve{s.named(), s.Time, s.Deflection, seriesPen(i), true})
	}
	c.place(heights, times)
	return c
}

// named is the name with the apparent deflection, which the reader came for.
func (s DeflectionSeries) named() string {
	if finite(s.AtLanding) && s.AtLanding != 0 {
		return s.Name + ": " + signedLength(s.AtLanding)
	}
	return s.Name
}

// place sets the panels beside each other, the left one right of its numbers.
func (c *deflection) place(heights, times [][]float64) {
	box := c.win
	box.Min.Y += axisBelow
	box.Max.Y -= titleAbove
	h0, h1 := along(heights)
	t0, t1 := along(times)
	c.heights.set(box, h0, h1)
	box.Min.X += vg.Length(c.heights.leftNeed() + 6)
	const gap, overhang = 28, 8
	box.Max.X -= overhang
	mid := (box.Min.X + box.Max.X) / 2
	left, right := box, box
	left.Max.X, right.Min.X = mid-gap/2, mid+gap/2
	c.heights.set(left, h0, h1)
	c.times.set(right, t0, t1)
	c.heights.name(false)
	c.times.name(true)
}

// along is the range of an axis, from zero if that is near.
func along(values [][]float64) (lo, hi float64) {
	lo, hi, _ = span(values...)
	if lo > 0 && lo < 0.5*hi {
		lo = 0
	}
	if lo == hi {
		d := math.Max(math.Abs(lo)*0.1, 1e-3)
		return lo - d, hi + d
	}
	return lo, hi
}

// largest is the greatest apparent deflection, whichever its sign.
func largest(series []DeflectionSeries) float64 {
	most := 0.0
	for _, s := range series {
		if lo, hi, ok := span(s.Deflection); ok {
			most = math.Max(most, math.Max(math.Abs(lo), math.Abs(hi)))
		}
	}
	return most
}

func (c *deflection) paint(p *pad) {
	c.heights.paint(p, true)
	c.times.paint(p, true)
	for _, a := range []struct {
		q     *panel
		words string
	}{{&c.heights, "height above the deck, m"}, {&c.times, "time since the release, s"}} {
		at := xy((a.q.win.Min.X+a.q.win.Max.X).Points()/2, a.q.win.Min.Y.Points()-axisBelow+3)
		p.text(text{s: a.words, at: at, along: 0.5, size: sizeLabel, ink: inkText})
	}
	c.say(p, spinStatement(c.spin)+" Spinward is up in both panels; a dot is the last moment.", c.strip.Min.X.Points()-12, c.strip.Max.X.Points())
	c.sheet.draw(p)
}
