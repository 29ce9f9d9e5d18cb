package integrator

import "math"

const (
	// timeUlps sets the resolution of time in a search, timeUlps epsilon
	// (|t| + |h|), as the rootfinding of the SUNDIALS solvers does (Hindmarsh
	// et al. 2005; from memory). Finer, the rounding of t alone moves g.
	timeUlps = 100
	// maxLooks limits the looks of one event in one step: about a second of
	// a plain g. A sound bound needs some tens to thousands.
	maxLooks = 1 << 24
	// firstLook is the share of the step at which a resting plain event is
	// first looked at.
	firstLook = 0x1p-20
)

// mode is what an event is waiting for.
type mode uint8

const (
	armed mode = iota
	resting
	spent
)

// track is the standing of an event at the start of a step.
type track struct {
	mode mode
	g    float64
}

// watch is an event under search.
type watch struct {
	EventSpec
	bounded Bounded  // nil: a plain event
	backed  Backed   // nil: it cannot tell
	clear   Clearing // nil: it cannot tell
	aimed   Aimed    // nil: it cannot tell
	unknown bool     // g was not looked at in the last step
	track
	end     track   // standing at the end of the search
	reached float64 // time up to which the step was searched
}

// Finder finds events along the steps of one run. The zero value is ready for
// Start; a Finder is reused from run to run. [Solve] has one of its own: a
// Finder is for callers with a loop of their own around [Stepper.Step].
type Finder struct {
	watch []watch
	hits  []Hit
	step  *Step
	res   float64   // resolution of time
	y     []float64 // state at the last look
}

// Start begins a run at t from y with the given events, which it copies. It
// fails with a [StepError] if a value is not a number, and panics if a Slop is
// negative or not a number.
func (f *Finder) Start(t float64, y []float64, events []EventSpec) error {
	f.watch, f.hits = f.watch[:0], f.hits[:0]
	if cap(f.y) < len(y) {
		f.y = make([]float64, len(y))
	}
	f.y = f.y[:len(y)]
	for _, spec := range events {
		if !(spec.Slop >= 0) {
			panic("integrator: event with a slop that is negative or not a number")
		}
		w := watch{EventSpec: spec}
		w.bounded, _ = spec.Event.(Bounded)
		w.backed, _ = spec.Event.(Backed)
		w.clear, _ = spec.Event.(Clearing)
		w.aimed, _ = spec.Event.(Aimed)
		g, err := w.value(t, y)
		if err != nil {
			return err
		}
		w.g, w.mode = g, resting
		if g > spec.Slop {
			w.mode = armed
		} else if g < -spec.Slop {
			w.mode = spent
		}
		f.watch = append(f.watch, w)
	}
	return nil
}

// Search returns the hits on s, which must begin where Start or the last
// Search ended, by the rules of events. If one is terminal, it truncates s
// there, and stop is true. The hits are valid until the next Search or Start.
// It fails with a [StepError].
func (f *Finder) Search(s *Step) (hits []Hit, stop bool, err error) {
	f.hits, f.step = f.hits[:0], s
	if len(f.watch) == 1 && f.watch[0].cleared(s) {
		return f.hits, false, nil
	}
	f.res = timeUlps * epsilon * (math.Abs(s.T1) + (s.T1 - s.T0))
	for i := range f.watch {
		f.watch[i].reached = math.Inf(1)
	}
	if err := f.searchAll(s.T1); err != nil {
		return nil, false, err
	}
	order(f.hits, f.res)
	all := f.hits
	f.hits, stop = uptoTerminal(all)
	for i := range f.watch {
		f.watch[i].track = f.watch[i].end
	}
	for _, h := range all[len(f.hits):] {
		f.watch[h.Event].mode = armed // at the end of the step, not hit yet
	}
	if stop {
		s.Truncate(f.hits[len(f.hits)-1].T)
		err = f.settle()
	}
	return f.hits, stop, err
}

// searchAll searches every event up to limit, or to just past the first
// terminal hit: where one event's hit ends the step before what others were
// searched to, these are searched again, so that they stand as at that time.
func (f *Finder) searchAll(limit float64) error {
	for again := true; again; {
		again = false
		for i := range f.watch {
			if f.watch[i].reached <= limit {
				continue
			}
			f.forget(i)
			reached, err := f.walk(i, limit)
			if err != nil {
				return err
			}
			f.watch[i].reached = reached
			if reached < limit {
				limit, again = reached, true
			}
		}
	}
	return nil
}

// forget drops the hits of event i.
func (f *Finder) forget(i int) {
	kept := f.hits[:0]
	for _, h := range f.hits {
		if h.Event != i {
			kept = append(kept, h)
		}
	}
	f.hits = kept
}

// settle takes the values anew at the end of a truncated step.
func (f *Finder) settle() (err error) {
	for i := range f.watch {
		w := &f.watch[i]
		if w.g, err = w.value(f.step.T1, f.step.Y1); err != nil {
			return err
		}
		w.unknown = false
	}
	return nil
}

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

// order sorts hits by time, makes those within res of an earlier one
// simultaneous with it, and sorts the simultaneous by event. The hits are few
// and nearly in order.
func order(hits []Hit, res float64) {
	for i := range hits {
		for j := i; j > 0 && hits[j].T < hits[j-1].T; j-- {
			hits[j], hits[j-1] = hits[j-1], hits[j]
		}
	}
	first := 0
	for i := range hits {
		if hits[i].T-hits[first].T > res {
			first = i
		}
		hits[i].T = hits[first].T
		for j := i; j > first && hits[j].Event < hits[j-1].Event; j-- {
			hits[j], hits[j-1] = hits[j-1], hits[j]
		}
	}
}

// uptoTerminal cuts the hits after those simultaneous with the first terminal
// one, and reports whether there is one.
func uptoTerminal(hits []Hit) ([]Hit, bool) {
	stop := false
	for i, h := range hits {
		if stop && h.T > hits[i-1].T {
			return hits[:i], true
		}
		stop = stop || h.Terminal
	}
	return hits, stop
}
