package scenarios

import (
	"embed"
	"io/fs"
	"path"
	"strings"
)

// The shipped scenarios lie in shipped/, each with the files that it names.
//
//go:embed shipped
var shipped embed.FS

// ExampleFile is a file of a shipped scenario.
type ExampleFile struct {
	Name string
	Data []byte
}

// Example is a shipped scenario.
type Example struct {
	Name  string // of the file, without its ending
	Title string
	Files []ExampleFile // the scenario first, then the files that it names
}

// Examples gives the shipped scenarios, by name.
func Examples() []Example {
	names, err := fs.Glob(shipped, "shipped/*.toml")
	if err != nil {
		panic(err) // the pattern is sound
	}
	out := make([]Example, 0, len(names))
	for _, n := range names {
		e, err := readExample(n)
		if err != nil {
			panic(err) // a test loads them all
		}
		out = append(out, e)
	}
	return out
}

func readExample(name string) (Example, error) {
	src, err := shipped.ReadFile(name)
	if err != nil {
		return Example{}, err
	}
	sc, err := Load(path.Base(name), src, Options{ReadFile: readShipped})
	if err != nil {
		return Example{}, err
	}
	e := Example{Name: strings.TrimSuffix(path.Base(name), ".toml"), Title: sc.Title,
		Files: []ExampleFile{{path.Base(name), src}}}
	for _, in := range sc.Inputs[1:] {
		data, err := readShipped(in.Name)
		if err != nil {
			return Example{}, err
		}
		e.Files = append(e.Files, ExampleFile{in.Name, data})
	}
	return e, nil
}

func readShipped(name string) ([]byte, error) { return shipped.ReadFile("shipped/" + name) }

// ExampleNamed finds a shipped scenario.
func ExampleNamed(name string) (Example, bool) {
	for _, e := range Examples() {
		if e.Name == name {
			return e, true
		}
	}
	return Example{}, false
}
