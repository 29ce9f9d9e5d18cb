package table_test

import (
	"bytes"
	"encoding/csv"
	"errors"
	"math"
	"math/rand/v2"
	"slices"
	"strconv"
	"strings"
	"testing"

	"offplumb/sim/table"
)

// TestExactGivesTheSameDoubleBack tries doubles of any bits, each through its
// text and back.
func TestExactGivesTheSameDoubleBack(t *testing.T) {
	const seed = 71
	rnd := rand.New(rand.NewPCG(seed, seed))
	for range 200_000 {
		want := math.Float64frombits(rnd.Uint64())
		if math.IsNaN(want) || math.IsInf(want, 0) || want == 0 {
			continue
		}
		s := table.Exact(want)
		got, err := strconv.ParseFloat(s, 64)
		if err != nil || math.Float64bits(got) != math.Float64bits(want) {
			t.Fatalf("seed %d: Exact(%b) = %q, which reads as %b (%v)", seed, want, s, got, err)
		}
	}
}

// TestExactIsShortest holds that no text of one digit less gives the same
// double.
func TestExactIsShortest(t *testing.T) {
	const seed = 72
	rnd := rand.New(rand.NewPCG(seed, seed))
	for range 50_000 {
		x := math.Float64frombits(rnd.Uint64())
		if math.IsNaN(x) || math.IsInf(x, 0) || x == 0 {
			continue
		}
		digits := strings.Trim(mantissa(table.Exact(x)), "0")
		if len(digits) < 2 {
			continue
		}
		shorter := strconv.FormatFloat(x, 'e', len(digits)-2, 64)
		if back, err := strconv.ParseFloat(shorter, 64); err == nil && back == x {
			t.Fatalf("seed %d: Exact(%b) = %q, though %q gives it back", seed, x, table.Exact(x), shorter)
		}
	}
}

// mantissa gives the digits of a number as written, leading zeros too.
func mantissa(s string) string {
	s, _, _ = strings.Cut(s, "e")
	return strings.NewReplacer("-", "", ".", "").Replace(s)
}

func TestExactOfSpecialValues(t *testing.T) {
	for _, c := range []struct {
		x    float64
		want string
	}{
		{math.NaN(), ""},
		{0, "0"},
		{math.Copysign(0, -1), "0"},
		{math.Inf(1), "inf"},
		{math.Inf(-1), "-inf"},
		{0.1, "0.1"},
		{-2.5, "-2.5"},
		{100, "100"},
		{1.0 / 3, "0.3333333333333333"},
		{math.MaxFloat64, "1.7976931348623157e+308"},
		{math.SmallestNonzeroFloat64, "5e-324"},
	} {
		if got := table.Exact(c.x); got != c.want {
			t.Errorf("Exact(%v) = %q, want %q", c.x, got, c.want)
		}
	}
}

func write(t *testing.T, tab *table.Table) string {
	t.Helper()
	var b bytes.Buffer
	if err := tab.WriteCSV(&b); err != nil {
		t.Fatal(err)
	}
	return b.String()
}

func TestWriteCSV(t *testing.T) {
	tab := &table.Table{Columns: []table.Column{
		{Name: "release", Kind: table.Text},
		{Name: "offset_m", Unit: "m"},
		{Name: "spinward_deg", Unit: "deg", Scale: math.Pi / 180},
		{Name: "impacts", Kind: table.Integer},
	}}
	tab.Add(table.Str("wrench"), table.Num(-0.25), table.Num(math.Pi/2), table.Num(3))
	tab.Add(table.Str(""), table.Num(math.NaN()), table.Num(math.Copysign(0, -1)), table.Num(math.NaN()))
	const want = "release,offset_m,spinward_deg,impacts\r\n" +
		"wrench,-0.25,90,3\r\n" +
		",,0,\r\n"
	if got := write(t, tab); got != want {
		t.Errorf("got\n%q\nwant\n%q", got, want)
	}
}

// TestWriteCSVWithoutRows: a table of nothing still says its columns.
func TestWriteCSVWithoutRows(t *testing.T) {
	tab := &table.Table{Columns: []table.Column{{Name: "a"}, {Name: "b"}}}
	if got, want := write(t, tab), "a,b\r\n"; got != want {
		t.Errorf("got %q, want %q", got, want)
	}
}

// TestIntegersHaveNoExponent: the Table Schema's integers are digits.
func TestIntegersHaveNoExponent(t *testing.T) {
	tab := &table.Table{Columns: []table.Column{{Name: "sample", Kind: table.Integer}, {Name: "x_m"}}}
	for _, x := range []float64{0, 1, 999_999, 1_000_000, 123_456_789, -2_000_000, 1 << 52} {
		tab.Add(table.Num(x), table.Num(0))
	}
	const want = "0,1,999999,1000000,123456789,-2000000,4503599627370496"
	var got []string
	for _, line := range strings.Split(strings.TrimSpace(write(t, tab)), "\r\n")[1:] {
		first, _, _ := strings.Cut(line, ",")
		got = append(got, first)
	}
	if s := strings.Join(got, ","); s != want {
		t.Errorf("got %s, want %s", s, want)
	}
}

