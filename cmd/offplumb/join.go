package main

import (
	"cmp"
	"compress/gzip"
	"context"
	"crypto/sha256"
	"encoding/hex"
	"errors"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"runtime"
	"slices"
	"strings"

	"github.com/spf13/cobra"
	"offplumb/sim/study"
)

// joinFlags are those of the join command: those of run that say what is
// written, and where the files are that the scenario names.
type joinFlags struct {
	runFlags
	inputs string
}

func newJoin(s streams) *cobra.Command {
	var f joinFlags
	cmd := &cobra.Command{
		Use: "join DIR...", Short: "join the parts of a run into the folder of the whole run",
		Long: strings.TrimSpace(`
join puts together the parts that run --part I/N has computed, all of them and
each once, in any order. The folder is that of a run in one go, byte by byte:
landings, samples and points come from the parts; what is left to do, such as
releases with tracks, crew paths, limits and figures, join does. The files that
the scenario names must be as they were. Exit status as that of run.`),
		Args: func(_ *cobra.Command, args []string) error {
			if len(args) == 0 {
				return wrong(errors.New("wants the folders of the parts"))
			}
			return nil
		},
		RunE: func(cmd *cobra.Command, args []string) error {
			if err := f.check(); err != nil {
				return err
			}
			return f.join(cmd.Context(), s, args)
		},
	}
	fl := cmd.Flags()
	fl.StringVar(&f.out, "out", "", "write into this `folder` (default: that of the whole run)")
	fl.StringVar(&f.inputs, "inputs", "", "the `folder` of the files that the scenario names, if they have moved")
	fl.IntVar(&f.jobs, "jobs", runtime.GOMAXPROCS(0), "how many `workers` compute at a time")
	f.writing(fl)
	return cmd
}

func (f *joinFlags) join(ctx context.Context, s streams, dirs []string) error {
	d, err := readParts(dirs)
	if err != nil {
		return wrong(err)
	}
	first := d.parts[0]
	f.sets, f.only, f.seed, f.allowOutside = first.Options.Set, first.Options.Only, first.Options.Seed, first.Options.AllowOutside
	folder := cmp.Or(f.inputs, first.Scenario.Folder)
	src, err := readUpTo(filepath.Join(first.dir, partScenario), maxScenario+1)
	if err != nil {
		return wrong(fmt.Errorf("%s: %w", first.dir, err))
	}
	if sum := sha256.Sum256(src); hex.EncodeToString(sum[:]) != first.Scenario.SHA256 {
		return wrong(fmt.Errorf("%s: %s is not the scenario that the part was computed from", first.dir, partScenario))
	}
	sc, err := f.source(first.Scenario.File, src, &inputs{folder: folder, beyond: f.allowOutside})
	if err != nil {
		return err
	}
	name := first.Scenario.File
	if name == stdinName {
		name = "-"
	}
	j := &job{loaded: sc, flags: &f.runFlags, out: f.folder(name), joined: d}
	if err := d.fit(j, folder); err != nil {
		return wrong(err)
	}
	if err := d.sound(); err != nil {
		return wrong(err)
	}
	return j.whole(ctx, s)
}

// joined are the parts of a run, in order.
type joined struct{ parts []*partFolder }

// partFolder is a part and where it lies.
type partFolder struct {
	*partRecord
	dir string
}

// readParts reads what the parts say of themselves, and holds that they belong
// together: of one run, each there once.
func readParts(dirs []string) (*joined, error) {
	d := &joined{}
	for _, dir := range dirs {
		r, err := readPartFile(dir)
		switch {
		case err != nil:
			return nil, fmt.Errorf("%s is not a part of a run: %w", dir, plainFile(err))
		case r.Format != partFormat:
			return nil, fmt.Errorf("%s: is a part of format %d, wants %d", dir, r.Format, partFormat)
		case r.Of < 1 || r.Of > mostParts || r.Part < 1 || r.Part > r.Of:
			return nil, fmt.Errorf("%s: there is no part %d of %d", dir, r.Part, r.Of)
		}
		d.parts = append(d.parts, &partFolder{r, dir})
	}
	first := d.parts[0]
	if here := madeHere(); first.Made != here {
		return nil, fmt.Errorf("%s was computed by %s; this is %s", first.dir, first.Made, here)
	}
	var foreign []string
	for _, p := range d.parts[1:] {
		if why := first.differs(p.partRecord); why != "" {
			foreign = append(foreign, fmt.Sprintf("%s does not belong to %s: %s", p.dir, first.dir, why))
		}
	}
	if len(foreign) > 0 {
		return nil, errors.New(strings.Join(foreign, "\n"))
	}
	return d, d.complete()
}

// complete holds that each part is there once, and puts them in order.
func (d *joined) complete() error {
	of := d.parts[0].Of
	by := make([]*partFolder, of)
	var faults []string
	for _, p := range d.parts {
		if q := by[p.Part-1]; q != nil {
			faults = append(faults, fmt.Sprintf("part %d of %d is given twice: %s and %s", p.Part, of, q.dir, p.dir))
		}
		by[p.Part-1] = p
	}
	var missing []string
	for i, p := range by {
		if p == nil {
			missing = append(missing, fmt.Sprint(i+1))
		}
	}
	if n := len(missing); n > partsTold {
		missing = append(missing[:partsTold], fmt.Sprintf("and %d more", n-partsTold))
	}
	if len(missing) > 0 {
		faults = append(faults, fmt.Sprintf("missing of %d parts: %s", of, strings.Join(missing, ", ")))
	}
	if len(faults) > 0 {
		return errors.New(strings.Join(faults, "\n"))
	}
	d.parts = by
	return nil
}

