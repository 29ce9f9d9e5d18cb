package measure_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/air"
	"offplumb/sim/flight"
	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// follow flies one release to its own end.
func follow(t *testing.T, in model.Model, r model.Release) (*model.Model, *flight.Track) {
	t.Helper()
	in.Releases = []model.Release{r}
	m := valid(t, in)
	let, problem := flight.Release(m, &m.Releases[0], nil)
	if problem.Msg != "" {
		t.Fatalf("%s: %s", problem.Key, problem.Msg)
	}
	track, err := flight.NewFlier(m).Fly(&let)
	if err != nil {
		t.Fatal(err)
	}
	return m, track
}

// ball is a body of 2 kg and 0.2 m.
func ball(restitution, friction float64) *model.Body {
	return &model.Body{Name: "ball", Mass: 2, Diameter: 0.2, Restitution: restitution, Friction: friction}
}

// TestPathOfDropIsInvolute tries the way of a drop in vacuum: an involute of
// the circle of radius r0 where it begins, which unwound by an angle is r0 times
// half its square long; the drop ends at the angle of tangent omega t.
func TestPathOfDropIsInvolute(t *testing.T) {
	rng := random(t, 30)
	for range 50 {
		r, spin := between(rng, 4, 100), between(rng, 0.1, 1)*float64(1-2*rng.IntN(2))
		h := between(rng, 0.2, 0.9) * r
		m, track := follow(t, ring(r, spin), model.Release{Name: "drop", At: model.Station{Height: h}, Until: model.Until{Kind: model.UntilLanding}})
		end := measure.EndOf(m, track)
		unwound := math.Tan(math.Acos((r - h) / r))
		// The way is as exact as the square of the time, found to 1e-9.
		if want := (r - h) * unwound * unwound / 2; math.Abs(end.Path-want) > 4e-9*want {
			t.Fatalf("R = %g m, height %g m, spin %g: goes %.12g m, want %.12g", r, h, spin, end.Path, want)
		}
		if end.Slid != 0 || end.Impacts != 1 || end.Outcome != flight.Landed || end.Surface != "floor" {
			t.Fatalf("a drop ends with %+v", end)
		}
		if want := math.Abs(spin) * math.Sqrt(r*r-(r-h)*(r-h)); math.Abs(end.Speed-want) > 1e-8*want {
			t.Fatalf("it lands at %.12g m/s, want %.12g", end.Speed, want)
		}
	}
}

// TestSlideOnFloor tries the way slid along the floor: friction changes the
// inertial speed u of the body's centre, at the distance q from the axis, by mu
// u^2/q a second towards that of the floor, U. So 1/u grows, or falls, evenly,
// and where the body stops it has slid (q/mu)(ln(u/U) - 1 + U/u) spinward, the
// same with its sign turned antispinward.
func TestSlideOnFloor(t *testing.T) {
	const r, spin, mu = 18.0, 0.5, 0.3
	q := r - 0.1
	floor := spin * q
	for _, v := range []float64{0.5, 3, -0.5, -3, 8, -6} {
		in := ring(r, spin)
		m, track := follow(t, in, model.Release{Name: "slide", Own: ball(0.3, mu), At: model.Station{Height: 0.1}, Start: model.Start{Kind: model.Velocity, VSpinward: v}})
		end := measure.EndOf(m, track)
		u := floor + v
		want := math.Abs(q / mu * (math.Log(u/floor) - 1 + floor/u))
		// It counts as at rest below 2e-5 m/s, which it would lose in 1e-10 m; the
		// integration is good to 1e-9 of the way.
		if tol := 1e-8*want + 1e-9; end.Outcome != flight.Rested || math.Abs(end.Slid-want) > tol || math.Abs(end.Path-end.Slid) > tol {
			t.Errorf("at %g m/s: %v after sliding %.12g m of %.12g, want %.12g", v, end.Outcome, end.Slid, end.Path, want)
		}
		if end.Speed != 0 || end.Surface != "floor" {
			t.Errorf("at %g m/s: ends on %q at %g m/s", v, end.Surface, end.Speed)
		}
		// Where it is: along the floor, wrapped.
		if way := math.Remainder(math.Copysign(want, v)/q, 2*math.Pi) * r; math.Abs(end.Arc-way) > 1e-7 {
			t.Errorf("at %g m/s: rests at arc %.12g m, want %.12g", v, end.Arc, way)
		}
	}
}