// TestWriteCSVReadsBack reads what was written by another reader of RFC 4180.
func TestWriteCSVReadsBack(t *testing.T) {
	texts := []string{"plain", "a, b", `3" pipe`, `"`, `""`, ",", "two\nlines", " spaces ", "Schlüssel", "工具", "tab\tinside", "a;b"}
	tab := &table.Table{Columns: []table.Column{{Name: "name", Kind: table.Text}, {Name: "other, \"odd\"", Kind: table.Text}, {Name: "x_m"}}}
	want := [][]string{{"name", "other, \"odd\"", "x_m"}}
	for i, s := range texts {
		other := texts[len(texts)-1-i]
		tab.Add(table.Str(s), table.Str(other), table.Num(float64(i)/8))
		want = append(want, []string{s, other, strconv.FormatFloat(float64(i)/8, 'g', -1, 64)})
	}
	src := write(t, tab)
	if bare := strings.Count(src, "\n") - strings.Count(src, "\r\n"); bare != 0 {
		t.Errorf("%d lines end without a carriage return", bare)
	}
	got, err := csv.NewReader(strings.NewReader(src)).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	if !slices.EqualFunc(got, want, slices.Equal[[]string]) {
		t.Errorf("got\n%q\nwant\n%q", got, want)
	}
}

// TestGuardAgainstFormulas: a text that a spreadsheet would compute is marked
// as text, any other stays as it is.
func TestGuardAgainstFormulas(t *testing.T) {
	for _, c := range []struct{ text, want string }{
		{"=1+1", "'=1+1"},
		{"=HYPERLINK(A1)", "'=HYPERLINK(A1)"},
		{"@SUM(A1)", "'@SUM(A1)"},
		{"+A1+A2", "'+A1+A2"},
		{"-cmd(1)", "'-cmd(1)"},
		{"-1+2", "'-1+2"},
		{"--1+cmd(2)", "'--1+cmd(2)"},
		{"\t=1", "'\t=1"},
		{"\r=1", "'\r=1"},
		{"\n=1", "'\n=1"},
		{"-5", "-5"},
		{"-5.25", "-5.25"},
		{"+1e-3", "+1e-3"},
		{"+axial side", "+axial side"},
		{"-axial", "-axial"},
		{"bulkhead -axial", "bulkhead -axial"},
		{"a=b", "a=b"},
		{"user@deck", "user@deck"},
		{"'quoted'", "'quoted'"},
		{"", ""},
	} {
		tab := &table.Table{Columns: []table.Column{{Name: "x_m"}, {Name: "name", Kind: table.Text}}}
		tab.Add(table.Num(1), table.Str(c.text))
		r := csv.NewReader(strings.NewReader(strings.ReplaceAll(write(t, tab), "\r\n", "\n")))
		rows, err := r.ReadAll()
		if err != nil {
			t.Fatalf("%q: %v", c.text, err)
		}
		// The writer ends a line inside a field by CR LF too, and drops a CR
		// that stands alone.
		want := strings.ReplaceAll(c.want, "\r", "")
		if got := rows[1][1]; got != want {
			t.Errorf("%q is written %q, want %q", c.text, got, want)
		}
	}
}

func TestNumbersAreNotGuarded(t *testing.T) {
	tab := &table.Table{Columns: []table.Column{{Name: "a_m"}, {Name: "b_m"}}}
	tab.Add(table.Num(-1.5), table.Num(-1e-7))
	if got, want := write(t, tab), "a_m,b_m\r\n-1.5,-1e-07\r\n"; got != want {
		t.Errorf("got %q, want %q", got, want)
	}
}

// failing is a writer that fails once it has taken n bytes.
type failing struct{ n int }

var errFull = errors.New("no space left")

func (f *failing) Write(p []byte) (int, error) {
	if f.n -= len(p); f.n < 0 {
		return 0, errFull
	}
	return len(p), nil
}

func TestWriteCSVGivesTheWritersError(t *testing.T) {
	tab := &table.Table{Columns: []table.Column{{Name: "a"}, {Name: "b"}}}
	for range 10_000 {
		tab.Add(table.Num(1), table.Num(2))
	}
	for _, n := range []int{0, 3, 5_000, 39_999} {
		if err := tab.WriteCSV(&failing{n}); !errors.Is(err, errFull) {
			t.Errorf("after %d bytes: got %v, want %v", n, err, errFull)
		}
	}
}

func TestAddRefusesARowOfWrongLength(t *testing.T) {
	tab := &table.Table{Columns: []table.Column{{Name: "a"}, {Name: "b"}}}
	defer func() {
		if recover() == nil {
			t.Error("a row of one cell is taken in a table of two columns")
		}
	}()
	tab.Add(table.Num(1))
}

func TestIndex(t *testing.T) {
	tab := &table.Table{Columns: []table.Column{{Name: "a"}, {Name: "b"}}}
	for name, want := range map[string]int{"a": 0, "b": 1, "c": -1, "": -1} {
		if got := tab.Index(name); got != want {
			t.Errorf("Index(%q) = %d, want %d", name, got, want)
		}
	}
}
