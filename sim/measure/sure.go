package measure

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/flight"
	"offplumb/sim/model"
)

// Numerical is how far the computation of a landing may be off: bounds, of
// estimates, not of what the models leave out. NaN: none is known.
type Numerical struct {
	Place float64 // m, of the place and of the offsets
	Time  float64 // s
	Speed float64 // m/s, of the velocity relative to the surface, and of its part along the normal
	// Unsure says what the looser computation touched instead, where the two do
	// not agree on what is touched; "": they agree.
	Unsure string
}

// unknown is the error of what has no estimate.
func unknown() Numerical { return Numerical{Place: math.NaN(), Time: math.NaN(), Speed: math.NaN()} }

// errorKey names the columns of the numerical error.
const errorKey = "error"

const (
	epsilon = 0x1p-52
	// roundings is how many roundings of the largest term a place or a velocity
	// is taken to be off by: some eight operations each on the way into the
	// inertial frame, along the flight and back.
	roundings = 32
	// lookRoundings is to how many roundings of (its time + its step) a contact is
	// located: a hundred, of a step that ends at up to 19 times the flight's
	// time, since steps grow tenfold at most. firstStep, in s, is the first one
	// where nothing acts.
	lookRoundings = 2000
	firstStep     = 1e-6
)

// Rounding is the numerical error of the landing of a flight without forces,
// and the least one of any: what roundings do to the place, and through the
// speed at which the gap closes, to the time of the touch,
//
//	dq = 32 eps (|q0| + |v0| T + |q| (1 + |omega| (t0 + T)))
//	dT = 2000 eps (T + 1 us) + min(dq/|vn|, T)
//
// with the inertial start q0, v0 at t0 and the landing q after T; then dq + |v|
// dT is the error of the place, and (2 |omega| |v| + (omega^2 + |alpha|) |q|) dT
// that of the velocity, with roundings.
func Rounding(m *model.Model, t *flight.Track, l *Landing) Numerical {
	return off(m, t, l, 0, 0)
}

// off is what roundings, and errors dq (m) and dv (m/s) beside them, do to a
// landing.
func off(m *model.Model, t *flight.Track, l *Landing, dq, dv float64) Numerical {
	hit := t.Landing()
	if hit == nil {
		return unknown()
	}
	omega, alpha := m.Motion.Bounds(t.Begin, t.Begin+hit.Time)
	q, u := r3.Norm(hit.State.Pos), r3.Norm(hit.State.Vel)
	turned := omega * (math.Abs(t.Begin) + hit.Time)
	rough := roundings * epsilon
	dq += rough * (r3.Norm(t.First.Pos) + r3.Norm(t.First.Vel)*hit.Time + q*(1+turned))
	dt := 0.0
	if hit.Time > 0 {
		dt = lookRoundings*epsilon*(hit.Time+firstStep) + math.Min(dq/l.NormalSpeed, hit.Time)
	}
	return Numerical{Place: wider(m, t, l) * (dq + u*dt), Time: dt,
		Speed: dv + omega*dq + rough*(r3.Norm(t.First.Vel)+(u+omega*q)*(1+turned)) + (2*omega*u+(omega*omega+alpha)*q)*dt}
}

// wider is by how much longer a way along the ground beneath the release is
// than the way at the landing plumb above it, at least 1.
func wider(m *model.Model, t *flight.Track, l *Landing) float64 {
	g := GroundOf(m, t)
	foot := g.Foot(l.Place.Phi)
	return math.Max(1, foot*foot/(g.Radius*l.Place.R))
}

// Safety is what the difference of a landing from the one at tolerances that
// are a hundred times as loose is multiplied by. The difference is about the
// error of the looser one, so the error proper, in proportion to the tolerances,
// is some hundredth of it: ten times that is taken. A test tries it at tolerances
// from 1e-5 to 1e-10.
const Safety = 0.1

