package main

import (
	"encoding/json"
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"path/filepath"
	"slices"
)

// runFile is the file that marks a folder as one of ours.
const runFile = "run.json"

// programName stands in every run.json.
const programName = "offplumb"

// markFile is in a folder in the making from its beginning: it tells that what a
// killed run leaves is ours, and stands in for run.json where no other could be
// written.
const markFile = ".offplumb"

// stage is an output folder in the making: files are written aside and put in
// place at the end, so that a failed run leaves what was there. The folder is
// locked for as long as its program lives.
type stage struct {
	shown        string // final as it was asked for
	final, aside string
	lock         io.Closer
	force        bool
	kind         folderKind
	placed       bool // aside is no more
}

// folderKind is a kind of output folder.
type folderKind struct {
	what string
	// known gives the files that the program wrote into a folder of the kind; ok
	// is false where it is not of the kind. All is true where it does not say
	// which: then all are.
	known func(dir string) (files []string, all, ok bool)
}

var runFolder = folderKind{"an earlier run", knownOfRun}

// newStage opens a folder beside the final one. It refuses a final one that
// holds something else, unless forced. What killed runs into the same folder
// left is put in order.
func newStage(final string, force bool, kind folderKind) (*stage, error) {
	s := &stage{shown: filepath.Clean(final), force: force, kind: kind}
	var err error
	if s.final, err = realFolder(s.shown); err != nil {
		return nil, err
	}
	tidy(s.final)
	foreign, err := s.mayReplace(s.final)
	if err != nil {
		return nil, err
	}
	if !foreign {
		if err := replaceable(s.shown, s.final); err != nil {
			return nil, err
		}
	}
	if err := os.MkdirAll(filepath.Dir(s.final), 0o777); err != nil {
		return nil, incomplete(err)
	}
	if s.aside, s.lock, err = makeAside(s.final); err != nil {
		return nil, incomplete(fmt.Errorf("cannot write beside %s: %w", s.shown, err))
	}
	if err := s.mark(); err != nil {
		s.discard()
		return nil, incomplete(fmt.Errorf("cannot write beside %s: %w", s.shown, err))
	}
	return s, nil
}

func (s *stage) mark() error {
	if err := os.Chmod(s.aside, 0o777&^umask()); err != nil {
		return err
	}
	return os.WriteFile(filepath.Join(s.aside, markFile), []byte(`{"program": "`+programName+`", "complete": false}`+"\n"), 0o666)
}

// realFolder gives the folder that a path leads to, through links.
func realFolder(path string) (string, error) {
	abs, err := filepath.Abs(path)
	if err != nil {
		return "", incomplete(err)
	}
	if info, err := os.Lstat(abs); err != nil || info.Mode()&fs.ModeSymlink == 0 {
		return abs, nil
	}
	to, err := filepath.EvalSymlinks(abs)
	if err != nil {
		return "", wrong(fmt.Errorf("%s is a link that leads nowhere, wants a folder to write into", path))
	}
	return to, nil
}

// replaceable refuses a folder that cannot be replaced as a whole.
func replaceable(shown, final string) error {
	if here, err := os.Getwd(); err == nil {
		if rel, err := filepath.Rel(final, here); err == nil && filepath.IsLocal(rel) {
			return wrong(fmt.Errorf("%s holds the folder that you are in, and results are put in place as a whole folder; choose another --out", shown))
		}
	}
	if isMount(final) {
		return wrong(fmt.Errorf("%s is the top of a file system, and results are put in place as a whole folder; choose one inside it: --out %s", shown, filepath.Join(shown, "run")))
	}
	return nil
}

// mayReplace refuses a folder that holds what is not ours, unless forced:
// foreign is true then.
func (s *stage) mayReplace(dir string) (foreign bool, err error) {
	why, err := s.holdsElse(dir)
	if err != nil || why == "" {
		return false, err
	}
	if !s.force {
		return true, wrong(fmt.Errorf("%s holds %s; choose another --out or use --force", s.shown, why))
	}
	return true, nil
}

