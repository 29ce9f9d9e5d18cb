package model_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// slack is what a place in a habitat of some tens of metres may be off by
// rounding, m: some hundred roundings.
const slack = 1e-12

func deg(x float64) model.Arc { return model.Arc{Value: x * math.Pi / 180, IsAngle: true} }

func arc(x float64) model.Arc { return model.Arc{Value: x} }

// habitats of every shape.
var (
	cylinder  = model.Habitat{Room: model.Room{FloorRadius: 18, CeilingRadius: 12.8, Length: 14}, Spin: 0.5}
	torus     = model.Habitat{Room: model.Room{Shape: model.Torus, FloorRadius: 18, TubeRadius: 2.5}, Spin: 0.5}
	flatTorus = model.Habitat{Room: model.Room{Shape: model.Torus, FloorRadius: 18, TubeRadius: 2.5, FlatFloor: true}, Spin: 0.5}
	sphere    = model.Habitat{Room: model.Room{Shape: model.Sphere, FloorRadius: 18}, Spin: 0.5}
	cabin     = model.Habitat{Room: model.Room{Shape: model.Cabin, FloorRadius: 18, Size: [3]float64{5, 4, 2.5}}, Spin: 0.5}
)

func room(name string, r model.Room) model.Room {
	r.Name = name
	return r
}

// build makes a model that must have no problems.
func build(t *testing.T, in model.Model) *model.Model {
	t.Helper()
	m, problems := model.New(in)
	for _, p := range problems {
		t.Errorf("%s: %s", p.Key, p.Msg)
	}
	if m == nil {
		t.FailNow()
	}
	return m
}

// named gives the surface nearest to a point.
func named(m *model.Model, p r3.Vec) string {
	return m.Interior.Surface(m.Interior.Contact(p).Surface).Name
}

func at(r, degrees, z float64) r3.Vec {
	return frame.Polar{R: r, Phi: degrees * math.Pi / 180, Z: z}.Vec()
}

// TestHabitatOfEveryShape tries the gap to the hull, and its name, at places
// of the habitat's own room.
func TestHabitatOfEveryShape(t *testing.T) {
	for _, c := range []struct {
		name string
		hab  model.Habitat
		at   r3.Vec
		gap  float64
		want string
	}{
		{"cylinder", cylinder, at(17.5, 50, 1), 0.5, "floor"},
		{"cylinder", cylinder, at(13, 50, 1), 0.2, "ceiling"},
		{"torus", torus, at(17.5, 50, 0), 0.5, "floor"},
		{"torus", torus, at(13.5, 50, 0), 0.5, "ceiling"},
		{"torus", torus, at(16.7, 50, 1.6), 0.5, "floor"}, // 3-4-5
		{"flat torus", flatTorus, at(17.9, 50, 1.2), 0.1, "floor"},
		{"flat torus", flatTorus, at(14, 50, 0), 0.5, "ceiling"},
		{"flat torus", flatTorus, at(17.26, 50, 1.68), 0.4, "wall +axial"}, // 3-4-5
		{"sphere", sphere, at(10.8, 50, 14.4), 0, "floor"},
		{"sphere", sphere, at(6, 50, -8), 8, "floor"},
		{"cabin", cabin, at(17.9, 0, 0.5), 0.1, "floor"},
		{"cabin", cabin, at(15.6, 0, 0.5), 0.1, "ceiling"},
		{"cabin", cabin, r3.Vec{X: 17, Y: 2.3}, 0.2, "spinward wall"},
		{"cabin", cabin, r3.Vec{X: 17, Z: -1.7}, 0.3, "bulkhead -axial"},
	} {
		m := build(t, model.Model{Habitat: c.hab})
		if got := m.Interior.Dist(c.at); math.Abs(got-c.gap) > slack {
			t.Errorf("%s: %v is %g m from the hull, want %g", c.name, c.at, got, c.gap)
		}
		if got := named(m, c.at); c.gap > 0 && got != c.want {
			t.Errorf("%s: nearest to %v is %q, want %q", c.name, c.at, got, c.want)
		}
	}
}

