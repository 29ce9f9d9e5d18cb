package measure

import (
	"math"

	"offplumb/sim/flight"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// Uniform is the uniform-gravity path: the same release under uniform gravity
// of the strength at rest on the deck beneath it, over a flat deck, without
// air: the part along the plumb line, at the time of the release; on a flat floor it pulls along the plumb line. Its frame is local to the plumb line: x spinward and y axial from the
// release, h above the deck.
type Uniform struct {
	Gravity                float64 // m/s^2
	Height                 float64 // m, of the centre at the release
	VSpinward, VAxial, VUp float64 // m/s, relative to the habitat
	Lands                  bool    // it comes down
	Time                   float64 // s
	Offset, OffsetAxial    float64 // m
	Speed                  float64 // m/s
}

// UniformGravity works out the uniform-gravity path of a track's release: the
// parabola of the schoolbooks, until the body's surface meets the deck.
func UniformGravity(m *model.Model, t *flight.Track) Uniform {
	g := GroundOf(m, t)
	foot := g.Foot(t.Start.Phi)
	at := frame.Polar{R: foot, Phi: t.Start.Phi, Z: t.Start.Z}
	u := Uniform{Gravity: math.Max(0, m.GravityAt(t.Begin, at)), Height: foot - t.Start.R}
	u.VSpinward, u.VAxial, u.VUp = frame.LocalAt(t.Start.Phi).Split(t.Local.Vel)
	drop := math.Max(0, u.Height-t.Body.Diameter/2)
	if u.Gravity == 0 || m.IsOutside(t.Local.Pos) {
		return u
	}
	u.Lands = true
	u.Time = (u.VUp + math.Sqrt(u.VUp*u.VUp+2*u.Gravity*drop)) / u.Gravity
	u.Offset, u.OffsetAxial = u.VSpinward*u.Time, u.VAxial*u.Time
	u.Speed = math.Hypot(math.Hypot(u.VSpinward, u.VAxial), u.VUp-u.Gravity*u.Time)
	return u
}

// At gives the place on the path, m from the plumb line at the release
// (spinward, axial) and above the deck, at a time (s).
func (u *Uniform) At(time float64) (spinward, axial, height float64) {
	return u.VSpinward * time, u.VAxial * time, u.Height + u.VUp*time - u.Gravity*time*time/2
}

// Top is the greatest height that the path reaches, m above the deck.
func (u *Uniform) Top() float64 {
	if u.VUp <= 0 || u.Gravity == 0 {
		return u.Height
	}
	return u.Height + u.VUp*u.VUp/(2*u.Gravity)
}
