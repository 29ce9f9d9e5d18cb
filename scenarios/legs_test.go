package scenarios_test

import (
	"fmt"
	"math"
	"reflect"
	"strings"
	"testing"

	"offplumb/scenarios"
	"offplumb/sim/model"
	"offplumb/sim/study"
)

// someone is a person, and a path of the legs given that starts under a hatch.
func someone(legs string) string {
	return ring + "[[crew]]\nname = \"mate\"\nmass = \"84 kg\"\nstature = \"1.78 m\"\n" +
		"[[deck]]\nname = \"upper\"\nheight = \"2.6 m\"\n[[deck.opening]]\nname = \"hatch\"\nsize = [\"1.2 m\", \"1.2 m\"]\n" +
		"[[crew_path]]\nname = \"way\"\ncrew = \"mate\"\nlegs = [" + legs + "]\n"
}

// TestNewerLegs tries how legs other than walks and plain ladders are read.
func TestNewerLegs(t *testing.T) {
	deg := math.Pi / 180
	for _, c := range []struct {
		text string
		want model.Leg
	}{
		{`{ ride = { up = "5 m" }, speed = "2 m/s" }`, model.Leg{Kind: model.Ride, Up: 5, Speed: 2, Ramp: 0.5, Trapezoid: true}},
		{`{ ride = { up = "5 m" }, speed = "2 m/s", ramp = "3 s", profile = "smooth" }`, model.Leg{Kind: model.Ride, Up: 5, Speed: 2, Ramp: 3}},
		{`{ ride = { spinward = "-30 deg" }, speed = "2 m/s", profile = "trapezoid" }`,
			model.Leg{Kind: model.Ride, Round: &model.Arc{Value: -30 * deg, IsAngle: true}, Speed: 2, Ramp: 0.5, Trapezoid: true}},
		{`{ ride = { spinward = "12 m" }, speed = "2 m/s" }`, model.Leg{Kind: model.Ride, Round: &model.Arc{Value: 12}, Speed: 2, Ramp: 0.5, Trapezoid: true}},
		{`{ stand_up = "0.5 m" }`, model.Leg{Kind: model.StandUp, Distance: 0.5, Speed: 1, Ramp: 0.45}},
		{`{ stand_up = "0.5 m", speed = "0.8 m/s", ramp = "0.3 s", profile = "trapezoid" }`, model.Leg{Kind: model.StandUp, Distance: 0.5, Speed: 0.8, Ramp: 0.3, Trapezoid: true}},
		{`{ sit_down = "40 cm" }`, model.Leg{Kind: model.SitDown, Distance: 0.4, Speed: 1, Ramp: 0.45}},
		{`{ turn = "90 deg" }`, model.Leg{Kind: model.Turn, Angle: 90 * deg, Duration: 1, Ramp: 0.5}},
		{`{ turn = "-90 deg", over = "2 s" }`, model.Leg{Kind: model.Turn, Angle: -90 * deg, Duration: 2, Ramp: 0.5}},
		{`{ climb = "2 m", speed = "0.4 m/s", pitch = "60 deg", facing = "-axial" }`,
			model.Leg{Kind: model.Climb, Distance: 2, Speed: 0.4, Ramp: 0.5, Pitch: 60 * deg, Facing: model.MinusAxial}},
		{`{ climb = "2.6 m", speed = "0.4 m/s", through = "hatch", profile = "trapezoid" }`,
			model.Leg{Kind: model.Climb, Distance: 2.6, Speed: 0.4, Ramp: 0.5, Through: "hatch", Trapezoid: true}},
		{`{ climb = "9 m", speed = "0.4 m/s", head_first = true }`, model.Leg{Kind: model.Climb, Distance: 9, Speed: 0.4, Ramp: 0.5, HeadFirst: true}},
		{`{ walk = { spinward = "2 m" }, speed = "1 m/s", profile = "trapezoid" }`,
			model.Leg{Kind: model.Walk, Spinward: &model.Arc{Value: 2}, Speed: 1, Ramp: 0.5, Trapezoid: true}},
	} {
		m := made(t, someone(c.text))
		if got := m.Paths[0].Legs[0]; !reflect.DeepEqual(got, c.want) {
			t.Errorf("%s is read as %+v, want %+v", c.text, got, c.want)
		}
	}
}

