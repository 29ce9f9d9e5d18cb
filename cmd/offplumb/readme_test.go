package main

import (
	"bytes"
	"flag"
	"os"
	"path/filepath"
	"runtime"
	"slices"
	"strings"
	"testing"

	"offplumb/scenarios"
)

var update = flag.Bool("update", false, "rewrite the generated parts of README.md and the figures that it shows")

const (
	readme     = "../../README.md"
	formatPage = "../../scenarios/FORMAT.md"
)

// generated replaces what stands between <!-- name --> and <!-- /name -->.
func generated(t *testing.T, text, name, body string) string {
	t.Helper()
	open, shut := "<!-- "+name+" -->\n", "<!-- /"+name+" -->"
	before, rest, ok := strings.Cut(text, open)
	_, after, ok2 := strings.Cut(rest, shut)
	if !ok || !ok2 {
		t.Fatalf("the page has no part %q", name)
	}
	return before + open + body + shut + after
}

// TestReadmeIsTrue holds the README against the program: the summary, the
// example, the limits of the models, and the figures that it shows.
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
	want = generated(t, want, "example", "```toml\n"+excerpt(t, "../../scenarios/shipped/overhead-locker.toml")+"```\n")
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

// excerpt gives the first table of each sort that the README shows.
func excerpt(t *testing.T, path string) string {
	t.Helper()
	src, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	var out []string
	paragraphs := strings.Split(strings.TrimSpace(string(src)), "\n\n")
	for _, head := range []string{"format", "[habitat]", "[[body]]", "[[release]]", "[[limit]]"} {
		at := slices.IndexFunc(paragraphs, func(p string) bool { return strings.HasPrefix(p, head) })
		if at < 0 {
			t.Fatalf("%s has no %s", path, head)
		}
		out = append(out, paragraphs[at])
	}
	return strings.Join(out, "\n\n") + "\n"
}

// TestReadmeFormatPage holds the page of the format against the format.
func TestReadmeFormatPage(t *testing.T) {
	src, err := os.ReadFile(formatPage)
	if err != nil {
		t.Fatal(err)
	}
	same(t, formatPage, []byte(generated(t, string(src), "reference", scenarios.Reference())))
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
