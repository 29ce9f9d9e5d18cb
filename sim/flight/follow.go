package flight

import (
	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/frame"
	"offplumb/sim/geom"
	"offplumb/sim/model"
)

const (
	// mostPhases bounds the phases of one release: more than the smallest
	// bounces (see leastRise) of an hour in a gravity of 10 m/s^2.
	mostPhases = 150_000
	// mostSteps bounds the integration steps of one release, some seconds of
	// computing.
	mostSteps = 2_000_000
	// patience is how many phases may pass within hurry (s) before a release
	// counts as stuck: no bounce of leastRise in a gravity of less than 8e9
	// m/s^2 is as short as 1 us.
	patience = 200
	hurry    = patience * 1e-6
)

// follow takes a release through its phases: flight, impact, slide, roll,
// rest. At each turn the body rebounds from what it moves into; then it is
// pressed on what is left, and slides, rolls or rests there, or it flies.
func (f *Flier) follow(t *Track) error {
	now := f.start(t)
	touches := f.touches(&now)
	known := patchesOf(touches)
	var last ending
	since := now.t
	for k := range mostPhases {
		f.whereabouts(t, &now)
		if k > 0 || len(touches) > 0 {
			touches = f.touches(&now)
		}
		if len(touches) > 0 && f.quick.Drifts() {
			f.sticks(t, &now, &touches[0])
			return nil
		}
		f.meet(t, &now, touches, known)
		if f.over(t, &now) {
			return nil
		}
		s := f.stand(t, &now, touches, last)
		f.touched(t, &now, s, known)
		if f.over(t, &now) {
			return nil
		}
		stays := freed
		if !last.slipped {
			stays = f.rests(t, &now, s)
		}
		if stays == settled {
			return nil
		}
		if stays == waited {
			known, last = patchesOf(touches), ending{slipped: true}
			continue
		}
		var err error
		known = patchesOf(s.on)
		if len(s.on) == 0 {
			last, err = f.fly(t, &now, patchesOf(s.grazed))
		} else {
			last, err = f.slideOn(t, &now, s, last)
		}
		if err != nil || f.ended {
			return err
		}
		if t.Work.Steps > mostSteps || k%patience == patience-1 && now.t-since < hurry {
			break
		}
		if k%patience == patience-1 {
			since = now.t
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

// staying is what friction does to a body in contact.
type staying int

const (
	freed   staying = iota // it does not hold it
	waited                 // it held it until now
	settled                // it holds it for good
)

// rests ends a release whose body has stopped where friction holds it, or lets
// it rest until friction does not.
func (f *Flier) rests(t *Track, now *moving, s stance) staying {
	if len(s.on) == 0 {
		return freed
	}
	if r3.Norm(now.v) <= 2*creep && s.wedges() {
		now.w = r3.Vec{} // a ball that is jammed does not spin on
	}
	if !f.stands(now, s.on) {
		return freed
	}
	a := f.m.Motion.At(t.Begin + now.t)
	pull := f.pull(&a, t.Begin+now.t, frame.State{Pos: now.q})
	var all []push
	for i := range s.on {
		_, mu := f.gripOf(s.on[i].Surface)
		if f.rolls(len(s.on)) {
			mu = level
		}
		all = append(all, push{normal: s.on[i].Normal, answer: s.on[i].Normal, mu: mu})
	}
	on := holds(all, pull)
	if on == nil {
		return freed
	}
	at := &s.on[on[0]]
	surface := f.m.Interior.Surface(at.Surface).Name
	if f.waits(t, now, all, surface) {
		return waited
	}
	now.v, now.w = r3.Vec{}, r3.Vec{}
	f.lay(t, at)
	t.Phases = append(t.Phases, Phase{Kind: Rest, local: true, base: frame.State{Pos: now.q}, T0: now.t, T1: now.t, Surface: surface})
	f.end(t, now, f.restOutcome(t, all, on))
	return settled
}

func (f *Flier) restOutcome(t *Track, all []push, on []int) Outcome {
	switch {
	case faced(all, on):
		return Stuck
	case t.Release.Until.Kind == model.UntilLanding:
		return Landed
	}
	return Rested
}

// wedges says whether what a body is pressed on and what it grazes face each
// other.
func (s *stance) wedges() bool {
	for i := range s.on {
		for k := range s.grazed {
			if r3.Dot(s.on[i].Normal, s.grazed[k].Normal) < -wedge {
				return true
			}
		}
	}
	return false
}

// stands says whether a body in contact has stopped. A rolling one that
// stands, but spins against its surface, has not.
func (f *Flier) stands(now *moving, on []geom.Touch) bool {
	if !f.rolls(len(on)) {
		return r3.Norm(now.v) <= 2*creep // twice: the event stops short of it
	}
	return r3.Norm(now.v) <= 2*rollCreep && r3.Norm(f.slipOf(now.v, now.w, on[0].Normal)) <= 2*rollCreep
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
