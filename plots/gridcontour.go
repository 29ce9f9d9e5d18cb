package plots

// gridField is a quantity on a grid of places; a NaN is a place without a value, and
// none of the four cells about it has any. Between places it is linear in each of the
// four triangles that a cell is cut into by its middle, where it is the mean of the
// corners, so that its contour lines are polylines and never cross.
type gridField struct {
	x, y []float64 // increasing
	v    []float64 // v[j*len(x)+i] at x[i], y[j]
}

// gridNode is a corner of a cell, or its middle.
type gridNode struct {
	id int
	at Point
	v  float64
}

func (g *gridField) node(i, j int) gridNode {
	k := j*len(g.x) + i
	return gridNode{k, Point{g.x[i], g.y[j]}, g.v[k]}
}

// cell gives the corners, in turn, and the middle; false where one has no value.
func (g *gridField) cell(i, j int) (corners [4]gridNode, middle gridNode, ok bool) {
	corners = [4]gridNode{g.node(i, j), g.node(i+1, j), g.node(i+1, j+1), g.node(i, j+1)}
	sum := 0.0
	for _, c := range corners {
		sum += c.v
	}
	middle = gridNode{len(g.v) + j*len(g.x) + i, Point{(g.x[i] + g.x[i+1]) / 2, (g.y[j] + g.y[j+1]) / 2}, sum / 4}
	return corners, middle, finite(sum)
}

// above gives polygons that make up where the quantity is at least some level: those of
// whole cells run along a row.
func (g *gridField) above(level float64) (out [][]Point) {
	for j := range len(g.y) - 1 {
		from := -1
		flush := func(to int) {
			if from >= 0 {
				out = append(out, []Point{{g.x[from], g.y[j]}, {g.x[to], g.y[j]}, {g.x[to], g.y[j+1]}, {g.x[from], g.y[j+1]}})
			}
			from = -1
		}
		for i := range len(g.x) - 1 {
			corners, middle, ok := g.cell(i, j)
			in := 0
			for _, c := range corners {
				if c.v >= level {
					in++
				}
			}
			if ok && in == 4 {
				if from < 0 {
					from = i
				}
				continue
			}
			flush(i)
			if ok && in > 0 {
				out = append(out, cutCell(corners, middle, level)...)
			}
		}
		flush(len(g.x) - 1)
	}
	return out
}

// cutCell gives the parts of the four triangles of a cell that are at least at a level.
func cutCell(corners [4]gridNode, middle gridNode, level float64) (out [][]Point) {
	for k := range corners {
		var part []Point
		tri := [3]gridNode{corners[k], corners[(k+1)%4], middle}
		for n := range tri {
			a, b := tri[n], tri[(n+1)%3]
			if a.v >= level {
				part = append(part, a.at)
			}
			if (a.v >= level) != (b.v >= level) {
				part = append(part, crossing(a, b, level))
			}
		}
		if len(part) > 2 {
			out = append(out, part)
		}
	}
	return out
}

// crossing is where the quantity has a level between two nodes; the same point whichever
// of them comes first.
func crossing(a, b gridNode, level float64) Point {
	if a.id > b.id {
		a, b = b, a
	}
	t := (level - a.v) / (b.v - a.v)
	return Point{a.at.X + t*(b.at.X-a.at.X), a.at.Y + t*(b.at.Y-a.at.Y)}
}

// gridEdge is the way between two nodes, by their ids; gridCut a piece of a contour line
// from one such edge to another.
type (
	gridEdge [2]int
	gridCut  struct {
		edge [2]gridEdge
		at   [2]Point
	}
)

func edgeOf(a, b gridNode) gridEdge { return gridEdge{min(a.id, b.id), max(a.id, b.id)} }

// cuts gives the pieces of the contour line of a level.
func (g *gridField) cuts(level float64) (out []gridCut) {
	for j := range len(g.y) - 1 {
		for i := range len(g.x) - 1 {
			corners, middle, ok := g.cell(i, j)
			for k := 0; ok && k < 4; k++ {
				tri := [3]gridNode{corners[k], corners[(k+1)%4], middle}
				var c gridCut
				n := 0
				for s := range tri {
					if a, b := tri[s], tri[(s+1)%3]; (a.v >= level) != (b.v >= level) {
						c.edge[n], c.at[n] = edgeOf(a, b), crossing(a, b, level)
						n++
					}
				}
				if n == 2 {
					out = append(out, c)
				}
			}
		}
	}
	return out
}

// lines gives the contour lines of a level, each in one piece: first those with ends,
// then those that close.
func (g *gridField) lines(level float64) (out [][]Point) {
	cuts := g.cuts(level)
	at := map[gridEdge][]int{} // looked up only
	for k, c := range cuts {
		for _, e := range c.edge {
			at[e] = append(at[e], k)
		}
	}
	done := make([]bool, len(cuts))
	follow := func(k, end int) {
		line := []Point{cuts[k].at[end]}
		for k >= 0 {
			done[k] = true
			end = 1 - end
			line = append(line, cuts[k].at[end])
			e := cuts[k].edge[end]
			k = -1
			for _, next := range at[e] {
				if !done[next] {
					k, end = next, 0
					if cuts[next].edge[1] == e {
						end = 1
					}
				}
			}
		}
		out = append(out, line)
	}
	for k := range cuts {
		for end := range 2 {
			if !done[k] && len(at[cuts[k].edge[end]]) == 1 {
				follow(k, end)
			}
		}
	}
	for k := range cuts {
		if !done[k] {
			follow(k, 0)
		}
	}
	return out
}
