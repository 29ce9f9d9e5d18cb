package scenarios

import (
	"errors"
	"fmt"
	"maps"
	"slices"

	"offplumb/sim/measure"
	"offplumb/sim/model"
	"offplumb/sim/study"
)

// remembered reads each file once: variants of a scenario are made of the
// bytes that the scenario itself was made of.
func remembered(read func(string) ([]byte, error)) func(string) ([]byte, error) {
	seen := map[string][]byte{}
	return func(name string) ([]byte, error) {
		if src, ok := seen[name]; ok {
			return src, nil
		}
		src, err := read(name)
		if err == nil {
			seen[name] = src
		}
		return src, err
	}
}

// mostPicks bounds the columns of a sweep: a table of more is of no use.
const mostPicks = 1000

// pick finds what the measures of the sweeps are of: what the key of says, else
// what the swept keys name, else all.
func (sc *Scenario) pick() (errs ErrorList) {
	for _, s := range sc.Sweeps {
		of := s.node.kids["of"]
		named := s.named()
		if of != nil {
			named = textsOf(of)
			if err := measure.CheckOf(sc.Model, named); err != nil {
				errs = append(errs, of.at.fault(join(s.path, "of"), "", "%v", err))
				continue
			}
		}
		list := s.node.kids["measures"]
		seen := map[string]bool{}
		for i, name := range textsOf(list) {
			picks, err := measure.Picks(sc.Model, name, named, of != nil)
			if err == nil && seen[picks[0].Column(false).Name] {
				err = fmt.Errorf("the measure %q is given twice", printable(name))
			}
			if err != nil {
				at := list
				if list.kind == isArray {
					at = list.items[i]
				}
				errs = append(errs, at.at.fault(join(s.path, "measures"), "", "%v", err))
				continue
			}
			seen[picks[0].Column(false).Name] = true
			s.Picks = append(s.Picks, picks...)
		}
		if len(s.Picks) > mostPicks {
			errs = append(errs, list.at.fault(join(s.path, "measures"), `name some with of = ["release.NAME"]`, "gives %d columns, wants at most %d", len(s.Picks), mostPicks))
		}
		s.releases = declared(s.Picks, sc.Model)
	}
	return errs
}

// textsOf are the texts of a text or a list of texts.
func textsOf(n *node) []string {
	if n.kind != isArray {
		return []string{n.text}
	}
	out := make([]string, len(n.items))
	for i, item := range n.items {
		out[i] = item.text
	}
	return out
}

// named is what the keys name of releases and crew paths.
func (s *Sweep) named() (out []string) {
	for i := range s.Keys {
		switch p := s.Keys[i].parts; p[0] {
		case "release":
			out = append(out, "release."+p[1])
		case "crew_path":
			out = append(out, "path."+p[1])
		}
	}
	return out
}

// Variant loads the scenario once more with a point of a sweep as settings
// behind its own. What the measures of the sweep do not depend on, such as
// other releases, is left out, so that nothing impossible in it matters. The
// error says in a line why the point is impossible. It may be called from
// several goroutines.
func (sc *Scenario) Variant(s *Sweep, point int) (*study.Prepared, error) {
	root, errs := sc.variantRoot(s, point)
	if root == nil {
		return nil, inLine(errs)
	}
	root.prune(s)
	v := &Scenario{Name: sc.Name, root: root, read: sc.read, open: sc.open, list: sc.list, keep: sc.keep, part: true}
	if err := v.finish(errs); err != nil {
		return nil, inLine(err)
	}
	p, problems := study.Prepare(v.Model)
	if len(problems) > 0 {
		return nil, inLine(v.Problems(problems))
	}
	return p, nil
}

// inLine gives the first fault of a scenario without its place.
func inLine(err error) error {
	var list ErrorList
	if !errors.As(err, &list) || len(list) == 0 {
		return err
	}
	if list[0].Key == "" {
		return errors.New(list[0].Msg)
	}
	return fmt.Errorf("%s: %s", list[0].Key, list[0].Msg)
}

// prune drops what no measure of a sweep depends on.
func (n *node) prune(s *Sweep) {
	for _, table := range unswept {
		n.drop(table)
	}
	if s.Variants != nil { // all landings are held against one another
		return
	}
	releases := maps.Clone(s.releases)
	n.keep("release", func(item *node) bool { return releases[item.name()] })
	paths := map[string]bool{}
	for i := range s.Picks {
		if s.Picks[i].Kind == "path" {
			paths[s.Picks[i].Of] = true
		}
	}
	if list := n.kids["release"]; list != nil {
		for _, r := range list.items {
			delete(releases, r.name())
			if path := r.get([]string{"carried", "path"}); path != nil {
				paths[path.text] = true
			}
		}
	}
	n.keep("crew_path", func(item *node) bool { return paths[item.name()] })
	if len(releases) == 0 { // none is of a list
		n.drop("release_list")
	}
}

// declared gives the names, as the file declares them, of the releases that
// picks are of.
func declared(picks []measure.Pick, m *model.Model) map[string]bool {
	out := map[string]bool{}
	for i := range m.Releases {
		r := &m.Releases[i]
		for k := range picks {
			if needed, _ := picks[k].NeedRelease(r); !needed {
				continue
			}
			if r.Series != "" {
				out[r.Series] = true
			} else {
				out[r.Name] = true
			}
		}
	}
	return out
}

// keep drops the entries of a list that are not wanted.
func (n *node) keep(list string, want func(*node) bool) {
	l := n.kids[list]
	if l == nil {
		return
	}
	l.items = slices.DeleteFunc(l.items, func(item *node) bool { return !want(item) })
	if len(l.items) == 0 {
		n.drop(list)
	}
}

// name is that of an entry of a list.
func (n *node) name() string {
	if name := n.kids["name"]; name != nil {
		return name.text
	}
	return ""
}
