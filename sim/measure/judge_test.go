package measure_test

import (
	"math"
	"testing"

	"offplumb/sim/measure"
	"offplumb/sim/model"
)

var nan = math.NaN()

// si is a bound in SI.
func si(x float64, unit string) *model.Quantity { return &model.Quantity{SI: x, Unit: unit} }

// project is a ring with two releases, a further one, a path and a limit.
func project(l model.Limit) model.Model {
	in := ring(18, 0.5, model.Deck{Name: "upper", Radius: 15, Thickness: 0.05, Whole: true, Friction: model.None, Restitution: model.None,
		Openings: []model.Opening{{Name: "hatch", Size: [2]float64{1, 1}}}})
	in.Habitat.Length = 12
	for _, name := range []string{"tool a", "tool b", "a/b [1]"} {
		in.Releases = append(in.Releases, model.Release{Name: name, At: model.Station{Height: 1}})
	}
	in.Crews = []model.Crew{mate}
	in.Paths = []model.Path{{Name: "round", Crew: mate.Name, Legs: []model.Leg{{Kind: model.Stand, Duration: 1}}}}
	l.Name, l.Source = "limit", "our note"
	in.Limits = []model.Limit{l}
	return in
}

// criterion matches a limit, which must be sound.
func criterion(t *testing.T, l model.Limit) *measure.Criterion {
	t.Helper()
	c, problems := measure.Criteria(valid(t, project(l)))
	if len(problems) > 0 || len(c) != 1 {
		t.Fatalf("%+v: %+v", l, problems)
	}
	return &c[0]
}

// same compares numbers, missing ones too.
func same(a, b float64) bool { return a == b || math.IsNaN(a) && math.IsNaN(b) }

// hits are impacts of a tool with some speeds, one a second from the first.
func hits(speeds ...float64) []measure.Event {
	var out []measure.Event
	for i, v := range speeds {
		out = append(out, measure.Event{Kind: measure.Impact, Surface: "floor", Time: float64(i + 1), Speed: v})
	}
	return out
}

// impactsOf is evidence of impacts of each release; nil rows: it did not run.
func impactsOf(rows ...[]measure.Event) measure.Evidence {
	return measure.Evidence{Events: func(i int) ([]measure.Event, bool) { return rows[i], rows[i] != nil }}
}

// TestBounds tries the verdict on a series of values, its worst one and its
// time, for all bounds. A value on its bound is within.
func TestBounds(t *testing.T) {
	bound := func(x float64) *model.Quantity { return si(x, "m/s") }
	for _, c := range []struct {
		name    string
		l       model.Limit
		speeds  []float64
		verdict string
		value   float64
		at      float64
	}{
		{"below max", model.Limit{Max: bound(6)}, []float64{1, 5, 3}, measure.Held, 5, 2},
		{"on max", model.Limit{Max: bound(5)}, []float64{1, 5, 3}, measure.Held, 5, 2},
		{"above max", model.Limit{Max: bound(4)}, []float64{1, 5, 6}, measure.Broken, 6, 3},
		{"the first of equals", model.Limit{Max: bound(4)}, []float64{1, 5, 5}, measure.Broken, 5, 2},
		{"above min", model.Limit{Min: bound(1)}, []float64{2, 1, 3}, measure.Held, 1, 2},
		{"below min", model.Limit{Min: bound(1.5)}, []float64{2, 1, 3}, measure.Broken, 1, 2},
		{"between, nearer to max", model.Limit{Min: bound(0), Max: bound(10)}, []float64{3, 8, 4}, measure.Held, 8, 2},
		{"between, nearer to min", model.Limit{Min: bound(0), Max: bound(10)}, []float64{3, 1, 4}, measure.Held, 1, 2},
		{"beyond both, farther below", model.Limit{Min: bound(2), Max: bound(4)}, []float64{0, 5}, measure.Broken, 0, 1},
		{"max_abs, above", model.Limit{MaxAbs: bound(4)}, []float64{-3, 4.5}, measure.Broken, 4.5, 2},
		{"max_abs, below", model.Limit{MaxAbs: bound(4)}, []float64{-4.5, 3}, measure.Broken, -4.5, 1},
		{"max_abs, within", model.Limit{MaxAbs: bound(5)}, []float64{-4.5, 3}, measure.Held, -4.5, 1},
		{"max_abs and a narrower max", model.Limit{MaxAbs: bound(5), Max: bound(2)}, []float64{-4, 3}, measure.Broken, 3, 2},
		{"near above", model.Limit{Max: bound(6), WarnMax: bound(4)}, []float64{1, 5, 3}, measure.Near, 5, 2},
		{"on the warning", model.Limit{Max: bound(6), WarnMax: bound(5)}, []float64{1, 5, 3}, measure.Held, 5, 2},
		{"near below", model.Limit{Min: bound(0), WarnMin: bound(2)}, []float64{3, 1, 5}, measure.Near, 1, 2},
		{"broken beats near", model.Limit{Min: bound(0), WarnMin: bound(20), Max: bound(8)}, []float64{1, 8.5, 2}, measure.Broken, 8.5, 2},
		{"only a warning", model.Limit{WarnMax: bound(4)}, []float64{3, 2}, measure.Held, 3, 1},
		{"only a warning, passed", model.Limit{WarnMax: bound(4)}, []float64{3, 9}, measure.Near, 9, 2},
		{"no value", model.Limit{Max: bound(4)}, []float64{3, nan, 9}, measure.Broken, nan, 2},
	} {
		c.l.Of, c.l.Measure = []string{"release.tool a"}, "impacts.speed"
		v, ok := criterion(t, c.l).Judge(impactsOf(hits(c.speeds...)))
		if !ok || v.Verdict != c.verdict || !same(v.Value, c.value) || v.At != c.at {
			t.Errorf("%s: %s with %g at %g s, want %s with %g at %g", c.name, v.Verdict, v.Value, v.At, c.verdict, c.value, c.at)
		}
		if v.Limit != "limit" || v.Of != "release.tool a" || v.Measure != "impacts.speed" || v.Unit != "m/s" || v.Source != "our note" {
			t.Errorf("%s: the verdict says %+v", c.name, v)
		}
		if math.IsNaN(c.value) != (v.Found == "no value") {
			t.Errorf("%s: found %q", c.name, v.Found)
		}
	}
}

