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
// of the person, with what is carried, on the structure.
type Loads struct {
	Time float64 // s from the start of the path
	Feet Feet

	GravityFeet, GravityWaist, GravityHead float64 // m/s^2
	TiltSpinward, TiltAxial                float64 // rad, where a plumb bob at the waist hangs; NaN: no weight
	Weight                                 float64 // N, along the deck's normal, at the waist
	SideSpinward, SideAxial                float64 // N
	FrictionDemand                         float64 // side by weight; NaN where there is no weight
	HeadCross                              float64 // rad/s^2, |omega x rate of the head|

	Coriolis, Euler   float64 // m/s^2, magnitudes at the waist
	AlongLadder       float64 // N, toward the ladder's foot, on a climb; NaN elsewhere
	Pull              float64 // N, away from the ladder; negative: into it; NaN elsewhere
	GravityCarried    float64 // m/s^2, at what is carried; NaN: nothing
	ForceCarried      float64 // N, of what is carried on the person; NaN: nothing
	Power             float64 // W, of the support's force on the person: the work of a climb
	CrossSpinward     float64 // rad/s^2, the parts of omega x rate of the head
	CrossAxial        float64
	CrossUp           float64
	SpeedWaist        float64 // m/s, relative to the habitat
	GravityDifference float64 // m/s^2, of feet less head
}

// Loads works out the loads at a time (s from the start of the path).
func (p *Plan) Loads(m *model.Model, t float64) Loads {
	a := m.Motion.At(p.Path.Time + t)
	f := p.At(t)
	out := Loads{Time: t, Feet: f}
	in := feeling{m, &a, p.Path.Time + t}
	out.GravityFeet = r3.Norm(in.felt(f.Point(model.Reach{}))) // they stay where a sitting trunk sinks
	out.GravityHead = r3.Norm(in.felt(f.Body(p.Crew.Head * p.Crew.Stature)))
	out.GravityDifference = out.GravityFeet - out.GravityHead
	waist := f.Body(p.Crew.Waist * p.Crew.Stature)
	gravity := in.felt(waist)
	out.GravityWaist, out.SpeedWaist = r3.Norm(gravity), r3.Norm(waist.Vel)
	force := r3.Scale(p.Crew.Mass, gravity)
	out.Power = -r3.Dot(force, waist.Vel)
	force = r3.Add(force, out.carry(in, p.Path.Carry, &f))
	ap := a.Apparent(waist.State)
	out.Coriolis, out.Euler = r3.Norm(ap.Coriolis), r3.Norm(ap.Euler)
	out.stand(gravity, force, a.Omega, f)
	out.climb(&p.legs[f.Leg], force, &f)
	out.cross(r3.Cross(a.In(a.Omega), f.HeadTurn), f.Local())
	return out
}

// feeling is an instant at which somebody feels apparent gravity.
type feeling struct {
	m    *model.Model
	a    *frame.Attitude
	time float64 // s
}

// felt is the apparent gravity at a point, m/s^2: what the structure must give
// against, and the ambient pull.
func (in feeling) felt(p Point) r3.Vec {
	return r3.Sub(in.m.AmbientAt(in.time, p.Pos), Support(in.a, p))
}

// carry works out the load in the hands, and gives its force, N.
func (l *Loads) carry(in feeling, c model.Carry, f *Feet) r3.Vec {
	l.GravityCarried, l.ForceCarried = math.NaN(), math.NaN()
	if c.Mass == 0 {
		return r3.Vec{}
	}
	at := f.Point(c.At)
	gravity := in.felt(at)
	force := r3.Scale(c.Mass, gravity)
	l.GravityCarried, l.ForceCarried = r3.Norm(gravity), r3.Norm(force)
	l.Power -= r3.Dot(force, at.Vel)
	return force
}

// stand splits the force on the structure along the deck's directions, and
// gives the tilt of the apparent gravity at the waist.
func (l *Loads) stand(gravity, force r3.Vec, omega r3.Vec, f Feet) {
	local := f.Local()
	spinward, axial, up := local.Split(force)
	l.Weight, l.SideSpinward, l.SideAxial = -up, spinward, axial
	l.FrictionDemand, l.TiltSpinward, l.TiltAxial = math.NaN(), math.NaN(), math.NaN()
	w := r3.Norm(omega)
	floor := weightless * w * w * math.Abs(f.R)
	gs, ga, gu := local.Split(gravity)
	if r3.Norm(gravity) > floor {
		l.TiltSpinward, l.TiltAxial = math.Atan2(gs, -gu), math.Atan2(ga, -gu)
	}
	if -gu > floor && -up > 0 {
		l.FrictionDemand = math.Hypot(spinward, axial) / -up
	}
}

// climb splits the force along the ladder and across it. The ladder is in
// front of the person, who faces it.
func (l *Loads) climb(leg *leg, force r3.Vec, f *Feet) {
	l.AlongLadder, l.Pull = math.NaN(), math.NaN()
	if leg.spec.Kind != model.Climb && leg.spec.Kind != model.Descend {
		return
	}
	local := f.Local()
	rise, into := local.Up, facing(leg.spec.Facing, local)
	if c, ok := leg.course.(line); ok {
		rise, into = c.rise, c.into
	}
	l.AlongLadder, l.Pull = -r3.Dot(force, rise), -r3.Dot(force, into)
}

// facing gives the direction in which a person looks, in habitat components.
func facing(d model.Direction, l frame.Local) r3.Vec {
	switch d {
	case model.Spinward:
		return l.Spinward
	case model.Antispinward:
		return r3.Scale(-1, l.Spinward)
	case model.PlusAxial:
		return l.Axial
	}
	return r3.Scale(-1, l.Axial)
}

func (l *Loads) cross(c r3.Vec, local frame.Local) {
	l.HeadCross = r3.Norm(c)
	l.CrossSpinward, l.CrossAxial, l.CrossUp = local.Split(c)
}
