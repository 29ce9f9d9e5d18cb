package flight

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/integrator"
	"offplumb/sim/frame"
)

// Coast gives the inertial state of a release a time (s) after it, as if there
// were no interior. Without forces it is exact. It fails with an
// [integrator.StepError] where the motion cannot be computed.
func (f *Flier) Coast(let *Let, time float64) (frame.State, error) {
	if err := f.steppers(); err != nil {
		return frame.State{}, err
	}
	a := f.m.Motion.At(let.Begin)
	base := a.ToInertial(let.Local)
	f.free.base, f.free.begin = base, let.Begin
	f.free.forces.set(f.m, let.Body, f.setup.Law, f.setup.Fields)
	if f.free.forces.None() {
		return depart(&base, time, f.zero[:]), nil
	}
	if q := quickOf(f.m, &f.free.forces, let.Body); q.Drifts() && !f.setup.Full && time > settleTimes*q.Relaxation {
		return f.coastDrifting(q, time)
	}
	f.st.Reset(0, f.zero[:])
	res, err := integrator.Solve(f.st, time, nil, nil)
	if err != nil {
		return frame.State{}, err
	}
	return depart(&base, time, res.Y), nil
}

// coastDrifting is Coast of dust, which drifts once its start has died out.
func (f *Flier) coastDrifting(q Quick, time float64) (frame.State, error) {
	f.st.Reset(0, f.zero[:])
	from := settleTimes * q.Relaxation
	res, err := integrator.Solve(f.st, from, nil, nil)
	if err != nil {
		return frame.State{}, err
	}
	begin := f.free.begin + from
	start := frame.Seen(f.m.Motion, begin, depart(&f.free.base, from, res.Y))
	d := &drift{f: &f.free.forces, step: fieldShare * q.Pace, begin: begin, first: math.Inf(-1), last: math.Inf(1), origin: start.Pos}
	st, err := d.stepper(f.m.Solver)
	if err != nil {
		return frame.State{}, err
	}
	st.Reset(0, f.zero[:3])
	if res, err = integrator.Solve(st, time-from, nil, nil); err != nil {
		return frame.State{}, err
	}
	local := frame.State{Pos: r3.Add(d.origin, vec(res.Y))}
	local.Vel = d.velocity(res.T, local.Pos)
	a := f.m.Motion.At(begin + res.T)
	return a.ToInertial(local), nil
}

// None says whether nothing acts on the body: it flies straight on.
func (f *Forces) None() bool { return f.drag.None() && len(f.fields) == 0 }
