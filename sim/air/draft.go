package air

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/interp"
)

// Draft is a steady motion of the air relative to the habitat, by height
// above the reference floor, which is its radius less the distance from the
// axis. Between the heights of its table each component is a monotone
// piecewise cubic (Fritsch & Butland, SIAM J. Sci. Stat. Comput. 5 (1984)
// 300-304), so that it overshoots nowhere and has no kinks there; beyond the
// ends it is that of the end. What keeps the draft up, and whether it is free
// of sources, is not asked.
type Draft struct {
	heights []float64
	along   [3]interp.FritschButland
	table   [3][]float64
}

// Components of a draft, in the local directions.
const (
	Spinward = iota
	Axial
	Up
)

// UniformDraft is the same at all heights: speeds (m/s) in the local directions.
func UniformDraft(spinward, axial, up float64) *Draft {
	return &Draft{table: [3][]float64{{spinward}, {axial}, {up}}}
}

// NewDraft makes a draft of speeds (m/s), spinward, axial and up, at heights
// (m), which grow. A nil list is none that way.
func NewDraft(heights []float64, speeds [3][]float64) (*Draft, error) {
	if len(heights) < 2 {
		return nil, fmt.Errorf("a draft by height wants two heights or more, got %d", len(heights))
	}
	for i := 1; i < len(heights); i++ {
		if !(heights[i] > heights[i-1]) {
			return nil, fmt.Errorf("heights have to grow, got %g m after %g m", heights[i], heights[i-1])
		}
	}
	d := &Draft{heights: heights}
	for c := range speeds {
		ys := speeds[c]
		if ys == nil {
			ys = make([]float64, len(heights))
		}
		if len(ys) != len(heights) {
			return nil, fmt.Errorf("wants a speed for each of %d heights, got %d", len(heights), len(ys))
		}
		d.table[c] = ys
		if err := d.along[c].Fit(heights, ys); err != nil {
			return nil, fmt.Errorf("draft: %w", err)
		}
	}
	return d, nil
}

// At gives the speeds in the local directions (m/s) at a height (m), and their
// rates with it (1/s).
func (d *Draft) At(height float64) (speed, rate [3]float64) {
	n := len(d.heights)
	for c := range speed {
		switch ys := d.table[c]; {
		case n == 0:
			speed[c] = ys[0]
		case height <= d.heights[0]:
			speed[c] = ys[0]
		case height >= d.heights[n-1]:
			speed[c] = ys[n-1]
		default:
			speed[c], rate[c] = d.along[c].Predict(height), d.along[c].PredictDerivative(height)
		}
	}
	return speed, rate
}

// Heights are those of the table, m; none for a uniform draft.
func (d *Draft) Heights() []float64 { return d.heights }

// Fastest bounds the speed of the draft, m/s: no component exceeds that at the
// ends of its piece.
func (d *Draft) Fastest() float64 {
	most := 0.0
	for i := range d.table[0] {
		for k := max(0, i-1); k <= i; k++ {
			square := 0.0
			for c := range d.table {
				x := math.Max(math.Abs(d.table[c][i]), math.Abs(d.table[c][k]))
				square += x * x
			}
			most = math.Max(most, math.Sqrt(square))
		}
	}
	return most
}

// Steepest bounds how fast the draft changes with height, 1/s: the slope of a
// monotone cubic is at most three times that between the ends of its piece
// (Fritsch & Butland 1984).
func (d *Draft) Steepest() float64 {
	most := 0.0
	for i := 1; i < len(d.heights); i++ {
		square := 0.0
		for c := range d.table {
			x := 3 * (d.table[c][i] - d.table[c][i-1]) / (d.heights[i] - d.heights[i-1])
			square += x * x
		}
		most = math.Max(most, math.Sqrt(square))
	}
	return most
}
