package model

// LandingMap asks where a body lands that is let go anywhere over a region, at
// several heights, with the speed of a careless hand in all directions.
type LandingMap struct {
	Name       string
	Body       string // "": a point without drag
	Over       Region
	Heights    []float64 // m, of the body's centre above the deck or the top of the fixture
	Speed      float64   // m/s, in all directions; 0: dropped
	Directions int       // how many; 1 without speed
	Step       float64   // m, between the places
	Cell       float64   // m, of the map
	Until      UntilKind // a landing or rest
	Goals      []Goal    // which of them is reached, from where
}

// Region is a patch of a deck, or the tops of fixtures.
type Region struct {
	Deck        string  // "": the reference floor
	Spinward    *[2]Arc // extent; nil: the whole of the deck
	Axial       *[2]float64
	Fixtures    []string // in place of a patch
	HasFixtures bool
}

// Goal is what a body of a landing map may reach: an opening that it falls
// through, surfaces, or a zone of a deck that it lands over.
type Goal struct {
	Name     string
	Opening  string   // "": another kind
	Surfaces []string // nil: another kind
	Zone     *Region
}

// MostFlights is how many flights a landing map may have: some minutes on one
// core for each million.
const MostFlights = 10_000_000

// DefaultDirections is how many directions a careless hand has: those of the
// twelve corners of an icosahedron and of the middles of its thirty edges.
const DefaultDirections = 42

// MostDirections bounds the directions: a tenth of a radian lies between those
// of 1002.
const MostDirections = 1002

// Flights is how many flights the places of some patches make.
func (l *LandingMap) Flights(patches []Patch) float64 {
	n := 0.0
	for i := range patches {
		n += float64(patches[i].N[0]) * float64(patches[i].N[1])
	}
	return n * float64(len(l.Heights)) * float64(l.Directions)
}
