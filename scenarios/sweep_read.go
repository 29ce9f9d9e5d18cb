package scenarios

import (
	"maps"
	"math"
	"slices"
	"strings"
)

// sweeps reads the sweeps. Beyond the bounds it stops.
func (b *builder) sweeps(root *object) (out []*Sweep) {
	points := 0.0
	for i, o := range root.subs("sweep") {
		points += o.many("") * o.many("2")
		if i == MaxSweeps || points > MaxPoints {
			b.fault(o.node.key, o.path, "", "wants at most %d sweeps of together at most %d points, got %d of %.0f with this one", MaxSweeps, MaxPoints, i+1, points)
			return nil
		}
		faults := len(b.errs)
		s := &Sweep{Name: o.str("name"), node: o.node, path: o.path}
		if o.has("variants") {
			b.variants(root.node, o, s)
			out = append(out, s)
			continue
		}
		if !o.has("key") {
			continue // which is told
		}
		s.Keys = append(s.Keys, b.swept(root.node, o, ""))
		if o.has("key2") {
			s.Keys = append(s.Keys, b.swept(root.node, o, "2"))
		} else {
			b.refuses(o, "stands only beside key2", "from2", "to2", "count2", "values2")
		}
		if len(b.errs) == faults {
			b.apart(root.node, o, s)
		}
		out = append(out, s)
	}
	return out
}

// many is how many values a key of a sweep takes, as far as it can be told.
func (o *object) many(end string) float64 {
	if n := len(o.subs("variants")); n > 0 && end == "" {
		return float64(n)
	}
	if list := o.vals["values"+end]; list != nil {
		return float64(len(list.list))
	}
	return math.Max(1, o.num("count"+end))
}

// swept reads a key and its values; end is that of the names of its keys.
func (b *builder) swept(root *node, o *object, end string) SweepKey {
	out := SweepKey{text: o.str("key" + end)}
	k := b.sweptKey(root, o, "key"+end, &out)
	values, from, to, count := "values"+end, "from"+end, "to"+end, "count"+end
	if o.has(values) {
		b.refuses(o, "wants either values or a range, not both", from, to, count)
		if list := o.vals[values]; list != nil && k != nil {
			b.listed(&out, k, list.node.items, join(o.path, values))
		}
		return out
	}
	if k != nil && !k.numeric() {
		b.fault(o.at("key"+end), join(o.path, "key"+end), "a list of "+values+" can step it", "wants a key that holds a number or a quantity; %s holds: %s", printable(out.Name), k.inWords())
		return out
	}
	if !o.has(from) && !o.has(to) && !o.has(count) {
		b.fault(o.node.key, o.path, "", "a sweep wants the key %s, or %s, %s and %s", values, from, to, count)
		return out
	}
	if b.wants(o, "a sweep through a range", from, to, count) && k != nil {
		b.sweptRange(&out, k, o, from, to, count)
	}
	return out
}

// unswept are the tables whose keys change no measure.
var unswept = []string{"title", "question", "notes", "limit", "platforms", "scatter", "sweep", "throw_to", "landing_map", "figure"}

// sweptKey finds the key of the format that a sweep names; nil after a fault.
func (b *builder) sweptKey(root *node, o *object, name string, out *SweepKey) *key {
	if o.vals[name] == nil {
		return nil
	}
	at, path := o.at(name), join(o.path, name)
	parts, rest, ok := splitSetting(out.text + "=")
	if !ok || rest != "" {
		b.fault(at, path, `such as "habitat.spin"`, "wants a key as in --set, its parts separated by points, got %q", shorten(out.text))
		return nil
	}
	out.parts, out.Name = parts, strings.Join(parts, ".")
	if fault, ok := put(root.branch(parts), file, parts, &node{kind: isText, at: at, key: at}, at); !ok {
		fault.Key = path
		b.errs = append(b.errs, fault)
		return nil
	}
	k := file.at(parts)
	switch {
	case slices.Contains(unswept, parts[0]):
		b.fault(at, path, "", "wants a key that changes what is measured; %s changes nothing", printable(out.Name))
	case parts[0] == "release_list" && k.name == "file":
		b.fault(at, path, "", "cannot step through files: a scenario is made of those that it names itself")
	case !k.numeric() && k.want != wantText && k.want != wantWord && k.want != wantFlag:
		b.fault(at, path, "", "wants a key that holds a single value; %s holds: %s", printable(out.Name), k.inWords())
	default:
		return k
	}
	return nil
}

// inWords is what a key holds, without marks.
func (k *key) inWords() string { return strings.NewReplacer("*", "", "`", "").Replace(k.holds()) }

// numeric says whether a key holds a number, with a unit or without.
func (k *key) numeric() bool {
	return k.want == wantQuantity || k.want == wantNumber || k.want == wantWordOrQuantity || k.want == wantQuantities
}

// at goes down to a key of the format, which is known to be there; of a free
// table it gives the table itself.
func (s *section) at(parts []string) *key {
	k, rest := s.find(parts[0]), parts[1:]
	if k.want == wantTables && len(rest) > 0 {
		rest = rest[1:] // the name of the entry
	}
	if k.sub == nil || len(rest) == 0 {
		return k
	}
	return k.sub.at(rest)
}

// branch gives a tree whose tables on the way to a key are its own, for a
// setting to be tried on.
func (n *node) branch(parts []string) *node {
	out := *n
	out.names, out.kids, out.items = slices.Clone(n.names), maps.Clone(n.kids), slices.Clone(n.items)
	if len(parts) == 0 {
		return &out
	}
	if n.kind == isArray {
		if item := n.named(parts[0]); item != nil {
			out.items[slices.Index(n.items, item)] = item.branch(parts[1:])
		}
	} else if kid := n.kids[parts[0]]; kid != nil {
		out.kids[parts[0]] = kid.branch(parts[1:])
	}
	return &out
}

// copied gives a tree of its own.
func (n *node) copied() *node {
	out := *n
	out.names = slices.Clone(n.names)
	if n.kids != nil {
		out.kids = make(map[string]*node, len(n.kids))
		for name, kid := range n.kids {
			out.kids[name] = kid.copied()
		}
	}
	out.items = make([]*node, len(n.items))
	for i, item := range n.items {
		out.items[i] = item.copied()
	}
	return &out
}

// get gives what stands at a key as settings have it; nil: nothing.
func (n *node) get(parts []string) *node {
	for _, p := range parts {
		if n == nil {
			return nil
		}
		if n.kind == isArray {
			n = n.named(p)
		} else {
			n = n.kids[p]
		}
	}
	return n
}

// apart holds that the second key does not take the place of the first.
func (b *builder) apart(root *node, o *object, s *Sweep) {
	if len(s.Keys) < 2 {
		return
	}
	tried := root.branch(s.Keys[0].parts).branch(s.Keys[1].parts)
	var first *node
	for i := range s.Keys {
		v := &node{kind: isText}
		if i == 0 {
			first = v
		}
		put(tried, file, s.Keys[i].parts, v, place{})
	}
	if tried.get(s.Keys[0].parts) != first {
		b.fault(o.at("key2"), join(o.path, "key2"), "", "stands in place of the first key: only one of the two can be given")
	}
}
