package scenarios

import "offplumb/sim/model"

// outside reads what becomes of what leaves the hull.
func (b *builder) outside(solver *object) {
	var out model.Outside
	if solver.str("outside") == "follow" {
		out = model.Outside{Follow: true, Distance: solver.numOr("max_distance", model.DefaultDistance)}
	} else if solver.has("max_distance") {
		b.fault(solver.at("max_distance"), join(solver.path, "max_distance"), `write outside = "follow" too`, "holds for releases that are followed outside")
	}
	b.in.Solver.Outside = out
}
