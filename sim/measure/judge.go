package measure

import (
	"fmt"
	"math"
	"slices"
	"strings"
)

// Evidence is what limits are judged by. A release or path that did not run
// has none: Release and Path give false, and limits on it are skipped.
type Evidence struct {
	Landing   func(release int) (*Landing, bool)
	Rest      func(release int) (*Rest, bool)
	Track     func(release int) ([]Sample, bool)
	Events    func(release int) ([]Event, bool)
	Clearance func(release int) ([]Clearance, bool)
	Loads     func(path int) ([]Load, bool)
	Scatter   func(scatter int) (*Scattered, bool)
	Map       func(landingMap int) (*LandMap, bool)
	Throws    func(study int) ([]Throw, bool)
	Decks     []DeckFigure

	PathClearance func(path int) ([]Clearance, bool)
	Habitat       func(stature, speed float64) HabitatFigure
	Turning       func() []Turning // how the habitat turns while anything moves
}

// Judge gives the verdict on a limit: that on its worst target, at its worst
// instant. It is false where nothing that the limit judges has run.
func (c *Criterion) Judge(e Evidence) (Verdict, bool) {
	var worst Verdict
	found := false
	for _, t := range c.Targets {
		v, ok := c.one(t, e)
		if ok && !found {
			worst, found = v, true
		} else if ok {
			worst.Join(&v)
		}
	}
	return worst, found
}

func (c *Criterion) one(t Target, e Evidence) (Verdict, bool) {
	v, ok := c.certain(t, e)
	v.Least, v.Most = v.Bad.Rank, v.Bad.Rank
	if l, landed := c.landing(t, e); landed {
		c.doubt(&v, l)
	}
	return v, ok
}

// certain gives the verdict as if there were no numerical error.
func (c *Criterion) certain(t Target, e Evidence) (Verdict, bool) {
	switch c.Table {
	case "landings":
		l, ok := e.Landing(t.Index)
		if !ok {
			return Verdict{}, false
		}
		return judgeEnd(c, t, landingColumns, l, l.Time, c.words(l.Surface, l.AllThrough)), true
	case "rests":
		r, ok := e.Rest(t.Index)
		if !ok {
			return Verdict{}, false
		}
		through, ok := c.passed(t, e)
		return judgeEnd(c, t, restColumns, r, r.Time, c.words(r.Surface, through)), ok
	case "impacts":
		rows, ok := e.Events(t.Index)
		return c.impacts(t, rows), ok
	case "clearance":
		get := e.Clearance
		if t.Kind == "path" {
			get = e.PathClearance
		}
		rows, ok := get(t.Index)
		return series(c, t, clearanceColumns, c.among(rows), func(k *Clearance) float64 { return k.Time }), ok
	case "tracks":
		rows, ok := e.Track(t.Index)
		return series(c, t, sampleColumns, rows, func(s *Sample) float64 { return s.Time }), ok
	case "scatter":
		s, ok := e.Scatter(t.Index)
		if !ok {
			return Verdict{}, false
		}
		return series(c, t, scatterColumns, []Scattered{*s}, func(*Scattered) float64 { return math.NaN() }), true
	case "maps":
		l, ok := e.Map(t.Index)
		if !ok {
			return Verdict{}, false
		}
		return c.landMap(t, l), true
	case "throws":
		rows, ok := e.Throws(t.Index)
		return series(c, t, throwColumns, rows, func(t *Throw) float64 { return t.Time }), ok
	case "crew":
		rows, ok := e.Loads(t.Index)
		return series(c, t, crewColumns, rows, func(l *Load) float64 { return l.Time }), ok
	}
	if c.Table == "spin" {
		return series(c, t, turningColumns, e.Turning(), func(t *Turning) float64 { return t.Time }), true
	}
	if c.Table == "habitat" {
		row := []HabitatFigure{e.Habitat(c.Limit.Stature, c.Limit.Speed)}
		return series(c, t, habitatColumns, row, func(*HabitatFigure) float64 { return math.NaN() }), true
	}
	return series(c, t, deckColumns, e.Decks, func(*DeckFigure) float64 { return math.NaN() }), true
}

// blank is the verdict without its finding.
func (c *Criterion) blank(t Target) Verdict {
	l := c.Limit
	v := Verdict{Limit: l.Name, Of: t.String(), Measure: l.Measure, Unit: c.unit.name, Source: l.Source,
		Value: math.NaN(), At: math.NaN(), Verdict: Held, Bad: Badness{Over: math.Inf(-1)}}
	v.Min, v.Max = c.unit.of(si(l.Min)), c.unit.of(si(l.Max))
	if l.MaxAbs != nil {
		bound := c.unit.of(l.MaxAbs.SI)
		v.Min, v.Max = math.Max(-bound, orInf(v.Min, -1)), math.Min(bound, orInf(v.Max, 1))
	}
	return v
}

func orInf(x float64, sign int) float64 {
	if math.IsNaN(x) {
		return math.Inf(sign)
	}
	return x
}

