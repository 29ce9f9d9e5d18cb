package flight

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/geom"
	"offplumb/sim/model"
)

// Outside of the hull there is no air. A flight ends where the body's centre
// passes the hull's outer face, so that its forces are smooth within a phase,
// and goes on from there. Back in, it counts only once it is deeper than thin:
// so a passing is never met twice.

// outer is the passing of the hull of a body that is followed outside.
type outer struct {
	in       *geom.Interior
	follow   bool
	outside  bool   // the body is
	from     r3.Vec // m, habitat components: where it was let go
	back     *apart // it comes in again
	far      *apart // it is too far away
	distance float64
}

// The places of the events of a flight: the touch, the hull, the distance.
const (
	hullEvent = 1
	farEvent  = 2
)

// outerOf prepares the events of a body outside.
func outerOf(f *free, m *model.Model) outer {
	in := m.Interior
	return outer{in: in, follow: m.Solver.Outside.Follow, distance: m.Solver.Outside.Distance,
		back: &apart{free: f, step: never, of: func(p r3.Vec) float64 { return in.Beyond(p) + thin }},
		far:  &apart{free: f, step: never}}
}

// leaving adds what ends a flight at the hull: its loss, or where it is
// followed outside, the passing, and its loss far away. In the hull the
// distance does not count.
func (f *Flier) leaving(e *ends) {
	o := &f.out
	if !o.follow || !o.outside {
		e.add(f.hull, 0, turns)
		return
	}
	o.back.step, o.far.step = never, never
	o.far.of = func(p r3.Vec) float64 {
		return math.Max(o.distance-r3.Norm(r3.Sub(p, o.from)), -o.in.Beyond(p))
	}
	e.add(o.back, 0, turns)
	e.add(o.far, 0, turns)
}

// lost says whether an event of a flight is the loss of the body; a passing of
// the hull is noted.
func (f *Flier) lost(t *Track, now *moving, event int) bool {
	o := &f.out
	switch {
	case !o.follow:
		return event == hullEvent
	case event == hullEvent:
		o.outside = !o.outside
		f.passes(t, now)
		return false
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
		o.from, o.outside = now.q, false
	}
	switch depth := o.in.Beyond(now.q); {
	case depth > thin:
		o.outside = true
	case depth < -2*thin:
		o.outside = false
	}
	f.passes(t, now)
}

// passes notes when the body first is outside, and that there is no air.
func (f *Flier) passes(t *Track, now *moving) {
	if f.free.forces.calm = f.out.outside; f.out.outside && t.Left < 0 {
		t.Left = now.t
	}
}
