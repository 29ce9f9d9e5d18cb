package main

import (
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"path/filepath"

	"offplumb/scenarios"
)

// inputs opens the files that a scenario names. What can be read only once, as
// standard input and pipes, is first copied to a file of its own.
type inputs struct {
	folder string
	stdin  io.Reader // nil: the scenario itself came from it
	beyond bool      // files outside the folder may be read, through links too
	once   map[string]*os.File
	sizes  map[string]int64
}

// open opens a file, as often as it is asked for. "-" is standard input.
func (n *inputs) open(path string) (io.ReadCloser, error) {
	if f, ok := n.once[path]; ok {
		return io.NopCloser(io.NewSectionReader(f, 0, n.sizes[path])), nil
	}
	if path == "-" {
		if n.stdin == nil {
			return nil, errors.New("standard input is taken by the scenario")
		}
		return n.copied(path, n.stdin)
	}
	f, err := n.file(path)
	if err != nil {
		return nil, err
	}
	info, err := f.Stat()
	if err != nil || info.Mode().IsRegular() {
		return f, err
	}
	defer f.Close()
	if info.IsDir() {
		return nil, errors.New("is a folder")
	}
	return n.copied(path, f)
}

// errBeyond refuses a link that a scenario from elsewhere may bring along.
var errBeyond = errors.New("is a link that leads outside the scenario's folder; --allow-outside permits it")

// file opens a file; only with leave one that lies outside the folder.
func (n *inputs) file(path string) (*os.File, error) {
	if n.beyond {
		if !filepath.IsAbs(path) {
			path = filepath.Join(n.folder, path)
		}
		return os.Open(path)
	}
	root, err := os.OpenRoot(n.folder)
	if err != nil {
		return nil, err
	}
	defer root.Close()
	f, err := root.Open(filepath.FromSlash(path))
	if err != nil && !errors.Is(err, fs.ErrPermission) {
		if _, there := os.Stat(filepath.Join(n.folder, path)); there == nil {
			return nil, errBeyond
		}
	}
	return f, err
}

// copied copies what can be read once into a file without a name.
func (n *inputs) copied(path string, r io.Reader) (io.ReadCloser, error) {
	f, err := os.CreateTemp("", programName+"-*")
	if err != nil {
		return nil, err
	}
	os.Remove(f.Name()) // where it is open still, it goes with the program
	size, err := io.Copy(f, r)
	if err != nil {
		return nil, fmt.Errorf("cannot copy it aside: %w", err)
	}
	if n.once == nil {
		n.once, n.sizes = map[string]*os.File{}, map[string]int64{}
	}
	n.once[path], n.sizes[path] = f, size
	return n.open(path)
}

// read reads a file as a whole, up to what may be of use.
func (n *inputs) read(path string) ([]byte, error) {
	f, err := n.open(path)
	if err != nil {
		return nil, err
	}
	defer f.Close()
	return io.ReadAll(io.LimitReader(f, scenarios.MaxListSize+1))
}
