package main

import (
	"bytes"
	"flag"
	"fmt"
	"os"
	"path/filepath"
	"regexp"
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
	want = generated(t, want, "trust", modelTable())
	want = generated(t, want, "contents", contentsOf(want))
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

// contentsOf lists the headings of a page that stand outside fenced blocks.
func contentsOf(page string) string {
	var out strings.Builder
	fenced := false
	for line := range strings.Lines(page) {
		line = strings.TrimSpace(line)
		if strings.HasPrefix(line, "```") {
			fenced = !fenced
		}
		level, title, ok := strings.Cut(line, " ")
		if fenced || !ok || level != "##" && level != "###" {
			continue
		}
		fmt.Fprintf(&out, "%s- [%s](#%s)\n", strings.Repeat("  ", len(level)-2), title, anchor(strings.ReplaceAll(title, " ", "-")))
	}
	return out.String()
}

// TestReadmeLinks: every link of the pages to a file or a heading leads
// somewhere.
func TestReadmeLinks(t *testing.T) {
	link := regexp.MustCompile(`\]\(([^)\s]+)\)`)
	links := 0
	for _, page := range []string{readme, "../../DEVELOPERS.md", formatPage, tutorial, columnsPage, filepath.Join(frozenDir, "README.md")} {
		src, err := os.ReadFile(page)
		if err != nil {
			t.Fatal(err)
		}
		for _, m := range link.FindAllStringSubmatch(string(src), -1) {
			links++
			file, heading, _ := strings.Cut(m[1], "#")
			if file == "" {
				if heading = "(#" + heading + ")"; !strings.Contains(contentsOf(string(src)), heading) {
					t.Errorf("%s has no heading for %s", page, m[1])
				}
			} else if _, err := os.Stat(filepath.Join(filepath.Dir(page), file)); err != nil {
				t.Errorf("%s: %v", page, err)
			}
		}
	}
	if links < 20 {
		t.Errorf("only %d links", links)
	}
}

// TestReadmeFormatPage holds the page of the format against the format.
func TestReadmeFormatPage(t *testing.T) {
	src, err := os.ReadFile(formatPage)
	if err != nil {
		t.Fatal(err)
	}
	want := generated(t, string(src), "reference", scenarios.Reference())
	same(t, formatPage, []byte(generated(t, want, "units", scenarios.Units())))
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
