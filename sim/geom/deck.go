package geom

import (
	"math"
	"slices"
)

// Shell is a floor or ceiling about the axis: matter from R0 to R1, with
// rectangular holes cut through it.
type Shell struct {
	Name                  string
	R0, R1                float64 // m
	Phi0, Phi1            float64 // rad; not counted where Whole
	Whole                 bool
	Z0, Z1                float64 // m
	Restitution, Friction float64 // of its surfaces; NaN: the body's
	Inner, Outer          string  // names of its two faces
	Edge                  string  // name of its other faces, holes apart
	Holes                 []Hole
}

// Hole is a cut through a shell. Its ends are radial planes.
type Hole struct {
	Name   string  // of the faces of the cut
	Phi    float64 // rad, its middle
	Half   float64 // rad, half its extent
	Z0, Z1 float64 // m
	// Round is a round passage whose mouth this is, or nil: the hole is square,
	// and collars fill its corners.
	Round *Passage
}

// HalfAngle gives half the angle under which a clear width w (m) appears at
// the distance r (m) from the axis: radial planes that far apart leave the
// width w between them there, and more farther out.
func HalfAngle(w, r float64) float64 { return math.Asin(math.Min(1, w/(2*r))) }

// AddShell adds the pieces that are left of a shell around its holes: bands
// between the axial places at which holes begin or end, each cut at the
// angles of its holes.
func (b *Builder) AddShell(s Shell) {
	b.addBands(&s)
	for i := range s.Holes {
		if p := s.Holes[i].Round; p != nil {
			b.addCollar(p, chord(s.R0, p.Width/2), s.R1)
		}
	}
}

func (b *Builder) addBands(s *Shell) {
	defer b.Together()()
	zs := []float64{s.Z0, s.Z1}
	for _, h := range s.Holes {
		zs = append(zs, clamp(h.Z0, s.Z0, s.Z1), clamp(h.Z1, s.Z0, s.Z1))
	}
	slices.Sort(zs)
	zs = slices.Compact(zs)
	for i := 1; i < len(zs); i++ {
		b.addBand(s, zs[i-1], zs[i])
	}
}

// span is a stretch of angles with what bounds it at each end: the name of a
// hole or an edge, or none where it goes on in another piece.
type span struct {
	from, to     float64
	atFrom, atTo string
}

func (b *Builder) addBand(s *Shell, z0, z1 float64) {
	var cuts []Hole
	for _, h := range s.Holes {
		if h.Z0 < z1 && h.Z1 > z0 {
			cuts = append(cuts, h)
		}
	}
	if len(cuts) == 0 && s.Whole {
		b.addSector(s, Sector{R0: s.R0, R1: s.R1, Whole: true, Z0: z0, Z1: z1}, span{})
		return
	}
	for _, left := range remaining(s, cuts) {
		b.addSector(s, Sector{R0: s.R0, R1: s.R1, Phi0: left.from, Phi1: left.to, Z0: z0, Z1: z1}, left)
	}
}

// remaining gives the angles that holes leave of a shell.
func remaining(s *Shell, cuts []Hole) []span {
	whole := span{from: s.Phi0, to: s.Phi1, atFrom: s.Edge, atTo: s.Edge}
	if s.Whole {
		// Begin in the middle of a hole, whose own cut then closes the circle.
		whole = span{from: cuts[0].Phi, to: cuts[0].Phi + 2*math.Pi}
	}
	left := []span{whole}
	for _, h := range cuts {
		left = cut(left, h)
	}
	return halved(left)
}

// halved divides the spans of more than half a turn, so that no piece faces
// itself across a hole: a sphere has one contact with a piece.
func halved(spans []span) []span {
	var out []span
	for _, s := range spans {
		if s.to-s.from <= math.Pi {
			out = append(out, s)
			continue
		}
		mid := (s.from + s.to) / 2
		out = append(out, span{from: s.from, to: mid, atFrom: s.atFrom}, span{from: mid, to: s.to, atTo: s.atTo})
	}
	return out
}

// cut takes a hole out of spans, wherever round the circle and however many
// turns off it is given.
func cut(spans []span, h Hole) []span {
	if len(spans) == 0 {
		return nil
	}
	first := math.Floor((spans[0].from - h.Phi) / (2 * math.Pi))
	for turn := first; turn <= first+2; turn++ {
		from, to := h.Phi-h.Half+turn*2*math.Pi, h.Phi+h.Half+turn*2*math.Pi
		var next []span
		for _, s := range spans {
			if to <= s.from || from >= s.to {
				next = append(next, s)
				continue
			}
			if from > s.from {
				next = append(next, span{from: s.from, to: from, atFrom: s.atFrom, atTo: h.Name})
			}
			if to < s.to {
				next = append(next, span{from: to, to: s.to, atFrom: h.Name, atTo: s.atTo})
			}
		}
		spans = next
	}
	return spans
}

