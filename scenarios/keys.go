package scenarios

import "math"

// want is what a key holds.
type want int

const (
	wantQuantity want = iota // a text with a unit, of one of dims
	wantNumber               // a bare number
	wantInteger              // a bare whole number
	wantText                 // a free text
	wantName                 // a name, unique within its list
	wantWord                 // one of words
	wantFlag                 // true or false
	wantTexts                // a text or a list of texts
	wantList                 // a list of count quantities
	wantTable                // a table of the section
	wantTables               // a list of tables of the section, in double brackets

	wantWordOrQuantity
	wantBound      // a quantity of any dimension, or a bare number
	wantOpen       // a table whose keys may hold points
	wantNumbers    // a list of count bare numbers
	wantSettings   // a table of keys of the scenario, as in --set, and their values
	wantQuantities // a quantity, or a list of them
	wantBounds     // a list of what other keys hold: texts, numbers, true or false
)

// span is a range of values, in SI.
type span struct {
	low, high float64
	open      bool // low itself is out
}

var (
	anything    = span{low: math.Inf(-1), high: math.Inf(1)}
	positive    = span{low: 0, high: math.Inf(1), open: true}
	notNegative = span{low: 0, high: math.Inf(1)}
	share       = span{low: 0, high: 1}
)

// key is one key of the format.
type key struct {
	name     string
	want     want
	dims     []*dimension
	span     span
	words    []string
	count    int
	sub      *section
	free     *section // of wantOpen: what its keys hold
	required bool
	group    string // of the keys of a group at most one may be given
	deflt    string // in words; for the reader
	doc      string
}

// section is a table of the format.
type section struct {
	name string // in words: "a release"
	doc  string
	keys []key
	// exactly lists groups of which one key must be given.
	exactly []string
}

func (s *section) find(name string) *key {
	for i := range s.keys {
		if s.keys[i].name == name {
			return &s.keys[i]
		}
	}
	return nil
}

func (s *section) names() []string {
	out := make([]string, len(s.keys))
	for i := range s.keys {
		out[i] = s.keys[i].name
	}
	return out
}

// group lists the keys of a group.
func (s *section) group(name string) []string {
	var out []string
	for i := range s.keys {
		if s.keys[i].group == name {
			out = append(out, s.keys[i].name)
		}
	}
	return out
}

// Short forms for the tables below.

func qty(name string, d *dimension, s span, doc string) key {
	return key{name: name, want: wantQuantity, dims: []*dimension{d}, span: s, doc: doc}
}

func arc(name, doc string) key {
	return key{name: name, want: wantQuantity, dims: []*dimension{length, angle}, span: anything, doc: doc}
}

func num(name string, s span, doc string) key {
	return key{name: name, want: wantNumber, span: s, doc: doc}
}

func text(name, doc string) key { return key{name: name, want: wantText, doc: doc} }

func flag(name, doc string) key {
	return key{name: name, want: wantFlag, deflt: "false", doc: doc}
}

func word(name, deflt, doc string, words ...string) key {
	return key{name: name, want: wantWord, words: words, deflt: deflt, doc: doc}
}

func texts(name, doc string) key { return key{name: name, want: wantTexts, doc: doc} }

func lengths(name string, n int, s span, doc string) key {
	return key{name: name, want: wantList, dims: []*dimension{length}, count: n, span: s, doc: doc}
}

func speeds(name, way string) key {
	return key{name: name, want: wantQuantities, dims: []*dimension{speed}, span: anything, deflt: `"0 m/s"`, doc: way + "; one for each height where there are heights"}
}

func table(name string, sub *section, doc string) key {
	return key{name: name, want: wantTable, sub: sub, doc: doc}
}

func tables(name string, sub *section, doc string) key {
	return key{name: name, want: wantTables, sub: sub, doc: doc}
}

func title() key {
	return key{name: "name", want: wantName, required: true, doc: "its name, free text, unique within its kind"}
}

func bound(name, doc string) key { return key{name: name, want: wantBound, doc: doc} }

func (k key) need() key            { k.required = true; return k }
func (k key) or(deflt string) key  { k.deflt = deflt; return k }
func (k key) one(group string) key { k.group = group; return k }
