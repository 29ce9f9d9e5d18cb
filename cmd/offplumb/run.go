package main

import (
	"context"
	"errors"
	"fmt"
	"os"
	"path/filepath"
	"runtime"
	"slices"
	"strings"

	"github.com/spf13/cobra"
	"github.com/spf13/pflag"
	"offplumb/plots"
)

// runFlags are those of the run command.
type runFlags struct {
	loading
	out       string
	only      []string
	jobs      int
	seed      uint64
	noFigures bool
	noReport  bool
	open      bool
	formats   []string
	json      bool
	quiet     bool
	force     bool
	part      string
	parted    bool // part was given
}

func newRun(s streams) *cobra.Command {
	var f runFlags
	cmd := &cobra.Command{
		Use: "run SCENARIO.toml", Short: "do everything a scenario asks for; write tables and figures, print a summary",
		Long: strings.TrimSpace(`
run reads a scenario, flies its releases, walks its crew paths and judges its
limits. It writes tables (CSV), figures, a report and run.json into a folder and
prints a summary. Exit status: 0 done, 1 done but a limit is broken, 2 the command line
or the scenario is wrong, 3 the run could not be completed.`),
		Args: exactly(1, "one scenario file, or - for standard input"),
		RunE: func(cmd *cobra.Command, args []string) error {
			if err := f.check(); err != nil {
				return err
			}
			f.parted = cmd.Flags().Changed("part")
			return f.run(cmd.Context(), s, args[0])
		},
	}
	f.loading.flags(cmd)
	fl := cmd.Flags()
	fl.StringVar(&f.out, "out", "", "write into this `folder` (default: the scenario's name plus -out)")
	fl.StringArrayVar(&f.only, "only", nil, "run this release or crew path only: its `NAME`, repeatable")
	fl.IntVar(&f.jobs, "jobs", runtime.GOMAXPROCS(0), "how many `workers` compute at a time")
	fl.Uint64Var(&f.seed, "seed", 1, "of the samples of scatters: a whole `number`")
	fl.StringVar(&f.part, "part", "", "compute part `I/N` of release lists, scatters and sweeps only, for offplumb join")
	f.writing(fl)
	return cmd
}

// writing adds the flags that say what is written.
func (f *runFlags) writing(fl *pflag.FlagSet) {
	fl.BoolVar(&f.noFigures, "no-figures", false, "write no figures")
	fl.BoolVar(&f.noReport, "no-report", false, "write no report.html")
	fl.BoolVar(&f.open, "open", false, "open the report in the browser once it is written")
	fl.StringSliceVar(&f.formats, "figure-format", []string{"svg"}, "`formats` of the figures: svg, png, pdf, separated by commas")
	fl.BoolVar(&f.json, "json", false, "print the contents of run.json in place of the summary")
	fl.BoolVar(&f.quiet, "quiet", false, "print no summary")
	fl.BoolVar(&f.force, "force", false, "write into a folder that holds something else")
}

func (f *runFlags) check() error {
	if f.jobs < 1 {
		return wrong(fmt.Errorf("--jobs: wants 1 or more, got %d", f.jobs))
	}
	if f.open && f.noReport {
		return wrong(errors.New("--open: there is no report to open with --no-report"))
	}
	for _, format := range f.formats {
		if !slices.Contains(plots.Formats(), format) {
			return wrong(fmt.Errorf("--figure-format: wants one of %s, got %q", strings.Join(plots.Formats(), ", "), format))
		}
	}
	return nil
}

// folder gives the output folder of a scenario.
func (f *runFlags) folder(scenario string) string {
	if f.out != "" {
		return f.out
	}
	if scenario == "-" {
		return "scenario-out"
	}
	base := filepath.Base(scenario)
	return strings.TrimSuffix(base, filepath.Ext(base)) + "-out"
}

func (f *runFlags) run(ctx context.Context, s streams, scenario string) error {
	var part partFlag
	if f.parted {
		var err error
		if part, err = readPart(f.part); err != nil {
			return wrong(err)
		}
	}
	sc, err := f.load(scenario, s.in)
	if err != nil {
		return err
	}
	j := &job{loaded: sc, flags: f, out: f.folder(scenario)}
	if err := j.choose(); err != nil {
		return err
	}
	if part.of > 0 {
		return j.runPart(ctx, s, part)
	}
	return j.whole(ctx, s)
}

// whole does all of a run, puts it in place and tells it.
func (j *job) whole(ctx context.Context, s streams) error {
	st, err := newStage(j.out, j.flags.force, runFolder)
	if err != nil {
		return err
	}
	defer st.discard()
	if err := j.do(ctx, s, st); err != nil {
		return j.giveUp(err, "not completed; what was finished is in", st, s)
	}
	if err := st.commit(); err != nil {
		return j.giveUp(fmt.Errorf("cannot put the results in place: %w", err), "the results are complete, and are in", st, s)
	}
	if j.flags.open {
		openReport(j.out, s.err)
	}
	return j.tell(s)
}

// do computes and writes everything into the stage.
func (j *job) do(ctx context.Context, s streams, st *stage) error {
	j.stage = st
	p := newProgress(s.err, j.flags.quiet)
	defer p.clear()
	runErr := j.compute(ctx, p)
	j.measure()
	if err := j.write(ctx, st, p, runErr == nil); err != nil {
		return err
	}
	return runErr
}

// giveUp keeps what was finished beside the output folder, which stays as it
// is.
func (j *job) giveUp(err error, words string, st *stage, s streams) error {
	where := st.keepPartial()
	fmt.Fprintln(s.err, calm(fmt.Sprintf("offplumb: %s %s", words, where)))
	if cause := new(signalled); asSignal(err, cause) {
		return *cause
	}
	return incomplete(err)
}

// tell prints the summary and gives the exit status.
func (j *job) tell(s streams) error {
	var err error
	switch {
	case j.flags.json:
		var src []byte
		if src, err = os.ReadFile(filepath.Join(j.out, runFile)); err == nil {
			_, err = s.out.Write(src)
		}
	case !j.flags.quiet:
		err = j.summary(s.out)
	}
	if err != nil {
		return incomplete(err)
	}
	for i := range j.verdicts {
		if j.verdicts[i].Verdict == "broken" {
			return errBroken
		}
	}
	return nil
}
