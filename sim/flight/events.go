package flight

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/integrator"
	"offplumb/sim/geom"
)

// ends are the events that end a phase, and what they mean.
type ends struct {
	specs  []integrator.EventSpec
	means  []meaning
	groups []geom.Group
}

type meaning int

const (
	turns  meaning = iota // what follows shows from the state
	loses                 // the body parts from a group
	leans                 // it begins to be pressed on one
	starts                // a rolling body begins to slip
)

func (e *ends) add(ev integrator.Event, slop float64, m meaning, g geom.Group) {
	e.specs = append(e.specs, integrator.EventSpec{Event: ev, Slop: slop, Terminal: true})
	e.means, e.groups = append(e.means, m), append(e.groups, g)
}

func (e *ends) ending(hits []integrator.Hit) ending {
	var out ending
	for _, h := range hits {
		switch e.means[h.Event] {
		case loses:
			out.parted = append(out.parted, e.groups[h.Event])
		case leans:
			out.leant = append(out.leant, e.groups[h.Event])
		case starts:
			out.skids = true
		}
	}
	return out
}

// pressSlop is the acceleration, in m/s^2, by which a body is not yet pressed
// on what it grazes: what drag makes of a motion slower than parting, in any
// air that slows it within less than a second.
const pressSlop = 1e-9

// promise turns a time during which an event's value g stays above zero, or
// within thin, into the rate that an [integrator.Bounded] event promises.
func promise(g, time float64) float64 {
	return math.Max(g, thin) / math.Max(time, math.SmallestNonzeroFloat64)
}

// besides is the gap to what the body does not touch yet.
type besides struct {
	s     *slide
	watch *geom.Beside
}

func (e besides) Value(_ float64, y []float64) float64 {
	d := e.s.flier.m.Interior.DistBeside(e.s.place(y), e.watch)
	return math.Min(d, math.MaxFloat32) - e.watch.Wide // where there is nothing else
}

func (e besides) Bound(s *integrator.Step, t float64, y []float64) (rate, accel, least float64) {
	var dy [dims]float64
	s.Rate(t, dy[:])
	time := e.s.flier.m.Interior.TimeBeside(e.s.place(y), vec(dy[:]), s.MaxAccel(0, 3), s.T1-t, e.watch)
	return promise(e.Value(t, y), time), 0, thin
}

// parts is the normal force of one contact: it parts where that ends.
type parts struct {
	s *slide
	i int
}

func (e parts) Value(t float64, y []float64) float64 {
	e.s.eval(t, y)
	return e.s.push[e.i].force
}

// leaves is how near the body is to a contact, within thin: a point that goes
// over an edge leaves its surface, whatever the force.
type leaves struct {
	s *slide
	g geom.Group
}

func (e leaves) Value(_ float64, y []float64) float64 {
	return e.s.flier.wide + thin - e.s.flier.m.Interior.ContactIn(e.s.place(y), e.g).Gap
}

// stops is the speed above that at which a body counts as having stopped.
type stops struct{ slow float64 }

func (e stops) Value(_ float64, y []float64) float64 { return r3.Norm(vec(y[3:])) - e.slow }

func (e stops) Bound(s *integrator.Step, t float64, _ []float64) (rate, accel, least float64) {
	var dy [dims]float64
	s.Rate(t, dy[:])
	return r3.Norm(vec(dy[3:])), s.MaxAccel(3, 6), e.slow / 2
}

// grips is the speed of a slipping contact point above creep.
type grips struct{ s *slide }

func (e grips) Value(t float64, y []float64) float64 {
	e.s.eval(t, y)
	return r3.Norm(e.s.slip(y)) - creep
}

// holdsFast is what a body that as good as does not slip lacks of the friction
// to roll.
type holdsFast struct{ s *slide }

func (e holdsFast) Value(t float64, y []float64) float64 {
	e.s.eval(t, y)
	if r3.Norm(e.s.slip(y)) > creep {
		return 1
	}
	return e.s.rub.need - e.s.rub.most
}

// skids is what friction has left to give to a rolling body.
type skids struct{ s *slide }

func (e skids) Value(t float64, y []float64) float64 {
	e.s.eval(t, y)
	return e.s.rub.most - e.s.rub.need
}

// reaches is the gap to a group that a sliding body grazes.
type reaches struct {
	s *slide
	g geom.Group
}

func (e reaches) Value(_ float64, y []float64) float64 {
	return e.s.flier.m.Interior.ContactIn(e.s.place(y), e.g).Gap - e.s.flier.wide
}

// presses is the acceleration, but for friction, of the gap to a group that a
// sliding body grazes: where it falls below zero, the body is pressed on it.
type presses struct {
	s *slide
	g geom.Group
}

func (e presses) Value(t float64, y []float64) float64 {
	q, v := e.s.place(y), vec(y[3:])
	if e.s.flier.hasLeft(q, v, e.g) {
		return 1
	}
	e.s.eval(t, y)
	return e.s.flier.gapAccel(q, v, e.s.rub.drive, e.g)
}

// hasLeft says whether a body no longer grazes a group, or moves off.
func (f *Flier) hasLeft(q, v r3.Vec, g geom.Group) bool {
	c := f.m.Interior.ContactIn(q, g)
	return c.Gap > f.wide+2*thin || r3.Dot(v, c.Normal) > parting
}
