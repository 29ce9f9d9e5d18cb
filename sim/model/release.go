package model

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