// TestPathIsSumOfChords tries path and slide of bounces and slides in air
// against the chords of the track in the habitat: together a little shorter.
func TestPathIsSumOfChords(t *testing.T) {
	rng := random(t, 31)
	for range 8 {
		in := ring(between(rng, 5, 30), between(rng, 0.3, 0.9))
		in.Habitat.Length = 8
		in.Air = air.FromPressure(1e5, 290)
		m, track := follow(t, in, model.Release{Name: "toss", Own: ball(between(rng, 0, 0.6), between(rng, 0.05, 0.5)), At: model.Station{Height: 1},
			Start: model.Start{Kind: model.Thrown, Speed: 3, Heading: between(rng, 0, 6), Elevation: 0.6}})
		end := measure.EndOf(m, track)
		path, slid := 0.0, 0.0
		for i := range track.Phases {
			way := chords(m, track, track.Phases[i].T0, track.Phases[i].T1)
			path += way
			if track.Phases[i].Kind != flight.Free {
				slid += way
			}
		}
		// 4000 chords of a phase that bends by 6 rad at most: each is short by
		// the square of 6/4000, by 24.
		const short = 6.0 / 4000 * 6 / 4000 / 24
		if path > end.Path*(1+1e-9) || path < end.Path*(1-short) {
			t.Errorf("goes %.12g m, its chords %.12g", end.Path, path)
		}
		if slid > end.Slid*(1+1e-9)+1e-12 || slid < end.Slid*(1-short)-1e-12 {
			t.Errorf("slides %.12g m, its chords %.12g", end.Slid, slid)
		}
	}
}

// chords adds up those of a stretch of a track, m, in the habitat frame.
func chords(m *model.Model, track *flight.Track, from, to float64) float64 {
	const n = 4000
	at := func(k int) r3.Vec {
		time := from + (to-from)*float64(k)/n
		a := m.Motion.At(track.Begin + time)
		return a.In(track.At(time).Pos)
	}
	sum, last := 0.0, at(0)
	for k := 1; k <= n; k++ {
		now := at(k)
		sum, last = sum+r3.Norm(r3.Sub(now, last)), now
	}
	return sum
}

// TestRollingCountsAsSliding tries a ball that rolls along the floor: its way
// is part of what it slid or rolled.
func TestRollingCountsAsSliding(t *testing.T) {
	in := ring(18, 0.5)
	b := ball(0.2, 0.4)
	b.Rolls = true
	m, track := follow(t, in, model.Release{Name: "roll", Own: b, At: model.Station{Height: 0.1},
		Start: model.Start{Kind: model.Velocity, VAxial: 1}, Until: model.Until{Kind: model.UntilDuration, Duration: 4}})
	end := measure.EndOf(m, track)
	rolled := false
	for i := range track.Phases {
		rolled = rolled || track.Phases[i].Kind == flight.Roll
	}
	if !rolled || end.Path <= 1 || math.Abs(end.Slid-end.Path) > 1e-9*end.Path {
		t.Errorf("rolled %t, slid or rolled %g m of %g", rolled, end.Slid, end.Path)
	}
}

