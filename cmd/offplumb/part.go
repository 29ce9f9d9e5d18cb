package main

import (
	"compress/gzip"
	"context"
	"crypto/sha256"
	"encoding/hex"
	"encoding/json"
	"errors"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"runtime"
	"strconv"
	"strings"

	"offplumb/sim/study"
)

const (
	// partFile marks a folder as a part of a run and says what is in it.
	partFile = "part.json"
	// partScenario is the scenario of a part, byte for byte.
	partScenario = "scenario.toml"
	// partFormat is the version of the folder's format.
	partFormat = 1
	// mostParts bounds the parts of a run.
	mostParts = 10_000
)

// partFlag is I/N: which part of how many; of 0: the whole.
type partFlag struct{ part, of int }

// readPart reads I/N.
func readPart(s string) (partFlag, error) {
	bad := fmt.Errorf("--part: wants I/N, such as 3/8, with N from 1 to %d and I from 1 to N, got %q", mostParts, s)
	a, b, ok := strings.Cut(s, "/")
	i, err1 := strconv.Atoi(a)
	n, err2 := strconv.Atoi(b)
	if !ok || err1 != nil || err2 != nil || n < 1 || n > mostParts || i < 1 || i > n {
		return partFlag{}, bad
	}
	return partFlag{i, n}, nil
}

func (f partFlag) String() string { return fmt.Sprintf("part %d of %d", f.part, f.of) }

// partRecord is part.json.
type partRecord struct {
	Program  string       `json:"program"`
	Format   int          `json:"part_format"`
	Made     partMade     `json:"made_by"`
	Part     int          `json:"part"`
	Of       int          `json:"of"`
	Scenario partSource   `json:"scenario"`
	Options  partOptions  `json:"options"`
	Work     []partOfWork `json:"work"`
}

// partMade says what program a part was computed with: another one, or another
// processor, might give other last digits.
type partMade struct {
	Version  string `json:"version"`
	Go       string `json:"go"`
	Platform string `json:"platform"`
}

func madeHere() partMade {
	return partMade{version, runtime.Version(), runtime.GOOS + "/" + runtime.GOARCH}
}

func (m partMade) String() string {
	return fmt.Sprintf("offplumb %s, %s, %s", m.Version, m.Go, m.Platform)
}

// partSource is a part's scenario. Folder is where the files lie that it names.
type partSource struct {
	File   string        `json:"file"`
	Folder string        `json:"folder"`
	SHA256 string        `json:"sha256"`
	Inputs []inputRecord `json:"inputs"`
}

// partOptions are those that results depend on.
type partOptions struct {
	Set          []string `json:"set"`
	Only         []string `json:"only"`
	Seed         uint64   `json:"seed"`
	AllowOutside bool     `json:"allow_outside"`
}

// partOfWork is the range of some work that a part has, and the file with it.
type partOfWork struct {
	Kind   string `json:"kind"`
	Name   string `json:"name,omitempty"`
	Items  int    `json:"items"`
	From   int    `json:"from"`
	To     int    `json:"to"`
	Layout string `json:"layout_sha256"`
	File   string `json:"file"`
}

// workOf describes the range of some work that a part has.
func workOf(s shared, number int, f partFlag) partOfWork {
	kind, name := s.of()
	sum := sha256.Sum256([]byte(s.layout()))
	r := spanOf(f.part, f.of, s.items())
	return partOfWork{Kind: kind, Name: name, Items: s.items(), From: r.from, To: r.to, Layout: hex.EncodeToString(sum[:]),
		File: fmt.Sprintf("work-%d.bin.gz", number)}
}

// record is the part.json of a part of this run.
func (j *job) partRecord(f partFlag) (*partRecord, error) {
	folder, err := filepath.Abs(j.origin.folder)
	if err != nil {
		return nil, err
	}
	src := scenarioOf(j.Scenario)
	inputs := src.Inputs
	if inputs == nil {
		inputs = []inputRecord{}
	}
	return &partRecord{Program: programName, Format: partFormat, Made: madeHere(), Part: f.part, Of: f.of,
		Scenario: partSource{File: j.Scenario.Name, Folder: folder, SHA256: src.SHA256, Inputs: inputs},
		Options:  partOptions{orEmpty(j.flags.sets), orEmpty(j.flags.only), j.flags.seed, j.flags.allowOutside},
		Work:     []partOfWork{}}, nil
}

// runPart computes a part of the run into a folder of its own.
func (j *job) runPart(ctx context.Context, s streams, f partFlag) error {
	if j.flags.out == "" {
		j.out = fmt.Sprintf("%s-part-%d-of-%d", strings.TrimSuffix(j.out, "-out"), f.part, f.of)
	}
	st, err := newStage(j.out, j.flags.force, folderKind{f.String(), func(dir string) ([]string, bool, bool) { return knownOfPart(dir, f) }})
	if err != nil {
		return err
	}
	defer st.discard()
	rec, err := j.doPart(ctx, s, st, f)
	if err == nil {
		err = st.commit()
	}
	if err != nil {
		if cause := new(signalled); asSignal(err, cause) {
			return *cause
		}
		if w := new(fail); errors.As(err, &w) {
			return err
		}
		return incomplete(err)
	}
	return j.reportPart(s, rec)
}

