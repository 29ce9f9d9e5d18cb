package main

import (
	"bytes"
	"errors"
	"path/filepath"
	"slices"
	"strings"
	"testing"
)

// TestOpen: the report is opened once it is in place; where that fails it is
// said, and the run is a success all the same.
func TestOpen(t *testing.T) {
	real := openFile
	t.Cleanup(func() { openFile = real })
	for _, c := range []struct {
		fails error
		says  string
	}{{nil, ""}, {errors.New("no browser here"), "cannot open the report: no browser here"}} {
		opened := ""
		openFile = func(path string) error { opened = path; return c.fails }
		out := filepath.Join(t.TempDir(), "out")
		var stdout, stderr bytes.Buffer
		if got := run([]string{"run", "../../scenarios/shipped/overhead-locker.toml", "--out", out, "--open"}, nil, &stdout, &stderr); got != exitDone {
			t.Errorf("exit status %d: %s", got, stderr.String())
		}
		if want := filepath.Join(out, reportFile); opened != want {
			t.Errorf("opened %q, want %q", opened, want)
		}
		if got := stderr.String(); !strings.Contains(got, c.says) || c.says == "" && got != "" {
			t.Errorf("stderr %q, want %q", got, c.says)
		}
	}
}

func TestOpener(t *testing.T) {
	for system, want := range map[string][]string{
		"linux": {"xdg-open", "x.html"}, "freebsd": {"xdg-open", "x.html"}, "darwin": {"open", "x.html"},
		"windows": {"rundll32", "url.dll,FileProtocolHandler", "x.html"},
	} {
		if got := opener(system, "x.html").Args; !slices.Equal(got, want) {
			t.Errorf("%s: %v, want %v", system, got, want)
		}
	}
}
