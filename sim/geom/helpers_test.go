package geom_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/geom"
)

// epsilon is the distance from 1 to the next float64.
const epsilon = 0x1p-52

// roundings bounds the error of a distance in units of epsilon times the size
// of the numbers that went in. The angle of a point against the middle of a
// sector goes through five roundings of numbers up to 4 pi, 4 epsilon each,
// and turns into a length by the factor r; the lengths themselves take about
// ten roundings more. Two distances are compared, hence twice that.
const roundings = 64

// slack is the rounding error that a distance between things of this size (m)
// may carry.
func slack(scale float64) float64 { return roundings * epsilon * scale }

// random gives a generator with a fixed seed, which a failure prints. Each
// stream is a sequence of its own.
func random(t testing.TB, stream uint64) *rand.Rand {
	t.Helper()
	const seed = 0x0ff91a3b
	t.Cleanup(func() {
		if t.Failed() {
			t.Logf("random numbers of PCG(%#x, %d)", seed, stream)
		}
	})
	return rand.New(rand.NewPCG(seed, stream))
}

// between gives a number from lo to hi.
func between(rng *rand.Rand, lo, hi float64) float64 { return lo + (hi-lo)*rng.Float64() }

// decades gives a number from lo to hi, each decade as likely as another.
func decades(rng *rand.Rand, lo, hi float64) float64 {
	return math.Exp(between(rng, math.Log(lo), math.Log(hi)))
}

// direction gives a unit vector, all directions alike.
func direction(rng *rand.Rand) r3.Vec {
	for {
		v := r3.Vec{X: rng.NormFloat64(), Y: rng.NormFloat64(), Z: rng.NormFloat64()}
		if n := r3.Norm(v); n > 1e-3 {
			return r3.Scale(1/n, v)
		}
	}
}

func dist(p, q r3.Vec) float64 { return r3.Norm(r3.Sub(p, q)) }

// polar gives the point at r (m), phi (rad), z (m).
func polar(r, phi, z float64) r3.Vec {
	return r3.Vec{X: r * math.Cos(phi), Y: r * math.Sin(phi), Z: z}
}

// toward gives the point at the distance d (m) from p along the unit vector u.
func toward(p r3.Vec, d float64, u r3.Vec) r3.Vec { return r3.Add(p, r3.Scale(d, u)) }

// attitude gives three unit vectors at right angles, all attitudes alike.
func attitude(rng *rand.Rand) (a, b, c r3.Vec) {
	a = direction(rng)
	for {
		b = r3.Cross(a, direction(rng))
		if r3.Norm(b) > 1e-3 {
			break
		}
	}
	b = r3.Unit(b)
	return a, b, r3.Cross(a, b)
}

// randomSector gives a sector of a kind: 0 a whole ring, 1 a thick piece, 2 a
// thin deck, 3 one that reaches the axis, 4 a ring but for a slit.
func randomSector(rng *rand.Rand, kind int) *geom.Sector {
	s := &geom.Sector{R1: between(rng, 1, 30), Phi0: between(rng, -2*math.Pi, math.Pi), Z0: between(rng, -5, 5)}
	s.R0 = s.R1 * between(rng, 0.05, 0.98)
	s.Z1 = s.Z0 + decades(rng, 0.02, 8)
	extent := between(rng, 0.02, 6)
	switch kind {
	case 0:
		s.Whole = true
	case 2:
		s.R0 = s.R1 - 0.05
	case 3:
		s.R0 = 0
	case 4:
		extent = 2*math.Pi - decades(rng, 0.001, 0.5)
	}
	s.Phi1 = s.Phi0 + extent
	return s
}

const sectorKinds = 5

func randomBlock(rng *rand.Rand) *geom.Block {
	b := &geom.Block{Centre: r3.Scale(between(rng, 0, 20), direction(rng))}
	b.Along, b.Across, b.Up = attitude(rng)
	for i := range b.Half {
		b.Half[i] = decades(rng, 0.02, 3)
	}
	return b
}

// shape is a solid with samples of its boundary and its size.
type shape struct {
	solid geom.Solid
	cover cover
	size  float64 // m, farthest from the origin
	bent  float64 // m, by which straight pieces of its outlines cut inside it
}

// randomShapes gives a number of shapes of every kind.
func randomShapes(rng *rand.Rand, each int, step float64) []shape {
	var out []shape
	for range each {
		for kind := range sectorKinds {
			s := randomSector(rng, kind)
			out = append(out, shape{solid: s, cover: coverSector(s, step), size: s.R1 + math.Max(math.Abs(s.Z0), math.Abs(s.Z1))})
		}
		b := randomBlock(rng)
		out = append(out, shape{solid: b, cover: coverBlock(b, step), size: r3.Norm(b.Centre) + b.Half[0] + b.Half[1] + b.Half[2]})
	}
	return append(out, furtherShapes(rng, each, step)...)
}

// point gives a place: near the boundary, at any distance down to a tenth of a
// millimetre on either side, or somewhere about.
func (s *shape) point(rng *rand.Rand) r3.Vec {
	q := s.cover.points[rng.IntN(len(s.cover.points))]
	if rng.IntN(3) == 0 {
		return r3.Scale(between(rng, 0, 1.5*s.size), direction(rng))
	}
	return toward(q, decades(rng, 1e-4, 3), direction(rng))
}
