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
