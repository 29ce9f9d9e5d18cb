package main

import (
	"fmt"
	"io"
	"os"
	"time"
)

// progress tells how far a run is, on a terminal only.
type progress struct {
	w     io.Writer // nil: nobody watches
	last  time.Time
	shown bool
}

// tellEvery keeps the terminal calm.
const tellEvery = 200 * time.Millisecond

func newProgress(w io.Writer, quiet bool) *progress {
	f, ok := w.(*os.File)
	if quiet || !ok || os.Getenv("TERM") == "dumb" { // which cannot wipe a line
		return &progress{}
	}
	if info, err := f.Stat(); err != nil || info.Mode()&os.ModeCharDevice == 0 {
		return &progress{}
	}
	return &progress{w: w, last: time.Now()}
}

func (p *progress) releases(done, of int) { p.tell("releases", done, of) }

func (p *progress) tell(what string, done, of int) {
	if p.w == nil || time.Since(p.last) < tellEvery {
		return
	}
	p.last, p.shown = time.Now(), true
	fmt.Fprintf(p.w, "\r%s: %d of %d\x1b[K", calm(what), done, of)
}

// clear wipes the line.
func (p *progress) clear() {
	if p.shown {
		fmt.Fprint(p.w, "\r\x1b[K")
	}
}
