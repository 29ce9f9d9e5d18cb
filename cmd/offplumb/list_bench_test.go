package main

import (
	"bytes"
	"fmt"
	"os"
	"path/filepath"
	"testing"
)

// BenchmarkList is a whole run of a release list on one worker, from CSV to CSV:
// the throws of testdata/reference/w1, four times over, to their landings.
func BenchmarkList(b *testing.B) {
	const times = 4
	dir := b.TempDir()
	rows, err := os.ReadFile("../../testdata/reference/w1/throws.csv")
	if err != nil {
		b.Fatal(err)
	}
	lines := bytes.Split(bytes.TrimSpace(rows), []byte("\n"))
	list := append([]byte(nil), lines[0]...)
	n := 0
	for range times {
		for _, line := range lines[1:] {
			_, rest, _ := bytes.Cut(line, []byte(","))
			list = fmt.Appendf(list, "\nt%05d,%s", n, rest)
			n++
		}
	}
	scenario, err := os.ReadFile("../../testdata/reference/w1/throws.toml")
	if err != nil {
		b.Fatal(err)
	}
	if err := os.WriteFile(filepath.Join(dir, "throws.csv"), list, 0o600); err != nil {
		b.Fatal(err)
	}
	file := filepath.Join(dir, "throws.toml")
	if err := os.WriteFile(file, scenario, 0o600); err != nil {
		b.Fatal(err)
	}
	args := []string{"run", file, "--out", filepath.Join(dir, "out"), "--no-figures", "--quiet", "--jobs", "1"}
	b.ReportAllocs()
	for b.Loop() {
		var stdout, stderr bytes.Buffer
		if got := run(args, nil, &stdout, &stderr); got != exitDone {
			b.Fatalf("exit status %d: %s", got, stderr.String())
		}
	}
	b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N)/float64(n), "ns/row")
}
