package main

import (
	"crypto/sha256"
	"encoding/base64"
	"fmt"
	"html/template"
	"io"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"offplumb/plots/motion"
)

// computed runs a scenario without writing anything.
func computed(t *testing.T, scenario string, set ...string) *job {
	t.Helper()
	f := &runFlags{jobs: 1, seed: 1, formats: []string{"svg"}, quiet: true}
	f.sets = set
	sc, err := f.load(scenario, strings.NewReader(""))
	if err != nil {
		t.Fatal(err)
	}
	j := &job{loaded: sc, flags: f}
	if err := j.compute(t.Context(), newProgress(io.Discard, true)); err != nil {
		t.Fatal(err)
	}
	j.measure()
	return j
}

// pageOf writes a page with the players of some releases, under a policy that lets pass
// nothing but the script and the style, by their hashes.
func pageOf(t *testing.T, j *job, which ...int) string {
	t.Helper()
	var body strings.Builder
	for _, i := range which {
		f, err := j.film(i)
		if err != nil {
			t.Fatal(err)
		}
		p, err := motion.Player(f)
		if err != nil {
			t.Fatal(err)
		}
		body.WriteString(string(p))
	}
	const base = template.CSS("body{margin:16px;background:#fff}@media screen and (prefers-color-scheme:dark){body{background:#14171A}}")
	style := string(base + motion.Style())
	page := fmt.Sprintf(`<!DOCTYPE html><html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width">`+
		`<meta http-equiv="Content-Security-Policy" content="default-src 'none'; script-src %s; style-src %s; base-uri 'none'; form-action 'none'">`+
		`<title>Players</title><style>%s</style></head><body>%s<script>%s</script></body></html>`,
		hashOf(string(motion.Script())), hashOf(style), style, body.String(), motion.Script())
	path := filepath.Join(t.TempDir(), "players.html")
	if err := os.WriteFile(path, []byte(page), 0o666); err != nil {
		t.Fatal(err)
	}
	return path
}

func hashOf(text string) string {
	sum := sha256.Sum256([]byte(text))
	return "'sha256-" + base64.StdEncoding.EncodeToString(sum[:]) + "'"
}
