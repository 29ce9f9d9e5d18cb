package study_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// TestThrowsUnderAmbient holds throws under a uniform pull, without spin, to the
// textbook: a target on the level at the distance d is reached at the speed v
// with sin(2e) = g d/v^2, twice; the slowest throw has v^2 = g d, at 45 deg.
// Toward a far centre it is nearly so.
func TestThrowsUnderAmbient(t *testing.T) {
	const g, d, v = 1.62, 8.0, 5.0
	for _, far := range []float64{0, 1.7e6} {
		in := model.Model{Habitat: model.Habitat{Room: model.Room{FloorRadius: 40, Length: 60}}, Ambient: model.Ambient{Strength: g, Direction: r3.Vec{X: 1}, Distance: far}}
		from, to := model.Station{Height: 30}, model.Station{Height: 30, Axial: d}
		tol := 1e-8
		if far > 0 {
			tol = 100 / far
		}
		low := math.Asin(g*d/(v*v)) / 2
		throws := solved(t, hall(t, in, model.ThrowTo{From: from, Target: model.Target{Station: to}, Speed: v, Longest: 20})).Aims[0].Throws
		if len(throws) != 2 {
			t.Fatalf("distance %g: %d throws, want 2", far, len(throws))
		}
		for i, e := range []float64{low, math.Pi/2 - low} {
			s := &throws[i]
			if math.Abs(s.V[2]-v*math.Sin(e)) > tol || math.Abs(s.V[1]-v*math.Cos(e)) > tol || s.Outcome != measure.ThrowArrives {
				t.Errorf("distance %g: %+v, want an elevation of %g rad", far, s.Throw, e)
			}
		}
		slow := solved(t, hall(t, in, model.ThrowTo{From: from, Target: model.Target{Station: to}, Least: true, Longest: 20})).Aims[0].Throws
		if len(slow) != 1 || math.Abs(slow[0].Speed-math.Sqrt(g*d)) > math.Max(tol, 1e-7) {
			t.Errorf("distance %g: the slowest are %+v, want %g m/s", far, slow, math.Sqrt(g*d))
		}
	}
}
