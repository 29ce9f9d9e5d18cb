package scenarios_test

import (
	"fmt"
	"strings"
	"testing"

	"offplumb/scenarios"
)

// entries makes as many entries as fit into the largest scenario.
func entries(used int, entry func(i int) string) string {
	var b strings.Builder
	for i := 0; ; i++ {
		s := entry(i)
		if used+b.Len()+len(s) > scenarios.MaxSize {
			return b.String()
		}
		b.WriteString(s)
	}
}

// TestHostileFiles loads files of the largest size that are made to be slow or
// to exhaust a reader: each is taken or refused, in a time that grows with its
// length. A quadratic reader takes minutes.
func TestHostileFiles(t *testing.T) {
	const head = "format = 1\n[habitat]\nfloor_radius = \"18 m\"\nspin = \"5 rpm\"\n"
	times := func(before, each, after string) string {
		room := scenarios.MaxSize - len(before) - len(after)
		return before + strings.Repeat(each, room/len(each)) + after
	}
	with := func(before string, entry func(i int) string) string { return before + entries(len(before), entry) }
	for _, c := range []struct {
		what, src string
		want      string // how the error begins; empty: it loads
	}{
		{"opening brackets", times("", "[", ""), "h:1:3: not TOML: "},
		{"lists in lists", times("x=", "[", ""), "h:1:10003: not TOML: "},
		{"closed lists in lists", times("x=", "[", "") + "]", "h:1:1: wants a scenario of at most 1 MiB"},
		{"tables in tables", times("x=", "{a=", ""), "h:1:30003: not TOML: "},
		{"quotes", times("", "\"", ""), "h:1:"},
		{"keys in a table", with(head, func(i int) string { return fmt.Sprintf("k%d=1\n", i) }), "h:5:1: habitat.k0: unknown key"},
		{"keys in a table, then a fault", with(head+"!", once), "h:5:1: not TOML: "},
		{"keys before a fault", with(head, func(i int) string { return fmt.Sprintf("k%07d=1\n", i) })[:scenarios.MaxSize-64] + "\n!", "h:95320:1: not TOML: "},
		{"a key over and over", times(head, "a=1\n", ""), "h:5:1: habitat.a: unknown key"},
		{"dotted keys", with(head, func(i int) string { return fmt.Sprintf("a.k%d=1\n", i) }), "h:5:1: habitat.a: unknown key"},
		{"a key of many parts", times(head, "a.", "a=1\n"), "h:5:1: a key of more than 32 parts"},
		{"100 000 dotted keys", head + strings.Repeat("a.b.c=1\n", 100_000), "h:5:1: habitat.a: unknown key"},
		{"a header of many parts", times(head+"[", "a.", "a]\n"), "h:5:2: a key of more than 32 parts"},
		{"headers", with(head, func(i int) string { return fmt.Sprintf("[k%d]\n", i) }), "h:5:2: k0: unknown key"},
		{"empty bodies", times(head, "[[body]]\n", ""), "h:5:3: body[0]: a body wants the key name"},
		{"a list on one line", times(head+"x=[", "1,", "1]\n"), "h:5:1: habitat.x: unknown key"},
		{"empty lists on one line", times(head+"x=[", "[],", "1]\n"), "h:5:1: habitat.x: unknown key"},
		{"a table on one line", with(head+"x={y=1", func(i int) string { return fmt.Sprintf(",k%d=1", i) })[:scenarios.MaxSize-32] + "=1}\n", "h:5:"},
		{"wrong values on one line", times(head+"[[deck]]\nname=\"d\"\nradius=\"9 m\"\naxial=[", "1,", "1]\n"), "h:8:7: deck[0].axial: wants a list of 2 values, got "},
		{"a text on one line", times("title=\"", "x", "\"\n"+head), ""},
		{"a key on one line", times(head, "x", "=1\n"), "h:5:1: habitat.xxx"},
		{"a number on one line", times(head+"length=", "1", "\n"), "h:5:8: habitat.length: wants a length"},
		{"a quantity on one line", times(head+"length=\"", "1", " m\"\n"), "h:5:8: habitat.length: wants a length"},
		{"a unit on one line", times(head+"length=\"1 ", "m", "\"\n"), "h:5:8: habitat.length: wants a length"},
		{"comments", times(head, "#\n", ""), ""},
		{"comments in a list", times(head+"[[deck]]\nname=\"d\"\nradius=\"9 m\"\naxial=[", "#[\n", "]\n"), "h:8:7: deck[0].axial: wants a list of 2 values, got an empty list"},
		{"blank lines", times(head, "\n", ""), ""},
		{"carriage returns", times(head, "\r\n", ""), ""},
		{"bodies", with(head, func(i int) string { return fmt.Sprintf("[[body]]\nname=\"b%d\"\nmass=\"1 g\"\ndiameter=\"1 m\"\n", i) }), ""},
		{"texts", times(head+"[[limit]]\nname=\"l\"\nmeasure=\"m.n\"\nof=[", "\"\",", "\"\"]\n"), ""},
	} {
		_, err := scenarios.Load("h", []byte(c.src), scenarios.Options{})
		got := ""
		if faults, ok := err.(scenarios.ErrorList); ok {
			got = faults[0].Error() // all of them may be a hundred thousand
		}
		if (err == nil) != (c.want == "") || !strings.HasPrefix(got, c.want) {
			t.Errorf("%s: got %.300q, want %q", c.what, got, c.want)
		}
	}
}

