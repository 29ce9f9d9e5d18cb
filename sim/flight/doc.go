// Package flight moves a released body: it starts it as the scenario says,
// integrates its motion in the inertial frame, and finds where it touches the
// interior.
//
// The interior turns with the habitat; the body does not. So the distance of
// the body to the interior is taken at each instant at the body's place in
// the habitat frame, and a bound on the speed relative to the habitat bounds
// the rate of that distance, whatever the way in which the habitat turns.
package flight
