package main

import (
	"bytes"
	"encoding/csv"
	"math"
	"os"
	"path/filepath"
	"strconv"
	"testing"
)

// TestThrowsInAir holds the landings of 500 throws against a solution in
// quadruple precision (testdata/reference/w1). At the default tolerance every
// row is to be within 5e-8 m, s and m/s.
func TestThrowsInAir(t *testing.T) {
	const within = 5e-8
	out := filepath.Join(t.TempDir(), "out")
	var stdout, stderr bytes.Buffer
	if got := run([]string{"run", "../../testdata/reference/w1/throws.toml", "--out", out, "--no-figures", "--quiet"}, nil, &stdout, &stderr); got != exitDone {
		t.Fatalf("exit status %d: %s", got, stderr.String())
	}
	got := byRelease(t, filepath.Join(out, "landings.csv"))
	want := byRelease(t, "../../testdata/reference/w1/landings.csv")
	if len(got) != 500 || len(want) != 500 {
		t.Fatalf("%d landings, %d in the reference", len(got), len(want))
	}
	for name, row := range want {
		for _, col := range []string{"time_s", "offset_m", "offset_axial_m", "speed_m_s"} {
			if d := math.Abs(got[name][col] - row[col]); !(d <= within) {
				t.Errorf("%s: %s is %.12g, want %.12g", name, col, got[name][col], row[col])
			}
		}
	}
}

// byRelease reads a table: the numbers of each row, by its release.
func byRelease(t *testing.T, path string) map[string]map[string]float64 {
	t.Helper()
	f, err := os.Open(path)
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	rows, err := csv.NewReader(f).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	out := map[string]map[string]float64{}
	for _, row := range rows[1:] {
		nums := map[string]float64{}
		for i, field := range row[1:] {
			if x, err := strconv.ParseFloat(field, 64); err == nil {
				nums[rows[0][i+1]] = x
			}
		}
		out[row[0]] = nums
	}
	return out
}
