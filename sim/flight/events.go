package flight

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/integrator"
	"offplumb/sim/frame"
	"offplumb/sim/geom"
)

// ends are the events that end a phase, and what they mean.
type ends struct {
	specs []integrator.EventSpec
	means []meaning
	of    []geom.Patch
}

type meaning int

const (
	turns  meaning = iota // what follows shows from the state
	loses                 // the body parts from a group
	leans                 // it begins to be pressed on one
	leaves                // it no longer grazes one: the phase goes on
	starts                // a rolling body begins to slip
)

func (e *ends) add(ev integrator.Event, slop float64, m meaning, of ...geom.Patch) {
	e.specs = append(e.specs, integrator.EventSpec{Event: ev, Slop: slop, Terminal: true})
	e.means = append(e.means, m)
	patch := geom.Patch{}
	if len(of) > 0 {
		patch = of[0]
	}
	e.of = append(e.of, patch)
}

// clear takes all out.
func (e *ends) clear() { e.specs, e.means, e.of = e.specs[:0], e.means[:0], e.of[:0] }

func (e *ends) ending(hits []integrator.Hit) ending {
	var out ending
	for _, h := range hits {
		switch e.means[h.Event] {
		case loses:
			out.parted = append(out.parted, e.of[h.Event])
		case leaves:
			out.left = append(out.left, e.of[h.Event])
		case leans:
			out.leant = append(out.leant, e.of[h.Event])
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

// strays is how near the body is to a contact, within thin: beyond an edge it
// has left its surface, whatever the force. That is asked so often that the
// body does not pass over a hole in the meantime.
type strays struct {
	s *slide
	g geom.Patch
}

// Bound implements [integrator.Bounded]: nothing happens before the contact
// comes to an edge, nor worth of note within a hole that is smaller than the
// body.
func (e strays) Bound(s *integrator.Step, t float64, y []float64) (rate, accel, least float64) {
	f := e.s.flier
	var dy [dims]float64
	s.Rate(t, dy[:])
	way := math.Max(f.m.Interior.Runs(e.s.place(y), e.g), math.Max(f.wide/4, leastHole))
	speed, acc := r3.Norm(vec(dy[:])), s.MaxAccel(0, 3)
	return promise(e.Value(t, y), 2*way/(speed+math.Sqrt(speed*speed+2*acc*way))), 0, thin
}

// leastHole is the width, in m, of a hole that a point may pass over.
const leastHole = 1e-3

func (e strays) Value(_ float64, y []float64) float64 {
	return e.s.flier.wide + thin - e.s.flier.m.Interior.ContactOn(e.s.place(y), e.g).Gap
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
	return e.s.rub.most*(1+2*holdShare) - e.s.rub.need
}

// grazing is a body along a patch that it touches without being pressed on it.
// at gives the body's state in the habitat.
type grazing struct {
	f  *Flier
	of geom.Patch
	at func(t float64, y []float64) frame.State
}

func (g *grazing) gap(t float64, y []float64) float64 {
	return g.f.m.Interior.ContactOn(g.at(t, y).Pos, g.of).Gap - g.f.wide
}

// reaches is the gap to what a body grazes.
type reaches struct{ *grazing }

func (e reaches) Value(t float64, y []float64) float64 { return e.gap(t, y) }

// parted is how near a body is to what it grazes, within twice thin: from
// there on it counts among what else there is.
type parted struct{ *grazing }

func (e parted) Value(t float64, y []float64) float64 { return 2*thin - e.gap(t, y) }

// Bound has the event looked at soon after the start of a step, and then each
// time that the time since then has doubled. It is no bound of the rate: a
// body that grazes something does so for long, or moves off from the start.
func (e parted) Bound(s *integrator.Step, t float64, y []float64) (rate, accel, least float64) {
	return promise(e.Value(t, y), math.Max(t-s.T0, (s.T1-s.T0)*firstLook)), 0, thin
}

// firstLook is the share of a step at which it is first asked whether a body
// moves off from what it grazes: less than a microsecond.
const firstLook = 0x1p-20

// presses is the acceleration, but for friction, of the gap to what a body
// grazes: where it falls below zero, the body is pressed on it.
type presses struct {
	*grazing
	drive func(t float64, y []float64) r3.Vec
}

func (e presses) Value(t float64, y []float64) float64 {
	s := e.at(t, y)
	c := e.f.m.Interior.ContactOn(s.Pos, e.of)
	if c.Gap > e.f.wide+2*thin || r3.Dot(s.Vel, c.Normal) > parting {
		return 1 // it has left, or moves off
	}
	return e.f.gapAccel(s.Pos, s.Vel, e.drive(t, y), e.of)
}

// graze adds the events of what a body grazes; rough is what an acceleration may
// be by rounding, m/s^2.
func (e *ends) graze(f *Flier, list []geom.Patch, slop, rough float64, at func(float64, []float64) frame.State, drive func(float64, []float64) r3.Vec) {
	for _, p := range list {
		g := &grazing{f, p, at}
		e.add(reaches{g}, slop, turns, p)
		e.add(parted{g}, 0, leaves, p)
		e.add(presses{g, drive}, math.Max(pressSlop, rough), leans, p)
	}
}
