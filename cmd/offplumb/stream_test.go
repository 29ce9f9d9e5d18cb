package main

import (
	"bytes"
	"context"
	"fmt"
	"os"
	"path/filepath"
	"strings"
	"testing"
)

const streamed = `format = 1
[habitat]
floor_radius = "18 m"
spin = "-5.2 rpm"
length = "14 m"
[[deck]]
name = "upper"
radius = "15.4 m"
[[deck.opening]]
name = "hatch"
size = ["0.9 m", "0.9 m"]
[[body]]
name = "tin"
mass = "0.4 kg"
diameter = "8 cm"
[[release]]
name = "first"
at = { height = "1 m" }
[[release]]
name = "second"
at = { height = "1.5 m" }
[[release_list]]
file = "a.csv"
body = "tin"
[[release_list]]
file = "b.csv"
until = "landing"
[[limit]]
name = "all"
of = "release.*"
measure = "landings.speed"
max = "3 m/s"
[[limit]]
name = "surface"
of = "release.*"
measure = "landings.surface"
surface_not_in = ["upper"]
[[limit]]
name = "impacts"
of = "release.b 1*"
measure = "impacts.energy"
max = "1 J"
[[limit]]
name = "tracks"
of = ["release.a 5", "release.second"]
measure = "tracks.a_coriolis"
max = "1 m/s^2"
[[limit]]
name = "clearance"
of = "release.a 2*"
measure = "clearance.clearance"
min = "1 m"
surface_in = ["bulkhead +axial"]
`

// TestStreamedIsAsKept: a list that is streamed gives the tables that it would
// give if it were kept, byte by byte.
func TestStreamedIsAsKept(t *testing.T) {
	dir := t.TempDir()
	list := func(name string, n int) {
		var b strings.Builder
		b.WriteString("release,deck,height_m,spinward_m,axial_m,mass_kg,diameter_m\n")
		for i := range n {
			fmt.Fprintf(&b, "%s %d,%s,%g,%g,%g,%g,0.05\n", name, i, [2]string{"floor", "upper"}[i%2], 0.3+float64(i%7)/4, float64(i%11)/10-0.5, float64(i%5)/10, 0.1+float64(i)/100)
		}
		if err := os.WriteFile(filepath.Join(dir, name+".csv"), []byte(b.String()), 0o666); err != nil {
			t.Fatal(err)
		}
	}
	list("a", 60)
	list("b", 25)
	scenario := filepath.Join(dir, "s.toml")
	if err := os.WriteFile(scenario, []byte(streamed), 0o666); err != nil {
		t.Fatal(err)
	}
	tables := func(keep int) map[string][]byte {
		var stdout, stderr bytes.Buffer
		f := runFlags{out: filepath.Join(dir, fmt.Sprint("out", keep)), jobs: 3, seed: 1, noFigures: true}
		f.keepRows = keep
		if got := status(f.run(context.Background(), streams{nil, &stdout, &stderr}, scenario), &stderr); got != exitBroken {
			t.Fatalf("exit status %d: %s", got, stderr.String())
		}
		if long := strings.Count(stdout.String(), " rows. First touch"); keep > 60 && long != 0 || keep < 60 && long == 0 {
			t.Fatalf("%d rows kept: %d lists streamed", keep, long)
		}
		all, err := contents(f.out)
		if err != nil {
			t.Fatal(err)
		}
		return all
	}
	want := tables(1000)
	for _, keep := range []int{10, 40} { // both are streamed; the first alone
		got := tables(keep)
		for _, name := range []string{"landings.csv", "rests.csv", "limits.csv"} {
			if !bytes.Equal(got[name], want[name]) {
				t.Errorf("%d rows kept: %s differs:\n%s\nwant\n%s", keep, name, got[name], want[name])
			}
		}
	}
}

// TestChangedList: a list that changes between its check and its flight ends the
// run, and what was there stays.
func TestChangedList(t *testing.T) {
	for _, more := range []string{"late,1\n", "\"\n"} {
		dir := t.TempDir()
		file := filepath.Join(dir, "l.csv")
		var b strings.Builder
		b.WriteString("release,height_m\n")
		for i := range 200 {
			fmt.Fprintf(&b, "row %d,1\n", i)
		}
		put := func(src string) {
			if err := os.WriteFile(file, []byte(src), 0o666); err != nil {
				t.Fatal(err)
			}
		}
		put(b.String())
		l := loading{keepRows: 10}
		sc, err := l.source("s.toml", []byte("format = 1\n[habitat]\nfloor_radius = \"18 m\"\nspin = \"5 rpm\"\n[[release_list]]\nfile = \"l.csv\"\nuntil = \"landing\"\n"), &inputs{folder: dir})
		if err != nil {
			t.Fatal(err)
		}
		put(b.String() + more)
		var stdout, stderr bytes.Buffer
		j := &job{loaded: sc, flags: &runFlags{jobs: 2, noFigures: true}, out: filepath.Join(dir, "out")}
		got := status(j.whole(context.Background(), streams{nil, &stdout, &stderr}), &stderr)
		if want := "l.csv has changed since it was checked"; got != exitIncomplete || !strings.Contains(stderr.String(), want) {
			t.Errorf("exit status %d, %q, want %q", got, stderr.String(), want)
		}
		if _, err := os.Stat(j.out); err == nil {
			t.Error("the output folder is there")
		}
	}
}
