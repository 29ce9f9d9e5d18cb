package main

import (
	"strings"
	"unicode"
)

// calm replaces what could command a terminal: names of files and words of the
// command line may hold control characters, and marks that turn the direction
// of a text. Lines and tabs stay.
func calm(s string) string {
	return strings.Map(func(r rune) rune {
		if r == '\n' || r == '\t' || unicode.IsPrint(r) {
			return r
		}
		return unicode.ReplacementChar
	}, s)
}
