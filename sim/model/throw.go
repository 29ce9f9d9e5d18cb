package model

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/frame"
)

// ThrowTo asks how to throw a body so that it arrives at a target.
type ThrowTo struct {
	Name    string
	From    Station
	Body    string  // "": a point without drag
	Leaves  float64 // s, when it is thrown
	Target  Target
	Speed   float64 // m/s relative to the habitat; 0: not given
	Time    float64 // s, of the flight; 0: not given
	Least   bool    // the slowest throws are asked for
	Longest float64 // s, of the flights looked at; 0: by [Model.LongestThrow]

	// Of a throw table: the targets stand at these distances (m) from plumb under
	// where it is thrown from.
	Distances []float64
	Along     Direction // Spinward or PlusAxial: the way that the distances are counted
}

// Target is what is to be reached: a station, or a point of a moving person.
type Target struct {
	Station
	Path  string // "": a station
	Reach Reach

	HasSpinward, HasAxial bool // given; of a table the place of the thrower stands in else
}

// Table says whether the study is a throw table.
func (t *ThrowTo) Table() bool { return t.Distances != nil }

// LongestThrow is the longest flight, in s, that a throw study looks at: its
// own, or one turn of the habitat, and never more than the longest time of a
// release. A throw that takes more than a turn follows the one before it by
// about a turn, and drifts rather than flies.
func (m *Model) LongestThrow(t *ThrowTo) float64 {
	longest := t.Longest
	if longest == 0 {
		omega, _ := m.Motion.Bounds(t.Leaves, t.Leaves)
		longest = 2 * math.Pi / omega // infinite without a spin
	}
	return math.Min(longest, m.Solver.MaxTime)
}

// BodyNamed gives a body: a point without mass for the empty name.
func (m *Model) BodyNamed(name string) Body { return m.BodyOf(&Release{Body: name}) }

// ThrowTargets gives the places of the targets of a throw study: one, or one
// for each distance of a table. A target on a crew path has none.
func (m *Model) ThrowTargets(t *ThrowTo) ([]Place, error) {
	if t.Target.Path != "" {
		return nil, nil
	}
	if !t.Table() {
		p, err := m.Resolve(t.Target.Station)
		return []Place{p}, err
	}
	from, err := m.Resolve(t.From)
	if err != nil {
		return nil, err
	}
	out := make([]Place, len(t.Distances))
	for i, d := range t.Distances {
		if out[i], err = m.Resolve(m.atDistance(t, from, d)); err != nil {
			return nil, err
		}
	}
	return out, nil
}

// atDistance is the target's station at a distance (m) along the target's deck
// from plumb under a place.
func (m *Model) atDistance(t *ThrowTo, from Place, d float64) Station {
	s := t.Target.Station
	if !t.Target.HasAxial {
		s.Axial = from.Z
	}
	if !t.Target.HasSpinward {
		s.Spinward = Arc{Value: m.targetArc(&s, from.Polar)}
	}
	if t.Along == PlusAxial {
		s.Axial += d
	} else {
		s.Spinward.Value += d
	}
	return s
}

// targetArc is the arc (m) of a place on the circle, or along the flat floor, that
// a station counts it on.
func (m *Model) targetArc(s *Station, p frame.Polar) float64 {
	if s.HasRadius {
		return s.Radius * p.Phi
	}
	d, _ := m.DeckNamed(s.Deck)
	if f := m.FlatDeck(d); f != nil {
		along, _, _ := f.Place(p.Vec())
		return along
	}
	return m.Decks[d].Radius * p.Phi
}

// throws checks the throw studies.
func (c *checker) throws() {
	for i := range c.m.Throws {
		c.throw(fmt.Sprintf("throw_to[%d]", i), &c.m.Throws[i])
	}
}

func (c *checker) throw(key string, t *ThrowTo) {
	m := c.m
	if _, ok := m.bodyIndex[t.Body]; t.Body != "" && !ok {
		c.fault(key+".body", "", "no body named %q", t.Body)
	}
	if _, ok := m.PathNamed(t.Target.Path); t.Target.Path != "" && !ok {
		c.fault(key+".target.path", "", "no crew path named %q", t.Target.Path)
	}
	if t.Time > m.Solver.MaxTime {
		c.fault(key+".time", "", "wants no more than the longest time of a release, solver.max_time: %g s, got %g s", m.Solver.MaxTime, t.Time)
	}
	a := m.BodyNamed(t.Body).Diameter / 2
	from, err := m.Resolve(t.From)
	if err != nil {
		c.fault(key+".from"+t.From.key(), "", "%v", err)
		return
	}
	before := len(c.problems)
	c.clear(key+".from", from, a)
	targets, err := m.ThrowTargets(t)
	if err != nil {
		c.fault(key+".target"+t.Target.key(), "", "%v", err)
		return
	}
	for i, p := range targets {
		c.target(key, t, i, p, a)
		if len(c.problems) == before && t.Least && r3.Norm(r3.Sub(p.Vec(), from.Vec())) < TouchSlack {
			c.fault(key+".target", "a speed or a time finds the throws that come back", "the target is where it is thrown from: the slowest throw is none at all")
		}
	}
}

// target checks that a body of the radius a (m) has room at a target.
func (c *checker) target(key string, t *ThrowTo, i int, p Place, a float64) {
	if !t.Table() {
		c.clear(key+".target", p, a)
		return
	}
	if msg := c.m.Obstructed(p, a); msg != "" {
		c.fault(key+".target", "", "at the distance %g m it %s", t.Distances[i], msg)
	}
}
