// Package geom is the interior of a habitat as a field of distances to named
// solid surfaces.
//
// Free space is a union of rooms and passages, less decks and fixtures. What
// bounds it is solid: hulls, ceilings, bulkheads, decks, walls and fixtures
// are pieces whose distance is exact, split around openings and mouths, and
// joined by the smallest. In free space the field is therefore the exact
// distance to the nearest solid; a mere bound would put phantom walls at
// mouths and rims, since contact is where the distance equals the body's
// radius. Membership in the rooms only decides inside from outside.
//
// Law: |d(p) - d(q)| <= |p - q| for the field and for each [Solid].
//
// Coordinates are those of the habitat frame, in m: z is the axial direction,
// r the distance from the axis and phi the angle from x toward y, which is
// spinward. Floors look inward: the top of a deck is its inner side.
//
// A new shape is a new type that implements [Solid]; nothing else changes.
package geom
