package integrator_test

import (
	"math"
	"math/rand/v2"
	"slices"
	"testing"

	"offplumb/integrator"
)

// until falls through zero at time r.
func until(r float64) integrator.Event { return timed(func(t float64) float64 { return r - t }) }

// TestEventsInOrderOfTime tries rule 8: hits of one step come in the order of
// time, whatever that of the events.
func TestEventsInOrderOfTime(t *testing.T) {
	var events []integrator.EventSpec
	for _, r := range []float64{0.8, 0.2, 0.6, 0.4} {
		events = append(events, integrator.EventSpec{Event: until(r), Slop: slop})
	}
	hits := allHits(t, tick(t, 0, 1), 1, events...)
	wantTimes(t, hits, resolution(1, 1), 0.2, 0.4, 0.6, 0.8)
	for i, want := range []int{1, 3, 2, 0} {
		if hits[i].Event != want {
			t.Errorf("hit %d is of event %d, want %d", i, hits[i].Event, want)
		}
	}
}

// TestEventsWithinRounding tries rule 8: hits within the resolution of time get
// one time and the order of the events, each once; hits apart by more keep
// theirs.
func TestEventsWithinRounding(t *testing.T) {
	res := resolution(1, 1)
	for _, c := range []struct {
		name  string
		apart float64
		order []int
		times int // different ones
	}{
		{"ten units of rounding apart", 10 * epsilon, []int{0, 1, 2, 3, 4}, 1},
		{"three resolutions apart", 3 * res, []int{4, 3, 2, 1, 0}, 5},
	} {
		for _, terminal := range []bool{false, true} {
			var events []integrator.EventSpec
			for i := range 5 { // the first event is the last in time
				r := 0.7 - float64(i)*c.apart
				events = append(events, integrator.EventSpec{Event: until(r), Slop: 100 * res, Terminal: terminal})
			}
			hits := allHits(t, tick(t, 0, 1), 1, events...)
			var order []int
			times := map[float64]bool{}
			for _, h := range hits {
				order = append(order, h.Event)
				times[h.T] = true
			}
			if !slices.Equal(order, c.order) || len(times) != c.times {
				t.Errorf("%s, terminal %v: hits %v, want events %v at %d times", c.name, terminal, hits, c.order, c.times)
			}
		}
	}
}

// TestEventTerminalTruncates tries rule 9 with events before, at and after the
// terminal one.
func TestEventTerminalTruncates(t *testing.T) {
	events := []integrator.EventSpec{
		{Event: until(0.6), Slop: slop},
		{Event: until(0.5), Slop: slop, Terminal: true},
		{Event: until(0.3), Slop: slop},
		{Event: until(0.5), Slop: slop},
		{Event: until(0.7), Slop: slop, Terminal: true},
	}
	st := tick(t, 0, 1)
	seen := 0
	var last integrator.Step
	res := mustSolve(t, st, 1, events, func(s *integrator.Step, hits []integrator.Hit) error {
		seen += len(hits)
		last = *s
		return nil
	})
	if !res.Stopped || seen != 3 || len(res.Hits) != 3 {
		t.Fatalf("stopped %v with hits %v, %d seen; want three", res.Stopped, res.Hits, seen)
	}
	wantTimes(t, res.Hits, resolution(1, 1), 0.3, 0.5, 0.5)
	for i, want := range []int{2, 1, 3} {
		if h := res.Hits[i]; h.Event != want || h.Terminal != (want == 1) {
			t.Errorf("hit %d is %v, want event %d", i, h, want)
		}
	}
	if end := res.Hits[1].T; res.T != end || last.T1 != end || res.Y[0] != last.Y1[0] || math.Abs(res.Y[0]-end) > 4*epsilon {
		t.Errorf("ended at %g, %g in state %g, %g; want %g", res.T, last.T1, res.Y[0], last.Y1[0], end)
	}
	res = mustSolve(t, st, 1, events, nil)
	wantTimes(t, res.Hits, resolution(1, 1), 0.6, 0.7)
	if res = mustSolve(t, st, 1, events, nil); res.Stopped || res.T != 1 {
		t.Errorf("the rest stopped at %g with %v", res.T, res.Hits)
	}
}

// TestEventsStandAsAtTerminal tries rule 9: what an event was, at the end of
// the step that a terminal hit cut short, does not count. Here events beyond it
// would be armed or spent by then.
func TestEventsStandAsAtTerminal(t *testing.T) {
	stop := integrator.EventSpec{Event: until(0.5), Slop: slop, Terminal: true}
	for _, c := range []struct {
		name  string
		g     gap
		times []float64 // in [0, 3], of steps of 1; the stop at 0.5 besides
	}{
		{"falls after it", func(x float64) float64 { return 0.8 - x }, []float64{0.8}},
		{"dips after it", func(x float64) float64 { return math.Abs(x-0.8) - 0.1 }, []float64{0.7}},
		{"leaves the surface after it", func(x float64) float64 { return max(0, x-0.8) }, nil},
		{"dips before it", func(x float64) float64 { return math.Abs(x-0.3) - 0.1 }, []float64{0.2}},
		{"dips before and after", func(x float64) float64 { return math.Abs(math.Abs(x-0.5)-0.3) - 0.1 }, []float64{0.1, 0.7}},
	} {
		for _, stopFirst := range []bool{false, true} {
			other := integrator.EventSpec{Event: fenced{c.g, 1, 0, slop}, Slop: slop}
			events := []integrator.EventSpec{other, stop}
			if stopFirst {
				events = []integrator.EventSpec{stop, other}
			}
			hits := slices.DeleteFunc(allHits(t, tick(t, 0, 1), 3, events...), func(h integrator.Hit) bool { return h.Terminal })
			t.Run(c.name, func(t *testing.T) { wantTimes(t, hits, resolution(3, 1), c.times...) })
		}
	}
}

