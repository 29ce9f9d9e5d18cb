package scenarios

import (
	"fmt"
	"math"
	"reflect"
	"strings"
	"testing"

	"github.com/pelletier/go-toml/v2"
)

// at finds a node of a tree by a path such as a.b[1].c.
func at(root *node, path string) *node {
	n := root
	for _, p := range keyParts(path) {
		if n = n.kids[p.name]; n == nil {
			return nil
		}
		if p.index >= 0 {
			if p.index >= len(n.items) {
				return nil
			}
			n = n.items[p.index]
		}
	}
	return n
}

func (p place) String() string { return fmt.Sprintf("%d:%d", p.line, p.col) }

// TestPlaces: the place of every kind of value, and of its key. Columns count
// characters.
func TestPlaces(t *testing.T) {
	type want struct{ path, key, value string }
	for _, c := range []struct {
		what, src string
		want      []want
	}{
		{"plain values", "a = 1\nbb=  'x'\n\n  c\t=\ttrue # no\nd = 1979-05-27\ne = -1.5e3\n", []want{
			{"a", "1:1", "1:5"}, {"bb", "2:1", "2:6"}, {"c", "4:3", "4:7"}, {"d", "5:1", "5:5"}, {"e", "6:1", "6:5"}}},
		{"carriage returns", "a = 1\r\n\r\n[t]\r\nb = 2\r\n", []want{{"a", "1:1", "1:5"}, {"t.b", "4:1", "4:5"}, {"t", "3:2", "3:2"}}},
		{"byte order mark", "\xef\xbb\xbfa = 1\n  b = 2\n", []want{{"a", "1:1", "1:5"}, {"b", "2:3", "2:7"}}},
		{"no line end", "a = 1", []want{{"a", "1:1", "1:5"}}},
		{"characters beyond ASCII", "t = { \"Höhe\" = 'ü', b = 'x' }\n'工具' = \"é\"\nc = [ \"°C\", \"y\" ]\n", []want{
			{"t", "1:1", "1:5"}, {"t.Höhe", "1:7", "1:16"}, {"t.b", "1:21", "1:25"}, {"工具", "2:1", "2:8"}, {"c[0]", "3:7", "3:7"}, {"c[1]", "3:13", "3:13"}}},
		{"headers", "[a]\nx = 1\n [ b . 'c' ]\nx = 2\n[[l]]\nx = 3\n[[l]]\n[[l.m]]\nx = 4\n", []want{
			{"a", "1:2", "1:2"}, {"a.x", "2:1", "2:5"}, {"b", "3:4", "3:4"}, {"b.c", "3:8", "3:8"}, {"b.c.x", "4:1", "4:5"},
			{"l", "5:3", "5:3"}, {"l[0]", "5:3", "5:3"}, {"l[0].x", "6:1", "6:5"}, {"l[1]", "7:3", "7:3"}, {"l[1].m[0]", "8:5", "8:5"}, {"l[1].m[0].x", "9:1", "9:5"}}},
		{"dotted keys", "a.b . c = 1\na.d = 2\n", []want{{"a", "1:1", "1:1"}, {"a.b", "1:3", "1:3"}, {"a.b.c", "1:7", "1:11"}, {"a.d", "2:3", "2:7"}}},
		{"tables in braces", "a = { b = 1, c = { d = 'x' }, e.f = 2 }\n", []want{
			{"a", "1:1", "1:5"}, {"a.b", "1:7", "1:11"}, {"a.c", "1:14", "1:18"}, {"a.c.d", "1:20", "1:24"}, {"a.e.f", "1:33", "1:37"}}},
		{"a list over lines", "a = [\n  1, # one\n  # [none]\n  'two',\n\n    3,\n]\nb = 1\n", []want{
			{"a", "1:1", "1:5"}, {"a[0]", "2:3", "2:3"}, {"a[1]", "4:3", "4:3"}, {"a[2]", "6:5", "6:5"}, {"b", "8:1", "8:5"}}},
		{"tables in a list", "a = [ { b = 1 },\n  { b = 2,c = [ 3 ] } ]\n", []want{
			{"a[0]", "1:7", "1:7"}, {"a[0].b", "1:9", "1:13"}, {"a[1]", "2:3", "2:3"}, {"a[1].c", "2:11", "2:15"}, {"a[1].c[0]", "2:17", "2:17"}}},
		{"lists in a list", "a = [[], ['[', # [\n\"]\"], [1, [2]],{},[ ] ]\n", []want{
			{"a[0]", "1:6", "1:6"}, {"a[1]", "1:10", "1:10"}, {"a[1][0]", "1:11", "1:11"}, {"a[1][1]", "2:1", "2:1"}, {"a[2]", "2:7", "2:7"},
			{"a[2][1]", "2:11", "2:11"}, {"a[2][1][0]", "2:12", "2:12"}, {"a[3]", "2:16", "2:16"}, {"a[4]", "2:19", "2:19"}}},
		{"comments between lists", "a = [[1], # [\n  # [[ \n [2]]\n", []want{{"a[0]", "1:6", "1:6"}, {"a[1]", "3:2", "3:2"}, {"a[1][0]", "3:3", "3:3"}}},
		{"texts over lines", "a = \"\"\"\nx\n\"\"\"\nb = '''\ny'''\nc = 1\n", []want{{"a", "1:1", "1:5"}, {"b", "4:1", "4:5"}, {"c", "6:1", "6:5"}}},
	} {
		root, errs := parse("x.toml", []byte(c.src))
		if len(errs) > 0 {
			t.Errorf("%s: %v", c.what, errs)
			continue
		}
		for _, w := range c.want {
			n := deep(root, w.path)
			if n == nil {
				t.Errorf("%s: there is no %s", c.what, w.path)
			} else if n.key.String() != w.key || n.at.String() != w.value {
				t.Errorf("%s: %s has its key at %v and its value at %v, want %s and %s", c.what, w.path, n.key, n.at, w.key, w.value)
			}
		}
	}
}

