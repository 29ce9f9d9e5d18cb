package scenarios_test

import (
	"os"
	"path/filepath"
	"slices"
	"testing"

	"offplumb/scenarios"
	"offplumb/sim/study"
)

// exampleFile finds a file of a shipped scenario.
func exampleFile(e *scenarios.Example) func(string) ([]byte, error) {
	return func(name string) ([]byte, error) {
		i := slices.IndexFunc(e.Files, func(f scenarios.ExampleFile) bool { return f.Name == name })
		if i < 0 {
			return nil, os.ErrNotExist
		}
		return e.Files[i].Data, nil
	}
}

// TestExamples: every shipped scenario loads with the files that come with it
// and nothing else, is ready to run, and says what it is.
func TestExamples(t *testing.T) {
	all := scenarios.Examples()
	if len(all) == 0 {
		t.Fatal("there are none")
	}
	for i := range all {
		e := &all[i]
		sc, err := scenarios.Load(e.Files[0].Name, e.Files[0].Data, scenarios.Options{ReadFile: exampleFile(e)})
		if err != nil {
			t.Errorf("%s: %v", e.Name, err)
			continue
		}
		if _, problems := study.Prepare(sc.Model); len(problems) > 0 {
			t.Errorf("%s: %v", e.Name, sc.Problems(problems))
		}
		if e.Files[0].Name != e.Name+".toml" || e.Title == "" || e.Title == e.Name {
			t.Errorf("%s: its file is %s, its title %q", e.Name, e.Files[0].Name, e.Title)
		}
	}
	if !slices.IsSortedFunc(all, func(a, b scenarios.Example) int {
		if a.Name < b.Name {
			return -1
		}
		return 1
	}) {
		t.Error("they are not in the order of their names")
	}
}

// TestShippedFilesAreUsed: nothing lies in the folder that no scenario names.
func TestShippedFilesAreUsed(t *testing.T) {
	used := map[string]bool{}
	for _, e := range scenarios.Examples() {
		for _, f := range e.Files {
			used[f.Name] = true
		}
	}
	files, err := filepath.Glob("shipped/*")
	if err != nil || len(files) == 0 {
		t.Fatal(files, err)
	}
	for _, f := range files {
		if !used[filepath.Base(f)] {
			t.Errorf("%s is named by no scenario", f)
		}
	}
}

func TestExampleNamed(t *testing.T) {
	if e, ok := scenarios.ExampleNamed("galley-ring"); !ok || e.Name != "galley-ring" || len(e.Files) != 2 || e.Files[1].Name != "stowage.csv" {
		t.Errorf("got %s with %d files, %t", e.Name, len(e.Files), ok)
	}
	if _, ok := scenarios.ExampleNamed("galley-ring.toml"); ok {
		t.Error("a file name is taken for a name")
	}
}

// BenchmarkLoad reads a shipped scenario with its release list.
func BenchmarkLoad(b *testing.B) {
	e, ok := scenarios.ExampleNamed("galley-ring")
	if !ok {
		b.Fatal("there is no galley-ring")
	}
	opt := scenarios.Options{ReadFile: exampleFile(&e)}
	b.ReportAllocs()
	b.SetBytes(int64(len(e.Files[0].Data)))
	for b.Loop() {
		if _, err := scenarios.Load("galley-ring.toml", e.Files[0].Data, opt); err != nil {
			b.Fatal(err)
		}
	}
}
