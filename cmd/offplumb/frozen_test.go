package main

import (
	"bytes"
	"encoding/csv"
	"encoding/json"
	"errors"
	"io/fs"
	"maps"
	"math"
	"os"
	"path/filepath"
	"slices"
	"strconv"
	"strings"
	"testing"

	"github.com/pelletier/go-toml/v2"

	"offplumb/scenarios"
)

const frozenDir = "../../testdata/frozen"

// Frozen numbers may differ by this share of them: 1000 times the tolerance
// of a step, far less than what anyone designs to. What is 0 but for rounding
// is held to the second, in the column's unit; a small angle comes of a cosine
// near 1, whose rounding of 1e-16 is 1e-6 deg, and is held to the third.
const (
	frozenRelative = 1e-6
	frozenAbsolute = 1e-9
	frozenDegrees  = 1e-5
)

// loose says which columns are not held: prose, whose words may change, and
// what names one of several equals: the time of an approach that lasts, and the flight that is
// the worst of a cell where another comes from the other side.
func loose(file, column string) bool {
	return column == "story" || file == "clearance.csv" && column == "time_s" ||
		strings.HasPrefix(filepath.ToSlash(file), "maps/") && strings.HasPrefix(column, "from")
}

// TestFrozen runs the scenarios of testdata/frozen and wants their tables as
// they were: each file, row and column that is frozen, with its numbers. New
// ones may come. With -update the tables of a scenario that has none yet are
// written; those that are there stay.
func TestFrozen(t *testing.T) {
	paths, err := filepath.Glob(filepath.Join(frozenDir, "*.toml"))
	if err != nil || len(paths) < 12 {
		t.Fatal(len(paths), err)
	}
	for _, path := range paths {
		dir := strings.TrimSuffix(path, ".toml")
		t.Run(filepath.Base(dir), func(t *testing.T) {
			out := filepath.Join(t.TempDir(), "out")
			var stdout, stderr bytes.Buffer
			if got := run([]string{"run", path, "--out", out, "--no-figures", "--no-report", "--quiet"}, nil, &stdout, &stderr); got > exitBroken {
				t.Fatalf("exit status %d: %s", got, stderr.String())
			}
			if _, err := os.Stat(dir); *update && errors.Is(err, fs.ErrNotExist) {
				freeze(t, out, dir)
			}
			tables := 0
			for name, want := range tablesIn(t, dir) {
				tables++
				got, err := os.ReadFile(filepath.Join(out, name))
				if err != nil {
					t.Errorf("%v: go test ./cmd/offplumb -run Frozen -update writes the tables of a new scenario", err)
					continue
				}
				for _, fault := range thawed(name, records(t, want), records(t, got)) {
					t.Errorf("%s: %s", name, fault)
				}
			}
			if tables < 3 {
				t.Errorf("%d tables are frozen", tables)
			}
		})
	}
}

// tablesIn reads the tables of a folder. Tracks are left out: their rows are
// many, and landings and rests follow from them.
func tablesIn(t *testing.T, dir string) map[string][]byte {
	t.Helper()
	all, err := contents(dir)
	if err != nil {
		t.Fatal(err)
	}
	maps.DeleteFunc(all, func(name string, _ []byte) bool {
		return filepath.Ext(name) != ".csv" || strings.HasPrefix(name, "tracks")
	})
	return all
}

func freeze(t *testing.T, out, dir string) {
	t.Helper()
	for name, data := range tablesIn(t, out) {
		path := filepath.Join(dir, name)
		if err := os.MkdirAll(filepath.Dir(path), 0o777); err != nil {
			t.Fatal(err)
		}
		if err := os.WriteFile(path, data, 0o666); err != nil {
			t.Fatal(err)
		}
	}
}

func records(t *testing.T, data []byte) [][]string {
	t.Helper()
	rows, err := csv.NewReader(bytes.NewReader(data)).ReadAll()
	if err != nil || len(rows) == 0 {
		t.Fatal(len(rows), err)
	}
	return rows
}

// thawed tells where a table is not what it was.
func thawed(file string, want, got [][]string) (out []string) {
	if len(got) != len(want) {
		return []string{strconv.Itoa(len(got)-1) + " rows, frozen are " + strconv.Itoa(len(want)-1)}
	}
	for i, column := range want[0] {
		at := slices.Index(got[0], column)
		if at < 0 {
			out = append(out, "no column "+column)
			continue
		}
		if loose(file, column) {
			continue
		}
		for r := range want[1:] {
			if w, g := want[r+1][i], got[r+1][at]; !alike(column, w, g) {
				out = append(out, "row "+strconv.Itoa(r+1)+", "+column+": "+g+", frozen is "+w)
			}
		}
	}
	return out
}

