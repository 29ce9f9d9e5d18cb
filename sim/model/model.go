// Package model holds a validated scenario: the habitat, its decks, the
// bodies, releases, crew paths and limits, in SI units and radians. A Model is
// made by [New], which checks it as a whole, and is immutable from then on.
//
// Package scenarios fills the plain fields of a Model from a file (any other
// program may do so too). New then checks what no key can tell by itself: that
// names are known, that decks lie in rooms, that bodies have room where they
// start. It builds the interior (package geom) and the turning of the habitat
// (package frame), and gives the model with them, or every [Problem] that it
// found, each under the key of the file where it lies. What is allowed but
// doubtful is a [Warning].
//
// A place is said as a [Station], a deck and lengths along it, as people say it;
// [Model.Resolve] makes a [Place] of it. A [Release] is a body, a place or a hand
// that carries it, a start and an end. A [Path] is a person's way, a list of
// legs. Studies ([Scatter], [LandingMap], [ThrowTo], [Spacing]) are many
// flights of one kind. A [Limit] is a criterion of the project, with its source.
//
// # Laws
//
//   - A Model is read by many goroutines at once, and nothing changes it.
//   - Nothing here reads a file, moves a body or prints.
package model

import (
	"math"

	"offplumb/sim/air"
	"offplumb/sim/frame"
	"offplumb/sim/geom"
)

// Model is a scenario. Slices are in the order of the file.
type Model struct {
	Title    string
	Habitat  Habitat
	Air      air.Air
	Decks    []Deck // Decks[0] is the reference floor once the model is made
	Rooms    []Room // further rooms, beside the habitat's own
	Passages []Passage
	Fixtures []Fixture
	Bodies   []Body
	Releases []Release
	Crews    []Crew
	Paths    []Path
	Limits   []Limit
	Spacings []Spacing
	Scatters []Scatter
	Maps     []LandingMap
	Throws   []ThrowTo
	Solver   Solver
	Output   Output

	// Made by New.
	Motion   frame.Motion   // how the habitat turns
	Interior *geom.Interior // its surfaces
	Warnings []Warning      // what the reader of the results must know

	bodyIndex map[string]int
	rates     frame.Rates
}

// Shape names the form of a room.
type Shape int

// The shapes of rooms.
const (
	Cylinder Shape = iota
	Torus
	Sphere
	Cabin
)

// Habitat is the reference room and its spin.
type Habitat struct {
	Room
	Spin    float64        // rad/s, positive: the floor moves spinward; before any change
	Changes []frame.Change // of the spin; in order of time once the model is made
	Coning  frame.Coning   // of its axis
}

// Room is a space whose walls are solid.
type Room struct {
	Name          string
	Shape         Shape
	FloorRadius   float64    // m
	Length        float64    // m, between end bulkheads; 0: none
	CeilingRadius float64    // m; 0: none
	TubeRadius    float64    // m, torus
	FlatFloor     bool       // torus
	Size          [3]float64 // m, cabin: spinward, axial, up
	Spinward      Arc        // where its middle stands
	Axial         float64    // m, of its middle
}

// Arc is a place round the circle: an arc length on the circle at hand, or an
// angle.
type Arc struct {
	Value   float64 // m, or rad
	IsAngle bool
}

// Angle gives the arc's angle (rad) on a circle of radius r (m).
func (a Arc) Angle(r float64) float64 {
	if a.IsAngle || a.Value == 0 { // on the axis too
		return a.Value
	}
	return a.Value / r
}

// Deck is a floor.
type Deck struct {
	Name        string
	Radius      float64 // m; 0 in the input: taken from Height
	Height      float64 // m above the reference floor, where Radius is 0
	Thickness   float64 // m, outward from its surface
	From, To    Arc     // spinward extent
	Whole       bool    // goes the whole way round
	Flat        bool    // a plane across the radius through its middle, Radius from the axis: see [Model.FlatDeck]
	Axial       [2]float64
	HasAxial    bool    // Axial was given, else the whole length
	Friction    float64 // NaN: the body's
	Restitution float64 // NaN: the body's
	Openings    []Opening
}

// Opening is a hole in a deck.
type Opening struct {
	Name     string
	Spinward Arc        // of its middle
	Axial    float64    // m, of its middle
	Size     [2]float64 // m: spinward, axial
	Coaming  float64    // m, height of its rim; 0: none
	Closed   bool       // a lid level with the deck
}

// Passage is a radial shaft.
type Passage struct {
	Name       string
	Spinward   Arc // on the circle at FromRadius
	Axial      float64
	FromRadius float64 // m
	ToRadius   float64 // m
	Width      float64 // m, square section; 0: round
	Diameter   float64 // m, round section
}

// FixtureKind names the form of a fixture.
type FixtureKind int

// The kinds of fixtures.
const (
	Box FixtureKind = iota
	Post
	Wall
)

// Fixture is something solid that stands in a room.
type Fixture struct {
	Name        string
	Kind        FixtureKind
	At          Station    // box: the middle of its underside
	Size        [3]float64 // m, box: spinward, axial, up
	Turn        float64    // rad, box: about the vertical, from spinward toward +axial
	From, To    Station    // post, wall
	Diameter    float64    // m, post
	Height      float64    // m, wall
	Thickness   float64    // m, wall
	Doorway     *Doorway   // wall
	Friction    float64    // NaN: the body's
	Restitution float64    // NaN: the body's
}

// Doorway is a hole in a wall, from its foot up.
type Doorway struct {
	At     float64 // m along the wall from its first station to the middle of the doorway
	Width  float64 // m
	Height float64 // m
}

