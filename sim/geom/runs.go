package geom

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// faced is a solid that knows how far its faces go.
type faced interface {
	Solid
	// runs gives how far (m) a point p may surely move while the nearest point
	// of the solid stays within the same face; 0 where it is on an edge.
	runs(p r3.Vec) float64
}

// Runs gives how far (m) a sphere that slides on a patch may surely move from p
// before its contact comes to an edge, or to the next piece; 0 where that is
// not known.
func (in *Interior) Runs(p r3.Vec, c Patch) float64 {
	if s, ok := in.pieces[in.nearestOn(p, c)].Solid.(faced); ok {
		return math.Max(0, s.runs(p))
	}
	return 0
}

// runs implements faced.
func (b *Block) runs(p r3.Vec) float64 {
	q := b.local(p)
	out, way := 0, math.Inf(1)
	for i := range q {
		if d := b.Half[i] - math.Abs(q[i]); d < 0 {
			out++
		} else {
			way = math.Min(way, d)
		}
	}
	if out != 1 {
		return 0
	}
	return way
}

// runs implements faced.
func (s *Sector) runs(p r3.Vec) float64 {
	r := math.Hypot(p.X, p.Y)
	across := math.Min(r-s.R0, s.R1-r)
	along := math.Min(p.Z-s.Z0, s.Z1-p.Z)
	round, beyond := s.rest(p, r)
	switch {
	case beyond > 0: // an end face, or one of its edges
		x := math.Sqrt(math.Max(0, r*r-beyond*beyond))
		return math.Min(along, math.Min(x-s.R0, s.R1-x))
	case across < 0: // inside or outside
		return math.Min(math.Min(along, round), r)
	case along < 0:
		return math.Min(across, round)
	}
	return 0
}

// rest gives how far a point at the distance r from the axis is from the end
// planes of the sector, within its range of angles, and how far it is from the
// nearer one beyond that.
func (s *Sector) rest(p r3.Vec, r float64) (round, beyond float64) {
	if s.Whole {
		return math.Inf(1), 0
	}
	half := (s.Phi1 - s.Phi0) / 2
	off := math.Abs(math.Remainder(math.Atan2(p.Y, p.X)-(s.Phi0+half), 2*math.Pi)) - half
	turn := r * math.Sin(math.Min(math.Pi/2, math.Abs(off)))
	if off > 0 {
		return 0, turn
	}
	return turn, 0
}
