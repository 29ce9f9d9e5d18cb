package scenarios

import (
	"fmt"
	"strings"
)

// checker holds a tree against the format.
type checker struct {
	errs ErrorList
}

func (c *checker) fault(at place, key, hint, format string, args ...any) {
	c.errs = append(c.errs, at.fault(key, hint, format, args...))
}

// join puts a key below a path.
func join(path, key string) string {
	if path == "" {
		return key
	}
	return path + "." + key
}

func (c *checker) object(n *node, s *section, path string) *object {
	o := &object{path: path, node: n, vals: map[string]*value{}}
	for _, name := range n.names {
		kid := n.kids[name]
		k := s.find(name)
		if k == nil {
			c.unknown(kid, s, path, name)
			continue
		}
		if v := c.value(kid, k, join(path, name)); v != nil {
			o.vals[name] = v
		}
	}
	c.missing(n, s, path)
	c.groups(n, s, path)
	return o
}

func (c *checker) unknown(kid *node, s *section, path, name string) {
	hint := "the keys of " + s.name + " are " + strings.Join(s.names(), ", ")
	if like := nearest(name, s.names()); like != "" {
		hint = fmt.Sprintf("did you mean %s?", like)
	}
	c.fault(kid.key, join(path, printable(name)), hint, "unknown key")
}

func (c *checker) missing(n *node, s *section, path string) {
	for i := range s.keys {
		k := &s.keys[i]
		if _, ok := n.kids[k.name]; k.required && !ok {
			c.fault(n.key, path, k.example(), "%s wants the key %s: %s", s.name, k.name, k.doc)
		}
	}
}

func (c *checker) groups(n *node, s *section, path string) {
	seen := map[string]string{}
	for _, name := range n.names {
		k := s.find(name)
		if k == nil || k.group == "" || k.want == wantFlag && !n.kids[name].flag {
			continue
		}
		if first, ok := seen[k.group]; ok {
			c.fault(n.kids[name].key, join(path, name), "", "wants only one of %s, and %s is given too", orList(s.group(k.group)), first)
			continue
		}
		seen[k.group] = name
	}
	for _, g := range s.exactly {
		if _, ok := seen[g]; !ok {
			c.fault(n.key, path, "", "%s wants one of %s", s.name, orList(s.group(g)))
		}
	}
}

func orList(words []string) string {
	if len(words) < 2 {
		return strings.Join(words, "")
	}
	return strings.Join(words[:len(words)-1], ", ") + " or " + words[len(words)-1]
}

// example shows how a key is written.
func (k *key) example() string {
	switch {
	case k.want == wantQuantity:
		return fmt.Sprintf("write %s = %q", k.name, k.dims[0].example)
	case k.want == wantWord:
		return "one of " + strings.Join(k.words, ", ")
	}
	return ""
}

// value reads what a key holds; nil after a fault.
func (c *checker) value(n *node, k *key, path string) *value {
	v := &value{node: n}
	var ok bool
	switch k.want {
	case wantQuantity:
		v.quantity, ok = c.quantity(n, k, path)
	case wantQuantities:
		if n.kind == isArray {
			v.list, ok = c.list(n, k, path)
		} else if v.quantity, ok = c.quantity(n, k, path); ok {
			v.list = []quantity{v.quantity}
		}
	case wantNumber, wantInteger:
		v.si, ok = c.number(n, k, path)
	case wantText, wantName:
		v.text, ok = c.text(n, k, path)
	case wantWord:
		v.text, ok = c.word(n, k, path)
	case wantFlag:
		v.flag, ok = n.flag, c.is(n, isBool, "true or false", path)
	case wantTexts:
		v.texts, ok = c.texts(n, k, path)
	case wantList, wantBounds, wantNumbers:
		v.list, ok = c.list(n, k, path)
	case wantTable:
		if ok = c.is(n, isTable, "a table in braces or under its own header", path); ok {
			v.sub = c.object(n, k.sub, path)
		}
	case wantTables:
		v.subs, ok = c.tables(n, k, path)
	case wantWordOrQuantity:
		ok = c.wordOrQuantity(v, n, k, path)
	case wantBound:
		v.quantity, ok = c.bound(n, path)
	case wantSettings:
		ok = c.is(n, isTable, `a table such as { "habitat.spin" = "4 rpm" }`, path)
	case wantOpen:
		if ok = c.is(n, isTable, "a table", path); ok {
			v.sub = c.free(n, k.free, path)
		}
	}
	if !ok {
		return nil
	}
	return v
}
