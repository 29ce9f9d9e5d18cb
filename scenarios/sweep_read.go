package scenarios

import (
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"
)

// sweeps reads the sweeps; those with faults are left out.
func (b *builder) sweeps(root *object) (out []*Sweep) {
	for _, o := range root.subs("sweep") {
		faults := len(b.errs)
		s := &Sweep{Name: o.str("name"), node: o.node, path: o.path}
		s.Keys = append(s.Keys, b.swept(root.node, o, ""))
		if o.has("key2") {
			s.Keys = append(s.Keys, b.swept(root.node, o, "2"))
		} else {
			b.refuses(o, "stands only beside key2", "from2", "to2", "count2", "values2")
		}
		if len(b.errs) == faults {
			b.apart(root.node, o, s)
		}
		if n := s.Points(); n > MaxPoints {
			b.fault(o.node.key, o.path, "", "wants at most %d points in all, got %d", MaxPoints, n)
		}
		out = append(out, s)
	}
	return out
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
var unswept = []string{"title", "notes", "limit", "platforms", "scatter", "sweep", "throw_to", "landing_map"}

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
	if fault, ok := put(root.copied(), file, parts, &node{kind: isText, at: at, key: at}, at); !ok {
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
	return k.want == wantQuantity || k.want == wantNumber || k.want == wantWordOrQuantity
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

// copied gives a tree of its own, for settings to be tried on.
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
	tried := root.copied()
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

// sweptValue reads one value of a swept key that holds a number.
func (b *builder) sweptValue(n *node, k *key, path string) (quantity, bool) {
	if k.want == wantNumber {
		x, ok := b.number(n, k, path)
		return quantity{si: x}, ok
	}
	return b.quantity(n, k, path)
}

// written is a value's number and unit as they stand in the file.
func (n *node) written(q quantity) (float64, unit) {
	if n.kind == isNumber {
		return n.num, unit{scale: 1}
	}
	x, name, _ := split(n.text)
	u, _ := q.dim.find(name)
	return x, u
}

// loose takes whatever a key can hold; the key that is stepped says more.
func (c *checker) loose(n *node, path string) bool {
	switch n.kind {
	case isText, isBool:
		return true
	case isNumber:
		_, ok := c.number(n, &key{want: wantNumber, span: anything}, path)
		return ok
	}
	c.fault(n.at, path, "", "wants a single value, got %s", n.found())
	return false
}

// listed takes the values of a list.
func (b *builder) listed(out *SweepKey, k *key, items []*node, path string) {
	if k.numeric() {
		b.numbers(out, k, items, path)
		return
	}
	out.quote = k.want != wantFlag
	for i, n := range items {
		v := b.value(n, k, fmt.Sprintf("%s[%d]", path, i))
		if v == nil {
			return
		}
		text := v.text
		if k.want == wantFlag {
			text = strconv.FormatBool(v.flag)
		}
		out.Texts = append(out.Texts, text)
	}
}

// numbers takes the values of a list, in the unit that they share or in SI.
func (b *builder) numbers(out *SweepKey, k *key, items []*node, path string) {
	var first quantity
	var one unit
	var si []float64
	same := true
	for i, n := range items {
		at := fmt.Sprintf("%s[%d]", path, i)
		q, ok := b.sweptValue(n, k, at)
		if !ok {
			continue
		}
		x, u := n.written(q)
		if len(si) == 0 {
			first, one = q, u
		}
		if q.dim != first.dim {
			b.fault(n.at, at, "", "wants %s, as the values before, got %s", first.dim.name, n.found())
			continue
		}
		same = same && u == one
		si, out.Values = append(si, q.si), append(out.Values, x)
		out.Texts = append(out.Texts, n.text)
		if n.kind == isNumber {
			out.Texts[len(out.Texts)-1] = n.raw
		}
	}
	out.Unit = one.name
	if !same {
		out.Values, out.Unit = si, first.dim.si
	}
}

// sweptRange takes count values from one to another.
func (b *builder) sweptRange(out *SweepKey, k *key, o *object, from, to, count string) {
	lo, hi, n := o.vals[from], o.vals[to], o.vals[count]
	if lo == nil || hi == nil || n == nil {
		return
	}
	q0, ok0 := b.sweptValue(lo.node, k, join(o.path, from))
	q1, ok1 := b.sweptValue(hi.node, k, join(o.path, to))
	if !ok0 || !ok1 {
		return
	}
	if q0.dim != q1.dim {
		b.fault(hi.node.at, join(o.path, to), "", "wants %s, as %s has, got %s", q0.dim.name, from, hi.node.found())
		return
	}
	if n.si == 1 && q0.si != q1.si {
		b.fault(n.node.at, join(o.path, count), "", "wants 2 or more, since %s and %s differ, got 1", from, to)
		return
	}
	a, u := lo.node.written(q0)
	z, v := hi.node.written(q1)
	if u != v {
		a, z, u = q0.si, q1.si, unit{name: q0.dim.si}
	}
	out.Unit, out.Values = u.name, stepped(a, z, int(n.si))
	for _, x := range out.Values {
		out.Texts = append(out.Texts, strings.TrimSpace(strconv.FormatFloat(x, 'g', -1, 64)+" "+u.name))
	}
}

// stepDigits is to how many digits of the larger end the values between are
// rounded, so that a tenth is a tenth: two fewer than a float64 holds of any
// number, which leaves room for the roundings of a step.
const stepDigits = 14

// stepped gives n values from a to z, both as they are.
func stepped(a, z float64, n int) []float64 {
	out := make([]float64, n)
	decimals := 0
	if most := math.Max(math.Abs(a), math.Abs(z)); most > 0 {
		decimals = max(0, stepDigits-1-int(math.Floor(math.Log10(most))))
	}
	for i := range out {
		x := a + (z-a)*float64(i)/math.Max(1, float64(n-1))
		x, _ = strconv.ParseFloat(strconv.FormatFloat(x, 'f', decimals, 64), 64)
		if x == 0 {
			x = 0 // no negative zero
		}
		out[i] = x
	}
	out[0], out[n-1] = a, z
	return out
}
