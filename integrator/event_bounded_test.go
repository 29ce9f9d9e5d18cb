package integrator_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"offplumb/integrator"
)

// counted counts the looks of an event.
type counted struct {
	integrator.Bounded
	looks *int
}

func (c counted) Value(t float64, y []float64) float64 {
	*c.looks++
	return c.Bounded.Value(t, y)
}

// TestEventPlainAndBounded tries rules 5 to 7 within one step from 0 to 1: what
// the ends of the step do not show, a plain event misses, and a bounded one
// finds.
func TestEventPlainAndBounded(t *testing.T) {
	const thin = 1e-4
	for _, c := range []struct {
		name           string
		g              gap
		plain, bounded []float64
	}{
		{"5 one root", func(x float64) float64 { return 0.5 - x }, []float64{0.5}, []float64{0.5}},
		{"5 dip", func(x float64) float64 { return (x-0.5)*(x-0.5) - 0.01 }, nil, []float64{0.4}},
		{"6 narrow dip", func(x float64) float64 { return math.Abs(x-0.5) - thin }, nil, []float64{0.5 - thin}},
		{"6 two narrow dips", func(x float64) float64 { return min(math.Abs(x-0.3), math.Abs(x-0.7)) - 2*thin }, nil,
			[]float64{0.3 - 2*thin, 0.7 - 2*thin}},
		{"6 dip at the very end", func(x float64) float64 { return math.Abs(x-1) - thin }, []float64{1 - thin}, []float64{1 - thin}},
		{"7 minimum above zero", func(x float64) float64 { return (x-0.5)*(x-0.5) + 1e-9 }, nil, nil},
		{"7 kink above zero", func(x float64) float64 { return math.Abs(x-1./3) + 1e-12 }, nil, nil},
		{"7 double root, no look upon it", func(x float64) float64 { return (x - 1/math.Pi) * (x - 1/math.Pi) }, nil, nil},
	} {
		t.Run("rule "+c.name, func(t *testing.T) {
			res := resolution(1, 1)
			for _, mirror := range []func(integrator.EventSpec) integrator.EventSpec{
				func(s integrator.EventSpec) integrator.EventSpec { return s }, rising,
			} {
				plain := mirror(integrator.EventSpec{Event: c.g, Slop: thin / 10})
				wantTimes(t, allHits(t, tick(t, 0, 1), 1, plain), res, c.plain...)
				bounded := mirror(integrator.EventSpec{Event: fenced{c.g, 1, 0, thin}, Slop: thin / 10})
				wantTimes(t, allHits(t, tick(t, 0, 1), 1, bounded), res, c.bounded...)
			}
		})
	}
}

// TestEventGrazeUponLook: by rule 7 a double root is a hit if a look falls upon
// it, as the end of a step does.
func TestEventGrazeUponLook(t *testing.T) {
	touch := timed(func(t float64) float64 { return (t - 2) * (t - 2) })
	hits := allHits(t, tick(t, 0, 1), 4, integrator.EventSpec{Event: touch})
	wantTimes(t, hits, resolution(2, 1), 2)
}

// timed is a plain event: a function of time.
type timed func(t float64) float64

func (g timed) Value(t float64, _ []float64) float64 { return g(t) }

// TestEventThreeRoots: by rule 5 a plain event finds one of two falls within a
// step, whichever; a bounded one finds both.
func TestEventThreeRoots(t *testing.T) {
	g := gap(func(x float64) float64 { return -(x - 0.1) * (x - 0.4) * (x - 0.9) })
	hits := allHits(t, tick(t, 0, 1), 1, integrator.EventSpec{Event: g})
	res := resolution(1, 1)
	if len(hits) != 1 || math.Abs(hits[0].T-0.1) > res && math.Abs(hits[0].T-0.9) > res {
		t.Errorf("plain: hits %v, want one of 0.1 and 0.9", hits)
	}
	hits = allHits(t, tick(t, 0, 1), 1, integrator.EventSpec{Event: fenced{g, 1, 0, 1e-4}})
	wantTimes(t, hits, res, 0.1, 0.9)
}

