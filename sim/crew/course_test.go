package crew_test

import (
	"math"
	"strings"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/crew"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// feet gives the place of the feet at a time, m in habitat components.
func feet(p *crew.Plan, t float64) r3.Vec {
	f := p.At(t)
	return frame.Polar{R: f.R, Phi: f.Phi, Z: f.Z}.Vec()
}

// facings are the ways to face with the direction (spinward, axial) of each.
var facings = []struct {
	facing          model.Direction
	spinward, axial float64
}{{model.Spinward, 1, 0}, {model.Antispinward, -1, 0}, {model.PlusAxial, 0, 1}, {model.MinusAxial, 0, -1}}

// TestPitchedLadderIsStraight tries that the feet on a pitched ladder go along
// a straight line of the habitat, up toward where the person faces, at the
// pitch above the deck at its start, as far as the leg says; and that whoever
// descends goes down the same line.
func TestPitchedLadderIsStraight(t *testing.T) {
	const r, phi, z, long = 18.0, 2.9, -1.5, 4.0 // across the half turn, where angles wrap
	start := model.Station{Spinward: model.Arc{Value: phi, IsAngle: true}, Axial: z}
	for _, pitch := range []float64{0.2, 0.7, 1.3, 1.5} {
		for _, c := range facings {
			leg := model.Leg{Kind: model.Climb, Distance: long, Speed: 0.4, Ramp: 0.5, Facing: c.facing, Pitch: pitch}
			_, p := plan(t, r, 0.5, rigger(), start, leg)
			sin, cos := math.Sincos(pitch)
			way := frame.LocalAt(phi).Vec(cos*c.spinward, cos*c.axial, sin)
			from := frame.Polar{R: r, Phi: phi, Z: z}.Vec()
			for k := 0.0; k <= 16; k++ {
				at := p.Duration() * k / 16
				want := r3.Add(from, r3.Scale(p.At(at).Along, way))
				if got := feet(p, at); off(got, want) > 16*epsilon*r {
					t.Fatalf("pitch %g facing %d: after %g s at %v, want %v", pitch, c.facing, at, got, want)
				}
			}
			if got := p.At(p.Duration()).Along; math.Abs(got-long) > 4*epsilon*long {
				t.Errorf("pitch %g: goes %.17g m, want %g", pitch, got, long)
			}
		}
	}
}

// TestPitchedDescentGoesBack tries that a descent begins where it is and goes
// backward and down: away from where the person faces.
func TestPitchedDescentGoesBack(t *testing.T) {
	const r, from, long, pitch = 18.0, 12.0, 3.0, 1.1
	for _, c := range facings {
		leg := model.Leg{Kind: model.Descend, Distance: long, Speed: 0.4, Ramp: 0.5, Facing: c.facing, Pitch: pitch}
		_, p := plan(t, r, 0.5, rigger(), model.Station{HasRadius: true, Radius: from}, leg)
		sin, cos := math.Sincos(pitch)
		want := r3.Add(r3.Vec{X: from}, frame.LocalAt(0).Vec(-long*cos*c.spinward, -long*cos*c.axial, -long*sin))
		if got := feet(p, p.Duration()); off(got, want) > 16*epsilon*r {
			t.Errorf("facing %d: ends at %v, want %v", c.facing, got, want)
		}
	}
}

// TestSteepestPitchIsRadial tries that a ladder of 90 deg is the one without a
// pitch.
func TestSteepestPitchIsRadial(t *testing.T) {
	leg := model.Leg{Kind: model.Climb, Distance: 3, Speed: 0.4, Ramp: 0.5, Pitch: math.Pi / 2}
	m, p := plan(t, 18, 0.5, rigger(), model.Station{}, leg)
	leg.Pitch = 0
	_, q := plan(t, 18, 0.5, rigger(), model.Station{}, leg)
	a, b := p.Loads(m, 3), q.Loads(m, 3)
	if a.Feet.R != b.Feet.R || a.Feet.Phi != b.Feet.Phi || math.Abs(a.Pull-b.Pull)+math.Abs(a.AlongLadder-b.AlongLadder) > some*a.Weight {
		t.Errorf("at 90 deg %+v, without a pitch %+v", a, b)
	}
}

// TestRideAlongTheRing tries that a ride along the ring keeps its radius and
// its axial place, to the angle or the arc that it is given, and that one
// inward or outward keeps its angle.
func TestRideAlongTheRing(t *testing.T) {
	const r, inner, z = 20.0, 15.0, 2.0
	start := model.Station{HasRadius: true, Radius: inner, Axial: z, Spinward: model.Arc{Value: 1, IsAngle: true}}
	for _, c := range []struct {
		name   string
		ride   model.Leg
		r, phi float64
		long   float64
	}{
		{"an arc", model.Leg{Round: &model.Arc{Value: 30}}, inner, 1 + 30/inner, 30},
		{"an angle", model.Leg{Round: &model.Arc{Value: -7, IsAngle: true}}, inner, -6, 7 * inner},
		{"up", model.Leg{Up: 6}, inner - 6, 1, 6},
		{"down", model.Leg{Up: -4}, inner + 4, 1, 4},
	} {
		leg := c.ride
		leg.Kind, leg.Speed, leg.Ramp, leg.Trapezoid = model.Ride, 2, 1.5, true
		_, p := plan(t, r, 0.4, rigger(), start, leg)
		for k := 0.0; k <= 10; k++ {
			f := p.At(p.Duration() * k / 10)
			if leg.Round != nil && (f.R != inner || f.VR != 0 || f.AR != 0) || leg.Round == nil && (f.Phi != 1 || f.VPhi != 0) || f.Z != z {
				t.Fatalf("%s: leaves its way: %+v", c.name, f)
			}
		}
		f := p.At(p.Duration())
		if math.Abs(f.R-c.r) > 8*epsilon*r || math.Abs(f.Phi-c.phi) > 8*epsilon*10 || math.Abs(p.Length()-c.long) > 8*epsilon*c.long {
			t.Errorf("%s: ends at %g m, %g rad after %g m, want %g, %g, %g", c.name, f.R, f.Phi, p.Length(), c.r, c.phi, c.long)
		}
		if want := c.long/2 + 1.5; math.Abs(p.Duration()-want) > 8*epsilon*want {
			t.Errorf("%s: takes %g s, want %g", c.name, p.Duration(), want)
		}
	}
}

// house is a ring of 18 m with a deck 2.7 m up and a hatch in it 1 m spinward.
func house(legs ...model.Leg) model.Model {
	who := rigger()
	return model.Model{
		Habitat: model.Habitat{Room: model.Room{FloorRadius: 18, Length: 14}, Spin: 0.5},
		Decks: []model.Deck{{Name: "upper", Radius: 15.3, Thickness: 0.05, Whole: true, Friction: model.None, Restitution: model.None,
			Openings: []model.Opening{{Name: "hatch", Spinward: model.Arc{Value: 1.0 / 15.3, IsAngle: true}, Axial: 0.5, Size: [2]float64{0.9, 0.8}}}}},
		Crews: []model.Crew{who},
		Paths: []model.Path{{Name: "path", Crew: who.Name, Start: model.Station{Spinward: model.Arc{Value: 1.0 / 15.3, IsAngle: true}, Axial: 0.5}, Legs: legs}},
	}
}

// planIn works out the path of a model, with its problems.
func planIn(t *testing.T, in model.Model) (*crew.Plan, []model.Problem) {
	t.Helper()
	m, problems := model.New(in)
	for _, p := range problems {
		t.Fatalf("%s: %s", p.Key, p.Msg)
	}
	return crew.NewPlan(m, &m.Paths[0])
}

// TestThroughHatch tries the check of a climb through an opening: that there is
// one of the name, that the way crosses its deck, and that the shoulders have
// room where it does, each way across.
func TestThroughHatch(t *testing.T) {
	up := model.Leg{Kind: model.Climb, Distance: 2.7, Speed: 0.4, Ramp: 0.5, Through: "hatch"}
	for _, c := range []struct {
		name   string
		change func(in *model.Model)
		says   string // "": no problem
	}{
		{"in its middle", func(*model.Model) {}, ""},
		{"another name", func(in *model.Model) { in.Paths[0].Legs[0].Through = "trap" }, `no opening named "trap"`},
		{"too short a climb", func(in *model.Model) { in.Paths[0].Legs[0].Distance = 2.6 }, `does not cross deck "upper"`},
		{"as broad as it leaves", func(in *model.Model) { in.Crews[0].Breadth = 0.8 - 1e-9 }, ""},
		{"broader", func(in *model.Model) { in.Crews[0].Breadth = 0.8 + 1e-9 }, `"hatch" leaves 0.4 m to its rim`},
		{"near its spinward rim", func(in *model.Model) { in.Paths[0].Start.Spinward.Value += 0.21 / 15.3 }, `leaves 0.24 m to its rim`},
		{"near its axial rim", func(in *model.Model) { in.Paths[0].Start.Axial -= 0.16 }, `leaves 0.24 m to its rim`},
		{"a turn later", func(in *model.Model) { in.Paths[0].Start.Spinward.Value += 2 * math.Pi }, ""},
	} {
		in := house(up)
		c.change(&in)
		_, problems := planIn(t, in)
		switch {
		case c.says == "" && len(problems) > 0:
			t.Errorf("%s: %+v", c.name, problems)
		case c.says != "" && (len(problems) == 0 || problems[0].Key != "legs[0].through" || !strings.Contains(problems[0].Msg, c.says)):
			t.Errorf("%s: %+v, want one that says %s", c.name, problems, c.says)
		}
	}
}

// TestPitchedThroughHatch tries that on a pitched ladder the shoulders are held
// against the opening from where the head passes it to where the feet do, a
// stature times the cotangent of the pitch apart, and not where the climb ends.
func TestPitchedThroughHatch(t *testing.T) {
	const pitch, past, wide = 1.2, 1.5, 2.0 // rad; m climbed on after the deck; m, the hatch
	spread, room := 1.78/math.Tan(pitch), wide/2-model.DefaultBreadth/2
	for _, way := range []float64{1, -1} {
		for _, c := range []struct {
			name string
			feet float64 // m, where they pass the deck, from the hatch's middle toward where the person faces
			ok   bool
		}{
			{"in the middle", spread / 2, true},
			{"head near the rim", spread - room + 1e-9, true},
			{"head too near", spread - room - 1e-9, false},
			{"feet near the rim", room - 1e-9, true},
			{"feet too near", room + 1e-9, false},
		} {
			facing := model.PlusAxial
			if way < 0 {
				facing = model.MinusAxial
			}
			in := house(model.Leg{Kind: model.Climb, Distance: 2.7/math.Sin(pitch) + past, Speed: 0.4, Ramp: 0.5, Pitch: pitch, Facing: facing, Through: "hatch"})
			in.Decks[0].Openings[0].Size[1] = wide
			// Along the axis height is as good as distance from it.
			in.Paths[0].Start.Axial += way * (c.feet - 2.7/math.Tan(pitch))
			if _, problems := planIn(t, in); c.ok != (len(problems) == 0) {
				t.Errorf("facing %d, %s: %+v", facing, c.name, problems)
			}
		}
	}
}

// TestHeadFirstThroughHatch tries the same for someone who goes down head
// first: the head, outward of the feet, passes while these are still as far up.
func TestHeadFirstThroughHatch(t *testing.T) {
	const pitch, wide, from = 1.2, 2.0, 13.3 // rad; m, the hatch; m, where the feet start
	spread, room := 1.78/math.Tan(pitch), wide/2-model.DefaultBreadth/2
	for _, c := range []struct {
		name string
		feet float64
		ok   bool
	}{
		{"in the middle", -spread / 2, true},
		{"head near the rim", room - spread - 1e-9, true},
		{"head too near", room - spread + 1e-9, false},
		{"feet near the rim", -room + 1e-9, true},
		{"feet too near", -room - 1e-9, false},
	} {
		in := house(model.Leg{Kind: model.Descend, Distance: (15.4 - from) / math.Sin(pitch), Speed: 0.4, Ramp: 0.5, Pitch: pitch,
			Facing: model.PlusAxial, Through: "hatch", HeadFirst: true})
		in.Decks[0].Openings[0].Size[1] = wide
		start := &in.Paths[0].Start
		start.HasRadius, start.Radius = true, from
		start.Axial += c.feet + (15.3-from)/math.Tan(pitch)
		if _, problems := planIn(t, in); c.ok != (len(problems) == 0) {
			t.Errorf("%s: %+v", c.name, problems)
		}
	}
}

// TestClimbJoinsDeck tries that a climb or a ride that ends level with a deck,
// within a millimetre, joins it: the feet arrive on it without a jump, and a
// walk goes on from there.
func TestClimbJoinsDeck(t *testing.T) {
	for _, c := range []struct {
		name string
		leg  model.Leg
	}{
		{"climb", model.Leg{Kind: model.Climb, Distance: 2.7}},
		{"climb a little short", model.Leg{Kind: model.Climb, Distance: 2.6995}},
		{"climb a little far", model.Leg{Kind: model.Climb, Distance: 2.7005}},
		{"ride", model.Leg{Kind: model.Ride, Up: 2.6995}},
		{"pitched", model.Leg{Kind: model.Climb, Distance: 2.6995 / math.Sin(1.4), Pitch: 1.4, Facing: model.PlusAxial}},
	} {
		c.leg.Speed, c.leg.Ramp = 0.4, 0.5
		in := house(c.leg, model.Leg{Kind: model.Stand, Duration: 1}, walk(1.6, 1, 0.5, false))
		in.Decks[0].Openings[0].Size[1] = 2
		p, problems := planIn(t, in)
		if len(problems) > 0 {
			t.Errorf("%s: %+v", c.name, problems)
			continue
		}
		at := p.Joints()[1]
		if gap := off(feet(p, at), feet(p, at+1e-9)); gap > 1e-12 {
			t.Errorf("%s: the feet jump by %g m where they join the deck", c.name, gap)
		}
		if end := p.At(p.Duration()); math.Abs(end.R-15.3) > 0.5e-3+1e-12 || math.Abs(end.Phi-1.6/15.3) > 8*epsilon {
			t.Errorf("%s: the walk on the deck ends at %+v", c.name, end)
		}
	}
}

// TestWaysThatLeadAstray tries what a climb or a ride must not do.
func TestWaysThatLeadAstray(t *testing.T) {
	for _, c := range []struct {
		name string
		legs []model.Leg
		key  string
		says string
	}{
		{"below the floor", []model.Leg{{Kind: model.Descend, Distance: 0.1, Speed: 1}}, "legs[0].descend", "below the reference floor"},
		{"ride below the floor", []model.Leg{{Kind: model.Ride, Up: -0.1, Speed: 1}}, "legs[0].ride", "below the reference floor"},
		{"to the axis", []model.Leg{{Kind: model.Climb, Distance: 18, Speed: 1}}, "legs[0].climb", "to the axis or beyond"},
		{"ride beyond the axis", []model.Leg{{Kind: model.Ride, Up: 19, Speed: 1}}, "legs[0].ride", "to the axis or beyond"},
		{"ride nowhere", []model.Leg{{Kind: model.Ride, Speed: 1}}, "legs[0].ride", "of no length"},
		{"sit below the feet", []model.Leg{{Kind: model.SitDown, Distance: 1, Speed: 1}}, "legs[0]", "lower than the feet"},
		{"up from below the feet", []model.Leg{{Kind: model.StandUp, Distance: 1, Speed: 1}}, "legs[0]", "lower than the feet"},
		{"deeper before than at the start", []model.Leg{{Kind: model.SitDown, Distance: 0.6, Speed: 1}, {Kind: model.StandUp, Distance: 0.6, Speed: 1},
			{Kind: model.StandUp, Distance: 0.6, Speed: 1}}, "legs[2]", "lower than the feet"},
	} {
		in := house(c.legs...)
		in.Decks = nil
		_, problems := planIn(t, in)
		if len(problems) == 0 || problems[0].Key != c.key || !strings.Contains(problems[0].Msg, c.says) {
			t.Errorf("%s: %+v, want %s: %s", c.name, problems, c.key, c.says)
		}
	}
}
