package integrator

import (
	"math"
)

// look is a time and the value there.
type look struct{ t, g float64 }

// walk searches event i up to limit. It returns limit or, after a terminal
// hit, a time within the resolution of it.
func (f *Finder) walk(i int, limit float64) (float64, error) {
	w := &f.watch[i]
	if w.cleared(f.step) {
		w.end = w.track
		return limit, nil
	}
	if err := f.known(w); err != nil {
		return 0, err
	}
	at, mode := look{f.step.T0, w.g}, w.mode
	out := at // the last look with g >= 0, or the start
	if mode == armed && w.backed != nil && !w.Rising {
		if reached, done, err := f.leap(i, at, limit); done || err != nil {
			return reached, err
		}
	}
	for n := 0; at.t < limit; n++ {
		if n == maxLooks {
			return 0, &StepError{T: at.t, H: limit - at.t, Reason: Stalled}
		}
		next, err := f.next(w, mode, at, limit)
		if err != nil {
			return 0, err
		}
		switch {
		case mode == armed && next.g <= 0 || mode == resting && next.g < -w.Slop:
			from := at
			if mode == resting {
				from = out
			}
			hit, past, err := f.locate(w, from, next)
			if err != nil {
				return 0, err
			}
			f.hits = append(f.hits, Hit{Event: i, T: hit, Terminal: w.Terminal})
			next, mode = past, spent
			if w.Terminal {
				w.end = track{spent, past.g}
				return min(limit, hit+f.res), nil
			}
		case next.g > w.Slop:
			mode = armed
		}
		if next.g >= 0 {
			out = next
		}
		at = next
	}
	w.end = track{mode, at.g}
	return limit, nil
}

// leap searches an armed event up to limit at one go, where bounds forward from
// the look at and backward from the first contact, or from limit, meet. It
// reports whether they did; else nothing has happened.
func (f *Finder) leap(i int, at look, limit float64) (reached float64, done bool, err error) {
	w := &f.watch[i]
	u, err := f.trusted(w, armed, at)
	if err != nil || !(at.t < limit) {
		return limit, false, err
	}
	end, err := f.look(w, limit)
	if err != nil {
		return limit, false, err
	}
	hit, past := end, end
	if end.g <= 0 {
		if hit, past, err = f.secant(w, at, end); err != nil {
			return limit, false, err
		}
		if hit, past, err = f.polish(w, hit, past); err != nil {
			return limit, false, err
		}
	}
	if at.t+u < hit.t {
		f.step.At(hit.t, f.y)
		if back := w.backed.Behind(f.step, hit.t, f.y); !(hit.t-back <= at.t+u) {
			return limit, false, nil
		}
	}
	switch {
	case end.g > 0:
		w.end = track{armed, end.g}
		return limit, true, nil
	case !w.Terminal:
		return limit, false, nil // there may be more
	}
	f.hits = append(f.hits, Hit{Event: i, T: hit.t, Terminal: true})
	w.end = track{spent, past.g}
	return min(limit, hit.t+f.res), true, nil
}

// cleared says whether the event is armed and tells that it remains so.
func (w *watch) cleared(s *Step) bool {
	if w.mode == armed && w.clear != nil && !w.Rising && w.clear.Clear(s) {
		w.unknown = true
		return true
	}
	return false
}

// known looks at the start of the step, if the last was not looked at.
func (f *Finder) known(w *watch) error {
	if !w.unknown {
		return nil
	}
	at, err := f.look(w, f.step.T0)
	w.g, w.unknown = at.g, false
	return err
}

// aim gives the end of the next step that the events ask for.
func (f *Finder) aim(t float64, y, dy []float64, next float64) float64 {
	end := math.Inf(1)
	for i := range f.watch {
		if w := &f.watch[i]; w.aimed != nil && w.mode == armed {
			end = min(end, w.aimed.Aim(t, y, dy, next))
		}
	}
	return end
}

// next takes the next look after at: as far on as the event's bound lets g be
// trusted, or to limit.
func (f *Finder) next(w *watch, mode mode, at look, limit float64) (look, error) {
	u := limit - at.t
	switch {
	case w.bounded != nil:
		bound, err := f.trusted(w, mode, at)
		if err != nil {
			return at, err
		}
		u = min(u, max(bound, f.res))
	case mode == resting:
		u = min(u, max(at.t-f.step.T0, f.step.h*firstLook, f.res))
	}
	t := at.t + u
	if !(t < limit) {
		t = limit
	}
	return f.look(w, t)
}

// trusted returns how long g surely takes to reach the nearest value that
// means something, or to change by thin if that is longer: the root of
// rate u + accel u^2/2 = d.
func (f *Finder) trusted(w *watch, mode mode, at look) (float64, error) {
	f.step.At(at.t, f.y)
	rate, accel, thin := w.bounded.Bound(f.step, at.t, f.y)
	if !(rate >= 0 && rate <= math.MaxFloat64 && accel >= 0 && accel <= math.MaxFloat64) {
		return 0, &StepError{T: at.t, H: f.step.h, Reason: BadEvent}
	}
	d := at.g
	switch mode {
	case resting:
		d = min(w.Slop-at.g, w.Slop+at.g)
	case spent:
		d = w.Slop - at.g
	}
	if d = max(d, thin); !(d > 0) {
		return 0, nil
	}
	return 2 * d / (rate + math.Sqrt(rate*rate+2*accel*d)), nil
}

// look evaluates the event at t on the step.
func (f *Finder) look(w *watch, t float64) (look, error) {
	f.step.At(t, f.y)
	g, err := w.value(t, f.y)
	return look{t, g}, err
}

// locate finds the hit between two looks. It returns its time, and a look past
// it to go on from. Where the first is not above zero, it is the hit: the
// start of going in from rest, or in an armed event a matter of rounding.
func (f *Finder) locate(w *watch, from, next look) (float64, look, error) {
	if from.g <= 0 {
		return from.t, next, nil
	}
	in, past, err := f.polish(w, from, next)
	return in.t, past, err
}

// value returns g, falling.
func (w *watch) value(t float64, y []float64) (float64, error) {
	g := w.Event.Value(t, y)
	if !(math.Abs(g) <= math.MaxFloat64) {
		return 0, &StepError{T: t, Reason: BadEvent}
	}
	if w.Rising {
		g = -g
	}
	return g, nil
}
