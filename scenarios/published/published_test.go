package published

import (
	"context"
	"errors"
	"strings"
	"testing"
)

// TestChecksHold runs every check.
func TestChecksHold(t *testing.T) {
	results, err := Run(context.Background(), Checks())
	if err != nil {
		t.Fatal(err)
	}
	for i := range results {
		r := &results[i]
		if !r.Held() {
			t.Errorf("%s, %s (%s): %.12g %s, published %.12g +- %.3g: %v", r.Group, r.Name, r.Source, r.Computed, r.Unit, r.Published, r.Tolerance, r.Err)
		}
	}
}

// TestChecksCanFail tries that no check holds where the published figure is
// another, by three tolerances.
func TestChecksCanFail(t *testing.T) {
	checks := Checks()
	for i := range checks {
		checks[i].Published += 3 * checks[i].Tolerance
	}
	results, err := Run(context.Background(), checks)
	if err != nil {
		t.Fatal(err)
	}
	for i := range results {
		if results[i].Held() {
			t.Errorf("%s, %s holds another figure", results[i].Group, results[i].Name)
		}
	}
}

// TestChecksSayWhy tries that each names its source, and that faults stop at
// their own check.
func TestChecksSayWhy(t *testing.T) {
	checks := Checks()
	seen := map[string]bool{}
	for _, c := range checks {
		id := c.Group + c.Source + c.Name
		if c.Source == "" || c.Group == "" || c.Name == "" || c.Tolerance <= 0 || seen[id] {
			t.Errorf("%q, %q, %q: not told apart or without tolerance", c.Group, c.Source, c.Name)
		}
		seen[id] = true
	}
	bad := checks[0]
	bad.toml = strings.Replace(bad.toml, "spin", "spun", 1)
	results, err := Run(context.Background(), []Check{bad, checks[0]})
	if err != nil || results[0].Held() || results[0].Err == nil || !results[1].Held() {
		t.Errorf("%+v, %v", results, err)
	}
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	if _, err := Run(ctx, checks); !errors.Is(err, context.Canceled) {
		t.Errorf("an ended context gives %v", err)
	}
}