// TestRoomsJoin tries pairs of rooms with a passage of either section between
// them: from end to end its middle line is clear by half its width, and runs on
// into both rooms.
func TestRoomsJoin(t *testing.T) {
	hubs := map[string]model.Room{
		"cylinder": {FloorRadius: 3, Length: 8},
		"sphere":   {Shape: model.Sphere, FloorRadius: 3},
		"torus":    {Shape: model.Torus, FloorRadius: 6, TubeRadius: 1.5},
		"flat":     {Shape: model.Torus, FloorRadius: 6, TubeRadius: 2.5, FlatFloor: true},
		"cabin":    {Shape: model.Cabin, FloorRadius: 6, Size: [3]float64{4, 4, 3}, Spinward: deg(30)},
	}
	rims := map[string]model.Habitat{"cylinder": cylinder, "torus": torus, "flat torus": flatTorus}
	tops := map[string]float64{"cylinder": 12.8, "torus": 13, "flat torus": 13.5}
	for hubName, hub := range hubs {
		for rimName, rim := range rims {
			for _, round := range []bool{false, true} {
				p := model.Passage{Name: "spoke", Spinward: deg(30), FromRadius: hub.FloorRadius, ToRadius: tops[rimName], Width: 1.2}
				if round {
					p.Width, p.Diameter = 0, 1.2
				}
				m := build(t, model.Model{Habitat: rim, Rooms: []model.Room{room("hub", hub)}, Passages: []model.Passage{p}})
				low := math.Inf(1)
				for r := hub.FloorRadius - 1; r < p.ToRadius+1; r += 0.001 {
					q := at(r, 30, 0)
					low = math.Min(low, m.Interior.Dist(q))
					if !m.Interior.Inside(q) {
						t.Fatalf("%s to %s: %g m from the axis is outside", hubName, rimName, r)
					}
				}
				if math.Abs(low-0.6) > 1e-9 {
					t.Errorf("%s to %s, round %t: the middle line is clear by %g m, want 0.6", hubName, rimName, round, low)
				}
			}
		}
	}
}

// TestCabinAtTheEndOfAnArm tries a further room that is a cabin: its names,
// stations in it, and the way through the arm.
func TestCabinAtTheEndOfAnArm(t *testing.T) {
	c := room("cabin A", cabin.Room)
	c.FloorRadius, c.Spinward, c.Axial = 30, deg(90), 1
	m := build(t, model.Model{Habitat: cylinder, Rooms: []model.Room{c}, Passages: []model.Passage{
		{Name: "arm", Spinward: deg(90), Axial: 1, FromRadius: 18, ToRadius: 27.5, Diameter: 1},
	}})
	for _, s := range []struct {
		station model.Station
		want    r3.Vec
	}{
		{model.Station{Room: "cabin A", Height: 0.4}, r3.Vec{Y: 29.6, Z: 1}},
		{model.Station{Room: "cabin A", Spinward: arc(2), Axial: -1.5, Height: 1}, r3.Vec{X: -2, Y: 29, Z: -0.5}},
		{model.Station{Room: "cabin A", Spinward: deg(2), Height: 1}, r3.Vec{X: -30 * math.Tan(2*math.Pi/180), Y: 29, Z: 1}},
	} {
		p, err := m.Resolve(s.station)
		if err != nil {
			t.Fatal(err)
		}
		if off := r3.Norm(r3.Sub(p.Vec(), s.want)); off > slack {
			t.Errorf("%+v is at %v, want %v", s.station, p.Vec(), s.want)
		}
		if msg := m.Obstructed(p, 0.3); msg != "" {
			t.Errorf("%+v %s", s.station, msg)
		}
		if f := m.FlatBeneath(p.Vec()); f == nil || f.Name != "cabin A floor" {
			t.Errorf("%+v is over %+v", s.station, f)
		}
	}
	if got := named(m, r3.Vec{X: -2, Y: 29.9, Z: 0}); got != "cabin A floor" {
		t.Errorf("0.1 m above its floor the nearest is %q", got)
	}
	if m.FlatBeneath(at(17, 0, 0)) != nil {
		t.Error("the ring has a flat floor")
	}
	if _, err := m.Resolve(model.Station{Room: "cabin B"}); err == nil || err.Error() != `no room named "cabin B"` {
		t.Errorf("an unknown room: %v", err)
	}
}

