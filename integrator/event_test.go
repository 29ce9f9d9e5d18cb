package integrator_test

import (
	"math"
	"slices"
	"testing"

	"offplumb/integrator"
)

// The tests of events go by the rules of event.go. Most run the clock, y = t,
// for which the interpolant is exact but for rounding, so that the times of
// the hits are known.

// gap is a plain event: a function of the first component.
type gap func(x float64) float64

func (g gap) Value(_ float64, y []float64) float64 { return g(y[0]) }

// fenced is a bounded event with a constant bound.
type fenced struct {
	gap
	rate, accel, thin float64
}

func (e fenced) Bound(*integrator.Step, float64, []float64) (rate, accel, thin float64) {
	return e.rate, e.accel, e.thin
}

// mirrored turns the sign of an event's value.
type mirrored struct{ integrator.Event }

func (m mirrored) Value(t float64, y []float64) float64 { return -m.Event.Value(t, y) }

// mirroredFence turns the sign of a bounded event's value.
type mirroredFence struct{ integrator.Bounded }

func (m mirroredFence) Value(t float64, y []float64) float64 { return -m.Bounded.Value(t, y) }

// rising returns the same event as a rise of the negated value.
func rising(spec integrator.EventSpec) integrator.EventSpec {
	if b, ok := spec.Event.(integrator.Bounded); ok {
		spec.Event = mirroredFence{b}
	} else {
		spec.Event = mirrored{spec.Event}
	}
	spec.Rising = !spec.Rising
	return spec
}

// resolution is that of time, by rule 2, for a step of length h that ends at t.
func resolution(t, h float64) float64 { return 100 * epsilon * (math.Abs(t) + math.Abs(h)) }

// tick returns a clock that takes steps of length h from t0.
func tick(t testing.TB, t0, h float64) *integrator.Stepper {
	t.Helper()
	st := newStepper(t, clock(), loose())
	st.Reset(t0, []float64{t0}, integrator.FirstStep(h), integrator.MaxStep(h))
	return st
}

// allHits solves to tEnd, going on after terminal hits, and returns every hit.
func allHits(t testing.TB, st *integrator.Stepper, tEnd float64, events ...integrator.EventSpec) []integrator.Hit {
	t.Helper()
	var hits []integrator.Hit
	note := func(_ *integrator.Step, more []integrator.Hit) error {
		hits = append(hits, more...)
		return nil
	}
	for range 1000 {
		res := mustSolve(t, st, tEnd, events, note)
		if !res.Stopped {
			return hits
		}
		for _, h := range res.Hits[firstTerminal(res.Hits):] {
			if h.T != res.T {
				t.Errorf("stopped at %g with a hit at %g", res.T, h.T)
			}
		}
	}
	t.Fatal("no end of terminal hits")
	return nil
}

// firstTerminal returns the index of the first terminal hit, or 0.
func firstTerminal(hits []integrator.Hit) int {
	return max(0, slices.IndexFunc(hits, func(h integrator.Hit) bool { return h.Terminal }))
}

// wantTimes demands hits at the given times, to within res.
func wantTimes(t *testing.T, hits []integrator.Hit, res float64, times ...float64) {
	t.Helper()
	ok := len(hits) == len(times)
	for i := 0; ok && i < len(hits); i++ {
		ok = math.Abs(hits[i].T-times[i]) <= res
	}
	if !ok {
		t.Errorf("hits %v, want times %v within %.2g", hits, times, res)
	}
}

// sameHits demands equal hits, bit for bit.
func sameHits(t *testing.T, what string, got, want []integrator.Hit) {
	t.Helper()
	if !slices.Equal(got, want) {
		t.Errorf("%s: hits %v, want %v", what, got, want)
	}
}

// slop is wide in the table, to give room for values within it.
const slop = 1e-3

