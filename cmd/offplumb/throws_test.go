package main

import (
	"bytes"
	"encoding/csv"
	"fmt"
	"math"
	"os"
	"path/filepath"
	"strconv"
	"testing"
)

const throwHall = `format = 1
[habitat]
floor_radius = "18 m"
spin = "%s"
length = "14 m"
[[body]]
name = "wrench"
mass = "1.4 kg"
diameter = "60 mm"
`

// TestThrowPastedBack: speed, heading and elevation of a solution, pasted into
// the throw of a release, bring the body to the target.
func TestThrowPastedBack(t *testing.T) {
	for _, spin := range []string{"5.2 rpm", "-5.2 rpm"} {
		dir := t.TempDir()
		head := fmt.Sprintf(throwHall, spin)
		runScenario(t, dir, "a", head+`[[throw_to]]
name = "toss"
from = { spinward = "2 m", axial = "-1 m", height = "1.5 m" }
body = "wrench"
target = { spinward = "-4 m", axial = "2 m", height = "1.2 m" }
speed = "9 m/s"
leaves = "3 s"
`)
		rows := column(t, filepath.Join(dir, "a-out/throws/toss.csv"), "speed_m_s", "heading_deg", "elevation_deg", "time_s")
		if len(rows) < 2 {
			t.Fatalf("spin %s: %d throws", spin, len(rows))
		}
		for i, r := range rows {
			runScenario(t, dir, "b", head+fmt.Sprintf(`[[release]]
name = "again"
body = "wrench"
at = { spinward = "2 m", axial = "-1 m", height = "1.5 m" }
time = "3 s"
throw = { speed = "%s m/s", heading = "%s deg", elevation = "%s deg" }
until = "%s s"
`, r[0], r[1], r[2], r[3]))
			track := column(t, filepath.Join(dir, "b-out/tracks/again.csv"), "spinward_m", "axial_m", "height_m")
			last := track[len(track)-1]
			arc := math.Remainder(num(t, last[0])+4, 2*math.Pi*18)
			off := math.Hypot(math.Hypot(arc, num(t, last[1])-2), num(t, last[2])-1.2)
			if off > 1e-6 {
				t.Errorf("spin %s, throw %d: %g m off", spin, i+1, off)
			}
		}
	}
}

func runScenario(t *testing.T, dir, name, src string) {
	t.Helper()
	file := filepath.Join(dir, name+".toml")
	if err := os.WriteFile(file, []byte(src), 0o666); err != nil {
		t.Fatal(err)
	}
	var stdout, stderr bytes.Buffer
	if got := run([]string{"run", file, "--out", filepath.Join(dir, name+"-out"), "--no-figures"}, nil, &stdout, &stderr); got != exitDone {
		t.Fatalf("exit status %d: %s", got, stderr.String())
	}
}

// column reads columns of a table as they stand.
func column(t *testing.T, path string, names ...string) (out [][]string) {
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
	for _, row := range rows[1:] {
		var cells []string
		for _, name := range names {
			for k, head := range rows[0] {
				if head == name {
					cells = append(cells, row[k])
				}
			}
		}
		out = append(out, cells)
	}
	return out
}

func num(t *testing.T, s string) float64 {
	t.Helper()
	x, err := strconv.ParseFloat(s, 64)
	if err != nil {
		t.Fatal(err)
	}
	return x
}
