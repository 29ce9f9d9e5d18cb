package measure

import (
	"fmt"
	"slices"
	"strings"

	"offplumb/sim/model"
	"offplumb/sim/table"
)

// Pick takes one number of the results of a scenario: a column of a table, of
// one thing. It holds names alone, so that it serves any variant of the
// scenario. Of several rows, such as those of a crew path, it takes the one of
// the greatest magnitude, of clearances the least, or what its ending says.
type Pick struct {
	Measure string // as given: table.column, with .min or .max behind it or not
	Kind    string // release, path, deck or habitat
	Of      string // name of the release, let-go series, path or deck; "": habitat
	table   string
	key     string
	take    string // min, max or "": the greatest magnitude
	unit    unit
}

// The endings of a measure that say which of several rows counts.
const (
	leastRow = "min"
	mostRow  = "max"
)

// Picks finds what a measure stands for: a number for each thing that it is
// of. of lists release.NAME, path.NAME and habitat, * standing for anything;
// those of another kind than the measure's table are passed over. Where none
// is left, it is an error if strict, else all things of the table's kind are
// taken. Decks and the habitat need no naming.
func Picks(m *model.Model, name string, of []string, strict bool) ([]Pick, error) {
	p, err := pickOf(name)
	if err != nil {
		return nil, err
	}
	switch p.table {
	case "habitat", "spin":
		return []Pick{p}, nil
	case "decks":
		p.Kind = "deck"
		return p.each(deckNames(m)), nil
	}
	kinds := []string{p.Kind}
	if p.table == "clearance" {
		kinds = []string{"release", "path"} // crew paths have clearances too
	}
	out, err := p.named(m, kinds, of)
	if err != nil || len(out) > 0 {
		return out, err
	}
	if strict {
		return nil, fmt.Errorf("%s is a measure of a %s, and none is named", name, plainKinds(kinds))
	}
	for _, kind := range kinds {
		p.Kind = kind
		out = append(out, p.each(wholes(m, kind))...)
	}
	if len(out) == 0 {
		return nil, fmt.Errorf("%s is a measure of a %s, and there is none", name, plainKinds(kinds))
	}
	return out, nil
}

// CheckOf checks a list of what measures are of.
func CheckOf(m *model.Model, of []string) error {
	_, err := Pick{}.named(m, nil, of)
	return err
}

// plainKinds names kinds for people.
func plainKinds(kinds []string) string {
	return strings.ReplaceAll(strings.Join(kinds, " or a "), "path", "crew path")
}

// named takes what a list names of the kinds wanted.
func (p Pick) named(m *model.Model, kinds, of []string) (out []Pick, err error) {
	seen := map[string]bool{}
	for _, s := range of {
		kind, name, _ := strings.Cut(s, ".")
		if s != "habitat" && kind != "release" && kind != "path" {
			return nil, fmt.Errorf("wants release.NAME, path.NAME or habitat, got %q", s)
		}
		names := []string{name}
		if !slices.Contains(wholes(m, kind), name) && s != "habitat" {
			found, msg := targets(m, s, kind)
			if msg != "" {
				return nil, fmt.Errorf("%s", msg)
			}
			names = names[:0]
			for _, t := range found {
				names = append(names, t.Name)
			}
		}
		if !slices.Contains(kinds, kind) {
			continue
		}
		p.Kind = kind
		for _, q := range p.each(names) {
			if !seen[kind+"."+q.Of] {
				seen[kind+"."+q.Of] = true
				out = append(out, q)
			}
		}
	}
	return out, nil
}

// each is the pick of each of some things.
func (p Pick) each(names []string) []Pick {
	out := make([]Pick, len(names))
	for i, name := range names {
		p.Of = name
		out[i] = p
	}
	return out
}

// wholes names what there is of a kind, a let-go series as one.
func wholes(m *model.Model, kind string) []string {
	if kind == "path" {
		return names(m, kind)
	}
	var out []string
	for i := range m.Releases {
		r := &m.Releases[i]
		name := r.Name
		if r.Series != "" {
			name = r.Series
		}
		if len(out) == 0 || out[len(out)-1] != name { // a series stands together
			out = append(out, name)
		}
	}
	return out
}

