package scenarios

import (
	"math"

	"offplumb/sim/model"
)

func degrees(x float64) float64 { return x * math.Pi / 180 }

// object is a table that was held against its section: values in SI.
type object struct {
	path string
	node *node
	vals map[string]*value
}

// value is what a key holds.
type value struct {
	node *node
	quantity
	text  string
	flag  bool
	texts []string
	list  []quantity
	sub   *object
	subs  []*object
}

// has says whether a key is given, be its value right or wrong.
func (o *object) has(k string) bool {
	if o == nil {
		return false
	}
	_, ok := o.node.kids[k]
	return ok
}

// Accessors: the zero value where a key is not given, or its value is wrong.

func (o *object) get(k string) *value {
	if o != nil && o.vals[k] != nil {
		return o.vals[k]
	}
	return &value{}
}

func (o *object) num(k string) float64     { return o.get(k).si }
func (o *object) str(k string) string      { return o.get(k).text }
func (o *object) flag(k string) bool       { return o.get(k).flag }
func (o *object) sub(k string) *object     { return o.get(k).sub }
func (o *object) subs(k string) []*object  { return o.get(k).subs }
func (o *object) texts(k string) []string  { return o.get(k).texts }
func (o *object) list(k string) []quantity { return o.get(k).list }

// numOr gives a number or the default.
func (o *object) numOr(k string, deflt float64) float64 {
	if o.has(k) {
		return o.num(k)
	}
	return deflt
}

func (o *object) arc(k string) model.Arc {
	q := o.get(k).quantity
	return model.Arc{Value: q.si, IsAngle: q.dim == angle}
}
