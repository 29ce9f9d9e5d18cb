package crew_test

import (
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/crew"
	"offplumb/sim/model"
)

// epsilon is the distance from 1 to the next float64.
const epsilon = 0x1p-52

// random gives a generator with a fixed seed, which a failure prints.
func random(t testing.TB, stream uint64) *rand.Rand {
	t.Helper()
	const seed = 0x1adde7
	t.Cleanup(func() {
		if t.Failed() {
			t.Logf("random numbers of PCG(%#x, %d)", seed, stream)
		}
	})
	return rand.New(rand.NewPCG(seed, stream))
}

// between gives a number from lo to hi.
func between(rng *rand.Rand, lo, hi float64) float64 { return lo + (hi-lo)*rng.Float64() }

// rigger is the person on the paths below.
func rigger() model.Crew {
	return model.Crew{Name: "rigger", Mass: 84, Stature: 1.78, Breadth: model.DefaultBreadth, Waist: model.WaistShare, Head: model.HeadShare}
}

// plan works out a path of one person in an empty ring of radius r (m).
func plan(t *testing.T, r, spin float64, who model.Crew, start model.Station, legs ...model.Leg) (*model.Model, *crew.Plan) {
	t.Helper()
	in := model.Model{
		Habitat: model.Habitat{Room: model.Room{FloorRadius: r}, Spin: spin},
		Crews:   []model.Crew{who},
		Paths:   []model.Path{{Name: "path", Crew: who.Name, Start: start, Legs: legs}},
	}
	m, problems := model.New(in)
	for _, p := range problems {
		t.Fatalf("%s: %s", p.Key, p.Msg)
	}
	p, problems := crew.NewPlan(m, &m.Paths[0])
	for _, p := range problems {
		t.Fatalf("%s: %s", p.Key, p.Msg)
	}
	return m, p
}

// walk goes spinward by an arc (m) or an angle (rad), to it.
func walk(to, speed, ramp float64, angle bool) model.Leg {
	return model.Leg{Kind: model.Walk, Spinward: &model.Arc{Value: to, IsAngle: angle}, Speed: speed, Ramp: ramp}
}

func off(a, b r3.Vec) float64 { return r3.Norm(r3.Sub(a, b)) }
