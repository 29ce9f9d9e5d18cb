package main

import (
	"context"
	"fmt"
	"io"
	"strings"

	"offplumb/sim/measure"
	"offplumb/sim/model"
	"offplumb/sim/study"
	"offplumb/sim/table"
)

// scatterResult is a scatter and what it gave.
type scatterResult struct {
	of    *model.Scatter
	cloud *measure.Cloud // nil: not asked for, or not finished
	sum   *measure.Scattered
}

// scatterShare is the work of a scatter.
type scatterShare struct {
	j *job
	*scatterResult
	run *study.Scattering
}

func (s *scatterShare) of() (kind, name string) { return "scatter", s.scatterResult.of.Name }
func (s *scatterShare) items() int              { return s.scatterResult.of.Samples }
func (s *scatterShare) layout() string          { return study.Layout(measure.Shot{}) }

func (s *scatterShare) options(p *progress) study.ScatterOptions {
	return study.ScatterOptions{Workers: s.j.flags.jobs, Seed: s.j.flags.seed,
		Done: func(done, of int) { p.tell("samples of "+s.scatterResult.of.Name, done, of) }}
}

// compute flies samples. A part cannot know whether a stated precision is
// reached: it flies all of its range, and the join drops what a whole run would
// not have flown.
func (s *scatterShare) compute(ctx context.Context, r span, p *progress, out *study.Packer) (err error) {
	if out == nil {
		cloud, err := s.j.Scatter(ctx, s.scatterResult.of, s.options(p))
		if err == nil {
			s.cloud = cloud
		}
		return err
	}
	if err := s.open(p); err != nil {
		return err
	}
	if err := s.run.Fly(ctx, r.from, r.to); err != nil {
		return err
	}
	return packItems(out, r, s.run.Cloud().Shot)
}

// open makes the scatter ready.
func (s *scatterShare) open(p *progress) (err error) {
	if s.run == nil {
		s.run, err = s.j.Scattering(s.scatterResult.of, s.options(p))
	}
	return err
}

func (s *scatterShare) restore(r span, in *study.Unpacker) error {
	if err := s.open(nil); err != nil {
		return err
	}
	return takeItems(in, r, s.run.Cloud().Take)
}

func (s *scatterShare) finish() {
	if s.cloud == nil {
		s.cloud = s.run.Settle()
	}
	s.sum = measure.Scatter(s.j.model(), s.cloud)
}

// scatterTables are the tables of the scatters.
func scatterTables(j *job) []task {
	var out []task
	var names table.Namer
	for i := range j.scatters {
		s := &j.scatters[i]
		file := "scatter/" + names.Name(s.of.Name)
		if s.cloud == nil {
			continue
		}
		columns := measure.CloudColumns(s.of)
		out = append(out, task{entry: entry{File: file + ".csv", Of: "scatter", Name: s.of.Name}, table: columns,
			title: s.of.Name + ": A row for each sample of a scatter.",
			write: func(w io.Writer) error { return table.StreamCSV(w, columns, s.cloud.Rows()) }})
		out = append(out, tableTask(file+"-summary.csv", "scatter summary", s.of.Name, "What the samples of a scatter come to.", measure.ScatterTable(s.sum)))
		if s.sum.Contour != nil {
			out = append(out, tableTask(file+"-contour.csv", "scatter contour", s.of.Name, "Corners of the smallest area that holds 95 % of the landings.", measure.ContourTable(s.sum.Contour)))
		}
	}
	return out
}

// sumScatter tells each scatter in a few sentences.
func sumScatter(j *job, b *strings.Builder) {
	head := false
	for i := range j.scatters {
		s := &j.scatters[i]
		if s.cloud == nil {
			continue
		}
		if !head {
			b.WriteString("\nScatter\n")
			head = true
		}
		b.WriteString(wrapped("  "+s.sentence(j.flags.seed), "    "))
	}
}

func (s *scatterResult) sentence(seed uint64) string {
	words := fmt.Sprintf("%s: %s of %q, %s", s.of.Name, count(s.sum.Samples, "sample"), s.of.Of, s.sampled(seed))
	if s.of.Stops() {
		words += fmt.Sprintf(", of at most %d", s.of.Samples)
	}
	if s.sum.Flown < s.sum.Samples {
		words += fmt.Sprintf(", %d of them left out", s.sum.Samples-s.sum.Flown)
	}
	if s.sum.Landed > 0 {
		words += fmt.Sprintf(". Median landing %s of plumb", s.median())
	}
	if e := s.ellipse(); e != nil {
		words += ". " + ellipseWords(e)
	}
	if c := s.sum.Contour; c != nil {
		words += ". " + contourWords(c)
	}
	words += ". " + sharesTold("First touch", s.sum.Surfaces)
	words += sharesTold("Fallen through", s.sum.Openings)
	words += sharesTold("Not landed", s.sum.Outcomes)
	if e := s.sum.Spread("energy"); e.Count > 0 {
		words += fmt.Sprintf("Impact energy: median %s, 95 %% below %s, greatest %s.", withUnit(e.Median(), "J"), withUnit(e.High(), "J"), withUnit(e.Max, "J"))
	}
	return strings.TrimSpace(words)
}

