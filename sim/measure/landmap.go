package measure

import (
	"math"
	"slices"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/flight"
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

// LetVelocity is a velocity (m/s) along the directions of the floor beneath a
// place, in habitat components.
func LetVelocity(m *model.Model, p model.Place, v r3.Vec) r3.Vec {
	return m.LocalAt(p.Polar).Vec(v.X, v.Y, v.Z)
}

// Stand describes a place by the deck or flat floor beneath it: its name, and
// the arc, or straight length, and axial place there, m.
func Stand(m *model.Model, p model.Place) (name string, spinward, axial float64) {
	at, name, arc := stand(m, p.Vec())
	return name, arc, at.Z
}
