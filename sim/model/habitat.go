package model

import (
	"offplumb/sim/frame"
)

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
