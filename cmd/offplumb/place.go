package main

import (
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"path/filepath"
	"regexp"
	"strings"
)

// The steps of putting a folder in place, and of putting in order what a killed
// program left between them. Where the system can exchange two folders at once,
// as Linux does, a reader finds the one or the other at any time. Elsewhere the
// old one is moved aside first: a program that is killed between the two moves
// leaves it under another name, and the next run into the same folder moves it
// back.

const (
	// mostBase bounds the part of the final name that is in the name of a folder
	// aside, bytes: names hold up to 255.
	mostBase = 200
	// mostTries is how often a step is taken that another program may undo: each
	// try after the first means that one has just done the same.
	mostTries = 100
	// oldEnd is the end of the name of what is moved aside.
	oldEnd = "-old"
)

// errLocked says that another program has a folder.
var errLocked = errors.New("another program has it")

// asideStart is how the names of the folders aside begin.
func asideStart(final string) string {
	base := filepath.Base(final)
	return "." + base[:min(len(base), mostBase)] + "-"
}

// makeAside makes a folder beside the final one and locks it. Another program
// may take it for left behind before it is locked, and remove it.
func makeAside(final string) (dir string, lock io.Closer, err error) {
	for range mostTries {
		dir, err = os.MkdirTemp(filepath.Dir(final), asideStart(final)+"*")
		if err != nil {
			return "", nil, err
		}
		lock, err := lockFolder(dir)
		if err != nil {
			lock = io.NopCloser(nil) // without locks nobody takes it for left behind
		}
		if info, serr := os.Stat(dir); serr == nil && info.IsDir() && !errors.Is(err, errLocked) {
			return dir, lock, nil
		}
		lock.Close()
	}
	return "", nil, errors.New("another program removes what is made there")
}

// replace moves a folder to where another one may stand, which is removed. Two
// programs may do so at once: the last one's stays.
func replace(from, to string) (err error) {
	for range mostTries {
		err = exchange(from, to)
		switch {
		case err == nil:
			removeFolder(from) // what is left of it, the next run removes
			return nil
		case errors.Is(err, errors.ErrUnsupported):
			err = replaceInSteps(from, to)
		case errors.Is(err, fs.ErrNotExist):
			err = os.Rename(from, to)
		}
		if !errors.Is(err, fs.ErrExist) {
			return err
		}
	}
	return err
}

// replaceInSteps is replace where folders cannot be exchanged. The error wraps
// [fs.ErrExist] where another program was faster.
func replaceInSteps(from, to string) error {
	old := from + oldEnd
	err := os.Rename(to, old)
	if err != nil && !errors.Is(err, fs.ErrNotExist) {
		return err
	}
	had := err == nil
	if err := os.Rename(from, to); err != nil {
		if !had {
			return err
		}
		if errors.Is(err, fs.ErrExist) { // another's stands there, newer than the old
			removeFolder(old)
			return err
		}
		return errors.Join(err, os.Rename(old, to))
	}
	if had {
		removeFolder(old)
	}
	return nil
}

// merge moves the files of a folder into another one. It moves none where one
// cannot be.
func merge(from, to string) error {
	for _, move := range []bool{false, true} {
		if err := filepath.WalkDir(from, func(path string, d fs.DirEntry, err error) error {
			if err != nil {
				return err
			}
			rel, err := filepath.Rel(from, path)
			if err != nil {
				return err
			}
			return putOne(path, filepath.Join(to, rel), d.IsDir(), move)
		}); err != nil {
			return err
		}
	}
	return nil
}

// putOne moves a file, or makes a folder; without move it only holds that it can.
func putOne(from, to string, folder, move bool) error {
	info, err := os.Stat(to)
	switch {
	case err == nil && info.IsDir() != folder:
		return fmt.Errorf("%s is in the way", to)
	case !move:
		return nil
	case folder:
		return os.MkdirAll(to, 0o777)
	}
	return os.Rename(from, to)
}

// tidy puts in order what killed programs left beside a folder: folders aside
// that no living program holds are removed, and an old folder that was moved
// aside is moved back where none took its place. What cannot be judged stays.
func tidy(final string) {
	parent := filepath.Dir(final)
	entries, err := os.ReadDir(parent)
	if err != nil {
		return
	}
	name := regexp.MustCompile("^" + regexp.QuoteMeta(asideStart(final)) + `[0-9]+(` + oldEnd + `)?$`)
	for _, e := range entries {
		if e.IsDir() && name.MatchString(e.Name()) {
			tidyOne(filepath.Join(parent, e.Name()), final)
		}
	}
}

func tidyOne(dir, final string) {
	owner := strings.TrimSuffix(dir, oldEnd)
	lock, err := lockFolder(owner)
	switch {
	case err == nil:
		defer lock.Close()
	case owner == dir || !errors.Is(err, fs.ErrNotExist):
		return // a program has it, or nobody can tell
	}
	if owner != dir && isMissing(final) {
		if os.Rename(dir, final) == nil {
			return
		}
	}
	if leftBehind(dir) {
		removeFolder(dir)
	}
}

// removeFolder removes a folder, what marks it as ours last: a program that is
// killed meanwhile leaves what can be told.
func removeFolder(dir string) {
	entries, err := os.ReadDir(dir)
	if err != nil {
		return
	}
	for _, e := range entries {
		if name := e.Name(); name != markFile && name != runFile && name != partFile {
			os.RemoveAll(filepath.Join(dir, name))
		}
	}
	os.RemoveAll(dir)
}

func isMissing(path string) bool {
	_, err := os.Lstat(path)
	return errors.Is(err, fs.ErrNotExist)
}

// leftBehind says whether a folder is empty or bears a mark of ours.
func leftBehind(dir string) bool {
	entries, err := os.ReadDir(dir)
	if err != nil || len(entries) == 0 {
		return err == nil
	}
	if _, err := os.Stat(filepath.Join(dir, markFile)); err == nil {
		return true
	}
	_, _, run := knownOfRun(dir)
	_, part := readPartFile(dir)
	return run || part == nil
}
