package measure

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/air"
	"offplumb/sim/flight"
	"offplumb/sim/geom"
	"offplumb/sim/model"
)

// TestClearancesDoNotHangOnLooks tries that the closest approaches of tracks
// among boxes and decks are the same, to the nanometre, when the track is
// looked at elsewhere and three times as often.
func TestClearancesDoNotHangOnLooks(t *testing.T) {
	const seed = 0xc1ea
	rng := rand.New(rand.NewPCG(seed, 0))
	between := func(lo, hi float64) float64 { return lo + (hi-lo)*rng.Float64() }
	for round := range 40 {
		in := model.Model{Habitat: model.Habitat{Room: model.Room{FloorRadius: 14, Length: 10}, Spin: 0.6},
			Air:    air.FromPressure(air.DefaultPressure, air.DefaultTemperature),
			Solver: model.Solver{RelTol: model.DefaultRelTol, PosTol: model.DefaultPosTol, VelTol: model.DefaultVelTol, MaxTime: 20},
			Output: model.Output{Step: model.DefaultStep},
			Bodies: []model.Body{{Name: "b", Mass: 1, Diameter: 0.1, Restitution: 0.5, Friction: 0.3}}}
		for i := range 3 {
			in.Fixtures = append(in.Fixtures, model.Fixture{Name: string(rune('p' + i)), Friction: model.None, Restitution: model.None, Turn: between(0, 1),
				At: model.Station{Spinward: model.Arc{Value: 2*float64(i) - 2}, Axial: between(-2, 2)}, Size: [3]float64{between(0.3, 1.2), between(0.3, 1.2), between(0.3, 1.5)}})
		}
		in.Releases = []model.Release{{Name: "r", Body: "b", At: model.Station{Spinward: model.Arc{Value: between(-5, 5)}, Axial: between(-3, 3), Height: 2},
			Start: model.Start{Kind: model.Velocity, VSpinward: between(-3, 3), VAxial: between(-2, 2), VUp: between(-1, 3)}}}
		m, problems := model.New(in)
		if len(problems) > 0 {
			t.Fatal(problems)
		}
		let, problem := flight.Release(m, &m.Releases[0], nil)
		if problem.Msg != "" {
			t.Fatal(problem)
		}
		track, err := flight.NewFlier(m).Fly(&let)
		if err != nil {
			t.Fatal(err)
		}
		coarse := looks(m, track)
		var fine []float64
		for i := 1; i < len(coarse); i++ {
			for _, u := range []float64{0, 0.31, 0.67} {
				fine = append(fine, coarse[i-1]+u*(coarse[i]-coarse[i-1]))
			}
		}
		fine = append(fine, track.End)
		for g := range m.Interior.Groups() {
			a, b := nearestBy(m, track, geom.Group(g), coarse), nearestBy(m, track, geom.Group(g), fine)
			for id, c := range a {
				if d, ok := b[id]; !ok || math.Abs(d.Gap-c.Gap) > 1e-9 {
					t.Errorf("PCG(%#x, 0), round %d, %q: %.12g m after %.9g s, by more looks %.12g after %.9g", seed, round, m.Interior.Surface(id).Name, c.Gap, c.Time, d.Gap, d.Time)
				}
			}
		}
	}
}

func nearestBy(m *model.Model, t *flight.Track, g geom.Group, times []float64) map[geom.SurfaceID]Clearance {
	at := make([]r3.Vec, len(times))
	for i, time := range times {
		at[i] = localAt(m, t, time).Pos
	}
	out := map[geom.SurfaceID]Clearance{}
	closest(m, t, g, times, at, out)
	return out
}
