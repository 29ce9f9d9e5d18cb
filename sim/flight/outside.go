package flight

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/integrator"
)

// Outside of the hull there is no air. A flight ends where the body's centre
// passes the hull's outer face, so that its forces are smooth within a phase,
// and goes on from there. Back in, it counts only once it is deeper than a
// margin: so a passing is never met twice.

// outer is the passing of the hull of a body that is followed outside.
type outer struct {
	follow    bool
	outside   bool    // the body is
	from      r3.Vec  // m, habitat components: where it was let go
	distance  float64 // m from there, beyond which it is lost
	margin    float64 // m
	back, far *apart  // it comes in again; it is too far away
}

// The places of the events of a flight that does not have them as one: the
// touch, the hull, the distance.
const (
	hullEvent = 1
	farEvent  = 2
)

// outerOf prepares the events of a body outside.
func outerOf(f *Flier) outer {
	o := f.m.Solver.Outside
	return outer{follow: o.Follow, distance: o.Distance, back: &apart{f: f, back: true}, far: &apart{f: f, far: true}}
}

// outside is the distance of a body outside from coming in again, or from being
// lost. In the hull how far it is from where it was let go does not count.
func (g *apart) outside(p r3.Vec) float64 {
	o := &g.f.out
	beyond := g.f.m.Interior.Beyond(p)
	if g.back {
		return beyond + o.margin
	}
	return math.Max(o.distance-r3.Norm(r3.Sub(p, o.from)), -beyond)
}

// covers is the time, s, that a way (m) takes at the least, from a speed (m/s)
// that grows by acc (m/s^2) at most.
func covers(way, speed, acc float64) float64 {
	return 2 * way / (speed + math.Sqrt(speed*speed+2*acc*way))
}

// leaving adds what ends a flight at the hull: the passing, and outside the
// loss far away.
func (f *Flier) leaving(e *ends) {
	o := &f.out
	if !o.outside {
		f.hull.ready()
		e.add(f.hull, 0, turns)
		return
	}
	o.back.ready()
	o.far.ready()
	e.add(o.back, 0, turns)
	e.add(o.far, 0, turns)
}

// lost says whether a flight ended with the loss of the body. Of one that is
// followed outside a passing of the hull is noted, and is none.
func (f *Flier) lost(t *Track, now *moving, res integrator.Result) bool {
	event, o := res.Hits[0].Event, &f.out
	passed := event == hullEvent || len(f.goes.specs) == 1 && f.touch.Value(res.T, res.Y) > slop(f.free.base.Pos)/4
	switch {
	case passed && o.follow:
		o.outside = !o.outside
		f.airless(t, now)
		return false
	case passed:
		return true
	}
	return o.outside && event == farEvent
}

// whereabouts notes at the start of a phase whether the body is outside. At the
// outer face what is known stays.
func (f *Flier) whereabouts(t *Track, now *moving) {
	o := &f.out
	if !o.follow {
		return
	}
	if now.t == 0 {
		o.from, o.outside = t.Local.Pos, false
	}
	o.margin = thin + slop(now.q)
	switch depth := f.m.Interior.Beyond(now.q); {
	case depth > o.margin:
		o.outside = true
	case depth < -2*o.margin:
		o.outside = false
	}
	f.airless(t, now)
}

// airless notes when the body first is outside, and that there is no air.
func (f *Flier) airless(t *Track, now *moving) {
	f.free.forces.ease(f.out.outside)
	if f.out.outside {
		f.quick = Quick{} // there is nothing to drift with; what was out may come in fast
	}
	if f.out.outside && t.Left < 0 {
		t.Left = now.t
	}
}
