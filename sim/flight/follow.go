package flight

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/integrator"
	"offplumb/sim/frame"
	"offplumb/sim/geom"
	"offplumb/sim/model"
)

const (
	// mostPhases bounds the phases of one release: beyond, it is stuck
	// somewhere that the model cannot resolve.
	mostPhases = 20_000
	// mostSteps bounds the integration steps of one release, some seconds of
	// computing.
	mostSteps = 2_000_000
	// parting is the speed along a surface's normal, in m/s, below which a body
	// neither meets nor leaves it: slower, it would stay within a nanometre for
	// a second.
	parting = 1e-9
	// stepTurn is how far, in rad, the habitat turns in a step along a
	// surface, at most: the events without a bound are looked at once a step.
	stepTurn = 0.3
)

// follow takes a release through its phases: flight, impact, slide, roll,
// rest. At each turn the body rebounds from what it moves into; then it is
// pressed on what is left, and slides, rolls or rests there, or it flies.
func (f *Flier) follow(t *Track) error {
	now := f.start(t)
	known := groupsOf(f.touches(&now))
	var parted []geom.Group
	for range mostPhases {
		touches := f.touches(&now)
		f.meet(t, &now, touches, known)
		if f.over(t, &now) {
			return nil
		}
		idx := f.pressedOn(t, &now, touches, parted)
		f.touched(t, &now, touches, idx, known)
		known, parted = nil, nil
		var err error
		switch {
		case f.over(t, &now):
			return nil
		case len(idx) == 0:
			err = f.fly(t, &now)
		case f.rests(t, &now, touches, idx):
			return nil
		default:
			known = groupsOf(pick(touches, idx))
			parted, err = f.slideOn(t, &now, pick(touches, idx))
		}
		if err != nil || f.ended {
			return err
		}
		if t.Work.Steps > mostSteps {
			break
		}
	}
	f.end(t, &now, Stuck)
	return nil
}

// start is the body at its release.
func (f *Flier) start(t *Track) moving {
	f.ended, f.arrival = false, t.First
	now := moving{q: t.Local.Pos, v: t.Local.Vel}
	if t.Release.Start.Kind == model.Still {
		a := f.m.Motion.At(t.Begin)
		now.w = r3.Scale(-1, a.In(a.Omega)) // it does not turn with the habitat
	}
	return now
}

// slop is how far a body may be from a surface that it touches, m.
func slop(q r3.Vec) float64 { return model.TouchSlack * math.Max(1, r3.Norm(q)*1e-5) }

// touches lists the surfaces that the body touches, each direction once.
func (f *Flier) touches(now *moving) []geom.Touch {
	all := f.m.Interior.Touching(now.q, f.wide+slop(now.q), nil)
	out := all[:0]
	for _, c := range all {
		if !hasNormal(out, c.Normal) {
			out = append(out, c)
		}
	}
	return out
}

// alike is the cosine above which two normals are one contact.
const alike = 1 - 1e-6

func hasNormal(list []geom.Touch, n r3.Vec) bool {
	for i := range list {
		if r3.Dot(list[i].Normal, n) > alike {
			return true
		}
	}
	return false
}

func groupsOf(list []geom.Touch) []geom.Group {
	var out []geom.Group
	for i := range list {
		out = append(out, list[i].Group)
	}
	return out
}

func hasGroup(list []geom.Group, g geom.Group) bool {
	for _, x := range list {
		if x == g {
			return true
		}
	}
	return false
}

func pick(list []geom.Touch, idx []int) []geom.Touch {
	var out []geom.Touch
	for _, i := range idx {
		out = append(out, list[i])
	}
	return out
}

// meet lets the body rebound and records the impacts.
func (f *Flier) meet(t *Track, now *moving, touches []geom.Touch, known []geom.Group) {
	before := *now
	for _, i := range f.collide(t.Begin+now.t, now, touches) {
		// A slide into its own surface is a matter of rounding.
		if hasGroup(known, touches[i].Group) && -r3.Dot(before.v, touches[i].Normal) <= parting {
			continue
		}
		f.record(t, before, &touches[i])
		before.v = now.v // what a second surface is met with, in a corner
	}
}

