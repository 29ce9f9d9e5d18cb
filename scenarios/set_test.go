package scenarios_test

import (
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"

	"offplumb/scenarios"
	"offplumb/sim/model"
)

// settable is a scenario with a name of every odd kind, for settings.
const settable = `format = 1
title = "settable"
[habitat]
floor_radius = "18 m"
floor_gravity = "0.5 g"
length = "14 m"
[air]
pressure = "70 kPa"
temperature = "22 °C"
[[body]]
name = "torque wrench"
mass = "1.4 kg"
diameter = "60 mm"
[[body]]
name = "a=b.c"
mass = "1 kg"
diameter = "1 cm"
[[body]]
name = "3\" pipe"
mass = "1 kg"
diameter = "1 cm"
[[body]]
name = "rigger's cup"
mass = "1 kg"
diameter = "1 cm"
[[release]]
name = "drop"
body = "torque wrench"
at = { height = "1.9 m" }
throw = { speed = "3 m/s", heading = "30 deg" }
[[release]]
name = "Öl"
body = "torque wrench"
[release.at]
radius = "14 m"
[[deck]]
name = "upper"
radius = "15.4 m"
from = "-40 deg"
to = "40 deg"
[[deck.opening]]
name = "hatch 2"
spinward = "3 m"
size = ["0.9 m", "0.9 m"]
[[crew]]
name = "rigger"
mass = "84 kg"
stature = "1.78 m"
[[crew_path]]
name = "round"
crew = "rigger"
start = { spinward = "-15 m" }
legs = [
  { walk = { spinward = "-14 m" }, speed = "1.2 m/s" },
  { stand = "1 s" },
]
[[limit]]
name = "l"
of = "release.drop"
measure = "landings.deflection"
max = "5 m"
[[release_list]]
file = "list.csv"
`

const settableList = "release,height_m\nfrom the list,1.5\n"

func readList(string) ([]byte, error) { return []byte(settableList), nil }

func loadSet(sets ...string) (*scenarios.Scenario, error) {
	return scenarios.Load("s.toml", []byte(settable), scenarios.Options{Sets: sets, ReadFile: readList})
}

// rounding is what a conversion of units may be off by, relatively: three
// roundings by half a unit of the last place.
const rounding = 3 * 0x1p-53

func near(got, want float64) bool { return math.Abs(got-want) <= rounding*math.Abs(want) }

// releaseNamed finds a release, or a point where there is none.
func releaseNamed(m *model.Model, name string) *model.Release {
	i := slices.IndexFunc(m.Releases, func(r model.Release) bool { return r.Name == name })
	if i < 0 {
		return &model.Release{}
	}
	return &m.Releases[i]
}

func deckNamed(m *model.Model, name string) *model.Deck {
	i := slices.IndexFunc(m.Decks, func(d model.Deck) bool { return d.Name == name })
	if i < 0 {
		return &model.Deck{}
	}
	return &m.Decks[i]
}

