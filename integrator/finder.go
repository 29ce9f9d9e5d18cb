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
