package geom

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// Passage is a radial shaft of square or round section that joins two rooms.
//
// Its mouths are cut into hulls and decks as pieces between surfaces of
// constant angle and axial place, never narrower than the shaft; the walls,
// which are at least as thick as what they pierce, fill what that leaves open,
// and of a round shaft collars around it. So there is no lip and no slit.
type Passage struct {
	Name   string
	Phi, Z float64 // rad and m, of its middle line
	From   float64 // m from the axis, of the corners at its inner end
	To     float64 // m from the axis, of the middle of its outer end; From < To
	Width  float64 // m, its side or diameter
	Round  bool    // it has a round section
	Wall   float64 // m, thickness of its walls
}

// Span is a stretch of places along the middle line of a passage, m from the
// axis.
type Span struct{ From, To float64 }

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
	h := Hole{Name: p.mouthName(), Phi: p.Phi, Half: half, Z0: p.Z - p.Width/2, Z1: p.Z + p.Width/2}
	if p.Round {
		h.Round = p
	}
	return h
}

func (p *Passage) mouthName() string { return p.Name + " mouth" }

// Ends gives where along its middle line the shaft's walls begin and end: where
// the whole of its section is inside the rooms.
func (p *Passage) Ends() Span { return Span{chord(p.From, p.Width/2), p.To} }

// Point gives the point of its middle line at the distance w (m) from the axis.
func (p *Passage) Point(w float64) r3.Vec {
	s := ShaftAt(p.Phi, p.Z)
	return s.point(r3.Vec{Z: w})
}

// Holds says whether a point lies within the clear section of the passage, and
// between its ends, by more than a depth (m).
func (p *Passage) Holds(at r3.Vec, by float64) bool {
	s, ends := ShaftAt(p.Phi, p.Z), p.Ends()
	q := s.local(at)
	across := math.Max(math.Abs(q.X), math.Abs(q.Y))
	if p.Round {
		across = math.Hypot(q.X, q.Y)
	}
	return across < p.Width/2-by && q.Z > ends.From+by && q.Z < ends.To-by
}

// crosses says whether the shaft runs through a shell that its middle line
// meets at the distance r (m) from the axis.
func (p *Passage) crosses(r float64) bool {
	s := p.Ends()
	return s.From <= r && r <= s.To
}

// AddPassage adds the walls of a passage and the space between them.
func (b *Builder) AddPassage(p Passage) {
	if p.Round {
		b.addPipe(&p)
	} else {
		b.addWalls(&p)
	}
	s := p.Ends()
	b.AddSpace(&shaftSpace{shaft: ShaftAt(p.Phi, p.Z), mid: (s.From + s.To) / 2, half: p.Width / 2,
		length: (s.To-s.From)/2 + p.Wall, wall: p.Wall, round: p.Round})
}

// addWalls adds the four walls of a square shaft.
func (b *Builder) addWalls(p *Passage) {
	at, s := ShaftAt(p.Phi, p.Z), p.Ends()
	side, long := p.Width/2+p.Wall/2, p.Width/2+p.Wall
	wall := func(name string, u, v, alongHalf, acrossHalf float64) {
		id := b.Surface(p.Name+" "+name, math.NaN(), math.NaN())
		b.Add(&Block{Centre: at.point(r3.Vec{X: u, Y: v, Z: (s.From + s.To) / 2}), Along: at.Spin, Across: r3.Vec{Z: 1}, Up: r3.Scale(-1, at.Out),
			Half: [3]float64{alongHalf, acrossHalf, (s.To - s.From) / 2}}, id, id, id, id, id, id)
	}
	wall("antispinward wall", -side, 0, p.Wall/2, long)
	wall("spinward wall", side, 0, p.Wall/2, long)
	wall("-axial wall", 0, -side, long, p.Wall/2)
	wall("+axial wall", 0, side, long, p.Wall/2)
}

// addPipe adds the wall of a round shaft.
func (b *Builder) addPipe(p *Passage) {
	defer b.Together()()
	s := p.Ends()
	id := b.Surface(p.Name+" wall", math.NaN(), math.NaN())
	for _, spinward := range []bool{false, true} {
		b.Add(&Pipe{Shaft: ShaftAt(p.Phi, p.Z), Bore: p.Width / 2, Outer: p.Width/2 + p.Wall, From: s.From, To: s.To, Spinward: spinward},
			id, id, id, id, id, id)
	}
}

// addCollar fills the corners of a mouth of a round shaft, from one place
// along its middle line to another.
func (b *Builder) addCollar(p *Passage, from, to float64) {
	defer b.Together()()
	wall, mouth := b.Surface(p.Name+" wall", math.NaN(), math.NaN()), b.Surface(p.mouthName(), math.NaN(), math.NaN())
	for _, spinward := range []bool{false, true} {
		b.Add(&Collar{Shaft: ShaftAt(p.Phi, p.Z), Bore: p.Width / 2, Half: p.Width/2 + p.Wall, From: from, To: to, Spinward: spinward},
			wall, mouth, mouth, mouth, mouth)
	}
}

// shaftSpace is the free space of a passage.
type shaftSpace struct {
	shaft        Shaft
	mid          float64 // m from the axis
	half, length float64 // m, half its width and half its length
	wall         float64
	round        bool
}

func (s *shaftSpace) across(p r3.Vec) (across, along float64) {
	q := s.shaft.local(p)
	across = math.Max(math.Abs(q.X), math.Abs(q.Y))
	if s.round {
		across = math.Hypot(q.X, q.Y)
	}
	return across, math.Abs(q.Z - s.mid)
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
