package main

import (
	"strings"
	"testing"

	"offplumb/scenarios/published"
)

// TestUnheldChecksAreSaid tries the table of a check that is not held and of
// one that cannot be run.
func TestUnheldChecksAreSaid(t *testing.T) {
	checks := published.Checks()[:3]
	results := []published.Result{{Check: checks[0], Computed: checks[0].Published}, {Check: checks[1], Computed: 2}, {Check: checks[2], Err: errBroken}}
	var b strings.Builder
	if err := checkText(&b, results); err != nil {
		t.Fatal(err)
	}
	text := b.String()
	if strings.Count(text, "  held\n") != 1 || strings.Count(text, "NOT HELD\n") != 2 || !strings.HasSuffix(text, "3 checks, 2 of them NOT HELD.\n") {
		t.Errorf("the table says\n%s", text)
	}
	if len(unheld(results)) != 2 {
		t.Errorf("%d are not held", len(unheld(results)))
	}
}
