package main

import (
	"bytes"
	"context"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"sync"
	"sync/atomic"

	"offplumb/plots/page"
)

// shelf holds the figures of the run until the parts of the report take them.
type shelf struct {
	list   []drawing
	svg    [][]byte // of those that the report holds, else nil
	taken  []bool
	beside string // ending of the figures' files; "": there are none
}

// shelve chooses the figures of the report and reads or draws them.
func (j *job) shelve(ctx context.Context, st *stage) (*shelf, error) {
	s := &shelf{list: j.drawings, svg: make([][]byte, len(j.drawings)), taken: make([]bool, len(j.drawings))}
	if len(s.list) == 0 {
		return s, nil
	}
	s.beside = "." + j.flags.formats[0]
	asFile := slices.Contains(j.flags.formats, "svg")
	if asFile {
		s.beside = ".svg"
	}
	chosen := j.chosen(s.list)
	errs := make([]error, len(chosen))
	inParallel(len(chosen), j.flags.jobs, func(i int) {
		if ctx.Err() != nil {
			return
		}
		k := chosen[i]
		if asFile {
			s.svg[k], errs[i] = os.ReadFile(filepath.Join(st.aside, s.list[k].file+".svg"))
		} else {
			s.svg[k], errs[i] = s.list[k].svg()
		}
		s.svg[k] = withoutCaution(s.svg[k])
	})
	if ctx.Err() != nil {
		return nil, context.Cause(ctx)
	}
	for _, err := range errs {
		if err != nil {
			return nil, err
		}
	}
	return s, nil
}

// inParallel does n things on several workers.
func inParallel(n, workers int, do func(i int)) {
	var next atomic.Int64
	var all sync.WaitGroup
	for range max(1, min(workers, n)) {
		all.Go(func() {
			for i := int(next.Add(1)) - 1; i < n; i = int(next.Add(1)) - 1 {
				do(i)
			}
		})
	}
	all.Wait()
}

func (d *drawing) svg() ([]byte, error) {
	f, err := d.make()
	if err != nil {
		return nil, err
	}
	var b bytes.Buffer
	err = f.Write(&b, "svg")
	return b.Bytes(), err
}

// withoutCaution drops the caution from a figure's description: the page says
// it once, not to every figure again.
func withoutCaution(svg []byte) []byte {
	escaped := strings.NewReplacer("'", "&#39;").Replace(caution)
	return bytes.Replace(svg, []byte(" "+escaped+"</desc>"), []byte("</desc>"), 1)
}

// chosen gives the figures that the report holds, in order: of each kind the
// first ones, those of a thing with a limit broken or near before others.
func (j *job) chosen(list []drawing) []int {
	uneasy := map[string]bool{}
	for i := range j.verdicts {
		if v := &j.verdicts[i]; v.Verdict != "held" {
			uneasy[v.Of] = true
		}
	}
	var out []int
	taken := map[string]int{}
	for _, first := range []bool{true, false} {
		for i := range list {
			d := &list[i]
			isFirst := d.asked || uneasy["release."+d.name] || uneasy["path."+d.name] || uneasy["study."+d.name]
			if isFirst == first && taken[d.of] < figuresInReport {
				taken[d.of]++
				out = append(out, i)
			}
		}
	}
	slices.Sort(out)
	return out
}

// take hands out the figures of a thing, of these kinds, and the files of those
// that the report has no room for.
func (s *shelf) take(name string, kinds ...string) (figures []page.Figure, files []page.File) {
	for _, kind := range kinds {
		for i := range s.list {
			d := &s.list[i]
			if s.taken[i] || d.asked || d.of != kind || d.name != name && name != anyName {
				continue
			}
			s.taken[i] = true
			if s.svg[i] == nil {
				files = append(files, page.File{Name: kind, Path: d.file + s.beside})
				continue
			}
			figures = append(figures, s.figure(i))
		}
	}
	return figures, files
}

// anyName takes figures of whatever name.
const anyName = "\x00"

func (s *shelf) figure(i int) page.Figure {
	d := &s.list[i]
	return page.Figure{Name: capital(d.of), SVG: s.svg[i], File: d.file + s.beside}
}

// asked hands out the figures that the scenario asks for, under its names.
func (s *shelf) asked() (figures []page.Figure, files []page.File) {
	for i := range s.list {
		d := &s.list[i]
		if !d.asked {
			continue
		}
		if s.taken[i] = true; s.svg[i] == nil {
			files = append(files, page.File{Name: d.name, Path: d.file + s.beside})
			continue
		}
		f := s.figure(i)
		f.Name = d.name + ": " + d.of
		figures = append(figures, f)
	}
	return figures, files
}

// rest hands out what no part has taken.
func (s *shelf) rest() (out []page.Figure) {
	for i := range s.list {
		if !s.taken[i] && s.svg[i] != nil {
			s.taken[i] = true
			out = append(out, s.figure(i))
		}
	}
	return out
}

func capital(s string) string { return strings.ToUpper(s[:1]) + s[1:] }