// TestStationInHub tries a station in a round further room: its arc is on the
// floor there.
func TestStationInHub(t *testing.T) {
	hub := model.Room{Name: "hub", FloorRadius: 3, Length: 8, Axial: 0.5}
	m := build(t, model.Model{Habitat: cylinder, Rooms: []model.Room{hub}})
	p, err := m.Resolve(model.Station{Room: "hub", Spinward: arc(1.5), Axial: 1, Height: 0.7})
	if err != nil || math.Abs(p.R-2.3) > slack || math.Abs(p.Phi-0.5) > slack || math.Abs(p.Z-1.5) > slack {
		t.Errorf("%+v, %v", p, err)
	}
	if msg := m.Obstructed(p, 0.5); msg != "" {
		t.Error(msg)
	}
}

// TestFlatReferenceFloor tries the mapping of a habitat that is a cabin.
func TestFlatReferenceFloor(t *testing.T) {
	m := build(t, model.Model{Habitat: cabin})
	f := m.FlatDeck(0)
	if f == nil {
		t.Fatal("its floor is curved")
	}
	for _, want := range [][3]float64{{0, 0, 0}, {2, -1.5, 0.4}, {-2.4, 1, 2.4}} {
		p, err := m.Resolve(model.Station{Spinward: arc(want[0]), Axial: want[1], Height: want[2]})
		if err != nil {
			t.Fatal(err)
		}
		if pos := (r3.Vec{X: 18 - want[2], Y: want[0], Z: want[1]}); r3.Norm(r3.Sub(p.Vec(), pos)) > slack {
			t.Errorf("%v is at %v", want, p.Vec())
		}
		s, a, h := f.Place(p.Vec())
		if math.Abs(s-want[0])+math.Abs(a-want[1])+math.Abs(h-want[2]) > slack {
			t.Errorf("%v comes back as %g, %g, %g", want, s, a, h)
		}
		back := m.PlaceOf(p.Vec())
		if math.Abs(m.Arc(back)-want[0]) > slack || math.Abs(back.Height-want[2]) > slack || back.Deck != 0 {
			t.Errorf("%v is described as arc %g, height %g, deck %d", want, m.Arc(back), back.Height, back.Deck)
		}
	}
	if m.FlatDeck(0).Local().Up != (r3.Vec{X: -1}) {
		t.Errorf("up is %v", m.FlatDeck(0).Local().Up)
	}
	curved := build(t, model.Model{Habitat: cylinder})
	if curved.FlatDeck(0) != nil {
		t.Error("the floor of a cylinder is flat")
	}
}

// TestOpeningInFlatFloor tries that an opening in a cabin's floor is where the
// floor has a hole, for arcs given either way.
func TestOpeningInFlatFloor(t *testing.T) {
	for _, spinward := range []model.Arc{arc(1.4), {Value: math.Atan2(1.4, 18), IsAngle: true}} {
		floor := model.Deck{Name: "floor", Openings: []model.Opening{{Name: "hatch", Spinward: spinward, Axial: -0.5, Size: [2]float64{0.8, 1}}}}
		m := build(t, model.Model{Habitat: cabin, Decks: []model.Deck{floor}})
		for _, c := range []struct {
			u, v float64
			open bool
		}{{1.4, -0.5, true}, {1.01, -0.5, true}, {0.99, -0.5, false}, {1.79, -0.5, true}, {1.81, -0.5, false}, {1.4, -0.99, true}, {1.4, -1.01, false}} {
			p := frame.PolarOf(r3.Vec{X: 18, Y: c.u, Z: c.v})
			if open := m.Decks[0].OpeningAt(p.Phi, p.Z) != nil; open != c.open {
				t.Errorf("at %g, %g open: %t", c.u, c.v, open)
			}
			if free := m.Interior.Dist(r3.Vec{X: 18.02, Y: c.u, Z: c.v}) > 0; free != c.open {
				t.Errorf("at %g, %g free: %t", c.u, c.v, free)
			}
		}
	}
}