// TestBoundsOfVerdict tries the bounds that a verdict prints, in its unit.
func TestBoundsOfVerdict(t *testing.T) {
	deg := func(x float64) *model.Quantity { return si(x*math.Pi/180, "rad") }
	for _, c := range []struct {
		name     string
		l        model.Limit
		min, max float64
	}{
		{"max", model.Limit{Max: deg(30)}, nan, 30},
		{"min", model.Limit{Min: deg(-10)}, -10, nan},
		{"max_abs", model.Limit{MaxAbs: deg(20)}, -20, 20},
		{"max_abs and max", model.Limit{MaxAbs: deg(20), Max: deg(5)}, -20, 5},
		{"max_abs and wider bounds", model.Limit{MaxAbs: deg(20), Min: deg(-50), Max: deg(50)}, -20, 20},
	} {
		c.l.Of, c.l.Measure = []string{"release.tool a"}, "impacts.incidence"
		v, _ := criterion(t, c.l).Judge(impactsOf(hits(1)))
		near := func(a, b float64) bool { return same(a, b) || math.Abs(a-b) < 1e-12*50 }
		if !near(v.Min, c.min) || !near(v.Max, c.max) || v.Unit != "deg" {
			t.Errorf("%s: from %g to %g %s, want %g to %g deg", c.name, v.Min, v.Max, v.Unit, c.min, c.max)
		}
	}
}

// TestImpactsOnly tries that leavings of passages are no impacts, and that
// whatever touches nothing holds a limit on impacts.
func TestImpactsOnly(t *testing.T) {
	c := criterion(t, model.Limit{Of: []string{"release.tool a"}, Measure: "impacts.speed", Max: si(4, "m/s")})
	rows := append(hits(3), measure.Event{Kind: measure.Leaves, Surface: "spoke A", Time: 0.5, Speed: 9, NormalSpeed: nan})
	if v, ok := c.Judge(impactsOf(rows)); !ok || v.Verdict != measure.Held || v.Value != 3 {
		t.Errorf("a leaving at 9 m/s counts: %+v", v)
	}
	if v, ok := c.Judge(impactsOf(rows[1:])); !ok || v.Verdict != measure.Held || v.Found != "no impact" || !math.IsNaN(v.Value) || !math.IsNaN(v.At) {
		t.Errorf("no impact: %+v", v)
	}
}

