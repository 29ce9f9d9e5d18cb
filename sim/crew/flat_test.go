package crew_test

import (
	"math"
	"strings"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/crew"
	"offplumb/sim/model"
)

// cabins is a cabin with a flat floor at 14 m, 7 m by 4 m, and another one
// across the axis, with the person's path.
func cabins(spin float64, start model.Station, legs ...model.Leg) model.Model {
	size := [3]float64{7, 4, 3}
	return model.Model{
		Habitat: model.Habitat{Room: model.Room{Shape: model.Cabin, FloorRadius: 14, Size: size}, Spin: spin},
		Rooms:   []model.Room{{Name: "cabin B", Shape: model.Cabin, FloorRadius: 14, Size: size, Spinward: model.Arc{Value: math.Pi, IsAngle: true}, Axial: 1}},
		Crews:   []model.Crew{rigger()},
		Paths:   []model.Path{{Name: "path", Crew: "rigger", Start: start, Legs: legs}},
	}
}

func across(in model.Model) (*model.Model, *crew.Plan, []model.Problem) {
	m, problems := model.New(in)
	if len(problems) > 0 {
		return nil, nil, problems
	}
	p, problems := crew.NewPlan(m, &m.Paths[0])
	return m, p, problems
}

func length(x float64) *float64 { return &x }

// TestWalkAcrossFlatFloor walks, climbs and sits on a flat floor, in either
// cabin, at either spin: the specific force that each point of the body needs
// is the second derivative of its inertial place, by differences; the body
// stands along the floor's normal, and the feet are where stations are.
func TestWalkAcrossFlatFloor(t *testing.T) {
	const h = 1e-3 // s: second differences err by h^2 of the fourth derivative and by roundings over h^2
	for _, room := range []string{"", "cabin B"} {
		for _, spin := range []float64{0.6, -0.6} {
			m, p, problems := across(cabins(spin, model.Station{Room: room, Spinward: model.Arc{Value: -2.5}, Axial: -1},
				model.Leg{Kind: model.Walk, Spinward: &model.Arc{Value: 2}, Axial: length(1), Speed: 1.2, Ramp: 0.5},
				model.Leg{Kind: model.SitDown, Distance: 0.4, Speed: 0.5},
				model.Leg{Kind: model.StandUp, Distance: 0.4, Speed: 0.5},
				model.Leg{Kind: model.Climb, Distance: 1, Speed: 0.4, Ramp: 0.2, Facing: model.PlusAxial}))
			if len(problems) > 0 {
				t.Fatal(problems)
			}
			for k := 1.0; k < 60; k++ {
				time := p.Duration() * k / 60
				for _, reach := range []model.Reach{{}, {Height: 1.6}, {Spinward: 0.4, Axial: -0.2, Height: 1}} {
					place := func(t float64) r3.Vec { pos, _ := p.State(m, t, reach); return pos }
					acc := r3.Scale(1/(h*h), r3.Add(r3.Sub(place(time+h), r3.Scale(2, place(time))), place(time-h)))
					f := p.At(time)
					a := m.Motion.At(time)
					force := crew.Support(&a, f.Point(reach))
					if d := off(a.Out(force), acc); d > 1e-4 && !near(p, time, 2*h) {
						t.Fatalf("%q, spin %g, %g s, reach %+v: the force differs from the inertial acceleration by %.3g m/s^2", room, spin, time, reach, d)
					}
				}
				f := p.At(time)
				if up := r3.Sub(f.Point(model.Reach{Height: 1}).Pos, f.Point(model.Reach{}).Pos); off(up, p.Flat.Local().Up) > 1e-12 {
					t.Fatalf("%g s: the body stands along %v", time, up)
				}
			}
			walked := p.At(p.Joints()[1])
			if s, a, height := p.Place(m, &walked); math.Abs(s-2) > 1e-12 || math.Abs(a-1) > 1e-12 || math.Abs(height) > 1e-12 {
				t.Errorf("%q: walks to %g, %g, %g", room, s, a, height)
			}
			top := p.At(p.Duration())
			if _, _, height := p.Place(m, &top); math.Abs(height-1) > 1e-12 || math.Abs(p.Length()-(math.Hypot(4.5, 2)+1)) > 1e-12 {
				t.Errorf("%q: climbs to %g m, %g m of way", room, height, p.Length())
			}
		}
	}
}

// near says whether a joint or the end of a ramp lies within dt (s), where the
// acceleration bends.
func near(p *crew.Plan, t, dt float64) bool {
	for _, b := range p.Breaks() {
		if math.Abs(b-t) < dt {
			return true
		}
	}
	return false
}

// TestFlatFloorTilts tries what a person who stands still on a flat floor
// feels: gravity leans by the angle between the radius and the floor's normal,
// whose tangent is the way from the middle over the distance of the waist from
// the axis; it needs as much friction, whatever the spin.
func TestFlatFloorTilts(t *testing.T) {
	for _, s := range []float64{-3, 0, 2.5} {
		_, p, problems := across(cabins(0.6, model.Station{Spinward: model.Arc{Value: s}}, model.Leg{Kind: model.Stand, Duration: 1}))
		if len(problems) > 0 {
			t.Fatal(problems)
		}
		m, _ := model.New(cabins(0.6, model.Station{}))
		l := p.Loads(m, 0.5)
		high := 14 - rigger().Waist*rigger().Stature
		if want := math.Atan2(s, high); math.Abs(l.TiltSpinward-want) > 1e-12 || math.Abs(l.FrictionDemand-math.Abs(s)/high) > 1e-12 {
			t.Errorf("%g m from the middle: tilt %g rad, want %g; friction demand %g", s, l.TiltSpinward, want, l.FrictionDemand)
		}
		if want := 84 * 0.36 * high; math.Abs(l.Weight-want) > 1e-9 {
			t.Errorf("%g m from the middle: weight %g N, want %g", s, l.Weight, want)
		}
	}
}

// TestFlatFloorRefusals tries what cannot be walked.
func TestFlatFloorRefusals(t *testing.T) {
	to := func(s float64) model.Leg {
		return model.Leg{Kind: model.Walk, Spinward: &model.Arc{Value: s}, Speed: 1}
	}
	for _, c := range []struct {
		name, says string
		legs       []model.Leg
	}{
		{"off the floor", `leads off "floor", which is 7 m by 4 m`, []model.Leg{to(3.6)}},
		{"laps", "a flat floor has no laps", []model.Leg{{Kind: model.Walk, Laps: 1, Speed: 1}}},
		{"nowhere", "a leg of no length", []model.Leg{to(0)}},
		{"in the air", "no floor underfoot: the feet are 1 m above it", []model.Leg{{Kind: model.Climb, Distance: 1, Speed: 1}, to(1)}},
		{"down", "leads below the floor", []model.Leg{{Kind: model.Descend, Distance: 1, Speed: 1}}},
		{"into a wall", "leads through", []model.Leg{{Kind: model.Ride, Round: &model.Arc{Value: 4}, Speed: 1}}},
	} {
		_, _, problems := across(cabins(0.6, model.Station{}, c.legs...))
		if len(problems) != 1 || !strings.Contains(problems[0].Msg, c.says) {
			t.Errorf("%s: %+v, want %q", c.name, problems, c.says)
		}
	}
}
