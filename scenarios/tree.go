package scenarios

import (
	"bytes"
	"errors"
	"fmt"
	"math"
	"strconv"
	"strings"
	"unicode/utf8"

	"github.com/pelletier/go-toml/v2/unstable"
)

const (
	// MaxSize is the largest scenario file that is read, bytes. Release lists
	// are files of their own.
	MaxSize = 1 << 20
	// maxDepth is how deep values may nest; the format needs five levels.
	maxDepth = 32
)

// kind is what a node is.
type kind int

const (
	isTable kind = iota
	isArray
	isText
	isNumber
	isBool
	isDate
)

var kindNames = [...]string{"a table", "a list", "a text", "a bare number", "true or false", "a date"}

// node is a value of the file.
type node struct {
	kind   kind
	at     place // of the value
	key    place // of its key, or of its table's header
	text   string
	num    float64
	flag   bool
	raw    string // a number as written
	names  []string
	kids   map[string]*node
	items  []*node
	inline bool // a table in braces, or a list in brackets: not to be added to
	header bool // a table whose header was seen
}

func newTable(at place) *node {
	return &node{kind: isTable, at: at, key: at, kids: map[string]*node{}}
}

// put adds a key to a table, or replaces it.
func (n *node) put(name string, kid *node) {
	if _, ok := n.kids[name]; !ok {
		n.names = append(n.names, name)
	}
	n.kids[name] = kid
}

// drop removes a key from a table.
func (n *node) drop(name string) {
	if _, ok := n.kids[name]; !ok {
		return
	}
	delete(n.kids, name)
	for i, s := range n.names {
		if s == name {
			n.names = append(n.names[:i:i], n.names[i+1:]...)
			return
		}
	}
}

// reader turns TOML into a tree.
type reader struct {
	content
	end  int // offset up to which values are read
	p    unstable.Parser
	root *node
	here *node // the table that key-values go to
	errs ErrorList
}

// parse reads TOML 1.0. Syntax errors end it at the first, faults of structure
// do not.
func parse(file string, src []byte) (*node, ErrorList) {
	if len(src) > MaxSize {
		return nil, ErrorList{{File: file, Line: 1, Col: 1, Msg: "wants a scenario of at most 1 MiB", Hint: "put long lists of releases into a CSV file and name it in [[release_list]]"}}
	}
	r := &reader{content: newContent(file, src)}
	r.root = newTable(place{file, 1, 1})
	r.here = r.root
	r.p.Reset(r.src)
	for r.p.NextExpression() {
		r.expression(r.p.Expression())
	}
	if err := r.p.Error(); err != nil {
		r.errs = append(r.errs, r.syntax(err))
		return nil, r.errs.sorted()
	}
	return r.root, r.errs.sorted()
}

// syntax gives a syntax error with its place.
func (r *reader) syntax(err error) Error {
	var bad *unstable.ParserError
	if !errors.As(err, &bad) {
		return place{r.file, 1, 1}.fault("", "", "not TOML: %s", err)
	}
	offset := int(r.p.Range(bad.Highlight).Offset)
	msg, hint := bad.Message, ""
	if c, n := utf8.DecodeRune(r.src[offset:]); n > 1 && strings.Contains(msg, "U+00") {
		msg = fmt.Sprintf("unexpected character %q", c) // the parser names a byte of it
	}
	for _, s := range []string{"expected newline", "unexpected character", "strings must be quoted"} {
		if strings.HasPrefix(msg, s) {
			hint = `texts and quantities stand in straight quotes: "1.9 m"`
		}
	}
	return r.place(offset).fault("", hint, "not TOML: %s", msg)
}

func (r *reader) fault(p place, key, format string, args ...any) {
	r.errs = append(r.errs, p.fault(key, "", format, args...))
}

func (r *reader) expression(e *unstable.Node) {
	switch e.Kind {
	case unstable.KeyValue:
		if r.here != nil {
			r.keyValue(r.here, e, 0)
		}
	case unstable.Table:
		r.here = r.header(e, false)
	case unstable.ArrayTable:
		r.here = r.header(e, true)
	}
}

// part is one part of a dotted key.
type part struct {
	name string
	at   place
	end  int
}

// parts divides a dotted key; it gives none, and a fault, where there are more
// than the format could ever want.
func (r *reader) parts(it unstable.Iterator) []part {
	var out []part
	for it.Next() {
		k := it.Node()
		out = append(out, part{string(k.Data), r.place(int(k.Raw.Offset)), int(k.Raw.Offset + k.Raw.Length)})
		if len(out) > maxDepth {
			r.fault(out[0].at, "", "a key of more than %d parts", maxDepth)
			return nil
		}
	}
	return out
}