func (b *Builder) addSector(s *Shell, piece Sector, at span) {
	name := func(n string) SurfaceID {
		if n == "" {
			n = s.Edge
		}
		return b.Surface(n, s.Restitution, s.Friction)
	}
	faces := make([]SurfaceID, sectorFaces)
	faces[SectorInner], faces[SectorOuter] = name(s.Inner), name(s.Outer)
	faces[SectorAntispinward], faces[SectorSpinward] = name(at.atFrom), name(at.atTo)
	faces[SectorMinusAxial], faces[SectorPlusAxial] = name(s.Edge), name(s.Edge)
	piece.open0, piece.open1 = at.atFrom == "", at.atTo == ""
	b.Add(&piece, faces...)
	added := &b.in.pieces[len(b.in.pieces)-1]
	for _, h := range s.Holes {
		if h.Z1 == piece.Z0 {
			added.rims = append(added.rims, rim{face: SectorMinusAxial, phi: h.Phi, half: h.Half, id: name(h.Name)})
		}
		if h.Z0 == piece.Z1 {
			added.rims = append(added.rims, rim{face: SectorPlusAxial, phi: h.Phi, half: h.Half, id: name(h.Name)})
		}
	}
}

// Opening is a hatch in a deck.
type Opening struct {
	Name     string
	Phi, Z   float64 // rad and m, its middle
	Spinward float64 // m, clear width at the deck's surface
	Axial    float64 // m, clear length
	Coaming  float64 // m, height of its rim above the deck; 0: none
	Closed   bool    // a lid level with the deck
}

// Deck is a floor with openings. Its radius is that of its surface, its
// thickness goes outward from there.
type Deck struct {
	Shell
	Openings []Opening
}

// AddDeck adds a deck with its openings, their coamings and lids. A body that
// is narrower than an opening passes it: its clear width is that between its
// sides at the deck's surface, and between the tops of its coaming.
func (b *Builder) AddDeck(d Deck) {
	for _, o := range d.Openings {
		d.Holes = append(d.Holes, Hole{Name: rimName(o), Phi: o.Phi, Half: HalfAngle(o.Spinward, d.R0),
			Z0: o.Z - o.Axial/2, Z1: o.Z + o.Axial/2})
	}
	b.addFloor(&d)
	for _, o := range d.Openings {
		if o.Coaming > 0 {
			b.addCoaming(&d, o)
		}
	}
}

// addFloor adds the deck and its lids, one body that is slid over unawares.
func (b *Builder) addFloor(d *Deck) {
	defer b.Together()()
	b.AddShell(d.Shell)
	for _, o := range d.Openings {
		if o.Closed {
			b.addLid(d, o)
		}
	}
}

func rimName(o Opening) string {
	if o.Coaming > 0 {
		return o.Name + " coaming"
	}
	return o.Name + " rim"
}

func (b *Builder) addLid(d *Deck, o Opening) {
	half := HalfAngle(o.Spinward, d.R0)
	top := b.Surface(o.Name+" lid", d.Restitution, d.Friction)
	under := b.Surface(o.Name+" lid underside", d.Restitution, d.Friction)
	b.Add(&Sector{R0: d.R0, R1: d.R1, Phi0: o.Phi - half, Phi1: o.Phi + half, Z0: o.Z - o.Axial/2, Z1: o.Z + o.Axial/2},
		top, under, top, top, top, top)
}

// addCoaming stands a rim around an opening, as thick as the deck: two sides
// and two ends.
func (b *Builder) addCoaming(d *Deck, o Opening) {
	thick := d.R1 - d.R0
	top := d.R0 - o.Coaming
	in := HalfAngle(o.Spinward, top)
	out := HalfAngle(o.Spinward+2*thick, top)
	z0, z1 := o.Z-o.Axial/2, o.Z+o.Axial/2
	id := b.Surface(o.Name+" coaming", d.Restitution, d.Friction)
	add := func(phi0, phi1, za, zb float64) {
		b.Add(&Sector{R0: top, R1: d.R0, Phi0: phi0, Phi1: phi1, Z0: za, Z1: zb}, id, id, id, id, id, id)
	}
	add(o.Phi-out, o.Phi-in, z0-thick, z1+thick)
	add(o.Phi+in, o.Phi+out, z0-thick, z1+thick)
	add(o.Phi-in, o.Phi+in, z0-thick, z0)
	add(o.Phi-in, o.Phi+in, z1, z1+thick)
}
