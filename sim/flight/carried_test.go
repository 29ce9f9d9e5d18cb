package flight_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/crew"
	"offplumb/sim/flight"
	"offplumb/sim/model"
)

// TestCarriedInheritsVelocity tries that what a person under way lets go has
// the velocity of the point that held it, by differences of that point's
// places in the inertial frame, and a throw on top of it.
func TestCarriedInheritsVelocity(t *testing.T) {
	const speed, step = 1.3, 1e-5 // m/s; s
	in := ring(18, -0.5)
	in.Crews = []model.Crew{{Name: "rigger", Mass: 84, Stature: 1.78, Breadth: 0.5, Waist: model.WaistShare, Head: model.HeadShare}}
	z := 3.0
	in.Paths = []model.Path{{Name: "round", Crew: "rigger", Time: 4, Start: model.Station{Spinward: model.Arc{Value: 2}}, Legs: []model.Leg{
		{Kind: model.Walk, Spinward: &model.Arc{Value: 9}, Axial: &z, Speed: speed, Ramp: 0.5},
		{Kind: model.Climb, Distance: 4, Speed: 0.4, Ramp: 0.5},
	}}}
	reach := model.Reach{Spinward: 0.4, Axial: -0.3, Height: 1.1}
	rng := random(t, 6)
	for range 40 {
		at := between(rng, 0.1, 15)
		r := model.Release{Name: "tool", Carried: &model.Carried{Path: "round", Time: at, Reach: reach}, Until: model.Until{Kind: model.UntilLanding}}
		var push r3.Vec // spinward, axial, up
		if rng.IntN(2) == 0 {
			push = r3.Vec{X: between(rng, -2, 2), Y: between(rng, -2, 2), Z: between(rng, -2, 2)}
			r.Start = model.Start{Kind: model.Velocity, VSpinward: push.X, VAxial: push.Y, VUp: push.Z}
		}
		in.Releases = []model.Release{r}
		m, problems := model.New(in)
		if len(problems) > 0 {
			t.Fatal(problems)
		}
		plan, problems := crew.NewPlan(m, &m.Paths[0])
		if len(problems) > 0 {
			t.Fatal(problems)
		}
		let, problem := flight.Release(m, &m.Releases[0], plan)
		if problem.Msg != "" {
			t.Fatal(problem)
		}
		track, err := flight.NewFlier(m).Fly(&let)
		if err != nil {
			t.Fatal(err)
		}
		pos, _ := plan.State(m, at, reach)
		back, _ := plan.State(m, at-step, reach)
		ahead, _ := plan.State(m, at+step, reach)
		vel := r3.Scale(0.5/step, r3.Sub(ahead, back))
		// The throw's directions are those at the hand.
		a := m.Motion.At(4 + at)
		out := r3.Unit(r3.Vec{X: pos.X, Y: pos.Y})
		vel = r3.Add(vel, r3.Add(r3.Scale(push.X, r3.Cross(a.Z, out)), r3.Add(r3.Scale(push.Y, a.Z), r3.Scale(-push.Z, out))))
		// The third derivative is below 60 m/s^3; roundings of some 20 m.
		tol := 60*step*step + 16*epsilon*20/step
		if off := r3.Norm(r3.Sub(track.First.Vel, vel)); off > tol || math.Abs(let.Begin-4-at) > 8*epsilon*20 {
			t.Fatalf("let go after %g s: velocity %v m/s, that of the hand and the throw is %v", at, track.First.Vel, vel)
		}
		if off := r3.Norm(r3.Sub(track.First.Pos, pos)); off > 32*epsilon*20 {
			t.Fatalf("let go after %g s at %v, the hand is at %v", at, track.First.Pos, pos)
		}
	}
}
