package main

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"offplumb/sim/flight"
	"offplumb/sim/measure"
	"offplumb/sim/model"
	"offplumb/sim/table"
)

// caution stands in the summary, run.json and the description of every figure.
const caution = "Results support design and training. They do not replace tests with hardware, the project's own safety requirements, " +
	"applicable codes and the judgement of licensed engineers. Every body is a sphere here: a person, a long tool or a sheet may catch, " +
	"turn or pass an opening otherwise; choose the size that errs on the safe side and state it."

// namesShown is how many names a warning lists.
const namesShown = 3

func (j *job) note(of, format string, args ...any) {
	j.notes = append(j.notes, model.Warning{Of: of, Msg: fmt.Sprintf(format, args...)})
}

// noteStep says that rows were left out for their number.
func (j *job) noteStep(of string, step float64) {
	if asked := j.model().Output.Step; step > asked {
		j.note(of, "rows stand %s s apart, not the %s s asked for, to keep below %d", table.Round(step, 3), table.Round(asked, 3), measure.MaxRows)
	}
}

// warn gathers what the reader of the results must know.
func (j *job) warn() {
	m := j.model()
	if m.Habitat.Spin == 0 && !m.Unsteady() {
		j.note("habitat", "there is no spin, so nothing falls")
	}
	if names := idleStudies(j); len(names) > 0 {
		j.note("studies", "this version checks these studies but does not run them: %s", someNames(names))
	}
	if late := m.Settled(); late > m.Solver.MaxTime {
		j.note("habitat", "changes of the spin go on until %s s, longer than any release is followed, %s s", table.Round(late, 4), table.Round(m.Solver.MaxTime, 4))
	}
	warnStreams(j)
	warnDoubts(j)
	warnScatters(j)
	warnSweeps(j)
	warnMaps(j)
	warnThrows(j)
	j.warnReleases()
	j.warnPaths()
	if len(j.unjudged) > 0 {
		j.note("limits", "not judged, since what they are about did not run or kept no track: %s", someNames(j.unjudged))
	}
}

// runStudies are the kinds of studies that run.
var runStudies = []string{"scatter", "sweep", "throw_to", "landing_map"}

// idleStudies names the studies that do not run.
func idleStudies(j *job) (out []string) {
	for _, s := range j.Studies {
		if !slices.Contains(runStudies, s.Kind) {
			out = append(out, s.Name)
		}
	}
	return out
}

func (j *job) warnReleases() {
	var late, stuck []string
	for i := range j.results {
		r := &j.results[i]
		if !r.Finished() {
			continue
		}
		l := &r.Landing
		rel := j.Lets[i].Release
		if r.Rest.Outcome == flight.TimeUp && rel.Until.Kind != model.UntilDuration {
			late = append(late, l.Release)
		}
		if r.Rest.Outcome == flight.Stuck {
			stuck = append(stuck, l.Release)
		}
		if r.Track != nil {
			_, step := measure.Times(r.Track.End, j.model().Output.Step)
			j.noteStep("release."+l.Release, step)
		}
	}
	if len(late) > 0 {
		j.note("releases", "still move after the longest time, %s s: %s", table.Round(j.model().Solver.MaxTime, 4), someNames(late))
	}
	if len(stuck) > 0 {
		j.note("releases", "are stuck, wedged between surfaces or in a motion that the model cannot resolve: %s", someNames(stuck))
	}
}

// overlapSlack is how deep, in m, an outline may reach into a surface before a
// warning: rounding.
const overlapSlack = 1e-9

func (j *job) warnPaths() {
	for i := range j.paths {
		p := &j.paths[i]
		if p.skipped {
			continue
		}
		of := "path." + p.plan.Path.Name
		for k := range p.loads {
			if l := &p.loads[k]; math.IsNaN(l.FrictionDemand) {
				j.note(of, "there is no weight %s s into the path: friction demand has no value there", table.Round(l.Time, 3))
				break
			}
		}
		if c := p.clearance; c.Gap < -overlapSlack {
			j.note(of, "the person's outline reaches %s m into %q, %s s into the path", table.Round(-c.Gap, 2), c.Surface, table.Round(c.Time, 3))
		}
	}
}

// someNames lists the first names and counts the others.
func someNames(names []string) string {
	if len(names) <= namesShown {
		return strings.Join(names, "; ")
	}
	return fmt.Sprintf("%s; and %d more", strings.Join(names[:namesShown], "; "), len(names)-namesShown)
}
