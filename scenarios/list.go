package scenarios

import (
	"bytes"
	"encoding/csv"
	"errors"
	"fmt"
	"io"
	"path/filepath"
	"slices"
	"strings"
	"unicode"
	"unicode/utf8"

	"offplumb/sim/model"
)

// MaxListSize is the largest file that is read as a whole, bytes: half a million
// rows of a release list with tracks. Long lists without are streamed.
const MaxListSize = 64 << 20

// reading says how files that a scenario names are read.
type reading struct {
	read         func(path string) ([]byte, error)
	open         func(path string) (io.ReadCloser, error) // may be called again and again
	keep         int                                      // rows of a release list that is kept
	brief        bool                                     // leave out lists that are longer
	allowOutside bool
	inputs       *[]Input
}

// listColumns are the columns of a release list, with their dimension; nil:
// text.
var listColumns = [...]struct {
	name string
	dim  *dimension
	span span
}{
	{"release", nil, anything},
	{"body", nil, anything},
	{"mass_kg", mass, positive},
	{"diameter_m", length, notNegative},
	{"deck", nil, anything},
	{"spinward_m", length, anything},
	{"axial_m", length, anything},
	{"height_m", length, anything},
	{"v_spinward_m_s", speed, anything},
	{"v_axial_m_s", speed, anything},
	{"v_up_m_s", speed, anything},
}

func listColumn(name string) int {
	for i := range listColumns {
		if listColumns[i].name == name {
			return i
		}
	}
	return -1
}

// list reads a release list: RFC 4180, one header row.
func (b *builder) list(o *object, files reading) {
	if b.long(o, files) {
		return
	}
	src, ok := b.contents(o, "file", files)
	if !ok {
		return
	}
	l := listReader{b: b, o: o, content: newContent(o.str("file"), src)}
	l.csv = csv.NewReader(bytes.NewReader(l.src))
	l.csv.ReuseRecord = true
	l.all()
}

// contents reads the file that a key names.
func (b *builder) contents(o *object, k string, files reading) ([]byte, bool) {
	name, ok := b.fileNamed(o, k, files)
	if !ok {
		return nil, false
	}
	at, key := o.at(k), join(o.path, k)
	src, err := files.read(name)
	if err == nil && len(src) > MaxListSize {
		err = fmt.Errorf("is larger than %d MiB", MaxListSize>>20)
	}
	if err != nil {
		b.fault(at, key, "", "cannot read %q: %v", shorten(name), plainly(err))
		return nil, false
	}
	*files.inputs = append(*files.inputs, input(name, src))
	return src, true
}

// fileNamed gives the name of a file that a key holds.
func (b *builder) fileNamed(o *object, k string, files reading) (string, bool) {
	name := o.str(k)
	at, key := o.at(k), join(o.path, k)
	if o.vals[k] == nil {
		return "", false
	}
	if name == "" || strings.ContainsFunc(name, func(r rune) bool { return !unicode.IsPrint(r) }) {
		b.fault(at, key, "", "wants the name of a CSV file, got %q", shorten(name))
		return "", false
	}
	if !files.allowOutside && !filepath.IsLocal(filepath.FromSlash(name)) {
		b.fault(at, key, "--allow-outside permits it", "names a file outside the scenario's folder: %q", shorten(name))
		return "", false
	}
	return name, true
}

// plainly drops the system call and the path from a file error.
func plainly(err error) error {
	for {
		inner := errors.Unwrap(err)
		if inner == nil {
			return err
		}
		err = inner
	}
}

// mostFaults is how many faults of a list are told: a list of a million rows
// may have one in every row. The others are counted.
const mostFaults = 1000

type listReader struct {
	content
	b      *builder
	o      *object
	csv    *csv.Reader
	cols   []int // of each column of the file: its index in listColumns
	names  []string
	faults int
	taken  map[string]bool
	known  map[string]bool // names taken elsewhere, read only
	bodies map[string]*model.Body
}

func (l *listReader) fault(at place, hint, format string, args ...any) {
	if l.faults++; l.faults <= mostFaults {
		l.b.fault(at, "", hint, format, args...)
	}
}

// field gives the place of a field of the record just read.
func (l *listReader) field(i int) place { return l.placeOf(l.csv.FieldPos(i)) }