// touched records as impacts the surfaces that the body has come to be pressed
// on without an impact.
func (f *Flier) touched(t *Track, now *moving, touches []geom.Touch, idx []int, known []geom.Group) {
	for _, i := range idx {
		if !hasGroup(known, touches[i].Group) && !t.hitNow(now.t, touches[i].Surface, f.m.Interior) {
			f.record(t, *now, &touches[i])
		}
	}
}

// hitNow says whether an impact at this time with this surface is recorded.
func (t *Track) hitNow(time float64, id geom.SurfaceID, in *geom.Interior) bool {
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

// over ends a release that is to stop at its landing, or whose time is up.
func (f *Flier) over(t *Track, now *moving) bool {
	switch {
	case t.Release.Until.Kind == model.UntilLanding && len(t.Impacts) > 0:
		f.end(t, now, Landed)
		// It stops as it arrives.
		t.Last = f.arrival
		return true
	case now.t >= f.longest(t.Release):
		f.end(t, now, TimeUp)
		return true
	}
	return false
}

// pressedOn gives the touches that the body is pressed on, of those that it
// has not just parted from and does not leave.
func (f *Flier) pressedOn(t *Track, now *moving, touches []geom.Touch, parted []geom.Group) []int {
	var idx []int
	var all []push
	for i := range touches {
		away := r3.Dot(now.v, touches[i].Normal)
		if away > parting || hasGroup(parted, touches[i].Group) {
			continue
		}
		now.v = r3.Sub(now.v, r3.Scale(away, touches[i].Normal))
		idx = append(idx, i)
	}
	a := f.m.Motion.At(t.Begin + now.t)
	pull := f.pull(&a, t.Begin+now.t, frame.State{Pos: now.q, Vel: now.v})
	for _, i := range idx {
		_, mu := f.gripOf(touches[i].Surface)
		_, rate := f.bend(now.q, now.v, touches[i].Group)
		all = append(all, push{normal: touches[i].Normal, closing: r3.Dot(now.v, rate), mu: mu})
	}
	var out []int
	for _, k := range pressed(all, pull, func(p []push) r3.Vec { return f.dragging(p, pull, now.v) }) {
		out = append(out, idx[k])
	}
	return out
}

// dragging is the friction that contacts would give.
func (f *Flier) dragging(p []push, pull, v r3.Vec) r3.Vec {
	for i := range p {
		pull = r3.Add(pull, r3.Scale(p[i].force, p[i].normal))
	}
	return friction(p, v, pull)
}

// rests ends a release whose body has stopped where friction holds it.
func (f *Flier) rests(t *Track, now *moving, touches []geom.Touch, idx []int) bool {
	slow := creep
	if f.body.Rolls {
		slow = rollCreep
	}
	if r3.Norm(now.v) > 2*slow { // twice: the event stops short of it
		return false
	}
	a := f.m.Motion.At(t.Begin + now.t)
	pull := f.pull(&a, t.Begin+now.t, frame.State{Pos: now.q})
	var all []push
	for _, i := range idx {
		_, mu := f.gripOf(touches[i].Surface)
		if f.body.Rolls && len(idx) == 1 {
			mu = level
		}
		all = append(all, push{normal: touches[i].Normal, mu: mu})
	}
	on := holds(all, pull)
	if on == nil {
		return false
	}
	now.v, now.w = r3.Vec{}, r3.Vec{}
	f.lay(t, &touches[idx[on[0]]])
	t.Phases = append(t.Phases, Phase{Kind: Rest, local: true, base: frame.State{Pos: now.q}, T0: now.t, T1: now.t, Surface: f.m.Interior.Surface(touches[idx[on[0]]].Surface).Name})
	outcome := Rested
	switch {
	case faced(all, on):
		outcome = Stuck
	case t.Release.Until.Kind == model.UntilLanding:
		outcome = Landed
	}
	f.end(t, now, outcome)
	return true
}

// lay gives a body that never left what it touched at its release a landing
// there, at the release.
func (f *Flier) lay(t *Track, c *geom.Touch) {
	if len(t.Impacts) == 0 {
		f.record(t, moving{q: t.Local.Pos, v: t.Local.Vel}, c)
	}
}

// inertial gives the inertial state of a body.
func (f *Flier) inertial(t *Track, now *moving) frame.State {
	a := f.m.Motion.At(t.Begin + now.t)
	return a.ToInertial(frame.State{Pos: now.q, Vel: now.v})
}

// end ends a track.
func (f *Flier) end(t *Track, now *moving, o Outcome) {
	f.ended = true
	t.Outcome, t.End = o, now.t
	t.Last = f.inertial(t, now)
	if now.t == 0 {
		t.Last = t.First
	}
}

// slideOn moves a body along the surfaces that it is pressed on, until it
// stops, parts from one, meets another, or its time ends. It gives the groups
// that it parts from.
func (f *Flier) slideOn(t *Track, now *moving, on []geom.Touch) ([]geom.Group, error) {
	s := f.slide
	*s = slide{flier: f, begin: t.Begin + now.t, origin: now.q, touched: on}
	for i := range on {
		_, s.mu[i] = f.gripOf(on[i].Surface)
	}
	s.rolls = f.body.Rolls && f.wide > 0 && len(on) == 1
	if !s.rolls {
		now.w = r3.Vec{}
	}
	y := []float64{0, 0, 0, now.v.X, now.v.Y, now.v.Z, now.w.X, now.w.Y, now.w.Z}
	phase := Phase{Kind: Slide, T0: now.t, local: true, base: frame.State{Pos: now.q},
		Surface: f.m.Interior.Surface(on[0].Surface).Name}
	s.eval(0, y)
	if s.rolls {
		s.slips = s.slip(y) > 2*creep || r3.Norm(s.grip) > s.push[0].mu*s.push[0].force
		if !s.slips {
			phase.Kind = Roll
		}
	}
	spin, _ := f.m.Motion.Bounds(s.begin, s.begin+1)
	f.contact.Reset(0, y, integrator.MaxStep(stepTurn/math.Max(spin, 1e-3)))
	events, partFrom := f.contactEvents(s)
	res, err := integrator.Solve(f.contact, f.longest(t.Release)-now.t, events, func(st *integrator.Step, _ []integrator.Hit) error {
		if st.T1 > st.T0 {
			phase.steps = append(phase.steps, st.Clone())
		}
		return nil
	})
	if err != nil {
		return nil, err
	}
	t.Work.add(res.Stats)
	now.t += res.T
	now.q, now.v, now.w = r3.Add(s.origin, vec(res.Y)), vec(res.Y[3:]), vec(res.Y[6:])
	f.onto(now, on)
	f.arrival = f.inertial(t, now)
	phase.T1 = now.t
	t.Phases = append(t.Phases, phase)
	var parted []geom.Group
	for _, h := range res.Hits {
		if k := h.Event - partFrom; k >= 0 && k < len(on) {
			parted = append(parted, on[k].Group)
		}
	}
	return parted, nil
}

// onto takes away what a phase has drifted from its surfaces.
func (f *Flier) onto(now *moving, on []geom.Touch) {
	for i := range on {
		c := f.m.Interior.ContactIn(now.q, on[i].Group)
		now.q = r3.Add(now.q, r3.Scale(f.wide-c.Gap, c.Normal))
		now.v = r3.Sub(now.v, r3.Scale(r3.Dot(now.v, c.Normal), c.Normal))
	}
}

// contactEvents gives the events of a slide, and the index of the first that
// parts the body from a surface.
func (f *Flier) contactEvents(s *slide) ([]integrator.EventSpec, int) {
	slow := creep
	if s.rolls {
		slow = rollCreep
	}
	events := []integrator.EventSpec{
		{Event: besides{s}, Slop: slop(s.origin), Terminal: true},
		{Event: stops{s, slow}, Terminal: true},
	}
	first := len(events)
	for i := range s.touched {
		events = append(events, integrator.EventSpec{Event: parts{s, i}, Slop: forceSlop, Terminal: true})
	}
	if s.rolls && s.slips {
		events = append(events, integrator.EventSpec{Event: grips{s}, Terminal: true})
	} else if s.rolls {
		events = append(events, integrator.EventSpec{Event: skids{s}, Slop: forceSlop, Terminal: true})
	}
	return events, first
}

// forceSlop is the normal force by mass, in m/s^2, that counts as none: the
// rounding of accelerations in a habitat of any size that people live in.
const forceSlop = 1e-12
