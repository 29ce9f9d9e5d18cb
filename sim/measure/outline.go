package measure

import "slices"

// Outlines traces the outlines of a set of squares of a grid, square (i, j)
// reaching from corner (i, j) to corner (i+1, j+1). Each loop has the squares on
// its left, so that one around them runs counterclockwise with i to the right
// and j up, and one around a hole clockwise; only turns are listed. Squares that
// meet at a corner alone are apart.
//
// Law: the areas of the loops, signed, sum to the number of squares.
func Outlines(squares [][2]int32) [][][2]int32 {
	in := make(map[[2]int32]bool, len(squares))
	for _, s := range squares {
		in[s] = true
	}
	sorted := slices.Clone(squares)
	slices.SortFunc(sorted, func(a, b [2]int32) int {
		if a[0] != b[0] {
			return int(a[0]) - int(b[0])
		}
		return int(a[1]) - int(b[1])
	})
	t := tracer{in: in, done: map[squareSide]bool{}}
	for _, s := range slices.Compact(sorted) {
		for side := range 4 {
			if e := (squareSide{s, side}); !in[e.across()] && !t.done[e] {
				t.loops = append(t.loops, t.trace(e))
			}
		}
	}
	return t.loops
}

// squareSide is a side of a square, run with the square on the left: 0 its low side,
// toward greater i, then on round it.
type squareSide struct {
	of   [2]int32
	side int
}

// ways are the ways of the four sides, counterclockwise round a square.
var ways = [4][2]int32{{1, 0}, {0, 1}, {-1, 0}, {0, -1}}

// starts are the corners that the sides start from.
var starts = [4][2]int32{{0, 0}, {1, 0}, {1, 1}, {0, 1}}

func plus(a, b [2]int32) [2]int32 { return [2]int32{a[0] + b[0], a[1] + b[1]} }

// across is the square on the other side of an edge.
func (e squareSide) across() [2]int32 { return plus(e.of, ways[(e.side+3)%4]) }

// from is the corner that an edge starts from.
func (e squareSide) from() [2]int32 { return plus(e.of, starts[e.side]) }

type tracer struct {
	in    map[[2]int32]bool
	done  map[squareSide]bool
	loops [][][2]int32
}

// trace follows an outline round from an edge. At its end an edge turns left
// along the same square, goes straight on along the next, or turns right.
func (t *tracer) trace(first squareSide) (loop [][2]int32) {
	last := -1
	for e := first; !t.done[e]; e = t.next(e) {
		t.done[e] = true
		if e.side != last {
			loop = append(loop, e.from())
		}
		last = e.side
	}
	if last == first.side { // it began in the middle of a side
		loop = loop[1:]
	}
	return loop
}

func (t *tracer) next(e squareSide) squareSide {
	ahead := plus(e.of, ways[e.side])
	if !t.in[ahead] {
		return squareSide{e.of, (e.side + 1) % 4}
	}
	if right := plus(ahead, ways[(e.side+3)%4]); t.in[right] {
		return squareSide{right, (e.side + 3) % 4}
	}
	return squareSide{ahead, e.side}
}
