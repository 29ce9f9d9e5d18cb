package flight_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/flight"
	"offplumb/sim/model"
)

// thrownAt is a solid ball without spin that is thrown at a bulkhead, at an
// angle (rad) from its normal, in a habitat that does not turn.
func thrownAt(b model.Body, angle float64) model.Model {
	const speed = 5
	in := ring(40, 0)
	in.Habitat.Length = 4
	b.Name, b.Mass, b.Diameter, b.Rolls = "ball", 0.2, 0.06, true
	in.Bodies = []model.Body{b}
	sin, cos := math.Sincos(angle)
	in.Releases = []model.Release{{Name: "throw", Body: "ball", Until: model.Until{Kind: model.UntilDuration, Duration: 0.5 / (speed * cos)},
		At: model.Station{HasRadius: true, Radius: 20, Axial: -1.77}, Start: pushed(speed*sin, 0, 0)}}
	in.Releases[0].Start.VAxial = -speed * cos
	return in
}

// TestPlanarImpactOfSphere: a sphere that strikes a massive plane with the
// normal speed v and the tangential one u, with restitution e and friction mu,
// takes a tangential impulse of mu times the normal one, or of
//
//	mu_c = 2/7 u/(v (1 + e))
//
// times it where mu exceeds that and the sphere leaves rolling. The energy lost
// by mass is, with k the ratio taken,
//
//	(1 - e^2) v^2/2 + k (1 + e) u v - 7/4 k^2 (1 + e)^2 v^2
//
// (Brach, Mechanical Impact Dynamics, 1991, planar impact of a sphere on a
// plane; from memory). Most is lost at mu_c, where the second and third terms
// leave u^2/7.
func TestPlanarImpactOfSphere(t *testing.T) {
	const tol = 1e-12
	for _, e := range []float64{0, 0.3, 0.8, 1} {
		for _, mu := range []float64{0, 0.05, 0.2, 0.6} {
			for _, angle := range []float64{0.05, 0.4, 0.9, 1.3} {
				in := thrownAt(model.Body{Restitution: e, Friction: mu}, angle)
				_, track := one(t, in, flight.Setup{})
				if len(track.Impacts) != 1 || len(track.Phases) < 2 {
					t.Fatalf("e %g, mu %g, %g rad: %s", e, mu, angle, kinds(track))
				}
				before, after, spin := track.Impacts[0].State.Vel, track.Last.Vel, flight.SpinOf(&track.Phases[1])
				v, u := -before.Z, math.Hypot(before.X, before.Y)
				k := math.Min(mu, 2.0/7*u/(v*(1+e)))
				jn, jt := after.Z-before.Z, r3.Norm(r3.Sub(r3.Vec{X: before.X, Y: before.Y}, r3.Vec{X: after.X, Y: after.Y}))
				if math.Abs(jn-(1+e)*v) > tol || math.Abs(jt-k*jn) > tol {
					t.Errorf("e %g, mu %g, %g rad: impulses %.15g and %.15g m/s, want the ratio %.15g", e, mu, angle, jn, jt, k)
				}
				lost := (r3.Norm2(before)-r3.Norm2(after))/2 - 0.03*0.03/5*r3.Norm2(spin)
				want := (1-e*e)*v*v/2 + k*(1+e)*u*v - 7.0/4*k*k*(1+e)*(1+e)*v*v
				if math.Abs(lost-want) > 10*tol {
					t.Errorf("e %g, mu %g, %g rad: loses %.15g J/kg, want %.15g", e, mu, angle, lost, want)
				}
			}
		}
	}
}
