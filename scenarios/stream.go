package scenarios

import (
	"bytes"
	"context"
	"crypto/sha256"
	"encoding/csv"
	"encoding/hex"
	"errors"
	"fmt"
	"hash"
	"io"
	"runtime"

	"offplumb/sim/measure"
	"offplumb/sim/model"
	"offplumb/sim/study"
)

const (
	// DefaultKeepRows is up to how many lines a release list is kept in memory;
	// a longer one, without tracks, is streamed.
	DefaultKeepRows = 5000
	// keptSize is the size, in bytes, above which it is streamed whatever its
	// lines.
	keptSize = 4 << 20
	// MaxRows bounds the rows of a streamed list; 8 bytes of each are kept while
	// its names are held apart.
	MaxRows = 20_000_000
)

// ErrChanged says that a release list is not as it was when it was checked.
var ErrChanged = errors.New("has changed since it was checked")

// Stream is a release list too long to be kept in memory: it is read once to
// be checked and once more to be flown. Its releases are not among those of the
// model.
type Stream struct {
	File  string // as the scenario names it
	Rows  int
	After int // releases of the model before its own, in the order of the file

	in     int // of the scenario's inputs
	head   listReader
	open   func() (io.ReadCloser, error)
	sum    string
	lines  int     // read
	counts []int32 // rows of each block
	hashes []uint64
	faults ErrorList
	count  int // of its faults
}

// long takes a release list that is too long to be kept; false: it is not.
func (b *builder) long(o *object, files reading) bool {
	if o.flag("tracks") {
		return false
	}
	name, ok := o.str("file"), true
	if quiet := (&builder{}); ok {
		name, ok = quiet.fileNamed(o, "file", files) // faults are for whoever reads it
	}
	if !ok {
		return false
	}
	f, err := files.open(name)
	if err != nil {
		return false
	}
	defer f.Close()
	head, err := io.ReadAll(io.LimitReader(f, keptSize+1))
	if err != nil || len(head) <= keptSize && bytes.Count(head, []byte{'\n'}) <= files.keep {
		return false
	}
	if files.brief {
		return true
	}
	*files.inputs = append(*files.inputs, Input{Name: name})
	s := &Stream{File: name, After: len(b.in.Releases), in: len(*files.inputs) - 1, open: func() (io.ReadCloser, error) { return files.open(name) }}
	s.head = listReader{b: b, o: o, content: content{file: name}}
	b.streams = append(b.streams, s)
	return true
}

// scan reads the long lists through and gives their faults. Without a model,
// which has faults itself, rows are not held against the interior.
func (sc *Scenario) scan(b *builder, m *model.Model) (errs ErrorList) {
	known := map[string]bool{}
	for i := range b.in.Releases {
		known[b.in.Releases[i].Name] = true
	}
	if m != nil {
		for i := range m.Limits {
			m.Limits[i].Listed = make([]bool, len(m.Limits[i].Of))
		}
	}
	for _, s := range b.streams {
		s.head.index()
		s.head.taken, s.head.known = nil, known
		s.check(m)
		if more := s.count - len(s.faults); more > 0 {
			s.faults = append(s.faults, s.end().fault("", "", "%s", moreFaults(more)))
		}
		errs = append(errs, s.faults...)
		sc.Inputs[s.in].SHA256 = s.sum
	}
	errs = append(errs, apart(b.streams)...)
	for _, s := range b.streams {
		s.hashes, s.faults = nil, nil
	}
	sc.Streams = b.streams
	return errs
}

// end is the place behind all that was read of the file.
func (s *Stream) end() place { return place{s.File, s.lines + 1, 1} }

// fault notes a fault of the file, up to a number.
func (s *Stream) fault(at place, hint, format string, args ...any) {
	if s.count++; s.count <= mostFaults {
		s.faults = append(s.faults, at.fault("", hint, format, args...))
	}
}

// parsed is what a block gave.
type parsed struct {
	releases []model.Release
	faults   ErrorList
	count    int // of faults
	hashes   []uint64
	matched  [][]bool // of each limit and each of its names
	broken   bool     // the rows behind cannot be told
}

// check reads the file through.
func (s *Stream) check(m *model.Model) {
	rows, err := s.Open()
	if err != nil {
		s.fault(place{file: s.File}, "", "cannot be read: %v", plainly(err))
		return
	}
	defer rows.f.Close()
	err = study.InOrder(context.Background(), runtime.GOMAXPROCS(0), rows.next,
		func() func(block) (parsed, error) {
			return func(b block) (parsed, error) { return s.checked(b, m), nil }
		},
		func(p parsed) error { return s.take(p, m) })
	s.lines = rows.blocks.line
	s.sum = hex.EncodeToString(rows.hash.Sum(nil))
	switch {
	case errors.Is(err, errStop):
	case err != nil:
		s.fault(place{file: s.File}, "", "cannot be read: %v", plainly(err))
	}
}

var errStop = errors.New("stop")

// take counts what a block gave.
func (s *Stream) take(p parsed, m *model.Model) error {
	s.count += p.count
	s.faults = append(s.faults, p.faults[:min(len(p.faults), max(0, mostFaults-len(s.faults)))]...)
	s.counts = append(s.counts, int32(len(p.releases)))
	s.hashes = append(s.hashes, p.hashes...)
	s.Rows += len(p.releases)
	for i, names := range p.matched {
		for k, ok := range names {
			m.Limits[i].Listed[k] = m.Limits[i].Listed[k] || ok
		}
	}
	if s.Rows > MaxRows {
		s.fault(place{file: s.File}, "divide it into several scenarios", "has more than %d rows", MaxRows)
		return errStop
	}
	if p.broken {
		return errStop
	}
	return nil
}

