package plots

import (
	"math"
	"strconv"
	"strings"

	"gonum.org/v1/plot"
)

// stepFor is the smallest of 1, 2, 5 times a power of ten that divides span into at
// most n parts; 0 if span is not a positive finite number.
func stepFor(span float64, n int) float64 {
	raw := span / float64(max(1, n))
	if !(raw > 0) || math.IsInf(raw, 0) {
		return 0
	}
	pow := math.Pow(10, math.Floor(math.Log10(raw)))
	for _, k := range []float64{1, 2, 5} {
		if k*pow >= raw*(1-1e-9) {
			return k * pow
		}
	}
	return 10 * pow
}

// roundBelow is the greatest of 1, 2, 5 times a power of ten that does not exceed v > 0.
func roundBelow(v float64) float64 {
	pow := math.Pow(10, math.Floor(math.Log10(v)))
	for _, k := range []float64{5, 2} {
		if k*pow <= v*(1+1e-9) {
			return k * pow
		}
	}
	return pow
}

// Ticks gives the multiples of a round step (1, 2, 5 times a power of ten) from min to
// max, both included to a part in 1e9 of the step, in at most n intervals, and the step.
// They are nil if min to max is not a finite range above zero.
func Ticks(min, max float64, n int) (ticks []float64, step float64) {
	step = stepFor(max-min, n)
	if step == 0 {
		return nil, 0
	}
	const slack = 1e-9
	first, last := math.Ceil(min/step-slack), math.Floor(max/step+slack)
	for i := 0; first+float64(i) <= last && i <= 2*n+2; i++ {
		ticks = append(ticks, (first+float64(i))*step)
	}
	return ticks, step
}

// tickText prints a tick with the digits that its step calls for.
func tickText(v, step float64) string {
	exp := int(math.Floor(math.Log10(step) + 1e-9))
	if biggest := math.Abs(v); exp < -5 || biggest >= 1e6 {
		s := strconv.FormatFloat(v, 'g', 6, 64)
		s = strings.Replace(s, "e+0", "e", 1)
		s = strings.Replace(s, "e+", "e", 1)
		s = strings.Replace(s, "e-0", "e-", 1)
		return strings.ReplaceAll(s, "-", minus)
	}
	return decimals(v, max(0, -exp))
}

// roundTicker is a plot.Ticker of round numbers, in at most n intervals. unit divides
// the values before they are printed, for an axis in mm of data in m; 0 means 1.
type roundTicker struct {
	n    int
	unit float64
}

var _ plot.Ticker = roundTicker{}

// Ticks implements plot.Ticker.
func (t roundTicker) Ticks(min, max float64) []plot.Tick {
	unit := t.unit
	if unit == 0 {
		unit = 1
	}
	values, step := Ticks(min/unit, max/unit, t.n)
	ticks := make([]plot.Tick, len(values))
	for i, v := range values {
		ticks[i] = plot.Tick{Value: v * unit, Label: tickText(v, step)}
	}
	return ticks
}

// roundOut widens min to max to whole steps, so that an axis begins and ends on a tick
// unless that would add more than a third of a step of empty paper.
func roundOut(min, max float64, n int) (lo, hi float64) {
	if min == max {
		d := math.Max(math.Abs(min)*0.1, 1e-3)
		min, max = min-d, max+d
	}
	_, step := Ticks(min, max, n)
	if step == 0 {
		return min, max
	}
	pad := (max - min) * 0.04
	lo, hi = min-pad, max+pad
	if down := math.Floor(min/step+1e-9) * step; min-down < 0.35*step {
		lo = down
	}
	if up := math.Ceil(max/step-1e-9) * step; up-max < 0.35*step {
		hi = up
	}
	return lo, hi
}