// judgeEnd judges a landing or a rest, by its number or by what it is on;
// words say how it breaks a limit on surfaces or openings.
func judgeEnd[T any](c *Criterion, t Target, cols []column[T], row *T, at float64, words string) Verdict {
	var v Verdict
	if len(c.Limit.Bounds()) > 0 {
		v = series(c, t, cols, []T{*row}, func(*T) float64 { return at })
	} else {
		v = c.blank(t)
		v.At, v.Found = at, "as wanted"
	}
	if words != "" {
		v.Verdict, v.Bad, v.Found = Broken, Badness{Rank: 2, Over: math.Inf(1)}, words
	}
	return v
}

// impacts judges the impacts of a release. One without any holds whatever
// bounds an impact.
func (c *Criterion) impacts(t Target, rows []Event) Verdict {
	hits := slices.DeleteFunc(slices.Clone(rows), func(e Event) bool { return e.Kind != Impact })
	if len(hits) == 0 {
		v := c.blank(t)
		v.Found = "no impact"
		return v
	}
	return series(c, t, eventColumns, hits, func(e *Event) float64 { return e.Time })
}

// among keeps the rows of the surfaces that the limit names, if it names any.
func (c *Criterion) among(rows []Clearance) []Clearance {
	if len(c.Limit.SurfaceIn) == 0 {
		return rows
	}
	var out []Clearance
	for i := range rows {
		if slices.Contains(c.Limit.SurfaceIn, rows[i].Surface) {
			out = append(out, rows[i])
		}
	}
	return out
}

// passed lists the openings that a release fell through, for a limit on rests
// that names any: the landing knows them.
func (c *Criterion) passed(t Target, e Evidence) ([]string, bool) {
	if len(c.Limit.FallsThroughNot) == 0 {
		return nil, true
	}
	l, ok := e.Landing(t.Index)
	if !ok {
		return nil, false
	}
	return l.AllThrough, true
}

// words says how a landing or a rest breaks a limit on surfaces or openings.
func (c *Criterion) words(surface string, through []string) string {
	in, out := c.Limit.SurfaceIn, c.Limit.SurfaceNotIn
	switch {
	case len(in) > 0 && !slices.Contains(in, surface):
		return touched(surface) + ", not " + strings.Join(in, " or ")
	case slices.Contains(out, surface):
		return touched(surface)
	}
	for _, o := range c.Limit.FallsThroughNot {
		if slices.Contains(through, o) {
			return "fell through " + o
		}
	}
	return ""
}

func touched(surface string) string {
	if surface == "" {
		return "touched nothing"
	}
	return "touched " + surface
}

// series judges a column at its worst row. A row without a value breaks the
// limit: what has no value cannot be held. Of a column that speaks of some rows
// only, the others are left out, but one at least must have a value.
func series[T any](c *Criterion, t Target, cols []column[T], rows []T, time func(*T) float64) Verdict {
	v := c.blank(t)
	col := numberColumn(cols, c.Key, c.unit)
	for i := range rows {
		if x := col.num(&rows[i]); !col.partly || !math.IsNaN(x) {
			c.judge(&v, c.unit.of(x), time(&rows[i]))
		}
	}
	if !v.Seen {
		v.Verdict, v.Found, v.Bad = Broken, "no value", Badness{Rank: 2, Over: math.Inf(1)}
	}
	return v
}

func numberColumn[T any](cols []column[T], key string, u unit) *column[T] {
	for i := range cols {
		if cols[i].key == key && cols[i].num != nil && cols[i].unit == u {
			return &cols[i]
		}
	}
	panic(fmt.Sprintf("measure: no column %q in %q", key, u.name))
}

// judge holds one value (in the column's unit) against the bounds and keeps
// it if it is the worst so far.
func (c *Criterion) judge(v *Verdict, x, at float64) {
	now, words := c.badness(v, x), ""
	verdict := ranks[now.Rank]
	if math.IsNaN(x) {
		words = "no value"
	}
	if v.Seen && !now.worse(v.Bad) {
		return
	}
	v.Bad, v.Value, v.At, v.Verdict, v.Found, v.Seen = now, x, at, verdict, words, true
}

// badness holds one value (in the column's unit) against the bounds.
func (c *Criterion) badness(v *Verdict, x float64) Badness {
	now := Badness{Over: over(x, v.Min, v.Max)}
	warn := over(x, c.unit.of(si(c.Limit.WarnMin)), c.unit.of(si(c.Limit.WarnMax)))
	switch {
	case math.IsNaN(x):
		now = Badness{Rank: 2, Over: math.Inf(1)}
	case now.Over > 0:
		now.Rank = 2
	case warn > 0:
		now = Badness{Rank: 1, Over: warn}
	case math.IsInf(now.Over, -1):
		now.Over = warn
	}
	return now
}

// Badness orders verdicts: by verdict, then by how far beyond the bound.
type Badness struct {
	Rank int     // 0 held, 1 near, 2 broken
	Over float64 // how far beyond its bound the value lies, in the verdict's unit
}

func (b Badness) worse(than Badness) bool {
	if b.Rank != than.Rank {
		return b.Rank > than.Rank
	}
	return b.Over > than.Over
}

// over is how far a value lies beyond its bounds, negative within; NaN stands
// for no bound.
func over(x, low, high float64) float64 {
	out := math.Inf(-1)
	if d := x - high; d > out {
		out = d
	}
	if d := low - x; d > out {
		out = d
	}
	return out
}
