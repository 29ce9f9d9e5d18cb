package scenarios

import (
	"bytes"
	"encoding/csv"
	"errors"
	"fmt"
	"io"
	"math"
	"path/filepath"
	"strconv"
	"strings"

	"offplumb/sim/model"
)

// MaxListSize is the largest release list that is read, bytes: half a million
// rows.
const MaxListSize = 64 << 20

// reading says how files that a scenario names are read.
type reading struct {
	read         func(path string) ([]byte, error)
	allowOutside bool
	inputs       *[]Input
}

// row is the place of a release in a list.
type row struct {
	file  string
	line  int
	cols  map[string]int // column of each field, from 1
	owner *object        // the [[release_list]]
}

// listColumns are the columns of a release list, with their dimension; nil:
// text.
var listColumns = []struct {
	name string
	key  string // the key that gives its default
	dim  *dimension
	span span
}{
	{"release", "", nil, anything},
	{"body", "body", nil, anything},
	{"mass_kg", "mass", mass, positive},
	{"diameter_m", "diameter", length, notNegative},
	{"deck", "deck", nil, anything},
	{"spinward_m", "spinward", length, anything},
	{"axial_m", "axial", length, anything},
	{"height_m", "height", length, anything},
	{"v_spinward_m_s", "", speed, anything},
	{"v_axial_m_s", "", speed, anything},
	{"v_up_m_s", "", speed, anything},
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
	name := o.str("file")
	at, key := o.at("file"), join(o.path, "file")
	if !files.allowOutside && !filepath.IsLocal(filepath.FromSlash(name)) {
		b.fault(at, key, "--allow-outside permits it", "names a file outside the scenario's folder: %q", shorten(name))
		return
	}
	src, err := files.read(name)
	if err == nil && len(src) > MaxListSize {
		err = fmt.Errorf("is larger than %d MiB", MaxListSize>>20)
	}
	if err != nil {
		b.fault(at, key, "", "cannot read %q: %v", shorten(name), plainly(err))
		return
	}
	*files.inputs = append(*files.inputs, input(name, src))
	l := listReader{b: b, o: o, file: name, csv: csv.NewReader(bytes.NewReader(bytes.TrimPrefix(src, []byte("\xef\xbb\xbf"))))}
	l.csv.ReuseRecord = true
	l.all()
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

type listReader struct {
	b     *builder
	o     *object
	file  string
	csv   *csv.Reader
	cols  []int // of each column of the file: its index in listColumns
	names []string
	taken map[string]bool
}

func (l *listReader) fault(line, col int, hint, format string, args ...any) {
	l.b.fault(place{l.file, line, col}, "", hint, format, args...)
}

func (l *listReader) all() {
	head, err := l.csv.Read()
	if err != nil {
		l.fault(1, 1, "", "wants a header row: %v", err)
		return
	}
	if !l.header(head) {
		return
	}
	l.taken = map[string]bool{}
	for i := range l.b.in.Releases {
		l.taken[l.b.in.Releases[i].Name] = true
	}
	for {
		rec, err := l.csv.Read()
		var bad *csv.ParseError
		switch {
		case errors.Is(err, io.EOF):
			return
		case errors.As(err, &bad):
			l.fault(bad.Line, bad.Column, "", "%v", bad.Err)
			return
		}
		l.record(rec)
	}
}

func (l *listReader) header(head []string) bool {
	good := true
	var known []string
	for i := range listColumns {
		known = append(known, listColumns[i].name)
	}
	for i, name := range head {
		line, col := l.csv.FieldPos(i)
		name = strings.TrimSpace(name)
		at := listColumn(name)
		if at < 0 {
			hint := "the columns are " + strings.Join(known, ", ")
			if like := nearest(name, known); like != "" {
				hint = "did you mean " + like + "?"
			}
			if strings.Contains(name, ";") {
				hint = "columns are separated by commas"
			}
			l.fault(line, col, hint, "unknown column %q", shorten(name))
			good = false
		}
		if contains(l.names, name) {
			l.fault(line, col, "", "column %q is given twice", name)
			good = false
		}
		l.cols, l.names = append(l.cols, at), append(l.names, name)
	}
	if !contains(l.names, "release") {
		l.fault(1, 1, "", "wants a column named release")
		return false
	}
	if !contains(l.names, "height_m") && !l.o.has("height") {
		l.fault(1, 1, "", "wants a column named height_m, or the key height in [[release_list]]")
		return false
	}
	return good
}

// cellsOf gives the fields of a record by column, numbers in SI.
func (l *listReader) cellsOf(rec []string) (text map[string]string, nums map[string]float64, at row, ok bool) {
	text, nums, ok = map[string]string{}, map[string]float64{}, true
	at = row{file: l.file, cols: map[string]int{}, owner: l.o}
	for i, field := range rec {
		c := &listColumns[l.cols[i]]
		line, col := l.csv.FieldPos(i)
		at.line = line
		at.cols[c.name] = col
		field = strings.TrimSpace(field)
		if field == "" {
			continue
		}
		if c.dim == nil {
			text[c.name] = field
			continue
		}
		x, err := strconv.ParseFloat(field, 64)
		k := key{dims: []*dimension{c.dim}}
		switch {
		case err != nil || math.IsNaN(x) || math.IsInf(x, 0) || math.Abs(x) > c.dim.most:
			l.fault(line, col, "", "%s: wants a number, got %q", c.name, shorten(field))
			ok = false
		case x < c.span.low || c.span.open && x == c.span.low:
			l.fault(line, col, "", "%s: wants %s, got %s", c.name, c.span.words(&k), shorten(field))
			ok = false
		default:
			nums[c.name] = x
		}
	}
	return text, nums, at, ok
}

func (l *listReader) record(rec []string) {
	text, nums, at, ok := l.cellsOf(rec)
	name := text["release"]
	switch {
	case name == "":
		l.fault(at.line, at.cols["release"], "", "wants a name, got an empty field")
		return
	case l.taken[name]:
		l.fault(at.line, at.cols["release"], "", "a release named %q is there already", shorten(name))
		return
	case len(name) > longestName:
		l.fault(at.line, at.cols["release"], "", "wants a name of at most %d bytes", longestName)
		return
	}
	l.taken[name] = true
	if !ok {
		return
	}
	r, ok := l.release(name, text, nums, at)
	if !ok {
		return
	}
	b := l.b
	b.in.Releases = append(b.in.Releases, r)
	b.keys = append(b.keys, "")
	b.rows = append(b.rows, at)
}

// release makes the release of a row.
func (l *listReader) release(name string, text map[string]string, nums map[string]float64, at row) (model.Release, bool) {
	o := l.o
	str := func(col, key string) string {
		if s, ok := text[col]; ok {
			return s
		}
		return o.str(key)
	}
	r := model.Release{Name: name, Body: str("body", "body"), Time: o.num("time"), Start: start(o), Until: untilOf(o), NoTrack: !o.flag("tracks")}
	r.At = model.Station{Deck: str("deck", "deck"), Spinward: o.arc("spinward"), Axial: o.num("axial"), Height: o.num("height")}
	if x, ok := nums["spinward_m"]; ok {
		r.At.Spinward = model.Arc{Value: x}
	}
	if x, ok := nums["axial_m"]; ok {
		r.At.Axial = x
	}
	x, ok := nums["height_m"]
	if ok {
		r.At.Height = x
	} else if !o.has("height") {
		l.fault(at.line, at.cols["height_m"], "", "height_m: wants a number, got an empty field")
		return r, false
	}
	l.moved(&r, nums)
	return r, l.ownBody(&r, nums, at)
}

// moved takes the velocity of a row.
func (l *listReader) moved(r *model.Release, nums map[string]float64) {
	vs, ok1 := nums["v_spinward_m_s"]
	va, ok2 := nums["v_axial_m_s"]
	vu, ok3 := nums["v_up_m_s"]
	if ok1 || ok2 || ok3 {
		r.Start = model.Start{Kind: model.Velocity, VSpinward: vs, VAxial: va, VUp: vu}
	}
}

// ownBody gives the release a body of its own where the row or the list has a
// mass or a diameter.
func (l *listReader) ownBody(r *model.Release, nums map[string]float64, at row) bool {
	m, hasMass := nums["mass_kg"]
	d, hasWidth := nums["diameter_m"]
	if !hasMass && l.o.has("mass") {
		m, hasMass = l.o.num("mass"), true
	}
	if !hasWidth && l.o.has("diameter") {
		d, hasWidth = l.o.num("diameter"), true
	}
	if !hasMass && !hasWidth {
		return true
	}
	own := model.Body{Name: r.Body, Restitution: model.DefaultRestitution, Friction: model.DefaultFriction}
	for _, known := range l.b.in.Bodies {
		if known.Name == r.Body {
			own = known
		}
	}
	if hasMass {
		own.Mass = m
	}
	if hasWidth {
		own.Diameter = d
	}
	if own.Mass == 0 || !hasWidth && own.Diameter == 0 && own.DragArea == 0 && r.Body == "" {
		l.fault(at.line, at.cols["release"], "", "a body without a name wants both a mass and a diameter")
		return false
	}
	r.Own = &own
	return true
}