// Between is the numerical error of a landing by the same release flown at
// looser tolerances: the difference of the two, roundings, and what the
// tolerances allow a single step, so that two flights of the same few steps do
// not pass for exact.
func Between(m *model.Model, fine, rough *flight.Track, l *Landing) Numerical {
	a := fine.Landing()
	if a == nil {
		return unknown()
	}
	b := counterpart(rough, a.Surface)
	if b == nil || a.Surface != b.Surface {
		out := unknown()
		if out.Unsure = nothing; b != nil {
			out.Unsure = b.Surface
		}
		return out
	}
	out := allowed(m, fine, l)
	dv := r3.Norm(r3.Sub(a.State.Vel, b.State.Vel))
	dn := r3.Norm(r3.Sub(a.Contact.Normal, b.Contact.Normal))
	// The three are off together, and each difference may vanish by accident.
	way, time := r3.Norm(r3.Sub(a.State.Pos, b.State.Pos)), math.Abs(a.Time-b.Time)
	if l.Speed > 0 {
		way, time = math.Max(way, l.Speed*time), math.Max(time, way/l.Speed)
	}
	out.Place += Safety * wider(m, fine, l) * way
	out.Time += Safety * time
	out.Speed += Safety * (dv + l.Speed*dn)
	return out
}

// counterpart is the first touch of a looser flight that counts beside a landing
// on a surface: what slides off an edge at loose tolerances may touch what it
// has slid on once more, and go on. It is nil where there is none.
func counterpart(rough *flight.Track, surface string) *flight.Impact {
	for i := range rough.Impacts {
		b := &rough.Impacts[i]
		if b.Surface == surface || !slidOn(rough, b.Surface, b.Time) {
			return b
		}
	}
	return nil
}

// slidOn says whether a body has slid or rolled on a surface before a time, s.
func slidOn(t *flight.Track, surface string, time float64) bool {
	for i := range t.Phases {
		if p := &t.Phases[i]; p.Kind != flight.Free && p.T0 < time && p.Surface == surface {
			return true
		}
	}
	return false
}

// allowed is the numerical error of a landing by what the tolerances allow a
// step that ends with it: shares of the departure from uniform motion.
func allowed(m *model.Model, t *flight.Track, l *Landing) Numerical {
	hit := t.Landing()
	a := m.Motion.At(t.Begin + hit.Time)
	end := a.ToInertial(hit.State)
	s := &m.Solver
	way := r3.Norm(r3.Sub(end.Pos, r3.Add(t.First.Pos, r3.Scale(hit.Time, t.First.Vel))))
	return off(m, t, l, s.RelTol*way+s.PosTol, s.RelTol*r3.Norm(r3.Sub(end.Vel, t.First.Vel))+s.VelTol)
}

// nothing is touched.
const nothing = "nothing"

// errorOf is the numerical error of a column of a landing, SI: that of place,
// time or speed, carried on to what is made of them. It is 0 for what is
// given.
func (l *Landing) errorOf(key string, u unit) float64 {
	e := &l.Error
	switch key {
	case "offset", "deflection", "offset_axial", "deflection_axial", "axial", "height":
		return e.Place
	case "spinward":
		if u == degree {
			return e.Place / l.Place.R
		}
		return e.Place
	case "time":
		return e.Time
	case "speed", "normal_speed":
		return e.Speed
	case "incidence":
		return math.Min(e.Speed/l.Speed, math.Pi/2)
	case "energy":
		return energyError(l.Energy, l.Speed, e.Speed)
	case "normal_energy":
		return energyError(l.NormalEnergy, l.NormalSpeed, e.Speed)
	}
	return 0
}

// energyError is the error of an energy (J) at a speed with an error (m/s).
func energyError(energy, speed, off float64) float64 {
	if speed == 0 {
		return 0
	}
	return energy * (2 + off/speed) * off / speed
}

// OfError says whether a pick takes the numerical error of a landing.
func (p Pick) OfError() bool { return p.table == "landings" && p.key == errorKey }