func (l *listReader) all() {
	if at, ok := notText(l.src); ok {
		l.fault(l.place(at), "save it as CSV UTF-8", "is not UTF-8")
		return
	}
	head, err := l.csv.Read()
	if errors.Is(err, io.EOF) {
		l.fault(l.place(0), "the first column is release", "wants a header row, got an empty file")
		return
	}
	if err != nil {
		l.broken(err)
		return
	}
	if !l.header(head) {
		return
	}
	l.index()
	l.rows()
	if more := l.faults - mostFaults; more > 0 {
		l.b.fault(l.place(len(l.src)), "", "", "%s", moreFaults(more))
	}
}

func moreFaults(n int) string {
	if n == 1 {
		return "and 1 more fault"
	}
	return fmt.Sprintf("and %d more faults", n)
}

// room makes room for some rows.
func (l *listReader) room(rows int) {
	b := l.b
	b.in.Releases, b.keys, b.rows = slices.Grow(b.in.Releases, rows), slices.Grow(b.keys, rows), slices.Grow(b.rows, rows)
}

// rows reads the rows that are left. It gives whether it got to the end.
func (l *listReader) rows() bool {
	for {
		rec, err := l.csv.Read()
		switch {
		case errors.Is(err, io.EOF):
			return true
		case errors.Is(err, csv.ErrFieldCount):
			l.wrongCount(rec)
		case err != nil:
			l.broken(err)
			return false
		default:
			l.record(rec)
		}
	}
}

// notText finds the first byte that is no UTF-8.
func notText(src []byte) (offset int, found bool) {
	if utf8.Valid(src) {
		return 0, false
	}
	for offset < len(src) {
		r, n := utf8.DecodeRune(src[offset:])
		if r == utf8.RuneError && n == 1 {
			break
		}
		offset += n
	}
	return offset, true
}

// broken faults what is no CSV; the rows behind it cannot be told.
func (l *listReader) broken(err error) {
	var bad *csv.ParseError
	if !errors.As(err, &bad) {
		l.fault(l.place(0), "", "%v", err)
		return
	}
	why := bad.Err.Error()
	switch {
	case errors.Is(err, csv.ErrBareQuote):
		why = "a quote inside a field without quotes"
	case errors.Is(err, csv.ErrQuote):
		why = "text behind the closing quote of a field, or no closing quote"
	}
	l.fault(l.placeOf(bad.Line, bad.Column), `a field that holds a quote stands in quotes, with that quote twice: "3"" pipe"`, "not CSV: %s", why)
}

func (l *listReader) wrongCount(rec []string) {
	hint := ""
	if len(rec) > len(l.cols) {
		hint = "a field that holds a comma stands in quotes; decimals are written with a point"
	}
	l.fault(l.field(0), hint, "wants %d fields, as in the header row, got %d", len(l.cols), len(rec))
}

// index gathers the names that rows are held against.
func (l *listReader) index() {
	in := &l.b.in
	l.taken, l.bodies = map[string]bool{}, map[string]*model.Body{}
	for i := range in.Releases {
		l.taken[in.Releases[i].Name] = true
	}
	for i := range in.Bodies {
		l.bodies[in.Bodies[i].Name] = &in.Bodies[i]
	}
}

// mostColumns is how many columns of a header are looked at: a list with more
// is none of ours, and its faults are all alike.
const mostColumns = 4 * len(listColumns)

func (l *listReader) header(head []string) bool {
	if len(head) == 1 && strings.ContainsAny(head[0], ";\t") {
		l.fault(l.field(0), "columns are separated by commas", "unknown column %q", shorten(head[0]))
		return false
	}
	good := true
	for i, name := range head[:min(len(head), mostColumns)] {
		name = strings.TrimSpace(name)
		at := listColumn(name)
		if at < 0 {
			l.unknownColumn(i, name)
			good = false
		} else if contains(l.names, name) {
			l.fault(l.field(i), "", "column %q is given twice", name)
			good = false
		}
		l.cols, l.names = append(l.cols, at), append(l.names, name)
	}
	if !contains(l.names, "release") {
		l.fault(l.place(0), "", "wants a column named release")
		return false
	}
	if !contains(l.names, "height_m") && !l.o.has("height") {
		l.fault(l.place(0), "", "wants a column named height_m, or the key height in [[release_list]]")
		return false
	}
	return good
}

func (l *listReader) unknownColumn(i int, name string) {
	known := make([]string, len(listColumns))
	for i := range listColumns {
		known[i] = listColumns[i].name
	}
	hint := "the columns are " + strings.Join(known, ", ")
	if like := nearest(name, known); like != "" {
		hint = "did you mean " + like + "?"
	}
	l.fault(l.field(i), hint, "unknown column %q", shorten(name))
}
