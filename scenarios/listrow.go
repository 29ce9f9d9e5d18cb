package scenarios

import (
	"math"
	"strings"

	"offplumb/sim/model"
)

// row is the place of a release in a list.
type row struct {
	file  string
	first cell                   // its first field
	cells [len(listColumns)]cell // by column; line 0: the list lacks it
}

// cell is the place of a field; rows are many, so it is small.
type cell struct{ line, col int32 }

// at gives the place of a column's cell, or of the row.
func (r *row) at(column string) place {
	c := r.first
	if i := listColumn(column); i >= 0 && r.cells[i].line > 0 {
		c = r.cells[i]
	}
	return place{r.file, int(c.line), int(c.col)}
}

// cell gives the place of a field of the record just read.
func (l *listReader) cell(i int) cell {
	at := l.field(i)
	return cell{int32(at.line), int32(at.col)}
}

// The places of listColumns.
const (
	releaseColumn = iota
	bodyColumn
	massColumn
	diameterColumn
	deckColumn
	spinwardColumn
	axialColumn
	heightColumn
	vSpinwardColumn
	vAxialColumn
	vUpColumn
)

// fields are those of a record by column: text, or numbers in SI.
type fields struct {
	text [len(listColumns)]string
	nums [len(listColumns)]float64
	has  [len(listColumns)]bool // it is not empty
}

// num gives the number of a column; false: it is empty.
func (f *fields) num(column int) (float64, bool) { return f.nums[column], f.has[column] }

// cellsOf reads the fields of a record.
func (l *listReader) cellsOf(rec []string, out *fields) (at row, ok bool) {
	ok = true
	at = row{file: l.file, first: l.cell(0)}
	for i, field := range rec {
		c := &listColumns[l.cols[i]]
		at.cells[l.cols[i]] = l.cell(i)
		field = strings.TrimSpace(field)
		if field == "" {
			continue
		}
		out.has[l.cols[i]] = true
		if c.dim == nil {
			out.text[l.cols[i]] = field
			ok = l.word(c.name, field, &at) && ok
			continue
		}
		x, good := l.number(c.name, c.dim, c.span, field, &at)
		out.nums[l.cols[i]], ok = x, ok && good
	}
	return at, ok
}

// word checks a text of a row.
func (l *listReader) word(column, field string, at *row) bool {
	why := nameFault(field)
	if why != "" {
		l.fault(at.at(column), "", "%s: %s, got %q", column, why, shorten(field))
	}
	return why == ""
}

// number reads a number of a row.
func (l *listReader) number(column string, d *dimension, s span, field string, at *row) (float64, bool) {
	x, rest, err := split(field)
	switch {
	case err != nil || rest != "":
		hint := comma(field)
		if _, known := d.find(rest); err == nil && known {
			hint = "numbers stand without a unit, which the column's name gives"
		}
		l.fault(at.at(column), hint, "%s: wants a number, got %q", column, shorten(field))
	case math.Abs(x) > d.most:
		l.fault(at.at(column), "", "%s: wants a magnitude of at most %g %s, got %s", column, d.most, d.si, shorten(field))
	case x < s.low || s.open && x == s.low:
		l.fault(at.at(column), "", "%s: wants %s, got %s", column, s.words(&key{dims: []*dimension{d}}), shorten(field))
	default:
		return x, true
	}
	return 0, false
}

// isEmpty says whether a row holds nothing, as spreadsheets leave at the end.
func isEmpty(rec []string) bool {
	for _, field := range rec {
		if strings.TrimSpace(field) != "" {
			return false
		}
	}
	return true
}

func (l *listReader) record(rec []string) {
	if isEmpty(rec) {
		return
	}
	var f fields
	at, ok := l.cellsOf(rec, &f)
	name := f.text[releaseColumn]
	switch {
	case name == "":
		l.fault(at.at("release"), "", "wants a name, got an empty field")
		return
	case l.taken[name] || l.known[name]:
		l.fault(at.at("release"), "", "a release named %q is there already", shorten(name))
		return
	}
	if l.taken != nil {
		l.taken[name] = true
	}
	if !ok {
		return
	}
	r, ok := l.release(name, &f, &at)
	if !ok {
		return
	}
	b := l.b
	b.in.Releases = append(b.in.Releases, r)
	b.keys = append(b.keys, "")
	b.rows = append(b.rows, at)
}

// release makes the release of a row.
func (l *listReader) release(name string, f *fields, at *row) (model.Release, bool) {
	o := l.o
	str := func(column int, key string) string {
		if f.has[column] {
			return f.text[column]
		}
		return o.str(key)
	}
	r := model.Release{Name: name, Body: str(bodyColumn, "body"), Time: o.num("time"), Start: start(o), Until: untilOf(o), NoTrack: !o.flag("tracks")}
	r.At = model.Station{Deck: str(deckColumn, "deck"), Spinward: o.arc("spinward"), Axial: o.num("axial"), Height: o.num("height")}
	if x, ok := f.num(spinwardColumn); ok {
		r.At.Spinward = model.Arc{Value: x}
	}
	if x, ok := f.num(axialColumn); ok {
		r.At.Axial = x
	}
	x, ok := f.num(heightColumn)
	if ok {
		r.At.Height = x
	} else if !o.has("height") {
		l.fault(at.at("height_m"), "", "height_m: wants a number, got an empty field")
		return r, false
	}
	l.moved(&r, f)
	return r, l.ownBody(&r, f, at)
}

// moved takes the velocity of a row.
func (l *listReader) moved(r *model.Release, f *fields) {
	vs, ok1 := f.num(vSpinwardColumn)
	va, ok2 := f.num(vAxialColumn)
	vu, ok3 := f.num(vUpColumn)
	if ok1 || ok2 || ok3 {
		r.Start = model.Start{Kind: model.Velocity, VSpinward: vs, VAxial: va, VUp: vu}
	}
}

// ownBody gives the release a body of its own where the row or the list has a
// mass or a diameter.
func (l *listReader) ownBody(r *model.Release, f *fields, at *row) bool {
	m, hasMass := f.num(massColumn)
	d, hasWidth := f.num(diameterColumn)
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
	switch known := l.bodies[r.Body]; {
	case known != nil:
		own = *known
	case hasMass && hasWidth:
	case r.Body == "":
		l.fault(at.at("release"), "", "a body without a name wants both a mass and a diameter")
		return false
	default:
		l.fault(at.at("body"), "one of its own wants both a mass and a diameter", "no body named %q", shorten(r.Body))
		return false
	}
	if hasMass {
		own.Mass = m
	}
	if hasWidth {
		own.Diameter = d
	}
	r.Own = &own
	return true
}
