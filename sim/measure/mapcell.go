package measure

import "math"

func (c *LandMap) land(n int, f *MapFlight) {
	c.Landed++
	cell := c.touch(n, &f.First)
	cell.Landings++
	cell.Time += f.Time
	c.hits[f.First.Surface].Count++
	c.deck(f.First.Deck).Landings++
	for i := range f.Later {
		c.touch(n, &f.Later[i])
	}
	if f.Rest != nil {
		c.cell(f.Rest).Rests++
	}
}

// touch puts a touch into its cell and its surface.
func (c *LandMap) touch(n int, s *Strike) *MapCell {
	h := c.hits[s.Surface]
	if h == nil {
		h = &MapHits{Worst: Strike{Speed: math.NaN()}}
		c.hits[s.Surface] = h
	}
	h.Touches++
	if h.Touches == 1 || s.Speed > h.Worst.Speed {
		h.Worst, h.From = *s, n
	}
	cell := c.cell(&s.Spot)
	if cell.Touches++; cell.Touches == 1 || s.Speed > cell.Worst.Speed {
		cell.Worst, cell.From = *s, n
	}
	cell.Normal = math.Max(cell.Normal, s.Normal)
	if c.From < 0 || s.Speed > c.Worst.Speed {
		c.Worst, c.From = *s, n
	}
	if !(c.Normal >= s.Normal) {
		c.Normal = s.Normal
	}
	return cell
}

func (c *LandMap) deck(name string) *MapDeck {
	for i := range c.Decks {
		if c.Decks[i].Name == name {
			return &c.Decks[i]
		}
	}
	d := MapDeck{Name: name, index: map[[2]int32]int{}}
	if k, ok := c.m.DeckNamed(name); ok && c.m.FlatDeck(k) == nil {
		d.Circumference = 2 * math.Pi * c.m.Decks[k].Radius
	}
	c.Decks = append(c.Decks, d)
	return &c.Decks[len(c.Decks)-1]
}

// edgeSlack is the share of a cell by which a place may fall short of a cell's
// edge and still count as beyond it: the errors of flights, so that landings on
// an edge are not torn apart by them.
const edgeSlack = 1e-6

// cellOf numbers the cell of a place.
func (c *LandMap) cellOf(x float64) int32 { return int32(math.Floor(x/c.Map.Cell + 0.5 + edgeSlack)) }

func (c *LandMap) cell(s *Spot) *MapCell {
	d := c.deck(s.Deck)
	at := [2]int32{c.cellOf(s.Spinward), c.cellOf(s.Axial)}
	k, ok := d.index[at]
	if !ok {
		k = len(d.Cells)
		d.index[at] = k
		d.Cells = append(d.Cells, MapCell{I: at[0], J: at[1], Worst: Strike{Speed: math.NaN(), Normal: math.NaN(), Energy: math.NaN()}, From: -1})
	}
	return &d.Cells[k]
}

// CellCount is how many cells there are.
func (c *LandMap) CellCount() (n int) {
	for i := range c.Decks {
		n += len(c.Decks[i].Cells)
	}
	return n
}

// Edges gives the edges of a cell on its deck, m: low and high, spinward and
// axial. Arcs end at half a lap.
func (c *LandMap) Edges(d *MapDeck, i, j int32) (spinward, axial [2]float64) {
	a := c.Map.Cell
	half := math.Inf(1)
	if d.Circumference > 0 {
		half = d.Circumference / 2
	}
	clip := func(x float64) float64 { return math.Max(-half, math.Min(half, x)) }
	return [2]float64{clip((float64(i) - 0.5) * a), clip((float64(i) + 0.5) * a)},
		[2]float64{(float64(j) - 0.5) * a, (float64(j) + 0.5) * a}
}

// middle is the middle of a cell, and its area, m^2.
func (c *LandMap) middle(d *MapDeck, cell *MapCell) (spinward, axial, area float64) {
	x, y := c.Edges(d, cell.I, cell.J)
	return (x[0] + x[1]) / 2, (y[0] + y[1]) / 2, (x[1] - x[0]) * (y[1] - y[0])
}

// Density is the share of the flights that land in a cell for each m^2 of it.
func (c *LandMap) Density(d *MapDeck, cell *MapCell) float64 {
	_, _, area := c.middle(d, cell)
	return float64(cell.Landings) / float64(c.Flights) / area
}
