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
	Ambient  Ambient
	Air      air.Air
	Weather  Weather
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
	Outside Outside // what leaves the hull
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