// header finds or makes the table of a header. It gives nil at a fault: the
// keys below it are then not read.
func (r *reader) header(e *unstable.Node, many bool) *node {
	parts, at := r.parts(e.Key()), r.root
	if parts == nil {
		return nil
	}
	for _, p := range parts[:len(parts)-1] {
		if at = r.into(at, p); at == nil {
			return nil
		}
	}
	last := parts[len(parts)-1]
	kid, ok := at.kids[last.name]
	if many {
		return r.another(at, kid, last)
	}
	switch {
	case !ok:
		kid = newTable(last.at)
		at.put(last.name, kid)
	case kid.kind != isTable || kid.inline || kid.header:
		r.fault(last.at, printable(last.name), "is given twice; first at line %d", kid.key.line)
		return nil
	}
	kid.header = true
	return kid
}

// another adds a table to a list of tables.
func (r *reader) another(at, list *node, p part) *node {
	if list == nil {
		list = &node{kind: isArray, at: p.at, key: p.at}
		at.put(p.name, list)
	}
	if list.kind != isArray || list.inline {
		r.fault(p.at, printable(p.name), "is given twice; first at line %d", list.key.line)
		return nil
	}
	kid := newTable(p.at)
	kid.header = true
	list.items = append(list.items, kid)
	return kid
}

// into goes down one part of a dotted key: of a list into its last table.
func (r *reader) into(at *node, p part) *node {
	kid, ok := at.kids[p.name]
	if !ok {
		kid = newTable(p.at)
		at.put(p.name, kid)
	}
	if kid.kind == isArray && !kid.inline && len(kid.items) > 0 {
		kid = kid.items[len(kid.items)-1]
	}
	if kid.kind != isTable || kid.inline {
		r.fault(p.at, printable(p.name), "is given twice; first at line %d", kid.key.line)
		return nil
	}
	return kid
}

func (r *reader) keyValue(at *node, e *unstable.Node, depth int) {
	parts := r.parts(e.Key())
	if parts == nil {
		return
	}
	for _, p := range parts[:len(parts)-1] {
		if at = r.into(at, p); at == nil {
			return
		}
	}
	last := parts[len(parts)-1]
	if old, ok := at.kids[last.name]; ok {
		r.fault(last.at, printable(last.name), "is given twice; first at line %d", old.key.line)
		return
	}
	r.end = r.valueOffset(last.end)
	v := r.value(e.Value(), depth)
	v.key = last.at
	at.put(last.name, v)
}

// valueOffset goes from the end of a key to its value.
func (r *reader) valueOffset(end int) int {
	for end < len(r.src) && strings.IndexByte(" \t=", r.src[end]) >= 0 {
		end++
	}
	return end
}

// value reads the value that begins at r.end.
func (r *reader) value(v *unstable.Node, depth int) *node {
	at := r.place(r.end)
	n := &node{at: at, key: at}
	r.end += max(int(v.Raw.Length), 1) // of a list or a table: its bracket
	if depth > maxDepth {
		r.fault(at, "", "values nest deeper than %d levels", maxDepth)
		return n
	}
	switch v.Kind {
	case unstable.String:
		n.kind, n.text = isText, string(v.Data)
	case unstable.Bool:
		n.kind, n.flag = isBool, string(v.Data) == "true"
	case unstable.Integer, unstable.Float:
		n.kind, n.raw = isNumber, string(v.Data)
		n.num = number(n.raw)
	case unstable.Array:
		r.list(n, v, depth)
	case unstable.InlineTable:
		n.kind, n.kids, n.inline = isTable, map[string]*node{}, true
		for it := v.Children(); it.Next(); {
			if it.Node().Kind == unstable.KeyValue {
				n.inline = false
				r.keyValue(n, it.Node(), depth+1)
			}
		}
		n.inline = true
	default:
		n.kind, n.text = isDate, string(v.Data)
	}
	return n
}

func (r *reader) list(n *node, v *unstable.Node, depth int) {
	n.kind, n.inline = isArray, true
	for it := v.Children(); it.Next(); {
		kid := it.Node()
		switch {
		case kid.Kind == unstable.Comment:
			continue
		case kid.Raw.Length > 0:
			r.end = int(kid.Raw.Offset)
		default: // The parser gives the place of all but lists.
			r.skip()
		}
		n.items = append(n.items, r.value(kid, depth+1))
	}
}

// skip goes to the list that comes next, past the ends of values, commas and
// comments.
func (r *reader) skip() {
	for r.end < len(r.src) && r.src[r.end] != '[' {
		if r.src[r.end] == '#' {
			r.end += max(bytes.IndexByte(r.src[r.end:], '\n'), 0)
		}
		r.end++
	}
}

// number reads a TOML number; NaN where it is none.
func number(raw string) float64 {
	clean := strings.ReplaceAll(raw, "_", "")
	if x, err := strconv.ParseInt(clean, 0, 64); err == nil {
		return float64(x)
	}
	if x, err := strconv.ParseFloat(clean, 64); err == nil {
		return x
	}
	return math.NaN()
}
