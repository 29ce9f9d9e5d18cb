package measure

// The outline of a level on a grid, by marching squares (Lorensen & Cline,
// Computer Graphics 21, 1987, 163-169, in two dimensions; from memory).

// The sides of a cell of the grid.
const (
	below = iota
	right
	above
	left
)

// sides lists, for each set of corners at or above a level, the stretches that
// the outline runs across the cell: from a side to a side, the high ground on
// the left. Corners are bits: 1 left below, 2 right below, 4 right above, 8 left
// above.
var sides = [16][][2]int{
	1: {{below, left}}, 2: {{right, below}}, 4: {{above, right}}, 8: {{left, above}},
	3: {{right, left}}, 6: {{above, below}}, 12: {{left, right}}, 9: {{below, above}},
	7: {{above, left}}, 11: {{right, above}}, 13: {{below, right}}, 14: {{left, below}},
	5: {{below, right}, {above, left}}, 10: {{left, below}, {right, above}}, // where the middle is high
}

// apart are the stretches of a saddle whose middle is low.
var apart = [16][][2]int{5: {{below, left}, {above, right}}, 10: {{right, below}, {left, above}}}

// level gives the closed outlines of where the density is at or above a level,
// in the order of the grid. The outermost bins must be below it.
func (g *grid) level(level float64) [][][2]float64 {
	next := map[int]int{}
	var starts []int
	for j := range g.n[1] - 1 {
		for i := range g.n[0] - 1 {
			for _, s := range g.crossings(i, j, level) {
				from := g.side(i, j, s[0])
				next[from] = g.side(i, j, s[1])
				starts = append(starts, from)
			}
		}
	}
	var loops [][][2]float64
	for _, from := range starts {
		var loop [][2]float64
		for at, ok := from, true; ok; {
			to, more := next[at]
			if ok = more; ok {
				loop = append(loop, g.crossed(at, level))
				delete(next, at)
				at = to
			}
		}
		if loop != nil {
			loops = append(loops, loop)
		}
	}
	return loops
}

// crossings lists how the outline crosses a cell.
func (g *grid) crossings(i, j int, level float64) [][2]int {
	a, b, c, d := g.at(i, j), g.at(i+1, j), g.at(i+1, j+1), g.at(i, j+1)
	set := 0
	for k, f := range [...]float64{a, b, c, d} {
		if f >= level {
			set |= 1 << k
		}
	}
	if (set == 5 || set == 10) && (a+b+c+d)/4 < level {
		return apart[set]
	}
	return sides[set]
}

// side gives the number of a side of a cell, which is one with that of its
// neighbour: twice the bin at its beginning, and one more for an upright one.
func (g *grid) side(i, j, side int) int {
	switch side {
	case right:
		i++
	case above:
		j++
	}
	n := 2 * (j*g.n[0] + i)
	if side == left || side == right {
		n++
	}
	return n
}

// crossed gives the place at which the level crosses a side.
func (g *grid) crossed(side int, level float64) [2]float64 {
	i, j := side/2%g.n[0], side/2/g.n[0]
	di, dj := 1, 0
	if side%2 == 1 {
		di, dj = 0, 1
	}
	a, b := g.at(i, j), g.at(i+di, j+dj)
	u := (level - a) / (b - a)
	return [2]float64{g.low[0] + (float64(i)+u*float64(di))*g.step[0], g.low[1] + (float64(j)+u*float64(dj))*g.step[1]}
}
