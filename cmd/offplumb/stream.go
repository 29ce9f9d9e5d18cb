package main

import (
	"context"
	"io"
	"os"

	"offplumb/scenarios"
	"offplumb/sim/measure"
	"offplumb/sim/study"
)

// streamResult is a release list that is too long to be kept, and what its rows
// came to.
type streamResult struct {
	of       *scenarios.Stream
	tally    tally
	verdicts []study.Judged // of each limit
	ran      bool
}

// streamShare is the work of such a list. Its rows go to landings.csv and
// rests.csv as they come, in order; only the tally stays.
type streamShare struct {
	j *job
	*streamResult
}

func (s *streamShare) of() (kind, name string) { return "release list", s.streamResult.of.File }
func (s *streamShare) items() int              { return s.streamResult.of.Rows }
func (s *streamShare) layout() string {
	return study.Layout(study.Row{}) + study.Layout([]study.Judged{})
}

// batch is some rows, one after another, on their way to the tables.
type batch struct {
	first           int
	rows            []study.Row
	verdicts        []study.Judged
	landings, rests []byte // their lines
}

// compute flies the rows of a range. A list that changed meanwhile is an error.
func (s *streamShare) compute(ctx context.Context, r span, p *progress, out *study.Packer) error {
	rows, err := s.streamResult.of.Open()
	if err != nil {
		return err
	}
	defer rows.Close()
	s.start()
	done := 0
	emit := func(b batch) error {
		done += len(b.rows)
		p.tell("rows of "+s.streamResult.of.File, done, r.len())
		for i := range b.verdicts {
			s.verdicts[i].Add(b.verdicts[i])
		}
		if out == nil {
			return s.take(&b)
		}
		for i := range b.rows {
			if err := out.Put(b.rows[i]); err != nil {
				return err
			}
		}
		return nil
	}
	next := func() (scenarios.Chunk, bool, error) {
		for {
			c, ok, err := rows.Next()
			if !ok || err != nil || c.First < r.to && c.First+c.Count > r.from {
				return c, ok, err
			}
		}
	}
	if err := study.InOrder(ctx, s.j.flags.jobs, next, func() func(scenarios.Chunk) (batch, error) { return s.worker(r, out == nil) }, emit); err != nil {
		return err
	}
	if out != nil {
		return out.Put(s.verdicts)
	}
	return nil
}

func (s *streamShare) start() {
	s.ran, s.verdicts = true, make([]study.Judged, len(s.j.Limits))
	s.tally = newTally(s.streamResult.of.Rows, len(s.j.flags.only) > 0)
}

// worker gives what flies the rows of a chunk that are in a range.
func (s *streamShare) worker(r span, written bool) func(scenarios.Chunk) (batch, error) {
	flier := s.j.RowFlier()
	return func(c scenarios.Chunk) (batch, error) {
		releases, err := c.Releases()
		if err != nil {
			return batch{}, err
		}
		from, to := max(c.First, r.from), min(c.First+c.Count, r.to)
		b := batch{first: from, rows: make([]study.Row, to-from), verdicts: make([]study.Judged, len(s.j.Limits))}
		for i := range b.rows {
			release := &releases[from-c.First+i]
			if !s.j.wanted(release.Name) {
				continue
			}
			if b.rows[i], err = flier.Fly(release, b.verdicts); err != nil {
				return b, err
			}
		}
		if written {
			b.write()
		}
		return b, nil
	}
}

// write makes the lines of the tables.
func (b *batch) write() {
	lines := measure.NewLines()
	b.landings, b.rests = make([]byte, 0, lineSize*len(b.rows)), make([]byte, 0, lineSize*len(b.rows))
	for i := range b.rows {
		if r := &b.rows[i]; r.Flown {
			b.landings, b.rests = lines.Landing(b.landings, &r.Landing), lines.Rest(b.rests, &r.Rest)
		}
	}
}

// lineSize is about the length of a line of the tables, bytes: a longer one
// makes them grow.
const lineSize = 384

// take writes rows to the tables and counts them.
func (s *streamShare) take(b *batch) error {
	w, err := s.j.listWriter()
	if err != nil {
		return err
	}
	if err := w.upTo(s.streamResult.of.After); err != nil {
		return err
	}
	for i := range b.rows {
		if b.rows[i].Flown {
			s.tally.add(s.j, b.first+i, &b.rows[i])
		}
	}
	return w.lines(b.landings, b.rests)
}

// restoredAtOnce is how many rows a join has in hand at a time.
const restoredAtOnce = 256

func (s *streamShare) restore(r span, in *study.Unpacker) error {
	if !s.ran {
		s.start()
	}
	for from := r.from; from < r.to; from += restoredAtOnce {
		b := batch{first: from}
		if err := takeItems(in, span{from, min(from+restoredAtOnce, r.to)}, func(_ int, row study.Row) { b.rows = append(b.rows, row) }); err != nil {
			return err
		}
		b.write()
		if err := s.take(&b); err != nil {
			return err
		}
	}
	var verdicts []study.Judged
	if err := in.Get(&verdicts); err != nil {
		return err
	}
	for i := range verdicts {
		s.verdicts[i].Add(verdicts[i])
	}
	return nil
}

func (s *streamShare) finish() {}

// wantsRows says whether --only asks for any row of a long list.
func (j *job) wantsRows(s *scenarios.Stream) bool {
	return len(j.flags.only) == 0 || len(s.Find(j.flags.only)) > 0
}

// listWriter writes landings.csv and rests.csv while rows come.
type listWriter struct {
	j               *job
	landings, rests *os.File
	next            int // release of the scenario to be written next
}

// listWriter opens the two tables, unless they are.
func (j *job) listWriter() (*listWriter, error) {
	if j.lists != nil {
		return j.lists, nil
	}
	w := &listWriter{j: j}
	var err error
	if w.landings, err = j.stage.create(landingsFile); err != nil {
		return nil, err
	}
	if w.rests, err = j.stage.create(restsFile); err != nil {
		w.landings.Close()
		return nil, err
	}
	j.lists = w
	if err := measure.LandingTable(nil).WriteCSV(w.landings); err != nil {
		return nil, err
	}
	return w, measure.RestTable(nil).WriteCSV(w.rests)
}

// The tables that long lists are streamed into.
const (
	landingsFile = "landings.csv"
	restsFile    = "rests.csv"
)

// upTo writes the scenario's own releases up to one.
func (w *listWriter) upTo(release int) error {
	if release <= w.next {
		return nil
	}
	var b batch
	for ; w.next < release; w.next++ {
		if r := &w.j.results[w.next]; r.Finished() {
			b.rows = append(b.rows, study.Row{Outcome: r.Outcome(), Flown: true})
		}
	}
	b.write()
	return w.lines(b.landings, b.rests)
}

func (w *listWriter) lines(landings, rests []byte) error {
	for _, f := range []struct {
		to   io.Writer
		text []byte
	}{{w.landings, landings}, {w.rests, rests}} {
		if _, err := f.to.Write(f.text); err != nil {
			return err
		}
	}
	return nil
}

// end writes what is left and closes the tables.
func (w *listWriter) end() error {
	if w == nil || w.landings == nil {
		return nil
	}
	err := w.upTo(len(w.j.results))
	for _, f := range []*os.File{w.landings, w.rests} {
		if cerr := f.Close(); err == nil {
			err = cerr
		}
	}
	w.landings = nil
	return err
}
