package scenarios

import (
	"fmt"
	"math"
	"strconv"
	"strings"
)

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
