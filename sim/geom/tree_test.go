package geom_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/geom"
)

// heap is an interior of a number of pieces of all kinds, some of them
// endless, with a surface for each face, named by where it stands.
func heap(rng *rand.Rand, n int) *geom.Interior {
	b := &geom.Builder{}
	for i := range n {
		var faces []geom.SurfaceID
		for f := range 6 {
			faces = append(faces, b.Surface(string(rune('a'+f))+string(rune(0x4e00+i)), none, none))
		}
		kind := i % (sectorKinds + 3)
		if kind >= sectorKinds {
			b.Add(randomBlock(rng), faces...)
			continue
		}
		s := randomSector(rng, kind)
		switch rng.IntN(6) {
		case 0:
			s.Z0 = math.Inf(-1)
		case 1:
			s.Z1 = math.Inf(1)
		}
		b.Add(s, faces...)
	}
	return b.Build()
}

// TestTreeIsLinearMinimum holds Dist and Contact against the least over all
// pieces, one after the other.
func TestTreeIsLinearMinimum(t *testing.T) {
	rng := random(t, 40)
	for _, n := range []int{1, 2, 3, 4, 5, 8, 9, 17, 64, 100, 333} {
		in := heap(rng, n)
		for range 1000 {
			p := r3.Scale(between(rng, 0, 40), direction(rng))
			want := linear(in, p)
			if got := in.Dist(p); math.Abs(got-want) > slack(80) {
				t.Fatalf("%d pieces: Dist(%v) = %.17g, least of all %.17g", n, p, got, want)
			}
			c := in.Contact(p)
			if to := in.DistTo(p, c.Surface); math.Abs(c.Gap-want) > slack(80) || to != c.Gap {
				t.Fatalf("%d pieces: at %v gap %.17g, to its surface %.17g, least of all %.17g", n, p, c.Gap, to, want)
			}
		}
	}
}

func linear(in *geom.Interior, p r3.Vec) float64 {
	low := math.Inf(1)
	for _, piece := range in.Pieces() {
		low = math.Min(low, piece.Solid.Dist(p))
	}
	return low
}

// TestTreeTakesTheEarlier tries that of pieces at the same distance the one
// that was added first is touched, wherever in the tree it stands: here
// midway between two stacks of blocks.
func TestTreeTakesTheEarlier(t *testing.T) {
	for _, n := range []int{2, 7, 40} {
		for _, side := range []float64{1, -1} {
			b := &geom.Builder{}
			for i := range n {
				at := r3.Vec{X: -5 * side}
				if i == 0 || i > n/2 {
					at.X = 5 * side
				}
				id := b.Surface(string(rune('a'+i)), none, none)
				b.Add(&geom.Block{Centre: at, Along: r3.Vec{X: 1}, Across: r3.Vec{Y: 1}, Up: r3.Vec{Z: 1}, Half: [3]float64{1, 1, 1}}, id, id, id, id, id, id)
			}
			if c := b.Build().Contact(r3.Vec{}); c.Surface != 0 || c.Gap != 4 {
				t.Errorf("of %d equal pieces number %d is touched, at %g m", n, c.Surface, c.Gap)
			}
		}
	}
}

func TestEmptyInterior(t *testing.T) {
	in := (&geom.Builder{}).Build()
	p := r3.Vec{X: 1, Y: 2, Z: 3}
	c := in.Contact(p)
	if !math.IsInf(in.Dist(p), 1) || !math.IsInf(c.Gap, 1) || c.Surface != -1 {
		t.Errorf("Dist %g, contact %+v", in.Dist(p), c)
	}
	if in.Inside(p) || !math.IsInf(in.Beyond(p), 1) || in.Section(0) != nil {
		t.Error("something is there")
	}
	if s := in.Surface(c.Surface); s.Name != "" || !math.IsNaN(s.Restitution) || !math.IsNaN(s.Friction) {
		t.Errorf("the surface of none is %+v", s)
	}
}