// TestLegsThatDoNotFit tries keys that a kind of leg has no use for, and those
// that it lacks.
func TestLegsThatDoNotFit(t *testing.T) {
	for _, c := range []struct{ legs, says string }{
		{`{ ride = { up = "5 m" } }`, "a ride wants the key speed"},
		{`{ ride = { up = "5 m" }, speed = "1 m/s", facing = "spinward" }`, "facing: a ride has none"},
		{`{ ride = { up = "5 m", spinward = "1 m" }, speed = "1 m/s" }`, "wants only one of up or spinward"},
		{`{ ride = {}, speed = "1 m/s" }`, "wants one of up or spinward"},
		{`{ stand_up = "0.5 m", pitch = "60 deg" }`, "pitch: standing up has none"},
		{`{ sit_down = "0.5 m", over = "1 s" }`, "over: sitting down has none"},
		{`{ turn = "90 deg", speed = "1 m/s" }`, "speed: a turn has none"},
		{`{ turn = "90 deg", about = "axial" }`, "about: a turn has none"},
		{`{ stand = "1 s", ramp = "1 s" }`, "ramp: standing has none"},
		{`{ walk = { spinward = "2 m" }, speed = "1 m/s", through = "hatch" }`, "through: a walk has none"},
		{`{ turn_head = "1 rad", head_first = true }`, "head_first: a turn of the head has none"},
		{`{ climb = "1 m", speed = "1 m/s", pitch = "5 deg" }`, "pitch: wants"},
		{`{ climb = "1 m", speed = "1 m/s", pitch = "95 deg" }`, "pitch: wants"},
		{`{ climb = "1 m", speed = "1 m/s", profile = "steady" }`, `profile: wants`},
		{`{ climb = "2.6 m", speed = "1 m/s", through = "trap" }`, `through: no opening named "trap"`},
		{`{ sit_down = "-0.5 m" }`, "sit_down: wants"},
	} {
		err := problemsOf(someone(c.legs))
		if !strings.Contains(err, c.says) {
			t.Errorf("%s: %s\nwant %s", c.legs, err, c.says)
		}
	}
}

// problemsOf loads and prepares a scenario that has some.
func problemsOf(more string) string {
	sc, err := scenarios.Load("b.toml", []byte("format = 1\n"+more), scenarios.Options{})
	if err != nil {
		return err.Error()
	}
	if _, problems := study.Prepare(sc.Model); len(problems) > 0 {
		return sc.Problems(problems).Error()
	}
	return "no problem"
}

// TestLoadsAndLevels tries what a path carries, where it is held if that is not
// said, and the levels of gravity that it names.
func TestLoadsAndLevels(t *testing.T) {
	for _, c := range []struct {
		keys   string
		carry  model.Carry
		levels []float64
	}{
		{"", model.Carry{At: model.Reach{Height: 1}}, nil},
		{`carry = { mass = "9 kg" }`, model.Carry{Mass: 9, At: model.Reach{Height: 1}}, nil},
		{`carry = { mass = "9 kg", at = { spinward = "0.3 m" } }`, model.Carry{Mass: 9, At: model.Reach{Spinward: 0.3}}, nil},
		{`carry = { mass = "500 g", at = { axial = "-0.2 m", height = "1.2 m" } }`, model.Carry{Mass: 0.5, At: model.Reach{Axial: -0.2, Height: 1.2}}, nil},
		{`gravity_levels = ["0.1 g", "2 m/s^2"]`, model.Carry{At: model.Reach{Height: 1}}, []float64{0.1 * 9.80665, 2}},
	} {
		p := made(t, someone(`{ stand = "1 s" }`)+c.keys).Paths[0]
		if p.Carry != c.carry || len(p.GravityLevels) != len(c.levels) {
			t.Errorf("%s is read as %+v and %v, want %+v and %v", c.keys, p.Carry, p.GravityLevels, c.carry, c.levels)
			continue
		}
		for i, want := range c.levels {
			if math.Abs(p.GravityLevels[i]-want) > 2*rounding*want {
				t.Errorf("%s: level %.17g m/s^2, want %.17g", c.keys, p.GravityLevels[i], want)
			}
		}
	}
}

// TestEvery tries that a carried release by length or time is a series, in the
// place of the one that declares it, and that a problem of one of its releases
// is told at the file's.
func TestEvery(t *testing.T) {
	release := func(name, every, height string) string {
		return fmt.Sprintf("[[release]]\nname = %q\ncarried = { path = \"way\", %s, reach = { height = %q } }\n", name, every, height)
	}
	walk := someone(`{ walk = { spinward = "3 m" }, speed = "1 m/s" }`)
	before := "[[release]]\nname = \"first\"\nat = { height = \"1 m\" }\n"
	for _, c := range []struct {
		every string
		want  []string
	}{
		{`every = "1 m"`, []string{"slip at 0 m", "slip at 1 m", "slip at 2 m", "slip at 3 m"}},
		{`every = "200 cm"`, []string{"slip at 0 m", "slip at 2 m", "slip at 3 m"}},
		{`every = "2 s"`, []string{"slip at 0 s", "slip at 2 s", "slip at 3.5 s"}},
		{`time = "2 s"`, []string{"slip"}},
		{``, []string{"slip"}},
	} {
		text := walk + before + strings.ReplaceAll(release("slip", c.every, "1 m"), ", ,", ",")
		m := made(t, text)
		var got []string
		for i := range m.Releases[1:] {
			got = append(got, m.Releases[i+1].Name)
			if s := m.Releases[i+1].Series; (s == "slip") != (len(c.want) > 1) {
				t.Errorf("%s: %q is of series %q", c.every, m.Releases[i+1].Name, s)
			}
		}
		if !reflect.DeepEqual(got, c.want) || m.Releases[0].Name != "first" {
			t.Errorf("%s gives %q, want %q", c.every, got, c.want)
		}
	}
	text := walk + before + release("slip", `every = "1 m"`, "-1 m")
	line := 1 + strings.Count("format = 1\n"+text[:strings.Index(text, "carried")], "\n")
	if got, want := problemsOf(text), fmt.Sprintf("b.toml:%d:", line); !strings.HasPrefix(got, want) || !strings.Contains(got, "release[1].carried") {
		t.Errorf("a hand below the floor: %s, want a problem at %s release[1].carried", got, want)
	}
	for _, c := range []struct{ every, says string }{
		{`every = "0 m"`, "every: wants"}, {`every = "2 kg"`, "every: wants"}, {`every = "0.1 mm"`, "carried.every: gives more than 10000 releases along 3 m"},
		{`every = "1 m", time = "1 s"`, "wants only one of time or every"},
	} {
		if got := problemsOf(walk + before + release("slip", c.every, "1 m")); !strings.Contains(got, c.says) {
			t.Errorf("%s: %s, want %s", c.every, got, c.says)
		}
	}
}