func TestSettings(t *testing.T) {
	spin := func(m *model.Model) float64 { return m.Habitat.Spin }
	drop := func(m *model.Model) *model.Release { return releaseNamed(m, "drop") }
	for _, c := range []struct {
		set  string
		got  func(*model.Model) float64
		want float64
	}{
		{`habitat.spin="4 rpm"`, spin, 4 * math.Pi / 30},
		{`habitat.spin='4 rpm'`, spin, 4 * math.Pi / 30},
		{`habitat.spin=4 rpm`, spin, 4 * math.Pi / 30},
		{`habitat.spin=4rpm`, spin, 4 * math.Pi / 30},
		{`habitat.spin = 4 rpm `, spin, 4 * math.Pi / 30},
		{` habitat . spin =-4 rpm`, spin, -4 * math.Pi / 30},
		{`"habitat".'spin'=4 rpm`, spin, 4 * math.Pi / 30},
		{`habitat.spin="4 rpm" # slower`, spin, 4 * math.Pi / 30},
		{`habitat.rim_speed=9 m/s`, spin, 0.5},
		{`habitat={floor_radius="18 m",spin="1 rad/s"}`, spin, 1},
		{`release.drop.at.height=2.2 m`, func(m *model.Model) float64 { return drop(m).At.Height }, 2.2},
		{`release."drop".at.height=2.2 m`, func(m *model.Model) float64 { return drop(m).At.Height }, 2.2},
		{`release.'drop'.at.height="2.2 m"`, func(m *model.Model) float64 { return drop(m).At.Height }, 2.2},
		{`release.0.at.height=2.2 m`, func(m *model.Model) float64 { return drop(m).At.Height }, 2.2},
		{`release.drop.at.spinward=1e-1 m`, func(m *model.Model) float64 { return drop(m).At.Spinward.Value }, 0.1},
		{`release.drop.at={height="3 m",spinward="2 m"}`, func(m *model.Model) float64 { return drop(m).At.Spinward.Value + drop(m).At.Height }, 5},
		{`release."Öl".at.radius=13 m`, func(m *model.Model) float64 { return releaseNamed(m, "Öl").At.Radius }, 13},
		{`release.Öl.at.radius=13 m`, func(m *model.Model) float64 { return releaseNamed(m, "Öl").At.Radius }, 13},
		{`body.torque wrench.mass=2 kg`, func(m *model.Model) float64 { return m.Bodies[0].Mass }, 2},
		{`body."torque wrench".restitution=0.5`, func(m *model.Model) float64 { return m.Bodies[0].Restitution }, 0.5},
		{`body."a=b.c".mass=2 kg`, func(m *model.Model) float64 { return m.Bodies[1].Mass }, 2},
		{`body.'3" pipe'.mass=2 kg`, func(m *model.Model) float64 { return m.Bodies[2].Mass }, 2},
		{`body."rigger's cup".mass=2 kg`, func(m *model.Model) float64 { return m.Bodies[3].Mass }, 2},
		{`body.rigger's cup.mass=2 kg`, func(m *model.Model) float64 { return m.Bodies[3].Mass }, 2},
		{`body.3.mass=2 kg`, func(m *model.Model) float64 { return m.Bodies[3].Mass }, 2},
		{`deck.upper.radius=15 m`, func(m *model.Model) float64 { return deckNamed(m, "upper").Radius }, 15},
		{`deck.upper.opening."hatch 2".size=["1 m", "1.1 m"]`, func(m *model.Model) float64 { return deckNamed(m, "upper").Openings[0].Size[1] }, 1.1},
		{`crew_path.round.legs.0.speed=1 m/s`, func(m *model.Model) float64 { return m.Paths[0].Legs[0].Speed }, 1},
		{`crew_path.round.legs.1.stand=2 s`, func(m *model.Model) float64 { return m.Paths[0].Legs[1].Duration }, 2},
		{`limit.l.max=6 m`, func(m *model.Model) float64 { return m.Limits[0].Max.SI }, 6},
		{`limit.l.max_abs=7`, func(m *model.Model) float64 { return m.Limits[0].MaxAbs.SI }, 7},
		{`release_list.0.height=1 m`, func(m *model.Model) float64 { return releaseNamed(m, "from the list").At.Height }, 1.5},
		{`release_list.0.mass=2 kg`, func(m *model.Model) float64 { return float64(len(m.Releases)) }, 3},
		// Tables and keys that the file does not have.
		{`solver.max_time=2 h`, func(m *model.Model) float64 { return m.Solver.MaxTime }, 7200},
		{`output.step=0.02 s`, func(m *model.Model) float64 { return m.Output.Step }, 0.02},
		{`release.drop.until=2 s`, func(m *model.Model) float64 { return drop(m).Until.Duration }, 2},
		{`release.drop.throw.elevation=45 deg`, func(m *model.Model) float64 { return drop(m).Start.Elevation }, math.Pi / 4},
		{`crew.rigger.breadth=0.6 m`, func(m *model.Model) float64 { return m.Crews[0].Breadth }, 0.6},
	} {
		sets := []string{c.set}
		if strings.HasPrefix(c.set, "release_list.0.mass") {
			sets = append(sets, `release_list.0.diameter=1 cm`)
		}
		sc, err := loadSet(sets...)
		if err != nil {
			t.Errorf("--set %s: %v", c.set, err)
		} else if got := c.got(sc.Model); !near(got, c.want) {
			t.Errorf("--set %s gives %v, want %v", c.set, got, c.want)
		}
	}
}

