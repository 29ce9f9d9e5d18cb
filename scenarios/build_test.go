package scenarios_test

import (
	"crypto/sha256"
	"fmt"
	"math"
	"strings"
	"testing"

	"offplumb/scenarios"
	"offplumb/sim/air"
	"offplumb/sim/model"
)

// made loads a scenario of a habitat of 18 m and more text.
func made(t *testing.T, more string) *model.Model {
	t.Helper()
	sc, err := scenarios.Load("b.toml", []byte("format = 1\n"+more), scenarios.Options{})
	if err != nil {
		t.Fatalf("%s\n%v", more, err)
	}
	return sc.Model
}

const ring = "[habitat]\nfloor_radius = \"18 m\"\nspin = \"5.2 rpm\"\nlength = \"14 m\"\n"

// TestSpin: spin, floor gravity and rim speed are three ways to say the same;
// by gravity it is positive.
func TestSpin(t *testing.T) {
	const r = 18.0
	for _, c := range []struct {
		key  string
		want float64 // rad/s
	}{
		{`spin = "5.2 rpm"`, 5.2 * 2 * math.Pi / 60},
		{`spin = "-5.2 rpm"`, -5.2 * 2 * math.Pi / 60},
		{`spin = "0.5 rad/s"`, 0.5},
		{`spin = "0 rpm"`, 0},
		{`floor_gravity = "0.54 g"`, math.Sqrt(0.54 * 9.80665 / r)},
		{`floor_gravity = "4.5 m/s^2"`, 0.5},
		{`floor_gravity = "0 g"`, 0},
		{`rim_speed = "9 m/s"`, 0.5},
		{`rim_speed = "-9 m/s"`, -0.5},
		{`rim_speed = "36 km/h"`, 10 / r},
	} {
		m := made(t, "[habitat]\nfloor_radius = \"18 m\"\n"+c.key+"\n")
		// A division and a root round once more each than a conversion.
		if got := m.Habitat.Spin; math.Abs(got-c.want) > 2*rounding*math.Abs(c.want) {
			t.Errorf("%s gives %v rad/s, want %v", c.key, got, c.want)
		}
	}
}

func TestAir(t *testing.T) {
	const kelvin = 273.15
	for _, c := range []struct {
		keys string
		want air.Air
	}{
		{"", air.FromPressure(101325, 20+kelvin)},
		{"[air]\n", air.FromPressure(101325, 20+kelvin)},
		{"[air]\npressure = \"70 kPa\"\n", air.FromPressure(70e3, 20+kelvin)},
		{"[air]\ntemperature = \"22 °C\"\n", air.FromPressure(101325, 22+kelvin)},
		{"[air]\npressure = \"0.7 bar\"\ntemperature = \"300 K\"\n", air.FromPressure(70e3, 300)},
		{"[air]\ndensity = \"1.2 kg/m^3\"\nviscosity = \"1.8e-5 Pa s\"\n", air.Air{Density: 1.2, Viscosity: 1.8e-5}},
		{"[air]\nnone = true\n", air.Air{}},
		{"[air]\nnone = false\n", air.FromPressure(101325, 20+kelvin)},
		{"[air]\nnone = false\npressure = \"70 kPa\"\n", air.FromPressure(70e3, 20+kelvin)},
	} {
		got := made(t, ring+c.keys).Air
		// Conversions move the inputs by a few roundings, which viscosity
		// takes to the power 1.5 at most.
		const slack = 8 * rounding
		if math.Abs(got.Density-c.want.Density) > slack*c.want.Density || math.Abs(got.Viscosity-c.want.Viscosity) > slack*c.want.Viscosity {
			t.Errorf("%q gives %+v, want %+v", c.keys, got, c.want)
		}
	}
}