// knownOfPart gives the files of a part that is to be replaced by the same one.
func knownOfPart(dir string, f partFlag) (files []string, all, ok bool) {
	r, err := readPartFile(dir)
	if err != nil || r.Part != f.part || r.Of != f.of {
		return nil, false, false
	}
	files = []string{partFile, partScenario}
	for i := range r.Work {
		files = append(files, r.Work[i].File)
	}
	return files, false, true
}

func (j *job) doPart(ctx context.Context, s streams, st *stage, f partFlag) (*partRecord, error) {
	p := newProgress(s.err, j.flags.quiet)
	defer p.clear()
	rec, err := j.partRecord(f)
	if err != nil {
		return nil, err
	}
	if len(j.origin.once) > 0 {
		return nil, wrong(errors.New("--part: wants files that the join can read again; a release list comes from standard input or a pipe"))
	}
	j.prepare()
	for n, work := range j.shares() {
		w := workOf(work, n+1, f)
		rec.Work = append(rec.Work, w)
		err := st.file(w.File, func(to io.Writer) error { return packRange(ctx, work, span{w.From, w.To}, p, to, rec.stamp(&w)) })
		if ctx.Err() != nil {
			return nil, context.Cause(ctx)
		}
		if err != nil {
			return nil, told(work, err)
		}
	}
	if err := st.file(partScenario, func(w io.Writer) error { _, err := w.Write(j.src); return err }); err != nil {
		return nil, err
	}
	return rec, st.file(partFile, func(w io.Writer) error {
		enc := json.NewEncoder(w)
		enc.SetIndent("", "  ")
		enc.SetEscapeHTML(false)
		return enc.Encode(rec)
	})
}

// stamp ties the file of some work to its part: it stands in its head.
func (r *partRecord) stamp(w *partOfWork) string {
	src, err := json.Marshal([]any{r.Made, r.Part, r.Of, r.Scenario.SHA256, r.Scenario.Inputs, r.Options, w})
	if err != nil {
		panic(err) // of texts and numbers alone
	}
	sum := sha256.Sum256(src)
	return hex.EncodeToString(sum[:])
}

// packRange computes a range and packs it, compressed, which guards it with a
// checksum too.
func packRange(ctx context.Context, work shared, r span, p *progress, to io.Writer, stamp string) error {
	z, err := gzip.NewWriterLevel(to, gzip.BestSpeed)
	if err != nil {
		return err
	}
	z.Comment = stamp
	out := study.NewPacker(z)
	if err := work.compute(ctx, r, p, out); err != nil {
		return err
	}
	return errors.Join(out.Flush(), z.Close())
}

// reportPart says what a part holds.
func (j *job) reportPart(s streams, rec *partRecord) error {
	var err error
	switch {
	case j.flags.json:
		var src []byte
		if src, err = os.ReadFile(filepath.Join(j.out, partFile)); err == nil {
			_, err = s.out.Write(src)
		}
	case !j.flags.quiet:
		_, err = io.WriteString(s.out, calm(j.partWords(rec)))
	}
	return incompleteIf(err)
}

func (j *job) partWords(rec *partRecord) string {
	var b strings.Builder
	fmt.Fprintf(&b, "%s: part %d of %d\n", j.Title, rec.Part, rec.Of)
	if len(rec.Work) == 0 {
		b.WriteString("There is no work to share; the join does all of it.\n")
	}
	for _, w := range rec.Work {
		what := w.Kind
		if w.Name != "" {
			what += fmt.Sprintf(" %q", w.Name)
		}
		if w.From == w.To {
			fmt.Fprintf(&b, "  %s: none of %d\n", what, w.Items)
			continue
		}
		fmt.Fprintf(&b, "  %s: %d to %d of %d\n", what, w.From+1, w.To, w.Items)
	}
	for i := range j.scatters {
		if o := j.scatters[i].of; o.Stops() && j.wanted(o.Name) {
			fmt.Fprintf(&b, "  %s: all samples are flown; the join keeps as many as the stated precision takes\n", o.Name)
		}
	}
	fmt.Fprintf(&b, "Written to %s; offplumb join puts the parts together.\n", j.out)
	return b.String()
}

// readPartFile reads the part.json of a folder.
func readPartFile(dir string) (*partRecord, error) {
	src, err := os.ReadFile(filepath.Join(dir, partFile))
	if err != nil {
		return nil, err
	}
	var r partRecord
	if err := json.Unmarshal(src, &r); err != nil {
		return nil, fmt.Errorf("%s: %w", partFile, err)
	}
	if r.Program != programName {
		return nil, fmt.Errorf("%s is not one of ours", partFile)
	}
	return &r, nil
}