// dips is a row of narrow dips, one in each unit of time.
type dips struct {
	center, depth []float64
	slope         float64
}

func (d dips) Value(_ float64, y []float64) float64 {
	i := min(max(int(y[0]), 0), len(d.center)-1)
	least := math.Inf(1)
	for j := max(i-1, 0); j <= min(i+1, len(d.center)-1); j++ {
		least = min(least, d.slope*math.Abs(y[0]-d.center[j])-d.depth[j])
	}
	return least
}

func (d dips) Bound(*integrator.Step, float64, []float64) (rate, accel, thin float64) {
	return d.slope, 0, leastDepth
}

// leastDepth is the depth from which dips are to be found.
const leastDepth = 1e-5

// TestEventEveryDipIsFound tries the law of rule 6: an excursion to -thin or
// lower is found, however short, and its hit is at its beginning.
func TestEventEveryDipIsFound(t *testing.T) {
	const seed, n = 20, 400
	rng := rand.New(rand.NewPCG(seed, 0))
	d := dips{slope: 0.5}
	var want []float64
	for i := range n {
		depth := leastDepth * math.Pow(1000, rng.Float64())
		center := float64(i) + 0.2 + 0.6*rng.Float64()
		d.depth, d.center = append(d.depth, depth), append(d.center, center)
		want = append(want, center-depth/d.slope)
	}
	for _, h := range []float64{n, 17.3, 0.71} { // one step, some, many
		hits := allHits(t, tick(t, 0, h), n, integrator.EventSpec{Event: d, Slop: leastDepth / 10})
		res := resolution(n, h) + 8*epsilon*n // the clock's rounding besides
		if len(hits) != n {
			t.Fatalf("seed %d, steps of %g: %d hits, want %d", seed, h, len(hits), n)
		}
		wantTimes(t, hits, res, want...)
	}
}

// wall is a thin wall across a line of motion.
type wall struct{ x, half, thin float64 }

func (w wall) Value(_ float64, y []float64) float64 { return math.Abs(y[0]-w.x) - w.half }

func (w wall) Bound(s *integrator.Step, t float64, _ []float64) (rate, accel, thin float64) {
	var dy [2]float64
	s.Rate(t, dy[:])
	return math.Abs(dy[0]), s.MaxAccel(0, 1), w.thin
}

// wallByMax bounds the rate by its maximum along the step.
type wallByMax struct{ wall }

func (w wallByMax) Bound(s *integrator.Step, _ float64, _ []float64) (rate, accel, thin float64) {
	return s.MaxRate(0, 1), 0, w.thin
}

// TestEventThinWallInLongStep: a motion of 1000 a unit of time over one step of
// 100 meets a wall whose thickness is 2e-9 of the way. As the bound is the
// true rate, the search halves no distance: it takes a look at the wall, those
// of the polishing, some that double the distance on leaving, and the last.
func TestEventThinWallInLongStep(t *testing.T) {
	const v, tEnd, half = 1000.0, 100.0, 1e-4
	w := wall{x: 76543.21, half: half, thin: half / 10}
	for _, c := range []struct {
		name string
		b    integrator.Bounded
	}{{"rate and accel", w}, {"greatest rate", wallByMax{w}}} {
		looks := 0
		st := newStepper(t, drift(), loose())
		st.Reset(0, []float64{0, v}, integrator.FirstStep(2*tEnd))
		spec := integrator.EventSpec{Event: counted{c.b, &looks}, Slop: half / 100}
		hits := allHits(t, st, tEnd, spec)
		// the position, up to 1e5, is rounded some eight times
		wantTimes(t, hits, resolution(tEnd, tEnd)+8*epsilon*1e5/v, (w.x-half)/v)
		if st.Stats().Accepted != 1 {
			t.Fatalf("%s: %d steps, want one", c.name, st.Stats().Accepted)
		}
		most := 10 + int(2*math.Log2(v*tEnd/w.thin))
		if looks > most {
			t.Errorf("%s: %d looks, want at most %d", c.name, looks, most)
		}
	}
}

