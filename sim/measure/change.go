package measure

import (
	"math"
	"strings"

	"offplumb/sim/table"
)

// Change is what became of a release from one variant of a scenario to another.
type Change struct {
	Variant, Release string
	Before, After    *Landing // nil: the variant has no such release
}

// Changes holds the landings of a variant against those before, by the names of
// the releases: in the order before, then those that are new.
func Changes(variant string, before, after []Landing) []Change {
	index := make(map[string]int, len(after))
	for i := range after {
		index[after[i].Release] = i
	}
	out := make([]Change, 0, len(before))
	known := make(map[string]bool, len(before))
	for i := range before {
		c := Change{Variant: variant, Release: before[i].Release, Before: &before[i]}
		if k, ok := index[c.Release]; ok {
			c.After = &after[k]
		}
		known[c.Release] = true
		out = append(out, c)
	}
	for i := range after {
		if !known[after[i].Release] {
			out = append(out, Change{Variant: variant, Release: after[i].Release, After: &after[i]})
		}
	}
	return out
}

// Kind says in a word what changed: gone, new, surface, outcome, openings, or
// numbers; "" where nothing did.
func (c *Change) Kind() string {
	b, a := c.Before, c.After
	switch {
	case a == nil:
		return "gone"
	case b == nil:
		return "new"
	case a.Outcome != b.Outcome:
		return "outcome"
	case a.Surface != b.Surface:
		return "surface"
	case a.through() != b.through():
		return "openings"
	case !same(a.Offset, b.Offset) || !same(a.OffsetAxial, b.OffsetAxial) || !same(a.Speed, b.Speed) || !same(a.Energy, b.Energy):
		return "numbers"
	}
	return ""
}

func same(a, b float64) bool { return a == b || math.IsNaN(a) && math.IsNaN(b) }

// Moved is by how much the deck offset changed, m; NaN where there is none.
func (c *Change) Moved() float64 {
	return side(c.After, func(l *Landing) float64 { return l.Offset }) - side(c.Before, func(l *Landing) float64 { return l.Offset })
}

func side(l *Landing, num func(*Landing) float64) float64 {
	if l == nil {
		return math.NaN()
	}
	return num(l)
}

// changeColumns are those of sweeps/NAME-changes.csv.
var changeColumns = changesOf()

func changesOf() []column[Change] {
	out := []column[Change]{
		{key: "release", meaning: "name of the release", text: func(c *Change) string { return c.Release }},
		{key: "variant", meaning: "variant that is held against the first", text: func(c *Change) string { return c.Variant }},
		{key: "changed", meaning: "gone or new: one of the two has no such release; outcome, surface or openings: it ends otherwise, lands on something else, or falls through other openings; numbers: only numbers differ; empty: nothing does",
			text: (*Change).Kind},
	}
	words := func(key, meaning string, text func(*Landing) string) {
		of := func(get func(*Change) *Landing) func(*Change) string {
			return func(c *Change) string {
				if l := get(c); l != nil {
					return text(l)
				}
				return ""
			}
		}
		out = append(out, column[Change]{key: key + "_before", meaning: meaning + ", in the first variant", text: of(func(c *Change) *Landing { return c.Before })},
			column[Change]{key: key + "_after", meaning: meaning + ", in this variant", text: of(func(c *Change) *Landing { return c.After })})
	}
	nums := func(key string, u unit, meaning string, num func(*Landing) float64) {
		before := func(c *Change) float64 { return side(c.Before, num) }
		after := func(c *Change) float64 { return side(c.After, num) }
		out = append(out, column[Change]{key: key + "_before", unit: u, meaning: meaning + ", in the first variant", num: before},
			column[Change]{key: key + "_after", unit: u, meaning: meaning + ", in this variant", num: after},
			column[Change]{key: key + "_change", unit: u, meaning: meaning + ": this variant less the first", num: func(c *Change) float64 { return after(c) - before(c) }})
	}
	words("surface", "surface first touched", func(l *Landing) string { return l.Surface })
	nums("offset", metre, "deck offset", func(l *Landing) float64 { return l.Offset })
	nums("offset_axial", metre, "axial distance from release to landing", func(l *Landing) float64 { return l.OffsetAxial })
	nums("speed", speedUnit, "speed of the centre relative to the surface", func(l *Landing) float64 { return l.Speed })
	nums("energy", joule, "impact energy", func(l *Landing) float64 { return l.Energy })
	words("outcome", "how it ended", func(l *Landing) string { return l.Outcome.String() })
	words("falls_through", "openings fallen through", func(l *Landing) string { return strings.Join(l.AllThrough, "; ") })
	return out
}

// ChangeTable is sweeps/NAME-changes.csv.
func ChangeTable(rows []Change) *table.Table { return fill(changeColumns, rows) }
