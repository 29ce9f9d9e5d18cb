package flight

import (
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
	f.st.Reset(0, f.zero[:])
	res, err := integrator.Solve(f.st, time, nil, nil)
	if err != nil {
		return frame.State{}, err
	}
	return depart(&base, time, res.Y), nil
}

// None says whether nothing acts on the body: it flies straight on.
func (f *Forces) None() bool { return f.drag.None() && len(f.fields) == 0 }
