package flight

import (
	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/model"
)

// Judge holds a track against the laws of motion in contact, and tells what is
// wrong with it, and of how many forces it could judge.
func Judge(m *model.Model, t *Track) (faults []string, forces int) {
	j := newJudge(m, t)
	return j.track(), j.pushes
}

// MostSteps is the step budget of a release.
const MostSteps = mostSteps

// SpinOf is the spin of a rolling body at the start of a phase, rad/s relative
// to the habitat.
func SpinOf(p *Phase) r3.Vec { return p.spin }