// TestWorstOfSeveral tries that of several targets the worst counts, by its
// verdict first and then by how far it is beyond its bound; that those which
// did not run are left out; and that there is no verdict if none did.
func TestWorstOfSeveral(t *testing.T) {
	c := criterion(t, model.Limit{Of: []string{"release.tool *"}, Measure: "impacts.speed", Max: si(4, "m/s"), WarnMax: si(2, "m/s")})
	for _, k := range []struct {
		name    string
		a, b    []measure.Event
		ok      bool
		of      string
		verdict string
	}{
		{"both held", hits(1), hits(1.5), true, "release.tool b", measure.Held},
		{"near beats held", hits(3), hits(1.5), true, "release.tool a", measure.Near},
		{"broken beats near", hits(3.9), hits(4.1), true, "release.tool b", measure.Broken},
		{"the farther beyond", hits(9), hits(8), true, "release.tool a", measure.Broken},
		{"no value is worst", hits(9), hits(nan), true, "release.tool b", measure.Broken},
		{"no impact is best", hits(1), hits([]float64{}...), true, "release.tool a", measure.Held},
		{"one did not run", nil, hits(5), true, "release.tool b", measure.Broken},
		{"none ran", nil, nil, false, "", ""},
	} {
		if k.b == nil && k.ok {
			k.b = []measure.Event{}
		}
		v, ok := c.Judge(impactsOf(k.a, k.b))
		if ok != k.ok || v.Of != k.of || v.Verdict != k.verdict {
			t.Errorf("%s: %t, %s of %q, want %t, %s of %q", k.name, ok, v.Verdict, v.Of, k.ok, k.verdict, k.of)
		}
	}
}

// TestSurfacesOfRests tries the limits on what a release ends on, alone and
// with a number: either breaks the limit.
func TestSurfacesOfRests(t *testing.T) {
	most := si(1, "m")
	for _, c := range []struct {
		name    string
		l       model.Limit
		surface string
		slid    float64
		verdict string
		found   string
	}{
		{"in", model.Limit{SurfaceIn: []string{"floor", "upper"}}, "upper", 9, measure.Held, "as wanted"},
		{"not in", model.Limit{SurfaceIn: []string{"floor", "upper"}}, "bulkhead -axial", 9, measure.Broken, "touched bulkhead -axial, not floor or upper"},
		{"on nothing", model.Limit{SurfaceIn: []string{"floor"}}, "", 9, measure.Broken, "touched nothing, not floor"},
		{"barred", model.Limit{SurfaceNotIn: []string{"floor"}}, "floor", 9, measure.Broken, "touched floor"},
		{"not barred", model.Limit{SurfaceNotIn: []string{"floor"}}, "upper", 9, measure.Held, "as wanted"},
		{"barred does not mean touched", model.Limit{SurfaceNotIn: []string{"floor"}}, "", 9, measure.Held, "as wanted"},
		{"both held", model.Limit{SurfaceIn: []string{"floor"}, Max: most}, "floor", 0.5, measure.Held, ""},
		{"number broken", model.Limit{SurfaceIn: []string{"floor"}, Max: most}, "floor", 1.5, measure.Broken, ""},
		{"surface broken", model.Limit{SurfaceIn: []string{"floor"}, Max: most}, "upper", 0.5, measure.Broken, "touched upper, not floor"},
	} {
		c.l.Of, c.l.Measure = []string{"release.tool b"}, "rests.slid"
		e := measure.Evidence{Rest: func(i int) (*measure.Rest, bool) {
			return &measure.Rest{Release: "tool b", Surface: c.surface, Slid: c.slid, Time: 7}, i == 1
		}}
		v, ok := criterion(t, c.l).Judge(e)
		if !ok || v.Verdict != c.verdict || v.Found != c.found || v.At != 7 || v.Of != "release.tool b" {
			t.Errorf("%s: %+v, want %s: %q at 7 s", c.name, v, c.verdict, c.found)
		}
	}
	c := criterion(t, model.Limit{Of: []string{"release.tool a"}, Measure: "rests.slid", Max: most})
	if v, ok := c.Judge(measure.Evidence{Rest: func(int) (*measure.Rest, bool) { return nil, false }}); ok {
		t.Errorf("of what did not run: %+v", v)
	}
}