// once is one entry and then none that fits.
func once(i int) string {
	if i == 0 {
		return "\n"
	}
	return strings.Repeat("#", scenarios.MaxSize)
}

// TestLongValuesAreShortened: an error stays readable, whatever it is about.
func TestLongValuesAreShortened(t *testing.T) {
	long := strings.Repeat("9", 10_000)
	const head = "format = 1\n[habitat]\nfloor_radius = \"18 m\"\nspin = \"5 rpm\"\n"
	for _, more := range []string{
		"length = \"" + long + " m\"\n",
		"length = " + long + "\n",
		"shape = \"" + long + "\"\n",
		"k" + long + " = 1\n",
		"[solver]\nrelative_tolerance = " + long + "\n",
		"[solver]\nrelative_tolerance = 1." + long + "e300\n",
		"[[body]]\nname = \"" + long + "\"\nmass = \"1 kg\"\ndiameter = \"1 m\"\n",
		"[[release]]\nname = \"a\"\nbody = \"b\"\nat.height = \"1 m\"\nuntil = \"" + long + "\"\n",
		"[[scatter]]\nname = \"a\"\nof = \"b\"\nvary = {}\nsamples = 1.5" + long + "\n",
	} {
		_, err := scenarios.Load("h", []byte(head+more), scenarios.Options{})
		if err == nil {
			t.Errorf("%.40q is taken", more)
		} else if n := len(err.Error()); n > 1000 {
			t.Errorf("%.40q: an error of %d bytes", more, n)
		}
	}
}

// TestManyFaultsOfAList: a list whose every row is wrong says so a thousand
// times, and counts the others.
func TestManyFaultsOfAList(t *testing.T) {
	_, err := loadList("", "release,height_m\n"+strings.Repeat("a,1\n", 100_000))
	lines := strings.Split(fmt.Sprint(err), "\n")
	const last = "l.csv:100002:1: and 98999 more faults"
	if len(lines) != 1001 || lines[1000] != last {
		t.Errorf("got %d faults, the last %q, want 1001 and %q", len(lines), lines[len(lines)-1], last)
	}
}

// TestWideLists: a header of very many columns is refused by its first.
func TestWideLists(t *testing.T) {
	_, err := loadList("", "release,height_m"+strings.Repeat(",a", 1<<20)+"\n")
	if n := strings.Count(fmt.Sprint(err), "unknown column"); err == nil || n > 100 {
		t.Errorf("got %d faults (%.100v)", n, err)
	}
}
