package study

import (
	"context"
	"fmt"
	"sync"
	"sync/atomic"

	"offplumb/sim/flight"
	"offplumb/sim/frame"
	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// ScatterOptions say how a scatter is run.
type ScatterOptions struct {
	Workers int // at least 1
	Seed    uint64
	Done    func(done, of int) // progress, called from one worker at a time; may be nil
}

// Scatter flies the samples of a scatter: all, or those that its stated
// precision takes. Only their numbers are kept, so that samples may be many. The
// result depends on the scenario and the seed alone. It stops early, with the
// context's error, when the context ends.
func (p *Prepared) Scatter(ctx context.Context, s *model.Scatter, opt ScatterOptions) (*measure.Cloud, error) {
	x, err := p.Scattering(s, opt)
	if err != nil {
		return nil, err
	}
	if !s.Stops() {
		err := x.Fly(ctx, 0, s.Samples)
		return x.out, err
	}
	from := 0
	for _, n := range looks(s.Samples) {
		err := x.Fly(ctx, from, n)
		if from = n; err != nil || n == s.Samples || x.out.Settled(p.Model, n) {
			x.out.Keep(n)
			return x.out, err
		}
	}
	return x.out, nil
}

// looks lists the numbers of samples after which a stated precision is looked
// at; the last is that of all samples.
func looks(samples int) (out []int) {
	for n := min(firstLook, samples); ; n = min(n+n/4, samples) {
		if out = append(out, n); n == samples {
			return out
		}
	}
}

const (
	// chunk is how many samples a worker takes at once: a few milliseconds'
	// worth.
	chunk = 64
	// firstLook is after how many samples the precision is looked at first;
	// later looks come after a quarter more each, so that they cost little.
	firstLook = 400
)

// Scattering makes a scatter ready: to be flown piece by piece, or to take
// samples that were flown elsewhere.
func (p *Prepared) Scattering(s *model.Scatter, opt ScatterOptions) (*Scattering, error) {
	at, ok := p.Model.ReleaseNamed(s.Of)
	if !ok {
		return nil, fmt.Errorf("no release named %q", s.Of)
	}
	x := &Scattering{p: p, s: s, of: &p.Lets[at], opt: opt}
	x.draw, x.side = newSampler(s, opt.Seed)
	x.ground = measure.GroundAt(p.Model, x.of.Place.Polar, p.Model.DeckBeneath(x.of.Place.Polar))
	x.out = measure.NewCloud(s, x.of.Place)
	x.out.Draw = x.numbers
	return x, nil
}

// Cloud is what the samples did that were flown or taken.
func (x *Scattering) Cloud() *measure.Cloud { return x.out }

// Settle ends a scatter with all samples, or with those that its stated
// precision takes, so that it is the same as one flown in one go.
func (x *Scattering) Settle() *measure.Cloud {
	if x.s.Stops() {
		for _, n := range looks(x.s.Samples) {
			if n == x.s.Samples || x.out.Settled(x.p.Model, n) {
				x.out.Keep(n)
				break
			}
		}
	}
	return x.out
}

// Fly flies the samples from one up to another on several workers. Sample i
// depends on the scenario, the seed and i alone.
func (x *Scattering) Fly(ctx context.Context, from, to int) error {
	var next atomic.Int64
	var tell sync.Mutex
	next.Store(int64(from))
	spread(x.opt.Workers, func() {
		w := x.worker()
		for {
			i := int(next.Add(chunk)) - chunk
			end := min(i+chunk, to)
			if i >= end || ctx.Err() != nil {
				break
			}
			x.done.Add(int64(end - i))
			for ; i < end; i++ {
				w.sample(i)
			}
			tell.Lock()
			if x.opt.Done != nil {
				x.opt.Done(int(x.done.Load()), x.s.Samples)
			}
			tell.Unlock()
		}
		tell.Lock()
		x.out.Work.Steps += w.work.Steps
		x.out.Work.Rejected += w.work.Rejected
		x.out.Work.Derivs += w.work.Derivs
		tell.Unlock()
	})
	return ctx.Err()
}

// Scattering is a scatter at work.
type Scattering struct {
	p      *Prepared
	s      *model.Scatter
	of     *flight.Let    // the release as the scenario has it
	ground measure.Ground // beneath it
	draw   *sampler
	side   []int // of each spread: its side of the unit cube
	out    *measure.Cloud
	opt    ScatterOptions
	done   atomic.Int64
}

// numbers gives the varied numbers of a sample.
func (x *Scattering) numbers(sample int, into []float64) {
	for k := range into {
		into[k] = quantile(&x.s.Vary[k], x.draw.at(sample, x.side[k]))
	}
}

// thrower flies samples, one after another.
type thrower struct {
	*Scattering
	m     *model.Model
	flier *flight.Flier
	track flight.Track
	drawn []float64
	work  flight.Work
}

func (x *Scattering) worker() *thrower {
	return &thrower{Scattering: x, m: x.p.Model, flier: flight.NewFlier(x.p.Model), drawn: make([]float64, len(x.s.Vary))}
}

// sample flies one sample, or says why it cannot be.
func (w *thrower) sample(i int) {
	v := w.p.Model.VariantOf(w.of.Release)
	w.numbers(i, w.drawn)
	for k, x := range w.drawn {
		if why := model.Possible(w.s.Vary[k].Key, x); why != "" {
			w.out.LeaveOut(i, measure.ShotImpossible, why)
			return
		}
		v.Set(&w.s.Vary[k], x)
	}
	v.Release.Own = &v.Body
	w.spin(v.Spin)
	let, why := w.let(&v)
	if why != "" {
		w.out.LeaveOut(i, measure.ShotImpossible, why)
		return
	}
	track := &w.track
	if err := w.flier.FlyAgain(track, &let); err != nil {
		w.out.LeaveOut(i, measure.ShotFailed, err.Error())
		return
	}
	w.work.Steps += track.Work.Steps
	w.work.Rejected += track.Work.Rejected
	w.work.Derivs += track.Work.Derivs
	l := measure.Land(w.m, track)
	spinward, axial := w.moved(&let)
	// The way gone, on the nominal ground where the sample starts above another.
	spinward += l.Offset * w.ground.Radius / measure.GroundOf(w.m, track).Radius
	w.out.Set(i, &l, spinward, axial+l.OffsetAxial)
}

// spin makes the habitat turn at a rate, rad/s.
func (w *thrower) spin(rate float64) {
	if rate == w.m.Habitat.Spin {
		return
	}
	w.m = w.p.Model.Spun(rate)
	w.flier = flight.NewFlier(w.m)
}

// let starts a variant, or says in words why it cannot start.
func (w *thrower) let(v *model.Variant) (flight.Let, string) {
	let, fault := flight.Release(w.m, &v.Release, w.p.carrier(w.of.Release))
	if v.Release.Carried == nil && fault.Msg == "" {
		fault.Msg = w.m.Obstructed(let.Place, v.Body.Diameter/2)
	}
	if fault.Msg == "" {
		return let, ""
	}
	pos := let.Place.Vec()
	near := w.m.Interior.Contact(pos)
	switch {
	case !w.m.Interior.Inside(pos):
		return let, "is let go outside the rooms"
	case near.Gap < 0:
		return let, "is let go inside a solid"
	}
	return let, fmt.Sprintf("has no room beside %q", w.m.Interior.Surface(near.Surface).Name)
}

// moved says where the plumb line of a sample stands, m from that of the
// nominal release: along its ground and axially.
func (w *thrower) moved(let *flight.Let) (spinward, axial float64) {
	from, to := w.of.Place, let.Place
	if f := w.ground.Flat; f != nil {
		s0, a0, _ := f.Place(from.Vec())
		s1, a1, _ := f.Place(to.Vec())
		return s1 - s0, a1 - a0
	}
	return w.ground.Radius * frame.WrapAngle(to.Phi-from.Phi), to.Z - from.Z
}
