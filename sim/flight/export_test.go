package flight

import "offplumb/sim/model"

// Judge holds a track against the laws of motion in contact, and tells what is
// wrong with it.
func Judge(m *model.Model, t *Track) []string { return newJudge(m, t).track() }

// MostSteps is the step budget of a release.
const MostSteps = mostSteps
