package scenarios

import (
	"fmt"
	"slices"
	"strings"
)

// MaxVariants bounds the variants of one sweep.
const MaxVariants = 100

// Variant is a named variant of a scenario: with some keys set otherwise, or
// another file, or both.
type Variant struct {
	Name string
	File string // "": the scenario itself
	sets []variantSet
}

// variantSet is one key that a variant sets.
type variantSet struct {
	parts []string
	value *node
}

// variants reads the variants of a sweep.
func (b *builder) variants(root *node, o *object, s *Sweep) {
	b.refuses(o, "stands only beside key", "from", "to", "count", "values", "key2", "from2", "to2", "count2", "values2")
	subs := o.subs("variants")
	if n := len(subs); n < 2 || n > MaxVariants {
		b.fault(o.at("variants"), join(o.path, "variants"), `such as [{ name = "before" }, { name = "after", set = { "habitat.spin" = "4 rpm" } }]`, "wants 2 to %d variants, got %d", MaxVariants, n)
		return
	}
	key := SweepKey{Name: "variant", parts: []string{"variant"}, Texts: []string{}}
	for _, v := range subs {
		out := Variant{Name: v.str("name"), File: v.str("file")}
		if v.has("file") && out.File == "" {
			b.fault(v.at("file"), join(v.path, "file"), "", "wants the name of a scenario file, got an empty text")
		}
		if set := v.node.kids["set"]; set != nil && set.kind == isTable {
			out.sets = b.settingsOf(set, nil, join(v.path, "set"))
			if out.File == "" {
				b.tried(root, out.sets, join(v.path, "set"))
			}
		}
		s.Variants = append(s.Variants, out)
		key.Texts = append(key.Texts, out.Name)
	}
	s.Keys = []SweepKey{key}
}

// settingsOf lists the keys that a table sets: names in quotes may hold points,
// as keys in --set do, and tables in tables are the same.
func (b *builder) settingsOf(n *node, above []string, path string) (out []variantSet) {
	for _, name := range n.names {
		kid := n.kids[name]
		at := join(path, printable(name))
		parts, rest, ok := splitSetting(name + "=")
		if !ok || rest != "" {
			b.fault(kid.key, at, `such as "habitat.spin"`, "wants a key as in --set, its parts separated by points")
			continue
		}
		parts = append(slices.Clone(above), parts...)
		switch {
		case slices.Contains(unswept, parts[0]):
			b.fault(kid.key, at, "", "wants a key that changes what is measured; %s changes nothing", printable(strings.Join(parts, ".")))
		case kid.kind == isTable:
			out = append(out, b.settingsOf(kid, parts, at)...)
		default:
			out = append(out, variantSet{parts, kid})
		}
	}
	return out
}

// tried holds that the keys are there to be set.
func (b *builder) tried(root *node, sets []variantSet, path string) {
	root = root.copied()
	for _, s := range sets {
		if fault, ok := put(root, file, s.parts, s.value.copied(), s.value.at); !ok {
			fault.Key = join(path, printable(strings.Join(s.parts, ".")))
			b.errs = append(b.errs, fault)
		}
	}
}

// variantRoot is the tree of a point of a sweep; nil: there is none.
func (sc *Scenario) variantRoot(s *Sweep, point int) (*node, ErrorList) {
	if s.Variants == nil {
		root := sc.root.copied()
		return root, apply(root, s.Settings(point))
	}
	v := &s.Variants[point]
	root, errs := sc.root.copied(), ErrorList(nil)
	if v.File != "" {
		src, err := sc.read(v.File)
		if err != nil {
			return nil, ErrorList{{File: v.File, Msg: fmt.Sprintf("cannot be read: %v", plainly(err))}}
		}
		if root, errs = parse(v.File, src); root == nil {
			return nil, errs
		}
		errs = append(errs, apply(root, sc.sets)...)
	}
	for _, set := range v.sets {
		if fault, ok := put(root, file, set.parts, set.value.copied(), set.value.at); !ok {
			errs = append(errs, fault)
		}
	}
	return root, errs
}

// otherFiles checks the files that variants are in, as scenarios of their own.
// What only a setting makes impossible is left to the point, as in any sweep.
func (sc *Scenario) otherFiles() (errs ErrorList) {
	if sc.part {
		return nil
	}
	for _, s := range sc.Sweeps {
		for i := range s.Variants {
			v := &s.Variants[i]
			if v.File == "" || slices.ContainsFunc(sc.Inputs, func(in Input) bool { return in.Name == v.File }) {
				continue
			}
			b := &builder{}
			o := b.object(s.node, sweep, s.path).subs("variants")[i]
			b.errs = nil // told already
			src, ok := b.contents(o, "file", reading{read: sc.read, allowOutside: sc.open, inputs: &sc.Inputs})
			if errs = append(errs, b.errs...); !ok {
				continue
			}
			errs = append(errs, sc.otherFile(v.File, src)...)
		}
	}
	return errs
}

// otherFile checks one, and takes the files that it names to those of the
// scenario.
func (sc *Scenario) otherFile(name string, src []byte) ErrorList {
	root, errs := parse(name, src)
	if root == nil {
		return errs
	}
	other := &Scenario{Name: name, Inputs: []Input{input(name, src)}, root: root, read: sc.read, open: sc.open, list: sc.list, keep: sc.keep, part: true}
	for _, table := range unswept {
		root.drop(table)
	}
	if err := other.finish(append(errs, apply(root, sc.sets)...)); err != nil {
		list, _ := err.(ErrorList)
		return list
	}
	for _, in := range other.Inputs[1:] {
		if !slices.ContainsFunc(sc.Inputs, func(have Input) bool { return have.Name == in.Name }) {
			sc.Inputs = append(sc.Inputs, in)
		}
	}
	return nil
}

// LongLists names the lists of the scenario that are too long for sweeps.
func (sc *Scenario) LongLists() (out []string) {
	for _, s := range sc.Streams {
		out = append(out, s.File)
	}
	return out
}
