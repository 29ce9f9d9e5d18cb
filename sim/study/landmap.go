package study

import (
	"context"
	"fmt"
	"sync/atomic"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/flight"
	"offplumb/sim/frame"
	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// MapOptions say how a landing map is run.
type MapOptions struct {
	Workers int                // at least 1
	Done    func(done, of int) // progress; may be nil
}

const (
	// blockFlights is how many flights are computed before they are added to the
	// map, in their order: a few MB of results, and some tenths of a second.
	blockFlights = 8192
	// mostCells bounds the cells with something in them: some 200 MB.
	mostCells = 1_000_000
)

// LandingMap flies a body from every place of a landing map, at every height
// and in every direction. Only what the cells need is kept. The result depends
// on the scenario alone. It stops early, with the context's error, when the
// context ends.
func (p *Prepared) LandingMap(ctx context.Context, l *model.LandingMap, opt MapOptions) (*measure.LandMap, error) {
	patches, problems := p.Model.Patches(l)
	if len(problems) > 0 {
		return nil, fmt.Errorf("%s", problems[0].Msg)
	}
	directions := Directions(l.Directions)
	x := &mapping{m: p.Model, of: l, directions: directions, out: measure.NewLandMap(p.Model, l, patches, directions)}
	x.release = model.Release{Name: l.Name, Body: l.Body, NoTrack: true, Until: model.Until{Kind: l.Until},
		Start: model.Start{Kind: model.Velocity}}
	x.body = p.Model.BodyOf(&x.release)
	x.fliers = make([]*flight.Flier, max(1, opt.Workers))
	step := max(1, blockFlights/len(directions))
	x.slots = make([]measure.MapFlight, step*len(directions))
	x.why = make([]string, step)
	for at := 0; at < x.out.Places; at += step {
		n := min(step, x.out.Places-at)
		x.block(ctx, at, n)
		if err := ctx.Err(); err != nil {
			return nil, err
		}
		if x.gather(at, n); x.out.CellCount() > mostCells {
			return nil, fmt.Errorf("more than %d cells are landed in: make cell greater than %.3g m", mostCells, l.Cell)
		}
		if opt.Done != nil {
			opt.Done((at+n)*len(directions), x.out.Places*len(directions))
		}
	}
	x.out.Finish()
	return x.out, nil
}

// mapping is a landing map at work.
type mapping struct {
	m          *model.Model
	of         *model.LandingMap
	directions []r3.Vec
	release    model.Release
	body       model.Body
	fliers     []*flight.Flier // of each worker
	out        *measure.LandMap
	slots      []measure.MapFlight // of the block: flight i goes to slot i
	why        []string            // of each place of the block: why it is left out
}

// block flies from n places on several workers.
func (x *mapping) block(ctx context.Context, at, n int) {
	var next, worker atomic.Int64
	spread(len(x.fliers), func() {
		w := worker.Add(1) - 1
		if x.fliers[w] == nil {
			x.fliers[w] = flight.NewFlier(x.m)
		}
		spare := &flight.Track{}
		for {
			k := int(next.Add(1)) - 1
			if k >= n || ctx.Err() != nil {
				return
			}
			x.place(ctx, x.fliers[w], spare, at+k, k)
		}
	})
}

// place flies in all directions from a place, into the slots of place k of the
// block, in the space of the spare track.
func (x *mapping) place(ctx context.Context, f *flight.Flier, spare *flight.Track, n, k int) {
	p := x.out.Place(n)
	if x.why[k] = x.left(p); x.why[k] != "" {
		return
	}
	for d, v := range x.directions {
		if ctx.Err() != nil {
			return
		}
		let := flight.Let{Release: &x.release, Body: x.body, Place: p,
			Local: frame.State{Pos: p.Vec(), Vel: measure.LetVelocity(p, r3.Scale(x.of.Speed, v))}}
		slot := &x.slots[k*len(x.directions)+d]
		if err := f.FlyAgain(spare, &let); err != nil {
			*slot = measure.MapFlight{Fate: measure.ShotFailed, Why: err.Error()}
		} else {
			*slot = x.out.Fly(spare)
		}
	}
}

// left says, in words, why a place is left out; "" where the body has room.
func (x *mapping) left(p model.Place) string {
	if x.m.Obstructed(p, x.body.Diameter/2) == "" {
		return ""
	}
	pos := p.Vec()
	if !x.m.Interior.Inside(pos) || p.R < 0 {
		return "outside the rooms"
	}
	near := x.m.Interior.Contact(pos)
	if near.Gap < 0 {
		return "inside a solid"
	}
	return fmt.Sprintf("too close to %q", x.m.Interior.Surface(near.Surface).Name)
}

// gather adds the flights of a block to the map, in their order.
func (x *mapping) gather(at, n int) {
	for k := range n {
		if x.why[k] != "" {
			x.out.Skip(x.why[k])
			continue
		}
		for d := range x.directions {
			x.out.Add((at+k)*len(x.directions)+d, &x.slots[k*len(x.directions)+d])
		}
	}
}
