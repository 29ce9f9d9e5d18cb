package geom_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/geom"
)

// worlds are the interiors that the laws are tried on.
func worlds() []namedWorld {
	return append([]namedWorld{{"gallery", gallery()}, {"wheel", wheel(3)}, {"wide passage", wide()}}, shaped()...)
}

type namedWorld struct {
	name string
	*world
}

// worldSize is how far from the origin places are tried, m.
const worldSize = 20

// somewhere gives a place about a world: anywhere, or near a rim, a mouth or
// another edge of a piece.
func somewhere(rng *rand.Rand, edges []r3.Vec) r3.Vec {
	if rng.IntN(3) == 0 {
		return r3.Vec{X: between(rng, -19, 19), Y: between(rng, -19, 19), Z: between(rng, -8, 8)}
	}
	return toward(edges[rng.IntN(len(edges))], decades(rng, 1e-3, 3), direction(rng))
}

// coverPieces samples the boundaries of all pieces.
func coverPieces(in *geom.Interior, step float64) cover {
	var all cover
	for _, piece := range in.Pieces() {
		var c cover
		switch s := piece.Solid.(type) {
		case *geom.Sector:
			c = coverSector(s, step)
		case *geom.Block:
			c = coverBlock(s, step)
		default:
			c = coverFurther(s, step)
		}
		all.points, all.edges = append(all.points, c.points...), append(all.edges, c.edges...)
		all.reach = math.Max(all.reach, c.reach)
	}
	return all
}

// eachWorld runs a test on each of the worlds, and on one at random.
func eachWorld(t *testing.T, stream uint64, test func(*testing.T, *rand.Rand, *world, *geom.Interior)) {
	for i, w := range worlds() {
		t.Run(w.name, func(t *testing.T) { test(t, random(t, stream+uint64(i)), w.world, w.build()) })
	}
	t.Run("random", func(t *testing.T) {
		rng := random(t, stream+9)
		w := randomWorld(rng)
		test(t, rng, w, w.build())
	})
}

func TestInteriorLipschitz(t *testing.T) {
	eachWorld(t, 100, func(t *testing.T, rng *rand.Rand, _ *world, in *geom.Interior) {
		edges := coverPieces(in, 5).edges
		for range 15000 {
			p := somewhere(rng, edges)
			q := toward(p, decades(rng, 1e-6, 10), direction(rng))
			most := dist(p, q)
			if got := math.Abs(in.Dist(p) - in.Dist(q)); got > most+slack(worldSize) {
				t.Fatalf("Dist changes by %.17g from %v to %v, %.17g apart", got, p, q, most)
			}
			if got := math.Abs(in.Beyond(p) - in.Beyond(q)); got > most+slack(worldSize) {
				t.Fatalf("Beyond changes by %.17g from %v to %v, %.17g apart", got, p, q, most)
			}
		}
	})
}

// TestInteriorSolid holds the sign of Dist against the words of the scenario.
func TestInteriorSolid(t *testing.T) {
	eachWorld(t, 110, func(t *testing.T, rng *rand.Rand, w *world, in *geom.Interior) {
		edges := coverPieces(in, 5).edges
		for range 25000 {
			p := somewhere(rng, edges)
			if d := in.Dist(p); math.Abs(d) > slack(worldSize) && (d < 0) != w.solid(p) {
				t.Fatalf("Dist(%v) = %g, solid: %t", p, d, w.solid(p))
			}
		}
	})
}

// TestInteriorDistExact tries, from places in free space, that there is no
// matter nearer than Dist, and some just beyond the nearest point.
func TestInteriorDistExact(t *testing.T) {
	const beyond = 1e-9 // m, past the surface: some hundred thousand roundings
	eachWorld(t, 120, func(t *testing.T, rng *rand.Rand, w *world, in *geom.Interior) {
		edges := coverPieces(in, 5).edges
		for range 2500 {
			p := somewhere(rng, edges)
			c := in.Contact(p)
			if c.Gap < 0 {
				continue
			}
			if !solidAbout(w, toward(c.Point, -beyond, c.Normal), beyond/2) {
				t.Fatalf("no matter at %v, nearest to %v at %g", c.Point, p, c.Gap)
			}
			for range 20 {
				q := toward(p, (c.Gap-slack(worldSize))*math.Cbrt(rng.Float64()), direction(rng))
				if w.solid(q) {
					t.Fatalf("matter at %v, %g from %v, where Dist is %g", q, dist(p, q), p, c.Gap)
				}
			}
		}
	})
}

