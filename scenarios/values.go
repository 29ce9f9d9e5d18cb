package scenarios

import (
	"fmt"
	"math"
	"regexp"
	"slices"
	"strconv"
	"strings"
	"unicode"
)

// found says what a node holds.
func (n *node) found() string {
	switch n.kind {
	case isText:
		if n.text == "" {
			return "an empty text"
		}
		return strconv.Quote(shorten(n.text))
	case isNumber:
		return "the bare number " + shorten(n.raw)
	case isBool:
		return strconv.FormatBool(n.flag)
	}
	return kindNames[n.kind]
}

// shorten keeps a text short enough for an error.
func shorten(s string) string {
	if r := []rune(s); len(r) > 60 {
		return string(r[:57]) + "..."
	}
	return s
}

// printable replaces what a terminal should not see.
func printable(s string) string {
	return shorten(strings.Map(func(r rune) rune {
		if unicode.IsPrint(r) {
			return r
		}
		return '\uFFFD'
	}, s))
}

func (c *checker) is(n *node, want kind, words, path string) bool {
	if n.kind != want {
		c.fault(n.at, path, "", "wants %s, got %s", words, n.found())
		return false
	}
	return true
}

func (c *checker) quantity(n *node, k *key, path string) (quantity, bool) {
	if n.kind == isNumber {
		c.fault(n.at, path, fmt.Sprintf("write the unit: %q", example(k.dims)), "%s, got the bare number %s", wantedUnit(k.dims), shorten(n.raw))
		return quantity{}, false
	}
	if n.kind != isText {
		c.fault(n.at, path, "", "%s, got %s", wanted(k.dims), n.found())
		return quantity{}, false
	}
	q, err := measureOf(n.text, k.dims...)
	if err != nil {
		c.fault(n.at, path, comma(n.text), "%v, got %s", err, n.found())
		return quantity{}, false
	}
	return q, c.within(n, k, q.si, path)
}

func example(dims []*dimension) string { return dims[0].example }

// comma explains a decimal comma.
func comma(text string) string {
	if strings.Contains(text, ",") {
		return "decimals are written with a point"
	}
	return ""
}

// within checks the range of a value in SI.
func (c *checker) within(n *node, k *key, x float64, path string) bool {
	s := k.span
	if x < s.low || s.open && x == s.low || x > s.high || math.IsNaN(x) {
		got := n.found()
		if n.kind == isNumber {
			got = shorten(n.raw)
		}
		c.fault(n.at, path, "", "wants %s, got %s", s.words(k), got)
		return false
	}
	return true
}

// words describes a span, in the unit of its key that is shown.
func (s span) words(k *key) string {
	unit := ""
	if len(k.dims) > 0 {
		u := k.dims[0].shown()
		unit = " " + u.name
		s.low, s.high = s.low/u.scale, s.high/u.scale
	}
	switch {
	case s.open && math.IsInf(s.high, 1):
		return "more than " + strconv.FormatFloat(s.low, 'g', -1, 64) + unit
	case math.IsInf(s.high, 1):
		return strconv.FormatFloat(s.low, 'g', -1, 64) + unit + " or more"
	case s.low == s.high:
		return strconv.FormatFloat(s.low, 'g', -1, 64)
	}
	return fmt.Sprintf("a value from %.6g%s to %.6g%s", s.low, unit, s.high, unit)
}

// mostNumber is the largest magnitude of a bare number that is taken for
// meant; whole numbers below it are exact.
const mostNumber = 1e15

func (c *checker) number(n *node, k *key, path string) (float64, bool) {
	if n.kind != isNumber {
		words := "a bare number"
		if k.want == wantInteger {
			words = "a whole number"
		}
		c.fault(n.at, path, "", "wants %s, got %s", words, n.found())
		return 0, false
	}
	if math.IsNaN(n.num) || math.IsInf(n.num, 0) {
		c.fault(n.at, path, "", "wants a finite number, got %s", shorten(n.raw))
		return 0, false
	}
	if math.Abs(n.num) > mostNumber {
		c.fault(n.at, path, "", "wants a magnitude of at most %g, got %s", mostNumber, shorten(n.raw))
		return 0, false
	}
	if k.want == wantInteger && n.num != math.Trunc(n.num) {
		c.fault(n.at, path, "", "wants a whole number, got %s", shorten(n.raw))
		return 0, false
	}
	return n.num, c.within(n, k, n.num, path)
}

// longestName bounds a name, in bytes: it stands in every table and figure.
const longestName = 200

func (c *checker) text(n *node, k *key, path string) (string, bool) {
	if !c.is(n, isText, "a text in quotes", path) {
		return "", false
	}
	if k.want != wantName {
		return n.text, true
	}
	if why := nameFault(n.text); why != "" {
		c.fault(n.at, path, "", "%s, got %s", why, n.found())
		return "", false
	}
	return n.text, true
}

