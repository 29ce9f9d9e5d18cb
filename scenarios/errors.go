package scenarios

import (
	"cmp"
	"fmt"
	"slices"
	"strings"
)

// Error is one fault of a scenario, at its place.
type Error struct {
	File      string
	Line, Col int    // from 1; 0: none
	Key       string // such as habitat.spin; may be empty
	Msg       string // what is wanted and what was found
	Hint      string // may be empty
}

// Error gives file:line:column: key: message, with the hint on a line of its
// own.
func (e Error) Error() string {
	var b strings.Builder
	b.WriteString(e.File)
	if e.Line > 0 {
		fmt.Fprintf(&b, ":%d:%d", e.Line, e.Col)
	}
	b.WriteString(": ")
	if e.Key != "" {
		b.WriteString(e.Key + ": ")
	}
	b.WriteString(e.Msg)
	if e.Hint != "" {
		b.WriteString("\n  hint: " + e.Hint)
	}
	return b.String()
}

// ErrorList is all faults of a scenario, in the order of the file.
type ErrorList []Error

// Error gives one fault a line.
func (l ErrorList) Error() string {
	lines := make([]string, len(l))
	for i := range l {
		lines[i] = l[i].Error()
	}
	return strings.Join(lines, "\n")
}

// sorted orders faults by their place, settings of the command line first,
// and drops repeats.
func (l ErrorList) sorted() ErrorList {
	slices.SortStableFunc(l, func(a, b Error) int {
		return cmp.Or(cmp.Compare(min(a.Line, 1), min(b.Line, 1)), cmp.Compare(a.File, b.File),
			cmp.Compare(a.Line, b.Line), cmp.Compare(a.Col, b.Col))
	})
	return slices.Compact(l)
}

// nearest gives the known word that is most like the one given, or "" where
// none is within a third of its letters.
func nearest(word string, known []string) string {
	best, least := "", max(1, len(word)/3)+1
	for _, k := range known {
		if len(word)-len(k) >= least || len(k)-len(word) >= least {
			continue // as many letters to insert or delete at least
		}
		if d := editDistance(word, k); d < least {
			best, least = k, d
		}
	}
	return best
}

// maxWord bounds the words that editDistance compares.
const maxWord = 64

// editDistance counts the letters to insert, delete, replace or swap with
// their neighbour to make b of a (optimal string alignment).
func editDistance(a, b string) int {
	if len(a) > maxWord || len(b) > maxWord {
		return max(len(a), len(b))
	}
	var d [maxWord + 1][maxWord + 1]uint8 // of at most maxWord, and cheap to clear
	for i := 0; i <= len(a); i++ {
		for j := 0; j <= len(b); j++ {
			switch {
			case i == 0 || j == 0:
				d[i][j] = uint8(i + j)
				continue
			case a[i-1] == b[j-1]:
				d[i][j] = d[i-1][j-1]
			default:
				d[i][j] = 1 + min(d[i-1][j-1], d[i-1][j], d[i][j-1])
			}
			if i > 1 && j > 1 && a[i-1] == b[j-2] && a[i-2] == b[j-1] {
				d[i][j] = min(d[i][j], d[i-2][j-2]+1)
			}
		}
	}
	return int(d[len(a)][len(b)])
}
