package study

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/crew"
	"offplumb/sim/flight"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// aim finds the throws at one target. It serves one goroutine.
//
// In vacuum the throw that arrives after a time t flies a straight line, in the
// inertial frame, to where the target is then: its velocity is the way over the
// time. In air that is the first guess, and Newton's method on free flights,
// without the interior, finds the velocity. Over t the speed of the throw is
// one curve, and what is asked for is where the curve has a value, or is lowest.
type aim struct {
	m       *model.Model
	flier   *flight.Flier
	let     flight.Let // place, body and time; the velocity changes
	target  func(t float64) frame.State
	moving  bool
	finest  float64 // s, of the motion of the target; 0: it stands
	fastest float64 // m/s, bound on the target's speed relative to the habitat
	longest float64 // s

	drag    bool     // something acts on it in flight
	most    float64  // m/s, beyond which throws are not looked for
	scale   float64  // m, of the places
	size    float64  // m, of the throw, wherever in a large habitat it is
	flights int      // of the solution under way
	last    velocity // solved last
}

// velocity is a solution: the throw that takes a time, m/s in habitat
// components.
type velocity struct {
	time float64
	v    r3.Vec
	jac  mat3 // derivative of the place reached, m per m/s
	ok   bool
}

// solverTolerance bounds the relative tolerance of the flights that the
// solution rests on: rougher ones would make it rougher than the Newton steps
// need.
const solverTolerance = 1e-10

// newAim prepares a throw study for one of its targets; place is that of a
// target that stands.
func (p *Prepared) newAim(t *model.ThrowTo, place model.Place) (*aim, error) {
	fine := *p.Model
	fine.Solver.RelTol = math.Min(fine.Solver.RelTol, solverTolerance)
	from, err := fine.Resolve(t.From)
	if err != nil {
		return nil, err
	}
	a := &aim{m: &fine, flier: flight.NewFlier(&fine), longest: fine.LongestThrow(t)}
	a.let = flight.Let{Release: &model.Release{Name: t.Name, Body: t.Body, At: t.From, Time: t.Leaves},
		Body: fine.BodyNamed(t.Body), Place: from, Begin: t.Leaves, Local: frame.State{Pos: from.Vec()}}
	a.drag = !flight.NewForces(&fine, a.let.Body, nil).None()
	if t.Target.Path == "" {
		still := frame.State{Pos: place.Vec()}
		a.target = func(float64) frame.State { return still }
	} else {
		a.follow(p.planOf(t.Target.Path), t)
	}
	a.scale = math.Max(1, math.Max(r3.Norm(a.let.Local.Pos), r3.Norm(a.target(0).Pos)))
	a.size = math.Min(a.scale, sizes*math.Max(1, r3.Norm(r3.Sub(a.target(0).Pos, a.let.Local.Pos))))
	return a, nil
}

// sizes is how many times as far as its target a throw may go and still be
// solved as well as others.
const sizes = 10

// rounding is what the numbers of a place leave of it, m, a few times over.
func (a *aim) rounding() float64 { return 16 * epsilon * a.scale }

const epsilon = 2.220446049250313e-16

func (p *Prepared) planOf(path string) *crew.Plan {
	for i := range p.Plans {
		if p.Plans[i].Path.Name == path {
			return p.Plans[i]
		}
	}
	return nil
}

// follow makes the target a point of a person on a path, who stands at its
// ends before and after it.
func (a *aim) follow(plan *crew.Plan, t *model.ThrowTo) {
	a.moving = true
	start, end := plan.Path.Time-t.Leaves, plan.Path.Time+plan.Duration()-t.Leaves
	a.target = func(time float64) frame.State {
		f := plan.At(math.Min(math.Max(time-start, 0), plan.Duration()))
		out := f.Point(t.Target.Reach).State
		if time < start || time > end {
			out.Vel = r3.Vec{}
		}
		return out
	}
	a.finest = personStep
	for u := 0.0; ; u += personStep {
		f := plan.At(math.Min(u, plan.Duration()))
		a.fastest = math.Max(a.fastest, 1.1*r3.Norm(f.Point(t.Target.Reach).Vel))
		if u > plan.Duration() {
			break
		}
	}
}

// personStep is the time, s, between flight times looked at while a person
// moves: a ramp of the speed takes several.
const personStep = 0.05

// vacuum is the throw that takes a time t (s) in vacuum: exact, under ambient
// gravity too if that is uniform.
func (a *aim) vacuum(t float64) r3.Vec {
	from, to := a.m.Motion.At(a.let.Begin), a.m.Motion.At(a.let.Begin+t)
	start := from.Out(a.let.Local.Pos)
	way := r3.Sub(to.Out(a.target(t).Pos), start)
	fall := r3.Vec{}
	if !a.m.Ambient.None() {
		fall = r3.Scale(t/2, a.m.Ambient.Accel(0, frame.State{Pos: start}))
	}
	return from.In(r3.Sub(r3.Sub(r3.Scale(1/t, way), fall), r3.Cross(from.Omega, start)))
}

// speed is the speed of the throw that takes a time t (s); see [sample].
func (a *aim) speed(t float64) float64 {
	if !a.drag {
		return r3.Norm(a.vacuum(t))
	}
	s := a.solve(t)
	if !s.ok {
		return math.Inf(1)
	}
	return r3.Norm(s.v)
}

// velocity is the throw that takes a time t (s), m/s in habitat components.
func (a *aim) velocity(t float64) (r3.Vec, bool) {
	if !a.drag {
		return a.vacuum(t), true
	}
	s := a.solve(t)
	return s.v, s.ok
}

// throw is the release with a velocity (m/s, habitat components).
func (a *aim) throw(v r3.Vec) *flight.Let {
	a.let.Local.Vel = v
	return &a.let
}

