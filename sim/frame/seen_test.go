package frame_test

import (
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/frame"
)

// TestSeenIsToHabitat holds the short way of a steady spin against the attitude.
func TestSeenIsToHabitat(t *testing.T) {
	s := frame.State{Pos: r3.Vec{X: 20, Y: -7, Z: 3}, Vel: r3.Vec{X: 1.5, Y: 4, Z: -2}}
	for _, spin := range []float64{0.4, -0.4} {
		for _, at := range []float64{0, 1.7, 30} {
			w := frame.Steady{Spin: spin}
			a := w.At(at)
			if got, want := frame.Seen(w, at, s), a.ToHabitat(s); got != want {
				t.Errorf("spin %g at %g s: %v, want %v", spin, at, got, want)
			}
		}
	}
}
