package main

import (
	"context"
	"fmt"

	"offplumb/sim/study"
)

// shared is work of a run that parts of it can share: many items, each of which
// depends on the scenario, the options and its own number alone. A whole run
// computes all items; a part computes a range of them and packs what they gave;
// a join takes from the parts what a whole run would have computed. All else of
// a run, such as sums, limits and figures, is done by the whole run and by the
// join alike. DEVELOPERS.md says how to make a study one of these.
type shared interface {
	// of says what the work is: its kind and, of several of a kind, its name.
	of() (kind, name string)
	// items is the number of items. It depends on scenario and options alone.
	items() int
	// layout describes what is packed, so that a program with another one is
	// told: study.Layout of what packItems packs.
	layout() string
	// compute computes the items of a range. With a packer it packs what they
	// gave, with packItems; without one, the range holds all items.
	compute(ctx context.Context, r span, p *progress, out *study.Packer) error
	// restore takes, with takeItems, what compute has packed of a range. Ranges
	// come in order, and together are all items.
	restore(r span, in *study.Unpacker) error
	// finish is called once all items are there, computed or restored.
	finish()
}

// span is a range of items: from one up to, but without, another.
type span struct{ from, to int }

func (r span) len() int { return r.to - r.from }

// spanOf is the range of a part, from 1 to of, of some items. The ranges of all
// parts follow one another, and differ in length by one at most.
func spanOf(part, of, items int) span {
	at := func(k int) int { return items/of*k + min(items%of, k) }
	return span{at(part - 1), at(part)}
}

// packItems packs a value for each item of a range.
func packItems[T any](out *study.Packer, r span, get func(i int) T) error {
	if out == nil {
		return nil
	}
	for i := r.from; i < r.to; i++ {
		if err := out.Put(get(i)); err != nil {
			return err
		}
	}
	return nil
}

// takeItems takes what packItems packed.
func takeItems[T any](in *study.Unpacker, r span, put func(i int, v T)) error {
	for i := r.from; i < r.to; i++ {
		var v T
		if err := in.Get(&v); err != nil {
			return err
		}
		put(i, v)
	}
	return nil
}

// shares lists the work that parts share, in the order of a run. A new kind of
// study adds its own here.
func (j *job) shares() []shared {
	var out []shared
	if r := j.rowShare(); r.items() > 0 {
		out = append(out, r)
	}
	for i := range j.streams {
		if s := &j.streams[i]; j.wantsRows(s.of) {
			out = append(out, &streamShare{j, s})
		}
	}
	for i := range j.scatters {
		if s := &j.scatters[i]; j.wanted(s.of.Name) {
			out = append(out, &scatterShare{j, s, nil})
		}
	}
	for i := range j.sweeps {
		if s := &j.sweeps[i]; j.wanted(s.Name) {
			out = append(out, &sweepShare{j, s})
		}
	}
	return out
}

// share does the work that can be shared: all of it, or it takes what parts
// have done.
func (j *job) share(ctx context.Context, p *progress) error {
	for _, s := range j.shares() {
		var err error
		if j.joined != nil {
			err = j.joined.restore(s, p)
		} else {
			err = s.compute(ctx, span{0, s.items()}, p, nil)
		}
		if ctx.Err() != nil {
			return context.Cause(ctx)
		}
		if err != nil {
			return told(s, err)
		}
		s.finish()
	}
	return nil
}

// told says which work an error is of.
func told(s shared, err error) error {
	kind, name := s.of()
	if name == "" {
		return fmt.Errorf("%s: %w", kind, err)
	}
	return fmt.Errorf("%s %q: %w", kind, name, err)
}

// rowShare is the work of the releases whose tracks are not kept: the rows of
// release lists. Tracks are many times as large as landings, and the few that
// are kept are flown by the join.
type rowShare struct {
	j     *job
	which []int // releases, by their number in the scenario
}

func (j *job) rowShare() *rowShare {
	s := &rowShare{j: j}
	for i := range j.Lets {
		if j.wantedRelease(j.Lets[i].Release) && !j.Keeps(i) {
			s.which = append(s.which, i)
		}
	}
	return s
}

func (s *rowShare) of() (kind, name string) { return "release lists", "" }
func (s *rowShare) items() int              { return len(s.which) }
func (s *rowShare) layout() string          { return study.Layout(study.Outcome{}) }
func (s *rowShare) finish()                 {}

func (s *rowShare) compute(ctx context.Context, r span, p *progress, out *study.Packer) error {
	j := s.j
	if err := j.Fly(ctx, s.which[r.from:r.to], j.results, study.Options{Workers: j.flags.jobs, Done: p.releases}); err != nil {
		return err
	}
	return packItems(out, r, func(i int) study.Outcome { return j.results[s.which[i]].Outcome() })
}

func (s *rowShare) restore(r span, in *study.Unpacker) error {
	return takeItems(in, r, func(i int, o study.Outcome) { s.j.results[s.which[i]] = o.Result() })
}