// off is how far a throw is off the target after a time (s): inertial
// components, m.
func (a *aim) off(v r3.Vec, t float64) (r3.Vec, bool) {
	a.flights++
	s, err := a.flier.Coast(a.throw(v), t)
	if err != nil {
		return r3.Vec{}, false
	}
	at := a.m.Motion.At(a.let.Begin + t)
	d := r3.Sub(s.Pos, at.Out(a.target(t).Pos))
	return d, !math.IsNaN(d.X + d.Y + d.Z)
}

const (
	// closeEnough is how near, as a share of the size of the throw, a flight must
	// come to the target to be a solution: what the flights' own errors let
	// Newton's method come to. It goes on to nearEnough where they are less.
	closeEnough = 1e-9
	nearEnough  = 1e-12
	// tooFast is how many times the speed given, or that of the slowest throw in
	// vacuum, is beyond all that is asked for: such throws are not looked for.
	tooFast = 10
	// mostFlights bounds the flights that one solution may take.
	mostFlights = 100
)

// solve finds the throw that takes a time t (s) in air: from the one found
// last, or from that in vacuum.
func (a *aim) solve(t float64) velocity {
	if r3.Norm(a.vacuum(t)) > a.most {
		return velocity{time: t}
	}
	if a.last.ok && math.Abs(t-a.last.time) < 0.2*a.last.time {
		// Over small changes of the time, the velocity in vacuum tells how it grows.
		guess := r3.Add(a.last.v, r3.Sub(a.vacuum(t), a.vacuum(a.last.time)))
		jac := a.last.jac.scaled(t / a.last.time)
		if s := a.newton(t, guess, &jac); s.ok {
			a.last = s
			return s
		}
	}
	s := a.newton(t, a.vacuum(t), nil)
	if s.ok {
		a.last = s
	}
	return s
}

// newton is Newton's method with Broyden's update of the derivative (Broyden
// 1965; from memory), which is taken anew where a step gains nothing, and with
// steps halved until they gain.
func (a *aim) newton(t float64, v r3.Vec, jac *mat3) velocity {
	const most = 60
	a.flights = 0
	d, ok := a.off(v, t)
	var j mat3
	fresh := false
	if jac != nil {
		j = *jac
	} else if ok {
		j, ok = a.slopes(v, t)
		fresh = true
	}
	for i := 0; ok && i < most; i++ {
		if r3.Norm(d) <= nearEnough*a.size+a.rounding() {
			break
		}
		step := r3.Scale(-1, j.solve(d))
		next, miss, gained := a.halved(v, d, step, t)
		if !gained && fresh {
			break
		}
		if !gained {
			j, ok = a.slopes(v, t)
			fresh = true
			continue
		}
		j.update(r3.Sub(next, v), r3.Sub(miss, d))
		fresh = false
		v, d = next, miss
		if r3.Norm(v) > a.most || a.flights > mostFlights {
			break
		}
	}
	return velocity{t, v, j, ok && r3.Norm(d) <= closeEnough*a.size+a.rounding() && r3.Norm(v) <= a.most}
}

// halved takes a step, or as much of it as gains.
func (a *aim) halved(v, d, step r3.Vec, t float64) (next, miss r3.Vec, gained bool) {
	const most = 12
	for range most {
		next = r3.Add(v, step)
		if r3.Norm(next) > 2*a.most {
			return next, d, true // too fast
		}
		if miss, ok := a.off(next, t); ok && r3.Norm(miss) < 0.9*r3.Norm(d) {
			return next, miss, true
		}
		step = r3.Scale(0.5, step)
	}
	return next, miss, false
}

// slopes is the derivative of the place reached by the velocity, by central
// differences.
func (a *aim) slopes(v r3.Vec, t float64) (j mat3, ok bool) {
	h := slopeStep * math.Max(r3.Norm(v), a.size/t*1e-3)
	for k, e := range [3]r3.Vec{{X: h}, {Y: h}, {Z: h}} {
		p, ok1 := a.off(r3.Add(v, e), t)
		q, ok2 := a.off(r3.Sub(v, e), t)
		if !ok1 || !ok2 {
			return j, false
		}
		j[k] = r3.Scale(1/(2*h), r3.Sub(p, q))
	}
	return j, true
}

// slopeStep is the step of differences, as a share of the speed: the square of
// it is the error of the derivative, and the error of the flights over it.
const slopeStep = 1e-4

// mat3 is a matrix by its columns.
type mat3 [3]r3.Vec

func (j mat3) scaled(by float64) mat3 {
	for k := range j {
		j[k] = r3.Scale(by, j[k])
	}
	return j
}

// solve gives the x of j x = d, by Cramer's rule; of infinite components where
// there is none.
func (j *mat3) solve(d r3.Vec) r3.Vec {
	det := r3.Dot(j[0], r3.Cross(j[1], j[2]))
	return r3.Scale(1/det, r3.Vec{X: r3.Dot(d, r3.Cross(j[1], j[2])), Y: r3.Dot(j[0], r3.Cross(d, j[2])), Z: r3.Dot(j[0], r3.Cross(j[1], d))})
}

// update makes the matrix take a step to the change seen, and leaves it as it
// is across.
func (j *mat3) update(step, change r3.Vec) {
	n := r3.Norm2(step)
	if n == 0 {
		return
	}
	told := r3.Add(r3.Add(r3.Scale(step.X, j[0]), r3.Scale(step.Y, j[1])), r3.Scale(step.Z, j[2]))
	wrong := r3.Scale(1/n, r3.Sub(change, told))
	for k, s := range [3]float64{step.X, step.Y, step.Z} {
		j[k] = r3.Add(j[k], r3.Scale(s, wrong))
	}
}
