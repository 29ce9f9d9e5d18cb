package scenarios

import (
	"fmt"
	"strings"

	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// Figure is a figure that a scenario asks for: a kind of drawing, of releases,
// crew paths, studies or the habitat.
type Figure struct {
	Name, Kind string
	Releases   []int    // index in the model, in the order named; those of a let-go series among them
	Paths      []int    // index in the model
	Studies    []string // names of scatters, sweeps, throw studies, landing maps or let-go series

	node *node
	path string
}

// figureKind says what a kind of figure can be of.
type figureKind struct {
	name string
	of   []string // release, series, path, scatter, sweep, throw, throw table, landing map, habitat
	most int      // things of one figure; 0: any number
	each bool     // a figure for each thing, in place of one of all
}

// MostTogether bounds the tracks and crew paths of one figure: as many as the
// palette can tell apart.
const MostTogether = 6

// figureKinds are the kinds of figures.
var figureKinds = []figureKind{
	{name: "side", of: []string{"release", "series"}, most: MostTogether},
	{name: "inertial", of: []string{"release"}, each: true},
	{name: "stack", of: []string{"release"}, each: true},
	{name: "deflection", of: []string{"release"}, most: MostTogether},
	{name: "plan", of: []string{"release", "path"}},
	{name: "loads", of: []string{"path"}, most: MostTogether},
	{name: "path", of: []string{"path"}, each: true},
	{name: "scatter", of: []string{"scatter"}, each: true},
	{name: "sweep", of: []string{"sweep"}, each: true},
	{name: "let_go", of: []string{"series"}, each: true},
	{name: "throws", of: []string{"throw", "throw table"}, each: true},
	{name: "throw_table", of: []string{"throw table"}, each: true},
	{name: "landing_map", of: []string{"landing map"}, each: true},
	{name: "spin", of: []string{"habitat"}},
}

func figureKindNamed(name string) *figureKind {
	for i := range figureKinds {
		if figureKinds[i].name == name {
			return &figureKinds[i]
		}
	}
	return nil
}

func figureKindNames() []string {
	out := make([]string, len(figureKinds))
	for i := range figureKinds {
		out[i] = figureKinds[i].name
	}
	return out
}

// plainThings are the things that figures are of, in words for people.
var plainThings = map[string]string{"release": "releases", "series": "let-go series", "path": "crew paths", "scatter": "scatters", "sweep": "sweeps",
	"throw": "throws to a target", "throw table": "throw tables", "landing map": "landing maps", "habitat": "the habitat"}

// wants says what a kind of figure is of.
func (k *figureKind) wants() string {
	words := make([]string, len(k.of))
	for i, kind := range k.of {
		words[i] = plainThings[kind]
	}
	return strings.Join(words, " or ")
}

func (k *figureKind) takes(kind string) bool {
	for _, of := range k.of {
		if of == kind {
			return true
		}
	}
	return false
}

// thing is what a name of a figure stands for.
type thing struct {
	kind, name string
	index      int
}

// drawn reads the figures that are asked for; draw finds what they are of.
func drawn(o *object) (out []*Figure) {
	for _, f := range o.subs("figure") {
		out = append(out, &Figure{Name: f.str("name"), Kind: f.str("kind"), node: f.node, path: f.path})
	}
	return out
}

// draw finds what the figures are of.
func (sc *Scenario) draw() (errs ErrorList) {
	for _, f := range sc.Figures {
		kind, of := figureKindNamed(f.Kind), f.node.kids["of"]
		if kind == nil || of == nil {
			continue // told before
		}
		at := []*node{of}
		if of.kind == isArray {
			at = of.items
		}
		fault := func(n *node, hint, format string, args ...any) {
			errs = append(errs, n.at.fault(f.path+".of", hint, format, args...))
		}
		seen, count := map[thing]bool{}, 0
		for _, n := range at {
			things, hint, msg := sc.things(n.text, kind)
			if msg != "" {
				fault(n, hint, "%s", msg)
				continue
			}
			for _, t := range things {
				if !seen[t] {
					seen[t] = true
					count += f.take(t, sc.Model)
				}
			}
		}
		if kind.most > 0 && count > kind.most {
			fault(of, "make several figures", "a figure of kind %s shows at most %d of them, got %d", kind.name, kind.most, count)
		}
	}
	return errs
}

// take adds a thing to a figure, and gives how many of the places in it that takes.
func (f *Figure) take(t thing, m *model.Model) int {
	switch t.kind {
	case "release":
		f.Releases = append(f.Releases, t.index)
	case "path":
		f.Paths = append(f.Paths, t.index)
	case "habitat":
	default:
		f.Studies = append(f.Studies, t.name)
		if t.kind == "series" {
			return 0 // as many of it are drawn as there is room for
		}
	}
	return 1
}

// things finds what a name or pattern stands for, of the kinds that a figure takes.
func (sc *Scenario) things(of string, kind *figureKind) (out []thing, hint, msg string) {
	prefix, name, ok := strings.Cut(of, ".")
	if of == "habitat" {
		prefix, name, ok = of, "", true
		if kind.takes(of) && !sc.Model.Unsteady() {
			return nil, "", "the spin does not change and the axis does not cone: there is nothing to draw"
		}
	}
	if !ok || of != "habitat" && prefix != "release" && prefix != "path" && prefix != "study" {
		return nil, "", fmt.Sprintf("wants release.NAME, path.NAME, study.NAME or habitat, got %q", shorten(of))
	}
	all := sc.drawable(prefix)
	var names []string
	other := ""
	for _, t := range all {
		names = append(names, t.name)
		if !measure.Matches(name, t.name) {
			continue
		}
		if !kind.takes(t.kind) {
			other = t.kind
			continue
		}
		out = append(out, t)
	}
	switch {
	case len(out) > 0:
		return out, "", ""
	case other != "":
		return nil, "", fmt.Sprintf("a figure of kind %s shows %s; %q stands for %s", kind.name, kind.wants(), shorten(of), plainThings[other])
	}
	if like := nearest(name, names); like != "" {
		hint = "did you mean " + printable(prefix+"."+like) + "?"
	}
	return nil, hint, fmt.Sprintf("no %s named %q", strings.Replace(prefix, "path", "crew path", 1), shorten(name))
}

// drawable lists what figures may be of, by the first part of its name.
func (sc *Scenario) drawable(prefix string) (out []thing) {
	m := sc.Model
	switch prefix {
	case "habitat":
		out = append(out, thing{kind: "habitat"})
	case "release":
		for i := range m.Releases {
			if r := &m.Releases[i]; !r.NoTrack && r.Series == "" {
				out = append(out, thing{"release", r.Name, i})
			}
		}
		for _, name := range measure.SeriesNames(m) {
			out = append(out, thing{"series", name, 0})
		}
	case "path":
		for i := range m.Paths {
			out = append(out, thing{"path", m.Paths[i].Name, i})
		}
	default:
		for i := range m.Scatters {
			out = append(out, thing{"scatter", m.Scatters[i].Name, i})
		}
		for i, s := range sc.Sweeps {
			out = append(out, thing{"sweep", s.Name, i})
		}
		for i := range m.Throws {
			kind := "throw"
			if m.Throws[i].Table() {
				kind = "throw table"
			}
			out = append(out, thing{kind, m.Throws[i].Name, i})
		}
		for i := range m.Maps {
			out = append(out, thing{"landing map", m.Maps[i].Name, i})
		}
	}
	return out
}
