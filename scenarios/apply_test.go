package scenarios

import (
	"reflect"
	"testing"
)

// TestApply: settings in the tree itself.
func TestApply(t *testing.T) {
	const src = "[habitat]\nspin = '5 rpm'\n[[scatter]]\nname = 's'\n[[release]]\nname = 'r'\nthrow = { speed = '1 m/s' }\n"
	for _, c := range []struct {
		set, same string // the file that it makes
	}{
		{`scatter.s.vary."at.height"={uniform=["1 m","2 m"]}`, "[habitat]\nspin = '5 rpm'\n[[scatter]]\nname = 's'\nvary = { 'at.height' = { uniform = ['1 m', '2 m'] } }\n[[release]]\nname = 'r'\nthrow = { speed = '1 m/s' }\n"},
		{`scatter.s.vary.at.height={uniform=["1 m","2 m"]}`, "[habitat]\nspin = '5 rpm'\n[[scatter]]\nname = 's'\nvary = { 'at.height' = { uniform = ['1 m', '2 m'] } }\n[[release]]\nname = 'r'\nthrow = { speed = '1 m/s' }\n"},
		{`release.r.velocity.up=1 m/s`, "[habitat]\nspin = '5 rpm'\n[[scatter]]\nname = 's'\n[[release]]\nname = 'r'\nvelocity = { up = '1 m/s' }\n"},
		{`habitat.floor_gravity=1 g`, "[habitat]\nfloor_gravity = '1 g'\n[[scatter]]\nname = 's'\n[[release]]\nname = 'r'\nthrow = { speed = '1 m/s' }\n"},
		// What is wrong changes nothing.
		{`habitat.floor_gravity.x=1 g`, src},
		{`release.r.velocity.upp=1 m/s`, src},
		{`release.r=1`, src},
		{`release.x.still=true`, src},
		{`air.colour=blue`, src},
	} {
		got, errs := parse("got", []byte(src))
		want, more := parse("want", []byte(c.same))
		if len(errs)+len(more) > 0 {
			t.Fatal(errs, more)
		}
		if errs := apply(got, []string{c.set}); (len(errs) == 0) != (c.same != src) {
			t.Errorf("--set %s: %v", c.set, errs)
		}
		if !reflect.DeepEqual(got.plain(), want.plain()) {
			t.Errorf("--set %s gives\n%v\nwant\n%v", c.set, got.plain(), want.plain())
		}
	}
}

// TestDrop: a key that is dropped is gone, and the others keep their order.
func TestDrop(t *testing.T) {
	root, _ := parse("x", []byte("a = 1\nb = 2\nc = 3\n"))
	names := root.names
	root.drop("b")
	root.drop("no")
	if got := root.names; !reflect.DeepEqual(got, []string{"a", "c"}) || root.kids["b"] != nil {
		t.Errorf("got %q", got)
	}
	if names[1] != "b" {
		t.Error("a list of names held elsewhere has changed")
	}
}
