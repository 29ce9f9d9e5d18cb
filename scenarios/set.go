package scenarios

import (
	"fmt"
	"strconv"
	"strings"
)

// apply puts settings KEY=VALUE into the tree, in their order.
func apply(root *node, sets []string) (errs ErrorList) {
	for _, s := range sets {
		at := place{file: "--set " + printable(s)}
		parts, val, ok := splitSetting(s)
		if !ok {
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

// splitSetting divides a setting into its value and the parts of its key. A
// part in quotes may hold points and equals signs.
func splitSetting(s string) (parts []string, val string, ok bool) {
	for {
		part, rest, ok := keyPartOf(strings.TrimSpace(s))
		if !ok || rest == "" {
			return nil, "", false
		}
		parts = append(parts, part)
		if rest[0] == '=' {
			return parts, rest[1:], true
		}
		s = rest[1:]
	}
}

// keyPartOf takes the first part of a key; the rest begins with a point or an
// equals sign.
func keyPartOf(s string) (part, rest string, ok bool) {
	if s != "" && (s[0] == '"' || s[0] == '\'') {
		end := strings.IndexByte(s[1:], s[0])
		if end < 0 {
			return "", "", false
		}
		part, rest = s[1:end+1], strings.TrimSpace(s[end+2:])
		return part, rest, rest != "" && (rest[0] == '.' || rest[0] == '=')
	}
	end := strings.IndexAny(s, ".=")
	if end < 0 {
		return "", "", false
	}
	part = strings.TrimSpace(s[:end])
	return part, s[end:], part != ""
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
		why := "wants one value"
		if len(errs) > 0 {
			why = errs[0].Msg
		}
		return nil, ErrorList{at.fault("", "", "cannot read the value: %s", why)}
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

// instead lists, beside the groups of the format, the keys that a key stands
// in place of.
var instead = map[*section]map[string][]string{
	airKeys: {
		"none":        {"pressure", "temperature", "density", "viscosity", "stratified", "buoyancy", "draft"},
		"stratified":  {"none"},
		"buoyancy":    {"none"},
		"pressure":    {"none", "density", "viscosity"},
		"temperature": {"none", "density", "viscosity"},
		"density":     {"none", "pressure", "temperature"},
		"viscosity":   {"none", "pressure", "temperature"},
	},
	draftKeys: {"file": {"heights", "spinward", "axial", "up"}, "heights": {"file"}, "spinward": {"file"}, "axial": {"file"}, "up": {"file"}},
	station:   {"radius": {"deck", "height"}, "deck": {"radius"}, "height": {"radius"}},
	target:    {"radius": {"deck", "height"}, "deck": {"radius"}, "height": {"radius"}},
}

// giveWay drops the keys that a key stands in place of.
func giveWay(at *node, s *section, k *key) {
	for _, other := range instead[s][k.name] {
		at.drop(other)
	}
	if k.group == "" {
		return
	}
	for _, other := range s.group(k.group) {
		if other != k.name {
			at.drop(other)
		}
	}
}

// put sets one key. Tables on the way are made; of an exclusive group the
// other keys go. At a fault nothing is changed.
func put(at *node, s *section, parts []string, v *node, where place) (Error, bool) {
	if len(parts) == 0 {
		return where.fault("", "", "wants a key of the entry, not the entry itself"), false
	}
	name, rest := parts[0], parts[1:]
	k := s.find(name)
	switch {
	case k == nil:
		hint := ""
		if like := nearest(name, s.names()); like != "" {
			hint = "did you mean " + like + "?"
		}
		return where.fault("", hint, "%s has no key %q", s.name, printable(name)), false
	case len(rest) == 0:
		if v.kind != isBool || v.flag {
			giveWay(at, s, k)
		}
		at.put(name, v)
		return Error{}, true
	case k.want == wantOpen:
		return putOpen(at, k, rest, v, where)
	case k.want == wantTables:
		return putEntry(at.kids[name], k, rest, v, where)
	case k.want != wantTable:
		return where.fault("", "", "%s holds no keys", name), false
	}
	kid, ok := at.kids[name]
	if !ok || kid.kind != isTable {
		kid = newTable(where)
	}
	fault, ok := put(kid, k.sub, rest, v, where)
	if ok {
		giveWay(at, s, k)
		at.put(name, kid)
	}
	return fault, ok
}

// putEntry sets a key of an entry of a list.
func putEntry(list *node, k *key, parts []string, v *node, where place) (Error, bool) {
	if list == nil || list.kind != isArray {
		return where.fault("", "", "the scenario has no %s", k.name), false
	}
	item := list.named(parts[0])
	if item == nil {
		return where.fault("", list.hint(parts[0]), "no %s named %q", k.name, printable(parts[0])), false
	}
	return put(item, k.sub, parts[1:], v, where)
}

// putOpen sets a key of a table whose keys may hold points: the longest that
// there is, and what is left of the setting's key below it.
func putOpen(at *node, k *key, parts []string, v *node, where place) (Error, bool) {
	table, ok := at.kids[k.name]
	if !ok || table.kind != isTable {
		table = newTable(where)
	}
	for n := len(parts) - 1; n > 0; n-- {
		name := strings.Join(parts[:n], ".")
		sub := k.free.find(name)
		if sub == nil {
			continue
		}
		kid, ok := table.kids[name]
		if !ok || kid.kind != isTable {
			kid = newTable(where)
		}
		fault, ok := put(kid, sub.sub, parts[n:], v, where)
		if ok {
			table.put(name, kid)
			at.put(k.name, table)
		}
		return fault, ok
	}
	table.put(strings.Join(parts, "."), v)
	at.put(k.name, table)
	return Error{}, true
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