// TestFloorDeck: a deck named "floor" gives the reference floor its surface
// and openings and is no further deck.
func TestFloorDeck(t *testing.T) {
	m := made(t, ring+`[[deck]]
name = "floor"
friction = 0.7
restitution = 0.1
thickness = "10 cm"
[[deck.opening]]
name = "outer hatch"
axial = "2 m"
size = ["1 m", "0.8 m"]
coaming = "5 cm"
closed = true
`)
	if len(m.Decks) != 1 {
		t.Fatalf("there are %d decks, want 1", len(m.Decks))
	}
	d := m.Decks[0]
	if d.Name != "floor" || d.Radius != 18 || d.Friction != 0.7 || d.Restitution != 0.1 || d.Thickness != 0.1 || !d.Whole {
		t.Errorf("got %+v", d)
	}
	want := model.Opening{Name: "outer hatch", Axial: 2, Size: [2]float64{1, 0.8}, Coaming: 0.05, Closed: true}
	if len(d.Openings) != 1 || d.Openings[0] != want {
		t.Errorf("its openings are %+v, want %+v", d.Openings, want)
	}
}

func TestDecks(t *testing.T) {
	m := made(t, ring+`[[deck]]
name = "by height"
height = "2.6 m"
from = "-40 deg"
to = "10 m"
axial = ["-2 m", "3 m"]
[[deck]]
name = "by radius"
radius = "12 m"
`)
	floor, a, b := m.Decks[0], m.Decks[1], m.Decks[2]
	if floor.Radius != 18 || !math.IsNaN(floor.Friction) || floor.Thickness != model.DefaultThickness {
		t.Errorf("the floor is %+v", floor)
	}
	if !near(a.Radius, 18-2.6) || a.Whole || !a.From.IsAngle || !near(a.From.Value, -40*math.Pi/180) || a.To != (model.Arc{Value: 10}) || a.Axial != [2]float64{-2, 3} {
		t.Errorf("the first deck is %+v", a)
	}
	if b.Radius != 12 || !b.Whole || b.Axial != [2]float64{-7, 7} || b.Thickness != model.DefaultThickness || !math.IsNaN(b.Restitution) {
		t.Errorf("the second deck is %+v", b)
	}
}

func TestBodies(t *testing.T) {
	m := made(t, ring+`[[body]]
name = "plain"
mass = "1.4 kg"
diameter = "60 mm"
[[body]]
name = "all"
mass = "1 lb"
diameter = "0 m"
restitution = 0
friction = 1.5
rolls = true
drag_area = "40 cm^2"
drag_coefficient = 0.8
`)
	if got, want := m.Bodies[0], (model.Body{Name: "plain", Mass: 1.4, Diameter: 0.06, Restitution: 0.3, Friction: 0.4}); got != want {
		t.Errorf("got %+v, want %+v", got, want)
	}
	if got, want := m.Bodies[1], (model.Body{Name: "all", Mass: 0.45359237, Friction: 1.5, Rolls: true, DragArea: 0.004, DragCoefficient: 0.8}); got != want {
		t.Errorf("got %+v, want %+v", got, want)
	}
}

