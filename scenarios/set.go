package scenarios

import (
	"fmt"
	"strconv"
	"strings"
)

// apply puts settings KEY=VALUE into the tree, in their order.
func apply(root *node, sets []string) (errs ErrorList) {
	for _, s := range sets {
		name, val, ok := strings.Cut(s, "=")
		at := place{file: "--set " + printable(s)}
		parts, err := splitKey(strings.TrimSpace(name))
		if !ok || err != nil || len(parts) == 0 {
			errs = append(errs, at.fault("", `such as --set habitat.spin="4 rpm"`, "wants KEY=VALUE, the parts of the key separated by points"))
			continue
		}
		v, bad := setting(val, at)
		if len(bad) > 0 {
			errs = append(errs, bad...)
			continue
		}
		if fault, ok := put(root, file, parts, v, at); !ok {
			errs = append(errs, fault)
		}
	}
	return errs
}

// splitKey divides a key at its points; a part in quotes may hold any.
func splitKey(key string) (parts []string, err error) {
	for key != "" {
		if q := key[0]; q == '"' || q == '\'' {
			end := strings.IndexByte(key[1:], q)
			if end < 0 {
				return nil, fmt.Errorf("a quote without an end")
			}
			parts = append(parts, key[1:end+1])
			key = key[end+2:]
			if key != "" && key[0] != '.' {
				return nil, fmt.Errorf("wants a point after a quote")
			}
			key = strings.TrimPrefix(key, ".")
			continue
		}
		part, rest, more := strings.Cut(key, ".")
		if part == "" || more && rest == "" {
			return nil, fmt.Errorf("an empty part")
		}
		parts, key = append(parts, part), rest
	}
	return parts, nil
}

// setting parses a value as the file would; what is no TOML is a text without
// its quotes.
func setting(val string, at place) (*node, ErrorList) {
	val = strings.TrimSpace(val)
	root, errs := parse(at.file, []byte("v = "+val+"\n"))
	if len(errs) == 0 && len(root.names) == 1 && root.kids["v"].kind != isDate {
		v := root.kids["v"]
		v.moveTo(at)
		return v, nil
	}
	if val != "" && strings.IndexByte("[{\"'", val[0]) >= 0 {
		return nil, ErrorList{at.fault("", "", "cannot read the value: %s", strings.TrimSpace(errs[0].Msg))}
	}
	return &node{kind: isText, text: val, at: at, key: at}, nil
}

// moveTo gives a node and what is in it one place.
func (n *node) moveTo(at place) {
	n.at, n.key = at, at
	for _, kid := range n.kids {
		kid.moveTo(at)
	}
	for _, item := range n.items {
		item.moveTo(at)
	}
}

// put sets one key. Tables on the way are made; of an exclusive group the
// other keys go.
func put(at *node, s *section, parts []string, v *node, where place) (Error, bool) {
	for i, name := range parts {
		k := s.find(name)
		path := strings.Join(parts[:i+1], ".")
		if k == nil {
			hint := ""
			if like := nearest(name, s.names()); like != "" {
				hint = "did you mean " + like + "?"
			}
			return where.fault("", hint, "%s has no key %q", s.name, name), false
		}
		if k.group != "" {
			for _, other := range s.group(k.group) {
				if other != name {
					at.drop(other)
				}
			}
		}
		rest := parts[i+1:]
		switch {
		case len(rest) == 0:
			at.put(name, v)
			return Error{}, true
		case k.want == wantOpen:
			return putOpen(at, name, rest, v, where), true
		case k.want != wantTable && k.want != wantTables:
			return where.fault("", "", "%s holds no keys", path), false
		}
		kid, ok := at.kids[name]
		if k.want == wantTables {
			if !ok || kid.kind != isArray {
				return where.fault("", "", "the scenario has no %s", name), false
			}
			item := kid.named(rest[0])
			if item == nil {
				return where.fault("", kid.hint(rest[0]), "no %s named %q", name, rest[0]), false
			}
			return put(item, k.sub, rest[1:], v, where)
		}
		if !ok || kid.kind != isTable {
			kid = newTable(where)
			at.put(name, kid)
		}
		at, s = kid, k.sub
	}
	return where.fault("", "", "wants a key of the entry, not the entry itself"), false
}

// putOpen sets a key of a free table.
func putOpen(at *node, name string, rest []string, v *node, where place) Error {
	kid, ok := at.kids[name]
	if !ok || kid.kind != isTable {
		kid = newTable(where)
		at.put(name, kid)
	}
	kid.put(strings.Join(rest, "."), v)
	return Error{}
}

// named finds the entry of a list by its name, or by its number from 0 where
// entries have no names.
func (n *node) named(name string) *node {
	for _, item := range n.items {
		if item.kind == isTable && item.kids["name"] != nil && item.kids["name"].text == name {
			return item
		}
	}
	if i, err := strconv.Atoi(name); err == nil && i >= 0 && i < len(n.items) && n.items[i].kind == isTable {
		return n.items[i]
	}
	return nil
}

// hint names the entries of a list.
func (n *node) hint(like string) string {
	var names []string
	for _, item := range n.items {
		if item.kind == isTable && item.kids["name"] != nil {
			names = append(names, item.kids["name"].text)
		}
	}
	if best := nearest(like, names); best != "" {
		return fmt.Sprintf("did you mean %q?", best)
	}
	if len(names) == 0 || len(names) > 12 {
		return ""
	}
	return "there are " + quoted(names)
}
