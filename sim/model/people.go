package model

// Crew is a person.
type Crew struct {
	Name    string
	Mass    float64 // kg, with kit
	Stature float64 // m
	Breadth float64 // m, shoulders and kit
	Waist   float64 // height of the waist as a share of stature
	Head    float64 // height of the head (inner ear) as a share of stature
}

// LegKind names a kind of leg.
type LegKind int

// The kinds of legs.
const (
	Walk LegKind = iota
	Stand
	Climb
	Descend
	TurnHead
	StandUp
	SitDown
	Turn
	Ride
)

// Direction is one of the four ways to face on a deck.
type Direction int

// The ways to face.
const (
	Spinward Direction = iota
	Antispinward
	PlusAxial
	MinusAxial
)

// Leg is one piece of a crew path.
type Leg struct {
	Kind     LegKind
	Spinward *Arc     // walk: where to on the deck at hand; nil: as it is
	Axial    *float64 // walk: where to, m; nil: as it is
	Laps     float64  // walk: times round, spinward positive, in place of Spinward
	Speed    float64  // m/s, walk, climb, descend; of the head: stand up, sit down
	Ramp     float64  // s, at both ends
	Distance float64  // m: climb and descend; stand up and sit down: by which the head rises or sinks
	Duration float64  // s, stand and turn of the head
	Facing   Direction
	Angle    float64 // rad, turn of the head or of the body, by the right-hand rule about the axis: about the vertical, to the left
	About    Axis

	Pitch     float64 // rad, climb and descend: of the ladder above the deck; 0: a radial one
	HeadFirst bool    // climb and descend: the head goes outward
	Through   string  // climb and descend: the opening that the way leads through
	Trapezoid bool    // the speed grows and falls steadily, instead of smoothly
	Up        float64 // m, ride: toward the axis, negative: away
	Round     *Arc    // ride: along the ring, at the radius of the feet
}

// Axis is what the head turns about.
type Axis int

// The axes of a turn of the head.
const (
	AboutVertical Axis = iota
	AboutSpinward
	AboutAxial
)

// Path is a person's motion.
type Path struct {
	Name  string
	Crew  string
	Start Station
	Legs  []Leg
	Time  float64 // s, when it starts
	Carry Carry

	GravityLevels []float64 // m/s^2, below and above which the time is wanted
}

// Carry is a mass that a person holds.
type Carry struct {
	Mass float64 // kg; 0: nothing
	At   Reach
}

// Spacing asks for the platforms or nets of a passage that keep the speed of a
// falling body below a limit.
type Spacing struct {
	Name     string
	Passage  string
	Body     string
	MaxSpeed float64 // m/s, at any contact
	Source   string
}
