package study_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/study"
)

// rounding is the slack for sums of some thousand products of numbers below 1.
const rounding = 1e-12

// TestDirectionsAreEven: they have no mean, the averages of the powers of any
// part are those over the sphere, 1/3 and 1/5, and no two are the same.
func TestDirectionsAreEven(t *testing.T) {
	for _, n := range study.DirectionCounts() {
		list := study.Directions(n)
		if len(list) != n {
			t.Fatalf("%d directions are %d", n, len(list))
		}
		for _, axis := range []r3.Vec{{X: 1}, {Y: 1}, {Z: 1}, r3.Unit(r3.Vec{X: 1, Y: -2, Z: 3})} {
			var sum [5]float64
			for _, v := range list {
				if math.Abs(r3.Norm(v)-1) > rounding {
					t.Fatalf("%d: %v is no direction", n, v)
				}
				x := r3.Dot(v, axis)
				for k := range sum {
					sum[k] += math.Pow(x, float64(k+1)) / float64(n)
				}
			}
			for k, want := range []float64{0, 1. / 3, 0, 1. / 5, 0} {
				if math.Abs(sum[k]-want) > rounding {
					t.Errorf("%d along %v: the mean of power %d is %g, want %g", n, axis, k+1, sum[k], want)
				}
			}
		}
		if close := closest(list); close < 0.5*math.Sqrt(4*math.Pi/float64(n)) {
			t.Errorf("%d: two are %g rad apart", n, close)
		}
	}
}

// closest is the least angle between two directions, rad.
func closest(list []r3.Vec) float64 {
	best := math.Pi
	for i := range list {
		for k := range i {
			best = math.Min(best, 2*math.Asin(r3.Norm(r3.Sub(list[i], list[k]))/2))
		}
	}
	return best
}

// TestDirectionsAreTheirOwnMirrorImages: spinward, axially and upward.
func TestDirectionsAreTheirOwnMirrorImages(t *testing.T) {
	for _, n := range []int{12, 42, 92, 252} {
		list := study.Directions(n)
		for _, mirror := range []r3.Vec{{X: -1, Y: 1, Z: 1}, {X: 1, Y: -1, Z: 1}, {X: 1, Y: 1, Z: -1}} {
			for _, v := range list {
				w := r3.Vec{X: v.X * mirror.X, Y: v.Y * mirror.Y, Z: v.Z * mirror.Z}
				found := false
				for _, u := range list {
					found = found || r3.Norm(r3.Sub(u, w)) < rounding
				}
				if !found {
					t.Fatalf("%d: %v has no mirror image by %v", n, v, mirror)
				}
			}
		}
	}
	if list := study.Directions(1); len(list) != 1 || list[0] != (r3.Vec{}) {
		t.Errorf("a drop goes %v", list)
	}
}
