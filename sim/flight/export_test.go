package flight

import "offplumb/sim/model"

// Judge holds a track against the laws of motion in contact, and tells what is
// wrong with it, and of how many forces it could judge.
func Judge(m *model.Model, t *Track) (faults []string, forces int) {
	j := newJudge(m, t)
	return j.track(), j.pushes
}

// MostSteps is the step budget of a release.
const MostSteps = mostSteps
