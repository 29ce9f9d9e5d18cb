package main

import (
	"context"
	"fmt"
	"io"
	"slices"
	"strings"
	"sync"
	"sync/atomic"

	"offplumb/sim/measure"
	"offplumb/sim/table"
)

// task is one file to be written.
type task struct {
	entry
	write func(io.Writer) error // nil: it is there already
	table []table.Column        // of a table, else nil
	title string
}

// write puts all files into the stage. After an incomplete run the tables of
// what was finished are written, and no figures.
func (j *job) write(ctx context.Context, st *stage, p *progress, complete bool) error {
	if err := j.lists.end(); err != nil {
		return err
	}
	tasks := j.tables()
	if complete && !j.flags.noFigures {
		figures, err := j.figures()
		if err != nil {
			return err
		}
		tasks = append(tasks, figures...)
	}
	var names table.Namer
	for i := range tasks {
		j.files = append(j.files, tasks[i].entry)
		if t := &tasks[i]; t.table != nil {
			j.resources = append(j.resources, table.Resource{Name: names.Name(strings.TrimSuffix(t.File, ".csv")), Path: t.File, Title: t.title, Columns: t.table})
		}
	}
	if err := writeAll(ctx, st, tasks, j.flags.jobs, p, complete); err != nil {
		return err
	}
	if complete && !j.flags.noReport {
		j.files = append(j.files, entry{File: reportFile, Of: "report"})
		if err := j.putReport(ctx, st); err != nil {
			return err
		}
	}
	if err := st.file("datapackage.json", func(w io.Writer) error {
		return table.WriteDataPackage(w, "offplumb-run", j.Title, j.resources)
	}); err != nil {
		return err
	}
	return st.file(runFile, func(w io.Writer) error { return j.runJSON(w, complete) })
}

// writeAll writes the files on several workers. The error is that of the first
// file in order.
func writeAll(ctx context.Context, st *stage, tasks []task, workers int, p *progress, stoppable bool) error {
	errs := make([]error, len(tasks))
	var next atomic.Int64
	var all sync.WaitGroup
	var tell sync.Mutex
	for range max(1, min(workers, len(tasks))) {
		all.Go(func() {
			for {
				i := int(next.Add(1)) - 1
				if i >= len(tasks) || stoppable && ctx.Err() != nil {
					return
				}
				if tasks[i].write != nil {
					errs[i] = st.file(tasks[i].File, tasks[i].write)
				}
				tell.Lock()
				p.tell("files", i+1, len(tasks))
				tell.Unlock()
			}
		})
	}
	all.Wait()
	if stoppable && ctx.Err() != nil {
		return context.Cause(ctx)
	}
	i := slices.IndexFunc(errs, func(err error) bool { return err != nil })
	if i < 0 {
		return nil
	}
	return errs[i]
}

// tables gives the CSV files.
func (j *job) tables() []task {
	out := []task{
		tableTask(landingsFile, "landings", "", "A row for each release.", measure.LandingTable(j.landings)),
		tableTask(restsFile, "rests", "", "A row for each release: where it ends.", measure.RestTable(j.rests)),
	}
	if j.lists != nil { // they are written already
		out[0].write, out[1].write = nil, nil
	}
	var names table.Namer
	for i := range j.results {
		name := names.Name(j.Lets[i].Release.Name)
		if !j.tracked(i) {
			continue
		}
		rows := func() *table.Table { s, _ := j.samples(i); return measure.TrackTable(s) }
		out = append(out, lateTask("tracks/"+name+".csv", "track", j.Lets[i].Release.Name, "A track: a row for each output step.", rows, measure.TrackTable(nil)))
		if events := j.results[i].Events; len(events) > 0 {
			out = append(out, tableTask("impacts/"+name+".csv", "impacts", j.Lets[i].Release.Name, "A row for each impact.", measure.EventTable(events)))
		}
	}
	var paths table.Namer
	for i := range j.paths {
		p := &j.paths[i]
		name := paths.Name(p.plan.Path.Name)
		if p.skipped {
			continue
		}
		rows := func() *table.Table { return measure.CrewTable(p.loads) }
		out = append(out, lateTask("crew/"+name+".csv", "crew", p.plan.Path.Name, "Loads along a crew path: a row for each output step.", rows, measure.CrewTable(nil)))
	}
	if len(j.near) > 0 {
		out = append(out, tableTask("clearance.csv", "clearance", "", "The closest approach of each release and crew path to each surface.", measure.ClearanceTable(j.near)))
	}
	if times := j.gravityTimes(); len(times) > 0 {
		out = append(out, tableTask("gravity.csv", "gravity", "", "Times below and above levels of apparent gravity along crew paths.", measure.GravityTable(times)))
	}
	out = append(out, tableTask("decks.csv", "decks", "", "A row for each deck.", measure.DeckTable(j.decks)))
	out = append(out, tableTask("habitat.csv", "habitat", "", "Figures of the habitat as a whole, a single row.", measure.HabitatTable(measure.HabitatOf(j.model(), 0, 0))))
	out = append(out, turningTables(j)...)
	out = append(out, slopeTables(j)...)
	out = append(out, j.studyTables()...)
	out = append(out, scatterTables(j)...)
	out = append(out, sweepTables(j)...)
	out = append(out, mapTables(j)...)
	out = append(out, throwTables(j)...)
	if len(j.Limits) > 0 {
		out = append(out, tableTask("limits.csv", "limits", "", "A row for each limit.", measure.LimitTable(j.verdicts)))
	}
	return out
}

func (j *job) gravityTimes() (out []measure.GravityTime) {
	for i := range j.paths {
		out = append(out, j.paths[i].gravity...)
	}
	return out
}

func tableTask(file, of, name, title string, t *table.Table) task {
	return lateTask(file, of, name, title, func() *table.Table { return t }, t)
}

// lateTask makes its rows when it is written, so that they need not all be in
// memory at once.
func lateTask(file, of, name, title string, rows func() *table.Table, like *table.Table) task {
	if name != "" {
		title = fmt.Sprintf("%s: %s", name, title)
	}
	return task{entry: entry{File: file, Of: of, Name: name}, title: title, table: like.Columns,
		write: func(w io.Writer) error { return rows().WriteCSV(w) }}
}
