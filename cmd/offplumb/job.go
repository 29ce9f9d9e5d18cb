package main

import (
	"context"
	"errors"
	"fmt"
	"slices"

	"offplumb/sim/crew"
	"offplumb/sim/flight"
	"offplumb/sim/measure"
	"offplumb/sim/model"
	"offplumb/sim/study"
	"offplumb/sim/table"
)

// job is one run of a scenario and all that it finds.
type job struct {
	*loaded
	flags *runFlags
	out   string

	joined    *joined        // takes the place of what parts have computed; nil: none
	results   []study.Result // of each release
	paths     []pathResult   // of each crew path
	landings  []measure.Landing
	rests     []measure.Rest
	near      []measure.Clearance
	decks     []measure.DeckFigure
	letgo     []letGoSeries
	serial    map[string]bool      // names of the releases in them
	spacings  [][]measure.Platform // of each spacing of platforms; nil: not asked for
	streams   []streamResult
	lists     *listWriter // landings and rests while they are written; nil: there is no long list
	stage     *stage
	sweeps    []sweepResult
	scatters  []scatterResult
	maps      []mapResult
	slopes    []measure.Slope // of the landings of releases with tracks
	throws    []*study.Throws // of each throw study; nil: not asked for
	verdicts  []measure.Verdict
	unjudged  []string
	files     []entry
	drawings  []drawing // of the figures written
	resources []table.Resource
	notes     []model.Warning
}

// pathResult is what a crew path does to the person.
type pathResult struct {
	plan      *crew.Plan
	loads     []measure.Load
	near      []measure.Clearance
	clearance measure.Clearance // the least of near
	gravity   []measure.GravityTime
	skipped   bool
}

// entry is a file of the output folder and what it is about.
type entry struct {
	File string `json:"file"`
	Of   string `json:"of"`
	Name string `json:"name,omitempty"`
}

func (j *job) model() *model.Model { return j.Prepared.Model }

// wanted says whether --only asks for a name.
func (j *job) wanted(name string) bool {
	return len(j.flags.only) == 0 || slices.Contains(j.flags.only, name)
}

// wantedRelease says whether --only asks for a release, or for its series.
func (j *job) wantedRelease(r *model.Release) bool {
	return j.wanted(r.Name) || r.Series != "" && j.wanted(r.Series)
}

// choose refuses an --only that names nothing.
func (j *job) choose() error {
	known := map[string]bool{}
	for i := range j.model().Releases {
		known[j.model().Releases[i].Name] = true
	}
	for i := range j.model().Paths {
		known[j.model().Paths[i].Name] = true
	}
	for i := range j.model().Spacings {
		known[j.model().Spacings[i].Name] = true
	}
	for _, name := range measure.SeriesNames(j.model()) {
		known[name] = true
	}
	for _, s := range j.Sweeps {
		known[s.Name] = true
	}
	for i := range j.model().Scatters {
		known[j.model().Scatters[i].Name] = true
	}
	for i := range j.model().Maps {
		known[j.model().Maps[i].Name] = true
	}
	for i := range j.model().Throws {
		known[j.model().Throws[i].Name] = true
	}
	for _, s := range j.Streams {
		for name := range s.Find(slices.DeleteFunc(slices.Clone(j.flags.only), func(name string) bool { return known[name] })) {
			known[name] = true
		}
	}
	for _, name := range j.flags.only {
		if !known[name] {
			return wrong(fmt.Errorf("--only: no release, crew path or study named %q", name))
		}
	}
	return nil
}

// prepare makes room for the results.
func (j *job) prepare() {
	j.results = make([]study.Result, len(j.Lets))
	j.scatters = make([]scatterResult, len(j.model().Scatters))
	for i := range j.scatters {
		j.scatters[i].of = &j.model().Scatters[i]
	}
	j.sweeps, j.streams = nil, nil
	for _, s := range j.Streams {
		j.streams = append(j.streams, streamResult{of: s})
	}
	for _, s := range j.Sweeps {
		j.sweeps = append(j.sweeps, sweepResult{Sweep: s})
	}
}

