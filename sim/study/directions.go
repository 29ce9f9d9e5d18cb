package study

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/model"
)

// DirectionCounts lists how many directions can be spread evenly: 10 n^2 + 2
// for a whole number n.
func DirectionCounts() []int {
	var out []int
	for n := 1; 10*n*n+2 <= model.MostDirections; n++ {
		out = append(out, 10*n*n+2)
	}
	return out
}

// Directions gives count unit vectors (X spinward, Y axial, Z up) in all
// directions: the corners of an icosahedron each of whose edges is cut into n
// parts, its faces into n^2 triangles, brought onto the sphere; count is
// 10 n^2 + 2. One direction is that of nothing: the zero vector, a drop.
//
// Law: the set is taken to itself by the turns and mirrors of the icosahedron,
// so that it has no mean, the same spread along every axis, and the averages of
// polynomials up to the fifth degree are those over the sphere (a spherical
// 5-design: Delsarte, Goethals & Seidel, Geometriae Dedicata 6, 1977, 363-388;
// from memory). It is its own mirror image spinward, axially and upward.
func Directions(count int) []r3.Vec {
	if count <= 1 {
		return []r3.Vec{{}}
	}
	n := int(math.Round(math.Sqrt(float64(count-2) / 10)))
	corners := icosahedron()
	var out []r3.Vec
	for a := range corners {
		out = append(out, corners[a])
		for b := a + 1; b < len(corners); b++ {
			if !joined(corners[a], corners[b]) {
				continue
			}
			for i := 1; i < n; i++ {
				out = append(out, mixedOf(n, corners[a], n-i, corners[b], i, r3.Vec{}, 0))
			}
			for c := b + 1; c < len(corners); c++ {
				if joined(corners[a], corners[c]) && joined(corners[b], corners[c]) {
					out = append(out, within(n, corners[a], corners[b], corners[c])...)
				}
			}
		}
	}
	return out
}

// within gives the points inside a face.
func within(n int, a, b, c r3.Vec) (out []r3.Vec) {
	for i := 1; i < n; i++ {
		for k := 1; i+k < n; k++ {
			out = append(out, mixedOf(n, a, i, b, k, c, n-i-k))
		}
	}
	return out
}

// mixedOf is the direction of a weighted sum of corners.
func mixedOf(n int, a r3.Vec, i int, b r3.Vec, j int, c r3.Vec, k int) r3.Vec {
	share := func(v r3.Vec, w int) r3.Vec { return r3.Scale(float64(w)/float64(n), v) }
	return r3.Unit(r3.Add(share(a, i), r3.Add(share(b, j), share(c, k))))
}

// icosahedron gives the twelve corners: two coordinates in the golden ratio,
// the third 0.
func icosahedron() (out []r3.Vec) {
	long := math.Phi / math.Hypot(1, math.Phi)
	short := 1 / math.Hypot(1, math.Phi)
	for _, s := range []float64{1, -1} {
		for _, l := range []float64{1, -1} {
			out = append(out, r3.Vec{Y: s * short, Z: l * long}, r3.Vec{X: s * short, Y: l * long}, r3.Vec{Z: s * short, X: l * long})
		}
	}
	return out
}

// joined says whether two corners share an edge: the cosine between them is
// then 1/sqrt 5, between others -1/sqrt 5 or -1.
func joined(a, b r3.Vec) bool { return r3.Dot(a, b) > 0 }
