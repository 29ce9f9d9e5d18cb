package scenarios

import (
	"bytes"
	"fmt"
	"sort"
	"unicode/utf8"
)

// byteOrderMark may stand at the start of a UTF-8 file and counts as nothing.
var byteOrderMark = []byte("\xef\xbb\xbf")

// place is where a value stands.
type place struct {
	file      string
	line, col int
}

func (p place) fault(key, hint, format string, args ...any) Error {
	return Error{File: p.file, Line: p.line, Col: p.col, Key: key, Msg: fmt.Sprintf(format, args...), Hint: hint}
}

// content is a file's text, which knows the place of each offset in it.
type content struct {
	file  string
	src   []byte
	lines []int32 // offset of each line
	seen  spot    // where a place was last asked for
	base  int     // lines of the file before src
}

// spot is an offset with its line, from 0, and its column, from 1.
type spot struct{ offset, line, col int }

func newContent(file string, src []byte) content {
	c := content{file: file, src: bytes.TrimPrefix(src, byteOrderMark), seen: spot{col: 1}}
	c.lines = make([]int32, 1, 1+bytes.Count(c.src, []byte("\n")))
	for i, b := range c.src {
		if b == '\n' {
			c.lines = append(c.lines, int32(i+1))
		}
	}
	return c
}

// place gives the line and column of an offset, columns counted in characters.
// It counts on from the last one on the same line, so that a file of one long
// line takes no longer than any other.
func (c *content) place(offset int) place {
	offset = min(max(offset, 0), len(c.src))
	line := sort.Search(len(c.lines), func(i int) bool { return int(c.lines[i]) > offset }) - 1
	from := spot{int(c.lines[line]), line, 1}
	if c.seen.line == line && c.seen.offset <= offset {
		from = c.seen
	}
	c.seen = spot{offset, line, from.col + utf8.RuneCount(c.src[from.offset:offset])}
	return place{c.file, c.base + line + 1, c.seen.col}
}

// placeOf gives the place of a line, from 1, and a column in bytes, from 1.
func (c *content) placeOf(line, col int) place {
	return c.place(int(c.lines[min(max(line, 1), len(c.lines))-1]) + col - 1)
}
