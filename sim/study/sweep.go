package study

import (
	"context"
	"fmt"
	"slices"
	"sync"
	"sync/atomic"

	"offplumb/sim/flight"
	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// Sweep is a scenario at many points, and what is taken of it at each.
type Sweep struct {
	Points int
	// Variant makes the scenario of a point; its error says why the point is
	// impossible. It is called from several goroutines.
	Variant func(point int) (*Prepared, error)
	Picks   []measure.Pick
	// Landings says that the landings of all releases are wanted too.
	Landings bool
}

// Point is what one point of a sweep gave.
type Point struct {
	Values []float64 // of each pick, SI; NaN where it has none; nil with a fault
	Fault  error     // why the point is impossible or could not be computed
	Spin   float64   // rad/s
	// Landings are those of all releases, where they are wanted.
	Landings []measure.Landing
	done     bool
}

// Finished says whether the point was computed, be it possible or not.
func (p *Point) Finished() bool { return p.done }

// Run computes the points on opt.Workers workers. Result i is that of point i.
// It stops early, with the context's error, when the context ends.
func (s *Sweep) Run(ctx context.Context, opt Options) ([]Point, error) {
	out := make([]Point, s.Points)
	return out, s.Compute(ctx, 0, s.Points, out, opt)
}

// Compute computes the points from one up to another, as Run does, and puts
// each to its place.
func (s *Sweep) Compute(ctx context.Context, from, to int, out []Point, opt Options) error {
	var next, done atomic.Int64
	var tell sync.Mutex
	next.Store(int64(from))
	spread(min(opt.Workers, to-from), func() {
		for {
			i := int(next.Add(1)) - 1
			if i >= to || ctx.Err() != nil {
				return
			}
			out[i] = s.point(i)
			n := int(done.Add(1))
			if opt.Done != nil {
				tell.Lock()
				opt.Done(n, to-from)
				tell.Unlock()
			}
		}
	})
	return ctx.Err()
}

func (s *Sweep) point(i int) Point {
	p, err := s.Variant(i)
	if err != nil {
		return Point{Fault: err, done: true}
	}
	values, landings, err := p.take(s.Picks, s.Landings)
	return Point{Values: values, Landings: landings, Fault: err, Spin: p.Model.Habitat.Spin, done: true}
}

// take runs what some picks depend on, or all, and gives their numbers, and the
// landings if all are wanted.
func (p *Prepared) take(picks []measure.Pick, all bool) (values []float64, landings []measure.Landing, err error) {
	results := make([]Result, len(p.Lets))
	flier, spare := flight.NewFlier(p.Model), &flight.Track{}
	var surer *surer
	if slices.ContainsFunc(picks, measure.Pick.OfError) {
		surer = newSurer(p.Model)
	}
	for i := range p.Lets {
		if !p.needed(picks, i, all) {
			continue
		}
		if results[i], err = p.one(flier, spare, surer, i); err != nil {
			return nil, nil, fmt.Errorf("release %q: %w", p.Lets[i].Release.Name, err)
		}
		if all {
			landings = append(landings, results[i].Landing)
		}
	}
	e := p.evidence(results)
	values = make([]float64, len(picks))
	for i := range picks {
		values[i] = picks[i].Value(p.Model, e)
	}
	return values, landings, nil
}

// needed says whether a release is to be flown. Where nothing past its landing
// counts, it ends there. All says that every landing is wanted.
func (p *Prepared) needed(picks []measure.Pick, i int, all bool) bool {
	let := &p.Lets[i]
	needed, past := all, false
	p.keep[i] = false
	for k := range picks {
		if this, track := picks[k].NeedRelease(let.Release); this {
			needed, past, p.keep[i] = true, past || picks[k].PastLanding(), p.keep[i] || track
		}
	}
	if needed && !past && let.Release.Until.Kind == model.UntilRest {
		short := *let.Release
		short.Until.Kind = model.UntilLanding
		let.Release = &short
	}
	return needed
}

// evidence is what the results of a scenario give for its measures.
func (p *Prepared) evidence(results []Result) measure.Evidence {
	m := p.Model
	return measure.Evidence{Decks: measure.DeckFigures(m),
		Habitat:   func(stature, speed float64) measure.HabitatFigure { return measure.HabitatOf(m, stature, speed) },
		Turning:   func() []measure.Turning { return p.Turnings(results) },
		Landing:   func(i int) (*measure.Landing, bool) { return &results[i].Landing, results[i].done },
		Rest:      func(i int) (*measure.Rest, bool) { return &results[i].Rest, results[i].done },
		Events:    func(i int) ([]measure.Event, bool) { return results[i].Events, results[i].Track != nil },
		Clearance: func(i int) ([]measure.Clearance, bool) { return results[i].Clearances, results[i].Track != nil },
		Track: func(i int) ([]measure.Sample, bool) {
			t := results[i].Track
			if t == nil {
				return nil, false
			}
			rows, _ := measure.Samples(m, t, flight.NewForces(m, t.Body, nil))
			return rows, true
		},
		Loads:         once(func(i int) []measure.Load { rows, _ := measure.LoadSeries(m, p.Plans[i]); return rows }),
		PathClearance: once(func(i int) []measure.Clearance { return measure.PathClearances(m, p.Plans[i]) }),
	}
}

// once works out the rows of each thing one time.
func once[T any](rows func(i int) []T) func(i int) ([]T, bool) {
	known := map[int][]T{}
	return func(i int) ([]T, bool) {
		if _, ok := known[i]; !ok {
			known[i] = rows(i)
		}
		return known[i], true
	}
}