// compute flies the releases and runs the studies.
func (j *job) compute(ctx context.Context, p *progress) error {
	j.prepare()
	var kept []int
	for i := range j.Lets {
		if j.wantedRelease(j.Lets[i].Release) && j.Keeps(i) {
			kept = append(kept, i)
		}
	}
	err := j.Fly(ctx, kept, j.results, study.Options{Workers: j.flags.jobs, Done: p.releases})
	if ctx.Err() != nil {
		return context.Cause(ctx)
	}
	if err != nil {
		return err
	}
	if err := j.runSlopes(ctx); err != nil {
		return err
	}
	if err := j.place(ctx); err != nil {
		return err
	}
	if err := j.share(ctx, p); err != nil {
		return err
	}
	if err := j.runThrows(ctx, p); err != nil {
		return err
	}
	return j.runMaps(ctx, p)
}

// place finds the platforms.
func (j *job) place(ctx context.Context) error {
	m := j.model()
	j.spacings = make([][]measure.Platform, len(m.Spacings))
	for i := range m.Spacings {
		if !j.wanted(m.Spacings[i].Name) {
			continue
		}
		var err error
		if j.spacings[i], err = study.Platforms(ctx, m, &m.Spacings[i]); err != nil {
			return err
		}
	}
	return nil
}

// measure works out the paths' loads, the tables' rows and the verdicts.
func (j *job) measure() {
	m := j.model()
	j.notes = append(j.notes, m.Warnings...)
	for i := range j.results {
		j.rowsOf(i)
	}
	for _, plan := range j.Plans {
		r := pathResult{plan: plan, skipped: !j.wanted(plan.Path.Name)}
		if !r.skipped {
			var step float64
			r.loads, step = measure.LoadSeries(m, plan)
			r.near = measure.PathClearances(m, plan)
			r.clearance = measure.Closest(r.near)
			j.near = append(j.near, r.near...)
			r.gravity = measure.GravityTimes(plan.Path, r.loads)
			j.noteStep("path."+plan.Path.Name, step)
		}
		j.paths = append(j.paths, r)
	}
	j.decks = measure.DeckFigures(m)
	j.letGo()
	j.judge()
	j.warn()
}

// rowsOf gathers a release's rows of the tables.
func (j *job) rowsOf(i int) {
	r := &j.results[i]
	if !r.Finished() {
		return
	}
	j.landings = append(j.landings, r.Landing)
	j.rests = append(j.rests, r.Rest)
	if j.tracked(i) {
		j.near = append(j.near, r.Clearances...)
	}
}

// tracked says whether a release's track is to be written and drawn.
func (j *job) tracked(i int) bool {
	r := j.Lets[i].Release
	return j.results[i].Track != nil && !r.NoTrack && r.Series == ""
}

func (j *job) judge() {
	e := measure.Evidence{Decks: j.decks}
	e.Habitat = func(stature, speed float64) measure.HabitatFigure {
		return measure.HabitatOf(j.model(), stature, speed)
	}
	e.Turning = func() []measure.Turning { return j.Turnings(j.results) }
	e.Landing = func(i int) (*measure.Landing, bool) { return &j.results[i].Landing, j.results[i].Finished() }
	e.Rest = func(i int) (*measure.Rest, bool) { return &j.results[i].Rest, j.results[i].Finished() }
	e.Events = func(i int) ([]measure.Event, bool) { return j.results[i].Events, j.results[i].Track != nil }
	e.Clearance = func(i int) ([]measure.Clearance, bool) { return j.results[i].Clearances, j.results[i].Track != nil }
	e.Track = func(i int) ([]measure.Sample, bool) { return j.samples(i) }
	e.PathClearance = func(i int) ([]measure.Clearance, bool) { return j.paths[i].near, !j.paths[i].skipped }
	e.Loads = func(i int) ([]measure.Load, bool) { return j.paths[i].loads, !j.paths[i].skipped }
	e.Map = func(i int) (*measure.LandMap, bool) { return j.landMap(i) }
	e.Scatter = func(i int) (*measure.Scattered, bool) { return j.scattered(i) }
	e.Throws = func(i int) ([]measure.Throw, bool) { return j.thrown(i) }
	for i := range j.Limits {
		if v, ok := j.judged(i, e); ok {
			j.verdicts = append(j.verdicts, v)
		} else {
			j.unjudged = append(j.unjudged, j.Limits[i].Limit.Name)
		}
	}
}

// samples gives the rows of a track.
func (j *job) samples(i int) ([]measure.Sample, bool) {
	t := j.results[i].Track
	if t == nil {
		return nil, false
	}
	m := j.model()
	rows, _ := measure.Samples(m, t, flight.NewForces(m, t.Body, nil))
	return rows, true
}

func asSignal(err error, to *signalled) bool { return errors.As(err, to) }
