package measure

import (
	"fmt"
	"math"
	"path"
	"slices"
	"strings"

	"offplumb/sim/model"
)

// The verdicts.
const (
	Held   = "held"
	Near   = "near"
	Broken = "broken"
)

// Criterion is a limit matched with what it judges.
type Criterion struct {
	Limit   *model.Limit
	Targets []Target
	Table   string
	Key     string // the column's name without its unit
	unit    unit
}

// Target is one thing that a limit judges.
type Target struct {
	Kind  string // release, path or habitat
	Index int
	Name  string

	Series string // of a release: the let-go series that it belongs to
}

// String names the target as a scenario does.
func (t Target) String() string {
	if t.Name == "" {
		return t.Kind
	}
	if t.Kind == "map" || t.Kind == throwStudy {
		return "study." + t.Name
	}
	return t.Kind + "." + t.Name
}

// Verdict is a limit judged. Value, Min and Max are in Unit; NaN: none.
type Verdict struct {
	Limit, Of, Measure string
	Value, Min, Max    float64
	Unit, Verdict      string
	At                 float64 // s
	Source             string
	Found              string // in words, where the value is no number
	Bad                Badness
	Seen               bool // a value was held against the bounds
	Least, Most        int  // ranks of the verdicts that are possible within the numerical error
	Unsure             bool // it is unsure what a landing judged touches
}

// judged is one table that limits may name.
type judged struct {
	kind string
	nums map[string]unit
	text map[string]bool
	keys []string
}

func judgedTable[T any](kind string, cols []column[T]) judged {
	j := judged{kind: kind, nums: map[string]unit{}, text: map[string]bool{}}
	for i := range cols {
		c := &cols[i]
		if c.text != nil {
			j.text[c.key] = true
		} else if _, taken := j.nums[c.key]; !taken {
			j.nums[c.key] = c.unit
		}
		if !slices.Contains(j.keys, c.key) {
			j.keys = append(j.keys, c.key)
		}
		if c.unit.suffix != "" && c.text == nil {
			j.nums[c.key+c.unit.suffix] = c.unit
		}
	}
	return j
}

// judgedTables are the tables that limits may name.
func judgedTables() map[string]judged {
	return map[string]judged{
		"landings":  judgedTable("release", landingColumns),
		"rests":     judgedTable("release", restColumns),
		"tracks":    judgedTable("release", sampleColumns),
		"impacts":   judgedTable("release", eventColumns),
		"clearance": judgedTable("release", clearanceColumns),
		"crew":      judgedTable("path", crewColumns),
		"habitat":   judgedTable("habitat", habitatColumns),
		"decks":     judgedTable("habitat", deckColumns),
		"spin":      judgedTable("habitat", turningColumns),
	}
}

// Criteria matches the limits of a scenario with what they judge. A limit on
// a name or a column that does not exist is a problem.
func Criteria(m *model.Model) (out []Criterion, problems []model.Problem) {
	tables := judgedTables()
	tables["scatter"] = judgedTable("study", scatterColumns)
	tables["maps"] = judgedMaps(m)
	tables["throws"] = judgedTable(throwStudy, throwColumns)
	for i := range m.Limits {
		c, faults := criterion(m, &m.Limits[i], tables)
		for _, f := range faults {
			f.Key = fmt.Sprintf("limit[%d].%s", i, f.Key)
			problems = append(problems, f)
		}
		out = append(out, c)
	}
	return out, problems
}

func criterion(m *model.Model, l *model.Limit, tables map[string]judged) (Criterion, []model.Problem) {
	c := Criterion{Limit: l}
	var key string
	c.Table, key, _ = strings.Cut(l.Measure, ".")
	t, ok := tables[c.Table]
	if !ok {
		return c, fault("measure", "wants table.column, the table one of landings, rests, tracks, impacts, clearance, crew, decks, habitat, spin, scatter, maps, throws; got %q", l.Measure)
	}
	u, num := t.nums[key]
	if !num && !t.text[key] {
		return c, fault("measure", "table %s has no column %q that a limit can judge; it has %s", c.Table, key, strings.Join(t.keys, ", "))
	}
	c.Key, c.unit = strings.TrimSuffix(key, u.suffix), u
	if c.Key == "" {
		c.Key = key
	}
	problems := c.bounds(num)
	problems = append(problems, c.surfaces(m)...)
	for k, of := range l.Of {
		kind := t.kind
		if c.Table == "clearance" && strings.HasPrefix(of, "path.") {
			kind = "path" // crew paths have clearances too
		}
		found, msg := targets(m, of, kind)
		if listed := k < len(l.Listed) && l.Listed[k] && kind == "release"; msg != "" && !listed {
			problems = append(problems, fault("of", "%s", msg)...)
		}
		c.Targets = append(c.Targets, found...)
	}
	return c, problems
}

// NeedTracks marks the releases whose tracks are needed to judge the limit.
func (c *Criterion) NeedTracks(release []bool) {
	switch c.Table {
	case "tracks", "impacts", "clearance":
		for _, t := range c.Targets {
			if t.Kind == "release" {
				release[t.Index] = true
			}
		}
	}
}

// Judges says whether the limit is about releases of a let-go series.
func (c *Criterion) Judges(series string) bool {
	return slices.ContainsFunc(c.Targets, func(t Target) bool { return t.Series == series })
}

// About says whether the limit judges the thing of a name.
func (c *Criterion) About(name string) bool {
	return slices.ContainsFunc(c.Targets, func(t Target) bool { return t.Name == name })
}

