package geom_test

import (
	"math"
	"reflect"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/geom"
)

// flatten gives points along an outline's piece, in its own direction, so
// close that an arc bulges past their chords by sagitta at most (m).
func flatten(s geom.Seg, sagitta float64) [][2]float64 {
	if !s.Arc {
		return [][2]float64{s.A, mix(s.A, s.B, 0.37), s.B}
	}
	n := 2 + int(math.Abs(s.Phi1-s.Phi0)/math.Sqrt(8*sagitta/s.Radius))
	var out [][2]float64
	for i := range n + 1 {
		phi := s.Phi0 + (s.Phi1-s.Phi0)*float64(i)/float64(n)
		out = append(out, [2]float64{s.Centre[0] + s.Radius*math.Cos(phi), s.Centre[1] + s.Radius*math.Sin(phi)})
	}
	return out
}

func mix(a, b [2]float64, u float64) [2]float64 {
	return [2]float64{a[0] + u*(b[0]-a[0]), a[1] + u*(b[1]-a[1])}
}

// sagitta is how far the flattened outlines may be off (m).
const sagitta = 1e-3

// enclosed says whether an outline goes round a point: a ray from it crosses
// the outline an odd number of times.
func enclosed(segs []geom.Seg, x, y float64) bool {
	odd := false
	for _, s := range segs {
		line := flatten(s, sagitta)
		for i := 1; i < len(line); i++ {
			a, b := line[i-1], line[i]
			if (a[1] > y) != (b[1] > y) && x < a[0]+(y-a[1])/(b[1]-a[1])*(b[0]-a[0]) {
				odd = !odd
			}
		}
	}
	return odd
}

// TestSectionOnBoundary tries that the outline of a solid lies on its
// boundary, and that the plane misses the solid where there is none.
func TestSectionOnBoundary(t *testing.T) {
	rng := random(t, 10)
	for _, s := range randomShapes(rng, 8, 2) {
		box := s.solid.Bounds()
		for range 10 {
			z := between(rng, box.Min.Z-0.2, box.Max.Z+0.2)
			segs := s.solid.Section(z)
			if within := z > box.Min.Z && z < box.Max.Z; within != (len(segs) > 0) {
				t.Fatalf("%+v: %d pieces at z = %g", s.solid, len(segs), z)
			}
			for _, seg := range segs {
				for _, q := range flatten(seg, sagitta) {
					d := s.solid.Dist(r3.Vec{X: q[0], Y: q[1], Z: z})
					if tol := slack(2 * s.size); d > tol || d < -tol-s.bent {
						t.Fatalf("%+v: the outline at z = %g is %g off the boundary at %v", s.solid, z, d, q)
					}
				}
			}
		}
	}
}

// TestSectionEncloses tries that the outline goes round just what lies within
// the solid.
func TestSectionEncloses(t *testing.T) {
	rng := random(t, 11)
	for _, s := range randomShapes(rng, 8, 2) {
		box := s.solid.Bounds()
		for range 40 {
			p := r3.Vec{X: between(rng, box.Min.X, box.Max.X), Y: between(rng, box.Min.Y, box.Max.Y), Z: between(rng, box.Min.Z, box.Max.Z)}
			round := enclosed(s.solid.Section(p.Z), p.X, p.Y)
			if d := s.solid.Dist(p); math.Abs(d) > 2*sagitta+s.bent && (d < 0) != round {
				t.Fatalf("%+v: at %v Dist is %g, the outline goes round it: %t", s.solid, p, d, round)
			}
		}
	}
}

// TestSectionAtFaces tries that a plane through the very end of a solid shows
// it.
func TestSectionAtFaces(t *testing.T) {
	block := &geom.Block{Centre: polar(5, 1, 2), Along: polar(1, 1+math.Pi/2, 0), Across: r3.Vec{Z: 1}, Up: polar(-1, 1, 0), Half: [3]float64{1, 0.5, 0.25}}
	ring := &geom.Sector{R0: 3, R1: 4, Phi0: 1, Phi1: 2, Z0: 1.5, Z1: 2.5}
	for _, s := range []geom.Solid{block, ring} {
		for _, z := range []float64{1.5, 2.5} {
			if n := len(s.Section(z)); n != 4 {
				t.Errorf("%+v: an outline of %d pieces at z = %g", s, n, z)
			}
		}
	}
}

// TestInteriorSection tries that the outlines of an interior are those of the
// pieces that the plane cuts, named by them, and lie on their surfaces: no
// free space is shown as matter or the other way.
func TestInteriorSection(t *testing.T) {
	for _, w := range worlds() {
		in := w.build()
		for z := -8.05; z < 8; z += 0.7 {
			var want []geom.Outline
			for _, p := range in.Pieces() {
				if segs := p.Solid.Section(z); segs != nil {
					want = append(want, geom.Outline{Surface: p.Faces[0], Segs: segs})
				}
			}
			got := in.Section(z)
			if !reflect.DeepEqual(got, want) {
				t.Fatalf("%s: at z = %g outlines %+v, want %+v", w.name, z, got, want)
			}
			for _, o := range got {
				for _, seg := range o.Segs {
					for _, q := range flatten(seg, sagitta) {
						p := r3.Vec{X: q[0], Y: q[1], Z: z}
						if in.Dist(p) > slack(worldSize) || in.DistTo(p, o.Surface) > slack(worldSize) {
							t.Fatalf("%s: the outline of %q at z = %g is %g m off matter", w.name, in.Surface(o.Surface).Name, z, in.Dist(p))
						}
					}
				}
			}
		}
	}
}
