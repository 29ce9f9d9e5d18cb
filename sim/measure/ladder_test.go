package measure_test

import (
	"strings"
	"testing"

	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// ladders tells the ladders of a path.
func ladders(t *testing.T, spin float64, start model.Station, legs ...model.Leg) []string {
	t.Helper()
	m, p := planned(t, ring(18, spin), model.Path{Name: "way", Start: start, Legs: legs})
	rows, _ := measure.LoadSeries(m, p)
	return measure.Ladders(m, p, rows)
}

// TestLadderWords tries the sides of a ladder: climbing at positive spin pushes
// spinward with 2 m spin v = 42.0 N here, so that a ladder in front of someone
// who faces spinward takes it and one behind the other way does not; descending
// and negative spin turn it round, each.
func TestLadderWords(t *testing.T) {
	const spin, v = 0.5, 0.5
	for _, c := range []struct {
		spin   float64
		kind   model.LegKind
		facing model.Direction
		pitch  float64
		want   string
	}{
		{spin, model.Climb, model.Spinward, 0, "way, leg 1, climbing facing spinward: pushed spinward with up to 42.0 N, into the ladder"},
		{spin, model.Climb, model.Antispinward, 0, "way, leg 1, climbing facing antispinward: pushed spinward with up to 42.0 N, away from the ladder; facing spinward it would press into the ladder"},
		{spin, model.Descend, model.Antispinward, 0, "way, leg 1, descending facing antispinward: pushed antispinward with up to 42.0 N, into the ladder"},
		{spin, model.Descend, model.Spinward, 0, "way, leg 1, descending facing spinward: pushed antispinward with up to 42.0 N, away from the ladder; facing antispinward it would press into the ladder"},
		{-spin, model.Climb, model.Spinward, 0, "way, leg 1, climbing facing spinward: pushed antispinward with up to 42.0 N, away from the ladder; facing antispinward it would press into the ladder"},
		{spin, model.Climb, model.PlusAxial, 0, "way, leg 1, climbing facing +axial: pushed spinward with up to 42.0 N, along the ladder's face; facing spinward it would press into the ladder"},
		{spin, model.Climb, model.MinusAxial, 1, "way, leg 1, climbing facing -axial: pushed spinward with up to 35.3 N, into the ladder"},
		{0, model.Climb, model.PlusAxial, 0, "way, leg 1, climbing facing +axial: no push to a side"},
	} {
		leg := model.Leg{Kind: c.kind, Distance: 3, Speed: v, Facing: c.facing, Pitch: c.pitch}
		got := ladders(t, c.spin, model.Station{HasRadius: true, Radius: 13}, leg)
		if len(got) != 1 || got[0] != c.want {
			t.Errorf("got  %q\nwant %q", got, c.want)
		}
	}
}

// TestOnlyLaddersAreTold tries that each climb and descent has its line, under
// the number of its leg, and that other legs have none.
func TestOnlyLaddersAreTold(t *testing.T) {
	got := ladders(t, 0.5, model.Station{}, model.Leg{Kind: model.Stand, Duration: 1},
		model.Leg{Kind: model.Climb, Distance: 3, Speed: 0.4, Ramp: 0.5}, model.Leg{Kind: model.Ride, Up: 1, Speed: 1, Ramp: 0.5},
		model.Leg{Kind: model.Descend, Distance: 2, Speed: 0.2, Ramp: 0.5})
	if len(got) != 2 || !strings.HasPrefix(got[0], "way, leg 2, climbing") || !strings.HasPrefix(got[1], "way, leg 4, descending") {
		t.Errorf("%q", got)
	}
}
