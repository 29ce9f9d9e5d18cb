package model

import "gonum.org/v1/gonum/spatial/r3"

// Outside says what becomes of what leaves the hull. The zero value ends its
// release there, as lost.
type Outside struct {
	Follow   bool
	Distance float64 // m, from the place in the habitat where it was let go: beyond, it is lost
}

// DefaultDistance is the distance, m, up to which a release is followed
// outside unless the scenario says.
const DefaultDistance = 1000

// IsOutside says whether a point (m, habitat components) lies outside of the
// hull, in a scenario that follows releases there. No air is outside.
func (m *Model) IsOutside(pos r3.Vec) bool {
	return m.Solver.Outside.Follow && m.Interior.Beyond(pos) > 0
}
