package study

import (
	"math"

	"offplumb/sim/flight"
	"offplumb/sim/measure"
	"offplumb/sim/model"
)

const (
	// looser is by how much the tolerances are looser at which a release is flown
	// again, for its numerical error; loosest bounds the relative one.
	looser, loosest = 100, 0.1
	// laterShare and later, in s, are how much later than the landing the second
	// flight is given up: where it has not touched by then, the two differ.
	laterShare, later = 0.5, 0.01
)

// surer estimates the numerical error of landings, one after another.
type surer struct {
	m     *model.Model
	loose *model.Model // with loose tolerances
	flier *flight.Flier
	track flight.Track // the last one's
}

func newSurer(m *model.Model) *surer {
	loose := *m
	s := &loose.Solver
	s.RelTol = math.Max(s.RelTol, math.Min(looser*s.RelTol, loosest))
	s.PosTol, s.VelTol = looser*s.PosTol, looser*s.VelTol
	return &surer{m: m, loose: &loose, flier: flight.NewFlier(&loose)}
}

// sure puts the numerical error of a landing into it. A flight without forces
// has roundings only; what else moves is flown again at looser tolerances, up
// to its landing.
func (s *surer) sure(let *flight.Let, t *flight.Track, l *measure.Landing) {
	switch {
	case l.Outcome != flight.Landed:
		return
	case !slid(t, l.Time) && flight.NewForces(s.m, t.Body, nil).None():
		l.Error = measure.Rounding(s.m, t, l)
		return
	}
	r := *let.Release
	if r.Until = (model.Until{Kind: model.UntilLanding}); slid(t, l.Time) {
		r.Until.Kind = model.UntilRest // what it slid off it may touch once more
	}
	again := *let
	again.Release = &r
	s.loose.Solver.MaxTime = l.Time*(1+laterShare) + later
	if s.flier.FlyAgain(&s.track, &again) == nil {
		l.Error = measure.Between(s.m, t, &s.track, l)
	}
}

// slid says whether a body was in contact before a time, s.
func slid(t *flight.Track, time float64) bool {
	for i := range t.Phases {
		if p := &t.Phases[i]; p.Kind != flight.Free && p.T0 < time {
			return true
		}
	}
	return false
}
