package main

import (
	"fmt"
	"io"
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/plots"
	"offplumb/sim/flight"
	"offplumb/sim/frame"
	"offplumb/sim/measure"
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
	asked          bool // by the scenario
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
				drawing{file: name + "-side", of: "side view", name: r.Landing.Release, make: func() (*plots.Figure, error) { return j.sideView(i) }},
				drawing{file: name + "-inertial", of: "inertial view", name: r.Landing.Release, make: func() (*plots.Figure, error) { return j.inertialView(i) }})
		}
	}
	all = append(all, j.sharedFigures()...)
	all = append(all, turningFigures(j)...)
	all = append(all, outsideFigures(j)...)
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