func TestSettingsOfTextsAndWords(t *testing.T) {
	for _, c := range []struct {
		set, want string
		got       func(*scenarios.Scenario) string
	}{
		{`title=Second layout`, "Second layout", func(s *scenarios.Scenario) string { return s.Title }},
		{`title="Second = layout"`, "Second = layout", func(s *scenarios.Scenario) string { return s.Title }},
		{`title=Second "layout"`, `Second "layout"`, func(s *scenarios.Scenario) string { return s.Title }},
		{`title="ü\u00e9"`, "üé", func(s *scenarios.Scenario) string { return s.Title }},
		{`title=2024-05-01`, "2024-05-01", func(s *scenarios.Scenario) string { return s.Title }},
		{`title=`, "s", func(s *scenarios.Scenario) string { return s.Title }}, // the file's name
		{`notes=a#b`, "a#b", func(s *scenarios.Scenario) string { return s.Notes }},
		{`release.drop.until=landing`, "1", func(s *scenarios.Scenario) string {
			return fmt.Sprint(int(releaseNamed(s.Model, "drop").Until.Kind))
		}},
		{`limit.l.of=["release.drop","release.Öl"]`, "release.drop,release.Öl", func(s *scenarios.Scenario) string { return strings.Join(s.Model.Limits[0].Of, ",") }},
		{`limit.l.source=IR-12`, "IR-12", func(s *scenarios.Scenario) string { return s.Model.Limits[0].Source }},
	} {
		sc, err := loadSet(c.set)
		if err != nil {
			t.Errorf("--set %s: %v", c.set, err)
		} else if got := c.got(sc); got != c.want {
			t.Errorf("--set %s gives %q, want %q", c.set, got, c.want)
		}
	}
}

// TestLaterSettingsWin: settings apply in their order.
func TestLaterSettingsWin(t *testing.T) {
	sc, err := loadSet("habitat.spin=1 rad/s", "habitat.spin=2 rad/s")
	if err != nil || sc.Model.Habitat.Spin != 2 {
		t.Errorf("got %v (%v), want 2", sc, err)
	}
}

