package measure_test

import (
	"math"
	"slices"
	"testing"

	"offplumb/sim/flight"
	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// letGo measures a release at 2.5 m along a path with some events.
func letGo(ends string, outcome flight.Outcome, events ...measure.Event) measure.LetGo {
	r := &model.Release{Name: "slips at 2.5 m", Series: "slips", Along: 2.5, Carried: &model.Carried{Path: "p", Time: 7}}
	track := &flight.Track{Release: r}
	track.Start.R = 14
	return measure.LetGoOf(track, &measure.Rest{Outcome: outcome, Surface: ends, Time: 30}, events)
}

// TestLetGo tries what is first, worst and the arrival among the impacts: the
// first of all, the fastest, and the first on what the body ends on; leavings
// are none of them.
func TestLetGo(t *testing.T) {
	hit := func(surface string, time, speed float64) measure.Event {
		return measure.Event{Kind: measure.Impact, Surface: surface, Time: time, Speed: speed, Energy: speed * speed}
	}
	leave := func(time, speed float64) measure.Event {
		return measure.Event{Kind: measure.Leaves, Surface: "spoke A", Time: time, Speed: speed}
	}
	for _, c := range []struct {
		name                  string
		ends                  string
		outcome               flight.Outcome
		events                []measure.Event
		first, arrival, worst float64 // s, their times
		leaves                float64 // m/s
	}{
		{"wall, out, floor", "floor", flight.Rested, []measure.Event{hit("wall", 1, 2), leave(4, 9.5), hit("floor", 5, 9), hit("floor", 6, 3)}, 1, 5, 5, 9.5},
		{"a rim is worse", "floor", flight.Rested, []measure.Event{hit("wall", 1, 2), hit("rim", 4, 8), leave(4.1, 5), hit("floor", 5, 7)}, 1, 5, 4, 5},
		{"the wall is worst", "floor", flight.Rested, []measure.Event{hit("floor", 1, 1), hit("wall", 2, 3), hit("floor", 5, 2)}, 1, 1, 2, nan},
		{"the first of equals", "floor", flight.Rested, []measure.Event{hit("floor", 1, 3), hit("floor", 2, 3)}, 1, 1, 1, nan},
		{"leaves twice", "floor", flight.Rested, []measure.Event{leave(1, 2), hit("rim", 2, 2), leave(3, 4), hit("floor", 5, 6)}, 2, 5, 5, 4},
		{"ends in flight", "", flight.TimeUp, []measure.Event{hit("wall", 1, 2)}, 1, nan, 1, nan},
		{"touches nothing", "", flight.Lost, nil, nan, nan, nan, nan},
	} {
		l := letGo(c.ends, c.outcome, c.events...)
		if !same(l.First.Time, c.first) || !same(l.Arrival.Time, c.arrival) || !same(l.Worst.Time, c.worst) || !same(l.LeavesSpeed, c.leaves) {
			t.Errorf("%s: first, arrival and worst after %g, %g and %g s, leaves at %g m/s, want %g, %g, %g and %g", c.name,
				l.First.Time, l.Arrival.Time, l.Worst.Time, l.LeavesSpeed, c.first, c.arrival, c.worst, c.leaves)
		}
		if math.IsNaN(c.worst) && (!math.IsNaN(l.Worst.Speed) || !math.IsNaN(l.First.Energy) || l.First.Surface != "") {
			t.Errorf("%s: of no impact %+v", c.name, l.First)
		}
		if l.Release != "slips at 2.5 m" || l.Along != 2.5 || l.PathTime != 7 || l.Radius != 14 || l.Outcome != c.outcome.String() || l.EndsOn != c.ends || l.Time != 30 {
			t.Errorf("%s: %+v", c.name, l)
		}
	}
}

// TestSeriesNames tries that each series is named once, in the order of the
// file, whatever stands between.
func TestSeriesNames(t *testing.T) {
	m := &model.Model{}
	for _, s := range []string{"", "up", "up", "", "down", "down", "down"} {
		m.Releases = append(m.Releases, model.Release{Series: s})
	}
	if got := measure.SeriesNames(m); !slices.Equal(got, []string{"up", "down"}) {
		t.Errorf("%q", got)
	}
}
