package scenarios_test

import (
	"errors"
	"strings"
	"testing"
	"unicode"

	"github.com/rogpeppe/go-internal/txtar"
	"offplumb/scenarios"
)

// FuzzLoad loads anything, with a setting and with any text for every list. It
// must not panic, and each fault must name its place and read well: a file, a
// line and a column from 1, or the setting; one line, and one of its hint.
func FuzzLoad(f *testing.F) {
	for _, e := range scenarios.Examples() {
		list := ""
		for _, file := range e.Files[1:] {
			list = string(file.Data)
		}
		f.Add(string(e.Files[0].Data), `habitat.spin="4 rpm"`, list)
	}
	ar, err := txtar.ParseFile("testdata/bad.txtar")
	if err != nil {
		f.Fatal(err)
	}
	for _, file := range ar.Files {
		if strings.HasSuffix(file.Name, ".toml") {
			f.Add(string(file.Data), "", "release,height_m\na,1\n")
		}
	}
	f.Add(settable, `release."drop".at={height="2 m"}`, settableList)
	f.Add(settable, "title=\"a\"\nb = 1", "release;height_m\na;1,5\n")
	f.Add(settable, `body."a=b.c".mass=1`, "release,height_m\n\"a\nb\",x\n\"")
	f.Fuzz(func(t *testing.T, src, set, list string) {
		opt := scenarios.Options{ReadFile: func(string) ([]byte, error) { return []byte(list), nil }, AllowOutside: true}
		if set != "" {
			opt.Sets = []string{set}
		}
		sc, err := scenarios.Load("fuzz.toml", []byte(src), opt)
		if err == nil {
			if sc == nil || sc.Model == nil || len(sc.Inputs) == 0 {
				t.Fatal("no scenario and no error")
			}
			return
		}
		var faults scenarios.ErrorList
		if !errors.As(err, &faults) || len(faults) == 0 {
			t.Fatalf("no list of faults: %v", err)
		}
		for _, e := range faults {
			checkFault(t, e)
		}
	})
}

func checkFault(t *testing.T, e scenarios.Error) {
	t.Helper()
	atFile := e.File != "" && e.Line >= 1 && e.Col >= 1
	if !atFile && !strings.HasPrefix(e.File, "--set ") {
		t.Errorf("no place: %+v", e)
	}
	lines := strings.Split(e.Error(), "\n")
	if len(lines) > 2 || len(lines) == 2 && (e.Hint == "" || !strings.HasPrefix(lines[1], "  hint: ")) {
		t.Errorf("an error of %d lines: %q", len(lines), e.Error())
	}
	for _, line := range lines {
		if strings.ContainsFunc(line, unicode.IsControl) {
			t.Errorf("control characters in %q", line)
		}
	}
	if e.Msg == "" {
		t.Errorf("it says nothing: %+v", e)
	}
}
