package crew

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// weightless is the share of the weight at rest below which there is none:
// friction demand and tilt then have no value. A billionth lies far above the
// roundings of the sum (1e-15) and below anything a person can feel.
const weightless = 1e-9

// Loads are what a person feels and exerts at one instant. Forces are those
// of the person on the structure.
type Loads struct {
	Time float64 // s from the start of the path
	Feet Feet

	GravityFeet, GravityWaist, GravityHead float64 // m/s^2
	TiltSpinward, TiltAxial                float64 // rad, where a plumb bob at the waist hangs; NaN: no weight
	Weight                                 float64 // N, along the deck's normal, at the waist
	SideSpinward, SideAxial                float64 // N
	FrictionDemand                         float64 // side by weight; NaN where there is no weight
	HeadCross                              float64 // rad/s^2, |omega x rate of the head|
}

// Loads works out the loads at a time (s from the start of the path).
func (p *Plan) Loads(m *model.Model, t float64) Loads {
	a := m.Motion.At(p.Path.Time + t)
	f := p.At(t)
	out := Loads{Time: t, Feet: f}
	out.GravityFeet = r3.Norm(p.felt(&a, &f, 0))
	out.GravityHead = r3.Norm(p.felt(&a, &f, p.Crew.Head))
	waist := p.felt(&a, &f, p.Crew.Waist)
	out.GravityWaist = r3.Norm(waist)
	out.stand(waist, p.Crew.Mass, a.Omega, f)
	out.HeadCross = r3.Norm(r3.Cross(a.In(a.Omega), f.HeadTurn))
	return out
}

// felt is the apparent gravity at a share of the stature, m/s^2.
func (p *Plan) felt(a *frame.Attitude, f *Feet, share float64) r3.Vec {
	return r3.Scale(-1, Support(a, f.Body(share*p.Crew.Stature)))
}

// stand splits the apparent gravity at the waist along the deck's directions.
func (l *Loads) stand(gravity r3.Vec, mass float64, omega r3.Vec, f Feet) {
	spinward, axial, up := frame.LocalAt(f.Phi).Split(gravity)
	l.Weight, l.SideSpinward, l.SideAxial = -mass*up, mass*spinward, mass*axial
	l.FrictionDemand, l.TiltSpinward, l.TiltAxial = math.NaN(), math.NaN(), math.NaN()
	w := r3.Norm(omega)
	floor := weightless * w * w * math.Abs(f.R)
	if r3.Norm(gravity) > floor {
		l.TiltSpinward, l.TiltAxial = math.Atan2(spinward, -up), math.Atan2(axial, -up)
	}
	if -up > floor {
		l.FrictionDemand = math.Hypot(spinward, axial) / -up
	}
}