func deckNames(m *model.Model) []string {
	out := make([]string, len(m.Decks))
	for i := range m.Decks {
		out[i] = m.Decks[i].Name
	}
	return out
}

// pickOf reads table.column, with .min or .max behind it or not.
func pickOf(name string) (Pick, error) {
	p := Pick{Measure: name}
	var key string
	p.table, key, _ = strings.Cut(name, ".")
	t, ok := judgedTables()[p.table]
	if !ok {
		return p, fmt.Errorf("wants table.column, the table one of landings, rests, tracks, impacts, clearance, crew, decks, habitat, spin; got %q", name)
	}
	if column, take, ok := strings.Cut(key, "."); ok {
		if take != leastRow && take != mostRow {
			return p, fmt.Errorf("wants .min or .max behind the column, or nothing; got %q", name)
		}
		key, p.take = column, take
	} else if p.table == "clearance" {
		p.take = leastRow
	}
	u, num := t.nums[key]
	switch {
	case !num && t.text[key]:
		return p, fmt.Errorf("column %s of table %s is text, wants one of numbers", key, p.table)
	case !num:
		return p, fmt.Errorf("table %s has no column %q; it has %s", p.table, key, strings.Join(t.numeric(), ", "))
	}
	p.Kind, p.unit, p.key = t.kind, u, key
	if !slices.Contains(t.keys, key) { // given with its unit
		p.key = strings.TrimSuffix(key, u.suffix)
	}
	return p, nil
}

// numeric lists the columns of numbers.
func (j judged) numeric() []string {
	return slices.DeleteFunc(slices.Clone(j.keys), func(key string) bool { return j.text[key] })
}

// String names the measure and what it is of.
func (p *Pick) String() string {
	if p.Of == "" {
		return p.Measure
	}
	return p.Measure + " of " + p.Of
}

// Unit is the unit of the measure, in words; "" for a ratio.
func (p *Pick) Unit() string { return p.unit.name }

// In gives an SI value in that unit.
func (p *Pick) In(si float64) float64 { return p.unit.of(si) }

// Column describes the measure for a table. Where the table has the measure of
// one thing alone, its name leaves out what it is of.
func (p *Pick) Column(alone bool) table.Column {
	c := table.Column{Name: p.table + "." + p.key, Unit: p.unit.name, Scale: p.unit.scale, Kind: table.Number, Meaning: p.words()}
	if p.take != "" && (p.take != leastRow || p.table != "clearance") {
		c.Name += "." + p.take
	}
	c.Name += p.unit.suffix
	if !alone && p.Of != "" {
		c.Name = p.Kind + "." + p.Of + ": " + c.Name
	}
	return c
}

// words says what the number is.
func (p *Pick) words() string {
	s := p.meaning()
	switch {
	case p.take == leastRow:
		s += "; the least of all"
	case p.take == mostRow:
		s += "; the greatest of all"
	case p.Kind == "release" && p.table != "landings" && p.table != "rests" || p.Kind == "path" || p.table == "spin":
		s += "; the greatest magnitude of all"
	}
	if p.Of != "" {
		s += "; of the " + plainKinds([]string{p.Kind}) + " " + p.Of
	}
	return s
}

// meaning is that of the column.
func (p *Pick) meaning() string {
	switch p.table {
	case "landings":
		return numberColumn(landingColumns, p.key, p.unit).meaning
	case "rests":
		return numberColumn(restColumns, p.key, p.unit).meaning
	case "impacts":
		return numberColumn(eventColumns, p.key, p.unit).meaning
	case "tracks":
		return numberColumn(sampleColumns, p.key, p.unit).meaning
	case "crew":
		return numberColumn(crewColumns, p.key, p.unit).meaning
	case "clearance":
		return numberColumn(clearanceColumns, p.key, p.unit).meaning
	case "decks":
		return numberColumn(deckColumns, p.key, p.unit).meaning
	case "spin":
		return numberColumn(turningColumns, p.key, p.unit).meaning
	}
	return numberColumn(habitatColumns, p.key, p.unit).meaning
}
