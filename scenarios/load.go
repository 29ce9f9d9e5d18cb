package scenarios

import (
	"bytes"
	"cmp"
	"crypto/sha256"
	"encoding/hex"
	"fmt"
	"io"
	"path"
	"slices"
	"strconv"
	"strings"

	"offplumb/sim/model"
	"offplumb/sim/study"
)

// Options say how a scenario is loaded.
type Options struct {
	Sets         []string                          // settings KEY=VALUE, in order
	ReadFile     func(path string) ([]byte, error) // reads what the scenario names; nil: nothing
	AllowOutside bool                              // permit files outside the scenario's folder

	// OpenFile opens a release list, again and again, so that a long one need
	// not be in memory; nil: ReadFile is used. KeepRows is up to how many lines
	// a list is kept; 0: DefaultKeepRows.
	OpenFile func(path string) (io.ReadCloser, error)
	KeepRows int
}

// Input is a file that a scenario was made of.
type Input struct {
	Name   string
	SHA256 string // in hex
}

// Study is a declared study.
type Study struct {
	Kind string // scatter, sweep, throw_to or landing_map
	Name string
}

// Scenario is a scenario file read and checked.
type Scenario struct {
	Name    string // of the file
	Title   string
	Notes   string
	Model   *model.Model
	Studies []Study // declared, in the order of the format and the file
	Sweeps  []*Sweep
	Figures []*Figure // asked for
	Asked   bool      // only those are drawn
	Inputs  []Input   // the file itself first
	Streams []*Stream

	Question string // what is to be answered
	Text     string // the file as it was read; empty in a variant

	root *node
	read func(path string) ([]byte, error) // once each
	open bool                              // files outside the scenario's folder are permitted
	list func(string) (io.ReadCloser, error)
	keep int
	sets []string // of the command line
	part bool     // a variant of a scenario: lists that are streamed are left out
	keys []string
	rows []row
}

func input(name string, src []byte) Input {
	sum := sha256.Sum256(src)
	return Input{Name: name, SHA256: hex.EncodeToString(sum[:])}
}

// Load reads a scenario. The error is an [ErrorList] of all its faults.
func Load(name string, src []byte, opt Options) (*Scenario, error) {
	root, errs := parse(name, src)
	if root == nil {
		return nil, errs
	}
	sc := &Scenario{Name: name, Text: string(src), Inputs: []Input{input(name, src)}, root: root, read: readOrNot(opt.ReadFile), open: opt.AllowOutside}
	if root.kids["sweep"] != nil {
		sc.read = remembered(sc.read)
	}
	sc.sets = opt.Sets
	sc.list, sc.keep = opt.OpenFile, cmp.Or(opt.KeepRows, DefaultKeepRows)
	if sc.list == nil {
		sc.list = func(name string) (io.ReadCloser, error) {
			src, err := sc.read(name)
			return io.NopCloser(bytes.NewReader(src)), err
		}
	}
	if err := sc.finish(append(errs, apply(root, opt.Sets)...)); err != nil {
		return nil, err
	}
	return sc, nil
}

// finish makes the scenario of its tree, which had faults before. The error is
// an [ErrorList].
func (sc *Scenario) finish(errs ErrorList) error {
	b := &builder{}
	o := b.object(sc.root, file, "")
	sc.Question = o.str("question")
	sc.Title, sc.Notes, sc.Studies, sc.Sweeps = o.str("title"), o.str("notes"), studies(o), b.sweeps(o)
	sc.Figures, sc.Asked = drawn(o), o.sub("output").str("figures") == "asked"
	if sc.Title == "" {
		sc.Title = strings.TrimSuffix(path.Base(sc.Name), ".toml")
	}
	b.build(o, reading{read: sc.read, allowOutside: sc.open, inputs: &sc.Inputs, open: sc.list, keep: sc.keep, brief: sc.part})
	b.in.Title = sc.Title
	if errs = append(errs, b.errs...); len(errs) > 0 {
		return append(errs, sc.scan(b, nil)...).sorted()
	}
	sc.keys, sc.rows = b.keys, b.rows
	m, problems := model.New(b.in)
	if len(problems) > 0 {
		return append(sc.placed(problems), sc.scan(b, nil)...).sorted()
	}
	if errs = sc.scan(b, m); len(errs) > 0 {
		return errs.sorted()
	}
	if m, problems = sc.expand(m, b.in); len(problems) > 0 {
		return sc.Problems(problems)
	}
	sc.Model = m
	if errs = append(append(sc.pick(), sc.draw()...), sc.otherFiles()...); len(errs) > 0 {
		return errs.sorted()
	}
	return nil
}

