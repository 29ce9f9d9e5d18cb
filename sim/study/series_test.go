package study_test

import (
	"context"
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/crew"
	"offplumb/sim/flight"
	"offplumb/sim/measure"
	"offplumb/sim/model"
	"offplumb/sim/study"
)

// errand is a ring in which someone walks 6 m, climbs 3 m and stands, with a
// tool at hand that is let go as given.
func errand(c model.Carried) model.Model {
	c.Path, c.Reach = "errand", model.Reach{Spinward: 0.4, Axial: 0.1, Height: 1.2}
	return model.Model{
		Habitat: model.Habitat{Room: model.Room{FloorRadius: 18, Length: 14}, Spin: 0.5},
		Solver:  model.Solver{RelTol: 1e-9, PosTol: 1e-12, VelTol: 1e-12, MaxTime: 60},
		Output:  model.Output{Step: 0.01},
		Bodies:  []model.Body{{Name: "tool", Mass: 1, Diameter: 0.06, Restitution: 0.4, Friction: 0.3}},
		Crews:   []model.Crew{{Name: "mate", Mass: 84, Stature: 1.78, Breadth: 0.5, Waist: model.WaistShare, Head: model.HeadShare}},
		Paths: []model.Path{{Name: "errand", Crew: "mate", Time: 3, Legs: []model.Leg{
			{Kind: model.Walk, Spinward: &model.Arc{Value: 6}, Speed: 1.1, Ramp: 0.5},
			{Kind: model.Stand, Duration: 2},
			{Kind: model.Climb, Distance: 3, Speed: 0.4, Ramp: 0.5},
			{Kind: model.Stand, Duration: 1},
		}}},
		Releases: []model.Release{
			{Name: "before", Body: "tool", At: model.Station{Height: 1}},
			{Name: "slips", Body: "tool", Carried: &c, Start: model.Start{Kind: model.Velocity, VUp: 0.5}},
			{Name: "after", Body: "tool", At: model.Station{Height: 2}},
		},
	}
}

// expand puts the series of a model out.
func expand(t *testing.T, in model.Model) (m *model.Model, plan *crew.Plan, out []model.Release, from []int) {
	t.Helper()
	m, problems := model.New(in)
	if len(problems) > 0 {
		t.Fatalf("%+v", problems)
	}
	plan, problems = crew.NewPlan(m, &m.Paths[0])
	if len(problems) > 0 {
		t.Fatalf("%+v", problems)
	}
	out, from, problems = study.Expand(m, in.Releases)
	if len(problems) > 0 {
		t.Fatalf("%+v", problems)
	}
	return m, plan, out, from
}

// TestSeriesAlongThePath tries a let-go series by length: a release at each
// stretch of the 9 m, named by it, at the time at which the feet have gone so
// far, and the last at the end.
func TestSeriesAlongThePath(t *testing.T) {
	for _, c := range []struct {
		every float64
		want  []float64 // m
	}{
		{1.5, []float64{0, 1.5, 3, 4.5, 6, 7.5, 9}},
		{2, []float64{0, 2, 4, 6, 8, 9}},
		{9, []float64{0, 9}},
		{20, []float64{0, 9}},
		{0.9, []float64{0, 0.9, 1.8, 2.7, 3.6, 4.5, 5.4, 6.3, 7.2, 8.1, 9}},
	} {
		_, plan, out, from := expand(t, errand(model.Carried{Every: c.every}))
		if len(out) != len(c.want)+2 || out[0].Name != "before" || out[len(out)-1].Name != "after" {
			t.Fatalf("every %g m: %d releases, want %d and two more", c.every, len(out)-2, len(c.want))
		}
		if from[0] != 0 || from[len(from)-1] != 2 || slices.ContainsFunc(from[1:len(from)-1], func(i int) bool { return i != 1 }) {
			t.Errorf("every %g m: they come from %v", c.every, from)
		}
		for i, way := range c.want {
			r := &out[i+1]
			if name := fmt.Sprintf("slips at %g m", way); r.Name != name || r.Series != "slips" {
				t.Errorf("every %g m: release %d is %q of %q, want %q", c.every, i, r.Name, r.Series, name)
			}
			// The roundings of a way of 9 m, and what a person goes in those of a time.
			if math.Abs(r.Along-way) > 1e-12 || plan.At(r.Carried.Time).Along < way-1e-12 {
				t.Errorf("%s: let go %.17g m along, after %g s at %.17g", r.Name, r.Along, r.Carried.Time, plan.At(r.Carried.Time).Along)
			}
			if before := plan.At(r.Carried.Time - 0.01).Along; way > 0 && before >= way {
				t.Errorf("%s: let go after %g s, but %g m along before", r.Name, r.Carried.Time, before)
			}
			if r.Carried.Every != 0 || r.Carried.Reach.Height != 1.2 || r.Start.VUp != 0.5 || r.Body != "tool" {
				t.Errorf("%s: %+v of %+v", r.Name, r.Carried, r)
			}
		}
	}
}

