package scenarios_test

import (
	"flag"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/rogpeppe/go-internal/txtar"
	"offplumb/scenarios"
	"offplumb/sim/study"
)

var update = flag.Bool("update", false, "rewrite what the tests expect")

// load reads a scenario as the program does, to the end of its checks.
func load(name string, src []byte, opt scenarios.Options) error {
	sc, err := scenarios.Load(name, src, opt)
	if err != nil {
		return err
	}
	if _, problems := study.Prepare(sc.Model); len(problems) > 0 {
		return sc.Problems(problems)
	}
	return nil
}

// TestBadFiles holds every refused file against the exact words of its error.
func TestBadFiles(t *testing.T) {
	paths, err := filepath.Glob("testdata/bad*.txtar")
	if err != nil || len(paths) < 2 {
		t.Fatal(paths, err)
	}
	for _, path := range paths {
		badFiles(t, path)
	}
}

func badFiles(t *testing.T, path string) {
	t.Helper()
	ar, err := txtar.ParseFile(path)
	if err != nil {
		t.Fatal(err)
	}
	for i := 0; i+1 < len(ar.Files); i += 2 {
		in, want := &ar.Files[i], &ar.Files[i+1]
		err := load(in.Name, in.Data, scenarios.Options{})
		if err == nil {
			t.Errorf("%s is taken", in.Name)
			continue
		}
		got := err.Error() + "\n"
		for _, line := range strings.Split(strings.TrimSpace(got), "\n") {
			if !strings.HasPrefix(line, in.Name+":") && !strings.HasPrefix(line, "  hint: ") {
				t.Errorf("%s: a line of its error names no place: %q", in.Name, line)
			}
		}
		if *update {
			want.Data = []byte(got)
		} else if got != string(want.Data) {
			t.Errorf("%s says\n%swant\n%s", in.Name, got, want.Data)
		}
	}
	if *update {
		if err := os.WriteFile(path, txtar.Format(ar), 0o666); err != nil {
			t.Fatal(err)
		}
	}
}
