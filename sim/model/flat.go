package model

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/frame"
)

// Flat is the flat floor of a cabin: a plane across the radius through its
// middle. Places on it are straight lengths from the middle, spinward and
// axial, and the height along its normal.
//
// Law: Place(Point(s, a, h)) = s, a, h to rounding.
type Flat struct {
	Name   string     // of its surface
	Radius float64    // m, of its middle
	Phi, Z float64    // rad and m, of its middle
	Size   [3]float64 // m, clear, of the cabin: spinward, axial, up
	local  frame.Local
}

// Local gives the directions of the floor: Up is its normal everywhere.
func (f *Flat) Local() frame.Local { return f.local }

// Point gives the point (m, habitat components) at a place on the floor.
func (f *Flat) Point(spinward, axial, height float64) r3.Vec {
	return r3.Add(r3.Vec{Z: f.Z}, f.local.Vec(spinward, axial, height-f.Radius))
}

// Place gives the place (m) of a point on the floor.
func (f *Flat) Place(pos r3.Vec) (spinward, axial, height float64) {
	spinward, axial, up := f.local.Split(r3.Sub(pos, r3.Vec{Z: f.Z}))
	return spinward, axial, up + f.Radius
}

// Along gives the straight length (m) from the middle to where the floor meets
// the radius of an angle, or the length itself.
func (f *Flat) Along(a Arc) float64 {
	if a.IsAngle {
		return f.Radius * math.Tan(a.Value)
	}
	return a.Value
}

// over says whether a point lies over the floor, in the cabin or in its hull.
func (f *Flat) over(pos r3.Vec) bool {
	s, a, h := f.Place(pos)
	return math.Abs(s) <= f.Size[0]/2+DefaultThickness && math.Abs(a) <= f.Size[1]/2+DefaultThickness &&
		h >= -DefaultThickness && h <= f.Size[2]+DefaultThickness
}

// flat gives the floor of a cabin.
func (r *Room) flat() *Flat {
	f := &Flat{Name: FloorName, Radius: r.FloorRadius, Phi: r.Spinward.Angle(r.FloorRadius), Z: r.Axial, Size: r.Size}
	if r.Name != "" {
		f.Name = r.Name + " " + FloorName
	}
	f.local = frame.LocalAt(f.Phi)
	return f
}

// FlatDeck gives the plane of a deck, nil where it is curved.
func (m *Model) FlatDeck(deck int) *Flat {
	if m.Decks[deck].Flat {
		return m.Habitat.flat()
	}
	return nil
}

// FlatBeneath gives the flat floor that a point (m, habitat components) lies
// over: that of the cabin that it is in, or that of a habitat that is a cabin;
// nil where floors are curved.
func (m *Model) FlatBeneath(pos r3.Vec) *Flat {
	for i := range m.Rooms {
		if r := &m.Rooms[i]; r.Shape == Cabin {
			if f := r.flat(); f.over(pos) {
				return f
			}
		}
	}
	return m.FlatDeck(0)
}

// LocalAt gives the directions of the floor beneath a place: those of the flat
// floor that it lies over, up being its normal, or those of the plumb line. A
// release's velocity, a throw's heading and elevation and a track's columns are
// along them.
func (m *Model) LocalAt(p frame.Polar) frame.Local {
	if f := m.FlatBeneath(p.Vec()); f != nil {
		return f.local
	}
	return frame.LocalAt(p.Phi)
}

// Above gives the height (m) of a place above a deck: along the plumb line, or
// along the normal of a flat one.
func (m *Model) Above(deck int, p frame.Polar) float64 {
	if f := m.FlatDeck(deck); f != nil {
		_, _, h := f.Place(p.Vec())
		return h
	}
	return m.Decks[deck].Radius - p.R
}

// CabinFloor gives the flat floor of a cabin, nil for other rooms.
func (r *Room) CabinFloor() *Flat {
	if r.Shape != Cabin {
		return nil
	}
	return r.flat()
}
