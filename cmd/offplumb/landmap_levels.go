package main

import (
	"math"
	"slices"

	"offplumb/plots"
)

// bandWords says from where to where a shade goes.
func bandWords(levels []float64, i int, values []float64, unit string) string {
	low, high := given(levels[i]), ""
	least, most := rangeOf(values)
	if i+1 < len(levels) {
		high = given(levels[i+1])
	} else {
		high = sigfig(most, 3)
	}
	if i == 0 {
		low = sigfig(least, 3)
	}
	if low == high {
		return low + " " + unit
	}
	return low + " to " + high + " " + unit
}

// rangeOf is the least and the greatest of the values that are some.
func rangeOf(values []float64) (low, high float64) {
	low, high = math.Inf(1), math.Inf(-1)
	for _, x := range values {
		if !math.IsNaN(x) {
			low, high = math.Min(low, x), math.Max(high, x)
		}
	}
	return low, high
}

// roundDown is the next of 1, 2 and 5 times a power of ten, below or at a number
// above 0.
func roundDown(x float64) float64 {
	power := math.Pow(10, math.Floor(math.Log10(x)))
	for _, lead := range []float64{5, 2} {
		if x >= lead*power*(1-1e-12) {
			return lead * power
		}
	}
	return power
}

// doublings are levels that grow by half to one and a half each, up to the
// greatest value, the first being the least value.
func doublings(values []float64) []float64 {
	low, high := rangeOf(values)
	var down []float64
	for level := roundDown(high); level > low && len(down) < plots.MostLayers-1; level = roundDown(level * 0.55) {
		down = append(down, level)
	}
	slices.Reverse(down)
	return append([]float64{low}, down...)
}

// leastStep is the share of a step that the uppermost band has at least.
const leastStep = 0.1

// evenSteps are levels a round step apart, the first being the least value.
func evenSteps(values []float64) []float64 {
	low, high := rangeOf(values)
	out := []float64{low}
	if !(high-low > 1e-6*high) {
		return out
	}
	step := roundDown((high - low) / (plots.MostLayers - 1))
	for (high-low)/step > plots.MostLayers-1 {
		step = nextRound(step)
	}
	for k := math.Floor(low/step) + 1; k*step < high-leastStep*step && len(out) < plots.MostLayers; k++ {
		out = append(out, k*step)
	}
	return out
}

// nextRound is the next greater of 1, 2 and 5 times a power of ten.
func nextRound(x float64) float64 {
	if lead := x / math.Pow(10, math.Floor(math.Log10(x*(1+1e-9)))); lead < 1.5 || lead > 4 {
		return 2 * x
	}
	return 2.5 * x
}
