package flight

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// What a track may deviate from the laws by.
const (
	// gapTol is how far, in m, a body may be from a surface that it slides on,
	// or within one: what a search for contacts does not tell.
	gapTol = thin
	// joinTol is how far, in m, one phase may begin from where the last ended:
	// but for rounding, a body is only moved when a slide drifted, and a point
	// when it touches something.
	joinTol = 1e-9
	moveTol = 4e-8
)

// judge holds a track against the laws of motion in contact, by its dense
// output and the interior alone.
type judge struct {
	m      *model.Model
	t      *Track
	forces *Forces
	faults []string
	most   struct{ grow, join, deep, off, pull, rub float64 } // the largest deviations
}

func newJudge(m *model.Model, t *Track) *judge {
	return &judge{m: m, t: t, forces: NewForces(m, t.Body, nil)}
}

func (j *judge) fault(format string, args ...any) {
	if len(j.faults) < 10 {
		j.faults = append(j.faults, fmt.Sprintf(format, args...))
	}
}

func (j *judge) wide() float64 { return j.t.Body.Diameter / 2 }

// local is the state on a phase, in the habitat.
func (j *judge) local(p *Phase, time float64) frame.State {
	s := p.at(time)
	if p.local {
		return s
	}
	a := j.m.Motion.At(j.t.Begin + time)
	return a.ToHabitat(s)
}

// spinAt is the spin of a rolling body relative to the habitat.
func (j *judge) spinAt(p *Phase, time float64) r3.Vec {
	if !j.t.Body.Rolls || !p.local || len(p.steps) == 0 {
		return p.spin // in flight its size stays
	}
	for i := range p.steps {
		if u := time - p.T0; u <= p.steps[i].T1 || i == len(p.steps)-1 {
			var y [dims]float64
			p.steps[i].At(u, y[:])
			return vec(y[6:])
		}
	}
	return p.spin
}

// energy is the Jacobi integral by mass, J/kg, with that of the spin.
func (j *judge) energy(s frame.State, w r3.Vec) float64 {
	spin := j.m.Habitat.Spin
	e := r3.Norm2(s.Vel)/2 - spin*spin*(s.Pos.X*s.Pos.X+s.Pos.Y*s.Pos.Y)/2
	if j.t.Body.Rolls {
		e += j.wide() * j.wide() / 5 * r3.Norm2(w)
	}
	return e
}

// track judges a whole track.
func (j *judge) track() []string {
	j.order()
	last := math.Inf(1)
	for i := range j.t.Phases {
		p := &j.t.Phases[i]
		if i > 0 {
			j.joint(&j.t.Phases[i-1], p)
		}
		for _, time := range looksOf(p) {
			s := j.local(p, time)
			e := j.energy(s, j.spinAt(p, time))
			// Bringing a body onto its surface moves it by gapTol at most.
			slack := 1e-8*(1+r3.Norm2(s.Vel)) + gapTol*j.m.Gravity(r3.Norm(s.Pos))
			j.most.grow = math.Max(j.most.grow, e-last)
			if e > last+slack {
				j.fault("phase %d %v, %.9g s: energy grows by %.3g J/kg", i, p.Kind, time, e-last)
			}
			last = e
			j.place(i, p, time, s)
		}
	}
	return j.faults
}

// looksOf gives times on a phase: the ends of its steps, and between.
func looksOf(p *Phase) []float64 {
	out := []float64{p.T0}
	for i := range p.steps {
		s := &p.steps[i]
		n := 4.0
		for k := 1.0; k <= n; k++ {
			if k == n {
				out = append(out, p.T0+s.T1)
			} else {
				out = append(out, p.T0+s.T0+(s.T1-s.T0)*k/n)
			}
		}
	}
	return out
}

// order judges the order of phases and impacts.
func (j *judge) order() {
	at, joints := 0.0, map[float64]bool{0: true}
	for i := range j.t.Phases {
		p := &j.t.Phases[i]
		if p.T0 != at || p.T1 < p.T0 {
			j.fault("phase %d goes from %g to %g s, the last one ended at %g s", i, p.T0, p.T1, at)
		}
		at = p.T1
		joints[at] = true
	}
	if at != j.t.End {
		j.fault("phases end at %g s, the track at %g s", at, j.t.End)
	}
	last := 0.0
	for i := range j.t.Impacts {
		h := &j.t.Impacts[i]
		if !joints[h.Time] || h.Time < last {
			j.fault("impact %d at %g s is at no joint, or out of order", i, h.Time)
		}
		if i > 0 && h.Time == last && h.Surface == j.t.Impacts[i-1].Surface {
			j.fault("impact %d repeats the last one", i)
		}
		if into := r3.Dot(h.State.Vel, h.Contact.Normal); into > parting {
			j.fault("impact %d leaves %q at %g m/s", i, h.Surface, into)
		}
		last = h.Time
	}
}

// joint judges where two phases meet.
func (j *judge) joint(p, q *Phase) {
	off := r3.Norm(r3.Sub(j.local(p, p.T1).Pos, j.local(q, q.T0).Pos))
	j.most.join = math.Max(j.most.join, off)
	if most := joinTol; off > most && j.t.Body.Diameter > 0 || off > moveTol {
		j.fault("%v to %v at %.9g s: place jumps by %.3g m", p.Kind, q.Kind, q.T0, off)
	}
}

// place judges where a body is and what its surroundings do to it.
func (j *judge) place(i int, p *Phase, time float64, s frame.State) {
	gap := j.m.Interior.Dist(s.Pos) - j.wide()
	j.most.deep = math.Max(j.most.deep, -gap)
	if gap < -gapTol*1.01 {
		j.fault("phase %d %v, %.9g s: %.3g m within %q", i, p.Kind, time, -gap, j.m.Interior.Surface(j.m.Interior.Contact(s.Pos).Surface).Name)
	}
	if p.Kind == Free {
		return
	}
	j.most.off = math.Max(j.most.off, gap)
	if gap > gapTol*1.01 {
		j.fault("phase %d %v, %.9g s: %.3g m off every surface", i, p.Kind, time, gap)
	}
}