// checked reads the rows of a block and holds them against the model.
func (s *Stream) checked(b block, m *model.Model) parsed {
	l, broken := s.read(b)
	p := parsed{releases: l.b.in.Releases, broken: broken}
	for i := range p.releases {
		r := &p.releases[i]
		p.hashes = append(p.hashes, hashOf(r.Name))
		if m == nil {
			continue
		}
		for _, fault := range m.CheckRelease(r) {
			at, key := l.b.rows[i].find(fault.Key)
			if l.faults++; l.faults <= mostFaults {
				l.b.fault(at, key, fault.Hint, "%s", fault.Msg)
			}
		}
	}
	p.faults, p.count = l.b.errs, l.faults
	if m != nil {
		p.matched = matched(m, p.releases)
	}
	return p
}

// matched says which names of the limits stand for any of some releases.
func matched(m *model.Model, releases []model.Release) [][]bool {
	out := make([][]bool, len(m.Limits))
	for i := range m.Limits {
		out[i] = make([]bool, len(m.Limits[i].Of))
		for k, of := range m.Limits[i].Of {
			for r := 0; r < len(releases) && !out[i][k]; r++ {
				out[i][k] = measure.StandsFor(of, releases[r].Name)
			}
		}
	}
	return out
}

// read reads the rows of a block; broken says that those behind it cannot be
// told.
func (s *Stream) read(b block) (l *listReader, broken bool) {
	head := s.head
	l = &head
	l.b = &builder{}
	l.content = newContent(s.File, b.src)
	l.base = b.line
	if at, bad := notText(l.src); bad {
		l.fault(l.place(at), "save it as CSV UTF-8", "is not UTF-8")
		return l, true
	}
	if b.long {
		l.fault(l.place(bytes.LastIndexByte(l.src[:max(0, len(l.src)-mostRow)], '\n')+1), "is a quote never closed?", "has a row of more than %d MiB", mostRow>>20)
		return l, true
	}
	l.room(bytes.Count(l.src, []byte{'\n'}) + 1)
	l.csv = csv.NewReader(bytes.NewReader(l.src))
	l.csv.ReuseRecord = true
	if b.number > 0 {
		l.csv.FieldsPerRecord = len(l.cols)
		return l, !l.rows()
	}
	rec, err := l.csv.Read()
	switch {
	case errors.Is(err, io.EOF):
		l.fault(l.place(0), "the first column is release", "wants a header row, got blank lines")
		return l, true
	case err != nil:
		l.broken(err)
		return l, true
	}
	l.cols, l.names = nil, nil
	if !l.header(rec) {
		return l, true
	}
	return l, !l.rows()
}

// ListRows reads a long list once more.
type ListRows struct {
	s      *Stream
	f      io.Closer
	blocks *blockReader
	hash   hash.Hash
	ready  *block // read for its header, and still to be given
	first  int
}

// Open opens the list to read its rows.
func (s *Stream) Open() (*ListRows, error) {
	f, err := s.open()
	if err != nil {
		return nil, err
	}
	r := &ListRows{s: s, f: f, hash: sha256.New()}
	r.blocks = newBlockReader(io.TeeReader(f, r.hash))
	if s.head.cols == nil { // the first block has the header row, which others need
		b, err := r.blocks.next()
		if err != nil && !errors.Is(err, io.EOF) {
			f.Close()
			return nil, err
		}
		l, _ := s.read(b)
		s.head.cols, s.head.names = l.cols, l.names
		r.ready = &b
	}
	return r, nil
}

func (r *ListRows) next() (block, bool, error) {
	if b := r.ready; b != nil {
		r.ready = nil
		return *b, true, nil
	}
	b, err := r.blocks.next()
	if errors.Is(err, io.EOF) {
		return b, false, nil
	}
	return b, err == nil, err
}

// Chunk is some rows of a list, one after another.
type Chunk struct {
	First, Count int // rows
	s            *Stream
	b            block
}

// Next gives the next rows; false: there are no more. The error wraps
// [ErrChanged] where the list is not as it was.
func (r *ListRows) Next() (Chunk, bool, error) {
	b, ok, err := r.next()
	switch {
	case err != nil:
		return Chunk{}, false, fmt.Errorf("%s: %w", r.s.File, plainly(err))
	case !ok && (hex.EncodeToString(r.hash.Sum(nil)) != r.s.sum || r.first != r.s.Rows), ok && b.number >= len(r.s.counts):
		return Chunk{}, false, fmt.Errorf("%s %w", r.s.File, ErrChanged)
	case !ok:
		return Chunk{}, false, nil
	}
	c := Chunk{First: r.first, Count: int(r.s.counts[b.number]), s: r.s, b: b}
	r.first += c.Count
	return c, true, nil
}

// Close closes the list.
func (r *ListRows) Close() error { return r.f.Close() }

// Releases reads the rows. It may be called by any goroutine.
func (c *Chunk) Releases() ([]model.Release, error) {
	l, broken := c.s.read(c.b)
	if broken || l.faults > 0 || len(l.b.in.Releases) != c.Count {
		return nil, fmt.Errorf("%s %w", c.s.File, ErrChanged)
	}
	return l.b.in.Releases, nil
}
