package study

import (
	"errors"

	"offplumb/sim/flight"
	"offplumb/sim/measure"
)

// Outcome is what a release without a track did, to be kept elsewhere.
type Outcome struct {
	Landing measure.Landing
	Rest    measure.Rest
	Work    flight.Work
}

// Outcome gives what there is of a result without its track.
func (r *Result) Outcome() Outcome { return Outcome{r.Landing, r.Rest, r.Work} }

// Result makes a finished result of an outcome.
func (o *Outcome) Result() Result {
	return Result{Landing: o.Landing, Rest: o.Rest, Work: o.Work, done: true}
}

// PointOutcome is a point of a sweep, to be kept elsewhere.
type PointOutcome struct {
	Values []float64
	Fault  string // why it has none; "": it has them
	Spin   float64

	Landings []measure.Landing
}

// Outcome gives what there is of a computed point.
func (p *Point) Outcome() PointOutcome {
	o := PointOutcome{Values: p.Values, Spin: p.Spin, Landings: p.Landings}
	if p.Fault != nil {
		o.Fault = p.Fault.Error()
	}
	return o
}

// Point makes a computed point of an outcome.
func (o *PointOutcome) Point() Point {
	p := Point{Values: o.Values, Spin: o.Spin, Landings: o.Landings, done: true}
	if o.Fault != "" {
		p.Fault = errors.New(o.Fault)
	}
	return p
}
