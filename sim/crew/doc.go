// Package crew works out crew paths: where a person's feet, waist and head
// are at each time, and what the structure must do to hold the person there.
//
// A path is a chain of legs. [NewPlan] joins them; [Plan.At] gives the feet,
// [Feet.Point] any point of the body, [Plan.Loads] the loads. Each leg is a
// way in space (walks along the ring, climbs along a radius or a straight
// stair, rides) and a profile of speed along it. A [Plan] also tells how near
// the person, a capsule round the line from feet to head, comes to every surface.
//
// The load is the specific force that the support must give,
//
//	f = a + 2 w x v + w x (w x r) + dw/dt x r
//
// with place, velocity and acceleration in the habitat's frame (Goldstein,
// Classical Mechanics, section 4.10; from memory). What a person feels as
// gravity is -f.
//
// # Laws
//
//   - Place is continuous over the joints of legs, and velocity too unless a
//     ramp is 0.
//   - At rest on a deck apparent gravity is w^2 R along the radius.
package crew
