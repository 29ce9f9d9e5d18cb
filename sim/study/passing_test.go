package study_test

import (
	"math"
	"math/rand/v2"
	"slices"
	"testing"

	"offplumb/sim/flight"
	"offplumb/sim/frame"
	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// TestPassingsAreFound: throws of all kinds near a hatch, in thick air and thin,
// pass it outward where a fine sampling of their tracks does, and nowhere else.
func TestPassingsAreFound(t *testing.T) {
	const seed, samples = 23, 3000
	r := rand.New(rand.NewPCG(seed, 1))
	found := 0
	for _, density := range []float64{0.5, 60} {
		in := hatched(ringSpin, overHatch(ringSpin))
		in.Air.Density = density
		in.Maps = nil
		m := prepared(t, in).Model
		deck := m.Decks[1].Radius
		flier := flight.NewFlier(m)
		for range 150 {
			rel := model.Release{Name: "r", Body: "b", Until: model.Until{Kind: model.UntilRest},
				At:    model.Station{Spinward: model.Arc{Value: 0.4 + 1.5*r.NormFloat64()}, Axial: 0.6 * r.NormFloat64(), Height: 0.3 + 5*r.Float64()},
				Start: model.Start{Kind: model.Velocity, VSpinward: 2 * r.NormFloat64(), VAxial: r.NormFloat64(), VUp: 6 * r.NormFloat64()}}
			let, fault := flight.Release(m, &rel, nil)
			if fault.Msg != "" || m.Obstructed(let.Place, 0.04) != "" {
				continue
			}
			track, err := flier.Fly(&let)
			if err != nil {
				t.Fatal(err)
			}
			want, before := false, frame.Polar{R: math.Inf(1)}
			for k := range samples + 1 {
				at := track.End * float64(k) / samples
				a := m.Motion.At(track.Begin + at)
				p := frame.PolarOf(a.In(track.At(at).Pos))
				if before.R <= deck && p.R > deck && m.Decks[1].OpeningAt(p.Phi, p.Z) != nil {
					want = true
				}
				before = p
			}
			got := slices.Contains(measure.FellThrough(m, track, track.End), "hatch")
			if got != want {
				t.Errorf("seed %d, density %g: %+v %+v: passes %v, sampled %v", seed, density, rel.At, rel.Start, got, want)
			}
			if want {
				found++
			}
		}
	}
	if found < 10 {
		t.Errorf("seed %d: only %d pass", seed, found)
	}
}
