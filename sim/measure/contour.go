package measure

import (
	"math"
	"slices"

	"gonum.org/v1/gonum/mat"
	"gonum.org/v1/gonum/stat"
	"offplumb/sim/table"
)

// Contour is the smallest area that holds a share of landings, without a
// distribution being assumed: where their density is above a level. The density
// is that of an averaged shifted histogram (Scott, Annals of Statistics 13,
// 1985, 1024-1040; from memory), and the level is the one above which that
// share of the landings lies (Hyndman, The American Statistician 50, 1996,
// 120-126; from memory). m, from plumb under the nominal release.
type Contour struct {
	Pieces [][][2]float64 // closed outlines, the dense side on the left; of landings on a line one piece, open
	Line   bool           // the landings lie on a line: the shortest stretch of it that holds the share
	Area   float64        // m^2, holes less
	Inside float64        // share of the landings that it holds
}

const (
	// leastForContour is how many landings a density wants; with fewer, a level
	// of 95 % hangs on one or two of them.
	leastForContour = 40
	// flatter is the ratio of the axes below which landings count as lying on a
	// line.
	flatter = 1e-6
	// shifts is how many shifted histograms are averaged, each way.
	shifts = 5
	// mostBins bounds the narrow bins of the grid, each way.
	mostBins = 400
	// tails is the share of landings at either end, along each axis, that may
	// lie off the grid; there the density counts as none.
	tails = 1e-3
	// kernelWidth is by how much the triangular kernel, to which the average of
	// shifted histograms tends, is wider than a normal one that smooths as much
	// (Marron & Nolan, Statistics & Probability Letters 7, 1988; from memory).
	// It goes with the rule of Scott for two dimensions, n^(-1/6) deviations.
	kernelWidth = 2.43
)

// DensityContour gives the contour that holds a share of landings at x and y;
// nil where they are too few, or all at one place.
func DensityContour(x, y []float64, share float64) *Contour {
	if len(x) < leastForContour {
		return nil
	}
	f, ok := axesOf(x, y)
	switch {
	case !ok:
		return nil
	case f.size[1] < flatter*f.size[0]:
		return stretch(f, x, y, share)
	}
	g := newGrid(f, x, y)
	at := make([]float64, len(x))
	for i := range x {
		at[i] = g.density(f.in(x[i], y[i]))
	}
	sorted := slices.Clone(at)
	slices.Sort(sorted)
	level := sorted[int((1-share)*float64(len(sorted)))]
	if level <= 0 {
		level = math.SmallestNonzeroFloat64
	}
	c := &Contour{}
	for _, d := range at {
		if d >= level {
			c.Inside++
		}
	}
	c.Inside /= float64(len(at))
	for _, loop := range g.level(level) {
		for k := range loop {
			loop[k] = f.out(loop[k])
		}
		c.Pieces = append(c.Pieces, loop)
		c.Area += shoelace(loop)
	}
	return c
}

// axes are the principal axes of landings, their deviations along them being
// the unit of each.
type axes struct {
	centre [2]float64
	way    [2][2]float64 // unit vectors
	size   [2]float64    // m, greater first
}

// axesOf is false where there is no spread.
func axesOf(x, y []float64) (f axes, ok bool) {
	cov := mat.NewSymDense(2, []float64{stat.Variance(x, nil), stat.Covariance(x, y, nil), 0, stat.Variance(y, nil)})
	var eig mat.EigenSym
	if !eig.Factorize(cov, true) {
		return f, false
	}
	var v mat.Dense
	eig.VectorsTo(&v)
	f.centre = [2]float64{stat.Mean(x, nil), stat.Mean(y, nil)}
	f.way[0] = [2]float64{v.At(0, 1), v.At(1, 1)}
	f.way[1] = [2]float64{-f.way[0][1], f.way[0][0]} // outlines keep their sense
	for k := range 2 {
		f.size[k] = math.Sqrt(math.Max(0, eig.Values(nil)[1-k]))
	}
	return f, f.size[0] > 0
}

// in gives a place by the axes, out is its inverse.
func (f *axes) in(x, y float64) [2]float64 {
	dx, dy := x-f.centre[0], y-f.centre[1]
	return [2]float64{(dx*f.way[0][0] + dy*f.way[0][1]) / f.size[0], (dx*f.way[1][0] + dy*f.way[1][1]) / f.size[1]}
}

func (f *axes) out(p [2]float64) [2]float64 {
	u, v := p[0]*f.size[0], p[1]*f.size[1]
	return [2]float64{f.centre[0] + u*f.way[0][0] + v*f.way[1][0], f.centre[1] + u*f.way[0][1] + v*f.way[1][1]}
}

// stretch is the shortest stretch of a line that holds a share of the landings
// on it.
func stretch(f axes, x, y []float64, share float64) *Contour {
	f.size[1] = 1 // not to divide by it; no landing is off the line
	along := make([]float64, len(x))
	for i := range x {
		along[i] = f.in(x[i], y[i])[0]
	}
	slices.Sort(along)
	n := int(math.Ceil(share * float64(len(along))))
	best := 0
	for i := 0; i+n <= len(along); i++ {
		if along[i+n-1]-along[i] < along[best+n-1]-along[best] {
			best = i
		}
	}
	ends := [][2]float64{f.out([2]float64{along[best]}), f.out([2]float64{along[best+n-1]})}
	return &Contour{Pieces: [][][2]float64{ends}, Line: true, Inside: float64(n) / float64(len(along))}
}