func fault(key, format string, args ...any) []model.Problem {
	return []model.Problem{{Key: key, Msg: fmt.Sprintf(format, args...)}}
}

// bounds checks that a limit has something to hold the column against.
func (c *Criterion) bounds(num bool) (out []model.Problem) {
	l := c.Limit
	numeric := false
	for _, b := range l.Bounds() {
		numeric = true
		if !num {
			out = append(out, fault(b.Key, "column %q is text: a limit on it takes surface_in or surface_not_in", c.Key)...)
		} else if b.Unit != c.unit.si {
			out = append(out, fault(b.Key, "wants a value in %s, as the column %s has, got one in %s", orPlain(c.unit.name), c.Key, orPlain(b.Unit))...)
		}
	}
	if c.Table == "maps" && judgesWords(l) { // what it lands on and falls through is known
		return out
	}
	words := len(l.SurfaceIn)+len(l.SurfaceNotIn)+len(l.FallsThroughNot) > 0
	if words && c.Table == "clearance" && len(l.SurfaceNotIn)+len(l.FallsThroughNot) == 0 {
		words = false // surface_in says which surfaces count
	} else if words && c.Table != "landings" && c.Table != "rests" {
		out = append(out, fault("measure", "surface_in, surface_not_in and falls_through_not judge landings and rests; got %q", c.Limit.Measure)...)
	}
	if !numeric && !words {
		out = append(out, fault("name", "wants something to hold against: min, max, max_abs, surface_in, surface_not_in or falls_through_not")...)
	}
	return out
}

func orPlain(u string) string {
	if u == "" {
		return "a bare number"
	}
	return u
}

// surfaces checks the names of surfaces and openings.
func (c *Criterion) surfaces(m *model.Model) (out []model.Problem) {
	known := map[string]bool{}
	var names []string
	for _, s := range m.Interior.Surfaces() {
		known[s.Name] = true
		names = append(names, s.Name)
	}
	check := func(key string, list []string) {
		for _, s := range list {
			if !known[s] {
				out = append(out, fault(key, "no surface named %q; there are %s", s, strings.Join(names, ", "))...)
			}
		}
	}
	check("surface_in", c.Limit.SurfaceIn)
	check("surface_not_in", c.Limit.SurfaceNotIn)
	for _, s := range c.Limit.FallsThroughNot {
		if !hasOpening(m, s) {
			out = append(out, fault("falls_through_not", "no opening named %q", s)...)
		}
	}
	return out
}

func hasOpening(m *model.Model, name string) bool {
	for i := range m.Decks {
		for j := range m.Decks[i].Openings {
			if m.Decks[i].Openings[j].Name == name {
				return true
			}
		}
	}
	return false
}

// targets finds what a name or pattern of a limit stands for.
func targets(m *model.Model, of, kind string) ([]Target, string) {
	if of == "habitat" {
		if kind != "habitat" {
			return nil, "habitat has the tables decks and habitat"
		}
		return []Target{{Kind: "habitat"}}, ""
	}
	prefix, name, _ := strings.Cut(of, ".")
	if prefix == "study" && (kind == "map" || kind == throwStudy) {
		prefix = kind
	}
	if prefix != "release" && prefix != kind && prefix != "path" && (prefix != "study" || kind != "study") {
		return nil, fmt.Sprintf("wants release.NAME, path.NAME or habitat, got %q", of)
	}
	if prefix != kind {
		return nil, fmt.Sprintf("the measure's table belongs to %s, got %q", strings.Replace(kind, "map", "a landing map, study.NAME", 1), of)
	}
	var out []Target
	for i, n := range names(m, kind) {
		if Matches(name, n) {
			t := Target{Kind: kind, Index: i, Name: n}
			if kind == "release" {
				t.Series = m.Releases[i].Series
			}
			out = append(out, t)
		}
	}
	if len(out) == 0 {
		return nil, fmt.Sprintf("no %s named %q", strings.Replace(kind, "map", "landing map", 1), name)
	}
	return out, ""
}

// Matches says whether a pattern, in which * stands for anything, fits a name.
func Matches(pattern, name string) bool {
	if name == pattern || pattern == "*" {
		return true
	}
	if !strings.Contains(pattern, "*") {
		return false
	}
	ok, err := path.Match(escape(pattern), escapeName(name))
	return ok && err == nil
}

// escape leaves * as the only character of a pattern with a meaning, and
// keeps / from ending a match.
func escape(pattern string) string {
	r := strings.NewReplacer(`\`, `\\`, `?`, `\?`, `[`, `\[`, `]`, `\]`, `/`, "\x00")
	return r.Replace(pattern)
}

func escapeName(name string) string { return strings.ReplaceAll(name, "/", "\x00") }

func names(m *model.Model, kind string) []string {
	var out []string
	switch kind {
	case "path":
		for i := range m.Paths {
			out = append(out, m.Paths[i].Name)
		}
		return out
	case "map":
		for i := range m.Maps {
			out = append(out, m.Maps[i].Name)
		}
		return out
	case throwStudy:
		for i := range m.Throws {
			out = append(out, m.Throws[i].Name)
		}
		return out
	case "study":
		for i := range m.Scatters {
			out = append(out, m.Scatters[i].Name)
		}
		return out
	}
	for i := range m.Releases {
		out = append(out, m.Releases[i].Name)
	}
	return out
}

// si is the value of a bound, NaN for one that a limit does not have.
func si(q *model.Quantity) float64 {
	if q == nil {
		return math.NaN()
	}
	return q.SI
}
