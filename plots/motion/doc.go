// Package motion makes the moving picture of a release: on board, in the habitat frame, and
// from outside, in the inertial frame, in step. It knows no models and no physics.
//
// Player is an element of an HTML page that a reader plays, drags and steps; Script and Style
// stand once in the page, however many players it has. Animation is a picture of its own: an
// SVG that runs wherever an image does, without script.
//
// Both speak the language of the figures of [offplumb/plots]: the same inks, an open circle
// for the release, a full one for the landing, a square for the resting place, a chain line
// for a plumb line, dashes for phases other than flight.
//
// # Places
//
// All places of a film are in m about the spin axis, x spinward and y up at the release (on
// a flat floor: along the floor and along its normal), z along the axis, so that a view is
// seen from the +axial end. The inertial frame is the one that stands still; the habitat
// frame coincides with it at the release and turns by Spin times the time from then on.
//
// # What a film holds
//
// A film keeps each piece of the track (a flight, a slide, a roll, a rest) as its state at the
// start, in 64 bits, and the departure from the uniform motion that begins there, as knots in
// 32 bits between which a cubic Hermite polynomial runs. A flight in vacuum needs no knots.
// The error is measured against every state given, and stated; see [Film] for its bound.
//
// # Test hook
//
// A player's element carries what it shows as attributes: data-time (s), data-phase,
// data-habitat and data-inertial (x y z, m, places as above), data-offset and data-height (m),
// data-speed and data-inertial-speed (m/s), data-centrifugal and data-coriolis (m/s^2), and
// data-drawn, the body's place on the two drawings (x y x y, units of their viewBox). Setting
// data-seek to a time (s) and sending the element an event "film-seek" shows that time.
package motion
