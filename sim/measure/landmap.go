package measure

import (
	"math"
	"slices"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/flight"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// LandMap gathers the flights of a landing map, a cell at a time, so that their
// tracks need not be kept. Flights are numbered by place, then height, then
// direction; they are added in this order, so that all sums are the same for any
// number of workers. SI units; NaN where there is no value.
type LandMap struct {
	Map        *model.LandingMap
	Patches    []model.Patch
	Directions []r3.Vec // unit vectors, X spinward, Y axial, Z up; zero: dropped

	Places  int     // those asked for, at every height
	Skipped []Share // of them, those where the body has no room, by reason
	Flights int     // computed
	Landed  int
	Late    int // their time ended
	Gone    int // left the habitat
	Failed  int // could not be computed
	Why     string
	Work    flight.Work

	Decks    []MapDeck // with landings, in the order that flights came to them
	Surfaces []MapHits // first touched, or touched later, in the order of the model
	Openings []Share   // fallen through, of the flights
	Through  Share     // any of them
	Goals    []Share   // reached, of the flights
	Worst    Strike    // of all touches
	Normal   float64   // m/s, greatest speed along a normal
	From     int       // number of the flight of Worst

	m       *model.Model
	offsets []int // of the places of each patch
	skipped map[string]int
	through int
	hits    map[string]*MapHits
	passed  map[string]int
	reached [][]uint16 // of each goal: directions by place and height
	free    []bool     // of each place and height: the body has room there
	zones   []model.Zone
}

// MapDeck is a deck, or a flat floor, with the cells that were landed in.
type MapDeck struct {
	Name          string
	Circumference float64 // m, of a deck about the axis; 0: flat
	Landings      int
	Cells         []MapCell // by spinward, then axial
	index         map[[2]int32]int
}

// MapCell is a square of a deck. Its middle stands at a whole number of cells
// from spinward and axial zero.
type MapCell struct {
	I, J     int32 // spinward, axial
	Landings int
	Rests    int
	Touches  int     // landings, and impacts after them
	Time     float64 // s, sum of those of the landings
	Worst    Strike  // of the touches
	Normal   float64 // m/s, greatest speed along the normal
	From     int     // number of the flight of Worst
}

// MapHits is what a surface got.
type MapHits struct {
	Share       // of the flights, that touched it first
	Touches int // and later
	Worst   Strike
	From    int
}

// Spot is a place on a plan.
type Spot struct {
	Deck            string
	Spinward, Axial float64 // m
	Surface         string
}

// Strike is a touch.
type Strike struct {
	Spot
	Speed, Normal, Energy float64 // m/s, m/s, J
}

// MapFlight is what one flight of a landing map did.
type MapFlight struct {
	Fate    Fate
	Why     string // it has no result
	Time    float64
	First   Strike
	Later   []Strike
	Rest    *Spot // nil: it did not come to rest, or was not followed
	Through []string
	Work    flight.Work
}

// NewLandMap makes a map without flights.
func NewLandMap(m *model.Model, l *model.LandingMap, patches []model.Patch, directions []r3.Vec) *LandMap {
	c := &LandMap{Map: l, Patches: patches, Directions: directions, m: m, From: -1, hits: map[string]*MapHits{}, passed: map[string]int{}, skipped: map[string]int{}}
	nan := math.NaN()
	c.Worst, c.Normal = Strike{Speed: nan, Normal: nan, Energy: nan}, nan
	for i := range patches {
		c.offsets = append(c.offsets, c.Places)
		c.Places += patches[i].Count()
	}
	c.Places *= len(l.Heights)
	c.free = make([]bool, c.Places)
	for i := range l.Goals {
		c.reached = append(c.reached, make([]uint16, c.Places))
		var z model.Zone
		if l.Goals[i].Zone != nil {
			z = m.ZoneOf(l.Goals[i].Zone)
		}
		c.zones = append(c.zones, z)
	}
	return c
}

// Place gives the place of a number: places at each height.
func (c *LandMap) Place(n int) model.Place {
	k, h := n/len(c.Map.Heights), c.Map.Heights[n%len(c.Map.Heights)]
	i := len(c.offsets) - 1
	for c.offsets[i] > k {
		i--
	}
	return c.Patches[i].Place(c.m, k-c.offsets[i], h)
}

// Start is where and how a flight is let go: as a station, and the velocity
// (m/s) relative to the habitat along the local directions.
func (c *LandMap) Start(n int) (at Spot, height float64, v r3.Vec) {
	p, deck, arc := stand(c.m, c.Place(n/len(c.Directions)).Vec())
	return Spot{Deck: deck, Spinward: arc, Axial: p.Z}, p.Height, r3.Scale(c.Map.Speed, c.Directions[n%len(c.Directions)])
}

// Fly measures a track of a flight.
func (c *LandMap) Fly(t *flight.Track) MapFlight {
	l := Land(c.m, t)
	f := MapFlight{Time: l.Time, Through: l.AllThrough, Work: t.Work}
	switch l.Outcome {
	case flight.Lost:
		f.Fate = ShotLost
		return f
	case flight.TimeUp:
		f.Fate = ShotTime
		return f
	}
	f.First = Strike{Spot{l.Deck, l.Arc, l.Place.Z, l.Surface}, l.Speed, l.NormalSpeed, l.Energy}
	if c.Map.Until == model.UntilRest {
		c.after(t, &f)
	}
	return f
}

// after follows a flight beyond its landing.
func (c *LandMap) after(t *flight.Track, f *MapFlight) {
	if t.Outcome == flight.Rested || t.Outcome == flight.Stuck {
		a := c.m.Motion.At(t.Begin + t.End)
		p, deck, arc := stand(c.m, a.ToHabitat(t.Last).Pos)
		f.Rest = &Spot{deck, arc, p.Z, endSurface(t)}
	}
	first := true
	for _, e := range Events(c.m, t) {
		if e.Kind != Impact {
			continue
		}
		if !first {
			f.Later = append(f.Later, Strike{Spot{e.Deck, e.Arc, e.Place.Z, e.Surface}, e.Speed, e.NormalSpeed, e.Energy})
		}
		first = false
	}
}

// Skip notes that the body has no room at a place and height, and why.
func (c *LandMap) Skip(why string) { c.skipped[why]++ }

// Add adds flight n. Flights are added in the order of their numbers.
func (c *LandMap) Add(n int, f *MapFlight) {
	c.free[n/len(c.Directions)] = true
	c.Work.Steps, c.Work.Rejected, c.Work.Derivs = c.Work.Steps+f.Work.Steps, c.Work.Rejected+f.Work.Rejected, c.Work.Derivs+f.Work.Derivs
	if f.Fate == ShotFailed {
		if c.Failed++; c.Why == "" {
			c.Why = f.Why
		}
		return
	}
	c.Flights++
	for _, o := range f.Through {
		c.passed[o]++
	}
	if len(f.Through) > 0 {
		c.through++
	}
	for g := range c.reached {
		if c.reaches(g, f) {
			c.reached[g][n/len(c.Directions)]++
		}
	}
	switch f.Fate {
	case ShotTime:
		c.Late++
	case ShotLost:
		c.Gone++
	default:
		c.land(n, f)
	}
}

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

// reaches says whether a flight reaches a goal.
func (c *LandMap) reaches(goal int, f *MapFlight) bool {
	g := &c.Map.Goals[goal]
	if g.Opening != "" {
		return slices.Contains(f.Through, g.Opening)
	}
	if f.Fate != ShotLanded {
		return false
	}
	hit := func(s *Spot) bool {
		if len(g.Surfaces) > 0 {
			return slices.Contains(g.Surfaces, s.Surface)
		}
		z := &c.zones[goal]
		round := 0.0
		if c.m.FlatDeck(z.Deck) == nil {
			round = 2 * math.Pi * c.m.Decks[z.Deck].Radius
		}
		return s.Deck == c.m.Decks[z.Deck].Name && z.Holds(s.Spinward, s.Axial, round)
	}
	return hit(&f.First.Spot) || f.Rest != nil && hit(f.Rest)
}

// Finish sorts the cells and works out the shares, once all flights are added.
func (c *LandMap) Finish() {
	for i := range c.Decks {
		slices.SortFunc(c.Decks[i].Cells, func(a, b MapCell) int {
			if a.I != b.I {
				return int(a.I) - int(b.I)
			}
			return int(a.J) - int(b.J)
		})
		c.Decks[i].index = nil
	}
	slices.SortStableFunc(c.Decks, func(a, b MapDeck) int { return b.Landings - a.Landings })
	for _, s := range c.m.Interior.Surfaces() {
		if h := c.hits[s.Name]; h != nil {
			h.Share = shareOf(s.Name, h.Count, c.Flights)
			c.Surfaces = append(c.Surfaces, *h)
			delete(c.hits, s.Name) // a name that several surfaces have counts once
		}
	}
	for i := range c.m.Decks {
		for _, o := range c.m.Decks[i].Openings {
			if !o.Closed {
				c.Openings = append(c.Openings, shareOf(o.Name, c.passed[o.Name], c.Flights))
			}
		}
	}
	c.Through = shareOf("any opening", c.through, c.Flights)
	c.leave()
	for g := range c.reached {
		n := 0
		for _, k := range c.reached[g] {
			n += int(k)
		}
		c.Goals = append(c.Goals, shareOf(c.Map.Goals[g].Name, n, c.Flights))
	}
}

// leave counts the places left out, by reason.
func (c *LandMap) leave() {
	for why, n := range c.skipped {
		c.Skipped = append(c.Skipped, Share{Name: why, Count: n, Share: float64(n) / float64(c.Places), Low: math.NaN(), High: math.NaN()})
	}
	slices.SortFunc(c.Skipped, byCount) // a map has no order
}

// SkippedPlaces is how many places at a height were left out.
func (c *LandMap) SkippedPlaces() (n int) {
	for i := range c.Skipped {
		n += c.Skipped[i].Count
	}
	return n
}

// Reached is the share of the directions from a place and height (by its
// number) that reach a goal; NaN where the body has no room.
func (c *LandMap) Reached(goal, place int) float64 {
	if !c.free[place] {
		return math.NaN()
	}
	return float64(c.reached[goal][place]) / float64(len(c.Directions))
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

// LetVelocity is a velocity (m/s) along the local directions at a place, in
// habitat components.
func LetVelocity(p model.Place, v r3.Vec) r3.Vec { return frame.LocalAt(p.Phi).Vec(v.X, v.Y, v.Z) }

// Stand describes a place by the deck or flat floor beneath it: its name, and
// the arc, or straight length, and axial place there, m.
func Stand(m *model.Model, p model.Place) (name string, spinward, axial float64) {
	at, name, arc := stand(m, p.Vec())
	return name, arc, at.Z
}

// MostReached is, for each place of each patch, the greatest share of the
// directions that reach a goal, of all heights; NaN where the body has room at
// none.
func (c *LandMap) MostReached(goal int) [][]float64 {
	out := make([][]float64, len(c.Patches))
	n := 0
	for i := range c.Patches {
		out[i] = make([]float64, c.Patches[i].Count())
		for k := range out[i] {
			best := math.NaN()
			for range c.Map.Heights {
				if x := c.Reached(goal, n); !(x <= best) && !math.IsNaN(x) {
					best = x
				}
				n++
			}
			out[i][k] = best
		}
	}
	return out
}
