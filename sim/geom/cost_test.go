package geom_test

import (
	"fmt"
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/geom"
)

// TestNoAllocations tries that looking things up allocates nothing: it happens
// in the step loop.
func TestNoAllocations(t *testing.T) {
	rng := random(t, 70)
	edges := coverPieces(gallery().build(), 5).edges
	interiors := []*geom.Interior{gallery().build(), wheel(3).build(), heap(rng, 200)}
	for _, w := range shaped() {
		interiors = append(interiors, w.build())
	}
	for i, in := range interiors {
		var sum float64
		for _, look := range []struct {
			name string
			up   func(p r3.Vec)
		}{
			{"Dist", func(p r3.Vec) { sum += in.Dist(p) }},
			{"Contact", func(p r3.Vec) { sum += in.Contact(p).Gap }},
			{"DistTo", func(p r3.Vec) { sum += in.DistTo(p, 0) }},
			{"Beyond", func(p r3.Vec) { sum += in.Beyond(p) }},
			{"Inside", func(p r3.Vec) { in.Inside(p) }},
			{"Surface", func(r3.Vec) { sum += float64(len(in.Surface(0).Name)) }},
		} {
			if n := testing.AllocsPerRun(200, func() { look.up(somewhere(rng, edges)) }); n != 0 {
				t.Errorf("interior %d: %s allocates %g times", i, look.name, n)
			}
		}
	}
}

// stores is a ring with a floor, a ceiling, bulkheads and so many lockers
// around the floor.
func stores(lockers int) *geom.Interior {
	w := &world{rooms: []geom.Cylinder{{Floor: whole("floor", 50, -20, 20), Ceiling: 40, Thickness: wall}}}
	const rows = 8
	for i := range lockers {
		phi, z := 2*math.Pi*float64(i/rows)/math.Ceil(float64(lockers)/rows), -18+36*float64(i%rows)/(rows-1)
		w.blocks = append(w.blocks, &geom.Block{Centre: polar(49, phi, z), Along: polar(1, phi+math.Pi/2, 0),
			Across: r3.Vec{Z: 1}, Up: polar(-1, phi, 0), Half: [3]float64{0.4, 0.3, 1}})
	}
	return w.build()
}

// BenchmarkDist measures the distance at places about the room.
func BenchmarkDist(b *testing.B) {
	for _, lockers := range []int{6, 96, 996} {
		in := stores(lockers)
		b.Run(fmt.Sprintf("pieces=%d", len(in.Pieces())), func(b *testing.B) { benchmarkAt(b, func(p r3.Vec) { in.Dist(p) }) })
	}
}

// BenchmarkContact measures the nearest surface.
func BenchmarkContact(b *testing.B) {
	in := stores(96)
	benchmarkAt(b, func(p r3.Vec) { in.Contact(p) })
}

// BenchmarkDistLinear measures what the tree saves: the least of all pieces
// one after the other.
func BenchmarkDistLinear(b *testing.B) {
	in := stores(96)
	benchmarkAt(b, func(p r3.Vec) { linear(in, p) })
}

func benchmarkAt(b *testing.B, do func(p r3.Vec)) {
	rng := random(b, 71)
	places := make([]r3.Vec, 1024)
	for i := range places {
		places[i] = polar(between(rng, 40, 50), between(rng, -math.Pi, math.Pi), between(rng, -20, 20))
	}
	b.ReportAllocs()
	for i := 0; b.Loop(); i++ {
		do(places[i%len(places)])
	}
}