func TestReleases(t *testing.T) {
	const walk = `[[crew]]
name = "rigger"
mass = "84 kg"
stature = "1.78 m"
[[crew_path]]
name = "walk"
crew = "rigger"
legs = [{ walk = { spinward = "6 m" }, speed = "1 m/s" }]
`
	deg := math.Pi / 180
	at := model.Station{Height: 1.5}
	for _, c := range []struct {
		keys string
		want model.Release
	}{
		{`at = { height = "1.5 m" }`, model.Release{At: at}},
		{`at = { deck = "floor", spinward = "2 m", axial = "-1 m", height = "1.5 m" }`,
			model.Release{At: model.Station{Deck: "floor", Spinward: model.Arc{Value: 2}, Axial: -1, Height: 1.5}}},
		{`at = { spinward = "90 deg", radius = "10 m" }`,
			model.Release{At: model.Station{Spinward: model.Arc{Value: 90 * deg, IsAngle: true}, Radius: 10, HasRadius: true}}},
		{"at.height = \"1.5 m\"\ntime = \"1 min\"", model.Release{At: at, Time: 60}},
		{"at.height = \"1.5 m\"\nuntil = \"rest\"", model.Release{At: at}},
		{"at.height = \"1.5 m\"\nuntil = \"landing\"", model.Release{At: at, Until: model.Until{Kind: model.UntilLanding}}},
		{"at.height = \"1.5 m\"\nuntil = \"500 ms\"", model.Release{At: at, Until: model.Until{Kind: model.UntilDuration, Duration: 0.5}}},
		{"at.height = \"1.5 m\"\nthrow = { speed = \"3 m/s\" }", model.Release{At: at, Start: model.Start{Kind: model.Thrown, Speed: 3}}},
		{"at.height = \"1.5 m\"\nthrow = { speed = \"3 m/s\", heading = \"30 deg\", elevation = \"-90 deg\" }",
			model.Release{At: at, Start: model.Start{Kind: model.Thrown, Speed: 3, Heading: 30 * deg, Elevation: -90 * deg}}},
		{"at.height = \"1.5 m\"\nvelocity = { spinward = \"1 m/s\", up = \"2 m/s\" }",
			model.Release{At: at, Start: model.Start{Kind: model.Velocity, VSpinward: 1, VUp: 2}}},
		{"at.height = \"1.5 m\"\nstill = true", model.Release{At: at, Start: model.Start{Kind: model.Still}}},
		{"at.height = \"1.5 m\"\nstill = false", model.Release{At: at}},
		{"at.height = \"1.5 m\"\nstill = false\nvelocity = { up = \"2 m/s\" }",
			model.Release{At: at, Start: model.Start{Kind: model.Velocity, VUp: 2}}},
	} {
		m := made(t, ring+"[[release]]\nname = \"r\"\n"+c.keys+"\n")
		c.want.Name = "r"
		if got := m.Releases[0]; got != c.want {
			t.Errorf("%s\ngives %+v\nwant  %+v", c.keys, got, c.want)
		}
	}
	m := made(t, ring+walk+"[[release]]\nname = \"r\"\ncarried = { path = \"walk\", time = \"2 s\", reach = { spinward = \"0.4 m\", height = \"1.1 m\" } }\n")
	want := model.Carried{Path: "walk", Time: 2, Reach: model.Reach{Spinward: 0.4, Height: 1.1}}
	if got := m.Releases[0]; got.Carried == nil || *got.Carried != want {
		t.Errorf("got %+v, want it carried by %+v", got, want)
	}
}

func TestLegs(t *testing.T) {
	num := func(p *float64) string {
		if p == nil {
			return "-"
		}
		return fmt.Sprint(*p)
	}
	show := func(l model.Leg) string {
		to := "-"
		if l.Spinward != nil {
			to = fmt.Sprintf("%g %t", l.Spinward.Value, l.Spinward.IsAngle)
		}
		axial := num(l.Axial)
		l.Spinward, l.Axial = nil, nil
		return fmt.Sprintf("to %s, %s: %+v", to, axial, l)
	}
	arc, z := model.Arc{Value: 3}, -1.5
	turn := model.Arc{Value: math.Pi / 2, IsAngle: true}
	for _, c := range []struct {
		leg  string
		want model.Leg
	}{
		{`{ walk = { spinward = "3 m" }, speed = "1 m/s" }`, model.Leg{Kind: model.Walk, Spinward: &arc, Speed: 1, Ramp: 0.5}},
		{`{ walk = { spinward = "90 deg" }, speed = "1 m/s", ramp = "0 s" }`, model.Leg{Kind: model.Walk, Spinward: &turn, Speed: 1}},
		{`{ walk = { axial = "-1.5 m" }, speed = "3.6 km/h", ramp = "1 s" }`, model.Leg{Kind: model.Walk, Axial: &z, Speed: 1, Ramp: 1}},
		{`{ walk = { laps = -2, axial = "-1.5 m" }, speed = "1 m/s" }`, model.Leg{Kind: model.Walk, Axial: &z, Laps: -2, Speed: 1, Ramp: 0.5}},
		{`{ stand = "2 s" }`, model.Leg{Kind: model.Stand, Duration: 2, Ramp: 0.5}},
		{`{ climb = "2 m", speed = "0.5 m/s" }`, model.Leg{Kind: model.Climb, Distance: 2, Speed: 0.5, Ramp: 0.5}},
		{`{ climb = "2 m", speed = "0.5 m/s", facing = "-axial" }`, model.Leg{Kind: model.Climb, Distance: 2, Speed: 0.5, Ramp: 0.5, Facing: model.MinusAxial}},
		{`{ turn_head = "90 deg" }`, model.Leg{Kind: model.TurnHead, Angle: math.Pi / 2, Duration: 1, Ramp: 0.5}},
		{`{ turn_head = "90 deg", about = "axial", over = "500 ms" }`, model.Leg{Kind: model.TurnHead, Angle: math.Pi / 2, Duration: 0.5, Ramp: 0.5, About: model.AboutAxial}},
	} {
		m := made(t, ring+"[[crew]]\nname = \"c\"\nmass = \"84 kg\"\nstature = \"1.78 m\"\n[[crew_path]]\nname = \"p\"\ncrew = \"c\"\nlegs = ["+c.leg+"]\n")
		if got := show(m.Paths[0].Legs[0]); got != show(c.want) {
			t.Errorf("%s\ngives %s\nwant  %s", c.leg, got, show(c.want))
		}
	}
}