// TestDecksInTubes tries that a deck in a torus or sphere reaches the hull at
// both ends, and does not reach through it.
func TestDecksInTubes(t *testing.T) {
	for _, c := range []struct {
		name   string
		hab    model.Habitat
		radius float64
		half   float64
	}{
		{"torus", torus, 17, 2}, // 1.5 below the middle of the tube: 3-4-5
		{"torus, above", torus, 14, 2.5 * math.Sqrt(1-(1.45/2.5)*(1.45/2.5))},
		{"torus, widest", torus, 15.48, 2.5},
		{"flat torus", flatTorus, 17.5, 2},
		{"sphere", sphere, 10.8, 14.4},
	} {
		in := model.Deck{Name: "upper", Radius: c.radius, Thickness: 0.05, Whole: true}
		m := build(t, model.Model{Habitat: c.hab, Decks: []model.Deck{in}})
		d := &m.Decks[1]
		if math.Abs(d.Axial[1]-c.half) > slack || math.Abs(d.Axial[0]+c.half) > slack {
			t.Errorf("%s: the deck reaches from %g m to %g m, want %g", c.name, d.Axial[0], d.Axial[1], c.half)
		}
		for _, r := range []float64{c.radius, c.radius + 0.025, c.radius + 0.05} {
			for u := -1.0; u <= 1; u += 1.0 / 256 {
				q := at(r, 20, u*c.half)
				if gap := m.Interior.Dist(q); gap > slack {
					t.Fatalf("%s: a gap of %g m in the deck at %v", c.name, gap, q)
				}
				if out := m.Interior.Beyond(q); out > slack {
					t.Fatalf("%s: the deck reaches %g m through the hull at %v", c.name, out, q)
				}
			}
		}
		if got := m.DeckBeneath(frame.Polar{R: c.radius - 0.3, Phi: 1}); got != 1 {
			t.Errorf("%s: deck %d is beneath", c.name, got)
		}
	}
}

// TestThickFloorPierced tries a passage through a floor thicker than its own
// walls: they are made as thick, so that no slit is left.
func TestThickFloorPierced(t *testing.T) {
	hub := model.Room{Name: "hub", FloorRadius: 2, Length: 8}
	m := build(t, model.Model{Habitat: torus, Rooms: []model.Room{hub}, Decks: []model.Deck{{Name: "floor", Thickness: 0.6}},
		Passages: []model.Passage{{Name: "spoke", FromRadius: 2, ToRadius: 13, Width: 1.6}}})
	for _, rho := range []float64{2.55, 2.8, 3.05} {
		for z := 0.8; z < 1.6; z += 0.005 {
			if gap := m.Interior.Dist(r3.Vec{X: 15.5 - math.Sqrt(rho*rho-z*z), Z: z}); gap > slack {
				t.Fatalf("a slit of %g m beside the spoke, %g m from the middle of the tube and %g m aside", gap, rho, z)
			}
		}
	}
}

