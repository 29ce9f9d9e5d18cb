// Package flight moves a released body: it starts it as the scenario says,
// integrates its motion in the inertial frame, and finds where it touches the
// interior.
//
// The interior turns with the habitat; the body does not. So the distance of
// the body to the interior is taken at each instant at the body's place in
// the habitat frame, and a bound on the speed relative to the habitat bounds
// the rate of that distance, whatever the way in which the habitat turns.
//
// [Release] gives a [Let]: the body, and its state where it is let go. A
// [Flier] moves it and gives a [Track]: phases (flight, slide, roll, rest) that
// are joined by impacts, each phase with its continuous motion, so that a track
// can be asked at any time. [Forces] are drag and any [Field] of acceleration.
//
//	free.go    flight between touches, as a departure from uniform motion
//	contact.go where it touches: the gap, its rate, and the search along a step
//	impact.go  the rebound: normal restitution and Coulomb's friction
//	press.go   the forces of what a body is pressed on
//	slide.go   sliding and rolling in the habitat's frame
//	follow.go  which phase comes after which, until rest
//	watch.go   what rests while the spin changes
//
// # Laws
//
//   - Without forces flight is exact; with them the tolerances hold for what
//     the forces do, in a habitat of any size.
//   - No solid is stepped over, however thin.
//   - An impact gives no energy in the frame of the surface.
package flight
