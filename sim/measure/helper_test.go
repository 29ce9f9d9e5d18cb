package measure_test

import (
	"math/rand/v2"
	"testing"

	"offplumb/sim/flight"
	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// epsilon is the distance from 1 to the next float64.
const epsilon = 0x1p-52

// random gives a generator with a fixed seed, which a failure prints.
func random(t testing.TB, stream uint64) *rand.Rand {
	t.Helper()
	const seed = 0x0ddba11
	t.Cleanup(func() {
		if t.Failed() {
			t.Logf("random numbers of PCG(%#x, %d)", seed, stream)
		}
	})
	return rand.New(rand.NewPCG(seed, stream))
}

// between gives a number from lo to hi.
func between(rng *rand.Rand, lo, hi float64) float64 { return lo + (hi-lo)*rng.Float64() }

// ring is a habitat without air, of radius r (m) and spin (rad/s).
func ring(r, spin float64, decks ...model.Deck) model.Model {
	return model.Model{
		Habitat: model.Habitat{Room: model.Room{FloorRadius: r}, Spin: spin},
		Decks:   decks,
		Solver:  model.Solver{RelTol: model.DefaultRelTol, PosTol: model.DefaultPosTol, VelTol: model.DefaultVelTol, MaxTime: model.DefaultMaxTime},
		Output:  model.Output{Step: model.DefaultStep},
	}
}

// valid makes the model.
func valid(t *testing.T, in model.Model) *model.Model {
	t.Helper()
	m, problems := model.New(in)
	for _, p := range problems {
		t.Fatalf("%s: %s", p.Key, p.Msg)
	}
	return m
}

// fly flies one release in a habitat.
func fly(t *testing.T, in model.Model, r model.Release) (*model.Model, *flight.Track) {
	t.Helper()
	if r.Until.Kind == model.UntilRest {
		r.Until.Kind = model.UntilLanding // the rest of it is no matter of these tests
	}
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

// land flies one release and measures its landing.
func land(t *testing.T, in model.Model, r model.Release) measure.Landing {
	t.Helper()
	m, track := fly(t, in, r)
	l := measure.Land(m, track)
	if l.Outcome != flight.Landed {
		t.Fatalf("outcome %v of a release at %+v", l.Outcome, r.At)
	}
	return l
}

// sphere is a release of a ball with a mass (kg) and a diameter (m).
func sphere(mass, diameter float64, at model.Station, start model.Start) model.Release {
	return model.Release{Name: "r", Own: &model.Body{Name: "ball", Mass: mass, Diameter: diameter}, At: at, Start: start}
}
