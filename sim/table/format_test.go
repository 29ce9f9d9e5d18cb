package table_test

import (
	"math"
	"slices"
	"strconv"
	"strings"
	"testing"

	"offplumb/sim/table"
	"pgregory.net/rapid"
)

func TestRound(t *testing.T) {
	for _, c := range []struct {
		x      float64
		digits int
		want   string
	}{
		{0, 3, "0"},
		{math.Copysign(0, -1), 3, "0"},
		{math.NaN(), 3, "-"},
		{math.Inf(1), 3, "inf"},
		{math.Inf(-1), 3, "-inf"},
		{1, 3, "1.00"},
		{1.5, 1, "2"},
		{0.99996, 3, "1.00"},
		{-0.99996, 3, "-1.00"},
		{9.995, 3, "9.99"}, // the double is below 9.995
		{9.996, 3, "10.0"},
		{99.96, 3, "100"},
		{999.6, 3, "1000"},
		{0.0999999, 3, "0.100"},
		{0.001, 3, "0.00100"},
		{123456, 3, "123000"},
		{-0.012345, 2, "-0.012"},
		{1e-6, 3, "0.00000100"},
		{9.996e-7, 3, "0.00000100"}, // a millionth once rounded
		{1e-7, 3, "1.00e-07"},
		{1e6, 3, "1000000"},
		{1e7, 3, "1.00e+07"},
		{9.996e6, 3, "1.00e+07"},
		{-1.2345e9, 3, "-1.23e+09"},
		{math.SmallestNonzeroFloat64, 3, "4.94e-324"},
		{999.9999999999, 13, "999.9999999999"}, // close below a power of ten
	} {
		if got := table.Round(c.x, c.digits); got != c.want {
			t.Errorf("Round(%v, %d) = %q, want %q", c.x, c.digits, got, c.want)
		}
	}
}

// TestRoundIsWithinHalfAUnit: a number and its text differ by at most half a
// unit of the last digit asked for, and the text has that many digits.
func TestRoundIsWithinHalfAUnit(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		x := rapid.Float64Range(-1e300, 1e300).Draw(t, "x") // beyond, the text may overflow
		digits := rapid.IntRange(1, 15).Draw(t, "digits")
		if x == 0 {
			return
		}
		s := table.Round(x, digits)
		back, err := strconv.ParseFloat(s, 64)
		if err != nil && !math.IsInf(back, 0) {
			t.Fatalf("Round(%v, %d) = %q: %v", x, digits, s, err)
		}
		// Half a unit of the last digit is at most 0.5e1^-(digits-1) of the
		// number; the reading back of the text adds its own rounding.
		const reading = 1e-15
		if most := math.Abs(x)*(0.5*math.Pow(10, float64(1-digits))+reading) + math.SmallestNonzeroFloat64; math.Abs(back-x) > most {
			t.Fatalf("Round(%v, %d) = %q, off by %g, more than %g", x, digits, s, back-x, most)
		}
		if n := len(strings.TrimLeft(mantissa(s), "0")); n < digits {
			t.Fatalf("Round(%v, %d) = %q shows %d digits", x, digits, s, n)
		}
	})
}

func TestFixedAndSigned(t *testing.T) {
	for _, c := range []struct {
		x             float64
		decimals      int
		fixed, signed string
	}{
		{0, 2, "0.00", "0.00"},
		{math.Copysign(0, -1), 2, "0.00", "0.00"},
		{math.Copysign(0, -1), 0, "0", "0"},
		{-0.004, 2, "0.00", "0.00"},
		{0.004, 2, "0.00", "0.00"},
		{-0.006, 2, "-0.01", "-0.01"},
		{0.006, 2, "0.01", "+0.01"},
		{-0.4, 0, "0", "0"},
		{0.6, 0, "1", "+1"},
		{10, 0, "10", "+10"},
		{100, 1, "100.0", "+100.0"},
		{-10, 1, "-10.0", "-10.0"},
		{0.99996, 3, "1.000", "+1.000"},
		{1e-7, 3, "0.000", "0.000"},
		{1e7, 1, "10000000.0", "+10000000.0"},
		{math.NaN(), 2, "-", "-"},
		{math.Inf(1), 2, "inf", "+inf"},
		{math.Inf(-1), 2, "-inf", "-inf"},
	} {
		if got := table.Fixed(c.x, c.decimals); got != c.fixed {
			t.Errorf("Fixed(%v, %d) = %q, want %q", c.x, c.decimals, got, c.fixed)
		}
		if got := table.Signed(c.x, c.decimals); got != c.signed {
			t.Errorf("Signed(%v, %d) = %q, want %q", c.x, c.decimals, got, c.signed)
		}
	}
}

func TestAlign(t *testing.T) {
	got := table.Align([][]string{
		{"deck", "radius", "note"},
		{"floor", "18", ""},
		{"Küche", "5.25", "kurz"},
		{"b"},
	}, []bool{false, true, false})
	want := []string{
		"deck   radius  note",
		"floor      18",
		"Küche    5.25  kurz",
		"b",
	}
	if !slices.Equal(got, want) {
		t.Errorf("got\n%s\nwant\n%s", strings.Join(got, "\n"), strings.Join(want, "\n"))
	}
}

func TestAlignNothing(t *testing.T) {
	if got := table.Align(nil, []bool{true}); len(got) != 0 {
		t.Errorf("no rows give %q", got)
	}
}
