package main

import (
	"cmp"
	"context"
	"fmt"
	"math"
	"slices"
	"strings"

	"offplumb/sim/measure"
	"offplumb/sim/study"
)

// runSlopes works out how sensitive the landings of releases with tracks are.
// Rows of lists and releases of a series are left out: they are many, and each
// would take some fourteen flights.
func (j *job) runSlopes(ctx context.Context) error {
	var which []int
	for i := range j.results {
		if j.results[i].Finished() && j.tracked(i) {
			which = append(which, i)
		}
	}
	var err error
	if j.slopes, err = j.Slopes(ctx, which, j.results, study.Options{Workers: j.flags.jobs}); err != nil {
		j.slopes = nil
		return context.Cause(ctx)
	}
	return nil
}

func slopeTables(j *job) []task {
	if len(j.slopes) == 0 {
		return nil
	}
	return []task{tableTask("sensitivity.csv", "sensitivity", "", "A row for each release with a track and each number of it: how its landing changes with the number.", measure.SlopeTable(j.slopes))}
}

func (j *job) slopesOf(release string) []measure.Slope {
	from := slices.IndexFunc(j.slopes, func(s measure.Slope) bool { return s.Release == release })
	if from < 0 {
		return nil
	}
	to := from
	for to < len(j.slopes) && j.slopes[to].Release == release {
		to++
	}
	return j.slopes[from:to]
}

// handfuls are the changes that people think in, for each unit: in the unit, and
// in words.
var handfuls = map[string]struct {
	size  float64
	words string
}{
	"m": {0.01, "1 cm"}, "m/s": {0.1, "0.1 m/s"}, "deg": {1, "1 degree"}, "rad/s": {math.Pi / 300, "0.1 rpm"},
}

// inputWords say what an input is.
var inputWords = map[string]string{
	"at.spinward": "of its place spinward", "at.axial": "of its place axially", "at.height": "of height", "at.radius": "of distance from the axis",
	"carried.reach.spinward": "of reach spinward", "carried.reach.axial": "of reach axially", "carried.reach.height": "of reach up",
	"velocity.spinward": "of speed spinward", "velocity.axial": "of speed axially", "velocity.up": "of speed up",
	"throw.speed": "of speed", "throw.heading": "of heading", "throw.elevation": "of elevation", "habitat.spin": "of spin",
}

// leastMoved is the shift of a landing, in m, below which a sensitivity is not
// told.
const leastMoved = 1e-4

// slopeWords tell how a landing shifts, the most first; "" where nothing does.
func slopeWords(rows []measure.Slope) string {
	rows = slices.Clone(rows)
	moves := func(s *measure.Slope) float64 { return s.Moves() * handfuls[s.Unit].size }
	slices.SortStableFunc(rows, func(a, b measure.Slope) int { return cmp.Compare(moves(&b), moves(&a)) })
	var words, none []string
	for i := range rows {
		s := &rows[i]
		what := inputWords[s.Input]
		if s.Note != "" {
			none = append(none, fmt.Sprintf("%s (%s)", strings.TrimPrefix(what, "of "), s.Note))
		} else if by := moves(s); by >= leastMoved {
			words = append(words, fmt.Sprintf("%s %s, %s", handfuls[s.Unit].words, what, shift(by)))
		}
	}
	out := ""
	if len(words) > 0 {
		out = "By how much its landing shifts against the plumb line of its release: " + strings.Join(words, "; ") + "."
	}
	if len(none) > 0 {
		out += " No sensitivity to " + strings.Join(none, "; ") + "."
	}
	return strings.TrimSpace(out)
}

// shift writes a length of millimetres to metres with two digits.
func shift(x float64) string {
	switch {
	case x < 0.00995:
		return sigfig(1000*x, 2) + " mm"
	case x < 0.995:
		return sigfig(100*x, 2) + " cm"
	}
	return sigfig(x, 2) + " m"
}
