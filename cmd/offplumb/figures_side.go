package main

import (
	"fmt"
	"math"

	"offplumb/plots"
	"offplumb/sim/flight"
	"offplumb/sim/measure"
	"offplumb/sim/model"
	"offplumb/sim/table"
)

// onSide gives the place of a side view: x spinward and y up from the foot of
// the plumb line on a deck of radius r (m); angle phi from the plumb line.
func onSide(r, dist, phi float64) plots.Point {
	sin, cos := math.Sincos(phi)
	return plots.Point{X: dist * sin, Y: r - dist*cos}
}

// side is how a side view looks at a release: from the foot of its plumb line,
// with the floor below.
type side struct {
	measure.Ground
	deck float64 // m, radius of the deck; 0 of a flat floor
	foot float64 // m, along a flat floor, of the plumb foot
	turn float64 // rad, of outlines
	by   plots.Point
}

func (j *job) sideOf(t *flight.Track) side {
	s := side{Ground: measure.GroundOf(j.model(), t)}
	if f := s.Flat; f != nil {
		s.foot = f.Radius * math.Tan(t.Start.Phi-f.Phi)
		s.turn, s.by = -math.Pi/2-f.Phi, plots.Point{X: -s.foot, Y: f.Radius}
		return s
	}
	s.deck = s.Radius
	s.turn, s.by = -math.Pi/2-t.Start.Phi, plots.Point{Y: s.Radius}
	return s
}

// point gives the place of a side view of a body that is seen.
func (s *side) point(at seen) plots.Point {
	if s.Flat != nil {
		x, _, h := s.Place(at.pos, 0)
		return plots.Point{X: x - s.foot, Y: h}
	}
	return onSide(s.deck, at.place.R, at.place.Phi)
}

// uniform gives the uniform-gravity path, which is one over a flat deck, bent
// onto a curved one. One that rises to the axis cannot be drawn so.
func (s *side) uniform(u *measure.Uniform) []plots.Point {
	if !u.Lands || u.Top() >= s.Radius {
		return nil
	}
	var out []plots.Point
	for k := 0.0; k <= trackPoints; k++ {
		along, _, h := u.At(u.Time * k / trackPoints)
		if s.Flat == nil {
			out = append(out, onSide(s.deck, s.deck-h, along/s.deck))
			continue
		}
		// On a flat floor it falls along the plumb line, which leans.
		sin, cos := math.Sincos(s.Start.Phi - s.Flat.Phi)
		out = append(out, plots.Point{X: cos*along - sin*h, Y: sin*along + cos*h})
	}
	return out
}

func (j *job) sideView(i int) (*plots.Figure, error) { return plots.SideView(j.sideSpec(i)) }

func (j *job) sideSpec(i int) plots.SideViewSpec {
	m, r := j.model(), &j.results[i]
	t, l := r.Track, &r.Landing
	s := j.sideOf(t)
	spec := plots.SideViewSpec{Title: sideTitle(l), Spin: m.SpinAt(t.Begin), Deck: s.deck, Body: t.Body.Diameter / 2,
		Outlines: j.section(t.Start.Z, s.turn, s.by), Surface: l.Surface, Offset: l.Offset, Deflection: l.Deflection,
		Notes: j.sideNotes(l, &s) + j.meanwhile(t, t.End), Uniform: s.uniform(&l.Uniform)}
	for _, at := range j.seenFrom(t, t.End) {
		p := s.point(at)
		spec.Track = append(spec.Track, plots.TrackPoint{T: at.t, X: p.X, Y: p.Y, Phase: at.phase})
	}
	if l.Outcome == flight.Landed {
		spec.Landing = landingOn(spec.Track, l.Time)
	}
	if o := r.Rest.Outcome; (o == flight.Rested || o == flight.Stuck) && t.End > l.Time {
		spec.Rest = landingOn(spec.Track, t.End)
	}
	spec.Desc = described("Side view in the habitat frame, seen from the +axial end: %s.", sentence(l))
	return spec
}

// landingOn gives the point of a drawn track at a time, which is one of its
// moments.
func landingOn(track []plots.TrackPoint, time float64) *plots.Point {
	for i := range track {
		if track[i].T >= time {
			return &plots.Point{X: track[i].X, Y: track[i].Y}
		}
	}
	return nil
}

func sideTitle(l *measure.Landing) string { return l.Release + ": " + outcomeWords(l) }

// outcomeWords tells a landing in a few words.
func outcomeWords(l *measure.Landing) string {
	switch {
	case l.Outcome == flight.Lost && l.Away > 0:
		return "lost outside, " + withUnit(l.Away, "m") + " away after " + withUnit(l.Time, "s")
	case l.Outcome == flight.Lost:
		return "leaves the habitat after " + withUnit(l.Time, "s")
	case l.Outcome == flight.TimeUp:
		return "no landing within " + withUnit(l.Time, "s")
	case math.IsNaN(l.Offset):
		return "lands on " + l.Surface
	case sigfig(l.Offset, 3) == "0":
		return "lands on " + l.Surface + ", on the plumb line"
	}
	return "lands on " + l.Surface + ", " + plots.SignedLength(l.Offset) + " off plumb"
}

// sentence tells a landing with its figures.
func sentence(l *measure.Landing) string {
	s := sideTitle(l) + ", after " + withUnit(l.Time, "s") + " at " + withUnit(l.Speed, "m/s")
	if l.Outcome == flight.Landed && !math.IsNaN(l.Deflection) {
		s += "; apparent deflection " + plots.SignedLength(l.Deflection)
	}
	return s
}

func (j *job) sideNotes(l *measure.Landing, on *side) string {
	s := fmt.Sprintf("Habitat frame. Apparent gravity at rest on %q%s: %s g.", on.Name, j.plumbPart(), table.Round(l.Uniform.Gravity/model.StandardGravity, 3))
	switch {
	case !l.Uniform.Lands:
	case l.Uniform.Top() >= on.Radius:
		s += " The path under uniform gravity of that strength would rise beyond the axis and is not drawn."
	default:
		s += " Dashed: the same release under uniform gravity of that strength, without air."
	}
	return s
}
