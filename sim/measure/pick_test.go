package measure_test

import (
	"math"
	"strings"
	"testing"

	"offplumb/sim/crew"
	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// picked is a scenario of two releases, a let-go series of three and two crew
// paths, as names go.
func picked() *model.Model {
	m := ring(18, 0.5)
	m.Decks = []model.Deck{{Name: "floor", Radius: 18}, {Name: "upper", Radius: 15}}
	m.Releases = []model.Release{{Name: "nut"}, {Name: "bolt"}, {Name: "slip at 0 m", Series: "slip"}, {Name: "slip at 1 m", Series: "slip"}}
	m.Paths = []model.Path{{Name: "up"}, {Name: "down"}}
	return &m
}

func TestPicks(t *testing.T) {
	m := picked()
	for _, c := range []struct {
		name   string
		of     []string
		strict bool
		want   string
	}{
		{"landings.speed", nil, false, "nut, bolt, slip"},
		{"landings.speed", []string{"release.bolt"}, false, "bolt"},
		{"landings.speed", []string{"release.slip"}, true, "slip"},
		{"landings.speed", []string{"release.slip at*", "release.slip at 0 m"}, true, "slip at 0 m, slip at 1 m"},
		{"landings.speed", []string{"path.up"}, false, "nut, bolt, slip"},
		{"landings.speed", []string{"path.up", "release.*t"}, true, "nut, bolt"},
		{"crew.weight", []string{"release.nut"}, false, "up, down"},
		{"crew.weight", []string{"path.down", "release.nut"}, true, "down"},
		{"clearance.clearance", nil, false, "nut, bolt, slip, up, down"},
		{"clearance.clearance", []string{"path.down", "release.nut"}, true, "down, nut"},
		{"decks.gravity", []string{"release.nut"}, true, "floor, upper"},
		{"habitat.spin", []string{"release.nut"}, true, ""},
	} {
		picks, err := measure.Picks(m, c.name, c.of, c.strict)
		if err != nil {
			t.Errorf("%s of %v: %v", c.name, c.of, err)
			continue
		}
		got := make([]string, len(picks))
		for i := range picks {
			got[i] = picks[i].Of
		}
		if s := strings.Join(got, ", "); s != c.want {
			t.Errorf("%s of %v is of %s, want %s", c.name, c.of, s, c.want)
		}
	}
}

func TestPickRefuses(t *testing.T) {
	m := picked()
	for _, c := range []struct{ name, of, want string }{
		{"speed", "", "wants table.column"},
		{"landings", "", "no column"},
		{"landings.", "", "no column"},
		{"landings.sped", "", `no column "sped"; it has time, offset, `},
		{"landings.surface", "", "is text"},
		{"landings.speed_kg", "", "no column"},
		{"crew.weight.mean", "", ".min or .max"},
		{"crew.weight.max.min", "", ".min or .max"},
		{"landings.speed", "release.nuts", `no release named "nuts"`},
		{"landings.speed", "nut", "wants release.NAME"},
		{"landings.speed", "path.up", "and none is named"},
		{"crew.weight", "habitat", "a measure of a crew path, and none is named"},
	} {
		var of []string
		if c.of != "" {
			of = []string{c.of}
		}
		if _, err := measure.Picks(m, c.name, of, c.of != ""); err == nil || !strings.Contains(err.Error(), c.want) {
			t.Errorf("%s of %q: %v", c.name, c.of, err)
		}
	}
	m.Paths = nil
	if _, err := measure.Picks(m, "crew.weight", nil, false); err == nil || !strings.Contains(err.Error(), "there is none") {
		t.Errorf("without a path: %v", err)
	}
}

func TestPickColumns(t *testing.T) {
	m := picked()
	for _, c := range []struct{ name, alone, of, unit string }{
		{"landings.speed", "landings.speed_m_s", "release.nut: landings.speed_m_s", "m/s"},
		{"landings.speed_m_s", "landings.speed_m_s", "release.nut: landings.speed_m_s", "m/s"},
		{"landings.spinward", "landings.spinward_m", "release.nut: landings.spinward_m", "m"},
		{"landings.spinward_deg", "landings.spinward_deg", "release.nut: landings.spinward_deg", "deg"},
		{"tracks.height.min", "tracks.height.min_m", "release.nut: tracks.height.min_m", "m"},
		{"clearance.clearance.min", "clearance.clearance_m", "release.nut: clearance.clearance_m", "m"},
		{"clearance.clearance.max", "clearance.clearance.max_m", "release.nut: clearance.clearance.max_m", "m"},
		{"rests.impacts", "rests.impacts", "release.nut: rests.impacts", ""},
		{"habitat.spin", "habitat.spin_rpm", "habitat.spin_rpm", "rpm"},
	} {
		picks, err := measure.Picks(m, c.name, nil, false)
		if err != nil {
			t.Fatal(err)
		}
		a, b := picks[0].Column(true), picks[0].Column(false)
		if a.Name != c.alone || b.Name != c.of || a.Unit != c.unit || picks[0].Unit() != c.unit || a.Meaning == "" {
			t.Errorf("%s: columns %+v and %+v", c.name, a, b)
		}
	}
	picks, err := measure.Picks(m, "habitat.spin", nil, false)
	if err != nil || math.Abs(picks[0].In(math.Pi)-30) > 30*epsilon {
		t.Errorf("half a turn a second is %g rpm, want 30 (%v)", picks[0].In(math.Pi), err)
	}
}

// weighed is evidence of three instants on each path and a landing of each
// release.
func weighed(speeds []float64, demand float64) measure.Evidence {
	load := func(weight, friction, pull float64) measure.Load {
		return measure.Load{Loads: crew.Loads{Weight: weight, FrictionDemand: friction, Pull: pull}}
	}
	rows := []measure.Load{load(5, 0.1, math.NaN()), load(-7, demand, -2), load(6, 0.2, 1)}
	landings := make([]measure.Landing, len(speeds))
	for i := range speeds {
		landings[i].Offset = speeds[i]
	}
	return measure.Evidence{
		Loads:   func(int) ([]measure.Load, bool) { return rows, true },
		Landing: func(i int) (*measure.Landing, bool) { return &landings[i], !math.IsInf(speeds[i], 0) },
	}
}

// TestPickTakes: of several rows the greatest magnitude with its sign, or what
// the ending says; what has no value is passed over, but not for friction
// demand, which is beyond all bounds there.
func TestPickTakes(t *testing.T) {
	nan := math.NaN()
	m := picked()
	for _, c := range []struct {
		name, of string
		demand   float64
		want     float64
	}{
		{"crew.weight", "path.up", 0, -7},
		{"crew.weight.max", "path.up", 0, 6},
		{"crew.weight.min", "path.down", 0, -7},
		{"crew.pull", "path.up", 0, -2},
		{"crew.friction_demand", "path.up", 0.5, 0.5},
		{"crew.friction_demand", "path.up", nan, nan},
		{"crew.friction_demand.min", "path.up", nan, nan},
		{"landings.offset", "release.bolt", 0, -3},
		{"landings.offset", "release.slip", 0, -4},
		{"landings.offset.max", "release.slip", 0, 1},
		{"landings.offset", "release.nut", 0, nan},
	} {
		picks, err := measure.Picks(m, c.name, []string{c.of}, true)
		if err != nil {
			t.Fatal(err)
		}
		e := weighed([]float64{math.Inf(1), -3, 1, -4}, c.demand)
		if got := picks[0].Value(m, e); got != c.want && !(math.IsNaN(got) && math.IsNaN(c.want)) {
			t.Errorf("%s of %s is %g, want %g", c.name, c.of, got, c.want)
		}
	}
}

// TestPickNeeds: what must be flown, and how far.
func TestPickNeeds(t *testing.T) {
	m := picked()
	for _, c := range []struct {
		name                string
		of                  string
		needed, track, past bool
	}{
		{"landings.offset", "release.slip", true, false, false},
		{"rests.time", "release.slip", true, false, true},
		{"impacts.energy", "release.slip", true, true, true},
		{"landings.offset", "release.nut", false, false, false},
	} {
		picks, err := measure.Picks(m, c.name, []string{c.of}, true)
		if err != nil {
			t.Fatal(err)
		}
		needed, track := picks[0].NeedRelease(&m.Releases[2])
		if needed != c.needed || track != c.track || picks[0].PastLanding() != c.past {
			t.Errorf("%s of %s: needed %t, with its track %t, past its landing %t", c.name, c.of, needed, track, picks[0].PastLanding())
		}
	}
}
