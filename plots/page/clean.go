package page

import (
	"strings"
	"unicode"
)

// clean makes a text fit for the page: control characters, which XML forbids
// or which turn the direction of what follows, are dropped; line ends and tabs
// are spaces.
func clean(s string) string {
	return strings.Join(strings.Fields(strings.Map(func(r rune) rune {
		switch {
		case r == '\n' || r == '\r' || r == '\t':
			return ' '
		case unfit(r):
			return -1
		}
		return r
	}, s)), " ")
}

// lines is clean for a text whose lines are to stay.
func lines(s string) string {
	return strings.TrimRight(strings.Map(func(r rune) rune {
		if r != '\n' && r != '\t' && unfit(r) {
			return -1
		}
		return r
	}, strings.ReplaceAll(s, "\r\n", "\n")), "\n")
}

// unfit says whether a character has no place in the page: controls, what XML
// 1.0 leaves out, and the characters that override the writing direction.
func unfit(r rune) bool {
	switch {
	case unicode.IsControl(r), r == 0xFFFE, r == 0xFFFF, r == unicode.ReplacementChar:
		return true
	case r >= 0x202A && r <= 0x202E, r >= 0x2066 && r <= 0x2069:
		return true
	}
	return false
}

// paragraphs splits a text at its empty lines.
func paragraphs(s string) (out []string) {
	for _, p := range strings.Split(lines(s), "\n\n") {
		if p = clean(p); p != "" {
			out = append(out, p)
		}
	}
	return out
}