// shoelace is the area of an outline, positive where it goes round
// counterclockwise.
func shoelace(loop [][2]float64) float64 {
	sum := 0.0
	for i := range loop {
		a, b := loop[i], loop[(i+1)%len(loop)]
		sum += a[0]*b[1] - a[1]*b[0]
	}
	return sum / 2
}

// grid is the density over narrow bins, by principal axes.
type grid struct {
	low  [2]float64 // of the middle of the first bin
	step [2]float64
	n    [2]int
	f    []float64
}

func newGrid(f axes, x, y []float64) *grid {
	var p [2][]float64
	for k := range p {
		p[k] = make([]float64, len(x))
	}
	for i := range x {
		q := f.in(x[i], y[i])
		p[0][i], p[1][i] = q[0], q[1]
	}
	g := &grid{}
	var wide [2]int // bins that a kernel reaches to each side
	for k := range p {
		wide[k] = g.axis(k, p[k])
	}
	g.f = make([]float64, g.n[0]*g.n[1])
	for i := range x {
		a, b := g.bin(0, p[0][i]), g.bin(1, p[1][i])
		if a >= 0 && a < g.n[0] && b >= 0 && b < g.n[1] {
			g.f[b*g.n[0]+a]++
		}
	}
	g.smooth(0, wide[0])
	g.smooth(1, wide[1])
	return g
}

// axis lays out the bins along an axis, with empty ones at the ends.
func (g *grid) axis(k int, values []float64) int {
	sorted := slices.Clone(values)
	slices.Sort(sorted)
	dev := stat.StdDev(sorted, nil)
	// The quartiles of a normal distribution lie 1.349 deviations apart; those
	// of one with far outliers say better how wide its body is.
	if q := (quantile(sorted, 0.75) - quantile(sorted, 0.25)) / 1.349; q > 0 {
		dev = math.Min(dev, q)
	}
	reach := kernelWidth * dev * math.Pow(float64(len(values)), -1./6)
	low, high := quantile(sorted, tails), quantile(sorted, 1-tails)
	g.step[k] = math.Max(reach/shifts, (high-low)/mostBins)
	wide := max(1, int(math.Round(reach/g.step[k])))
	g.low[k] = low - float64(wide+1)*g.step[k]
	g.n[k] = int(math.Ceil((high-g.low[k])/g.step[k])) + wide + 2
	return wide
}

// bin gives the number of the bin that holds a value.
func (g *grid) bin(k int, v float64) int { return int(math.Floor((v-g.low[k])/g.step[k] + 0.5)) }

// smooth spreads each bin over its neighbours along an axis, by a triangle.
func (g *grid) smooth(k, wide int) {
	n, stride, lines, across := g.n[0], 1, g.n[1], g.n[0]
	if k == 1 {
		n, stride, lines, across = g.n[1], g.n[0], g.n[0], 1
	}
	line := make([]float64, n)
	for l := range lines {
		for i := range n {
			sum := 0.0
			for d := 1 - wide; d < wide; d++ {
				if i+d >= 0 && i+d < n {
					sum += g.f[l*across+(i+d)*stride] * (1 - math.Abs(float64(d))/float64(wide))
				}
			}
			line[i] = sum
		}
		for i, v := range line {
			g.f[l*across+i*stride] = v
		}
	}
}

// density gives the density at a place, between the middles of bins by straight
// lines; 0 off the grid.
func (g *grid) density(p [2]float64) float64 {
	u, v := (p[0]-g.low[0])/g.step[0], (p[1]-g.low[1])/g.step[1]
	i, j := int(math.Floor(u)), int(math.Floor(v))
	if i < 0 || j < 0 || i+1 >= g.n[0] || j+1 >= g.n[1] {
		return 0
	}
	u, v = u-float64(i), v-float64(j)
	return (1-v)*((1-u)*g.at(i, j)+u*g.at(i+1, j)) + v*((1-u)*g.at(i, j+1)+u*g.at(i+1, j+1))
}

func (g *grid) at(i, j int) float64 { return g.f[j*g.n[0]+i] }

// ContourTable is scatter/NAME-contour.csv: the corners of the contour, in
// order.
func ContourTable(c *Contour) *table.Table {
	var rows []corner
	for k, piece := range c.Pieces {
		for _, p := range piece {
			rows = append(rows, corner{float64(k + 1), p})
		}
	}
	return fill(cornerColumns, rows)
}

type corner struct {
	piece float64
	at    [2]float64
}

var cornerColumns = []column[corner]{
	{key: "piece", meaning: "number of the outline; a hole runs clockwise, spinward to the right and +axial up", num: func(c *corner) float64 { return c.piece }},
	{key: "plan_spinward", unit: metre, meaning: "place on the deck beneath the release, unrolled, from plumb under the release as the scenario has it", num: func(c *corner) float64 { return c.at[0] }},
	{key: "plan_axial", unit: metre, meaning: "axial place, from the release as the scenario has it", num: func(c *corner) float64 { return c.at[1] }},
}
