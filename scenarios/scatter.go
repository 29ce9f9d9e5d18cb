package scenarios

import (
	"fmt"
	"strings"

	"offplumb/sim/model"
)

// spreadOf is the section of how a number varies that is a quantity of some
// dimensions, or a bare number.
func spreadOf(dims ...*dimension) *section {
	list := func(name string, n int, doc string) key {
		k := key{name: name, want: wantNumbers, count: n, span: anything, doc: doc}
		if len(dims) > 0 {
			k.want, k.dims = wantList, dims
		}
		return k.one("spread")
	}
	return &section{name: "a spread", doc: "How a number varies.",
		keys: []key{
			list("normal", 2, "mean and standard deviation, in units of the number"),
			list("uniform", 2, "low and high: all values between are as likely"),
			list("triangular", 3, "low, mode and high"),
			text("file", "CSV file beside the scenario, each row as likely; keys that name the same file take their values from the same row").one("spread"),
			text("column", "column of the file; its name ends in its unit, as height_m does, or its fields have theirs"),
		},
		exactly: []string{"spread"}}
}

func spreadKey(name, doc string, dims ...*dimension) key {
	return table(name, spreadOf(dims...), doc)
}

// vary holds the numbers of a release that a scatter may vary.
var vary = &section{name: "vary", doc: "The numbers of the release that vary, and how.",
	keys: []key{
		spreadKey("at.spinward", "place along the deck", length, angle),
		spreadKey("at.axial", "axial place", length),
		spreadKey("at.height", "height above the deck", length),
		spreadKey("at.radius", "distance from the axis, of a release placed by it", length),
		spreadKey("velocity.spinward", "of what is dropped or given a velocity", speed),
		spreadKey("velocity.axial", "of what is dropped or given a velocity", speed),
		spreadKey("velocity.up", "of what is dropped or given a velocity", speed),
		spreadKey("throw.speed", "of what is thrown", speed),
		spreadKey("throw.heading", "of what is thrown", angle),
		spreadKey("throw.elevation", "of what is thrown", angle),
		spreadKey("time", "when it is let go", duration),
		spreadKey("body.mass", "of its body", mass),
		spreadKey("body.diameter", "of its body", length),
		spreadKey("body.restitution", "of its body"),
		spreadKey("body.friction", "of its body"),
		spreadKey("body.drag_area", "of its body", area),
		spreadKey("body.drag_coefficient", "of its body"),
		spreadKey("habitat.spin", "of the habitat", turnRate),
	}}

// free holds a table with free keys against the section of what they hold.
// Keys with a point may stand as such or as tables in tables.
func (c *checker) free(n *node, s *section, path string) *object {
	flat := newTable(n.at)
	flat.key = n.key
	put := func(name string, kid *node) {
		if old, ok := flat.kids[name]; ok {
			c.fault(kid.key, join(path, printable(name)), "", "is given twice; first at line %d", old.key.line)
			return
		}
		flat.put(name, kid)
	}
	for _, name := range n.names {
		kid := n.kids[name]
		if kid.kind != isTable || !s.hasUnder(name) {
			put(name, kid)
			continue
		}
		for _, sub := range kid.names {
			put(name+"."+sub, kid.kids[sub])
		}
	}
	return c.object(flat, s, path)
}

// hasUnder says whether a section has keys that begin with a name and a point.
func (s *section) hasUnder(name string) bool {
	for i := range s.keys {
		if strings.HasPrefix(s.keys[i].name, name+".") {
			return true
		}
	}
	return false
}

var samplings = map[string]model.Sampling{"random": model.Random, "latin_hypercube": model.LatinHypercube, "halton": model.Halton}

func (b *builder) scatter(o *object, files reading) model.Scatter {
	s := model.Scatter{Name: o.str("name"), Of: o.str("of"), Samples: int(o.num("samples")), Sampling: samplings[o.str("sampling")],
		Precision: o.num("precision"), SharePrecision: o.num("share_precision")}
	if s.Sampling == model.LatinHypercube {
		b.refuses(o, "a Latin hypercube is one of all its samples: it cannot stop sooner", "precision", "share_precision")
	}
	v := o.sub("vary")
	if v == nil {
		return s
	}
	if len(v.node.names) == 0 {
		b.fault(o.at("vary"), v.path, `write vary = { "at.height" = { normal = ["1.9 m", "0.1 m"] } }`, "wants at least one key of the release")
	}
	for _, name := range v.node.names {
		if sub := v.sub(name); sub != nil {
			s.Vary = append(s.Vary, b.spread(sub, name, vary.find(name).sub, files))
		}
	}
	return s
}

func (b *builder) spread(o *object, name string, s *section, files reading) model.Spread {
	out := model.Spread{Key: name}
	kinds := []struct {
		key  string
		kind model.SpreadKind
	}{{"normal", model.Normal}, {"uniform", model.Uniform}, {"triangular", model.Triangular}}
	for _, k := range kinds {
		list := o.list(k.key)
		if list == nil {
			continue
		}
		out.Kind = k.kind
		alike := true
		for i, q := range list {
			out.P[i] = q.si
			alike = b.likeFirst(o, k.key, i, list) && alike
		}
		out.IsAngle = list[0].dim == angle && s.find(k.key).dims[0] != angle
		if alike {
			b.ordered(o, k.key, list)
		}
		b.refuses(o, "stands only beside file", "column")
	}
	if o.has("file") {
		b.fromFile(&out, o, s, files)
	}
	return out
}

// likeFirst faults a value of another dimension than the first of its list: an
// arc may be a length or an angle, but not both.
func (b *builder) likeFirst(o *object, key string, i int, list []quantity) bool {
	alike := list[i].dim == list[0].dim
	if !alike {
		b.fault(o.vals[key].node.items[i].at, fmt.Sprintf("%s[%d]", join(o.path, key), i), "", "wants %s as the first value has, got %s", list[0].dim.name, list[i].dim.name)
	}
	return alike
}

// ordered faults values that make no distribution.
func (b *builder) ordered(o *object, key string, list []quantity) {
	fault := func(i int, what string) {
		b.fault(o.vals[key].node.items[i].at, fmt.Sprintf("%s[%d]", join(o.path, key), i), "", "wants %s", what)
	}
	switch {
	case key == "normal" && list[1].si <= 0:
		fault(1, "a standard deviation above 0")
	case key == "uniform" && list[1].si <= list[0].si:
		fault(1, "a high end above the low end")
	case key == "triangular" && list[2].si <= list[0].si:
		fault(2, "a high end above the low end")
	case key == "triangular" && (list[1].si < list[0].si || list[1].si > list[2].si):
		fault(1, "a mode between the low end and the high end")
	}
}
