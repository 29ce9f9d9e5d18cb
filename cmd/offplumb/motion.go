package main

import (
	"context"
	"fmt"
	"html/template"
	"io"
	"math"
	"slices"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/plots"
	"offplumb/plots/motion"
	"offplumb/sim/flight"
	"offplumb/sim/frame"
	"offplumb/sim/measure"
	"offplumb/sim/table"
)

// withFilms adds the moving pictures to the figures, which have their file names: only an
// SVG moves.
func (j *job) withFilms(all []task) []task {
	if !slices.Contains(j.flags.formats, "svg") {
		return all
	}
	taken := map[string]bool{}
	for i := range all {
		taken[all[i].File] = true
	}
	var names table.Namer
	for i := range j.results {
		base := names.Name(j.Lets[i].Release.Name) + "-motion"
		if !j.tracked(i) {
			continue
		}
		file := base + ".svg"
		for n := 2; taken[file]; n++ {
			file = fmt.Sprintf("%s-%d.svg", base, n)
		}
		taken[file] = true
		all = append(all, task{entry: entry{File: file, Of: "moving picture", Name: j.Lets[i].Release.Name},
			write: func(w io.Writer) error {
				f, err := j.film(i)
				if err != nil {
					return err
				}
				return motion.Animation(w, f)
			}})
	}
	return all
}

// films are the players of the first releases that have a card in the report,
// by their index. The others have their moving pictures beside it.
func (j *job) films(ctx context.Context) (map[int]template.HTML, error) {
	out := map[int]template.HTML{}
	if j.flags.noFigures {
		return out, nil
	}
	for i := range j.results {
		if len(out) == figuresInReport {
			break
		}
		if !j.tracked(i) || j.inSeries(j.Lets[i].Release.Name) {
			continue
		}
		if ctx.Err() != nil {
			return nil, context.Cause(ctx)
		}
		f, err := j.film(i)
		if err != nil {
			return nil, err
		}
		if out[i], err = motion.Player(f); err != nil {
			return nil, err
		}
	}
	return out, nil
}

// film fills the moving picture of a tracked release.
func (j *job) film(i int) (*motion.Film, error) {
	m, r := j.model(), &j.results[i]
	t, l := r.Track, &r.Landing
	if !j.tracked(i) {
		return nil, fmt.Errorf("release %q has no track", j.Lets[i].Release.Name)
	}
	g := measure.GroundOf(m, t)
	f := &motion.Film{Name: l.Release, Title: sideTitle(l), Notes: j.filmNotes(t),
		Spin: m.Habitat.Spin, Radius: g.Radius, Body: t.Body.Diameter / 2, Step: m.Output.Step,
		Desc: described("Moving picture in the habitat frame and, in step, in the inertial frame, both seen from the +axial end: %s.", sentence(l))}
	down := t.Start.Phi // of what points down on the drawing
	if g.Flat != nil {
		f.Flat, f.Lean, f.Axial = true, t.Start.Phi-g.Flat.Phi, g.Flat.Z
		down = g.Flat.Phi
	}
	f.Outlines = j.section(t.Start.Z, -math.Pi/2-down, plots.Point{})
	f.Pieces = filmPieces(t, -math.Pi/2-down-m.Habitat.Spin*t.Begin)
	f.Events = filmEvents(r.Events, l, t)
	f.Uniform = filmUniform(&l.Uniform, &g)
	return f, nil
}

func (j *job) filmNotes(t *flight.Track) string {
	if !j.model().Ambient.None() {
		return ambientWords(j.model())
	}
	if j.model().Air.Vacuum() || t.Body.Diameter == 0 {
		return "Without air a flight is a straight line in the inertial frame."
	}
	return "Drag of the air, which turns with the habitat, bends the flight in the inertial frame."
}

// filmParts is how often a track is sampled within an integration step, which is smooth and
// known to a fourth-order polynomial.
const filmParts = 48