// ellipse is the landing ellipse; nil where there is none worth telling, since
// the landings lie on a line.
func (s *scatterResult) ellipse() *measure.Ellipse {
	if c := s.sum.Contour; c != nil && c.Line {
		return nil
	}
	return s.sum.Ellipse
}

// sampled says how samples were spread. Halton points have no seed.
func (s *scatterResult) sampled(seed uint64) string {
	switch s.of.Sampling {
	case model.Halton:
		return "Halton points"
	case model.LatinHypercube:
		return fmt.Sprintf("a Latin hypercube of seed %d", seed)
	}
	return fmt.Sprintf("random with seed %d", seed)
}

// scattered gives what a scatter came to, if it ran.
func (j *job) scattered(i int) (*measure.Scattered, bool) {
	if i >= len(j.scatters) || j.scatters[i].cloud == nil {
		return nil, false
	}
	return j.scatters[i].sum, true
}

// median says where the median landing is.
func (s *scatterResult) median() string { return onPlan(s.sum.Median[0], s.sum.Median[1]) }

// onPlan says where a place on a plan is.
func onPlan(spinward, axial float64) string {
	switch {
	case axial > leastShown:
		return way(spinward) + ", " + withUnit(axial, "m") + " toward +axial"
	case axial < -leastShown:
		return way(spinward) + ", " + withUnit(-axial, "m") + " toward -axial"
	}
	return way(spinward)
}

func ellipseWords(e *measure.Ellipse) string {
	return fmt.Sprintf("95 %% landing ellipse: semi-axes %s and %s, the major one %s deg from spinward toward +axial, about %s; it holds %s",
		withUnit(e.Major, "m"), withUnit(e.Minor, "m"), table.Fixed(degreesOf(e.Angle), 1), onPlan(e.Spinward, e.Axial), percent(e.Inside))
}

func contourWords(c *measure.Contour) string {
	if c.Line {
		a, b := c.Pieces[0][0], c.Pieces[0][1]
		return fmt.Sprintf("The landings lie on a line: the shortest stretch with 95 %% of them goes from %s to %s", onPlan(a[0], a[1]), onPlan(b[0], b[1]))
	}
	return fmt.Sprintf("95 %% contour, no distribution assumed: %s m^2 in %s; it holds %s", sigfig(c.Area, 3), count(len(c.Pieces), "outline"), percent(c.Inside))
}

// percent writes a share.
func percent(share float64) string { return sigfig(100*share, 3) + " %" }

// shareWords gives a share with its interval.
func shareWords(s *measure.Share) string {
	return fmt.Sprintf("%s %s (%s to %s)", s.Name, percent(s.Share), sigfig(100*s.Low, 3), percent(s.High))
}

// sharesTold lists shares with their 95 % confidence intervals.
func sharesTold(what string, list []measure.Share) string {
	if len(list) == 0 {
		return ""
	}
	words := make([]string, 0, namesTold)
	for i := range list {
		if i == namesTold {
			words = append(words, fmt.Sprintf("and %d more", len(list)-i))
			break
		}
		words = append(words, shareWords(&list[i]))
	}
	return what + ": " + strings.Join(words, ", ") + ". "
}

// namesTold bounds the surfaces or openings that a sentence lists.
const namesTold = 6

// warnScatters notes what the reader of a scatter must know.
func warnScatters(j *job) {
	for i := range j.scatters {
		s := &j.scatters[i]
		if s.cloud == nil {
			continue
		}
		for _, why := range s.sum.LeftOut {
			j.note("study."+s.of.Name, "%s of %d left out: %s", count(why.Count, "sample"), s.sum.Samples, why.Name)
		}
		if least := study.HaltonLeast(s.of); s.of.Sampling == model.Halton && s.sum.Samples < least {
			j.note("study."+s.of.Name, "Halton points of %d keys are spread unevenly below %d samples; a Latin hypercube is not", len(s.of.Vary), least)
		}
	}
}

// scatterRecords are the scatters for run.json.
func (j *job) scatterRecords() (out []scatterRecord) {
	shares := func(list []measure.Share) []shareRecord {
		out := []shareRecord{}
		for _, s := range list {
			out = append(out, shareRecord{s.Name, s.Count, number(s.Share), number(s.Low), number(s.High)})
		}
		return out
	}
	for i := range j.scatters {
		if s := &j.scatters[i]; s.cloud != nil {
			out = append(out, scatterRecord{s.of.Name, s.of.Of, s.of.Sampling.String(), s.sum.Samples, s.sum.Flown, s.sum.Landed, shares(s.sum.Surfaces), shares(s.sum.Openings)})
		}
	}
	return out
}
