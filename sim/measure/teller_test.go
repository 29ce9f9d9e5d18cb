package measure

import (
	"slices"
	"strconv"
	"testing"
)

// TestLongStories tries that a long story keeps its head and its tail and says
// how much it leaves out, and that nothing is left out that would not be
// shorter for it.
func TestLongStories(t *testing.T) {
	for n := range 40 {
		var parts []string
		for i := range n {
			parts = append(parts, strconv.Itoa(i))
		}
		got := shorter(slices.Clone(parts))
		if n <= headTold+tailTold+1 {
			if !slices.Equal(got, parts) {
				t.Errorf("of %d parts: %v", n, got)
			}
			continue
		}
		want := append(slices.Clone(parts[:headTold]), "("+strconv.Itoa(n-headTold-tailTold)+" more, in its impacts)")
		if want = append(want, parts[n-tailTold:]...); !slices.Equal(got, want) {
			t.Errorf("of %d parts: %v, want %v", n, got, want)
		}
	}
}

// TestTelling tries how impacts are put together: those on one surface are
// counted until another thing happens, a graze is not told, and whatever leaves
// a passage touches anew.
func TestTelling(t *testing.T) {
	hit := func(surface string, time, normal float64) Event {
		return Event{Kind: Impact, Surface: surface, Time: time, Speed: 2, NormalSpeed: normal, Energy: 8}
	}
	s := teller{events: []Event{hit("wall", 0, 0), hit("wall", 1, 1), hit("floor", 2, 1), hit("floor", 3, 1), hit("floor", 4, 1), hit("rim", 4.5, 1e-6),
		{Kind: Leaves, Surface: "spoke", Time: 5, Speed: 3, Energy: 18, NormalSpeed: 0}, hit("floor", 6, 1), hit("floor", 9, 1)}}
	s.until(8)
	s.flush()
	want := []string{"touches wall at 0 s with 2.00 m/s, 8.00 J", "bounces there once more", "touches floor at 2.00 s with 2.00 m/s, 8.00 J",
		"bounces there 2 times more", "leaves spoke at 5.00 s with 3.00 m/s, 18.0 J", "touches floor at 6.00 s with 2.00 m/s, 8.00 J"}
	if !slices.Equal(s.parts, want) {
		t.Errorf("got  %q\nwant %q", s.parts, want)
	}
}
