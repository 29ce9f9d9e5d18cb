package table

import (
	"math"
	"strconv"
	"strings"
	"unicode/utf8"
)

// Round writes a number for people, with the given number of significant
// digits, without an exponent from a millionth to ten million. Trailing zeros
// stay, since they say how exact the number is. A missing value is "-".
func Round(x float64, digits int) string {
	switch {
	case math.IsNaN(x):
		return "-"
	case math.IsInf(x, 0):
		return Exact(x)
	case x == 0:
		return "0"
	}
	// Rounded first: 0.99996 to three digits is 1.00, not 1.000.
	s := strconv.FormatFloat(x, 'e', digits-1, 64)
	rounded, _ := strconv.ParseFloat(s, 64)
	exp, _ := strconv.Atoi(s[strings.IndexByte(s, 'e')+1:])
	if exp < -6 || exp > 6 {
		return s
	}
	return strconv.FormatFloat(rounded, 'f', max(0, digits-1-exp), 64)
}

// Fixed writes a number with the given decimals, never as a negative zero. A
// missing value is "-".
func Fixed(x float64, decimals int) string {
	switch {
	case math.IsNaN(x):
		return "-"
	case math.IsInf(x, 0):
		return Exact(x)
	}
	s := strconv.FormatFloat(x, 'f', decimals, 64)
	if strings.Trim(s, "-0.") == "" {
		return strings.TrimPrefix(s, "-")
	}
	return s
}

// Signed is Fixed with a plus sign before what is above zero.
func Signed(x float64, decimals int) string {
	s := Fixed(x, decimals)
	if x > 0 && strings.Trim(s, "0.") != "" {
		return "+" + s
	}
	return s
}

// Align sets rows of text in columns, two spaces apart. right says which
// columns are set to the right, as numbers are. Lines carry no trailing
// spaces.
func Align(rows [][]string, right []bool) []string {
	wide := make([]int, len(right))
	for _, row := range rows {
		for i, s := range row {
			wide[i] = max(wide[i], utf8.RuneCountInString(s))
		}
	}
	out := make([]string, len(rows))
	for n, row := range rows {
		var b strings.Builder
		for i, s := range row {
			pad := strings.Repeat(" ", wide[i]-utf8.RuneCountInString(s))
			if i > 0 {
				b.WriteString("  ")
			}
			if right[i] {
				b.WriteString(pad + s)
			} else {
				b.WriteString(s + pad)
			}
		}
		out[n] = strings.TrimRight(b.String(), " ")
	}
	return out
}
