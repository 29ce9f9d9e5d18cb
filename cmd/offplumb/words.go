package main

import (
	"math"
	"slices"
	"strconv"
	"strings"

	"offplumb/sim/table"
)

// textWidth is how wide running text of the summary is, in characters.
const textWidth = 100

// rpm is a spin rate (rad/s) in revolutions a minute.
func rpm(spin float64) float64 { return spin * 30 / math.Pi }

// leastShown is the least magnitude shown, in SI: what is below, no reader
// cares for.
const leastShown = 5e-7

// sigfig rounds to significant digits.
func sigfig(x float64, digits int) string {
	if math.Abs(x) < leastShown {
		x = 0
	}
	return table.Round(x, digits)
}

// given writes a number as someone gave it, without zeros at its end.
func given(x float64) string {
	rounded, _ := strconv.ParseFloat(strconv.FormatFloat(x, 'g', 6, 64), 64)
	return strconv.FormatFloat(rounded, 'f', -1, 64)
}

// smaller are the units for small values of some units: each a thousandth of
// the one before.
var smaller = map[string][]string{"m": {"m", "mm"}, "J": {"J", "mJ", "uJ"}, "m/s": {"m/s", "mm/s"}}

// smallFrom is the magnitude below which a smaller unit is taken.
const smallFrom = 0.0099995

func withUnit(x float64, unit string) string {
	if math.IsNaN(x) {
		return "-"
	}
	units := smaller[unit]
	for k := 1; k < len(units) && math.Abs(x) < smallFrom && math.Abs(x) >= leastShown; k++ {
		x, unit = 1000*x, units[k]
	}
	return sigfig(x, 3) + " " + unit
}

// way says how far and which way along the deck.
func way(x float64) string {
	switch {
	case math.IsNaN(x):
		return "-"
	case math.Abs(x) < leastShown:
		return "0 m"
	case x > 0:
		return withUnit(x, "m") + " spinward"
	}
	return withUnit(-x, "m") + " antispinward"
}

func orZero(x float64) float64 {
	if math.IsNaN(x) {
		return 0
	}
	return x
}

// extent is the least and the greatest of some values.
type extent struct{ low, high float64 }

func newRange() *extent { return &extent{math.Inf(1), math.Inf(-1)} }

func (r *extent) add(x float64) { r.low, r.high = math.Min(r.low, x), math.Max(r.high, x) }

// String gives one value where both round to the same.
func (r *extent) String() string {
	low, high := sigfig(r.low, 3), sigfig(r.high, 3)
	if low == high {
		return low
	}
	return low + " to " + high
}

func spaced(unit string) string {
	if unit == "" {
		return ""
	}
	return " " + unit
}

// wrapped breaks running text, with an indent from the second line on.
func wrapped(text, indent string) string {
	var b strings.Builder
	col := 0
	for i, word := range held(strings.Fields(text)) {
		switch n := len([]rune(word)); {
		case i == 0:
			lead := text[:len(text)-len(strings.TrimLeft(text, " "))]
			b.WriteString(lead)
			col = n + len(lead)
		case col+1+n > textWidth:
			b.WriteString("\n" + indent)
			col = len(indent) + n
		default:
			b.WriteByte(' ')
			col += 1 + n
		}
		b.WriteString(word)
	}
	return b.String() + "\n"
}

// held joins numbers to the units behind them, which no line may part.
func held(words []string) []string {
	out := words[:0:0]
	for i, w := range words {
		if i > 0 && slices.Contains(unitsHeld, strings.TrimRight(w, ".,;:)")) && isNumber(words[i-1]) {
			out[len(out)-1] += " " + w
			continue
		}
		out = append(out, w)
	}
	return out
}

// unitsHeld are the units of running text.
var unitsHeld = []string{"m", "mm", "m/s", "mm/s", "s", "J", "mJ", "uJ", "N", "g", "kg", "deg", "rpm", "%", "m^2"}

func isNumber(s string) bool {
	_, err := strconv.ParseFloat(strings.TrimLeft(s, "("), 64)
	return err == nil
}
