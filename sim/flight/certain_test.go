package flight_test

import (
	"math"
	"testing"

	"offplumb/sim/flight"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// TestSpinThatChangesLater flies the workload in a spin that changes long after
// the last landing: what is written out for a steady spin, and the general way,
// are to differ by roundings alone.
func TestSpinThatChangesLater(t *testing.T) {
	const tol = 1e-12
	steady := throws(t, tol)
	later := throws(t, tol, frame.Change{Start: 1e5, Over: 10, To: 0.1})
	f, g := flight.NewFlier(steady.m), flight.NewFlier(later.m)
	for i := range steady.lets {
		a, err := f.Fly(&steady.lets[i])
		if err != nil {
			t.Fatal(err)
		}
		b, err := g.Fly(&later.lets[i])
		if err != nil {
			t.Fatal(err)
		}
		p, q := a.Landing(), b.Landing()
		// The contact is found within a quarter of the slop, some 1e-13 of the
		// radius, which a slow approach turns into more along the deck.
		if far := math.Hypot(p.State.Pos.X-q.State.Pos.X, p.State.Pos.Y-q.State.Pos.Y); far > 1e-9 || p.Contact.Surface != q.Contact.Surface {
			t.Errorf("throw %d: lands %g m apart", i, far)
		}
	}
}

// TestJerkInFlight lets a ball hang all but still inside a ring that begins to
// turn, fast and within a blink, while the ball is far from everything. A pillar
// comes round and hits it, whatever the still ring promised. A fine sampling finds
// no touch before.
func TestJerkInFlight(t *testing.T) {
	for _, over := range []float64{1e-3, 0.1} {
		for _, spin := range []float64{2, -2} {
			const start, r = 5.0, 30.0
			in := ring(r, math.Copysign(1e-3, spin))
			in.Habitat.Changes = []frame.Change{{Start: start, Over: over, To: spin, Linear: true}}
			in.Solver.MaxTime = 12
			in.Bodies = []model.Body{{Name: "ball", Mass: 1, Diameter: 0.2}}
			in.Fixtures = []model.Fixture{{Name: "pillar", At: model.Station{Spinward: model.Arc{Value: -math.Copysign(20, spin)}},
				Size: [3]float64{1, 1, 12}, Friction: math.NaN(), Restitution: math.NaN()}}
			in.Releases = []model.Release{{Name: "ball", Body: "ball", At: model.Station{Height: 8}, Until: model.Until{Kind: model.UntilLanding}}}
			m := must(t, in)
			let, problem := flight.Release(m, &m.Releases[0], nil)
			if problem.Msg != "" {
				t.Fatal(problem)
			}
			track, err := flight.NewFlier(m).Fly(&let)
			if err != nil {
				t.Fatal(err)
			}
			if track.Landing() == nil {
				t.Fatalf("over %g: no landing", over)
			}
			hit, gap := track.Landing().Time, math.Inf(1)
			const looks = 200_000
			for k := range looks {
				time := hit * float64(k) / looks
				a := m.Motion.At(track.Begin + time)
				gap = math.Min(gap, m.Interior.Dist(a.ToHabitat(track.At(time)).Pos)-0.1)
			}
			if gap < -1e-9 || m.Interior.Surface(track.Landing().Contact.Surface).Name == "floor" {
				t.Errorf("over %g: passes through something by %g m, lands on %q at %g s", over, -gap, m.Interior.Surface(track.Landing().Contact.Surface).Name, hit)
			}
		}
	}
}