// TestSeriesInTime tries one by time: at each stretch of it, standing too.
func TestSeriesInTime(t *testing.T) {
	_, plan, out, _ := expand(t, errand(model.Carried{Every: 2.5, ByTime: true}))
	whole := plan.Duration()
	n := int(math.Ceil(whole/2.5)) + 1
	if len(out) != n+2 {
		t.Fatalf("%d releases, want %d", len(out)-2, n)
	}
	for i := range n {
		r := &out[i+1]
		want := math.Min(2.5*float64(i), whole)
		if r.Carried.Time != want || r.Along != plan.At(want).Along || i < n-1 && r.Name != fmt.Sprintf("slips at %g s", want) {
			t.Errorf("%q: after %.17g s, %g m along, want %.17g", r.Name, r.Carried.Time, r.Along, want)
		}
	}
}

// TestSeriesEndsOnce tries that where the stretches end with the path, as far
// as roundings tell, there is one release at the end, not two of one name.
func TestSeriesEndsOnce(t *testing.T) {
	for _, byTime := range []bool{false, true} {
		for n := 1; n <= 40; n++ {
			for _, way := range []float64{0.7, 2.1, 6, 7.3} {
				in := errand(model.Carried{})
				in.Paths[0].Legs = in.Paths[0].Legs[:1]
				in.Paths[0].Legs[0].Spinward = &model.Arc{Value: way}
				_, plan, _, _ := expand(t, in)
				c := in.Releases[1].Carried
				c.ByTime, c.Every = byTime, way/float64(n)
				if byTime {
					c.Every = plan.Duration() / float64(n)
				}
				_, _, out, _ := expand(t, in)
				names := map[string]bool{}
				for i := range out {
					names[out[i].Name] = true
				}
				if len(out) != n+1+2 || len(names) != len(out) {
					t.Fatalf("%d stretches of %g m, by time %t: %d releases, of %d names", n, way, byTime, len(out)-2, len(names)-2)
				}
			}
		}
	}
}

// TestSeriesInheritsVelocities tries that each release of a series starts with
// the velocity of the hand, in the inertial frame by differences of its place
// there, and its own on top.
func TestSeriesInheritsVelocities(t *testing.T) {
	in := errand(model.Carried{Every: 0.75})
	_, plan, out, _ := expand(t, in)
	in.Releases = out
	m, problems := model.New(in)
	if len(problems) > 0 {
		t.Fatal(problems)
	}
	p, problems := study.Prepare(m)
	if len(problems) > 0 {
		t.Fatal(problems)
	}
	for i := range p.Lets {
		let := &p.Lets[i]
		if let.Release.Series == "" {
			continue
		}
		inertial := velocityOf(m, let)
		c := let.Release.Carried
		if let.Begin != 3+c.Time {
			t.Errorf("%q begins at %g s, want 3 s and %g s", let.Release.Name, let.Begin, c.Time)
		}
		const step = 1e-6
		if c.Time < step || c.Time > plan.Duration()-step {
			continue
		}
		back, _ := plan.State(m, c.Time-step, c.Reach)
		ahead, _ := plan.State(m, c.Time+step, c.Reach)
		hand := r3.Scale(0.5/step, r3.Sub(ahead, back))
		a := m.Motion.At(let.Begin)
		own := a.Out(r3.Scale(-0.5/r3.Norm(r3.Vec{X: let.Local.Pos.X, Y: let.Local.Pos.Y}), r3.Vec{X: let.Local.Pos.X, Y: let.Local.Pos.Y}))
		// Accelerations of 10 m/s^2 over the step, and places rounded at 18 m.
		if off := r3.Norm(r3.Sub(inertial, r3.Add(hand, own))); off > 10*step+64*0x1p-52*18/step {
			t.Errorf("%q starts with %v m/s, the hand moves with %v and throws with %v", let.Release.Name, inertial, hand, own)
		}
	}
}