// expand puts the releases of let-go series in the place of those that declare
// them.
func (sc *Scenario) expand(m *model.Model, in model.Model) (*model.Model, []model.Problem) {
	releases, from, problems := study.Expand(m, in.Releases)
	if len(problems) > 0 || !slices.ContainsFunc(releases, func(r model.Release) bool { return r.Series != "" }) {
		return m, problems
	}
	keys, rows := make([]string, len(from)), make([]row, len(from))
	for i, k := range from {
		keys[i], rows[i] = sc.keys[k], sc.rows[k]
	}
	sc.keys, sc.rows = keys, rows
	for _, s := range sc.Streams {
		s.After += len(releases) - len(in.Releases) // all of them are before any list
	}
	in.Releases, in.Limits = releases, m.Limits
	return model.New(in)
}

func readOrNot(read func(string) ([]byte, error)) func(string) ([]byte, error) {
	if read != nil {
		return read
	}
	return func(string) ([]byte, error) { return nil, fmt.Errorf("no other files can be read here") }
}

func studies(o *object) (out []Study) {
	for _, kind := range []string{"scatter", "sweep", "throw_to", "landing_map"} {
		for _, s := range o.subs(kind) {
			out = append(out, Study{Kind: kind, Name: s.str("name")})
		}
	}
	return out
}

// Problems gives the faults that later stages found their places in the file.
func (sc *Scenario) Problems(problems []model.Problem) error {
	return sc.placed(problems).sorted()
}

func (sc *Scenario) placed(problems []model.Problem) (errs ErrorList) {
	for _, p := range problems {
		at, key := sc.find(p.Key)
		errs = append(errs, at.fault(key, p.Hint, "%s", p.Msg))
	}
	return errs
}

// find gives the place of a key such as release[2].at.height: that of its
// value, or of what is nearest above it.
func (sc *Scenario) find(key string) (place, string) {
	if rest, ok := strings.CutPrefix(key, "release["); ok {
		num, tail, _ := strings.Cut(rest, "]")
		if i, err := strconv.Atoi(num); err == nil && i < len(sc.keys) {
			if sc.keys[i] == "" {
				return sc.rows[i].find(strings.TrimPrefix(tail, "."))
			}
			key = sc.keys[i] + tail
		}
	}
	n, depth := sc.root, 0
	parts := keyParts(key)
	for i := 0; i < len(parts); i++ {
		p := parts[i]
		kid := n.kids[p.name]
		if kid == nil && i+1 < len(parts) {
			i++
			kid = n.kids[p.name+"."+parts[i].name] // a key that holds a point
		}
		if kid == nil {
			break
		}
		if p.index >= 0 {
			if p.index >= len(kid.items) {
				break
			}
			kid = kid.items[p.index]
		}
		n, depth = kid, depth+1
	}
	if depth == 0 {
		return place{sc.root.at.file, 1, 1}, key
	}
	if n.kind == isTable && n.header {
		return n.key, key
	}
	return n.at, key
}

// keyPart is a part of a key, with its index in brackets or -1.
type keyPart struct {
	name  string
	index int
}

func keyParts(key string) (out []keyPart) {
	for _, s := range strings.Split(key, ".") {
		name, rest, ok := strings.Cut(s, "[")
		i := -1
		if ok {
			i, _ = strconv.Atoi(strings.TrimSuffix(rest, "]"))
		}
		out = append(out, keyPart{name, i})
	}
	return out
}

// rowKeys maps the end of a release's key to the column that gives it.
var rowKeys = map[string]string{"at.height": "height_m", "at.axial": "axial_m", "at.spinward": "spinward_m", "at.deck": "deck", "body": "body"}

// find gives the place in a list of a key of its release.
func (r *row) find(key string) (place, string) {
	column := rowKeys[key]
	if i := listColumn(column); i < 0 || r.cells[i].line == 0 {
		return r.at(""), ""
	}
	return r.at(column), column
}