// solidAbout says whether there is matter at p or within a small distance
// around it: past an edge the line from outside may just pass it by.
func solidAbout(w *world, p r3.Vec, d float64) bool {
	for _, e := range []r3.Vec{{}, {X: d}, {X: -d}, {Y: d}, {Y: -d}, {Z: d}, {Z: -d}} {
		if w.solid(r3.Add(p, e)) {
			return true
		}
	}
	return false
}

// TestInteriorDistSampled holds Dist in free space against samples of the
// boundaries of all pieces.
func TestInteriorDistSampled(t *testing.T) {
	eachWorld(t, 130, func(t *testing.T, rng *rand.Rand, _ *world, in *geom.Interior) {
		all := coverPieces(in, 1)
		for range 8 {
			p := somewhere(rng, all.edges)
			d := in.Dist(p)
			if d <= 0 {
				continue
			}
			if near := all.nearest(p); d > near+slack(worldSize) || d < near-all.reach-slack(worldSize) {
				t.Fatalf("Dist(%v) = %.17g, nearest sample %.17g, reach %g", p, d, near, all.reach)
			}
		}
	})
}

// TestContact tries that the contact is that of Dist: on the surface, along a
// unit normal.
func TestContact(t *testing.T) {
	eachWorld(t, 140, func(t *testing.T, rng *rand.Rand, _ *world, in *geom.Interior) {
		edges := coverPieces(in, 5).edges
		for range 8000 {
			p := somewhere(rng, edges)
			c := in.Contact(p)
			switch {
			case c.Gap != in.Dist(p):
				t.Fatalf("at %v the gap is %.17g, Dist %.17g", p, c.Gap, in.Dist(p))
			case c.Gap > 0 && math.Abs(in.Dist(c.Point)) > slack(worldSize):
				t.Fatalf("the point %v nearest to %v is %g off the surface", c.Point, p, in.Dist(c.Point))
			case r3.Norm(r3.Sub(p, toward(c.Point, c.Gap, c.Normal))) > slack(worldSize):
				t.Fatalf("%v is not %g along %v from %v", p, c.Gap, c.Normal, c.Point)
			case math.Abs(r3.Norm(c.Normal)-1) > 8*epsilon:
				t.Fatalf("at %v the normal is %.17g long", p, r3.Norm(c.Normal))
			case in.DistTo(p, c.Surface) != c.Gap:
				t.Fatalf("at %v the gap is %g, to its surface %g", p, c.Gap, in.DistTo(p, c.Surface))
			}
		}
	})
}

// TestContactNormalIsGradient holds normals against central differences of
// Dist, away from the seams where the nearest point jumps.
func TestContactNormalIsGradient(t *testing.T) {
	eachWorld(t, 150, func(t *testing.T, rng *rand.Rand, _ *world, in *geom.Interior) {
		edges := coverPieces(in, 5).edges
		tried, seams := 0, 0
		for range 5000 {
			p := somewhere(rng, edges)
			c := in.Contact(p)
			if c.Gap < diffLeast || math.Hypot(p.X, p.Y) < diffLeast {
				continue
			}
			tried++
			grad, jump := gradientOf(p, worldSize, func(p r3.Vec) (float64, r3.Vec) {
				c := in.Contact(p)
				return c.Gap, c.Point
			})
			if jump {
				seams++
				continue
			}
			if tol := 2 * (diffStep/diffLeast + slack(worldSize)/diffStep); r3.Norm(r3.Sub(grad, c.Normal)) > tol {
				t.Fatalf("at %v normal %v, gradient %v", p, c.Normal, grad)
			}
		}
		if seams > tried/50 || tried < 500 {
			t.Errorf("%d of %d places lay at seams", seams, tried)
		}
	})
}
