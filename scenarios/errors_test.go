package scenarios

import (
	"strings"
	"testing"
)

func TestNearest(t *testing.T) {
	known := []string{"spin", "floor_radius", "floor_gravity", "rim_speed", "length"}
	for _, c := range []struct{ word, want string }{
		{"spni", "spin"},
		{"spinn", "spin"},
		{"pin", "spin"},
		{"lenght", "length"},
		{"floor_radus", "floor_radius"},
		{"floor-radius", "floor_radius"},
		{"speed", ""},
		{"colour", ""},
		{"", ""},
		{strings.Repeat("x", 1000), ""},
		{strings.Repeat("ü", 40), ""},
	} {
		if got := nearest(c.word, known); got != c.want {
			t.Errorf("%.20q is taken for %q, want %q", c.word, got, c.want)
		}
	}
	if got := nearest(strings.Repeat("x", 65), []string{strings.Repeat("x", 66)}); got != "" {
		t.Errorf("words too long to compare are taken for each other: %q", got)
	}
}

// TestEditDistance holds the distance against the laws of one and some known
// values.
func TestEditDistance(t *testing.T) {
	for _, c := range []struct {
		a, b string
		want int
	}{
		{"", "", 0}, {"", "abc", 3}, {"abc", "abc", 0}, {"abc", "acb", 1}, {"abc", "ab", 1}, {"abc", "axc", 1}, {"kitten", "sitting", 3}, {"ca", "abc", 3},
		{strings.Repeat("a", 64), strings.Repeat("b", 64), 64},
	} {
		if got, back := editDistance(c.a, c.b), editDistance(c.b, c.a); got != c.want || back != c.want {
			t.Errorf("from %q to %q it is %d, back %d, want %d", c.a, c.b, got, back, c.want)
		}
	}
}

// TestErrorOrder: settings first, then files, each in its order; what is told
// twice stands once.
func TestErrorOrder(t *testing.T) {
	e := func(file string, line, col int) Error { return Error{File: file, Line: line, Col: col, Msg: "m"} }
	list := ErrorList{e("b", 2, 1), e("b", 1, 9), e("a", 7, 1), e("--set x", 0, 0), e("b", 1, 9), e("b", 1, 10)}
	const want = "--set x: m\na:7:1: m\nb:1:9: m\nb:1:10: m\nb:2:1: m"
	if got := list.sorted().Error(); got != want {
		t.Errorf("got\n%s\nwant\n%s", got, want)
	}
}

func TestErrorText(t *testing.T) {
	for _, c := range []struct {
		e    Error
		want string
	}{
		{Error{File: "a.toml", Line: 12, Col: 10, Key: "habitat.spin", Msg: "m"}, "a.toml:12:10: habitat.spin: m"},
		{Error{File: "a.toml", Line: 1, Col: 1, Msg: "m", Hint: "h"}, "a.toml:1:1: m\n  hint: h"},
		{Error{File: "--set k=v", Key: "k", Msg: "m"}, "--set k=v: k: m"},
	} {
		if got := c.e.Error(); got != c.want {
			t.Errorf("got %q, want %q", got, c.want)
		}
	}
}
