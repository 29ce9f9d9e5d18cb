package main

import (
	"bytes"
	"math"
	"path/filepath"
	"testing"
)

// TestErrorCoversReference holds the numerical error of 500 throws in air to
// their true one, by a solution in quadruple precision (testdata/reference/w1),
// at several tolerances: at least 99 of 100 are covered.
func TestErrorCoversReference(t *testing.T) {
	want := byRelease(t, "../../testdata/reference/w1/landings.csv")
	for _, tol := range []string{"1e-5", "1e-6", "1e-7", "1e-8", "1e-9", "1e-10"} {
		out := filepath.Join(t.TempDir(), "out")
		var stdout, stderr bytes.Buffer
		if got := run([]string{"run", "../../testdata/reference/w1/throws.toml", "--set", "solver.relative_tolerance=" + tol, "--out", out, "--no-figures", "--no-report", "--quiet"}, nil, &stdout, &stderr); got != exitDone {
			t.Fatalf("exit status %d: %s", got, stderr.String())
		}
		covered, worst := 0, 0.0
		for name, row := range byRelease(t, filepath.Join(out, "landings.csv")) {
			off := func(col string) float64 { return math.Abs(row[col] - want[name][col]) }
			share := max(math.Hypot(off("offset_m"), off("offset_axial_m"))/row["error_m"], off("time_s")/row["error_s"], off("speed_m_s")/row["error_m_s"])
			if worst = max(worst, share); share <= 1 {
				covered++
			}
		}
		t.Logf("at %s: %d covered, the worst %.3g of its estimate", tol, covered, worst)
		if covered < len(want)*99/100 {
			t.Errorf("at %s: %d of %d landings within their numerical error, the worst %.3g times it", tol, covered, len(want), worst)
		}
	}
}

// TestTiny writes errors with one digit, rounded up.
func TestTiny(t *testing.T) {
	for _, c := range []struct {
		x    float64
		want string
	}{{2.3e-9, "3e-9"}, {2e-9, "2e-9"}, {9.1e-11, "1e-10"}, {0.00042, "5e-4"}, {0, "0"}, {12, "2e1"}, {1.5, "2"}} {
		if got := tiny(c.x); got != c.want {
			t.Errorf("%g is written %s, want %s", c.x, got, c.want)
		}
	}
}
