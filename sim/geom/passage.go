package geom

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// Passage is a radial shaft of square section that joins two rooms.
type Passage struct {
	Name     string
	Phi, Z   float64 // rad and m, of its middle line
	From, To float64 // m from the axis; From < To
	Width    float64 // m
	Wall     float64 // m, thickness of its walls
}

// FloorMouth is the hole that the passage makes in a floor of radius r (m)
// inside of which it begins. Its corners meet those of the shaft: there is no
// lip.
func (p *Passage) FloorMouth(r float64) Hole {
	return p.mouth(HalfAngle(p.Width, r))
}

// CeilingMouth is the hole in a ceiling shell that lies between r - thickness
// and r. It is cut to the shaft's width where the shell is narrowest; the
// shaft's own walls fill what that leaves open farther out.
func (p *Passage) CeilingMouth(r, thickness float64) Hole {
	return p.mouth(HalfAngle(p.Width, math.Max(r-thickness, p.Width/2)))
}

func (p *Passage) mouth(half float64) Hole {
	return Hole{Name: p.Name + " mouth", Phi: p.Phi, Half: half, Z0: p.Z - p.Width/2, Z1: p.Z + p.Width/2}
}

// ends gives where along its middle line the shaft's walls begin and end: where
// the whole of its section is inside the rooms.
func (p *Passage) ends() (x0, x1 float64) {
	h := p.Width / 2
	return math.Sqrt(math.Max(0, p.From*p.From-h*h)), p.To
}

// AddPassage adds the four walls of a passage and the space between them.
func (b *Builder) AddPassage(p Passage) {
	x0, x1 := p.ends()
	out := onAngle(p.Phi, 1, 0)
	spin := onAngle(p.Phi+math.Pi/2, 1, 0)
	axial := r3.Vec{Z: 1}
	side := p.Width/2 + p.Wall/2
	wall := func(name string, off r3.Vec, alongHalf, acrossHalf float64) {
		centre := r3.Add(r3.Add(r3.Scale((x0+x1)/2, out), r3.Vec{Z: p.Z}), off)
		id := b.Surface(p.Name+" "+name, math.NaN(), math.NaN())
		b.Add(&Block{Centre: centre, Along: spin, Across: axial, Up: r3.Scale(-1, out),
			Half: [3]float64{alongHalf, acrossHalf, (x1 - x0) / 2}}, id, id, id, id, id, id)
	}
	long := p.Width/2 + p.Wall
	wall("antispinward wall", r3.Scale(-side, spin), p.Wall/2, long)
	wall("spinward wall", r3.Scale(side, spin), p.Wall/2, long)
	wall("-axial wall", r3.Scale(-side, axial), long, p.Wall/2)
	wall("+axial wall", r3.Scale(side, axial), long, p.Wall/2)
	b.AddSpace(&shaftSpace{mid: r3.Add(r3.Scale((x0+x1)/2, out), r3.Vec{Z: p.Z}), out: out, spin: spin,
		half: p.Width / 2, length: (x1-x0)/2 + p.Wall, wall: p.Wall})
}

// shaftSpace is the free space of a passage.
type shaftSpace struct {
	mid, out, spin r3.Vec
	half, length   float64
	wall           float64
}

func (s *shaftSpace) across(p r3.Vec) (across, along float64) {
	d := r3.Sub(p, s.mid)
	return math.Max(math.Abs(r3.Dot(d, s.spin)), math.Abs(d.Z)), math.Abs(r3.Dot(d, s.out))
}

// Beyond implements [Space].
func (s *shaftSpace) Beyond(p r3.Vec) float64 {
	across, along := s.across(p)
	return math.Max(across-s.half-s.wall, along-s.length)
}

// Holds implements [Space].
func (s *shaftSpace) Holds(p r3.Vec) bool {
	across, along := s.across(p)
	return across <= s.half && along <= s.length
}
