package measure

import (
	"math"
	"slices"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// Pulled is the apparent gravity at rest on a deck under the spin at time 0 and
// the ambient gravity together, over all that a turn makes of it. SI units.
type Pulled struct {
	Pulls       bool    // there is ambient gravity
	Least, Most float64 // m/s^2
	Tilt        float64 // rad, the greatest between a plumb bob and the deck's normal
}

const (
	// pulledLooks is at how many angles, from the one toward which the pull
	// leads, a deck is looked at. Strength has its extremes at the first and in
	// the middle, by symmetry.
	pulledLooks = 720
	// tiltCuts narrows the place of the greatest tilt by a third each.
	tiltCuts = 60
)

// pulledOn works out what is felt at a distance r from the axis, at the axial
// place z (m).
func pulledOn(m *model.Model, r, z float64) Pulled {
	out := Pulled{Pulls: !m.Ambient.None(), Least: m.Gravity(r), Most: m.Gravity(r)}
	if !out.Pulls {
		return out
	}
	first := math.Atan2(m.Ambient.Direction.Y, m.Ambient.Direction.X)
	tilt := func(phi float64) float64 {
		s, a, up := frame.LocalAt(phi).Split(m.GravityVector(0, frame.Polar{R: r, Phi: phi, Z: z}.Vec()))
		return math.Atan2(math.Hypot(s, a), -up)
	}
	const step = 2 * math.Pi / pulledLooks
	at := first
	out.Least, out.Most, out.Tilt = math.Inf(1), 0, -1
	for k := range pulledLooks {
		phi := first + float64(k)*step
		g := r3.Norm(m.GravityVector(0, frame.Polar{R: r, Phi: phi, Z: z}.Vec()))
		out.Least, out.Most = math.Min(out.Least, g), math.Max(out.Most, g)
		if x := tilt(phi); x > out.Tilt {
			out.Tilt, at = x, phi
		}
	}
	a, b := at-step, at+step
	for range tiltCuts {
		if u, v := a+(b-a)/3, b-(b-a)/3; tilt(u) < tilt(v) {
			a = u
		} else {
			b = v
		}
	}
	out.Tilt = math.Max(out.Tilt, tilt((a+b)/2))
	return out
}

// middleOf is the axial middle of a deck, m; 0 where it has no end.
func middleOf(d *model.Deck) float64 {
	if z := (d.Axial[0] + d.Axial[1]) / 2; !math.IsNaN(z) && !math.IsInf(z, 0) {
		return z
	}
	return 0
}

// unlessPulled leaves out the columns of ambient gravity where there is none.
func unlessPulled[T any](cols []column[T], pulled bool) []column[T] {
	return slices.DeleteFunc(slices.Clone(cols), func(c column[T]) bool { return !pulled && c.pulled })
}

// emptied is a figure that holds for the spin alone.
func (p *Pulled) emptied(x float64) float64 {
	if p.Pulls {
		return math.NaN()
	}
	return x
}