// Body is what a release is made of: a sphere.
type Body struct {
	Name            string
	Mass            float64 // kg; 0: none given
	Diameter        float64 // m; 0: a point
	Restitution     float64
	Friction        float64
	Rolls           bool
	DragArea        float64 // m^2; 0: that of the sphere
	DragCoefficient float64 // 0: the law for spheres
}

// Station is a place as a scenario gives it.
type Station struct {
	Deck      string // "": the reference floor
	Room      string // "": the habitat
	Spinward  Arc
	Axial     float64 // m
	Height    float64 // m above the deck
	Radius    float64 // m from the axis, with HasRadius: instead of deck and height
	HasRadius bool
}

// MotionKind says how a release starts.
type MotionKind int

// The ways to start.
const (
	Dropped  MotionKind = iota // at rest relative to the habitat, or to what carried it
	Thrown                     // Speed, Heading, Elevation
	Velocity                   // components
	Still                      // at rest in the inertial frame
)

// Start is the motion that a release starts with, relative to the habitat.
type Start struct {
	Kind                   MotionKind
	Speed                  float64 // m/s
	Heading, Elevation     float64 // rad; heading 0 spinward, 90 deg toward +axial
	VSpinward, VAxial, VUp float64 // m/s
}

// UntilKind says when a release is done.
type UntilKind int

// The ways to end.
const (
	UntilRest UntilKind = iota
	UntilLanding
	UntilDuration
)

// Until is when a release is done.
type Until struct {
	Kind     UntilKind
	Duration float64 // s
}

// Carried says that a release is let go by a crew member under way.
type Carried struct {
	Path   string
	Time   float64 // s from the start of the path
	Every  float64 // m along the path or s, a series; 0: none
	ByTime bool    // Every is in s
	Reach  Reach
}

// Reach is a point carried along with a person: from the feet, in the local
// directions there.
type Reach struct {
	Spinward, Axial, Height float64 // m
}

// Release is an object let go.
type Release struct {
	Name    string
	Body    string // "": a point without drag
	Own     *Body  // instead of Body: one that no other release has
	At      Station
	Carried *Carried // instead of At
	Time    float64  // s, when it is let go
	Start   Start
	Until   Until
	NoTrack bool    // its landing is wanted, not its track
	Series  string  // the let-go series that it belongs to; "": none
	Along   float64 // m along the path, in a series
}

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

// Quantity is a number with its dimension, as limits have it.
type Quantity struct {
	SI   float64
	Unit string // the SI unit of its dimension, "" for a bare number
}

// Limit is an acceptance criterion of the user's project.
type Limit struct {
	Name             string
	Listed           []bool   // of each name of Of: it stands for a row of a streamed release list
	Of               []string // release.NAME, path.NAME, study.NAME, habitat; * stands for anything
	Measure          string   // table.column, without the unit
	Min, Max         *Quantity
	MaxAbs           *Quantity
	WarnMin, WarnMax *Quantity
	SurfaceIn        []string
	SurfaceNotIn     []string
	FallsThroughNot  []string
	Source           string
	Stature          float64 // m, of measures of the habitat; 0: DefaultStature
	Speed            float64 // m/s, of measures of the habitat; 0: DefaultSpeed
}

// Solver sets the accuracy of the integration.
type Solver struct {
	RelTol  float64 // relative, dimensionless
	PosTol  float64 // absolute on position, m
	VelTol  float64 // absolute on velocity, m/s
	MaxTime float64 // s, of any release
}

// Output sets what is written.
type Output struct {
	Step float64 // s, between the rows of a track
}

// Warning is something that the reader of the results must know.
type Warning struct {
	Of  string // what it is about, such as release.NAME
	Msg string
}

// Problem is a fault of a scenario. Key is the path of the value at fault,
// such as "release[2].at.height".
type Problem struct {
	Key, Msg, Hint string
}

// Defaults of the format.
const (
	DefaultThickness   = 0.05 // m, of a deck
	DefaultRestitution = 0.3  // of a body; our choice, no source
	DefaultFriction    = 0.4  // of a body; our choice, no source
	DefaultBreadth     = 0.5  // m, shoulders and kit
	DefaultStature     = 1.75 // m, of measures of the habitat; our choice, no source
	DefaultSpeed       = 1    // m/s, of measures of the habitat
	DefaultRamp        = 0.5  // s, ramp of a walk or climb
	DefaultRise        = 1    // m/s, of the head when someone stands up or sits down (common practice, no source)
	DefaultRiseRamp    = 0.45 // s, its ramp; our choice, no source
	WaistShare         = 0.55 // of stature (from memory)
	HeadShare          = 0.93 // of stature (from memory)
	DefaultRelTol      = 1e-9
	DefaultPosTol      = 1e-12   // m
	DefaultVelTol      = 1e-12   // m/s
	DefaultMaxTime     = 3600    // s
	DefaultStep        = 0.01    // s
	StandardGravity    = 9.80665 // m/s^2
)

// None marks a friction or restitution that a surface does not have.
var None = math.NaN()

// Bound is one bound of a limit with its key.
type Bound struct {
	Key string
	Quantity
}

// Bounds gives the bounds that a limit has.
func (l *Limit) Bounds() []Bound {
	var out []Bound
	add := func(key string, q *Quantity) {
		if q != nil {
			out = append(out, Bound{Key: key, Quantity: *q})
		}
	}
	add("min", l.Min)
	add("max", l.Max)
	add("max_abs", l.MaxAbs)
	add("warn_min", l.WarnMin)
	add("warn_max", l.WarnMax)
	return out
}
