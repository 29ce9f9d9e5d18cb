package scenarios

import (
	"bufio"
	"bytes"
	"errors"
	"io"
)

const (
	// blockSize is how many bytes of a long list are read at a time, and the row
	// that they end in: a few hundred rows.
	blockSize = 32 << 10
	// mostRow bounds a row of a list, bytes: a quote that is never closed would
	// make the rest of the file one field.
	mostRow = 1 << 20
)

// block is a piece of a CSV file: whole rows.
type block struct {
	src    []byte
	line   int  // lines before it
	number int  // of the block, from 0
	long   bool // it is cut off, for its last row is longer than mostRow
}

// blockReader divides a CSV file into blocks. A line that ends within quotes
// ends no row.
type blockReader struct {
	r      *bufio.Reader
	line   int
	number int
	done   bool
}

func newBlockReader(r io.Reader) *blockReader {
	return &blockReader{r: bufio.NewReaderSize(r, blockSize)}
}

// next gives the next block, or io.EOF.
func (b *blockReader) next() (block, error) {
	if b.done {
		return block{}, io.EOF
	}
	out := block{line: b.line, number: b.number}
	quoted, row := false, 0
	for {
		piece, err := b.r.ReadSlice('\n')
		out.src = append(out.src, piece...)
		quoted = quoted != (bytes.Count(piece, []byte{'"'})%2 == 1)
		row += len(piece)
		switch {
		case err == nil:
			b.line++
			if !quoted {
				row = 0
			}
		case errors.Is(err, io.EOF):
			b.done = true
		case !errors.Is(err, bufio.ErrBufferFull):
			return block{}, err
		}
		out.long = row > mostRow
		if b.done || out.long || err == nil && !quoted && len(out.src) >= blockSize {
			break
		}
	}
	b.done = b.done || out.long
	if len(out.src) == 0 {
		return block{}, io.EOF
	}
	b.number++
	return out, nil
}