// holdsElse says what a folder holds that may not be replaced, "" for nothing.
func (s *stage) holdsElse(dir string) (string, error) {
	entries, err := os.ReadDir(dir)
	switch {
	case errors.Is(err, fs.ErrNotExist):
		return "", nil
	case err != nil:
		if info, serr := os.Stat(dir); serr == nil && !info.IsDir() {
			return "", wrong(fmt.Errorf("%s is a file, wants a folder to write into", s.shown))
		}
		return "", incomplete(err)
	case len(entries) == 0:
		return "", nil
	}
	files, all, ok := s.kind.known(dir)
	if !ok {
		return "something else than " + s.kind.what, nil
	}
	if all {
		return "", nil
	}
	name, err := stranger(dir, files)
	if err != nil || name == "" {
		return "", incompleteIf(err)
	}
	return fmt.Sprintf("%q beside %s", name, s.kind.what), nil
}

// litter are the files that systems put into folders that are looked at.
var litter = []string{".DS_Store", "Thumbs.db", "desktop.ini", markFile}

// stranger gives the first file of a folder that is none of those named.
func stranger(dir string, files []string) (found string, err error) {
	known := map[string]bool{}
	for _, f := range files {
		known[f] = true
	}
	err = filepath.WalkDir(dir, func(path string, d fs.DirEntry, err error) error {
		if err != nil || d.IsDir() || slices.Contains(litter, d.Name()) {
			return err
		}
		rel, err := filepath.Rel(dir, path)
		if err == nil && !known[filepath.ToSlash(rel)] {
			found = filepath.ToSlash(rel)
			return fs.SkipAll
		}
		return err
	})
	return found, err
}

// knownOfRun gives the files of a run, those that its run.json names; all of a
// run that was not completed.
func knownOfRun(dir string) (files []string, all, ok bool) {
	src, err := os.ReadFile(filepath.Join(dir, runFile))
	if err != nil {
		return nil, false, false
	}
	var mark struct {
		Program  string
		Complete bool
		Files    []entry
	}
	if json.Unmarshal(src, &mark) != nil || mark.Program != programName {
		return nil, false, false
	}
	files = []string{runFile, "datapackage.json"}
	for _, f := range mark.Files {
		files = append(files, f.File)
	}
	return files, !mark.Complete, true
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
		os.Remove(path) // half a file is worse than none
		return fmt.Errorf("%s: %w", name, bare(err))
	}
	return nil
}

// bare drops the path of a file error, which may lie in the folder aside.
func bare(err error) error {
	var at *fs.PathError
	if errors.As(err, &at) {
		return at.Err
	}
	return err
}

// commit puts the folder in place. An earlier run's folder is replaced as a
// whole; into a folder that holds something else, files are put one by one,
// which needs force.
func (s *stage) commit() error {
	foreign, err := s.mayReplace(s.final) // once more: a run may take hours
	if err != nil {
		return err
	}
	if err := os.Remove(filepath.Join(s.aside, markFile)); err != nil {
		return err
	}
	if foreign {
		if err := merge(s.aside, s.final); err != nil {
			return err
		}
		s.discard()
		return nil
	}
	if err := replace(s.aside, s.final); err != nil {
		return err
	}
	s.close()
	return nil
}

// keepPartial puts what was finished beside the final folder, which stays as
// it is. It gives the place: where it was made, if it cannot be moved.
func (s *stage) keepPartial() string {
	to := s.final + ".partial"
	mark, run := filepath.Join(s.aside, markFile), filepath.Join(s.aside, runFile)
	if _, err := os.Stat(run); err != nil {
		os.Rename(mark, run)
	} else {
		os.Remove(mark)
	}
	defer s.close()
	if why, err := s.holdsElse(to); err != nil || why != "" {
		return s.aside
	}
	if err := replace(s.aside, to); err != nil {
		return s.aside
	}
	return s.shown + ".partial"
}

func (s *stage) close() {
	s.placed = true
	s.lock.Close()
}

// discard removes the folder, unless it was put in place.
func (s *stage) discard() {
	if !s.placed {
		removeFolder(s.aside)
		s.close()
	}
}
