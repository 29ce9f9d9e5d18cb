package main

import (
	"bytes"
	"encoding/csv"
	"encoding/json"
	"fmt"
	"os"
	"path"
	"path/filepath"
	"regexp"
	"slices"
	"strconv"
	"strings"
	"testing"
)

// packageFile is datapackage.json, as its readers see it.
type packageFile struct {
	Profile, Name string
	Resources     []packageTable
}

type packageTable struct {
	Profile, Name, Path, Title, Encoding string
	Schema                               struct {
		Fields        []packageField
		MissingValues []string
	}
}

type packageField struct{ Name, Type, Unit, Description string }

// ran runs a scenario without pictures and gives its folder.
func ran(t *testing.T, scenario string, more ...string) string {
	t.Helper()
	out := filepath.Join(t.TempDir(), "out")
	var stdout, stderr bytes.Buffer
	args := append([]string{"run", scenario, "--out", out, "--no-figures", "--no-report", "--quiet"}, more...)
	if got := run(args, nil, &stdout, &stderr); got > exitBroken {
		t.Fatalf("%s: exit status %d: %s", scenario, got, stderr.String())
	}
	return out
}

func unmarshalFile(t *testing.T, path string, into any) {
	t.Helper()
	data, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	if err := json.Unmarshal(data, into); err != nil {
		t.Fatalf("%s: %v", path, err)
	}
}

// lighter makes the shipped scenario of the format's every key quick: fewer
// samples have the same tables.
var lighter = []string{"--set", `scatter."wrench, careless hand".samples=200`, "--set", `landing_map."galley wall".step=0.5 m`}

// TestDataPackages holds datapackage.json of every shipped and frozen scenario
// against what the Frictionless specifications (Data Package, Tabular Data
// Resource and Table Schema, version 1; from memory) require, and against the tables
// themselves: every header and the type of every cell.
func TestDataPackages(t *testing.T) {
	shipped, err := filepath.Glob("../../scenarios/shipped/*.toml")
	if err != nil || len(shipped) < 30 {
		t.Fatal(len(shipped), err)
	}
	frozen, err := filepath.Glob(filepath.Join(frozenDir, "*.toml"))
	if err != nil {
		t.Fatal(err)
	}
	for _, scenario := range slices.Concat(shipped, frozen) {
		t.Run(filepath.Base(scenario), func(t *testing.T) {
			var more []string
			if filepath.Base(scenario) == "galley-ring.toml" {
				more = lighter
			}
			out := ran(t, scenario, more...)
			var pkg packageFile
			unmarshalFile(t, filepath.Join(out, "datapackage.json"), &pkg)
			for _, fault := range packageFaults(&pkg, out) {
				t.Error(fault)
			}
			tables := tablesOnDisk(t, out)
			for _, r := range pkg.Resources {
				tables = slices.DeleteFunc(tables, func(name string) bool { return name == r.Path })
			}
			if len(tables) > 0 {
				t.Errorf("not in the package: %q", tables)
			}
		})
	}
}

func tablesOnDisk(t *testing.T, dir string) (out []string) {
	t.Helper()
	all, err := contents(dir)
	if err != nil {
		t.Fatal(err)
	}
	for name := range all {
		if filepath.Ext(name) == ".csv" {
			out = append(out, filepath.ToSlash(name))
		}
	}
	slices.Sort(out)
	return out
}

// resourceName is what a name in a package may be: lower case, digits, dots,
// underscores and hyphens.
var resourceName = regexp.MustCompile(`^[-a-z0-9._]+$`)