// TestFixturesStand tries boxes, walls and posts on floors of all kinds.
func TestFixturesStand(t *testing.T) {
	c := room("cabin A", cabin.Room)
	c.FloorRadius, c.Spinward = 30, deg(90)
	in := model.Model{Habitat: cylinder, Rooms: []model.Room{c, {Name: "hub", FloorRadius: 3, Length: 8}}}
	here := func(r string, s, a, h float64) model.Station {
		return model.Station{Room: r, Spinward: arc(s), Axial: a, Height: h}
	}
	in.Fixtures = []model.Fixture{
		{Name: "locker", At: here("cabin A", 1, 0.5, 0), Size: [3]float64{0.6, 0.4, 1}, Friction: model.None, Restitution: model.None},
		{Name: "rail", Kind: model.Post, From: here("cabin A", -2, 0, 0), To: here("cabin A", -2, 0, 2.5), Diameter: 0.1},
		{Name: "screen", Kind: model.Wall, From: here("cabin A", -0.5, -1, 0), To: here("cabin A", 0.5, -1, 0), Height: 2, Thickness: 0.05},
		{Name: "baffle", Kind: model.Wall, From: here("cabin A", 2, -2, 0), To: here("cabin A", 2, 2, 0), Height: 1, Thickness: 0.05},
		{Name: "bench", At: here("hub", 1.5, 0, 0), Size: [3]float64{0.6, 0.4, 0.5}},
		{Name: "bulkhead", Kind: model.Wall, From: here("", 0, -7, 0), To: here("", 0, 7, 0), Height: 5.2, Thickness: 0.05},
	}
	m := build(t, in)
	in1 := func(s, a, h float64) r3.Vec { return r3.Vec{X: -s, Y: 30 - h, Z: a} }
	for _, k := range []struct {
		at   r3.Vec
		gap  float64
		want string
	}{
		{in1(1, 0.5, 1.1), 0.1, "locker top"},
		{in1(1.5, 0.5, 0.5), 0.2, "locker spinward side"},
		{in1(1, 0.8, 0.5), 0.1, "locker +axial side"},
		{in1(-1.8, 0, 1.2), 0.15, "rail"},
		{in1(-0.2, -0.9, 1.2), 0.075, "screen"},
		{in1(0, -1, 2.1), 0.1, "screen"},
		{in1(1.9, 1, 0.5), 0.075, "baffle"},
		{frame.Polar{R: 2.4, Phi: 0.5}.Vec(), 0.1, "bench top"},
		{r3.Vec{X: 15, Y: 0.125, Z: 3}, 0.1, "bulkhead"},
	} {
		if gap := m.Interior.Dist(k.at); math.Abs(gap-k.gap) > slack || named(m, k.at) != k.want {
			t.Errorf("%v is %g m from %q, want %g from %q", k.at, gap, named(m, k.at), k.gap, k.want)
		}
	}
}

// TestPlacesPasteBack tries that a place, wherever it is, comes back as the
// station that it is described by, on the deck beneath.
func TestPlacesPasteBack(t *testing.T) {
	pod := room("pod", cabin.Room)
	pod.FloorRadius, pod.Spinward = 30, deg(90)
	trunk := model.Passage{Name: "trunk", Spinward: deg(90), FromRadius: 18, ToRadius: 27.5, Width: 1}
	for _, c := range []struct {
		name string
		in   model.Model
		at   []r3.Vec
	}{
		{"ring and pod", model.Model{Habitat: cylinder, Rooms: []model.Room{pod}, Passages: []model.Passage{trunk}},
			[]r3.Vec{at(15, 200, 3), {Y: 22}, {X: -2, Y: 29, Z: 1}, {X: 2.2, Y: 29.8}}},
		{"torus", model.Model{Habitat: torus}, []r3.Vec{at(16, 200, 2), at(13.2, 10, 0)}},
		{"cabin", model.Model{Habitat: cabin}, []r3.Vec{{X: 17, Y: 2, Z: 1}, {X: 17.9, Y: -2.4, Z: -1}}},
	} {
		m := build(t, c.in)
		for _, pos := range c.at {
			p := m.PlaceOf(pos)
			back, err := m.Resolve(model.Station{Deck: m.Decks[p.Deck].Name, Spinward: arc(m.Arc(p)), Axial: p.Z, Height: p.Height})
			if err != nil || r3.Norm(r3.Sub(back.Vec(), pos)) > slack {
				t.Errorf("%s: %v comes back as %v, %v", c.name, pos, back.Vec(), err)
			}
			if msg := m.Obstructed(back, 0.05); msg != "" {
				t.Errorf("%s: %v %s", c.name, pos, msg)
			}
		}
	}
}