// TestPlatformKeys tries how a spacing of platforms is read, and what is wrong
// with one.
func TestPlatformKeys(t *testing.T) {
	const spoke = "[habitat]\nfloor_radius = \"18 m\"\nspin = \"5 rpm\"\nlength = \"14 m\"\nceiling_radius = \"14 m\"\n" +
		"[[room]]\nname = \"hub\"\nfloor_radius = \"4 m\"\nlength = \"8 m\"\n" +
		"[[passage]]\nname = \"spoke\"\nfrom_radius = \"4 m\"\nto_radius = \"14 m\"\nwidth = \"1.5 m\"\n" +
		"[[body]]\nname = \"person\"\nmass = \"90 kg\"\ndiameter = \"0.5 m\"\n[[body]]\nname = \"crate\"\nmass = \"90 kg\"\ndiameter = \"1.6 m\"\n"
	platforms := func(passage, body, speed string) string {
		return spoke + fmt.Sprintf("[[platforms]]\nname = \"nets\"\npassage = %q\nbody = %q\nmax_speed = %q\n", passage, body, speed)
	}
	m := made(t, platforms("spoke", "person", "14.4 km/h")+"source = \"our study\"\n")
	want := model.Spacing{Name: "nets", Passage: "spoke", Body: "person", MaxSpeed: 4, Source: "our study"}
	if got := m.Spacings; len(got) != 1 || math.Abs(got[0].MaxSpeed-4) > 4*rounding*4 {
		t.Errorf("read as %+v, want %+v", got, want)
	} else if got[0].MaxSpeed = 4; got[0] != want {
		t.Errorf("read as %+v, want %+v", got[0], want)
	}
	for _, c := range []struct{ text, says string }{
		{platforms("trunk", "person", "4 m/s"), `platforms[0].passage: no passage named "trunk"`},
		{platforms("spoke", "cat", "4 m/s"), `platforms[0].body: no body named "cat"`},
		{platforms("spoke", "crate", "4 m/s"), `platforms[0].body: body "crate" does not fit into "spoke"`},
		{platforms("spoke", "person", "0 m/s"), "max_speed: wants"},
		{platforms("spoke", "person", "4 m/s") + "[[platforms]]\nname = \"nets\"\npassage = \"spoke\"\nbody = \"person\"\nmax_speed = \"4 m/s\"\n", "platforms[1].name"},
	} {
		if got := problemsOf(c.text); !strings.Contains(got, c.says) {
			t.Errorf("%s, want %s", got, c.says)
		}
	}
}

// TestLimitsOfTheHabitat tries the stature and the speed that a limit on the
// habitat is for.
func TestLimitsOfTheHabitat(t *testing.T) {
	limit := func(keys string) string {
		return ring + "[[limit]]\nname = \"l\"\nof = \"habitat\"\nmeasure = \"habitat.head_to_foot\"\nmax = 0.1\n" + keys
	}
	for _, c := range []struct {
		keys           string
		stature, speed float64
	}{{"", 0, 0}, {"stature = \"190 cm\"\n", 1.9, 0}, {"stature = \"1.5 m\"\nspeed = \"2 m/s\"\n", 1.5, 2}} {
		if l := made(t, limit(c.keys)).Limits[0]; math.Abs(l.Stature-c.stature) > 2*rounding*2 || l.Speed != c.speed || l.Max.SI != 0.1 || l.Max.Unit != "" {
			t.Errorf("%q is read as %+v", c.keys, l)
		}
	}
	for _, c := range []struct{ keys, says string }{{"stature = \"4 m\"\n", "stature: wants"}, {"speed = \"0 m/s\"\n", "speed: wants"}, {"stature = 1.9\n", "stature: wants"}} {
		if got := problemsOf(limit(c.keys)); !strings.Contains(got, c.says) {
			t.Errorf("%q: %s, want %s", c.keys, got, c.says)
		}
	}
}
