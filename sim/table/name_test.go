package table_test

import (
	"fmt"
	"regexp"
	"slices"
	"strings"
	"testing"

	"offplumb/sim/table"
	"pgregory.net/rapid"
)

func TestNamer(t *testing.T) {
	long := strings.Repeat("a", 100)
	for _, c := range []struct {
		what         string
		things, want []string
	}{
		{"lower case and hyphens", []string{"Torque Wrench", "wrench  (1.4 kg)!", "upper_deck"}, []string{"torque-wrench", "wrench-1-4-kg", "upper-deck"}},
		{"none at the ends", []string{"  spoke B ", "--x--"}, []string{"spoke-b", "x"}},
		{"taken", []string{"drop", "Drop", "drop!", "drop"}, []string{"drop", "drop-2", "drop-3", "drop-4"}},
		{"a number that is taken itself", []string{"drop", "drop", "drop-2", "drop 2"}, []string{"drop", "drop-2", "drop-2-2", "drop-2-3"}},
		{"a number taken before", []string{"drop 2", "drop", "drop"}, []string{"drop-2", "drop", "drop-3"}},
		{"empty", []string{"工具", "", "!", "x"}, []string{"-2", "-3", "-4", "x"}},
		{"devices", []string{"con", "NUL", "Aux", "prn", "com1", "lpt9", "com10", "console"}, []string{"con-2", "nul-2", "aux-2", "prn-2", "com1-2", "lpt9-2", "com10", "console"}},
		{"letters beyond a to z", []string{"Schlüssel", "ÉTAGÈRE", "K"}, []string{"schl-ssel", "tag-re", "k"}},
		{"long", []string{long + "b", long + "c", long[:99] + " c"}, []string{long, long + "-2", long[:99]}},
	} {
		var n table.Namer
		var got []string
		for _, thing := range c.things {
			got = append(got, n.Name(thing))
		}
		if !slices.Equal(got, c.want) {
			t.Errorf("%s: %q get %q, want %q", c.what, c.things, got, c.want)
		}
	}
}

// TestNamerKeepsNamesApart: whatever things are called, their files have
// different names that every file system takes.
func TestNamerKeepsNamesApart(t *testing.T) {
	fit := regexp.MustCompile(`^-?[a-z0-9]+(-[a-z0-9]+)*$`)
	rapid.Check(t, func(t *rapid.T) {
		things := rapid.SliceOf(rapid.OneOf(rapid.String(), rapid.StringMatching(`(a|b|-| |2|3){0,4}`), rapid.StringN(0, 300, -1))).Draw(t, "things")
		var n table.Namer
		taken := map[string]string{}
		for _, thing := range things {
			name := n.Name(thing)
			if !fit.MatchString(name) || len(name) > 110 {
				t.Fatalf("%q gets %q", thing, name)
			}
			if first, ok := taken[name]; ok {
				t.Fatalf("%q and %q both get %q", first, thing, name)
			}
			taken[name] = thing
		}
	})
}

// TestNamerStaysFast names many things alike; a search from 2 each time would
// take 5e9 steps.
func TestNamerStaysFast(t *testing.T) {
	const many = 100_000
	var n table.Namer
	last := ""
	for range many {
		last = n.Name("drop")
	}
	if want := fmt.Sprintf("drop-%d", many); last != want {
		t.Errorf("the last is %q, want %q", last, want)
	}
}
