package measure_test

import (
	"math"
	"testing"

	"offplumb/sim/crew"
	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// mate is the person on the paths below.
var mate = model.Crew{Name: "mate", Mass: 84, Stature: 1.78, Breadth: model.DefaultBreadth, Waist: model.WaistShare, Head: model.HeadShare}

// planned works out a path of the mate in a habitat.
func planned(t *testing.T, in model.Model, path model.Path) (*model.Model, *crew.Plan) {
	t.Helper()
	path.Crew = mate.Name
	if path.Name == "" {
		path.Name = "path"
	}
	in.Crews, in.Paths = []model.Crew{mate}, []model.Path{path}
	m := valid(t, in)
	p, problems := crew.NewPlan(m, &m.Paths[0])
	if len(problems) > 0 {
		t.Fatalf("%+v", problems)
	}
	return m, p
}

// TestWorkIsEnergy tries the work on a path against the energy that it takes:
// with the waist, and what is carried, as the places of the masses, half m
// spin^2 times the fall of the squares of their distances from the axis, and
// the growth of half m v^2, v relative to the habitat. It must hold for any
// kind of leg, at every row, and whatever the step of the rows: they may be far
// apart.
func TestWorkIsEnergy(t *testing.T) {
	const r, spin = 18.0, 0.6
	steady := func(l model.Leg) model.Leg { l.Speed, l.Ramp, l.Trapezoid = 0.7, 0.5, true; return l }
	smooth := func(l model.Leg) model.Leg { l.Speed, l.Ramp = 0.7, 0.6; return l }
	for _, c := range []struct {
		name string
		legs []model.Leg
	}{
		{"climb", []model.Leg{smooth(model.Leg{Kind: model.Climb, Distance: 5})}},
		{"steady ramps", []model.Leg{steady(model.Leg{Kind: model.Climb, Distance: 5})}},
		{"down again", []model.Leg{smooth(model.Leg{Kind: model.Climb, Distance: 5}), {Kind: model.Stand, Duration: 0.3}, steady(model.Leg{Kind: model.Descend, Distance: 3})}},
		{"pitched", []model.Leg{smooth(model.Leg{Kind: model.Climb, Distance: 5, Pitch: 0.9, Facing: model.Antispinward})}},
		{"ride", []model.Leg{steady(model.Leg{Kind: model.Ride, Up: 6}), steady(model.Leg{Kind: model.Ride, Round: &model.Arc{Value: 1, IsAngle: true}})}},
		{"walk", []model.Leg{smooth(model.Leg{Kind: model.Walk, Laps: 0.2})}},
		{"standing up", []model.Leg{smooth(model.Leg{Kind: model.StandUp, Distance: 0.5}), steady(model.Leg{Kind: model.SitDown, Distance: 0.4})}},
	} {
		for _, step := range []float64{0.01, 0.37, 5} {
			for _, carry := range []model.Carry{{}, {Mass: 12, At: model.Reach{Spinward: 0.3, Axial: 0.1, Height: 1.2}}} {
				in := ring(r, spin)
				in.Output.Step = step
				m, p := planned(t, in, model.Path{Legs: c.legs, Carry: carry})
				rows, _ := measure.LoadSeries(m, p)
				for i := range rows {
					want := energyAt(m, p, rows[i].Time) - energyAt(m, p, 0)
					// A quadrature over at most a few hundred smooth stretches, each
					// to rounding of the energy at hand, 84 kg at 10 m/s.
					if tol := 1e-9 * 84 * 100; math.Abs(rows[i].Work-want) > tol {
						t.Errorf("%s, carrying %g kg, rows %g s apart: work after %g s %.12g J, want %.12g", c.name, carry.Mass, step, rows[i].Time, rows[i].Work, want)
						break
					}
				}
			}
		}
	}
}

// energyAt is the energy of waist and load in the turning frame, J.
func energyAt(m *model.Model, p *crew.Plan, at float64) float64 {
	f := p.At(at)
	sum := 0.0
	for _, c := range []struct {
		mass  float64
		point crew.Point
	}{{p.Crew.Mass, f.Body(p.Crew.Waist * p.Crew.Stature)}, {p.Path.Carry.Mass, f.Point(p.Path.Carry.At)}} {
		x, v, w := c.point.Pos, c.point.Vel, m.Habitat.Spin
		sum += c.mass / 2 * (v.X*v.X + v.Y*v.Y + v.Z*v.Z - w*w*(x.X*x.X+x.Y*x.Y))
	}
	return sum
}

// TestWorkOfClimb tries the same for a climb in figures: a waist 0.979 m above
// the feet goes from 17.021 m to 12.021 m.
func TestWorkOfClimb(t *testing.T) {
	const spin = 0.6
	m, p := planned(t, ring(18, spin), model.Path{Legs: []model.Leg{{Kind: model.Climb, Distance: 5, Speed: 0.4, Ramp: 0.5}}})
	rows, _ := measure.LoadSeries(m, p)
	want := 84 * spin * spin * (17.021*17.021 - 12.021*12.021) / 2
	if last := rows[len(rows)-1]; math.Abs(last.Work-want) > 1e-9*want || last.Time != p.Duration() || rows[0].Work != 0 {
		t.Errorf("work %.12g J after %g s, want %.12g after %g", last.Work, last.Time, want, p.Duration())
	}
}

// TestLoadRows tries the places of the rows: arcs and heights on the deck
// beneath the start, the leg under way, times a step apart and the end.
func TestLoadRows(t *testing.T) {
	in := ring(20, 0.5, model.Deck{Name: "upper", Radius: 16, Thickness: 0.05, Whole: true, Friction: model.None, Restitution: model.None})
	in.Output.Step = 0.5
	at := model.Station{Deck: "upper", Spinward: model.Arc{Value: 3}}
	m, p := planned(t, in, model.Path{Start: at, Legs: []model.Leg{
		{Kind: model.Walk, Spinward: &model.Arc{Value: -5}, Speed: 1, Ramp: 0.5},
		{Kind: model.Climb, Distance: 2, Speed: 0.5, Ramp: 0.5}}})
	rows, step := measure.LoadSeries(m, p)
	if n := int(p.Duration()/0.5) + 1; step != 0.5 || len(rows) != n {
		t.Fatalf("%d rows %g s apart, want %d", len(rows), step, n)
	}
	first, last := rows[0], rows[len(rows)-1]
	if math.Abs(first.Arc-3) > 16*epsilon*3 || first.Height != 0 || first.Leg != "1 walk" {
		t.Errorf("starts at arc %.17g m, height %g m on %q", first.Arc, first.Height, first.Leg)
	}
	if math.Abs(last.Arc+5) > 16*epsilon*5 || math.Abs(last.Height-2) > 16*epsilon*20 || last.Leg != "2 climb" || last.Time != p.Duration() {
		t.Errorf("ends after %g s at arc %.17g m, height %.17g m on %q", last.Time, last.Arc, last.Height, last.Leg)
	}
	for i := range rows[:len(rows)-1] {
		if rows[i].Time != 0.5*float64(i) {
			t.Errorf("row %d is at %g s", i, rows[i].Time)
		}
	}
}