// TestSettingsReplaceTheOthersOfTheirGroup: one of an exclusive group takes
// the place of the others, whatever the file had.
func TestSettingsReplaceTheOthersOfTheirGroup(t *testing.T) {
	for _, c := range []struct {
		sets []string
		ok   func(*model.Model) bool
	}{
		{[]string{"habitat.spin=1 rad/s"}, func(m *model.Model) bool { return m.Habitat.Spin == 1 }},
		{[]string{"habitat.rim_speed=-18 m/s"}, func(m *model.Model) bool { return m.Habitat.Spin == -1 }},
		{[]string{"habitat.spin=1 rad/s", "habitat.rim_speed=36 m/s"}, func(m *model.Model) bool { return m.Habitat.Spin == 2 }},
		{[]string{"release.drop.velocity.up=2 m/s"}, func(m *model.Model) bool {
			s := releaseNamed(m, "drop").Start
			return s.Kind == model.Velocity && s.VUp == 2
		}},
		{[]string{"release.drop.still=true"}, func(m *model.Model) bool { return releaseNamed(m, "drop").Start.Kind == model.Still }},
		{[]string{"release.drop.still=false"}, func(m *model.Model) bool { return releaseNamed(m, "drop").Start.Kind == model.Thrown }},
		{[]string{`release.drop.carried={path="round"}`}, func(m *model.Model) bool { return releaseNamed(m, "drop").Carried != nil }},
		{[]string{`release.drop.carried.path=round`}, func(m *model.Model) bool { return releaseNamed(m, "drop").Carried != nil }},
		{[]string{"deck.upper.height=3 m"}, func(m *model.Model) bool { return deckNamed(m, "upper").Radius == 15 }},
		{[]string{"crew_path.round.legs.1.turn_head=90 deg"}, func(m *model.Model) bool { return m.Paths[0].Legs[1].Kind == model.TurnHead }},
		{[]string{"air.none=true"}, func(m *model.Model) bool { return m.Air.Density == 0 }},
		{[]string{"air.none=false"}, func(m *model.Model) bool { return m.Air.Density > 0 }},
		{[]string{"air.density=1.2 kg/m^3", "air.viscosity=2e-5 Pa s"}, func(m *model.Model) bool { return m.Air.Density == 1.2 && m.Air.Viscosity == 2e-5 }},
		{[]string{"air.none=true", "air.pressure=1 bar"}, func(m *model.Model) bool { return m.Air.Density > 0 }},
		{[]string{"release.drop.at.radius=16 m"}, func(m *model.Model) bool { return releaseNamed(m, "drop").At.HasRadius }},
		{[]string{"release.Öl.at.height=1 m"}, func(m *model.Model) bool {
			s := releaseNamed(m, "Öl").At
			return !s.HasRadius && s.Height == 1
		}},
	} {
		sc, err := loadSet(c.sets...)
		if err != nil {
			t.Errorf("%q: %v", c.sets, err)
		} else if !c.ok(sc.Model) {
			t.Errorf("%q: the model does not have it", c.sets)
		}
	}
}

