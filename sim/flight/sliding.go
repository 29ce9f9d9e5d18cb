package flight

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/frame"
	"offplumb/sim/geom"
)

// stepTurn is how far, in rad, the habitat turns in a step along a surface, at
// most: the events without a bound are looked at once a step.
const stepTurn = 0.3

// slideOn moves a body along the surfaces that it is pressed on, until it
// stops, parts from one, meets another, or its time ends.
func (f *Flier) slideOn(t *Track, now *moving, st stance, last ending) (ending, error) {
	s, kind := f.slideFrom(t, now, st, last)
	phase := Phase{Kind: kind, T0: now.t, local: true, base: frame.State{Pos: now.q, Vel: now.v}, spin: now.w,
		Surface: f.m.Interior.Surface(st.on[0].Surface).Name}
	y := []float64{0, 0, 0, now.v.X, now.v.Y, now.v.Z, now.w.X, now.w.Y, now.w.Z}
	r := run{st: f.contact, limit: f.longest(t.Release) - now.t, grazed: s.grazed, tidy: s.tidy,
		most:   f.longestStep(s.begin),
		events: func(grazed []geom.Patch) *ends { return f.slideEvents(s, now, grazed) }}
	r.smooth, s.last = f.smoothUntil(t, now)
	res, end, err := f.solve(t, &phase, &r, y)
	if err != nil {
		return ending{}, err
	}
	now.t += res.T
	now.q, now.v, now.w = s.place(res.Y), vec(res.Y[3:]), vec(res.Y[6:])
	f.arrival = f.inertial(t, now)
	phase.T1 = now.t
	t.add(phase)
	return end, nil
}

// slideFrom prepares the equations, brings a body that has as good as stopped,
// or as good as stopped slipping, to do so, and says what it does.
func (f *Flier) slideFrom(t *Track, now *moving, st stance, last ending) (*slide, Kind) {
	s, on := f.slide, st.on
	*s = slide{flier: f, begin: t.Begin + now.t, last: math.Inf(1), origin: now.q, on: patchesOf(on), grazed: patchesOf(st.grazed)}
	for i := range on {
		_, s.mu[i] = f.gripOf(on[i].Surface)
	}
	if !f.rolls(len(on)) {
		now.w = r3.Vec{}
		if r3.Norm(now.v) <= 2*creep {
			s.setOff(now, last.slipped)
		}
		return s, Slide
	}
	n := on[0].Normal
	u := f.slipOf(now.v, now.w, n)
	if s.slips = s.mu[0] == 0 || r3.Norm(u) > 2*creep; s.slips {
		return s, Slide
	}
	f.grip(now, n, u, st.grazed)
	s.eval(0, []float64{0, 0, 0, now.v.X, now.v.Y, now.v.Z, now.w.X, now.w.Y, now.w.Z})
	s.slips, s.known = last.skids || s.rub.need > s.rub.most*(1+holdShare), false
	if s.slips {
		return s, Slide
	}
	return s, Roll
}

// hardlySlides is the share of the friction below which what is left of the
// pull counts as little: the body then creeps off so slowly that the direction
// of friction makes the equations stiff.
const hardlySlides = 0.2

// holdShare is how far, as a share, the friction of a rolling body may exceed
// what there is before it begins to slip; twice that while it rolls. Without
// it a body that needs just what there is would slip and roll by turns without
// end.
const holdShare = 1e-9

// setOff stops a body that has as good as stopped, but is not held. Where
// friction all but holds it, it gets a creep the way that it is driven; so does
// one that has just slipped, whose acceleration is lost in roundings.
func (s *slide) setOff(now *moving, slipped bool) {
	var y, dy [dims]float64
	now.v = r3.Vec{}
	s.Deriv(0, y[:], dy[:])
	a, drive := r3.Norm(vec(dy[3:])), s.rub.drive
	if (a > 0 || slipped) && a < hardlySlides*s.rub.most && r3.Norm(drive) > 0 {
		now.v = r3.Scale(2*creep/r3.Norm(drive), drive)
	}
}

// grip ends the slip u (m/s) of a rolling body by the impulse that does so, as
// far as what it grazes lets it.
func (f *Flier) grip(now *moving, n, u r3.Vec, grazed []geom.Touch) {
	j := r3.Scale(-rollShare, u)
	now.v = r3.Add(now.v, j)
	now.w = r3.Add(now.w, r3.Scale(-2.5/f.wide, r3.Cross(n, j)))
	for i := range grazed {
		into := math.Min(0, r3.Dot(now.v, grazed[i].Normal))
		now.v = r3.Sub(now.v, r3.Scale(into, grazed[i].Normal))
	}
}

// tidy takes away what a body has drifted from the surfaces that it slides on,
// or into those that it grazes, if that is worth it, and what of its velocity
// is along their normals. It tells whether.
func (s *slide) tidy(y []float64) bool {
	f, q, v := s.flier, s.place(y), vec(y[3:])
	most := slop(s.origin) / drifts
	moved := false
	shift := func(p geom.Patch, back bool) {
		c := f.m.Interior.ContactOn(q, p)
		off := f.wide + f.hover(q) - c.Gap
		if off > most || back && off < -most {
			q, moved = r3.Add(q, r3.Scale(off, c.Normal)), true
			v = r3.Sub(v, r3.Scale(r3.Dot(v, c.Normal), c.Normal))
		}
	}
	for _, p := range s.on {
		shift(p, true)
	}
	for _, p := range s.grazed {
		shift(p, false)
	}
	if moved {
		y[0], y[1], y[2] = q.X-s.origin.X, q.Y-s.origin.Y, q.Z-s.origin.Z
		y[3], y[4], y[5] = v.X, v.Y, v.Z
	}
	return moved
}

// drifts is the share of the slop that a drift may be: half a nanometre.
const drifts = 80

// slideEvents lists what ends a slide.
func (f *Flier) slideEvents(s *slide, now *moving, grazed []geom.Patch) *ends {
	s.grazed = grazed
	e := &ends{}
	watch := &geom.Beside{Wide: f.wide, Thin: thin, Slop: slop(s.origin) / 2, On: s.on, Grazed: s.grazed}
	e.add(besides{s, watch}, slop(s.origin)/4, turns)
	e.add(stops{f.slowEnough(now, len(s.on))}, 0, turns)
	// A force that is but rounding counts as none, and not as one that pulls.
	rough := noise(r3.Vec{}, now.v)
	for i, g := range s.on {
		e.add(parts{s, i}, rough, loses, g)
		e.add(strays{s, g}, 0, loses, g)
	}
	if f.rolls(len(s.on)) && s.mu[0] > 0 {
		if s.slips {
			e.add(grips{s}, 0, turns)
			e.add(holdsFast{s}, forceSlop, turns)
		} else {
			e.add(skids{s}, forceSlop, starts)
		}
	}
	e.graze(f, s.grazed, slop(s.origin)/4, rough, s.local, func(at float64, y []float64) r3.Vec {
		s.eval(at, y)
		return s.rub.drive
	})
	return e
}

// slowEnough is the speed at which a body counts as having stopped. One that
// goes on from there stops anew only when it was faster again; one that was set
// off with a creep (see setOff) is faster, and may stop as the pull changes.
func (f *Flier) slowEnough(now *moving, n int) float64 {
	slow := creep
	if f.rolls(n) {
		slow = rollCreep
	}
	if v := r3.Norm(now.v); v <= 2*slow && (v == 0 || f.rolls(n)) {
		return 4 * slow
	}
	return slow
}