// TestTextOfRests tries a limit on a column of text: what it is on counts, not
// the column.
func TestTextOfRests(t *testing.T) {
	c := criterion(t, model.Limit{Of: []string{"release.tool a"}, Measure: "rests.surface", SurfaceIn: []string{"upper"}})
	v, ok := c.Judge(measure.Evidence{Rest: func(int) (*measure.Rest, bool) { return &measure.Rest{Surface: "floor", Time: 2}, true }})
	if !ok || v.Verdict != measure.Broken || v.Found != "touched floor, not upper" || !math.IsNaN(v.Value) || v.At != 2 {
		t.Errorf("%+v", v)
	}
}

// TestFallsThrough tries the limit on openings that a release must not fall
// through, before or after its landing.
func TestFallsThrough(t *testing.T) {
	c := criterion(t, model.Limit{Of: []string{"release.tool a"}, Measure: "landings.surface", FallsThroughNot: []string{"hatch"}})
	for _, k := range []struct {
		through []string
		verdict string
		found   string
	}{{nil, measure.Held, "as wanted"}, {[]string{"trap"}, measure.Held, "as wanted"}, {[]string{"trap", "hatch"}, measure.Broken, "fell through hatch"}} {
		v, ok := c.Judge(measure.Evidence{Landing: func(int) (*measure.Landing, bool) {
			return &measure.Landing{Surface: "floor", AllThrough: k.through, Time: 3}, true
		}})
		if !ok || v.Verdict != k.verdict || v.Found != k.found || v.At != 3 {
			t.Errorf("through %v: %+v, want %s: %q", k.through, v, k.verdict, k.found)
		}
		rest := criterion(t, model.Limit{Of: []string{"release.tool a"}, Measure: "rests.surface", FallsThroughNot: []string{"hatch"}})
		v, ok = rest.Judge(measure.Evidence{
			Landing: func(int) (*measure.Landing, bool) {
				return &measure.Landing{Surface: "floor", AllThrough: k.through}, true
			},
			Rest: func(int) (*measure.Rest, bool) { return &measure.Rest{Surface: "floor", Time: 5}, true },
		})
		if !ok || v.Verdict != k.verdict || v.Found != k.found || v.At != 5 {
			t.Errorf("resting, through %v: %+v, want %s: %q", k.through, v, k.verdict, k.found)
		}
	}
}

// TestClearanceLimits tries limits on clearance: of all surfaces or of those
// named, of a release or of a path, whose rows are its own.
func TestClearanceLimits(t *testing.T) {
	rows := []measure.Clearance{{Surface: "floor", Gap: 0, Time: 5}, {Surface: "upper", Gap: 0.3, Time: 2}, {Surface: "hatch rim", Gap: 0.2, Time: 3}}
	e := measure.Evidence{
		Clearance: func(i int) ([]measure.Clearance, bool) { return rows, i == 0 },
		PathClearance: func(i int) ([]measure.Clearance, bool) {
			return []measure.Clearance{{Surface: "upper", Gap: -0.1, Time: 9}}, i == 0
		},
	}
	for _, c := range []struct {
		name    string
		of      string
		in      []string
		min     float64
		verdict string
		value   float64
		at      float64
	}{
		{"all", "release.tool a", nil, 0.1, measure.Broken, 0, 5},
		{"some", "release.tool a", []string{"upper", "hatch rim"}, 0.1, measure.Held, 0.2, 3},
		{"one", "release.tool a", []string{"upper"}, 0.25, measure.Held, 0.3, 2},
		{"one, too near", "release.tool a", []string{"upper"}, 0.35, measure.Broken, 0.3, 2},
		{"never the nearest", "release.tool a", []string{"bulkhead +axial"}, 0.1, measure.Broken, nan, nan},
		{"a path", "path.round", []string{"upper"}, 0, measure.Broken, -0.1, 9},
	} {
		v, ok := criterion(t, model.Limit{Of: []string{c.of}, Measure: "clearance.clearance", SurfaceIn: c.in, Min: si(c.min, "m")}).Judge(e)
		if !ok || v.Verdict != c.verdict || !same(v.Value, c.value) || !same(v.At, c.at) || v.Of != c.of {
			t.Errorf("%s: %+v, want %s with %g m at %g s", c.name, v, c.verdict, c.value, c.at)
		}
	}
}

