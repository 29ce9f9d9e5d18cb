package main

import (
	"fmt"
	"io"
	"math"
	"strings"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/plots"
	"offplumb/sim/flight"
	"offplumb/sim/frame"
	"offplumb/sim/measure"
	"offplumb/sim/model"
	"offplumb/sim/table"
)

// A drawn track has about trackPoints points, and one for each turnDrawn (rad)
// that the habitat turns by, so that its laps are round; figures thin them
// further. Beyond mostPoints the laps could not be told apart.
const (
	trackPoints = 400
	turnDrawn   = math.Pi / 60
	mostPoints  = 20_000
)

// drawing is a figure to be made, with its file name less the ending.
type drawing struct {
	file, of, name string
	make           func() (*plots.Figure, error)
}

// figures lists the figures of the run, in each of the formats asked for.
func (j *job) figures() ([]task, error) {
	if j.Asked {
		return j.drawn(j.askedFigures()), nil
	}
	var all []drawing
	var names table.Namer
	for i := range j.results {
		name := names.Name(j.Lets[i].Release.Name)
		if r := &j.results[i]; j.tracked(i) {
			all = append(all,
				drawing{name + "-side", "side view", r.Landing.Release, func() (*plots.Figure, error) { return j.sideView(i) }},
				drawing{name + "-inertial", "inertial view", r.Landing.Release, func() (*plots.Figure, error) { return j.inertialView(i) }})
		}
	}
	all = append(all, j.sharedFigures()...)
	all = append(all, turningFigures(j)...)
	all = append(all, airFigures(j)...)
	all = append(all, j.pathFigures()...)
	all = append(all, j.studyFigures()...)
	all = append(all, streamFigures(j)...)
	all = append(all, scatterFigures(j)...)
	all = append(all, sweepFigures(j)...)
	all = append(all, mapFigures(j)...)
	all = append(all, throwFigures(j)...)
	all = append(all, j.askedFigures()...)
	return j.withFilms(j.drawn(all)), nil
}

func (j *job) drawn(all []drawing) []task {
	var out []task
	taken := map[string]bool{}
	for _, d := range all {
		// A release named "plan x" and a deck named "x side" would meet.
		for base, n := d.file, 2; taken[d.file]; n++ {
			d.file = fmt.Sprintf("%s-%d", base, n)
		}
		taken[d.file] = true
		j.drawings = append(j.drawings, d)
		for _, format := range j.flags.formats {
			out = append(out, task{entry: entry{File: d.file + "." + format, Of: d.of, Name: d.name},
				write: func(w io.Writer) error {
					f, err := d.make()
					if err != nil {
						return fmt.Errorf("%s of %q: %w", d.of, d.name, err)
					}
					return f.Write(w, format)
				}})
		}
	}
	return out
}

// described ends a figure's description with the caution.
func described(format string, args ...any) string {
	return fmt.Sprintf(format, args...) + " " + caution
}

// moments gives the times (s since the release) at which a track is drawn up
// to an end, in a habitat that turns at spin (rad/s) at most: its knots and
// between them.
func moments(t *flight.Track, spin, end float64) []float64 {
	out := []float64{0}
	points := math.Min(mostPoints, math.Max(trackPoints, math.Abs(spin)*end/turnDrawn))
	knots := t.Knots()
	for i := 1; i < len(knots) && knots[i-1] < end; i++ {
		knots[i] = math.Min(knots[i], end)
		n := 1 + int(points*(knots[i]-knots[i-1])/end)
		for k := 1; k <= n; k++ {
			out = append(out, knots[i-1]+(knots[i]-knots[i-1])*float64(k)/float64(n))
		}
	}
	return out
}

// seen is where a body is in the habitat at a moment.
type seen struct {
	t     float64
	pos   r3.Vec
	place frame.Polar // Phi counts from the release, and is not wrapped
	phase string
}

func (j *job) seenFrom(t *flight.Track, end float64) []seen {
	m := j.model()
	w := measure.NewWinding(m, t)
	var out []seen
	for _, at := range moments(t, j.fastest(t, end), end) {
		a := m.Motion.At(t.Begin + at)
		pos := a.In(t.At(at).Pos)
		p := frame.PolarOf(pos)
		p.Phi = w.To(at)
		out = append(out, seen{at, pos, p, t.Phases[t.PhaseAt(at)].Kind.String()})
	}
	return out
}

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
	case l.Outcome == flight.Lost:
		return "leaves the habitat after " + withUnit(l.Time, "s")
	case l.Outcome == flight.TimeUp:
		return "no landing within " + withUnit(l.Time, "s")
	case math.IsNaN(l.Offset) || sigfig(l.Offset, 3) == "0":
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
	s := fmt.Sprintf("Habitat frame. Apparent gravity at rest on %q: %s g.", on.Name, table.Round(l.Uniform.Gravity/model.StandardGravity, 3))
	switch {
	case !l.Uniform.Lands:
	case l.Uniform.Top() >= on.Radius:
		s += " The path under uniform gravity of that strength would rise beyond the axis and is not drawn."
	default:
		s += " Dashed: the same release under uniform gravity of that strength, without air."
	}
	return s
}

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
	return fmt.Sprintf("Inertial frame, seen from the +axial end. %s The habitat turns by %s deg meanwhile.", path,
		table.Round(math.Abs(turned)*180/math.Pi, 3))
}