// deep is at for lists in lists: a[1][0].
func deep(root *node, path string) *node {
	path, more, nested := strings.Cut(path, "][")
	if !nested {
		return at(root, path)
	}
	n := at(root, path+"]")
	for _, s := range strings.Split(strings.TrimSuffix(more, "]"), "][") {
		var i int
		fmt.Sscan(s, &i)
		if n == nil || i >= len(n.items) {
			return nil
		}
		n = n.items[i]
	}
	return n
}

// TestTreeHoldsWhatTheDecoderReads holds the tree against the decoder of the
// TOML module: same keys, same values.
func TestTreeHoldsWhatTheDecoderReads(t *testing.T) {
	sources := map[string]string{
		"kinds": "a = 0x1F\nb = 0o17\nc = 0b101\nd = 1_000\ne = -1_0.5_0e+1_0\nf = +0\ng = -0.0\nh = inf\ni = -inf\nj = true\nk = \"q\\u00e9\\n\"\nl = '\\n'\nm = \"\"\"\none\\\n   two\"\"\"\nn = '''\nx'''\n",
		"lists": "a = []\nb = [1, 2.5, 'x', [true, []], {c = 1}]\nc = [\n 1,\n # no\n 2,\n]\n",
		"keys":  "'a b' = 1\n\"c.d\" = 2\ne.f.g = 3\ne.h = 4\n[t.u]\nv = 5\n[t]\nw = 6\n[[l]]\nx = 7\n[[l.m]]\ny = 8\n[[l]]\n[l.n]\nz = 9\n",
		"crlf":  "a = 1\r\n[b]\r\nc = '''\r\nx\r\n'''\r\n",
	}
	for _, e := range Examples() {
		sources[e.Name] = string(e.Files[0].Data)
	}
	for name, src := range sources {
		root, errs := parse(name, []byte(src))
		if len(errs) > 0 {
			t.Errorf("%s: %v", name, errs)
			continue
		}
		var want map[string]any
		if err := toml.Unmarshal([]byte(src), &want); err != nil {
			t.Fatalf("%s: %v", name, err)
		}
		if got := root.plain(); !reflect.DeepEqual(got, numbers(want)) {
			t.Errorf("%s: got\n%v\nwant\n%v", name, got, want)
		}
	}
}

