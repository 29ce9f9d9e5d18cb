package measure_test

import (
	"slices"
	"strings"
	"testing"

	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// TestPatterns tries which targets a limit's names and patterns stand for: * is
// the only character with a meaning, and a name stands for itself whatever is
// in it.
func TestPatterns(t *testing.T) {
	for _, c := range []struct {
		of   []string
		want []string
	}{
		{[]string{"release.tool a"}, []string{"release.tool a"}},
		{[]string{"release.tool *"}, []string{"release.tool a", "release.tool b"}},
		{[]string{"release.*b*"}, []string{"release.tool b", "release.a/b [1]"}},
		{[]string{"release.*"}, []string{"release.tool a", "release.tool b", "release.a/b [1]"}},
		{[]string{"release.a/b [1]"}, []string{"release.a/b [1]"}},
		{[]string{"release.a/b [*"}, []string{"release.a/b [1]"}},
		{[]string{"release.tool b", "release.a*"}, []string{"release.tool b", "release.a/b [1]"}},
	} {
		k := criterion(t, model.Limit{Of: c.of, Measure: "rests.slid", Max: si(1, "m")})
		var got []string
		for _, target := range k.Targets {
			got = append(got, target.String())
			if target.Kind != "release" || !k.About(target.Name) {
				t.Errorf("%v: target %+v", c.of, target)
			}
		}
		if !slices.Equal(got, c.want) {
			t.Errorf("%v stands for %v, want %v", c.of, got, c.want)
		}
	}
}

// TestSeriesOfLimit tries that a limit by pattern knows the let-go series that
// its releases belong to.
func TestSeriesOfLimit(t *testing.T) {
	in := project(model.Limit{Of: []string{"release.slips*"}, Measure: "impacts.speed", Max: si(4, "m/s")})
	for _, name := range []string{"slips at 0 m", "slips at 1 m"} {
		in.Releases = append(in.Releases, model.Release{Name: name, Series: "slips", At: model.Station{Height: 1}})
	}
	c, problems := measure.Criteria(valid(t, in))
	if len(problems) > 0 {
		t.Fatal(problems)
	}
	if !c[0].Judges("slips") || c[0].Judges("") || len(c[0].Targets) != 2 || c[0].Targets[1].Index != 4 || c[0].Targets[1].Series != "slips" {
		t.Errorf("%+v", c[0].Targets)
	}
	if c[0].Judges("falls") {
		t.Error("it judges a series that there is not")
	}
}

// TestTracksNeeded tries which releases' tracks a limit needs.
func TestTracksNeeded(t *testing.T) {
	for measure, want := range map[string]bool{"impacts.speed": true, "clearance.clearance": true, "tracks.height": true,
		"rests.slid": false, "landings.speed": false} {
		unit := "m"
		if strings.HasSuffix(measure, "speed") {
			unit = "m/s"
		}
		got := make([]bool, 3)
		criterion(t, model.Limit{Of: []string{"release.tool b"}, Measure: measure, Max: si(4, unit)}).NeedTracks(got)
		if !slices.Equal(got, []bool{false, want, false}) {
			t.Errorf("%s needs the tracks %v", measure, got)
		}
	}
	got := make([]bool, 3)
	criterion(t, model.Limit{Of: []string{"path.round"}, Measure: "clearance.clearance", Min: si(0, "m")}).NeedTracks(got)
	if slices.Contains(got, true) {
		t.Errorf("a limit on a path needs the tracks %v", got)
	}
}

// TestUnitsOfColumns tries that a column may be named with its unit, which
// tells those of one name apart.
func TestUnitsOfColumns(t *testing.T) {
	for _, c := range []struct {
		measure, unit string
	}{{"rests.spinward", "m"}, {"rests.spinward_m", "m"}, {"rests.spinward_deg", "rad"}, {"impacts.energy_J", "J"}, {"crew.gravity_waist_g", "m/s^2"},
		{"habitat.spin_rpm", "rad/s"}, {"decks.walk_run", "m/s"}, {"crew.cross_up", "rad/s^2"}, {"crew.power", "W"}} {
		of := "release.tool a"
		switch table, _, _ := strings.Cut(c.measure, "."); table {
		case "crew":
			of = "path.round"
		case "habitat", "decks":
			of = "habitat"
		}
		criterion(t, model.Limit{Of: []string{of}, Measure: c.measure, Max: si(1, c.unit)})
	}
}

// TestUnsoundLimits tries what is wrong with a limit, at its key.
func TestUnsoundLimits(t *testing.T) {
	most := si(1, "m")
	for _, c := range []struct {
		name string
		l    model.Limit
		key  string
		says string
	}{
		{"no table", model.Limit{Of: []string{"release.tool a"}, Measure: "falls.slid", Max: most}, "measure", "wants table.column, the table one of landings, rests"},
		{"no column", model.Limit{Of: []string{"release.tool a"}, Measure: "rests.glide", Max: most}, "measure", `table rests has no column "glide"`},
		{"no dot", model.Limit{Of: []string{"release.tool a"}, Measure: "rests", Max: most}, "measure", `no column ""`},
		{"another unit", model.Limit{Of: []string{"release.tool a"}, Measure: "rests.slid", Max: si(1, "s")}, "max", "wants a value in m, as the column slid has, got one in s"},
		{"a bare number", model.Limit{Of: []string{"release.tool a"}, Measure: "rests.slid", Min: si(1, "")}, "min", "got one in a bare number"},
		{"a unit too many", model.Limit{Of: []string{"path.round"}, Measure: "crew.friction_demand", WarnMax: most}, "warn_max", "wants a value in a bare number"},
		{"a bound on text", model.Limit{Of: []string{"release.tool a"}, Measure: "rests.surface", Max: most}, "max", "is text"},
		{"nothing to hold", model.Limit{Of: []string{"release.tool a"}, Measure: "rests.slid"}, "name", "wants something to hold against"},
		{"nothing but surfaces", model.Limit{Of: []string{"release.tool a"}, Measure: "clearance.clearance", SurfaceIn: []string{"floor"}}, "name", "wants something to hold against"},
		{"surfaces of impacts", model.Limit{Of: []string{"release.tool a"}, Measure: "impacts.speed", SurfaceIn: []string{"floor"}}, "measure", "judge landings and rests"},
		{"barred surfaces of clearance", model.Limit{Of: []string{"release.tool a"}, Measure: "clearance.clearance", Min: most, SurfaceNotIn: []string{"floor"}}, "measure", "judge landings and rests"},
		{"unknown surface", model.Limit{Of: []string{"release.tool a"}, Measure: "rests.slid", SurfaceIn: []string{"flor"}}, "surface_in", `no surface named "flor"; there are floor,`},
		{"unknown barred surface", model.Limit{Of: []string{"release.tool a"}, Measure: "rests.slid", SurfaceNotIn: []string{"flor"}}, "surface_not_in", `no surface named "flor"`},
		{"unknown opening", model.Limit{Of: []string{"release.tool a"}, Measure: "landings.surface", FallsThroughNot: []string{"trap"}}, "falls_through_not", `no opening named "trap"`},
		{"unknown release", model.Limit{Of: []string{"release.spanner*"}, Measure: "rests.slid", Max: most}, "of", `no release named "spanner*"`},
		{"a question mark is none of a pattern", model.Limit{Of: []string{"release.tool ?"}, Measure: "rests.slid", Max: most}, "of", `no release named "tool ?"`},
		{"unknown path", model.Limit{Of: []string{"path.square"}, Measure: "crew.power", Max: si(1, "W")}, "of", `no path named "square"`},
		{"unknown kind", model.Limit{Of: []string{"study.chart"}, Measure: "rests.slid", Max: most}, "of", "wants release.NAME, path.NAME or habitat"},
		{"loads of a release", model.Limit{Of: []string{"release.tool a"}, Measure: "crew.power", Max: si(1, "W")}, "of", "the measure's table belongs to path"},
		{"a path's rest", model.Limit{Of: []string{"path.round"}, Measure: "rests.slid", Max: most}, "of", "the measure's table belongs to release"},
		{"the habitat's rest", model.Limit{Of: []string{"habitat"}, Measure: "rests.slid", Max: most}, "of", "habitat has the tables decks and habitat"},
		{"a release's spin", model.Limit{Of: []string{"release.tool a"}, Measure: "habitat.spin", Max: si(1, "rad/s")}, "of", "the measure's table belongs to habitat"},
	} {
		_, problems := measure.Criteria(valid(t, project(c.l)))
		if !slices.ContainsFunc(problems, func(p model.Problem) bool { return p.Key == "limit[0]."+c.key && strings.Contains(p.Msg, c.says) }) {
			t.Errorf("%s: %+v, want %s: %s", c.name, problems, c.key, c.says)
		}
	}
}
