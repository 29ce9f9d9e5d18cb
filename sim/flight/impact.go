package flight

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/frame"
	"offplumb/sim/geom"
)

// leastRise is the height, in m, that a rebound must reach: one that would
// rise less ends the bouncing, which would else take infinitely many impacts
// in a finite time. A body of restitution e that falls from 1 m so bounces
// ln(1000)/(2 ln(1/e)) times.
const leastRise = 1e-3

// grip gives restitution and friction between a body and a surface: those of
// the surface win.
func (f *Flier) gripOf(id geom.SurfaceID) (restitution, friction float64) {
	restitution, friction = f.body.Restitution, f.body.Friction
	s := f.m.Interior.Surface(id)
	if !math.IsNaN(s.Restitution) {
		restitution = s.Restitution
	}
	if !math.IsNaN(s.Friction) {
		friction = s.Friction
	}
	return restitution, friction
}

// strike changes velocity and spin (habitat frame) by the impulse of one
// surface: normal restitution e, and Coulomb friction that is limited by
// sticking (Brach, Mechanical Impact Dynamics, 1991, chapter 5; from memory).
// With the contact point's velocity u across the normal n, the impulse by mass
// is (1 + e)|v.n| along n and
//
//	min(mu (1 + e) |v.n|, |u|)      against u, of a body that does not roll
//	min(mu (1 + e) |v.n|, 2/7 |u|)  against u, of a solid sphere that rolls
//
// Law: the energy in the surface's frame does not grow, for 0 <= e <= 1.
func (f *Flier) strike(n, v, w r3.Vec, e, mu float64) (r3.Vec, r3.Vec) {
	into := -r3.Dot(v, n)
	v = r3.Add(v, r3.Scale((1+e)*into, n))
	u, share := v, 1.0
	if f.body.Rolls && f.wide > 0 {
		u, share = r3.Sub(v, r3.Scale(f.wide, r3.Cross(w, n))), 2.0/7
	}
	u = r3.Sub(u, r3.Scale(r3.Dot(u, n), n))
	speed := r3.Norm(u)
	if speed == 0 {
		return v, w
	}
	j := r3.Scale(-math.Min(mu*(1+e)*into, share*speed)/speed, u)
	v = r3.Add(v, j)
	if share < 1 {
		w = r3.Add(w, r3.Scale(-2.5/f.wide, r3.Cross(n, j)))
	}
	return v, w
}

// mostStrikes bounds the impulses of one instant, in a corner.
const mostStrikes = 30

// collide lets a body that touches surfaces at t (s, habitat time) rebound
// from those that it moves into, and gives the state after and the impacts.
// Where a rebound would not rise, the body stays.
func (f *Flier) collide(t float64, now *moving, touches []geom.Touch) (hits []int) {
	for k := range mostStrikes {
		i, into := -1, parting
		for j := range touches {
			if x := -r3.Dot(now.v, touches[j].Normal); x > into {
				i, into = j, x
			}
		}
		if i < 0 {
			return hits
		}
		hits = append(hits, i)
		e, mu := f.gripOf(touches[i].Surface)
		if k > mostStrikes/2 || !f.rises(t, now, &touches[i], e*into, mu, e) {
			e = 0
		}
		now.v, now.w = f.strike(touches[i].Normal, now.v, now.w, e, mu)
	}
	// Wedged in a corner: nothing is left of the motion.
	now.v = r3.Vec{}
	return hits
}

// rises says whether a rebound at the given speed (m/s) is one: it rises
// leastRise before the surface has the body back, or nothing presses it there.
func (f *Flier) rises(t float64, now *moving, c *geom.Touch, speed, mu, e float64) bool {
	v, _ := f.strike(c.Normal, now.v, now.w, e, mu)
	v = r3.Sub(v, r3.Scale(r3.Dot(v, c.Normal), c.Normal))
	a := f.m.Motion.At(t)
	_, rate := f.bend(now.q, v, c.Group)
	press := -r3.Dot(f.pull(&a, t, frame.State{Pos: now.q, Vel: v}), c.Normal) - r3.Dot(v, rate)
	return press <= 0 || speed*speed > 2*press*leastRise
}

// moving is a body at an instant, in the habitat frame.
type moving struct {
	t       float64 // s since the release
	q, v, w r3.Vec  // m, m/s, rad/s relative to the habitat
}
