package study

import (
	"context"
	"fmt"
	"math"
	"slices"
	"sync"
	"sync/atomic"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/flight"
	"offplumb/sim/frame"
	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// Thrown is a throw that reaches a target, flown among the surfaces until it
// arrives or touches something.
type Thrown struct {
	measure.Throw
	Track  *flight.Track
	Target frame.State // when it should arrive, habitat components
}

// Aimed is what was found for one target.
type Aimed struct {
	Distance float64     // m, of a throw table; NaN: of none
	Target   frame.State // at the throw, habitat components
	Throws   []Thrown    // by the time that they take

	// Of the slowest throw among those looked at, be it in the way of something
	// or not; NaN where the time of the flight is given.
	Least, LeastTime float64
	// At the longest flight looked at the throws are slower yet, so that with
	// more time they would be slower still.
	Falling bool
	// Most is the speed, m/s, beyond which no throws were looked for in air; 0: in
	// vacuum, where there is none.
	Most float64
}

// Throws is what a throw study found.
type Throws struct {
	Of      *model.ThrowTo
	From    model.Place
	Body    model.Body
	Longest float64 // s, of the flights looked at
	Slack   float64 // m, how far off the target an arrival may be, the most of all
	Aims    []Aimed // one, or one for each distance
}

// Rows are the rows of its table.
func (t *Throws) Rows() []measure.Throw {
	var out []measure.Throw
	for i := range t.Aims {
		a := &t.Aims[i]
		for k := range a.Throws {
			out = append(out, a.Throws[k].Throw)
		}
		if len(a.Throws) == 0 {
			out = append(out, measure.NoThrow(a.Distance, a.Least, a.LeastTime))
		}
	}
	return out
}

// ThrowTo solves a throw study: all throws that reach the target, flown again
// among the surfaces. Result i belongs to target i. It stops early, with the
// context's error, when the context ends.
func (p *Prepared) ThrowTo(ctx context.Context, t *model.ThrowTo, opt Options) (*Throws, error) {
	places, err := p.Model.ThrowTargets(t)
	if err != nil {
		return nil, err
	}
	from, err := p.Model.Resolve(t.From)
	if err != nil {
		return nil, err
	}
	n := max(1, len(places))
	out := &Throws{Of: t, From: from, Body: p.Model.BodyNamed(t.Body), Longest: p.Model.LongestThrow(t), Aims: make([]Aimed, n)}
	errs := make([]error, n)
	var next, done atomic.Int64
	var tell sync.Mutex
	spread(min(opt.Workers, n), func() {
		for {
			i := int(next.Add(1)) - 1
			if i >= n || ctx.Err() != nil {
				return
			}
			place := model.Place{}
			if len(places) > 0 {
				place = places[i]
			}
			out.Aims[i], errs[i] = p.aimAt(ctx, t, i, place)
			if opt.Done != nil {
				tell.Lock()
				opt.Done(int(done.Add(1)), n)
				tell.Unlock()
			}
		}
	})
	if ctx.Err() != nil {
		return nil, ctx.Err()
	}
	if i := slices.IndexFunc(errs, func(err error) bool { return err != nil }); i >= 0 {
		return nil, errs[i]
	}
	for i := range out.Aims {
		for k := range out.Aims[i].Throws {
			t := &out.Aims[i].Throws[k]
			out.Slack = math.Max(out.Slack, p.throwSlack(t.Speed, t.Time, from))
		}
	}
	return out, nil
}

// throwSlack is how far off its target, m, a throw of a speed (m/s) may be when
// it arrives after a time (s): a thousandth of a millimetre, what a hundred
// steps of the integration leave of its way, and the roundings of its place.
func (p *Prepared) throwSlack(speed, time float64, from model.Place) float64 {
	const steps, roundings = 100, 1000
	return 1e-6 + steps*p.Model.Solver.RelTol*speed*time + roundings*epsilon*r3.Norm(from.Vec())
}

func (p *Prepared) aimAt(ctx context.Context, t *model.ThrowTo, i int, place model.Place) (Aimed, error) {
	nan := math.NaN()
	out := Aimed{Distance: nan, Least: nan, LeastTime: nan}
	if t.Table() {
		out.Distance = t.Distances[i]
	}
	a, err := p.newAim(t, place)
	if err != nil {
		return out, err
	}
	out.Target = a.target(0)
	times, styles := a.times(ctx, t, &out)
	if a.drag {
		out.Most = a.most
	}
	for k, time := range times {
		v, ok := a.velocity(time)
		if !ok {
			continue
		}
		thrown, err := p.fly(a, v, time)
		if err != nil {
			return out, fmt.Errorf("throw %d: %w", k+1, err)
		}
		thrown.Distance, thrown.Solution, thrown.Style = out.Distance, len(out.Throws)+1, styles[k]
		thrown.Least, thrown.LeastTime = out.Least, out.LeastTime
		out.Throws = append(out.Throws, thrown)
	}
	return out, nil
}

// times gives the times of the throws asked for, in order, and their styles.
func (a *aim) times(ctx context.Context, t *model.ThrowTo, out *Aimed) (times []float64, styles []string) {
	if t.Time > 0 {
		a.longest = t.Time
		first := firstValley(valleys(a.curve(ctx, 0), a.speed))
		return []float64{t.Time}, []string{a.style(t.Time, first)}
	}
	curve := a.curve(ctx, t.Speed)
	low := valleys(curve, a.speed)
	if n := len(curve); n > 1 {
		out.Falling = curve[n-1].speed < curve[n-2].speed
		low = append(low, curve[n-1])
		for _, s := range low {
			if !(s.speed >= out.Least) {
				out.Least, out.LeastTime = s.speed, s.time
			}
		}
		low = low[:len(low)-1]
	}
	if !t.Least {
		times = crossings(curve, t.Speed, a.speed)
		for _, time := range times {
			styles = append(styles, a.style(time, firstValley(low)))
		}
		return times, styles
	}
	for _, s := range low {
		times = append(times, s.time)
		if s.time == out.LeastTime {
			styles = append(styles, measure.Slowest)
		} else {
			styles = append(styles, measure.Slow)
		}
	}
	return times, styles
}

// style tells a throw that is direct: harder, it would take less time, and so
// down to no time at all, without a slowest one between; the first of those
// takes the time given. The others are lobbed.
func (a *aim) style(t, first float64) string {
	const h = 1e-5 // of the time
	if t > first || a.speed(t*(1+h)) > a.speed(t*(1-h)) {
		return measure.Lobbed
	}
	return measure.Direct
}

func firstValley(low []sample) float64 {
	if len(low) == 0 {
		return math.Inf(1)
	}
	return low[0].time
}

const (
	// timeRatio is between flight times looked at while they are short: the
	// speed falls as 1/time there.
	timeRatio = 1.02
	// turnPieces is how many pieces of a turn of the habitat the flight times
	// looked at are apart at most: half a degree. The speed over the time has
	// about as many hills and valleys as the target makes turns, and a valley and
	// a hill that lie within a degree are not told apart.
	turnPieces = 720
	// mostTimes bounds the flight times looked at; beyond, they lie further
	// apart.
	mostTimes = 200_000
)

// curve gives the speed of the throws at flight times up to the longest, so
// close together that no hill or valley of it is passed over, from one that is
// too short for any throw of a speed (m/s; 0: any).
func (a *aim) curve(ctx context.Context, speed float64) []sample {
	omega, _ := a.m.Motion.Bounds(a.let.Begin, a.let.Begin+a.longest)
	step := 2 * math.Pi / omega / turnPieces
	if a.finest > 0 {
		step = math.Min(step, a.finest)
	}
	step = math.Max(step, a.longest/mostTimes)
	var out []sample
	if speed == 0 {
		speed = a.slowestInVacuum()
	}
	a.most = tooFast * speed
	for t := a.shortest(speed, omega); ctx.Err() == nil; t = math.Min(t*timeRatio, t+step) {
		t = math.Min(t, a.longest)
		out = append(out, sample{t, a.speed(t)})
		if t >= a.longest {
			break
		}
	}
	return out
}

// shortest is a flight time, s, that is too short for any throw of a speed
// (m/s), in a habitat that turns at a rate (rad/s). While it flies a body
// gets no faster, relative to the habitat, than the spin makes it on its way
// out, and the ambient pull: v^2 grows by no more than (omega r)^2 + 2 g r. One that comes back must be
// turned round, at no more than the apparent acceleration.
func (a *aim) shortest(speed, omega float64) float64 {
	r := 2 * a.scale
	gap := r3.Norm(r3.Sub(a.target(0).Pos, a.let.Local.Pos))
	pull := a.pull()
	fast := math.Hypot(math.Hypot(speed, omega*r), math.Sqrt(2*pull*r))
	straight := 0.5 * gap / (fast + a.fastest)
	back := 0.1 * speed / (omega*omega*r + 2*omega*fast + pull + a.fastest/personStep)
	t := math.Max(straight, 0)
	if gap < closeEnough || t == 0 {
		t = back
	}
	if math.IsInf(t, 0) || math.IsNaN(t) || t <= 0 {
		t = a.longest * 1e-6
	}
	return math.Min(t, a.longest/2)
}

// slowestInVacuum is about the speed, m/s, of the slowest throw in vacuum, and
// not less than what spin and ambient gravity do to speeds on the way.
func (a *aim) slowestInVacuum() float64 {
	least := math.Inf(1)
	for t := a.longest; t > a.longest*1e-6; t *= 0.9 {
		least = math.Min(least, r3.Norm(a.vacuum(t)))
	}
	omega, _ := a.m.Motion.Bounds(a.let.Begin, a.let.Begin)
	return math.Max(10*least, math.Max(omega*a.scale, math.Sqrt(2*a.pull()*a.size)))
}

// pull is the strength, m/s^2, of the ambient gravity where the body starts.
func (a *aim) pull() float64 { return r3.Norm(a.m.AmbientAt(a.let.Begin, a.let.Local.Pos)) }

func sorted(times []float64) []float64 {
	out := slices.Clone(times)
	slices.Sort(out)
	return out
}
