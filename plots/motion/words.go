package motion

import (
	"math"
	"strconv"
	"strings"
)

const minus = "\u2212"

// signif prints v to n significant digits, with a typeset minus; the player's script has the
// same rule.
func signif(v float64, n int) string {
	if v == 0 {
		return "0"
	}
	s := strconv.FormatFloat(v, 'e', n-1, 64)
	exp, _ := strconv.Atoi(s[strings.IndexByte(s, 'e')+1:])
	if exp < -4 || exp > 6 {
		return strings.ReplaceAll(s[:strings.IndexByte(s, 'e')]+"e"+strconv.Itoa(exp), "-", minus)
	}
	return strings.Replace(strconv.FormatFloat(v, 'f', max(0, n-1-exp), 64), "-", minus, 1)
}

// plain prints v to at most n significant digits, without zeros at the end.
func plain(v float64, n int) string {
	s := signif(v, n)
	if strings.Contains(s, ".") && !strings.Contains(s, "e") {
		s = strings.TrimSuffix(strings.TrimRight(s, "0"), ".")
	}
	return s
}

// length prints a length given in m in a fitting unit.
func length(v float64, n int) string {
	switch a := math.Abs(v); {
	case a == 0 || a >= 0.1 && a < 9999.5:
		return plain(v, n) + " m"
	case a < 0.1e-3:
		return plain(v*1e6, n) + " µm"
	case a < 0.1:
		return plain(v*1e3, n) + " mm"
	}
	return plain(v/1e3, n) + " km"
}

// spinWords says which way the floor moves: the drawn directions never flip.
func spinWords(spin float64) string {
	rpm := plain(math.Abs(spin)*30/math.Pi, 3) + " rpm"
	switch {
	case spin > 0:
		return "Spin " + rpm + ": the floor moves spinward."
	case spin < 0:
		return "Spin " + minus + rpm + ": the floor moves antispinward."
	}
	return "No spin."
}

// nice is the largest of 1, 2, 5 times a power of ten that is at most v.
func nice(v float64) float64 {
	p := math.Pow(10, math.Floor(math.Log10(v)))
	for _, k := range []float64{5, 2} {
		if k*p <= v*(1+1e-9) {
			return k * p
		}
	}
	return p
}

// Pictures play in real time where that takes realLeast to realMost, s.
const realLeast, realMost = 0.5, 10.0

// rate is how many times as fast as real a film of a duration (s) plays.
func rate(duration float64) float64 {
	switch {
	case duration <= 0 || duration >= realLeast && duration <= realMost:
		return 1
	case duration > realMost:
		r := nice(duration / realMost)
		if duration/r > realMost*1.0001 {
			r = nice(r * 2.5)
		}
		return r
	}
	return nice(duration / 2)
}

// rateWords say how fast a film plays.
func rateWords(rate float64) string {
	switch {
	case rate == 1:
		return "In real time."
	case rate > 1:
		return plain(rate, 3) + " times as fast as real."
	}
	return "Slowed down " + plain(1/rate, 3) + " times."
}
