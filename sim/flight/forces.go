package flight

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/air"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// Field is an ambient acceleration, beside drag.
type Field interface {
	// Accel gives the acceleration (m/s^2, inertial components) of a body at an
	// inertial state, at habitat time t (s).
	Accel(t float64, s frame.State) r3.Vec
}

// Forces are what acts on one body in flight: drag relative to the air, which
// turns with the habitat like a solid, and ambient fields.
type Forces struct {
	motion  frame.Motion
	steady  bool    // the spin is, and is spin (rad/s) about the axis
	spin    float64 // so that it need not be asked for at each derivative
	plain   bool    // drag in a steady spin is all there is
	drag    air.Drag
	perMass float64 // 1/kg
	fields  []Field
	calm    bool    // the body is outside, where there is no air
	around  *around // nil: the air turns like a solid, is the same everywhere and only drags
}

// NewForces gives the forces on a body: drag, the model's ambient gravity and
// further fields. A nil law is the program's own for spheres, or the body's own
// drag coefficient.
func NewForces(m *model.Model, b model.Body, law air.Law, fields ...Field) *Forces {
	f := &Forces{}
	f.set(m, b, law, fields)
	return f
}

// set makes f the forces on a body.
func (f *Forces) set(m *model.Model, b model.Body, law air.Law, fields []Field) {
	if !m.Ambient.None() {
		fields = append([]Field{m.Ambient}, fields...)
	}
	*f = Forces{motion: m.Motion, fields: fields}
	if w, ok := m.Motion.(frame.Steady); ok {
		f.steady, f.spin = true, w.Spin
	}
	if b.Mass <= 0 {
		return
	}
	if law == nil && b.DragCoefficient > 0 {
		law = air.Constant(b.DragCoefficient)
	}
	area := b.DragArea
	if area == 0 {
		area = air.SphereArea(b.Diameter)
	}
	// The Reynolds number is that of the disc of the same area.
	f.drag = air.NewDrag(m.Air, law, math.Sqrt(4*area/math.Pi), area)
	f.perMass = 1 / b.Mass
	f.around = newAround(m, b, f)
	f.ease(false)
}

// ease lets drag act, or not: the body is outside, in calm.
func (f *Forces) ease(calm bool) {
	f.calm = calm
	f.plain = f.steady && len(f.fields) == 0 && !f.drag.None() && !calm && f.around == nil
}

// Drag gives the acceleration by drag, m/s^2 in inertial components, at an
// inertial state and habitat time t (s). Air at rest in the habitat moves with
// omega x r.
func (f *Forces) Drag(t float64, s frame.State) r3.Vec {
	if f.calm || f.drag.None() {
		return r3.Vec{}
	}
	if f.around != nil {
		h := f.around.at(f, t, s.Pos)
		return h.drag(f, s.Vel)
	}
	rel := f.relative(t, s)
	return r3.Scale(-f.perMass*f.drag.PerVelocity2(r3.Norm2(rel)), rel)
}

// relative is the velocity relative to the air, m/s.
func (f *Forces) relative(t float64, s frame.State) r3.Vec {
	if f.around != nil {
		h := f.around.at(f, t, s.Pos)
		return r3.Sub(s.Vel, h.wind)
	}
	if f.steady {
		return r3.Vec{X: s.Vel.X + f.spin*s.Pos.Y, Y: s.Vel.Y - f.spin*s.Pos.X, Z: s.Vel.Z}
	}
	return r3.Sub(s.Vel, r3.Cross(f.motion.Omega(t), s.Pos))
}

// Accel gives the whole acceleration, m/s^2 in inertial components.
func (f *Forces) Accel(t float64, s frame.State) r3.Vec {
	if f.around != nil && !f.calm {
		return f.around.accel(f, t, s)
	}
	a := f.Drag(t, s)
	for _, g := range f.fields {
		a = r3.Add(a, g.Accel(t, s))
	}
	return a
}
