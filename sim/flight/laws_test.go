package flight

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/frame"
	"offplumb/sim/geom"
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
// output and the interior alone: time goes on and phases join; impacts are at
// joints, and go into surfaces; the body is in nothing, and slides along a
// surface; its energy in the turning frame (the Jacobi integral v'^2/2 - omega^2
// r^2/2, and that of the spin where it rolls) never grows; surfaces push and do
// not pull, and friction neither exceeds mu N nor helps the motion. Where the
// turning changes there is no such integral: the energy is judged within the
// stretches of steady turning alone.
type judge struct {
	m      *model.Model
	t      *Track
	forces *Forces
	faults []string
	pushes int // that were judged
	spin   float64
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
	spin := j.spin
	e := r3.Norm2(s.Vel)/2 - spin*spin*(s.Pos.X*s.Pos.X+s.Pos.Y*s.Pos.Y)/2
	if j.t.Body.Rolls {
		e += j.wide() * j.wide() / 5 * r3.Norm2(w)
	}
	return e
}

// track judges a whole track.
func (j *judge) track() []string {
	j.order()
	last, stretch := math.Inf(1), math.NaN()
	for i := range j.t.Phases {
		p := &j.t.Phases[i]
		if i > 0 {
			j.joint(&j.t.Phases[i-1], p)
		}
		for _, time := range looksOf(p) {
			s := j.local(p, time)
			now := j.m.Motion.Stretch(j.t.Begin + time)
			j.spin = j.m.SpinAt(j.t.Begin + time)
			e := j.energy(s, j.spinAt(p, time))
			if now.End != stretch || !math.IsInf(now.Pace, 1) {
				last = math.Inf(1)
			}
			stretch = now.End
			// Bringing a body onto its surface moves it by gapTol at most.
			slack := 1e-8*(1+r3.Norm2(s.Vel)) + gapTol*j.spin*j.spin*r3.Norm(s.Pos)
			if e > last+slack {
				j.fault("phase %d %v, %.9g s: energy grows by %.3g J/kg", i, p.Kind, time, e-last)
			}
			last = e
			j.place(i, p, time, s)
		}
		if p.Kind == Slide || p.Kind == Roll {
			j.push(i, p)
		}
		if p.Kind == Rest && p.T1 > p.T0 {
			j.hold(i, p)
		}
	}
	return j.faults
}

// looksOf gives times on a phase: the ends of its steps, and between.
func looksOf(p *Phase) []float64 {
	out := []float64{p.T0}
	if len(p.steps) == 0 && p.T1 > p.T0 {
		out = append(out, (p.T0+p.T1)/2, p.T1)
	}
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
	if most := joinTol; off > most && j.t.Body.Diameter > 0 || off > moveTol {
		j.fault("%v to %v at %.9g s: place jumps by %.3g m", p.Kind, q.Kind, q.T0, off)
	}
}

// place judges where a body is and what its surroundings do to it.
func (j *judge) place(i int, p *Phase, time float64, s frame.State) {
	gap := j.m.Interior.Dist(s.Pos) - j.wide()
	if gap < -gapTol*1.01 {
		j.fault("phase %d %v, %.9g s: %.3g m within %q", i, p.Kind, time, -gap, j.m.Interior.Surface(j.m.Interior.Contact(s.Pos).Surface).Name)
	}
	if p.Kind == Free {
		return
	}
	if gap > gapTol*1.01 {
		j.fault("phase %d %v, %.9g s: %.3g m off every surface", i, p.Kind, time, gap)
	}
}

// push judges what surfaces do to a body along a phase: at the start of each
// step, where the dense output's derivative is that of the equations.
func (j *judge) push(i int, p *Phase) {
	for k := range p.steps {
		var y, dy [dims]float64
		step := &p.steps[k]
		step.At(step.T0, y[:])
		step.Rate(step.T0, dy[:])
		j.pushAt(i, p, p.T0+step.T0, frame.State{Pos: r3.Add(p.base.Pos, vec(y[:])), Vel: vec(y[3:])}, vec(dy[3:]), vec(y[6:]))
	}
}

// hold judges what surfaces do to a body at rest while the turning changes.
func (j *judge) hold(i int, p *Phase) {
	const looks = 40
	for k := 0.0; k < looks; k++ {
		j.pushAt(i, p, p.T0+(p.T1-p.T0)*k/looks, p.base, r3.Vec{}, r3.Vec{})
	}
}

const (
	// forceTol is what a force by mass may be off by, as a share of the
	// accelerations at hand: the difference of two of them, along a normal that
	// is good to the gap's tolerance over a metre.
	forceTol = 1e-7
	// edgeTol is the same on an edge, about which the normal turns a thousand
	// times as fast; sharp is the curvature, 1/m, from which on it is one.
	edgeTol = 1e-4
	sharp   = 3
)

// between says whether more than one solid is near, such as at a seam: which
// of them touches is a matter of the gap's tolerance.
func (j *judge) between(p r3.Vec) bool {
	near := 0
	for _, piece := range j.m.Interior.Pieces() {
		if piece.Solid.Dist(p) < j.wide()+10*gapTol {
			near++
		}
	}
	return near > 1
}

// onEdge says whether a body slides over an edge.
func (j *judge) onEdge(s frame.State, c geom.Patch) bool {
	const way = 1e-6
	step := r3.Scale(way/math.Max(r3.Norm(s.Vel), way), s.Vel)
	fore, aft := j.m.Interior.ContactOn(r3.Add(s.Pos, step), c), j.m.Interior.ContactOn(r3.Sub(s.Pos, step), c)
	return r3.Norm(r3.Sub(fore.Normal, aft.Normal)) > 2*way*sharp
}

func (j *judge) pushAt(i int, p *Phase, time float64, s frame.State, acc, spin r3.Vec) {
	a := j.m.Motion.At(j.t.Begin + time)
	pull := r3.Add(a.Apparent(s).Sum(), a.In(j.forces.Accel(j.t.Begin+time, a.ToInertial(s))))
	by := r3.Sub(acc, pull) // what the surfaces do
	touches := j.m.Interior.Touching(s.Pos, j.wide()+gapTol, nil)
	if len(touches) != 1 || j.between(s.Pos) {
		return // more unknowns than this can tell
	}
	j.pushes++
	n := touches[0].Normal
	normal := r3.Dot(by, n)
	rub := r3.Sub(by, r3.Scale(normal, n))
	tol := forceTol
	if j.onEdge(s, touches[0].Patch) {
		tol = edgeTol
	}
	tol *= 1 + r3.Norm(pull) + r3.Norm(by)
	if normal < -tol {
		j.fault("phase %d %v, %.9g s: pulled with %.3g m/s^2 by %q", i, p.Kind, time, -normal, p.Surface)
	}
	mu := j.t.Body.Friction
	if own := j.m.Interior.Surface(touches[0].Surface).Friction; !math.IsNaN(own) {
		mu = own
	}
	if over := r3.Norm(rub) - mu*math.Max(0, normal); over > tol {
		j.fault("phase %d %v, %.9g s: friction %.3g m/s^2 beyond mu N = %.3g", i, p.Kind, time, over, mu*normal)
	}
	u := s.Vel // of the contact point
	if j.t.Body.Rolls && j.wide() > 0 {
		u = r3.Sub(u, r3.Scale(j.wide(), r3.Cross(spin, n)))
	}
	if r3.Norm(u) > 10*creep && r3.Dot(rub, u) > tol*r3.Norm(u) {
		j.fault("phase %d %v, %.9g s: friction %v helps the slip %v", i, p.Kind, time, rub, u)
	}
}
