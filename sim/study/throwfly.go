package study

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/flight"
	"offplumb/sim/frame"
	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// fly throws a solution among the surfaces, and measures it.
func (p *Prepared) fly(a *aim, v r3.Vec, time float64) (Thrown, error) {
	short := *p.Model
	short.Solver.MaxTime = time
	r := *a.let.Release
	r.Until = model.Until{Kind: model.UntilLanding}
	r.Start.Kind = model.Thrown
	r.Start.Speed, r.Start.Heading, r.Start.Elevation = measure.AimOf(p.Model, v, a.let.Place.Polar)
	let, fault := flight.Release(p.Model, &r, nil)
	if fault.Msg != "" {
		return Thrown{}, fmt.Errorf("%s", fault.Msg)
	}
	track, err := flight.NewFlier(&short).Fly(&let)
	if err != nil {
		return Thrown{}, err
	}
	out := Thrown{Throw: measure.ThrowOf(p.Model, track, a.target(time), a.target(0).Pos, time, p.throwSlack(r.Start.Speed, time, let.Place)), Track: track, Target: a.target(time)}
	a.sensitivity(&out.Throw, &r, time)
	return out, nil
}

const (
	// angleStep (rad) and speedStep (a share of the speed) are those of the
	// central differences that tell how far a throw misses: their squares, a part
	// in 1e8, are what is neglected.
	angleStep = 1e-4
	speedStep = 1e-4
)

// sensitivity works out how far a throw passes the target for what it is off:
// the shift of its place at the arrival, less the part along its way there,
// which only makes it early or late.
func (a *aim) sensitivity(out *measure.Throw, r *model.Release, time float64) {
	place := func(change func(*model.Start, float64), by float64) (frame.State, bool) {
		other := *r
		change(&other.Start, by)
		let, fault := flight.Release(a.m, &other, nil)
		if fault.Msg != "" {
			return frame.State{}, false
		}
		s, err := a.flier.Coast(&let, time)
		at := a.m.Motion.At(let.Begin + time)
		return at.ToHabitat(s), err == nil
	}
	here, ok := place(func(*model.Start, float64) {}, 0)
	way := r3.Sub(here.Vel, a.target(time).Vel)
	per := func(h float64, change func(*model.Start, float64)) float64 {
		p, ok1 := place(change, h)
		q, ok2 := place(change, -h)
		if !ok || !ok1 || !ok2 || h == 0 {
			return math.NaN()
		}
		d := r3.Scale(1/(2*h), r3.Sub(p.Pos, q.Pos))
		if n := r3.Norm2(way); n > 0 {
			d = r3.Sub(d, r3.Scale(r3.Dot(d, way)/n, way))
		}
		return r3.Norm(d)
	}
	out.PerHeading = per(angleStep, func(s *model.Start, by float64) { s.Heading += by })
	out.PerElev = per(angleStep, func(s *model.Start, by float64) { s.Elevation += by })
	out.PerSpeed = per(speedStep*r.Start.Speed, func(s *model.Start, by float64) { s.Speed += by })
}
