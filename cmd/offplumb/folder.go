package main

import (
	"encoding/json"
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"path/filepath"
)

// runFile is the file that marks a folder as one of ours.
const runFile = "run.json"

// programName stands in every run.json.
const programName = "offplumb"

// stage is an output folder in the making: files are written aside and put in
// place at the end, so that a failed run leaves what was there.
type stage struct {
	final, aside string
	force        bool
	foreign      bool // final holds something that is not ours
	ours         func(dir string) bool
}

// newStage opens a folder beside the final one. It refuses a final one that
// holds something else, unless forced.
func newStage(final string, force bool) (*stage, error) {
	return newStageOf(final, force, "an earlier run", ours)
}

// newStageOf is newStage for a folder of a kind that ours knows and what names.
func newStageOf(final string, force bool, what string, ours func(dir string) bool) (*stage, error) {
	final = filepath.Clean(final)
	s := &stage{final: final, force: force, ours: ours}
	foreign, err := s.holdsElse(final)
	if err != nil {
		return nil, err
	}
	if foreign && !force {
		return nil, wrong(fmt.Errorf("%s holds something else than %s; choose another --out or use --force", final, what))
	}
	s.foreign = foreign
	parent := filepath.Dir(final)
	if err := os.MkdirAll(parent, 0o777); err != nil {
		return nil, incomplete(err)
	}
	s.aside, err = os.MkdirTemp(parent, "."+filepath.Base(final)+"-*")
	if err != nil {
		return nil, incomplete(fmt.Errorf("cannot write beside %s: %w", final, err))
	}
	if err := os.Chmod(s.aside, 0o777&^umask()); err != nil {
		s.discard()
		return nil, incomplete(err)
	}
	return s, nil
}

// holdsElse says whether a folder holds files but not what may be replaced.
func (s *stage) holdsElse(dir string) (bool, error) {
	entries, err := os.ReadDir(dir)
	switch {
	case errors.Is(err, fs.ErrNotExist):
		return false, nil
	case err != nil:
		if info, serr := os.Stat(dir); serr == nil && !info.IsDir() {
			return false, wrong(fmt.Errorf("%s is a file, wants a folder to write into", dir))
		}
		return false, incomplete(err)
	case len(entries) == 0:
		return false, nil
	}
	return !s.ours(dir), nil
}

func ours(dir string) bool {
	src, err := os.ReadFile(filepath.Join(dir, runFile))
	if err != nil {
		return false
	}
	var mark struct{ Program string }
	return json.Unmarshal(src, &mark) == nil && mark.Program == programName
}

// create creates a file of the folder, to be written while the run goes on.
func (s *stage) create(name string) (*os.File, error) {
	return os.Create(filepath.Join(s.aside, name))
}

// file creates a file of the folder, with the folders above it, and hands it
// to write.
func (s *stage) file(name string, write func(io.Writer) error) error {
	path := filepath.Join(s.aside, filepath.FromSlash(name))
	if !filepath.IsLocal(filepath.FromSlash(name)) {
		return fmt.Errorf("file name %q leads out of the output folder", name)
	}
	if err := os.MkdirAll(filepath.Dir(path), 0o777); err != nil {
		return err
	}
	f, err := os.Create(path)
	if err != nil {
		return err
	}
	err = write(f)
	if cerr := f.Close(); err == nil {
		err = cerr
	}
	if err != nil {
		return fmt.Errorf("%s: %w", name, err)
	}
	return nil
}

// commit puts the folder in place. An earlier run's folder is replaced as a
// whole; into a folder that holds something else, files are put one by one.
func (s *stage) commit() error {
	if s.foreign {
		defer s.discard()
		return s.merge()
	}
	return replace(s.aside, s.final)
}

// keepPartial puts what was finished beside the final folder, which stays as
// it is. It gives the place.
func (s *stage) keepPartial() (string, error) {
	to := s.final + ".partial"
	if foreign, err := s.holdsElse(to); err != nil || foreign {
		s.discard()
		return "", err
	}
	return to, replace(s.aside, to)
}

// replace moves a folder to where another one may stand.
func replace(from, to string) error {
	old := from + "-old"
	err := os.Rename(to, old)
	if err != nil && !errors.Is(err, fs.ErrNotExist) {
		return err
	}
	had := err == nil
	if err := os.Rename(from, to); err != nil {
		if had {
			err = errors.Join(err, os.Rename(old, to))
		}
		return err
	}
	if had {
		return os.RemoveAll(old)
	}
	return nil
}

func (s *stage) merge() error {
	return filepath.WalkDir(s.aside, func(path string, d fs.DirEntry, err error) error {
		if err != nil {
			return err
		}
		rel, err := filepath.Rel(s.aside, path)
		if err != nil {
			return err
		}
		to := filepath.Join(s.final, rel)
		if d.IsDir() {
			return os.MkdirAll(to, 0o777)
		}
		return os.Rename(path, to)
	})
}

func (s *stage) discard() { os.RemoveAll(s.aside) }