// packageFaults tells what is wrong with a package in a folder.
func packageFaults(pkg *packageFile, dir string) (out []string) {
	fault := func(format string, args ...any) { out = append(out, fmt.Sprintf(format, args...)) }
	if pkg.Profile != "tabular-data-package" || !resourceName.MatchString(pkg.Name) || len(pkg.Resources) == 0 {
		fault("package %q of profile %q with %d resources", pkg.Name, pkg.Profile, len(pkg.Resources))
	}
	names, paths := map[string]bool{}, map[string]bool{}
	for i := range pkg.Resources {
		r := &pkg.Resources[i]
		if !resourceName.MatchString(r.Name) || names[r.Name] || paths[r.Path] {
			fault("resource %q of %s: a name that is not one, or twice", r.Name, r.Path)
		}
		names[r.Name], paths[r.Path] = true, true
		if r.Profile != "tabular-data-resource" || r.Encoding != "utf-8" || !slices.Equal(r.Schema.MissingValues, []string{""}) {
			fault("%s: profile %q, encoding %q, missing values %q", r.Path, r.Profile, r.Encoding, r.Schema.MissingValues)
		}
		if path.IsAbs(r.Path) || strings.Contains(r.Path, "..") || strings.Contains(r.Path, `\`) {
			fault("%s: a path out of the folder", r.Path)
		}
		data, err := os.ReadFile(filepath.Join(dir, filepath.FromSlash(r.Path)))
		if err != nil {
			fault("%v", err)
			continue
		}
		for _, f := range tableFaults(r, data) {
			fault("%s: %s", r.Path, f)
		}
	}
	return out
}

// tableFaults holds a table against its description.
func tableFaults(r *packageTable, data []byte) (out []string) {
	rows, err := csv.NewReader(bytes.NewReader(data)).ReadAll()
	if err != nil || len(rows) == 0 {
		return []string{fmt.Sprint(len(rows), " rows: ", err)}
	}
	var header []string
	seen := map[string]bool{}
	for _, f := range r.Schema.Fields {
		header = append(header, f.Name)
		if seen[f.Name] || f.Name == "" || f.Description == "" {
			out = append(out, fmt.Sprintf("field %q has no name or meaning, or stands twice", f.Name))
		}
		seen[f.Name] = true
	}
	if !slices.Equal(header, rows[0]) {
		return append(out, fmt.Sprintf("header %q, described as %q", rows[0], header))
	}
	for n, row := range rows[1:] {
		for i, cell := range row {
			if kind := r.Schema.Fields[i].Type; !fitsType(kind, cell) {
				out = append(out, fmt.Sprintf("row %d: %s is %q, no %s", n+1, header[i], cell, kind))
			}
		}
	}
	return out
}

// fitsType says whether a cell is of a type, or missing.
func fitsType(kind, cell string) bool {
	var err error
	switch {
	case kind == "string" || cell == "" && (kind == "number" || kind == "integer"):
	case kind == "number":
		_, err = strconv.ParseFloat(cell, 64)
	case kind == "integer":
		_, err = strconv.ParseInt(cell, 10, 64)
	default:
		return false
	}
	return err == nil
}

// TestPackageFaults: the check notices a fault of each sort.
func TestPackageFaults(t *testing.T) {
	const good = `{"profile":"tabular-data-package","name":"p","resources":[{"profile":"tabular-data-resource","name":"a","path":"a.csv","encoding":"utf-8",` +
		`"schema":{"fields":[{"name":"n","type":"integer","description":"d"},{"name":"x_m","type":"number","description":"d"}],"missingValues":[""]}}]}`
	dir := t.TempDir()
	put(t, filepath.Join(dir, "a.csv"), "n,x_m\n1,2.5\n,\n")
	for _, c := range []struct{ what, old, now string }{
		{"nothing", "", ""},
		{"another profile", "tabular-data-package", "package"},
		{"a name", `"name":"a"`, `"name":"A b"`},
		{"a path", "a.csv", "b.csv"},
		{"a path outward", "a.csv", "../a.csv"},
		{"a field", `"x_m"`, `"y_m"`},
		{"a type", `"number"`, `"integer"`},
		{"an unknown type", `"number"`, `"real"`},
		{"no meaning", `"number","description":"d"`, `"number"`},
		{"missing values", `[""]`, `["-"]`},
	} {
		var pkg packageFile
		if err := json.Unmarshal([]byte(strings.Replace(good, c.old, c.now, 1)), &pkg); err != nil {
			t.Fatal(err)
		}
		if faults := packageFaults(&pkg, dir); (len(faults) > 0) != (c.old != "") {
			t.Errorf("%s: %q", c.what, faults)
		}
	}
}
