package flight

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/frame"
	"offplumb/sim/geom"
	"offplumb/sim/model"
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
		u, share = r3.Sub(v, r3.Scale(f.wide, r3.Cross(w, n))), rollShare
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

// rollShare is the share of its slip that a solid sphere which grips loses in
// velocity; its spin takes the rest.
const rollShare = 2.0 / 7

// mostStrikes bounds the impulses of one instant, in a corner.
const mostStrikes = 30

// struck is one impulse.
type struck struct {
	i int    // index of the touch
	v r3.Vec // m/s, velocity before
}

// collide lets a body that touches surfaces at t (s, habitat time) rebound
// from those that it moves into, and gives the impacts. Where a rebound would
// not rise, the body stays; so does one that a corner's friction lifts by so
// little.
func (f *Flier) collide(t float64, now *moving, touches []geom.Touch) (hits []struck) {
	for k := range mostStrikes {
		i := deepest(now.v, touches)
		if i < 0 {
			break
		}
		hits = append(hits, struck{i, now.v})
		e, mu := f.gripOf(touches[i].Surface)
		if into := -r3.Dot(now.v, touches[i].Normal); k > mostStrikes/2 || !f.rises(t, now, touches, i, e*into) {
			e = 0
		}
		now.v, now.w = f.strike(touches[i].Normal, now.v, now.w, e, mu)
	}
	if len(hits) > 0 {
		f.stayDown(t, now, touches)
		f.yield(now, touches)
	}
	return hits
}

// deepest gives the touch that a velocity goes into most, -1 for none.
func deepest(v r3.Vec, touches []geom.Touch) int {
	i, into := -1, parting
	for j := range touches {
		if x := -r3.Dot(v, touches[j].Normal); x > into {
			i, into = j, x
		}
	}
	return i
}

// stayDown takes away the rise of a body, after an impact, from surfaces that
// have it back before it rose by leastRise.
func (f *Flier) stayDown(t float64, now *moving, touches []geom.Touch) {
	for i := range touches {
		n := touches[i].Normal
		if up := r3.Dot(now.v, n); up > parting && f.fallsBack(t, now, touches, touches[i], leastRise) {
			now.v = r3.Sub(now.v, r3.Scale(up, n))
		}
	}
}

// yield takes from a velocity what still goes into surfaces that a body is
// wedged between, and all of it if that does not do.
func (f *Flier) yield(now *moving, touches []geom.Touch) {
	for range mostStrikes {
		i := deepest(now.v, touches)
		if i < 0 {
			return
		}
		n := touches[i].Normal
		now.v = r3.Sub(now.v, r3.Scale(r3.Dot(now.v, n), n))
	}
	now.v = r3.Vec{}
}

// rises says whether a rebound from touch i at the given speed (m/s) is one:
// it rises leastRise before the surface has the body back, or nothing presses
// it there.
func (f *Flier) rises(t float64, now *moving, touches []geom.Touch, i int, speed float64) bool {
	e, mu := f.gripOf(touches[i].Surface)
	n := touches[i].Normal
	after := *now
	after.v, after.w = f.strike(n, now.v, now.w, e, mu)
	after.v = r3.Sub(after.v, r3.Scale(r3.Dot(after.v, n), n))
	press := f.presses(t, after, touches, touches[i])
	return press <= 0 || speed*speed > 2*press*leastRise
}

// presses is the acceleration (m/s^2) by which a body that moves along the
// touch c is pressed on it: also by the friction of what else it stands on, if it
// rolls.
func (f *Flier) presses(t float64, now moving, touches []geom.Touch, c geom.Touch) float64 {
	a := f.m.Motion.At(t)
	var others []geom.Touch
	for k := range touches {
		if touches[k].Patch != c.Patch && r3.Dot(now.v, touches[k].Normal) <= parting {
			others = append(others, touches[k])
		}
	}
	all, pull := f.pushes(&a, t, &now, others)
	sub := subset(all, pressed(all, pull))
	balance(sub, pull)
	acc := f.rub(&a, sub, nil, pull, now.v, now.w, true).acc
	return -f.gapAccel(now.q, now.v, acc, c.Patch)
}

// meet lets the body rebound and records the impacts, each surface once.
func (f *Flier) meet(t *Track, now *moving, touches []geom.Touch, known []geom.Patch) {
	before := *now
	if t.Release.Until.Kind == model.UntilLanding && len(touches) == 1 && len(known) == 0 && deepest(now.v, touches) == 0 {
		// It stops as it arrives: what becomes of its motion is of no interest.
		f.record(t, *now, &touches[0])
		return
	}
	for _, hit := range f.collide(t.Begin+now.t, now, touches) {
		c := &touches[hit.i]
		// A slide into its own surface is a matter of the integration's error.
		if hasGroup(known, c.Group) && -r3.Dot(before.v, c.Normal) <= creep || t.hitNow(now.t, c.Surface) {
			continue
		}
		f.record(t, moving{t: now.t, q: now.q, v: hit.v}, c)
	}
}

// touched records as impacts the surfaces that the body has come to be pressed
// on without an impact.
func (f *Flier) touched(t *Track, now *moving, s stance, known []geom.Patch) {
	for i := range s.on {
		if !hasGroup(known, s.on[i].Group) && !t.hitNow(now.t, s.on[i].Surface) {
			f.record(t, *now, &s.on[i])
		}
	}
}

// hitNow says whether an impact at this time with this surface is recorded.
func (t *Track) hitNow(time float64, id geom.SurfaceID) bool {
	for i := len(t.Impacts) - 1; i >= 0 && t.Impacts[i].Time == time; i-- {
		if t.Impacts[i].Contact.Surface == id {
			return true
		}
	}
	return false
}

func (f *Flier) record(t *Track, at moving, c *geom.Touch) {
	t.Impacts = append(t.Impacts, Impact{Time: at.t, State: frame.State{Pos: at.q, Vel: at.v}, Contact: c.Contact,
		Surface: f.m.Interior.Surface(c.Surface).Name})
}