func TestCrew(t *testing.T) {
	m := made(t, ring+`[[crew]]
name = "a"
mass = "84 kg"
stature = "1.78 m"
[[crew]]
name = "b"
mass = "60 kg"
stature = "160 cm"
breadth = "0.4 m"
waist = 0.5
head = 0.9
`)
	want := []model.Crew{{Name: "a", Mass: 84, Stature: 1.78, Breadth: 0.5, Waist: 0.55, Head: 0.93},
		{Name: "b", Mass: 60, Stature: 1.6, Breadth: 0.4, Waist: 0.5, Head: 0.9}}
	for i := range want {
		if m.Crews[i] != want[i] {
			t.Errorf("got %+v, want %+v", m.Crews[i], want[i])
		}
	}
}

func TestLimits(t *testing.T) {
	m := made(t, ring+`[[limit]]
name = "a"
of = ["release.*", "habitat"]
measure = "landings.deflection"
min = "-80 cm"
max = 0.5
max_abs = "45 deg"
warn_min = "1 g"
warn_max = "2 kg"
source = "IR-12"
[[limit]]
name = "b"
of = "release.x"
measure = "landings.surface"
surface_in = ["floor"]
surface_not_in = "upper"
falls_through_not = ["hatch"]
`)
	a, b := m.Limits[0], m.Limits[1]
	for _, c := range []struct {
		key  string
		got  *model.Quantity
		si   float64
		unit string
	}{
		{"min", a.Min, -0.8, "m"}, {"max", a.Max, 0.5, ""}, {"max_abs", a.MaxAbs, math.Pi / 4, "rad"}, {"warn_min", a.WarnMin, 9.80665, "m/s^2"}, {"warn_max", a.WarnMax, 2, "kg"},
	} {
		if c.got == nil || !near(c.got.SI, c.si) || c.got.Unit != c.unit {
			t.Errorf("%s is %+v, want %g %s", c.key, c.got, c.si, c.unit)
		}
	}
	if s := strings.Join(a.Of, " ") + " " + a.Measure + " " + a.Source; s != "release.* habitat landings.deflection IR-12" {
		t.Errorf("the first is %s", s)
	}
	if s := fmt.Sprint(b.SurfaceIn, b.SurfaceNotIn, b.FallsThroughNot, b.Min); s != "[floor] [upper] [hatch] <nil>" {
		t.Errorf("the second has %s", s)
	}
}

func TestDefaultsOfSettings(t *testing.T) {
	m := made(t, ring)
	if want := (model.Solver{RelTol: 1e-9, PosTol: 1e-12, VelTol: 1e-12, MaxTime: 3600}); m.Solver != want {
		t.Errorf("the solver is %+v, want %+v", m.Solver, want)
	}
	if m.Output.Step != 0.01 {
		t.Errorf("the step is %g s, want 10 ms", m.Output.Step)
	}
	if m.Habitat.Length != 14 || m.Habitat.CeilingRadius != 0 {
		t.Errorf("the habitat is %+v", m.Habitat)
	}
}

