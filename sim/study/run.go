package study

import (
	"context"
	"fmt"
	"sync"
	"sync/atomic"

	"offplumb/sim/flight"
	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// Result is what one release did.
type Result struct {
	Track      *flight.Track // nil where only landing and rest are wanted
	Landing    measure.Landing
	Rest       measure.Rest
	Events     []measure.Event     // with Track only, as is Clearances
	Clearances []measure.Clearance // to every surface
	Work       flight.Work
	done       bool
}

// Finished says whether the release was asked for and computed.
func (r *Result) Finished() bool { return r.done }

// Options say how a scenario is run.
type Options struct {
	Workers int                       // at least 1
	Want    func(*model.Release) bool // which releases; nil: all
	Done    func(done, of int)        // progress, called from one worker at a time; may be nil
}

// Run flies every release. Result i belongs to release i. It stops early, with
// the context's error, when the context ends, and with that of the first
// release in file order that could not be computed.
func (p *Prepared) Run(ctx context.Context, opt Options) ([]Result, error) {
	results := make([]Result, len(p.Lets))
	return results, p.Fly(ctx, p.which(opt.Want), results, opt)
}

// which lists the releases that are wanted.
func (p *Prepared) which(want func(*model.Release) bool) (out []int) {
	for i := range p.Lets {
		if want == nil || want(p.Lets[i].Release) {
			out = append(out, i)
		}
	}
	return out
}

// Keeps says whether the track of a release is kept.
func (p *Prepared) Keeps(release int) bool { return p.keep[release] }

// Fly flies some releases and puts the result of each to its place. It stops
// as Run does.
func (p *Prepared) Fly(ctx context.Context, which []int, results []Result, opt Options) error {
	errs := make([]error, len(which))
	var next, done atomic.Int64
	var tell sync.Mutex
	spread(opt.Workers, func() {
		flier, spare, surer := flight.NewFlier(p.Model), &flight.Track{}, newSurer(p.Model)
		for {
			k := int(next.Add(1)) - 1
			if k >= len(which) || ctx.Err() != nil {
				return
			}
			results[which[k]], errs[k] = p.one(flier, spare, surer, which[k])
			n := int(done.Add(1))
			if opt.Done != nil {
				tell.Lock()
				opt.Done(n, len(which))
				tell.Unlock()
			}
		}
	})
	if err := ctx.Err(); err != nil {
		return err
	}
	for k, err := range errs {
		if err != nil {
			return fmt.Errorf("release %q: %w", p.Lets[which[k]].Release.Name, err)
		}
	}
	return nil
}

// one flies a release, in the space of the spare track if its own is not kept.
// With a surer the numerical error of its landing is estimated.
func (p *Prepared) one(flier *flight.Flier, spare *flight.Track, surer *surer, i int) (Result, error) {
	let := &p.Lets[i]
	track := spare
	if p.keep[i] {
		track = &flight.Track{}
	}
	if err := flier.FlyAgain(track, let); err != nil {
		return Result{}, err
	}
	res := Result{Landing: measure.Land(p.Model, track), Rest: measure.EndOf(p.Model, track), Work: track.Work, done: true}
	if surer != nil {
		surer.sure(let, track, &res.Landing)
	}
	if p.keep[i] {
		res.Track = track
		res.Events = measure.Events(p.Model, track)
		res.Clearances = measure.Clearances(p.Model, track)
	}
	return res, nil
}

// spread runs the work on n workers and waits for them.
func spread(n int, work func()) {
	var all sync.WaitGroup
	for range max(1, n) {
		all.Go(work)
	}
	all.Wait()
}