// TestEnds tries outcome and surface of the ways to end.
func TestEnds(t *testing.T) {
	hatch := model.Deck{Name: "floor", Friction: model.None, Restitution: model.None,
		Openings: []model.Opening{{Name: "outer hatch", Size: [2]float64{1, 1}}}}
	duration := model.Until{Kind: model.UntilDuration, Duration: 0.4}
	for _, c := range []struct {
		name    string
		decks   []model.Deck
		r       model.Release
		outcome flight.Outcome
		surface string
		impacts int
	}{
		{"in flight", nil, model.Release{At: model.Station{Height: 2}, Until: duration}, flight.TimeUp, "", 0},
		{"sliding", nil, model.Release{At: model.Station{Height: 0.1}, Until: duration, Start: model.Start{Kind: model.Velocity, VAxial: 5}}, flight.TimeUp, "floor", 0},
		{"at once", nil, model.Release{At: model.Station{Height: 0.1}}, flight.Rested, "floor", 1},
		{"at once, to land", nil, model.Release{At: model.Station{Height: 0.1}, Until: model.Until{Kind: model.UntilLanding}}, flight.Landed, "floor", 1},
		{"out of a hatch", []model.Deck{hatch}, model.Release{At: model.Station{Height: 0.3}}, flight.Lost, "", 0},
	} {
		c.r.Name, c.r.Own = "r", ball(0.2, 0.4)
		m, track := follow(t, ring(18, 0.5, c.decks...), c.r)
		end := measure.EndOf(m, track)
		if end.Outcome != c.outcome || end.Surface != c.surface || end.Impacts != c.impacts || end.Time != track.End {
			t.Errorf("%s: ends %v on %q after %d impacts and %g s, want %v on %q after %d", c.name, end.Outcome, end.Surface, end.Impacts, end.Time, c.outcome, c.surface, c.impacts)
		}
	}
}

// TestEventsAreImpacts tries the rows of impacts: in the order of time, each
// with speed, angle and energies of the body as it arrives.
func TestEventsAreImpacts(t *testing.T) {
	in := ring(12, 0.8)
	in.Habitat.Length, in.Habitat.CeilingRadius = 5, 8
	m, track := follow(t, in, model.Release{Name: "toss", Own: ball(0.6, 0.2), At: model.Station{Height: 1},
		Start: model.Start{Kind: model.Velocity, VSpinward: 2, VAxial: 4, VUp: 6}})
	events := measure.Events(m, track)
	if len(events) != len(track.Impacts) || len(events) < 6 {
		t.Fatalf("%d rows of %d impacts", len(events), len(track.Impacts))
	}
	for i, e := range events {
		hit := &track.Impacts[i]
		v, n := r3.Norm(hit.State.Vel), math.Abs(r3.Dot(hit.State.Vel, hit.Contact.Normal))
		if e.Kind != measure.Impact || e.Surface != hit.Surface || e.Time != hit.Time || i > 0 && e.Time < events[i-1].Time {
			t.Fatalf("row %d: %+v, the impact %+v", i, e, hit)
		}
		for _, c := range []struct {
			name      string
			got, want float64
		}{
			{"speed", e.Speed, v}, {"normal speed", e.NormalSpeed, n}, {"energy", e.Energy, v * v}, {"normal energy", e.Normal, n * n},
			{"cosine of incidence", v * math.Cos(e.Incidence), n}, {"axial place", e.Place.Z, hit.State.Pos.Z},
			{"height", e.Place.Height, 12 - math.Hypot(hit.State.Pos.X, hit.State.Pos.Y)},
			{"arc", e.Arc, 12 * math.Atan2(hit.State.Pos.Y, hit.State.Pos.X)},
		} {
			if math.Abs(c.got-c.want) > 256*epsilon*math.Max(c.want, 40) {
				t.Errorf("row %d: %s %.15g, want %.15g", i, c.name, c.got, c.want)
			}
		}
		// Where a point of the habitat moves to can be told from the track alone.
		if i == 0 && math.Abs(arrival(m, track, e.Time)-e.Speed) > 1e-4*e.Speed {
			t.Errorf("arrives at %g m/s, the row says %g", arrival(m, track, e.Time), e.Speed)
		}
	}
}

// arrival is the speed in the habitat just before a time, by a difference over
// a microsecond, in which it changes by less than 1e-4 of itself.
func arrival(m *model.Model, track *flight.Track, at float64) float64 {
	return chords(m, track, at-1e-6, at) / 1e-6
}

// TestNoMassNoEnergy tries that a body without a mass has no energy.
func TestNoMassNoEnergy(t *testing.T) {
	m, track := follow(t, ring(12, 0.8), model.Release{Name: "point", At: model.Station{Height: 1}, Until: model.Until{Kind: model.UntilLanding}})
	if e := measure.Events(m, track); len(e) != 1 || !math.IsNaN(e[0].Energy) || !math.IsNaN(e[0].Normal) || math.IsNaN(e[0].Speed) {
		t.Errorf("%+v", e)
	}
}