// startTable has events on steps of length 1 from 0, none steeper than 3.
var startTable = []struct {
	name  string
	g     gap
	tEnd  float64
	times []float64
}{
	{"1 above, falls", func(x float64) float64 { return 0.3 - x }, 1, []float64{0.3}},
	{"1 above, stays", func(x float64) float64 { return 0.3 + x }, 1, nil},
	{"1 just above slop, falls", func(x float64) float64 { return 2*slop - x }, 1, []float64{2 * slop}},
	{"1 beyond, stays", func(x float64) float64 { return -0.3 - x }, 1, nil},
	{"1 just beyond slop, stays", func(x float64) float64 { return -2*slop - x }, 1, nil},
	{"1 beyond, comes up", func(x float64) float64 { return x - 0.3 }, 1, nil},
	{"1 beyond, comes up, falls", func(x float64) float64 { return 0.8 - math.Abs(x-1) }, 2, []float64{1.8}},
	{"3 on the surface, out", func(x float64) float64 { return x }, 1, nil},
	{"3 on the surface, slowly out", func(x float64) float64 { return x * x * x }, 1, nil},
	{"3 on the surface, lies", func(float64) float64 { return 0 }, 3, nil},
	{"3 on the surface, trembles", func(x float64) float64 { return 0.9 * slop * math.Sin(50*x) }, 3, nil},
	{"3 on the surface, in", func(x float64) float64 { return -x }, 1, []float64{0}},
	{"3 on the surface, slowly in", func(x float64) float64 { return -x * x * x }, 1, []float64{0}},
	{"3 slightly above, in within slop, out", func(x float64) float64 { return sq(x-0.03) - 0.4*slop }, 1, nil},
	{"3 slightly above, in", func(x float64) float64 { return slop/2 - x }, 1, []float64{slop / 2}},
	{"3 slightly below, in", func(x float64) float64 { return -slop/2 - x }, 1, []float64{0}},
	{"3 slightly below, out", func(x float64) float64 { return x - slop/2 }, 1, nil},
	{"3 out, back within a step", func(x float64) float64 { return x * (0.7 - x) }, 1, []float64{0.7}},
	{"3 out within slop, back", func(x float64) float64 { return x * (0.06 - x) }, 1, []float64{0.06}},
	{"3 in, back within a step", func(x float64) float64 { return x * (x - 0.7) }, 1, []float64{0}},
	{"3 in within slop, back", func(x float64) float64 { return x * (x - 0.06) }, 1, nil},
	{"3 lies for two steps, in", func(x float64) float64 { return min(0, 2-x) }, 3, []float64{2}},
	{"3 lies for two steps, out", func(x float64) float64 { return max(0, x-2) }, 3, nil},
	{"4 in and out, often", func(x float64) float64 { return math.Cos(2 * math.Pi / 3 * x) }, 9, []float64{0.75, 3.75, 6.75}},
}

// TestEventStartRestAndSpent tries rules 1 to 4, with plain and bounded events,
// falling and rising, terminal and not.
func TestEventStartRestAndSpent(t *testing.T) {
	for _, c := range startTable {
		t.Run("rule "+c.name, func(t *testing.T) {
			res := resolution(c.tEnd, 1)
			for _, event := range []integrator.Event{c.g, fenced{c.g, 3, 0, slop / 4}} {
				spec := integrator.EventSpec{Event: event, Slop: slop}
				hits := allHits(t, tick(t, 0, 1), c.tEnd, spec)
				wantTimes(t, hits, res, c.times...)
				sameHits(t, "as a rise", allHits(t, tick(t, 0, 1), c.tEnd, rising(spec)), hits)
				spec.Terminal = true
				wantTimes(t, allHits(t, tick(t, 0, 1), c.tEnd, spec), res, c.times...)
			}
		})
	}
}

// TestEventRestsAndGoesInWithinStep tries rule 3 where the state lies on the
// surface for a part of a step. The looks of a plain event are at 2^-20 of the
// step and doubling from there, so of those on the surface the one at 1/4 is the
// last; those of a bounded one are thin/rate apart.
func TestEventRestsAndGoesInWithinStep(t *testing.T) {
	g := gap(func(x float64) float64 { return min(0, 2.4-x) })
	hits := allHits(t, tick(t, 0, 1), 3, integrator.EventSpec{Event: g, Slop: slop})
	wantTimes(t, hits, resolution(3, 1), 2.25)
	hits = allHits(t, tick(t, 0, 1), 3, integrator.EventSpec{Event: fenced{g, 1, 0, slop / 10}, Slop: slop})
	wantTimes(t, hits, slop, 2.4-slop/2)
}

// TestEventNotchWhileResting: an excursion below -slop from a state that rests
// just above it is found by a bounded event, however short and wherever.
func TestEventNotchWhileResting(t *testing.T) {
	const rest, depth, rate = -0.8 * slop, 0.4 * slop, 1.0
	for i := range 100 {
		at := 0.1 + 0.008137*float64(i)
		g := gap(func(x float64) float64 { return min(rest, rest-depth+rate*math.Abs(x-at)) })
		event := fenced{g, rate, 0, slop / 100}
		hits := allHits(t, tick(t, 0, 1), 1, integrator.EventSpec{Event: event, Slop: slop})
		// never seen at or above zero, it is a hit at the start of the step
		wantTimes(t, hits, 0, 0)
	}
}
