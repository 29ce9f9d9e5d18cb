package plots

import (
	"strings"
	"sync"
	"unicode/utf8"

	"gonum.org/v1/plot/font"
	"gonum.org/v1/plot/font/liberation"
	"gonum.org/v1/plot/vg"
)

// fontWeightBold is the weight of titles in the font package's scale (regular is 0).
const fontWeightBold = 3

// Heights of Liberation Sans, and of Arial and Helvetica, which share its metrics, per
// size of type: capital above the baseline, tail below, one line to the next.
const (
	capHeight  = 0.73
	tailDepth  = 0.21
	lineHeight = 1.22
)

var fonts = sync.OnceValue(func() *font.Cache { return font.NewCache(liberation.Collection()) })

// sans describes the type of every text in a figure.
func sans(size float64, bold bool) font.Font {
	f := font.Font{Typeface: "Liberation", Variant: "Sans", Size: vg.Length(size)}
	if bold {
		f.Weight = fontWeightBold
	}
	return f
}

func face(size float64, bold bool) font.Face {
	f := sans(size, bold)
	return fonts().Lookup(f, f.Size)
}

// textWidth is the width of s in pt.
func textWidth(s string, size float64, bold bool) float64 {
	f := face(size, bold)
	return f.Width(s).Points()
}

// clean makes a name fit for a line of XML text: control characters, line breaks and
// bytes that are not UTF-8 become spaces, and runs of spaces become one.
func clean(s string) string {
	s = strings.Map(func(r rune) rune {
		if r < 0x20 || r == 0x7F || r == utf8.RuneError || r == 0xFFFE || r == 0xFFFF {
			return ' '
		}
		return r
	}, s)
	return strings.Join(strings.Fields(s), " ")
}

// clip shortens s to width pt with an ellipsis.
func clip(s string, width, size float64, bold bool) string {
	if textWidth(s, size, bold) <= width {
		return s
	}
	r := []rune(s)
	for len(r) > 1 && textWidth(string(r)+"…", size, bold) > width {
		r = r[:len(r)-1]
	}
	return strings.TrimRight(string(r), " ") + "…"
}

// wrap breaks s into at most maxLines lines of width pt; what is left over is cut with
// an ellipsis.
func wrap(s string, width, size float64, bold bool, maxLines int) []string {
	var lines []string
	line := ""
	words := strings.Fields(s)
	for i, w := range words {
		next := strings.TrimSpace(line + " " + w)
		if line != "" && textWidth(next, size, bold) > width {
			if len(lines) == maxLines-1 {
				rest := line + " " + strings.Join(words[i:], " ")
				return append(lines, clip(rest, width, size, bold))
			}
			lines, next = append(lines, line), w
		}
		line = next
	}
	if line != "" {
		lines = append(lines, clip(line, width, size, bold))
	}
	return lines
}

// balanced breaks s into as many lines as wrap does, but of like widths, so that no word
// stands alone on the last one.
func balanced(s string, width, size float64, bold bool, maxLines int) []string {
	lines := wrap(s, width, size, bold, maxLines)
	if len(lines) < 2 || strings.HasSuffix(lines[len(lines)-1], "…") {
		return lines
	}
	const step = 4 // pt
	for w := width - step; w > width/2; w -= step {
		next := wrap(s, w, size, bold, maxLines+1)
		if len(next) > len(lines) {
			break
		}
		lines = next
	}
	return lines
}