// TestWrongSettings: errors name the setting, with a hint where one helps.
func TestWrongSettings(t *testing.T) {
	for _, c := range []struct{ set, want string }{
		{`habitat.spni=4 rpm`, "--set habitat.spni=4 rpm: the habitat has no key \"spni\"\n  hint: did you mean spin?"},
		{`habitt.spin=4 rpm`, "--set habitt.spin=4 rpm: the file has no key \"habitt\"\n  hint: did you mean habitat?"},
		{`colour=blue`, "--set colour=blue: the file has no key \"colour\""},
		{`release.dorp.at.height=2 m`, "--set release.dorp.at.height=2 m: no release named \"dorp\"\n  hint: did you mean \"drop\"?"},
		{`release.something else.at.height=2 m`, "--set release.something else.at.height=2 m: no release named \"something else\"\n  hint: there are \"drop\", \"Öl\""},
		{`release.2.at.height=2 m`, "--set release.2.at.height=2 m: no release named \"2\"\n  hint: there are \"drop\", \"Öl\""},
		{`release.-1.at.height=2 m`, "--set release.-1.at.height=2 m: no release named \"-1\"\n  hint: there are \"drop\", \"Öl\""},
		{`crew_path.round.legs.7.speed=1 m/s`, "--set crew_path.round.legs.7.speed=1 m/s: no legs named \"7\""},
		{`fixture.bench.turn=1 deg`, "--set fixture.bench.turn=1 deg: the scenario has no fixture"},
		{`release.drop=x`, "--set release.drop=x: wants a key of the entry, not the entry itself"},
		{`habitat.spin.x=1`, "--set habitat.spin.x=1: spin holds no keys"},
		{`habitat.spin`, "--set habitat.spin: wants KEY=VALUE, the parts of the key separated by points\n  hint: such as --set habitat.spin=\"4 rpm\""},
		{`=4 rpm`, "--set =4 rpm: wants KEY=VALUE, the parts of the key separated by points\n  hint: such as --set habitat.spin=\"4 rpm\""},
		{``, "--set : wants KEY=VALUE, the parts of the key separated by points\n  hint: such as --set habitat.spin=\"4 rpm\""},
		{`habitat..spin=4 rpm`, "--set habitat..spin=4 rpm: wants KEY=VALUE, the parts of the key separated by points\n  hint: such as --set habitat.spin=\"4 rpm\""},
		{`.habitat=4 rpm`, "--set .habitat=4 rpm: wants KEY=VALUE, the parts of the key separated by points\n  hint: such as --set habitat.spin=\"4 rpm\""},
		{`habitat.=4 rpm`, "--set habitat.=4 rpm: wants KEY=VALUE, the parts of the key separated by points\n  hint: such as --set habitat.spin=\"4 rpm\""},
		{`release."drop.at.height=2 m`, "--set release.\"drop.at.height=2 m: wants KEY=VALUE, the parts of the key separated by points\n  hint: such as --set habitat.spin=\"4 rpm\""},
		{`release.drop.carried.pth=x`, "--set release.drop.carried.pth=x: a carried release has no key \"pth\"\n  hint: did you mean path?"},
		{`release."drop"x.at.height=2 m`, "--set release.\"drop\"x.at.height=2 m: wants KEY=VALUE, the parts of the key separated by points\n  hint: such as --set habitat.spin=\"4 rpm\""},
		{`habitat.spin=fast`, "--set habitat.spin=fast: habitat.spin: wants an angular speed such as \"4 rpm\", got \"fast\""},
		{`habitat.spin=4`, "--set habitat.spin=4: habitat.spin: wants an angular speed in rpm, rad/s, deg/s, got the bare number 4\n  hint: write the unit: \"4 rpm\""},
		{`habitat.spin=`, "--set habitat.spin=: habitat.spin: wants an angular speed such as \"4 rpm\", got an empty text"},
		{`habitat.length=0 m`, "--set habitat.length=0 m: habitat.length: wants more than 0 m, got \"0 m\""},
		{`body."torque wrench".restitution=2`, "--set body.\"torque wrench\".restitution=2: body[0].restitution: wants a value from 0 to 1, got 2"},
		{`release.drop.at={height="2 m"`, "--set release.drop.at={height=\"2 m\": cannot read the value: not TOML: "},
		{`title="no end`, "--set title=\"no end: cannot read the value: not TOML: "},
		{"title=\"a\"\nformat = 1", "--set title=\"a\"\ufffdformat = 1: cannot read the value: wants one value"},
		{`format=2`, "--set format=2: format: wants 1, got 2"},
		{`release.drop.at.axial=9 m`, "--set release.drop.at.axial=9 m: release[0].at.axial: lies outside the bulkheads"},
		{`release.drop.body=wrench`, "--set release.drop.body=wrench: release[0].body: no body named \"wrench\""},
		{`air.density=1 kg/m^3`, "s.toml:7:2: air: air given by density and viscosity wants the key viscosity"},
	} {
		_, err := loadSet(c.set)
		if err == nil {
			t.Errorf("--set %s is taken", c.set)
		} else if got := err.Error(); got != c.want && !(strings.HasPrefix(got, c.want) && !strings.Contains(got, "\n")) {
			t.Errorf("--set %s: got\n%s\nwant\n%s", c.set, got, c.want)
		}
	}
}

// TestWrongSettingsComeAtOnce: several wrong settings, and what is wrong in
// the file, are told together.
func TestWrongSettingsComeAtOnce(t *testing.T) {
	src := strings.Replace(settable, `mass = "84 kg"`, `mass = "heavy"`, 1)
	_, err := scenarios.Load("s.toml", []byte(src), scenarios.Options{Sets: []string{"habitat.spni=1", "habitat.spin=fast", "nothing"}, ReadFile: readList})
	var got []string
	if err != nil {
		for _, line := range strings.Split(err.Error(), "\n") {
			if !strings.HasPrefix(line, "  hint: ") {
				got = append(got, line[:min(len(line), 24)])
			}
		}
	}
	want := []string{"--set habitat.spin=fast:", "--set habitat.spni=1: th", "--set nothing: wants KEY", "s.toml:47:8: crew[0].mas"}
	if !slices.Equal(got, want) {
		t.Errorf("got %q, want %q", got, want)
	}
}