// TestEventsNoneIsLost tries rules 8 and 9 where they meet: events whose roots
// are within a few resolutions of one another, some terminal, each fire once in
// all, whatever their distances.
func TestEventsNoneIsLost(t *testing.T) {
	const seed, n = 25, 4000
	rng := rand.New(rand.NewPCG(seed, 0))
	res := resolution(1, 1)
	for i := range n {
		var events []integrator.EventSpec
		var offsets []float64
		for range 2 + rng.IntN(4) {
			off := 4 * rng.Float64()
			offsets = append(offsets, off)
			events = append(events, integrator.EventSpec{
				Event: until(0.5 + off*res), Slop: 10 * res, Terminal: rng.IntN(2) == 0})
		}
		fired := make([]int, len(events))
		last := 0.0
		for _, h := range allHits(t, tick(t, 0, 1), 1, events...) {
			fired[h.Event]++
			if h.T < last {
				t.Errorf("seed %d, case %d: a hit at %g after one at %g", seed, i, h.T, last)
			}
			last = h.T
		}
		for e, count := range fired {
			if count != 1 {
				t.Fatalf("seed %d, case %d: event %d fired %d times; roots %g resolutions on, events %+v",
					seed, i, e, count, offsets, events)
			}
		}
	}
}

// TestEventAfterTerminalHit tries rule 4: going on from a terminal hit fires
// nothing anew, and after a Reset the same state does, at its start.
func TestEventAfterTerminalHit(t *testing.T) {
	events := []integrator.EventSpec{{Event: gap(func(x float64) float64 { return 0.5 - x }), Slop: 1e-12, Terminal: true}}
	st := tick(t, 0, 1)
	res := mustSolve(t, st, 1, events, nil)
	wantTimes(t, res.Hits, resolution(1, 1), 0.5)
	hitT, hitY := res.T, res.Y[0]
	for _, tEnd := range []float64{hitT, hitT + 1e-12, 0.6, 1} {
		if res := mustSolve(t, st, tEnd, events, nil); res.Stopped || res.T != tEnd {
			t.Fatalf("going on to %g stopped at %g with %v", tEnd, res.T, res.Hits)
		}
	}
	st.Reset(hitT, []float64{hitY})
	res = mustSolve(t, st, 1, events, nil)
	if len(res.Hits) != 1 || res.T != hitT || res.Y[0] != hitY {
		t.Errorf("after Reset: hits %v at %g, want one at the start, %g", res.Hits, res.T, hitT)
	}
}

// TestEventRiseAndFallAlternate: what a plain event with short steps finds of
// the rises and falls of one function, a bounded one finds too.
func TestEventRiseAndFallAlternate(t *testing.T) {
	g := gap(math.Sin)
	events := []integrator.EventSpec{
		{Event: g, Slop: slop},
		{Event: g, Slop: slop, Rising: true},
		{Event: fenced{g, 1, 0, slop}, Slop: slop},
		{Event: fenced{g, 1, 0, slop}, Slop: slop, Rising: true},
	}
	hits := allHits(t, tick(t, 1, 0.5), 20, events...)
	var times []float64
	for k := 1.0; k*math.Pi < 20; k++ {
		times = append(times, k*math.Pi, k*math.Pi)
	}
	wantTimes(t, hits, resolution(20, 0.5)+40*0.5*epsilon*20, times...)
	for i, h := range hits {
		if rise := i / 2 % 2; h.Event != rise+2*(i%2) {
			t.Errorf("hit %d is of event %d", i, h.Event)
		}
	}
}

// TestFinderOnItsOwn drives the steps by hand, with a Finder, to the same hits
// as Solve.
func TestFinderOnItsOwn(t *testing.T) {
	events := []integrator.EventSpec{
		{Event: gap(math.Cos), Slop: slop, Terminal: true},
		{Event: gap(math.Sin), Slop: slop, Rising: true},
	}
	want := allHits(t, tick(t, 0, 0.5), 20, events...)
	st := tick(t, 0, 0.5)
	var f integrator.Finder
	if err := f.Start(0, []float64{0}, events); err != nil {
		t.Fatal(err)
	}
	var got []integrator.Hit
	for at := 0.0; at < 20; {
		s, err := st.Step(20)
		if err != nil {
			t.Fatal(err)
		}
		hits, stop, err := f.Search(s)
		if err != nil {
			t.Fatal(err)
		}
		got = append(got, hits...)
		if terminal := slices.ContainsFunc(hits, func(h integrator.Hit) bool { return h.Terminal }); stop != terminal {
			t.Errorf("stop %v with hits %v", stop, hits)
		}
		at = s.T1
	}
	sameHits(t, "by hand", got, want)
}
