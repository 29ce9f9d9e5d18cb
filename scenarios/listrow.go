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

// cellsOf gives the fields of a record by column, numbers in SI.
func (l *listReader) cellsOf(rec []string) (text map[string]string, nums map[string]float64, at row, ok bool) {
	text, nums, ok = map[string]string{}, map[string]float64{}, true
	at = row{file: l.file, first: l.cell(0)}
	for i, field := range rec {
		c := &listColumns[l.cols[i]]
		at.cells[l.cols[i]] = l.cell(i)
		field = strings.TrimSpace(field)
		if field == "" {
			continue
		}
		if c.dim == nil {
			text[c.name] = field
			ok = l.word(c.name, field, &at) && ok
			continue
		}
		x, good := l.number(c.name, c.dim, c.span, field, &at)
		nums[c.name], ok = x, ok && good
	}
	return text, nums, at, ok
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
	text, nums, at, ok := l.cellsOf(rec)
	name := text["release"]
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
	r, ok := l.release(name, text, nums, &at)
	if !ok {
		return
	}
	b := l.b
	b.in.Releases = append(b.in.Releases, r)
	b.keys = append(b.keys, "")
	b.rows = append(b.rows, at)
}

// release makes the release of a row.
func (l *listReader) release(name string, text map[string]string, nums map[string]float64, at *row) (model.Release, bool) {
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
		l.fault(at.at("height_m"), "", "height_m: wants a number, got an empty field")
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
func (l *listReader) ownBody(r *model.Release, nums map[string]float64, at *row) bool {
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
