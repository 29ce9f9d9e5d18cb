package main

import (
	"fmt"
	"math"
	"strings"

	"offplumb/plots"
	"offplumb/sim/flight"
	"offplumb/sim/frame"
	"offplumb/sim/measure"
	"offplumb/sim/table"
)

func (j *job) inertialView(i int) (*plots.Figure, error) {
	return plots.InertialView(j.inertialSpec(i))
}

// bothViews draws a release on board and from outside.
func (j *job) bothViews(i int) (*plots.Figure, error) {
	spec := plots.BothViewsSpec{Side: j.sideSpec(i), Inertial: j.inertialSpec(i)}
	spec.Title = spec.Side.Title
	spec.Desc = described("One release in two views above one another: on board, and from outside in the inertial frame. %s.", sentence(&j.results[i].Landing))
	spec.Notes = spec.Side.Notes + " " + strings.TrimPrefix(spec.Inertial.Notes, "Inertial frame, seen from the +axial end. ") + " Both are seen from the +axial end."
	return plots.BothViews(spec)
}

func (j *job) inertialSpec(i int) plots.InertialViewSpec {
	m, r := j.model(), &j.results[i]
	t, l := r.Track, &r.Landing
	g := measure.GroundOf(m, t)
	foot := frame.Polar{R: g.Foot(t.Start.Phi), Phi: t.Start.Phi}.Vec()
	from, to := turnedAt(m, t.Begin, t.Start.Phi), turnedAt(m, t.Begin+l.Time, t.Start.Phi)
	spec := plots.InertialViewSpec{Title: l.Release + ": from outside, in the inertial frame", Spin: m.SpinAt(t.Begin),
		Outlines: j.section(t.Start.Z, 0, plots.Point{}), Foot: plots.Point{X: foot.X, Y: foot.Y},
		ReleaseAngle: from, LandingAngle: to, Body: t.Body.Diameter / 2,
		Surface: l.Surface, Offset: l.Offset, Flat: g.Flat != nil, Notes: j.inertialNotes(t, l, to-from) + j.meanwhile(t, l.Time)}
	if g.Flat != nil {
		begin := j.seenFrom(t, l.Time)[0]
		_, _, spec.Height = g.Place(begin.pos, begin.place.Phi)
	}
	for _, at := range moments(t, j.fastest(t, l.Time), l.Time) {
		p := t.At(at).Pos
		spec.Path = append(spec.Path, plots.TrackPoint{T: at, X: p.X, Y: p.Y, Phase: t.Phases[t.PhaseAt(at)].Kind.String()})
	}
	if l.Outcome == flight.Landed {
		spec.Landing = landingOn(spec.Path, l.Time)
	}
	spec.Desc = described("View in the inertial frame from the +axial end: %s, while the habitat turns by %s deg.",
		sentence(l), table.Round(math.Abs(to-from)*180/math.Pi, 3))
	return spec
}

func (j *job) inertialNotes(t *flight.Track, l *measure.Landing, turned float64) string {
	path := "Without air the path is a straight line."
	if !j.model().Air.Vacuum() && t.Body.Diameter > 0 {
		path = "Air drag, of air that turns with the habitat, bends the path."
	}
	if !j.model().Ambient.None() {
		path = ambientWords(j.model()) + " It bends the path."
	}
	return fmt.Sprintf("Inertial frame, seen from the +axial end. %s The habitat turns by %s deg meanwhile.", path,
		table.Round(math.Abs(turned)*180/math.Pi, 3))
}
