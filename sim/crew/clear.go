package crew

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/geom"
	"offplumb/sim/model"
)

// stepOver is how high above the feet, in m, the capsule that stands for a
// person begins: coamings and toe boards are stepped over.
const stepOver = 0.3

// bodyStep is the distance, in m, between the places along a path and along
// the body at which room is looked for.
const bodyStep = 0.1

// Clearance is the smallest distance of a person's outline to a surface.
type Clearance struct {
	Gap     float64 // m; negative: an overlap
	Time    float64 // s from the start of the path
	Surface string
}

// clear finds the legs on which the person's centreline lies in a solid or
// outside the rooms.
func (p *Plan) clear(m *model.Model) []model.Problem {
	var out []model.Problem
	for i := range p.legs {
		l := &p.legs[i]
		if t, where := p.blocked(m, l); where != "" {
			out = append(out, model.Problem{Key: fmt.Sprintf("legs[%d]", i),
				Msg: fmt.Sprintf("leads through %s, %.3g s into the path", where, t)})
		}
	}
	return out
}

// blocked tries a leg at places bodyStep apart.
func (p *Plan) blocked(m *model.Model, l *leg) (float64, string) {
	n := 1 + int(math.Min(1e5, l.length()/bodyStep))
	for k := 0; k <= n; k++ {
		t := l.start + l.way.lasts()*float64(k)/float64(n)
		f := p.At(t)
		for h := stepOver; h <= p.Crew.Stature-f.low.x; h += bodyStep {
			pos := f.Point(model.Reach{Height: h}).Pos
			if near := m.Interior.Contact(pos); near.Gap < 0 {
				return t, fmt.Sprintf("%q", m.Interior.Surface(near.Surface).Name)
			}
			if !m.Interior.Inside(pos) {
				return t, "the hull"
			}
		}
	}
	return 0, ""
}

// Clearance finds the smallest room that the person has along the path: the
// capsule from 0.3 m above the feet to the head, as wide as the breadth.
func (p *Plan) Clearance(m *model.Model) Clearance {
	best := Clearance{Gap: math.Inf(1)}
	for _, c := range p.Clearances(m) {
		if c.Gap < best.Gap {
			best = c
		}
	}
	return best
}

// Clearances finds the smallest room to each surface that is the nearest of
// its body of matter somewhere along the path, in the order of the interior's
// surfaces. It looks bodyStep apart along the way and along the body.
func (p *Plan) Clearances(m *model.Model) []Clearance {
	best := make([]Clearance, len(m.Interior.Surfaces()))
	for i := range best {
		best[i].Gap = math.Inf(1)
	}
	for i := range p.legs {
		l := &p.legs[i]
		n := 1 + int(math.Min(1e5, l.length()/bodyStep))
		for k := 0; k <= n; k++ {
			p.near(m, l.start+l.way.lasts()*float64(k)/float64(n), best)
		}
	}
	var out []Clearance
	for i, s := range m.Interior.Surfaces() {
		if c := best[i]; !math.IsInf(c.Gap, 1) {
			c.Surface = s.Name
			out = append(out, c)
		}
	}
	return out
}

// underfoot is the cosine to the upright from which on a surface is one to
// stand on, to which no room is wanted.
const underfoot = 0.7

// near looks at the room about the person at a time.
func (p *Plan) near(m *model.Model, t float64, best []Clearance) {
	a := p.Crew.Breadth / 2
	f := p.At(t)
	up := f.Local().Up
	for h := stepOver + a; h <= math.Max(stepOver+a, p.Crew.Stature-f.low.x-a); h += bodyStep {
		pos := f.Point(model.Reach{Height: h}).Pos
		for g := range m.Interior.Groups() {
			c := m.Interior.ContactIn(pos, geom.Group(g))
			if r3.Dot(c.Normal, up) > underfoot {
				continue
			}
			if gap := c.Gap - a; c.Surface >= 0 && gap < best[c.Surface].Gap {
				best[c.Surface].Gap, best[c.Surface].Time = gap, t
			}
		}
	}
}

// State gives a point of the body in the inertial frame at a time (s from the
// start of the path).
func (p *Plan) State(m *model.Model, t float64, reach model.Reach) (pos, vel r3.Vec) {
	a := m.Motion.At(p.Path.Time + t)
	f := p.At(t)
	s := a.ToInertial(f.Point(reach).State)
	return s.Pos, s.Vel
}