// nameFault says what is wrong with a name, "" where nothing is.
func nameFault(s string) string {
	switch {
	case strings.TrimSpace(s) == "":
		return "wants a name"
	case s != strings.TrimSpace(s):
		return "wants a name without spaces at its ends"
	case len(s) > longestName:
		return fmt.Sprintf("wants a name of at most %d bytes", longestName)
	case strings.ContainsFunc(s, func(r rune) bool { return !unicode.IsPrint(r) }):
		return "wants a name of printable characters"
	}
	return ""
}

func (c *checker) word(n *node, k *key, path string) (string, bool) {
	if n.kind == isText && slices.Contains(k.words, n.text) {
		return n.text, true
	}
	c.fault(n.at, path, didYouMean(n, k.words), "wants one of %s, got %s", quoted(k.words), n.found())
	return "", false
}

func didYouMean(n *node, words []string) string {
	if like := nearest(n.text, words); n.kind == isText && like != "" {
		return fmt.Sprintf("did you mean %q?", like)
	}
	return ""
}

func quoted(words []string) string {
	out := make([]string, len(words))
	for i, w := range words {
		out[i] = strconv.Quote(w)
	}
	return strings.Join(out, ", ")
}

func (c *checker) texts(n *node, k *key, path string) ([]string, bool) {
	items := []*node{n}
	if n.kind == isArray {
		items = n.items
	}
	var out []string
	for _, item := range items {
		if !c.is(item, isText, "a text or a list of texts", path) {
			return nil, false
		}
		out = append(out, item.text)
	}
	if len(out) == 0 {
		c.fault(n.at, path, "", "wants at least one text, got an empty list")
	}
	return out, len(out) > 0
}

func (c *checker) list(n *node, k *key, path string) ([]quantity, bool) {
	if !c.is(n, isArray, "a list in brackets", path) {
		return nil, false
	}
	if len(n.items) == 0 {
		c.fault(n.at, path, "", "wants %s, got an empty list", countWords(k.count))
		return nil, false
	}
	if k.count > 0 && len(n.items) != k.count {
		c.fault(n.at, path, "", "wants %s, got %d", countWords(k.count), len(n.items))
		return nil, false
	}
	out, good := make([]quantity, len(n.items)), true
	for i, item := range n.items {
		var ok bool
		at := fmt.Sprintf("%s[%d]", path, i)
		switch k.want {
		case wantBounds:
			ok = c.loose(item, at)
		case wantNumbers:
			out[i].si, ok = c.number(item, k, at)
		default:
			out[i], ok = c.quantity(item, k, at)
		}
		good = good && ok
	}
	return out, good
}

func countWords(n int) string {
	if n == 0 {
		return "a list of values"
	}
	return fmt.Sprintf("a list of %d values", n)
}

// indices are those of lists in a path.
var indices = regexp.MustCompile(`\[[0-9]+\]`)

func (c *checker) tables(n *node, k *key, path string) ([]*object, bool) {
	if n.kind == isTable {
		hint := fmt.Sprintf("write [[%s]]", indices.ReplaceAllString(path, ""))
		if n.inline {
			hint = fmt.Sprintf("write %s = [{ ... }]", k.name)
		}
		c.fault(n.key, path, hint, "wants a list of tables, got one table")
		return nil, false
	}
	if !c.is(n, isArray, "a list of tables", path) {
		return nil, false
	}
	var out []*object
	first := map[string]*node{}
	for i, item := range n.items {
		at := fmt.Sprintf("%s[%d]", path, i)
		if !c.is(item, isTable, "a table", at) {
			return nil, false
		}
		o := c.object(item, k.sub, at)
		out = append(out, o)
		c.unique(o, first, k)
	}
	return out, true
}

func (c *checker) unique(o *object, first map[string]*node, k *key) {
	name := o.str("name")
	if name == "" {
		return
	}
	n := o.get("name").node
	if old, ok := first[name]; ok {
		c.fault(n.at, join(o.path, "name"), "", "%s named %q is there already, at line %d", k.sub.name, shorten(name), old.at.line)
		return
	}
	first[name] = n
}

func (c *checker) wordOrQuantity(v *value, n *node, k *key, path string) (ok bool) {
	if n.kind == isText && slices.Contains(k.words, n.text) {
		v.text = n.text
		return true
	}
	if n.kind == isText {
		if _, _, err := split(n.text); err != nil {
			c.fault(n.at, path, didYouMean(n, k.words), "wants one of %s or %s, got %s", quoted(k.words),
				strings.TrimPrefix(wanted(k.dims), "wants "), n.found())
			return false
		}
	}
	v.quantity, ok = c.quantity(n, k, path)
	return ok
}

func (c *checker) bound(n *node, path string) (quantity, bool) {
	if n.kind == isNumber {
		x, ok := c.number(n, &key{want: wantNumber, span: anything}, path)
		return quantity{si: x}, ok
	}
	if n.kind != isText {
		c.fault(n.at, path, "", "wants a number with its unit, or a bare number, got %s", n.found())
		return quantity{}, false
	}
	q, err := measureOf(n.text, dimensions...)
	if err != nil {
		c.fault(n.at, path, comma(n.text), "%v, got %s", err, n.found())
		return quantity{}, false
	}
	return q, true
}