// post is a thin post that a thrown ball passes: the distance from it.
type post struct {
	at     [2]float64
	radius float64
}

func (p post) Value(_ float64, y []float64) float64 {
	return math.Hypot(y[0]-p.at[0], y[1]-p.at[1]) - p.radius
}

func (p post) Bound(s *integrator.Step, t float64, _ []float64) (rate, accel, thin float64) {
	var dy [4]float64
	s.Rate(t, dy[:])
	return math.Hypot(dy[0], dy[1]), s.MaxAccel(0, 2), p.radius / 100
}

// thrown is a throw with gravity 9.8 along the second axis.
func thrown() system {
	return system{4, func(_ float64, y, dy []float64) {
		dy[0], dy[1], dy[2], dy[3] = y[2], y[3], 0, -9.8
	}}
}

// TestEventThinPost: a post much narrower than the step, on the path or beside
// it, is hit or not as the parabola says.
func TestEventThinPost(t *testing.T) {
	const seed, radius, tEnd = 21, 1e-5, 10.0
	rng := rand.New(rand.NewPCG(seed, 0))
	st := newStepper(t, thrown(), loose())
	for i := range 200 {
		v := [2]float64{5 + 20*rng.Float64(), 60 * (rng.Float64() - 0.5)}
		when := tEnd * (0.05 + 0.9*rng.Float64())
		slope := v[1] - 9.8*when
		speed := math.Hypot(v[0], slope)
		// beside the path by up to two radii, at right angles to it; from 0.99
		// of one on, no deeper than thin, a hit is not due
		off := 2 * radius * rng.Float64()
		p := post{radius: radius, at: [2]float64{
			v[0]*when - off*slope/speed,
			v[1]*when - 4.9*when*when + off*v[0]/speed,
		}}
		if off > 0.98*radius && off < 1.001*radius {
			continue
		}
		st.Reset(0, []float64{0, 0, v[0], v[1]}, integrator.FirstStep(tEnd))
		hits := allHits(t, st, tEnd, integrator.EventSpec{Event: p, Slop: radius / 1e3, Terminal: i%2 == 0})
		if off > radius {
			wantTimes(t, hits, 0)
			continue
		}
		// the path is straight over so short a way: sag 9.8 dt^2/2 of 1e-11
		early := math.Sqrt(radius*radius-off*off) / speed
		wantTimes(t, hits, 1e-3*radius/speed, when-early)
		if t.Failed() {
			t.Fatalf("seed %d, throw %d: beside by %g radii", seed, i, off/radius)
		}
	}
}

// TestEventStateIsNeverBelow tries rule 2: the state at a terminal hit is not
// below the surface, and less than the resolution later it is.
func TestEventStateIsNeverBelow(t *testing.T) {
	const seed = 22
	rng := rand.New(rand.NewPCG(seed, 0))
	st := newStepper(t, thrown(), tight(1e-9))
	for i := range 300 {
		floor := -20 * rng.Float64()
		g := func(y []float64) float64 { return y[1] - floor - 0.1*math.Sin(y[0]) }
		event := stateGap(g)
		st.Reset(0, []float64{0, 1, 30 * rng.Float64(), 10 * rng.Float64()})
		var last integrator.Segment
		res := mustSolve(t, st, 100, []integrator.EventSpec{{Event: event, Terminal: true}},
			func(s *integrator.Step, _ []integrator.Hit) error {
				s.CopyTo(&last)
				return nil
			})
		if !res.Stopped {
			t.Fatalf("seed %d, throw %d: no hit", seed, i)
		}
		if at := g(res.Y); at < 0 {
			t.Errorf("seed %d, throw %d: value %g at the hit", seed, i, at)
		}
		// the step was no longer than the way that remained to 100
		after := make([]float64, 4)
		last.At(res.T+resolution(100, 100), after)
		if past := g(after); past > 0 {
			t.Errorf("seed %d, throw %d: value %g past the hit", seed, i, past)
		}
	}
}

// stateGap is a plain event of the whole state.
type stateGap func(y []float64) float64

func (g stateGap) Value(_ float64, y []float64) float64 { return g(y) }
