package measure

import (
	"math"
	"strings"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/flight"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// Landing is what a release did up to its first touch, or its end. Lengths in
// m, times in s, speeds in m/s, angles in rad; NaN where there is no value.
type Landing struct {
	Release, Body string
	Outcome       flight.Outcome
	Surface       string
	Time          float64
	Offset        float64 // deck offset, spinward positive
	Deflection    float64 // deck offset less that of the uniform-gravity path
	OffsetAxial   float64
	DeflAxial     float64
	Place         model.Place
	Deck          string
	Arc           float64
	Speed         float64 // of the centre relative to the surface
	NormalSpeed   float64
	Incidence     float64 // between velocity and normal, 0 head-on
	NormalEnergy  float64 // J, of the motion along the normal
	Energy        float64 // J; NaN without a mass or a touch
	Uniform       Uniform
	FellThrough   []string // openings passed before the touch
	AllThrough    []string // and after it
	Error         Numerical
}

// Land measures the landing of a track.
func Land(m *model.Model, t *flight.Track) Landing {
	nan := math.NaN()
	out := Landing{Release: t.Release.Name, Body: t.Body.Name, Outcome: t.Outcome, Time: t.End,
		Offset: nan, Deflection: nan, OffsetAxial: nan, DeflAxial: nan,
		NormalSpeed: nan, Incidence: nan, Energy: nan, NormalEnergy: nan, Error: unknown()}
	out.Uniform = UniformGravity(m, t)
	last := t.Last
	hit := t.Landing()
	out.AllThrough = FellThrough(m, t, t.End)
	if hit != nil {
		out.Outcome, out.Time, out.Surface = flight.Landed, hit.Time, hit.Surface
		if out.FellThrough = out.AllThrough; hit.Time < t.End {
			out.FellThrough = FellThrough(m, t, hit.Time)
		}
		out.strike(t.Body.Mass, hit)
		out.offsets(m, t, hit)
		out.where(m, hit.State)
		return out
	}
	if out.Outcome != flight.Lost {
		out.Outcome = flight.TimeUp
	}
	out.FellThrough = out.AllThrough
	a := m.Motion.At(t.Begin + t.End)
	local := a.ToHabitat(last)
	out.Speed = r3.Norm(local.Vel)
	out.where(m, local)
	return out
}

func (l *Landing) where(m *model.Model, s frame.State) {
	l.Place, l.Deck, l.Arc = stand(m, s.Pos)
}

// strike measures how a body arrives. The surface is at rest in the habitat.
func (l *Landing) strike(mass float64, hit *flight.Impact) {
	v := hit.State.Vel
	l.Speed = r3.Norm(v)
	l.NormalSpeed = math.Abs(r3.Dot(v, hit.Contact.Normal))
	if l.Speed > 0 {
		l.Incidence = math.Acos(math.Min(1, l.NormalSpeed/l.Speed))
	}
	l.Energy, l.NormalEnergy = energy(mass, l.Speed), energy(mass, l.NormalSpeed)
}

// energy is half m v^2, J, without spin; NaN where no mass is given.
func energy(mass, speed float64) float64 {
	if mass <= 0 {
		return math.NaN()
	}
	return mass * speed * speed / 2
}

func (l *Landing) offsets(m *model.Model, t *flight.Track, hit *flight.Impact) {
	g := GroundOf(m, t)
	l.Offset = g.Offset(GoneRound(m, t, hit.Time))
	l.OffsetAxial = hit.State.Pos.Z - t.Local.Pos.Z
	if l.Uniform.Lands {
		l.Deflection = l.Offset - l.Uniform.Offset
		l.DeflAxial = l.OffsetAxial - l.Uniform.OffsetAxial
	}
}

// angle is the place's angle from spinward zero, rad.
func (l *Landing) angle() float64 { return frame.WrapAngle(l.Place.Phi) }

// through lists the openings passed.
func (l *Landing) through() string { return strings.Join(l.AllThrough, "; ") }

// uniform is a figure of the uniform-gravity path, which has none where it
// never comes down.
func (l *Landing) uniform(x float64) float64 {
	if !l.Uniform.Lands {
		return math.NaN()
	}
	return x
}
