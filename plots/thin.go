package plots

import "math"

// Thin drops points of a polyline that the line hardly needs, by the algorithm of
// Douglas & Peucker, The Canadian Cartographer 10 (1973) 112-122 (from memory).
//
// Law: both ends stay, order stays, and every dropped point lies within tolerance
// (in the unit of the points, 0 or more) of the segment that replaces it.
// The points must be finite. The result shares no memory with pts.
func Thin(pts []Point, tolerance float64) []Point {
	keep := thinIndex(len(pts), tolerance, func(i int) (x, y float64) { return pts[i].X, pts[i].Y })
	out := make([]Point, len(keep))
	for i, k := range keep {
		out[i] = pts[k]
	}
	return out
}

// thinIndex gives the indices that Thin keeps, ascending. A stack replaces recursion,
// so that a track of any length is safe.
func thinIndex(n int, tolerance float64, at func(int) (x, y float64)) []int {
	if n <= 2 {
		return countTo(n)
	}
	kept := make([]bool, n)
	kept[0], kept[n-1] = true, true
	stack := [][2]int{{0, n - 1}}
	for len(stack) > 0 {
		lo, hi := stack[len(stack)-1][0], stack[len(stack)-1][1]
		stack = stack[:len(stack)-1]
		far, dist := farthest(lo, hi, at)
		if dist > tolerance {
			kept[far] = true
			stack = append(stack, [2]int{lo, far}, [2]int{far, hi})
		}
	}
	out := make([]int, 0, n)
	for i, k := range kept {
		if k {
			out = append(out, i)
		}
	}
	return out
}

func countTo(n int) []int {
	out := make([]int, n)
	for i := range out {
		out[i] = i
	}
	return out
}

// farthest finds the point strictly between lo and hi that is farthest from the
// segment joining them; distance -1 if there is none.
func farthest(lo, hi int, at func(int) (x, y float64)) (int, float64) {
	ax, ay := at(lo)
	bx, by := at(hi)
	best, dist := lo, -1.0
	for i := lo + 1; i < hi; i++ {
		px, py := at(i)
		if d := segmentDistance(px, py, ax, ay, bx, by); d > dist {
			best, dist = i, d
		}
	}
	return best, dist
}

// segmentDistance is the distance from p to the segment a-b, not to its line: a track
// that turns back on itself would lose its turning point otherwise.
func segmentDistance(px, py, ax, ay, bx, by float64) float64 {
	dx, dy := bx-ax, by-ay
	l2 := dx*dx + dy*dy
	t := 0.0
	if l2 > 0 {
		t = math.Max(0, math.Min(1, ((px-ax)*dx+(py-ay)*dy)/l2))
	}
	return math.Hypot(px-ax-t*dx, py-ay-t*dy)
}