// TestScenario: what a scenario says beside its model.
func TestScenario(t *testing.T) {
	const src = "format = 1\n" + ring + `[[sweep]]
name = "s"
key = "habitat.spin"
values = ["4 rpm"]
measures = "habitat.rim_speed"
[[release]]
name = "r"
at = { height = "1 m" }
[[scatter]]
name = "c"
of = "r"
samples = 10
vary = { "at.height" = { normal = ["1 m", "1 cm"] } }
[[landing_map]]
name = "m"
over = {}
heights = ["1 m"]
step = "1 m"
cell = "1 m"
[[throw_to]]
name = "t"
from = { height = "1 m" }
target = { spinward = "1 m" }
least_speed = true
`
	sc, err := scenarios.Load("dir/my ring.toml", []byte(src), scenarios.Options{})
	if err != nil {
		t.Fatal(err)
	}
	if sc.Title != "my ring" || sc.Model.Title != "my ring" || sc.Name != "dir/my ring.toml" {
		t.Errorf("title %q, of the model %q, name %q", sc.Title, sc.Model.Title, sc.Name)
	}
	want := scenarios.Input{Name: "dir/my ring.toml", SHA256: fmt.Sprintf("%x", sha256.Sum256([]byte(src)))}
	if len(sc.Inputs) != 1 || sc.Inputs[0] != want {
		t.Errorf("inputs %+v, want %+v", sc.Inputs, want)
	}
	if got, want := fmt.Sprint(sc.Studies), "[{scatter c} {sweep s} {throw_to t} {landing_map m}]"; got != want {
		t.Errorf("studies %s, want %s", got, want)
	}
}

// TestTitleAndNotes: both are kept as written.
func TestTitleAndNotes(t *testing.T) {
	sc, err := scenarios.Load("x.toml", []byte("format = 1\ntitle = \"Ring 2\"\nnotes = \"\"\"\nTwo\nlines\"\"\"\n"+ring), scenarios.Options{})
	if err != nil || sc.Title != "Ring 2" || sc.Notes != "Two\nlines" {
		t.Errorf("got %+v (%v)", sc, err)
	}
}

// TestPlacesOfProblems: problems of later stages find the value they are
// about, or what is nearest above it.
func TestPlacesOfProblems(t *testing.T) {
	const src = "format = 1\n" + ring + `[[release]]
name = "a"
at = { axial = "1 m",
  height = "1 m" }
[[release]]
name = "b"
[release.at]
height = "1 m"
`
	sc, err := scenarios.Load("x", []byte(src), scenarios.Options{})
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range []struct{ key, want string }{
		{"habitat.floor_radius", "x:3:16: habitat.floor_radius: m"},
		{"habitat.ceiling_radius", "x:2:2: habitat.ceiling_radius: m"},
		{"habitat", "x:2:2: habitat: m"},
		{"release[0].name", "x:7:8: release[0].name: m"},
		{"release[0].at.axial", "x:8:16: release[0].at.axial: m"},
		{"release[0].at.height", "x:9:12: release[0].at.height: m"},
		{"release[0].at.deck", "x:8:6: release[0].at.deck: m"},
		{"release[1].at.height", "x:13:10: release[1].at.height: m"},
		{"release[1].at", "x:12:10: release[1].at: m"},
		{"release[1].throw.speed", "x:10:3: release[1].throw.speed: m"},
		{"release[7]", "x:1:1: release[7]: m"},
		{"air.density", "x:1:1: air.density: m"},
		{"", "x:1:1: m"},
	} {
		if got := sc.Problems([]model.Problem{{Key: c.key, Msg: "m"}}).Error(); got != c.want {
			t.Errorf("%q: got %q, want %q", c.key, got, c.want)
		}
	}
	both := sc.Problems([]model.Problem{{Key: "release[1].at", Msg: "later"}, {Key: "habitat", Msg: "first", Hint: "why"}})
	if got, want := both.Error(), "x:2:2: habitat: first\n  hint: why\nx:12:10: release[1].at: later"; got != want {
		t.Errorf("got %q, want %q", got, want)
	}
}
