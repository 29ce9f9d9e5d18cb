package crew

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// local gives the directions of the deck where the feet are.
func (b *builder) local() frame.Local {
	if b.plan.Flat != nil {
		return b.plan.Flat.Local()
	}
	return frame.LocalAt(b.at.phi)
}

// onFlat gives place and height (m) of the feet on the flat floor.
func (b *builder) onFlat() (spinward, axial, height float64) {
	return b.plan.Flat.Place(frame.Polar{R: b.at.r, Phi: b.at.phi, Z: b.at.z}.Vec())
}

// cross lets the person walk across a flat floor, straight to a place on it.
func (b *builder) cross(key string, l *leg) {
	f := b.plan.Flat
	s, a, h := b.onFlat()
	if math.Abs(h) > levelSlack {
		b.fault(key, "no floor underfoot: the feet are %.4g m above it", h)
		return
	}
	if l.spec.Laps != 0 {
		b.fault(key, "a flat floor has no laps")
		return
	}
	toS, toA := s, a
	if l.spec.Spinward != nil {
		toS = f.Along(*l.spec.Spinward)
	}
	if l.spec.Axial != nil {
		toA = *l.spec.Axial
	}
	if math.Abs(toS) > f.Size[0]/2 || math.Abs(toA) > f.Size[1]/2 {
		b.fault(key, "leads off %q, which is %.4g m by %.4g m", f.Name, f.Size[0], f.Size[1])
		return
	}
	b.straight(key, l, f.Local().Vec(toS-s, toA-a, 0))
}

// straight lets the feet go a straight way (m, habitat components).
func (b *builder) straight(key string, l *leg, way r3.Vec) {
	long := r3.Norm(way)
	b.follow(key, l, line{from: b.at, way: r3.Scale(1/math.Max(long, math.SmallestNonzeroFloat64), way), long: long})
}

// rideFlat moves the person in a lift, along the floor's normal or along the
// floor.
func (b *builder) rideFlat(key string, l *leg) {
	way := r3.Scale(l.spec.Up, b.plan.Flat.Local().Up)
	if l.spec.Round != nil {
		way = r3.Scale(b.plan.Flat.Along(*l.spec.Round), b.plan.Flat.Local().Spinward)
	}
	b.straight(key, l, way)
	b.arrive(key)
}

// arriveFlat checks the end of a climb or a ride over a flat floor.
func (b *builder) arriveFlat(key string) {
	if _, _, h := b.onFlat(); h < -levelSlack {
		b.fault(key, "leads below the floor")
	} else if h >= b.plan.Flat.Radius {
		b.fault(key, "leads to the axis or beyond")
	}
}

// Place gives arc or straight length on the deck or flat floor of the path's
// start, axial place and height above it, of feet; all in m.
func (p *Plan) Place(m *model.Model, f *Feet) (spinward, axial, height float64) {
	if p.Flat != nil {
		return p.Flat.Place(frame.Polar{R: f.R, Phi: f.Phi, Z: f.Z}.Vec())
	}
	deck := m.Decks[p.Deck].Radius
	return deck * f.Phi, f.Z, deck - f.R
}
