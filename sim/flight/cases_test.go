package flight_test

import (
	"math"
	"strings"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/flight"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// bench is a ring of 20 m with 5 m/s^2 on its floor, a bench 2 m long, 1 m wide
// and 0.8 m high at spinward 3 m, and bulkheads at axial +-4 m; without air.
func bench(b model.Body, at model.Station, start model.Start) model.Model {
	in := ring(20, 0.5)
	in.Habitat.Length = 8
	in.Fixtures = []model.Fixture{{Name: "bench", Kind: model.Box, At: model.Station{Spinward: model.Arc{Value: 3}},
		Size: [3]float64{2, 1, 0.8}, Friction: model.None, Restitution: model.None}}
	b.Name = "body"
	in.Bodies = []model.Body{b}
	in.Releases = []model.Release{{Name: "release", Body: "body", At: at, Start: start}}
	return in
}

// pushed is a start with a velocity (m/s): spinward, axial, up.
func pushed(spinward, axial, up float64) model.Start {
	return model.Start{Kind: model.Velocity, VSpinward: spinward, VAxial: axial, VUp: up}
}

// order tells the kinds of phases, each followed by its surface if it has one,
// and the outcome.
func order(t *flight.Track) string {
	var out []string
	for _, p := range t.Phases {
		s := p.Kind.String()
		if p.Surface != "" {
			s += " on " + p.Surface
		}
		out = append(out, s)
	}
	return strings.Join(append(out, t.Outcome.String()), ", ")
}

// lawful flies a release and holds it to the laws.
func lawful(t *testing.T, in model.Model) (*model.Model, *flight.Track) {
	t.Helper()
	m, track := one(t, in, flight.Setup{})
	if faults, _ := flight.Judge(m, track); len(faults) > 0 {
		t.Errorf("%q: %s", faults, order(track))
	}
	return m, track
}

// end is where a track ends, in the habitat.
func end(m *model.Model, t *flight.Track) frame.State {
	a := m.Motion.At(t.Begin + t.End)
	return a.ToHabitat(t.Last)
}

// TestStories tries how releases go in plain cases.
func TestStories(t *testing.T) {
	onBench := model.Station{Spinward: model.Arc{Value: 3}, Height: 0.85}
	onFloor := model.Station{Spinward: model.Arc{Value: -2}, Height: 0.05}
	for _, c := range []struct {
		name string
		in   model.Model
		want string
	}{
		{"set down on the floor", bench(model.Body{Mass: 1, Diameter: 0.1, Friction: 0.4}, onFloor, model.Start{}), "rest on floor, rested"},
		{"a point set down on the floor", bench(model.Body{Friction: 0.4}, model.Station{Height: 0}, model.Start{}), "rest on floor, rested"},
		{"a ball set down on the floor", bench(model.Body{Mass: 1, Diameter: 0.1, Friction: 0.4, Rolls: true}, onFloor, model.Start{}), "rest on floor, rested"},
		{"set down without friction", bench(model.Body{Mass: 1, Diameter: 0.1}, onFloor, model.Start{}), "rest on floor, rested"},
		{"dropped without restitution", bench(model.Body{Mass: 1, Diameter: 0.1, Friction: 0.4}, model.Station{Spinward: model.Arc{Value: -2}, Height: 1}, model.Start{}),
			"flight, rest on floor, rested"}, // the impulse of friction stops it
		{"dropped without restitution, smooth", bench(model.Body{Mass: 1, Diameter: 0.1, Friction: 0.01}, model.Station{Spinward: model.Arc{Value: -2}, Height: 1}, model.Start{}),
			"flight, slide on floor, rest on floor, rested"},
		{"slid along the floor", bench(model.Body{Mass: 1, Diameter: 0.1, Friction: 0.4}, onFloor, pushed(-2, 1, 0)), "slide on floor, rest on floor, rested"},
		{"slid off the bench", bench(model.Body{Mass: 1, Diameter: 0.1, Friction: 0.1}, onBench, pushed(0, 2, 0)),
			"slide on bench top, flight, slide on floor, slide on floor, rest on floor, rested"}, // along the bulkhead at last
		{"slid against the bench", bench(model.Body{Mass: 1, Diameter: 0.1, Friction: 0.1}, model.Station{Height: 0.05}, pushed(3, 0, 0)),
			"slide on floor, rest on floor, rested"},
		{"rolled slowly off the bench", bench(model.Body{Mass: 1, Diameter: 0.2, Friction: 0.8, Rolls: true}, model.Station{Spinward: model.Arc{Value: 3}, Axial: 0.45, Height: 0.9}, pushed(0, 0.1, 0)),
			"slide on bench top, roll on bench top"},
		{"until landing", until(bench(model.Body{Mass: 1, Diameter: 0.1, Restitution: 0.5}, model.Station{Height: 1}, model.Start{}), model.Until{Kind: model.UntilLanding}), "flight, landed"},
	} {
		m, track := lawful(t, c.in)
		if got := order(track); !strings.HasPrefix(got, c.want) {
			t.Errorf("%s: %s, want %s", c.name, got, c.want)
		}
		if track.Outcome == flight.Rested && r3.Norm(end(m, track).Vel) > 1e-12 {
			t.Errorf("%s: rests with %v m/s", c.name, end(m, track).Vel)
		}
	}
}

func until(in model.Model, u model.Until) model.Model {
	in.Releases[0].Until = u
	return in
}

// TestSlidesOffTheBench tries the same by its impacts: the floor beside the
// bench is what it lands on, and the bulkhead stops its way along the axis.
func TestSlidesOffTheBench(t *testing.T) {
	m, track := lawful(t, bench(model.Body{Mass: 1, Diameter: 0.1, Friction: 0.1}, model.Station{Spinward: model.Arc{Value: 3}, Height: 0.85}, pushed(0, 2, 0)))
	if got := hits(track); got != "floor, bulkhead +axial" {
		t.Fatalf("hits %s: %s", got, order(track))
	}
	// It leaves the top at its edge, 0.5 m from the middle, and falls 0.8 m.
	if at := local(m, track, track.Phases[0].T1).Pos.Z; math.Abs(at-0.5) > 0.05 {
		t.Errorf("leaves the bench at axial %g m", at)
	}
	if z := track.Impacts[0].State.Pos.Z; z < 0.9 || z > 2.5 {
		t.Errorf("lands at axial %g m", z)
	}
}

// hits names the surfaces of a track's impacts.
func hits(track *flight.Track) string {
	var out []string
	for _, i := range track.Impacts {
		out = append(out, i.Surface)
	}
	return strings.Join(out, ", ")
}

// TestRestsAtOnce tries that what is set down rests at time 0, where it was.
func TestRestsAtOnce(t *testing.T) {
	for _, d := range []float64{0, 0.1} {
		_, track := lawful(t, bench(model.Body{Mass: 1, Diameter: d, Friction: 0.2}, model.Station{Spinward: model.Arc{Value: 9}, Height: d / 2}, model.Start{}))
		if track.End != 0 || track.Outcome != flight.Rested || len(track.Impacts) != 1 || track.Last.Pos != track.First.Pos {
			t.Errorf("diameter %g: ends after %g s: %s", d, track.End, order(track))
		}
	}
}

// TestStopsInTheCorner tries that a body which slides into the corner of the
// floor and the bench's side stops there, touching both.
func TestStopsInTheCorner(t *testing.T) {
	m, track := lawful(t, bench(model.Body{Mass: 1, Diameter: 0.1, Friction: 0.05}, model.Station{Height: 0.05}, pushed(1.5, 0, 0)))
	s := end(m, track)
	if track.Outcome != flight.Rested || len(m.Interior.Touching(s.Pos, 0.05+1e-7, nil)) != 2 {
		t.Errorf("ends at %v: %s", s.Pos, order(track))
	}
	if got := hits(track); got != "bench antispinward side" {
		t.Errorf("hits %s", got)
	}
}

// TestSlidesOnAndOn tries bodies that nothing stops: without friction along the
// floor, and a ball that rolls, both keep their speed to the end of the time.
func TestSlidesOnAndOn(t *testing.T) {
	for _, b := range []model.Body{{Mass: 1, Diameter: 0.1}, {Mass: 1, Diameter: 0.1, Friction: 0.5, Rolls: true}, {Friction: 0}} {
		in := bench(b, model.Station{Height: b.Diameter / 2}, pushed(-1, 0, 0))
		in.Fixtures = nil
		in.Solver.MaxTime = 300
		m, track := lawful(t, in)
		speed := 1.0
		if b.Rolls {
			speed = 5.0 / 7
		}
		if got := r3.Norm(end(m, track).Vel); track.Outcome != flight.TimeUp || track.End != 300 || math.Abs(got-speed) > 1e-6 {
			t.Errorf("%+v: %.9g m/s in the end, want %.9g: %s", b, got, speed, order(track))
		}
	}
}

// TestBouncesOnAndOn tries that a body of restitution 1 rebounds to its height
// to the end of the time, and one of 0 never.
func TestBouncesOnAndOn(t *testing.T) {
	in := bench(model.Body{Mass: 1, Diameter: 0.1, Restitution: 1}, model.Station{Height: 0.5}, model.Start{})
	in.Fixtures = nil
	in.Solver.MaxTime = 600
	m, track := lawful(t, in)
	if track.Outcome != flight.TimeUp || track.End != 600 || len(track.Impacts) < 500 {
		t.Errorf("%d impacts, %s after %g s", len(track.Impacts), track.Outcome, track.End)
	}
	n := len(track.Impacts)
	if top := apex(m, track, track.Impacts[n-2].Time, track.Impacts[n-1].Time); math.Abs(top-apex(m, track, track.Impacts[0].Time, track.Impacts[1].Time)) > 1e-6 {
		t.Errorf("rises to %g m in the end", top)
	}
	in.Bodies[0].Restitution = 0
	if _, track := lawful(t, in); order(track) != "flight, slide on floor, time" || len(track.Impacts) != 1 {
		t.Errorf("without restitution: %s", order(track))
	}
}

// apex is the greatest height (m) of a body between two times.
func apex(m *model.Model, track *flight.Track, t0, t1 float64) float64 {
	top := 0.0
	for k := range 2001 {
		p := local(m, track, t0+(t1-t0)*float64(k)/2000).Pos
		top = math.Max(top, m.Habitat.FloorRadius-math.Hypot(p.X, p.Y)-track.Body.Diameter/2)
	}
	return top
}

// TestTooWide tries bodies that are wider than a hatch, a slot or a spoke: they
// stay on top of it, at rest or wedged, after few phases.
func TestTooWide(t *testing.T) {
	hatch := func(w, l, coaming float64) model.Model {
		in := bench(model.Body{Mass: 1, Diameter: 0.5, Restitution: 0.3, Friction: 0.5}, model.Station{Height: 1.2}, model.Start{})
		in.Fixtures = nil
		in.Decks = []model.Deck{{Name: model.FloorName, Friction: model.None, Restitution: model.None,
			Openings: []model.Opening{{Name: "hatch", Spinward: model.Arc{Value: -0.2}, Size: [2]float64{w, l}, Coaming: coaming}}}}
		return in
	}
	for _, c := range []struct {
		name string
		in   model.Model
	}{
		{"square hatch", hatch(0.45, 0.45, 0)},
		{"slot", hatch(0.2, 3, 0)},
		{"slot across", hatch(3, 0.49, 0)},
		{"coaming", hatch(0.49, 0.49, 0.1)},
	} {
		_, track := lawful(t, c.in)
		if (track.Outcome != flight.Rested && track.Outcome != flight.Stuck) || len(track.Phases) > 40 {
			t.Errorf("%s: %s", c.name, order(track))
		}
	}
}

// TestTooWideForSpoke tries a ball in a hub, let go over the mouth of a spoke
// that is too narrow for it: it comes to rest there.
func TestTooWideForSpoke(t *testing.T) {
	for _, rolls := range []bool{false, true} {
		in := ring(20, 0.5)
		in.Habitat.CeilingRadius, in.Habitat.Length = 15, 8
		in.Rooms = []model.Room{{Name: "hub", FloorRadius: 3, Length: 6}}
		in.Passages = []model.Passage{{Name: "spoke", FromRadius: 3, ToRadius: 15, Width: 0.4}}
		in.Bodies = []model.Body{{Name: "b", Mass: 1, Diameter: 0.5, Restitution: 0.4, Friction: 0.6, Rolls: rolls}}
		in.Releases = []model.Release{{Name: "drop", Body: "b", At: model.Station{HasRadius: true, Radius: 2.7}}}
		m, track := lawful(t, in)
		if s := end(m, track); (track.Outcome != flight.Rested && track.Outcome != flight.Stuck) || math.Hypot(s.Pos.X, s.Pos.Y) > 3 || len(track.Phases) > 60 {
			t.Errorf("ends at %v: %s", s.Pos, order(track))
		}
	}
}

// TestWedge tries bodies thrown into the wedge between a bulkhead and a box
// that stands askew: their story ends.
func TestWedge(t *testing.T) {
	for _, b := range []model.Body{
		{Mass: 1, Diameter: 0.2, Restitution: 0.5, Friction: 0.3}, {Mass: 1, Diameter: 0.2, Friction: 0.3},
		{Mass: 1, Diameter: 0.2, Restitution: 0.9}, {Mass: 1, Diameter: 0.2, Restitution: 0.5, Friction: 0.3, Rolls: true}, {Restitution: 0.5, Friction: 0.3},
	} {
		for _, turn := range []float64{0.1, 0.4, 0.8} {
			in := bench(b, model.Station{Spinward: model.Arc{Value: -1}, Axial: 3.7, Height: 0.1}, pushed(3, 0.1, 0))
			f := &in.Fixtures[0]
			f.At.Axial, f.Turn, f.Size[0] = 3, turn, 3
			in.Solver.MaxTime = 120
			_, track := lawful(t, in)
			if track.Outcome == flight.Lost || track.Outcome == flight.TimeUp && track.End < 120 || len(track.Phases) > 2000 {
				t.Errorf("%+v, %g rad: %d phases: %s", b, turn, len(track.Phases), kinds(track))
			}
		}
	}
}

// TestStillStays tries that what is let go at rest beside the turning habitat
// stays where it is, seen from outside, until something comes by.
func TestStillStays(t *testing.T) {
	for _, spin := range []float64{0.5, -0.5} {
		in := bench(model.Body{Mass: 1, Diameter: 0.1}, model.Station{HasRadius: true, Radius: 12}, model.Start{Kind: model.Still})
		in.Habitat.Spin = spin
		in.Solver.MaxTime = 100
		_, track := lawful(t, in)
		if track.Outcome != flight.TimeUp || track.At(70).Pos != track.First.Pos || len(track.Impacts) != 0 {
			t.Errorf("at %v from %v: %s", track.At(70).Pos, track.First.Pos, order(track))
		}
		in.Releases[0].At.Radius = 19.5 // at the height of the bench, which hits it
		if _, track := lawful(t, in); len(track.Impacts) == 0 || !strings.HasPrefix(track.Impacts[0].Surface, "bench") {
			t.Errorf("hits %s: %s", hits(track), order(track))
		}
	}
}

// TestPassesNarrowly tries a body of 0.99 times the width of a hatch: it falls
// through the middle without touching its rim.
func TestPassesNarrowly(t *testing.T) {
	in := ring(20, 1e-6) // hardly turning: it falls straight, thrown down
	in.Decks = []model.Deck{{Name: "upper", Radius: 16, Thickness: 0.05, Whole: true, Friction: model.None, Restitution: model.None,
		Openings: []model.Opening{{Name: "hatch", Size: [2]float64{0.5, 0.5}}}}}
	in.Bodies = []model.Body{{Name: "b", Mass: 1, Diameter: 0.495}}
	in.Releases = []model.Release{{Name: "fall", Body: "b", At: model.Station{Height: 6}, Start: pushed(0, 0, -2), Until: model.Until{Kind: model.UntilLanding}}}
	_, track := lawful(t, in)
	if hit := track.Landing(); hit == nil || hit.Surface != "floor" {
		t.Errorf("lands on %+v", hit)
	}
}
