package scenarios

import "offplumb/sim/model"

// outside reads what becomes of what leaves the hull.
func (b *builder) outside(solver *object) {
	out := model.Outside{Follow: solver.str("outside") == "follow", Distance: solver.numOr("max_distance", model.DefaultDistance)}
	if solver.has("max_distance") && !out.Follow {
		b.fault(solver.at("max_distance"), join(solver.path, "max_distance"), `write outside = "follow" too`, "holds for releases that are followed outside")
	}
	b.in.Solver.Outside = out
}
