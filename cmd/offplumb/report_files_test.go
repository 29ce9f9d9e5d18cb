package main

import (
	"bytes"
	"encoding/json"
	"html"
	"os"
	"path/filepath"
	"strings"
	"testing"
)

// TestReportLeadsToAllFiles: of a scenario that has something of each kind the
// report leads to every file that was written, has a place of its own for each
// figure, and a card for each study.
func TestReportLeadsToAllFiles(t *testing.T) {
	dir := t.TempDir()
	path := filepath.Join(dir, "all.toml")
	src := strings.Replace(oneOfEach, "[output]\nfigures = \"asked\"\n", `[[sweep]]
name = "layouts"
variants = [{ name = "before" }, { name = "after", set = { "release.drop.at.height" = "1.4 m" } }]
measures = "landings.offset"
[[limit]]
name = "slow"
of = "study.tosses"
measure = "throws.speed"
max = "6 m/s"
`, 1)
	put(t, path, src+asking(t, path, src))
	out := filepath.Join(dir, "out")
	var stderr bytes.Buffer
	if got := run([]string{"run", path, "--out", out, "--quiet"}, nil, &bytes.Buffer{}, &stderr); got != exitDone {
		t.Fatalf("exit status %d: %s", got, stderr.String())
	}
	page, err := os.ReadFile(filepath.Join(out, reportFile))
	if err != nil {
		t.Fatal(err)
	}
	var record struct{ Files []entry }
	if text, err := os.ReadFile(filepath.Join(out, runFile)); err != nil || json.Unmarshal(text, &record) != nil || len(record.Files) < 30 {
		t.Fatalf("%v, %d files", err, len(record.Files))
	}
	text := html.UnescapeString(string(page))
	for _, f := range record.Files {
		if f.File != reportFile && !strings.Contains(text, `href="`+f.File+`"`) {
			t.Errorf("the report does not lead to %s, of %s", f.File, f.Of)
		}
	}
	for _, want := range []string{"What changed from the first variant", "Figures asked for", "Changes of the spin", "> map</h3>", "> tosses</h3>", "Throws of \"mug\" at 5.00 m/s"} {
		if !strings.Contains(text, want) {
			t.Errorf("no %q", want)
		}
	}
	if strings.Contains(text, "Further figures") {
		t.Error("a figure has no place of its own")
	}
}
