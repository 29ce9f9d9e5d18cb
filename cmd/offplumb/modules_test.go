package main

import (
	"os"
	"os/exec"
	"slices"
	"strings"
	"testing"
)

// TestModulesAreListed holds the list of linked modules in DEVELOPERS.md, with
// their licences, against what is linked on this platform: all of it is listed,
// and on linux, which links most, nothing else.
func TestModulesAreListed(t *testing.T) {
	cmd := exec.Command("go", "list", "-deps", "-f", "{{with .Module}}{{if not .Main}}{{.Path}}{{end}}{{end}}", ".")
	cmd.Env = append(os.Environ(), "GOOS=linux")
	out, err := cmd.Output()
	if err != nil {
		t.Fatal(err)
	}
	linked := strings.Fields(string(out))
	slices.Sort(linked)
	linked = slices.Compact(linked)
	src, err := os.ReadFile("../../DEVELOPERS.md")
	if err != nil {
		t.Fatal(err)
	}
	_, text, _ := strings.Cut(string(src), "<!-- modules -->")
	text, _, _ = strings.Cut(text, "<!-- /modules -->")
	var listed []string
	for line := range strings.Lines(text) {
		cells := strings.Split(line, " | ")
		if len(cells) != 3 || strings.HasPrefix(line, "| module") {
			continue
		}
		listed = append(listed, strings.TrimPrefix(cells[0], "| "))
		if strings.TrimSpace(cells[1]) == "" {
			t.Errorf("no licence for %s", cells[0])
		}
	}
	listed = slices.DeleteFunc(listed, func(s string) bool { return s == "---" })
	if !slices.Equal(linked, listed) {
		t.Errorf("linked are %q, listed %q", linked, listed)
	}
}