// velocityOf is the inertial velocity of a release, m/s.
func velocityOf(m *model.Model, let *flight.Let) r3.Vec {
	a := m.Motion.At(let.Begin)
	return a.ToInertial(let.Local).Vel
}

// TestSeriesFaults tries too fine a series, and one along a path with a fault
// of its own, which is left to Prepare.
func TestSeriesFaults(t *testing.T) {
	in := errand(model.Carried{Every: 9.0 / (study.MaxSeries + 1)})
	m, problems := model.New(in)
	if len(problems) > 0 {
		t.Fatal(problems)
	}
	_, _, problems = study.Expand(m, in.Releases)
	if len(problems) != 1 || problems[0].Key != "release[1].carried.every" || !strings.Contains(problems[0].Msg, "more than 10000 releases along 9 m") {
		t.Errorf("%+v", problems)
	}
	in = errand(model.Carried{Every: 1})
	in.Paths[0].Legs[0].Spinward = &model.Arc{} // no way at all
	if m, problems = model.New(in); len(problems) > 0 {
		t.Fatal(problems)
	}
	if out, _, problems := study.Expand(m, in.Releases); len(problems) > 0 || len(out) != 2 {
		t.Errorf("a path with a fault: %d releases, %+v", len(out), problems)
	}
}

// TestLimitOverSeries tries a limit by pattern over a series: it knows all of
// its releases and no other, keeps their tracks, and gives the worst of them.
func TestLimitOverSeries(t *testing.T) {
	in := errand(model.Carried{Every: 1.5})
	_, _, out, _ := expand(t, in)
	in.Releases = out
	in.Releases[0].NoTrack = true
	in.Limits = []model.Limit{{Name: "soft", Of: []string{"release.slips*"}, Measure: "impacts.speed", Max: &model.Quantity{SI: 1, Unit: "m/s"}}}
	m, problems := model.New(in)
	if len(problems) > 0 {
		t.Fatal(problems)
	}
	p, problems := study.Prepare(m)
	if len(problems) > 0 {
		t.Fatal(problems)
	}
	results, err := p.Run(context.Background(), study.Options{Workers: 2})
	if err != nil {
		t.Fatal(err)
	}
	var want measure.Event
	name := ""
	for i := range results {
		if m.Releases[i].Series == "" {
			continue
		}
		for _, e := range results[i].Events {
			if e.Kind == measure.Impact && e.Speed > want.Speed {
				want, name = e, m.Releases[i].Name
			}
		}
	}
	c := &p.Limits[0]
	v, ok := c.Judge(measure.Evidence{Events: func(i int) ([]measure.Event, bool) { return results[i].Events, results[i].Track != nil }})
	if !ok || len(c.Targets) != len(out)-2 || !c.Judges("slips") {
		t.Fatalf("judges %d targets of %d: %t", len(c.Targets), len(out)-2, ok)
	}
	if v.Of != "release."+name || v.Value != want.Speed || v.At != want.Time || v.Verdict != measure.Broken || want.Speed < 1 {
		t.Errorf("%+v, want %g m/s of %q", v, want.Speed, name)
	}
	if results[0].Track != nil {
		t.Error("the track of another release is kept")
	}
}