func alike(column, a, b string) bool {
	x, err := strconv.ParseFloat(a, 64)
	y, err2 := strconv.ParseFloat(b, 64)
	if err != nil || err2 != nil {
		return a == b
	}
	floor := frozenAbsolute
	if strings.HasSuffix(column, "_deg") {
		floor = frozenDegrees
	}
	return math.Abs(x-y) <= floor+frozenRelative*math.Abs(x)
}

// TestFrozenNotices: a difference of each sort is told, and a new column is
// none.
func TestFrozenNotices(t *testing.T) {
	want := [][]string{{"release", "time_s", "story"}, {"a", "1.5", "x"}, {"b", "", "y"}}
	for _, c := range []struct {
		what string
		got  [][]string
		bad  int
	}{
		{"the same", [][]string{{"release", "time_s", "story"}, {"a", "1.5000001", "z"}, {"b", "", "y"}}, 0},
		{"a new column", [][]string{{"release", "new", "time_s", "story"}, {"a", "1", "1.5", "x"}, {"b", "1", "", "y"}}, 0},
		{"a number", [][]string{{"release", "time_s", "story"}, {"a", "1.50001", "x"}, {"b", "", "y"}}, 1},
		{"a value where none was", [][]string{{"release", "time_s", "story"}, {"a", "1.5", "x"}, {"b", "0", "y"}}, 1},
		{"a text", [][]string{{"release", "time_s", "story"}, {"c", "1.5", "x"}, {"b", "", "y"}}, 1},
		{"a column", [][]string{{"release", "story"}, {"a", "x"}, {"b", "y"}}, 1},
		{"a row", [][]string{{"release", "time_s", "story"}, {"a", "1.5", "x"}}, 1},
	} {
		if faults := thawed("landings.csv", want, c.got); len(faults) != c.bad {
			t.Errorf("%s: %q", c.what, faults)
		}
	}
}

// formatUnfrozen are the keys that no frozen scenario has, as the schema
// names them. A new key is listed here until a frozen scenario is added for
// it.
var formatUnfrozen = []string{}

// TestFrozenFormat: the frozen scenarios have every key of the format but
// those listed, so that none can be dropped or come to mean another thing
// unseen.
func TestFrozenFormat(t *testing.T) {
	var schema map[string]any
	if err := json.Unmarshal(scenarios.Schema(), &schema); err != nil {
		t.Fatal(err)
	}
	used := map[string]bool{}
	paths, err := filepath.Glob(filepath.Join(frozenDir, "*.toml"))
	if err != nil {
		t.Fatal(err)
	}
	for _, path := range paths {
		src, err := os.ReadFile(path)
		if err != nil {
			t.Fatal(err)
		}
		var x any
		if err := toml.Unmarshal(src, &x); err != nil {
			t.Fatal(err)
		}
		eachKey("", schema, x, func(_, key string) { used[key] = true })
	}
	missing := map[string]bool{}
	eachKey("", schema, nil, func(path, key string) {
		if !used[key] && !missing[key] {
			missing[key] = true
			if !slices.Contains(formatUnfrozen, path) {
				t.Errorf("no frozen scenario has %s", path)
			}
		}
	})
	if len(missing) != len(formatUnfrozen) {
		t.Errorf("%d keys are missing, %d are listed", len(missing), len(formatUnfrozen))
	}
}

// eachKey calls f for every key that a value has of a schema, or without a
// value for every key of the schema: with its path, and with the names of the
// keys beside it, so that it is the same key wherever its table stands.
func eachKey(path string, schema map[string]any, x any, f func(path, key string)) {
	if items, ok := schema["items"].(map[string]any); ok {
		list, _ := x.([]any)
		if x == nil {
			list = []any{nil}
		}
		for _, item := range list {
			eachKey(path, items, item, f)
		}
		return
	}
	props, _ := schema["properties"].(map[string]any)
	names := slices.Sorted(maps.Keys(props))
	table, _ := x.(map[string]any)
	for _, name := range names {
		value, ok := table[name]
		if x != nil && !ok {
			continue
		}
		f(path+"/"+name, strings.Join(names, " ")+"/"+name)
		eachKey(path+"/"+name, props[name].(map[string]any), value, f)
	}
}