// partsTold bounds the missing parts that are listed.
const partsTold = 20

// differs says why another part is not of the same run; "": it is.
func (r *partRecord) differs(o *partRecord) string {
	shownSums := func(a, b string) string { return fmt.Sprintf("SHA-256 %.12s and %.12s", b, a) }
	switch {
	case o.Scenario.SHA256 != r.Scenario.SHA256:
		return "another scenario, " + shownSums(r.Scenario.SHA256, o.Scenario.SHA256)
	case !slices.Equal(o.Scenario.Inputs, r.Scenario.Inputs):
		return "the files that the scenario names are others"
	case o.Scenario.File != r.Scenario.File:
		return fmt.Sprintf("another name of the scenario, %q and %q", o.Scenario.File, r.Scenario.File)
	case o.Made != r.Made:
		return fmt.Sprintf("another program, %s and %s", o.Made, r.Made)
	case o.Options.Seed != r.Options.Seed:
		return fmt.Sprintf("another seed, %d and %d", o.Options.Seed, r.Options.Seed)
	case !slices.Equal(o.Options.Set, r.Options.Set):
		return "other settings (--set)"
	case !slices.Equal(o.Options.Only, r.Options.Only):
		return "other names (--only)"
	case o.Options.AllowOutside != r.Options.AllowOutside:
		return "another --allow-outside"
	case o.Of != r.Of:
		return fmt.Sprintf("one of %d parts, not of %d", o.Of, r.Of)
	}
	return ""
}

// fit holds that the parts have what the run takes from them, and that the
// scenario's files are as they were.
func (d *joined) fit(j *job, folder string) error {
	was := d.parts[0].Scenario.Inputs
	for i, now := range j.Inputs[1:] {
		if i >= len(was) || was[i] != (inputRecord{now.Name, now.SHA256}) {
			return fmt.Errorf("%s has changed since the parts were computed", filepath.Join(folder, now.Name))
		}
	}
	if err := j.choose(); err != nil {
		return err
	}
	j.prepare()
	shares := j.shares()
	for _, p := range d.parts {
		if len(p.Work) != len(shares) {
			return fmt.Errorf("%s: has %d pieces of work, wants %d", p.dir, len(p.Work), len(shares))
		}
		for n, s := range shares {
			if want := workOf(s, n+1, partFlag{p.Part, p.Of}); p.Work[n] != want {
				return fmt.Errorf("%s: its work differs from what this program wants: %+v, not %+v", p.dir, p.Work[n], want)
			}
		}
	}
	return nil
}

// restore takes some work from the parts.
func (d *joined) restore(s shared, pr *progress) error {
	kind, name := s.of()
	for i, p := range d.parts {
		n := slices.IndexFunc(p.Work, func(w partOfWork) bool { return w.Kind == kind && w.Name == name })
		if n < 0 {
			return fmt.Errorf("%s has none of it", p.dir)
		}
		if err := p.restore(s, &p.Work[n]); err != nil {
			return fmt.Errorf("%s: %s: %w", p.dir, p.Work[n].File, err)
		}
		pr.tell("parts", i+1, len(d.parts))
	}
	return nil
}

func (p *partFolder) restore(s shared, w *partOfWork) error {
	return p.read(w, func(r io.Reader) error {
		in := study.NewUnpacker(r)
		if err := s.restore(span{w.From, w.To}, in); err != nil {
			return err
		}
		return in.End()
	})
}

// sound holds that the files of all parts are whole and where they belong,
// before anything is written.
func (d *joined) sound() error {
	for _, p := range d.parts {
		for i := range p.Work {
			w := &p.Work[i]
			if err := p.read(w, func(r io.Reader) error { _, err := io.Copy(io.Discard, r); return err }); err != nil {
				return fmt.Errorf("%s: %s: %w", p.dir, w.File, err)
			}
		}
	}
	return nil
}

// read reads the packed results of some work.
func (p *partFolder) read(w *partOfWork, do func(io.Reader) error) error {
	f, err := os.Open(filepath.Join(p.dir, w.File))
	if err != nil {
		return plainFile(err)
	}
	defer f.Close()
	z, err := gzip.NewReader(f)
	if err != nil {
		return fmt.Errorf("%w: %w", study.ErrPacked, err)
	}
	if z.Comment != p.stamp(w) {
		return errors.New("it is not that of this part")
	}
	if err := do(z); err != nil && !errors.Is(err, study.ErrPacked) {
		return fmt.Errorf("%w: %w", study.ErrPacked, err)
	} else if err != nil {
		return err
	}
	return nil
}

// plainFile drops the system call from a file error, and keeps the file.
func plainFile(err error) error {
	var at *os.PathError
	if errors.As(err, &at) {
		return fmt.Errorf("%s: %w", filepath.Base(at.Path), at.Err)
	}
	return err
}
