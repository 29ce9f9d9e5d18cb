package measure

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"offplumb/sim/model"
)

// mapColumns are the figures of a landing map that limits can judge: those of
// every map, then shares by the names of surfaces, openings and goals.
func mapColumns(m *model.Model) []column[LandMap] {
	out := slices.Clone(wholeMapColumns)
	add := func(key string, num func(*LandMap) float64) {
		out = append(out, column[LandMap]{key: key, meaning: key, num: num})
	}
	for _, s := range m.Interior.Surfaces() {
		add("share_on."+s.Name, func(c *LandMap) float64 { return c.shareOn(s.Name) })
	}
	for i := range m.Decks {
		for _, o := range m.Decks[i].Openings {
			add("share_through."+o.Name, func(c *LandMap) float64 { return c.shareThrough(o.Name) })
		}
	}
	for i := range m.Maps {
		for _, g := range m.Maps[i].Goals {
			add("share_reaching."+g.Name, func(c *LandMap) float64 { return namedShare(c.Goals, g.Name) })
		}
	}
	return out
}

var wholeMapColumns = []column[LandMap]{
	{key: "worst_energy", unit: joule, num: func(c *LandMap) float64 { return c.Worst.Energy }},
	{key: "worst_speed", unit: speedUnit, num: func(c *LandMap) float64 { return c.Worst.Speed }},
	{key: "worst_normal_speed", unit: speedUnit, num: func(c *LandMap) float64 { return c.Normal }},
	{key: "through", num: func(c *LandMap) float64 { return c.Through.Share }},
	{key: "landed", num: func(c *LandMap) float64 { return float64(c.Landed) / float64(c.Flights) }},
	{key: "lost", num: func(c *LandMap) float64 { return float64(c.Gone) / float64(c.Flights) }},
	{key: "footprint", unit: squareMetre, num: func(c *LandMap) float64 { return c.FootprintArea() }},
	{key: "surface", text: func(*LandMap) string { return "" }},
}

// judgedMaps is the table of landing maps for limits. Its list of columns has
// one for all surfaces, as a scenario has many.
func judgedMaps(m *model.Model) judged {
	t := judgedTable("map", mapColumns(m))
	t.keys = t.keys[:len(wholeMapColumns)]
	t.keys = append(t.keys, "share_on.SURFACE", "share_through.OPENING", "share_reaching.NAME")
	return t
}

// judgesWords says whether a limit names surfaces or openings.
func judgesWords(l *model.Limit) bool {
	return len(l.SurfaceIn)+len(l.SurfaceNotIn)+len(l.FallsThroughNot) > 0
}

func (c *LandMap) shareOn(surface string) float64 {
	for i := range c.Surfaces {
		if c.Surfaces[i].Name == surface {
			return c.Surfaces[i].Share.Share
		}
	}
	return 0
}

func (c *LandMap) shareThrough(opening string) float64 {
	if s := namedShare(c.Openings, opening); !math.IsNaN(s) {
		return s
	}
	return 0 // it is closed
}

// namedShare is a share of a list; NaN where it is not there.
func namedShare(list []Share, name string) float64 {
	for i := range list {
		if list[i].Name == name {
			return list[i].Share
		}
	}
	return math.NaN()
}

// landMap judges a map, by its number or by what its flights touch first and
// fall through.
func (c *Criterion) landMap(t Target, l *LandMap) Verdict {
	var v Verdict
	if len(c.Limit.Bounds()) > 0 {
		v = series(c, t, mapColumns(l.m), []LandMap{*l}, func(*LandMap) float64 { return math.NaN() })
	} else {
		v = c.blank(t)
		v.Found = "as wanted"
	}
	if words := c.mapWords(l); words != "" {
		v.Verdict, v.Bad, v.Found = Broken, Badness{Rank: 2, Over: math.Inf(1)}, words
	}
	return v
}

// mapWords says how the flights of a map break a limit on surfaces or openings.
func (c *Criterion) mapWords(l *LandMap) string {
	var words []string
	say := func(what string, n int) {
		words = append(words, fmt.Sprintf("%d of %d %s", n, l.Flights, what))
	}
	for i := range l.Surfaces {
		s := &l.Surfaces[i]
		if s.Count > 0 && c.words(s.Name, nil) != "" {
			say("touched "+s.Name, s.Count)
		}
	}
	if n := l.Flights - l.Landed; n > 0 && len(c.Limit.SurfaceIn) > 0 {
		say("touched nothing", n)
	}
	for i := range l.Openings {
		if o := &l.Openings[i]; o.Count > 0 && slices.Contains(c.Limit.FallsThroughNot, o.Name) {
			say("fell through "+o.Name, o.Count)
		}
	}
	return strings.Join(words, ", ")
}
