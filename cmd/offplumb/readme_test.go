package main

import (
	"bytes"
	"flag"
	"os"
	"path/filepath"
	"runtime"
	"strings"
	"testing"

	"offplumb/scenarios"
)

var update = flag.Bool("update", false, "rewrite the generated parts of README.md and the figures that it shows")

const readme = "../../README.md"

// generated replaces what stands between <!-- name --> and <!-- /name -->.
func generated(t *testing.T, text, name, body string) string {
	t.Helper()
	open, shut := "<!-- "+name+" -->\n", "<!-- /"+name+" -->"
	before, rest, ok := strings.Cut(text, open)
	_, after, ok2 := strings.Cut(rest, shut)
	if !ok || !ok2 {
		t.Fatalf("README.md has no part %q", name)
	}
	return before + open + body + shut + after
}

// TestReadmeIsTrue holds the README against the program: the table of the
// format, the summary, and the figures that it shows.
func TestReadmeIsTrue(t *testing.T) {
	if runtime.GOARCH != "amd64" {
		t.Skip("bytes are held for one architecture: others may fuse multiply and add")
	}
	src, err := os.ReadFile(readme)
	if err != nil {
		t.Fatal(err)
	}
	out := filepath.Join(t.TempDir(), "overhead-locker-out")
	var stdout, stderr bytes.Buffer
	if got := run([]string{"run", "../../scenarios/shipped/overhead-locker.toml", "--out", out}, nil, &stdout, &stderr); got != exitDone {
		t.Fatalf("exit status %d: %s", got, stderr.String())
	}
	summary := strings.ReplaceAll(stdout.String(), out, "overhead-locker-out")
	want := generated(t, string(src), "summary", "```\n"+summary+"```\n")
	want = generated(t, want, "reference", scenarios.Reference())
	want = generated(t, want, "limits", modelLimits())
	same(t, readme, []byte(want))
	for _, name := range []string{"wrench-slips-out-side.svg", "wrench-slips-out-inertial.svg"} {
		figure, err := os.ReadFile(filepath.Join(out, name))
		if err != nil {
			t.Fatal(err)
		}
		same(t, filepath.Join("../../testdata/figures", name), figure)
	}
}

// same holds a file against what it should be, or rewrites it.
func same(t *testing.T, path string, want []byte) {
	t.Helper()
	if *update {
		if err := os.WriteFile(path, want, 0o666); err != nil {
			t.Fatal(err)
		}
		return
	}
	got, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	if !bytes.Equal(got, want) {
		t.Errorf("%s is not what the program gives; go test ./cmd/offplumb -run Readme -update rewrites it", path)
	}
}

// TestReadmeChecksPage holds the page of the published checks against what selfcheck
// prints.
func TestReadmeChecksPage(t *testing.T) {
	if runtime.GOARCH != "amd64" {
		t.Skip("last digits are held for one architecture")
	}
	var stdout, stderr bytes.Buffer
	if got := run([]string{"selfcheck", "--format", "markdown"}, nil, &stdout, &stderr); got != exitDone {
		t.Fatalf("exit status %d: %s", got, stderr.String())
	}
	same(t, "../../scenarios/published/CHECKS.md", stdout.Bytes())
}
