package measure_test

import (
	"math"
	"regexp"
	"strconv"
	"testing"

	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// TestStoryOfSlideThereAndBack: a body pushed toward the middle of a flat floor
// turns, since along the floor its weight pulls it away from there: one slide
// there and back, told as one, and its two ways are all that it slid.
func TestStoryOfSlideThereAndBack(t *testing.T) {
	in := ring(6, 1)
	in.Habitat.Shape, in.Habitat.Size = model.Cabin, [3]float64{8, 4, 3}
	m, track := follow(t, in, model.Release{Name: "r", Own: ball(0, 0.05), At: model.Station{Spinward: model.Arc{Value: 2}, Height: 0.1},
		Start: model.Start{Kind: model.Velocity, VSpinward: -1}})
	end := measure.EndOf(m, track)
	got := regexp.MustCompile(`slides (\S+) m on floor and (\S+) m back; touches spinward wall`).FindStringSubmatch(end.Story)
	if got == nil {
		t.Fatalf("no slide there and back: %s", end.Story)
	}
	there, _ := strconv.ParseFloat(got[1], 64)
	back, _ := strconv.ParseFloat(got[2], 64)
	// From x = 2 it goes down to the turn and from there up to the wall at 4 less
	// its radius of 0.1.
	if math.Abs(back-there-1.9) > 5e-3 { // as the story rounds
		t.Errorf("%g m there and %g m back, which is not from 2 to 3.9 m: %s", there, back, end.Story)
	}
}
