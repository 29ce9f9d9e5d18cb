package measure_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/flight"
	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// flownOutside flies the first release of a scenario.
func flownOutside(t *testing.T, in model.Model) (*model.Model, *flight.Track) {
	t.Helper()
	in.Solver = model.Solver{RelTol: model.DefaultRelTol, PosTol: model.DefaultPosTol, VelTol: model.DefaultVelTol, MaxTime: 60, Outside: in.Solver.Outside}
	in.Output = model.Output{Step: 0.05}
	m, problems := model.New(in)
	if problems != nil {
		t.Fatal(problems)
	}
	let, fault := flight.Release(m, &m.Releases[0], nil)
	if fault.Msg != "" {
		t.Fatal(fault)
	}
	track, err := flight.NewFlier(m).Fly(&let)
	if err != nil {
		t.Fatal(err)
	}
	return m, track
}

// TestOutsideOfArm lets a point go beside an arm, on the side that the arm goes
// away from: after the time u it stands at r (1, omega u) in the inertial frame,
// seen in the habitat at sqrt(1 + (omega u)^2) r, by atan(omega u) - omega u
// round. The cabin at the other end comes by.
func TestOutsideOfArm(t *testing.T) {
	const spin, r = 0.5, 6.0
	cabin := func(name string, at float64) model.Room {
		return model.Room{Name: name, Shape: model.Cabin, FloorRadius: 14, Size: [3]float64{6, 4, 2.4}, Spinward: model.Arc{Value: at, IsAngle: true}}
	}
	in := model.Model{Habitat: model.Habitat{Room: model.Room{FloorRadius: 2, Length: 4}, Spin: spin},
		Rooms:    []model.Room{cabin("near", 0), cabin("far", math.Pi)},
		Passages: []model.Passage{{Name: "a", FromRadius: 2, ToRadius: 11.6, Width: 1.2}, {Name: "b", FromRadius: 2, ToRadius: 11.6, Width: 1.2, Spinward: model.Arc{Value: math.Pi, IsAngle: true}}},
		Releases: []model.Release{{Name: "behind", At: model.Station{HasRadius: true, Radius: r, Spinward: model.Arc{Value: -1.4}}}}}
	in.Solver.Outside = model.Outside{Follow: true, Distance: 80}
	m, track := flownOutside(t, in)
	o, ok := measure.OutsideOf(m, track)
	if !ok || track.Outcome != flight.Lost || o.Left != 0 || o.Swept != "" {
		t.Fatalf("%v: %+v", track.Outcome, o)
	}
	if math.Abs(o.LeftSpeed-spin*r) > 1e-12 || math.Abs(o.Leaves) > 1e-12 || math.Abs(o.Distance-80) > 1e-8 {
		t.Errorf("it leaves with %.15g m/s at %g rad and ends %.12g m away", o.LeftSpeed, o.Leaves, o.Distance)
	}
	// Brute force over the closed form.
	phi, best, away, falls, last := -1.4/r, math.Inf(1), 0.0, false, 0.0
	for u := 0.0; u < track.End; u += 1e-3 {
		x := spin * u
		rho, at := r*math.Hypot(1, x), phi+math.Atan(x)-x
		gap := m.Interior.Dist(r3.Vec{X: rho * math.Cos(at), Y: rho * math.Sin(at)})
		if falls && gap > last && away > 1 {
			best = math.Min(best, last)
		}
		away, falls, last = math.Max(away, gap), gap < last, gap
	}
	if math.Abs(o.Again-best) > 1e-4 {
		t.Errorf("what comes round passes at %.9g m, by brute force %.9g m", o.Again, best)
	}
	rows := measure.OutsideSamples(m, track)
	if len(rows) < 10 || math.Abs(rows[len(rows)-1].Distance-80) > 1e-8 || rows[0].Distance != 0 {
		t.Errorf("%d rows, the last %+v", len(rows), rows[len(rows)-1])
	}
	if l := measure.Land(m, track); math.Abs(l.Away-80) > 1e-8 || l.Uniform.Lands {
		t.Errorf("its landing is %+v", l)
	}
}

// TestDecksUnderAmbient holds the figures of a deck to the sums of vectors: a
// pull g across the axis adds to and takes from omega^2 r, and leans the bob by
// asin(g/(omega^2 r)) at the most; one along the axis leans it by
// atan(g/(omega^2 r)).
func TestDecksUnderAmbient(t *testing.T) {
	const r, spin, g = 12.0, 0.6, 1.62
	c := spin * spin * r
	for _, k := range []struct {
		pull              r3.Vec
		least, most, tilt float64
	}{
		{r3.Vec{X: 0.6, Y: -0.8}, c - g, c + g, math.Asin(g / c)},
		{r3.Vec{Z: 1}, math.Hypot(c, g), math.Hypot(c, g), math.Atan(g / c)},
	} {
		m, problems := model.New(model.Model{Habitat: model.Habitat{Room: model.Room{FloorRadius: r}, Spin: spin}, Ambient: model.Ambient{Strength: g, Direction: k.pull}})
		if problems != nil {
			t.Fatal(problems)
		}
		d := measure.DeckFigures(m)[0]
		if math.Abs(d.Least-k.least) > 1e-12 || math.Abs(d.Most-k.most) > 1e-12 || math.Abs(d.Tilt-k.tilt) > 1e-9 {
			t.Errorf("%+v, want %+v", d.Pulled, k)
		}
		if names := measure.DeckTable(measure.DeckFigures(m)).Columns; len(names) != 10 {
			t.Errorf("decks.csv has %d columns", len(names))
		}
	}
}

// TestFallsThroughAndBack throws a point outward through a hole in a deck, to
// where a pull toward the axis turns it round, barely beyond or not: the passing
// and the return may lie in one step, which ends within the deck.
func TestFallsThroughAndBack(t *testing.T) {
	for _, speed := range []float64{3, 3.12, 3.13, 3.2, 4} {
		in := model.Model{Habitat: model.Habitat{Room: model.Room{FloorRadius: 20, Length: 30}}, Ambient: model.Ambient{Strength: 1.62, Direction: r3.Vec{X: -1}},
			Decks: []model.Deck{{Name: "upper", Radius: 15, Thickness: 0.05, Whole: true, Friction: model.None, Restitution: model.None,
				Openings: []model.Opening{{Name: "hole", Size: [2]float64{4, 4}}}}},
			Releases: []model.Release{{Name: "down and up", At: model.Station{HasRadius: true, Radius: 12},
				Start: model.Start{Kind: model.Velocity, VUp: -speed}, Until: model.Until{Kind: model.UntilDuration, Duration: 4.8}}}}
		m, track := flownOutside(t, in)
		through := measure.FellThrough(m, track, track.End)
		if fell := 12+speed*speed/(2*1.62) > 15; fell != (len(through) == 1 && through[0] == "hole") {
			t.Errorf("%g m/s: it falls through %v", speed, through)
		}
	}
}