// plain gives a node as maps, slices, texts, numbers and truth.
func (n *node) plain() any {
	switch n.kind {
	case isTable:
		out := map[string]any{}
		for _, k := range n.names {
			out[k] = n.kids[k].plain()
		}
		return out
	case isArray:
		out := []any{}
		for _, item := range n.items {
			out = append(out, item.plain())
		}
		return out
	case isNumber:
		return n.num
	case isBool:
		return n.flag
	}
	return n.text
}

// numbers makes all numbers of a decoded value doubles.
func numbers(v any) any {
	switch v := v.(type) {
	case map[string]any:
		out := map[string]any{}
		for k := range v {
			out[k] = numbers(v[k])
		}
		return out
	case []any:
		out := []any{}
		for _, item := range v {
			out = append(out, numbers(item))
		}
		return out
	case int64:
		return float64(v)
	}
	return v
}

func TestNumber(t *testing.T) {
	for _, c := range []struct {
		raw  string
		want float64
	}{
		{"12", 12}, {"-12", -12}, {"+12", 12}, {"1_000", 1000}, {"0xff", 255}, {"0o10", 8}, {"0b11", 3},
		{"1e3", 1000}, {"1.5", 1.5}, {"-1_0.2_5", -10.25}, {"inf", math.Inf(1)}, {"-inf", math.Inf(-1)},
		{"99999999999999999999", 1e20},
	} {
		if got := number(c.raw); got != c.want {
			t.Errorf("%s is %v, want %v", c.raw, got, c.want)
		}
	}
	if got := number("nan"); !math.IsNaN(got) {
		t.Errorf("nan is %v", got)
	}
}

// TestFaultsOfStructure: what is given twice is faulted at its second place,
// with the line of the first, and all faults come at once.
func TestFaultsOfStructure(t *testing.T) {
	for _, c := range []struct{ what, src, want string }{
		{"a key", "a = 1\na = 2\n", "x:2:1: a: is given twice; first at line 1"},
		{"a key in quotes", "a = 1\n 'a' = 2\n", "x:2:2: a: is given twice; first at line 1"},
		{"a key that would upset a terminal", "\"a\\u001b\\n\" = 1\n\"a\\u001b\\n\" = 2\n", "x:2:1: a\ufffd\ufffd: is given twice; first at line 1"},
		{"a key in braces", "t = { a = 1, a = 2 }\n", "x:1:14: a: is given twice; first at line 1"},
		{"a table", "[a]\n[b]\n[a]\nx = 1\n", "x:3:2: a: is given twice; first at line 1"},
		{"a table and a value", "a = 1\n[a]\nb = 2\n", "x:2:2: a: is given twice; first at line 1"},
		{"a value and a table", "[a.b]\n[a]\nb = 1\n", "x:3:1: b: is given twice; first at line 1"},
		{"a table below a value", "a = 1\n[a.b]\n", "x:2:2: a: is given twice; first at line 1"},
		{"a list and a table", "[[a]]\n[a]\n", "x:2:2: a: is given twice; first at line 1"},
		{"a table and a list", "[a]\n[[a]]\n", "x:2:3: a: is given twice; first at line 1"},
		{"a list of values and of tables", "a = []\n[[a]]\n", "x:2:3: a: is given twice; first at line 1"},
		{"more in a table in braces", "a = { b = 1 }\na.c = 2\n", "x:2:1: a: is given twice; first at line 1"},
		{"a header for a table in braces", "a = { b = 1 }\n[a]\n", "x:2:2: a: is given twice; first at line 1"},
		{"a dotted key through a value", "a = 1\na.b = 2\n", "x:2:1: a: is given twice; first at line 1"},
		{"several", "a = 1\na = 2\nb = 1\n[c]\na = 3\na = 4\n", "x:2:1: a: is given twice; first at line 1\nx:6:1: a: is given twice; first at line 5"},
	} {
		_, errs := parse("x", []byte(c.src))
		if got := errs.Error(); got != c.want {
			t.Errorf("%s: got\n%s\nwant\n%s", c.what, got, c.want)
		}
	}
}

