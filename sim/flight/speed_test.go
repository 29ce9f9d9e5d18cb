package flight_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/flight"
	"offplumb/sim/frame"
)

// TestSpeedSeenIsThatOfSeen holds the short way to a speed against the state in
// the habitat, in a steady spin and in one that will change.
func TestSpeedSeenIsThatOfSeen(t *testing.T) {
	// A turn keeps lengths: what is left are some 16 roundings of speeds of at
	// most 20 m/s.
	const most = 16 * 20 * 0x1p-53
	for _, changes := range [][]frame.Change{nil, {{Start: 1e5, Over: 10, To: 0.1}}} {
		w := throws(t, 1e-9, changes...)
		f := flight.NewFlier(w.m)
		for i := range w.lets[:50] {
			track, err := f.Fly(&w.lets[i])
			if err != nil {
				t.Fatal(err)
			}
			p := &track.Phases[0]
			for k := range p.Steps() {
				t0, t1 := p.Step(k)
				at := t0 + 0.3*(t1-t0)
				want, got := r3.Norm(track.Seen(p, k, at).Vel), track.SpeedSeen(p, k, at)
				if !(math.Abs(got-want) <= most) {
					t.Fatalf("throw %d, step %d: %g m/s, want %g", i, k, got, want)
				}
			}
		}
	}
}
