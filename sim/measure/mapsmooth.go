package measure

import "math"

// A figure shows cells between landings too, where they lie closer than a step:
// nothing was let go between two places of the grid, but could have been.

// Shades is a value for each of some cells of a deck.
type Shades struct {
	Cells  [][2]int32 // by spinward, then axial
	Values []float64
}

// MeanDensity is the share of the flights that land for each m^2, over a square
// one step wide about the middle of each cell of the footprint of a deck. Places
// a step apart leave no pattern in it.
func (c *LandMap) MeanDensity(d *MapDeck) Shades {
	weights := c.window()
	reach := int32(len(weights) / 2)
	sum := map[[2]int32]float64{}
	var landed [][2]int32
	for k := range d.Cells {
		cell := &d.Cells[k]
		if cell.Landings == 0 {
			continue
		}
		landed = append(landed, [2]int32{cell.I, cell.J})
		density := c.Density(d, cell)
		for i := -reach; i <= reach; i++ {
			for j := -reach; j <= reach; j++ {
				sum[[2]int32{cell.I + i, cell.J + j}] += density * weights[reach+i] * weights[reach+j]
			}
		}
	}
	out := Shades{Cells: c.joined(landed)}
	for _, at := range out.Cells {
		out.Values = append(out.Values, sum[at])
	}
	return out
}

// mostWindow bounds the reach of a mean, in cells: a step of a hundred cells is
// too coarse to be mended.
const mostWindow = 16

// window gives the share of a square one step wide that lies in a cell and in
// its neighbours, along one way.
func (c *LandMap) window() []float64 {
	wide := math.Max(1, c.Map.Step/c.Map.Cell)
	reach := int(math.Min(mostWindow, math.Ceil((wide-1)/2-edgeSlack)))
	out, sum := make([]float64, 2*reach+1), 0.0
	for i := range out {
		from := math.Abs(float64(i-reach)) - 0.5
		out[i] = math.Max(0, math.Min(from+1, wide/2)-math.Max(from, -wide/2))
		sum += out[i]
	}
	for i := range out {
		out[i] /= sum
	}
	return out
}

// WorstNear is a figure of the worst touch in each touched cell of a deck, and in
// the cells between them that of the worst one within a step.
func (c *LandMap) WorstNear(d *MapDeck, of func(*Strike) float64) Shades {
	var touched [][2]int32
	worst := map[[2]int32]float64{}
	for k := range d.Cells {
		if cell := &d.Cells[k]; cell.Touches > 0 {
			touched = append(touched, [2]int32{cell.I, cell.J})
			worst[[2]int32{cell.I, cell.J}] = of(&cell.Worst)
		}
	}
	reach := int32(math.Min(mostWindow, math.Floor(c.Map.Step/c.Map.Cell+edgeSlack)))
	out := Shades{Cells: c.joined(touched)}
	for _, at := range out.Cells {
		x, ok := worst[at]
		if !ok {
			x = math.NaN()
			for i := -reach; i <= reach; i++ {
				for j := -reach; j <= reach; j++ {
					if y, ok := worst[[2]int32{at[0] + i, at[1] + j}]; ok && !(x >= y) {
						x = y
					}
				}
			}
		}
		out.Values = append(out.Values, x)
	}
	return out
}