// TestHabitatLimits tries limits on the habitat as a whole, for the stature and
// speed that they name, and on its decks, of which the worst counts.
func TestHabitatLimits(t *testing.T) {
	in := project(model.Limit{})
	in.Limits = nil
	m := valid(t, in)
	e := measure.Evidence{Decks: measure.DeckFigures(m), Habitat: func(stature, speed float64) measure.HabitatFigure { return measure.HabitatOf(m, stature, speed) }}
	g := 0.5 * 0.5
	for _, c := range []struct {
		name    string
		l       model.Limit
		verdict string
		value   float64
		unit    string
	}{
		{"head to foot, default", model.Limit{Measure: "habitat.head_to_foot", Max: si(0.1, "")}, measure.Held, 0.93 * 1.75 / 18, ""},
		{"head to foot, tall", model.Limit{Measure: "habitat.head_to_foot", Stature: 2, Max: si(0.1, "")}, measure.Broken, 0.93 * 2 / 18, ""},
		{"Coriolis, default", model.Limit{Measure: "habitat.coriolis_ratio", Max: si(0.25, "")}, measure.Held, 2 * 0.5 / (g * 18), ""},
		{"Coriolis, running", model.Limit{Measure: "habitat.coriolis_ratio", Speed: 3, Max: si(0.25, "")}, measure.Broken, 6 * 0.5 / (g * 18), ""},
		{"spin", model.Limit{Measure: "habitat.spin", Max: si(4*rpm, "rad/s")}, measure.Broken, 0.5 / rpm, "rpm"},
		{"gravity of the lightest deck", model.Limit{Measure: "decks.gravity", Min: si(4, "m/s^2")}, measure.Broken, g * 15 / 9.80665, "g"},
		{"gravity of the heaviest deck", model.Limit{Measure: "decks.gravity", Max: si(5, "m/s^2")}, measure.Held, g * 18 / 9.80665, "g"},
	} {
		c.l.Of = []string{"habitat"}
		v, ok := criterion(t, c.l).Judge(e)
		if !ok || v.Verdict != c.verdict || math.Abs(v.Value-c.value) > 8*epsilon*c.value || v.Unit != c.unit || v.Of != "habitat" || !math.IsNaN(v.At) {
			t.Errorf("%s: %+v, want %s with %.17g %s", c.name, v, c.verdict, c.value, c.unit)
		}
	}
}

// TestColumnsWithGaps tries limits on loads that only ladders have: the rows
// without a ladder do not count, but one without any breaks the limit. Where a
// weight is missing there is no friction demand, and no limit on it is held.
func TestColumnsWithGaps(t *testing.T) {
	row := func(time, pull, demand float64) measure.Load {
		var l measure.Load
		l.Time, l.Pull, l.AlongLadder, l.FrictionDemand = time, pull, 2*pull, demand
		return l
	}
	for _, c := range []struct {
		name, measure string
		unit          string
		rows          []measure.Load
		verdict       string
		value, at     float64
	}{
		{"pull", "crew.pull", "N", []measure.Load{row(0, nan, 0.1), row(1, 3, 0.2), row(2, 4, 0.1), row(3, nan, 0)}, measure.Held, 4, 2},
		{"along", "crew.along_ladder", "N", []measure.Load{row(0, nan, 0.1), row(1, 3, 0.2), row(2, 4, 0.1)}, measure.Broken, 8, 2},
		{"no ladder", "crew.pull", "N", []measure.Load{row(0, nan, 0.1), row(1, nan, 0.2)}, measure.Broken, nan, nan},
		{"demand", "crew.friction_demand", "", []measure.Load{row(0, nan, 0.1), row(1, nan, 0.2)}, measure.Held, 0.2, 1},
		{"no weight", "crew.friction_demand", "", []measure.Load{row(0, nan, 0.1), row(1, nan, nan)}, measure.Broken, nan, 1},
	} {
		l := model.Limit{Of: []string{"path.round"}, Measure: c.measure, Max: si(5, c.unit)}
		v, ok := criterion(t, l).Judge(measure.Evidence{Loads: func(int) ([]measure.Load, bool) { return c.rows, true }})
		if !ok || v.Verdict != c.verdict || !same(v.Value, c.value) || !same(v.At, c.at) || math.IsNaN(c.value) != (v.Found == "no value") {
			t.Errorf("%s: %+v, want %s with %g at %g s", c.name, v, c.verdict, c.value, c.at)
		}
	}
}
