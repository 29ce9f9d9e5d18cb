package measure_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"offplumb/sim/measure"
)

// winding is how often loops go round a point, counterclockwise.
func winding(loops [][][2]int32, x, y float64) int {
	sum := 0.0
	for _, loop := range loops {
		for k := range loop {
			a, b := loop[k], loop[(k+1)%len(loop)]
			turn := math.Atan2(float64(b[1])-y, float64(b[0])-x) - math.Atan2(float64(a[1])-y, float64(a[0])-x)
			sum += math.Remainder(turn, 2*math.Pi)
		}
	}
	return int(math.Round(sum / (2 * math.Pi)))
}

// TestOutlinesEncloseTheirSquares: of random sets of squares, each square is
// gone round once and every other not at all; the areas sum to their number;
// corners are turns.
func TestOutlinesEncloseTheirSquares(t *testing.T) {
	const seed, side = 17, 7
	r := rand.New(rand.NewPCG(seed, 1))
	for range 200 {
		fill := r.Float64()
		in := map[[2]int32]bool{}
		var list [][2]int32
		for i := range int32(side) {
			for j := range int32(side) {
				if at := [2]int32{i - 3, j - 3}; r.Float64() < fill {
					in[at] = true
					list = append(list, at)
				}
			}
		}
		r.Shuffle(len(list), func(a, b int) { list[a], list[b] = list[b], list[a] })
		loops := measure.Outlines(list)
		area := 0.0
		for _, loop := range loops {
			for k := range loop {
				a, b, c := loop[k], loop[(k+1)%len(loop)], loop[(k+2)%len(loop)]
				area += float64(a[0])*float64(b[1])/2 - float64(a[1])*float64(b[0])/2
				if (b[0]-a[0])*(c[1]-b[1])-(b[1]-a[1])*(c[0]-b[0]) == 0 {
					t.Fatalf("seed %d: corner %v does not turn", seed, b)
				}
			}
		}
		if area != float64(len(list)) {
			t.Fatalf("seed %d: area %g of %d squares", seed, area, len(list))
		}
		for i := int32(-1); i <= side; i++ {
			for j := int32(-1); j <= side; j++ {
				at := [2]int32{i - 3, j - 3}
				want := 0
				if in[at] {
					want = 1
				}
				if got := winding(loops, float64(at[0])+0.5, float64(at[1])+0.5); got != want {
					t.Fatalf("seed %d: square %v is gone round %d times, want %d", seed, at, got, want)
				}
			}
		}
	}
}

// TestOutlinesOfSquaresAtACorner: two that meet at a corner alone are apart, and
// a hole runs the other way round.
func TestOutlinesOfSquaresAtACorner(t *testing.T) {
	if loops := measure.Outlines([][2]int32{{0, 0}, {1, 1}}); len(loops) != 2 || len(loops[0]) != 4 || len(loops[1]) != 4 {
		t.Errorf("two at a corner: %v", loops)
	}
	var ring [][2]int32
	for i := range int32(3) {
		for j := range int32(3) {
			if i != 1 || j != 1 {
				ring = append(ring, [2]int32{i, j})
			}
		}
	}
	if loops := measure.Outlines(ring); len(loops) != 2 || winding(loops, 1.5, 1.5) != 0 || winding(loops[:1], 1.5, 1.5) != 1 {
		t.Errorf("a ring: %v", loops)
	}
	if loops := measure.Outlines(nil); loops != nil {
		t.Errorf("nothing: %v", loops)
	}
}