// TestSyntaxErrors: the place of the fault, and what the decoder says of it.
func TestSyntaxErrors(t *testing.T) {
	for _, c := range []struct{ what, src, want string }{
		{"no value", "a = 1\nbb =\n", "x:2:5:"},
		{"no equals sign", "a = 1\nbb 2\n", "x:2:4:"},
		{"a unit outside quotes", "a = 18 m\n", "x:1:8:"},
		{"a line of two values", "a = 1 b = 2\n", "x:1:7:"},
		{"after characters beyond ASCII", "t = { 'Höhe' = 'ü', b = x }\n", "x:1:25:"},
		{"after a byte order mark", "\xef\xbb\xbfa = x\n", "x:1:5:"},
		{"after carriage returns", "a = 1\r\nb = x\r\n", "x:2:5:"},
		{"leading zero", "a = 07\n", "x:1:5:"},
		{"text without an end", "a = 'x\n", "x:1:7:"},
		{"list without an end", "a = [1,\n2\n", "x:2:2:"},
		{"an escape that is none", "a = \"\\q\"\n", "x:1:6:"},
		{"not UTF-8", "a = 'x'\nb = '\xfc'\n", "x:2:6:"},
		{"not UTF-8 in a comment", "a = 'x' # \xfc\n", "x:1:11:"},
		{"UTF-16", "a\x00=\x001\x00\n\x00", "x:1:2:"},
	} {
		root, errs := parse("x", []byte(c.src))
		if root != nil || len(errs) != 1 {
			t.Errorf("%s: got %v, want one fault", c.what, errs)
			continue
		}
		if got := errs.Error(); !strings.HasPrefix(got, c.want+" not TOML: ") {
			t.Errorf("%s: got %q, want it at %s", c.what, got, c.want)
		}
	}
}

func TestSizeCap(t *testing.T) {
	fits := []byte("a = 1\n#" + strings.Repeat("x", MaxSize-7))
	if _, errs := parse("x", fits); len(fits) != MaxSize || len(errs) > 0 {
		t.Errorf("%d bytes are refused: %v", len(fits), errs)
	}
	_, errs := parse("x", append(fits, '\n'))
	if len(errs) != 1 || !strings.HasPrefix(errs.Error(), "x:1:1: wants a scenario of at most 1 MiB") {
		t.Errorf("one byte more: got %v", errs)
	}
}

func TestDepth(t *testing.T) {
	nest := func(n int) string { return "a = " + strings.Repeat("[", n) + strings.Repeat("]", n) + "\n" }
	dots := func(n int) string { return strings.Repeat("a.", n-1) + "a = 1\n" }
	for _, c := range []struct {
		what, src string
		want      string
	}{
		{"lists", nest(maxDepth + 1), ""},
		{"lists too deep", nest(maxDepth + 2), fmt.Sprintf("x:1:%d: values nest deeper than 32 levels", 5+maxDepth+1)},
		{"parts of a key", dots(maxDepth), ""},
		{"parts of a key, too many", dots(maxDepth + 1), "x:1:1: a key of more than 32 parts"},
		{"parts of a header, too many", "[" + strings.Repeat("a.", maxDepth) + "a]\nb = 1\n", "x:1:2: a key of more than 32 parts"},
	} {
		if _, errs := parse("x", []byte(c.src)); errs.Error() != c.want {
			t.Errorf("%s: got %q, want %q", c.what, errs.Error(), c.want)
		}
	}
}