// filmPieces gives the states of a track, turned about the axis by an angle (rad). At a
// joint of phases a track gives the earlier one, at its ends what it began and ended with:
// phases are sampled just within their own ends, and what differs at the ends is a piece of
// no duration, so that the film tells of each moment what the table tells.
func filmPieces(t *flight.Track, turn float64) (out []motion.Piece) {
	add := func(kind flight.Kind, states ...motion.State) {
		out = append(out, motion.Piece{Phase: kind.String(), States: states})
	}
	n := len(t.Phases)
	if n == 0 {
		add(flight.Rest, filmState(t.First, 0, turn))
		return out
	}
	for i := range t.Phases {
		p := &t.Phases[i]
		if p.T1 == p.T0 {
			continue
		}
		states := phaseStates(t, p, turn)
		if first := filmState(t.First, 0, turn); p.T0 <= 0 && states[0].Vel != first.Vel {
			add(p.Kind, first)
		}
		add(p.Kind, states...)
	}
	last := filmState(t.Last, t.End, turn)
	if k := len(out) - 1; k < 0 || t.Phases[n-1].T1 == t.Phases[n-1].T0 || out[k].States[len(out[k].States)-1].Vel != last.Vel {
		add(t.Phases[n-1].Kind, last)
	}
	return out
}

// phaseStates samples a phase.
func phaseStates(t *flight.Track, p *flight.Phase, turn float64) []motion.State {
	inside := func(at float64) frame.State {
		return t.At(math.Max(math.Nextafter(p.T0, math.Inf(1)), math.Min(at, math.Nextafter(p.T1, 0))))
	}
	out := []motion.State{filmState(inside(p.T0), p.T0, turn)}
	knots := p.Knots()
	for k := 1; k < len(knots); k++ {
		for n := 1.0; n <= filmParts && knots[k] > knots[k-1]; n++ {
			at := knots[k-1] + (knots[k]-knots[k-1])*n/filmParts
			if n == filmParts {
				at = knots[k] // to the last digit
			}
			out = append(out, filmState(inside(at), at, turn))
		}
	}
	return out
}

func filmState(s frame.State, at, turn float64) motion.State {
	return motion.State{T: at, Pos: turnedBy(s.Pos, turn), Vel: turnedBy(s.Vel, turn)}
}

func turnedBy(v r3.Vec, a float64) [3]float64 {
	sin, cos := math.Sincos(a)
	return [3]float64{cos*v.X - sin*v.Y, sin*v.X + cos*v.Y, v.Z}
}

// filmEvents lists what a reader wants to see of a track.
func filmEvents(events []measure.Event, l *measure.Landing, t *flight.Track) []motion.Event {
	out := []motion.Event{{T: 0, Name: "release", Kind: motion.Release}}
	if l.Outcome == flight.Landed {
		out = append(out, motion.Event{T: l.Time, Name: "lands on " + l.Surface, Kind: motion.Landing})
	}
	for i := range events {
		if e := &events[i]; e.Time > l.Time || e.Kind == measure.Leaves {
			out = append(out, motion.Event{T: e.Time, Name: e.Kind + " " + e.Surface, Kind: motion.Impact})
		}
	}
	switch {
	case t.End <= l.Time && l.Outcome == flight.Landed:
	case t.Outcome == flight.Rested || t.Outcome == flight.Stuck:
		out = append(out, motion.Event{T: t.End, Name: "rest", Kind: motion.Rest})
	default:
		out = append(out, motion.Event{T: t.End, Name: "end", Kind: motion.End})
	}
	return out
}

func filmUniform(u *measure.Uniform, g *measure.Ground) *motion.Uniform {
	if !u.Lands {
		return nil
	}
	out := &motion.Uniform{Gravity: u.Gravity, Height: u.Height, Along: u.VSpinward, Up: u.VUp, Time: u.Time}
	if u.Top() >= g.Radius {
		out.WhyNotDrawn = "it would rise beyond the axis"
	}
	return out
}
