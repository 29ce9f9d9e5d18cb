package plots

import (
	"math"
	"strconv"
	"strings"
)

// Minus is the sign before negative numbers in figures.
const minus = "\u2212"

// dimDigits is the number of significant digits of a dimension: what a drawing can
// show and a reader can use. Tables keep all digits.
const dimDigits = 3

// finite reports whether v is neither NaN nor infinite.
func finite(v float64) bool { return !math.IsNaN(v) && !math.IsInf(v, 0) }

// decimals prints v with n digits after the point, minus sign typeset, and no
// negative zero.
func decimals(v float64, n int) string {
	s := strconv.FormatFloat(v, 'f', n, 64)
	if strings.Trim(s, "-0.") == "" {
		return strings.TrimPrefix(s, "-")
	}
	return strings.Replace(s, "-", minus, 1)
}

// signif prints v to n significant digits; beyond 1e-4 to 1e6 with an exponent.
func signif(v float64, n int) string {
	if v == 0 || !finite(v) {
		return decimals(v, 0)
	}
	s := strconv.FormatFloat(v, 'e', n-1, 64)
	exp, _ := strconv.Atoi(s[strings.IndexByte(s, 'e')+1:])
	if exp < -4 || exp > 6 {
		mantissa := s[:strings.IndexByte(s, 'e')]
		return strings.ReplaceAll(mantissa+"e"+strconv.Itoa(exp), "-", minus)
	}
	return decimals(v, max(0, n-1-exp))
}

// lengthUnit is the unit, and its size in metres, in which a length of about v metres is read.
func lengthUnit(v float64) (string, float64) {
	switch a := math.Abs(v); {
	case a == 0 || a >= 0.1 && a < 9999.5:
		return "m", 1
	case a < 0.1e-3:
		return "µm", 1e-6
	case a < 0.1:
		return "mm", 1e-3
	default:
		return "km", 1e3
	}
}

// length prints a length given in m with a fitting unit, as "0.634 m", "0.898 mm", "2300 km".
func length(v float64) string {
	unit, size := lengthUnit(v)
	return signif(v/size, dimDigits) + " " + unit
}

// roundLength prints a length of one significant digit, as that of a scale bar.
func roundLength(v float64) string {
	unit, size := lengthUnit(v)
	return signif(v/size, 1) + " " + unit
}

// SignedLength prints a length along the deck, m, as figures do: to three digits, in a
// unit that fits, with its direction in words.
func SignedLength(v float64) string { return signedLength(v) }

// signedLength prints a length along the deck with its direction in words.
func signedLength(v float64) string {
	switch {
	case v > 0:
		return length(v) + " spinward"
	case v < 0:
		return length(-v) + " antispinward"
	}
	return "0 m"
}

// degrees prints an angle given in rad, to three significant digits; beyond a turn
// also as turns.
func degrees(v float64) string {
	s := signif(v*180/math.Pi, dimDigits) + "°"
	if math.Abs(v) > 2*math.Pi {
		s += " (" + signif(v/(2*math.Pi), dimDigits) + " turns)"
	}
	return s
}

// rpm prints a spin rate given in rad/s in the unit habitats are described in.
func rpm(v float64) string { return signif(math.Abs(v)*30/math.Pi, dimDigits) + " rpm" }

// seconds prints a time given in s.
func seconds(v float64) string { return signif(v, dimDigits) + " s" }
