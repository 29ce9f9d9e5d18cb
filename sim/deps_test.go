package sim

import (
	"go/parser"
	"go/token"
	"io/fs"
	"os"
	"path/filepath"
	"slices"
	"strconv"
	"strings"
	"testing"
)

// allowed is the policy: which packages of the module each package may
// import. It is not to be changed to let a build pass, but when the
// architecture is meant to change, together with the picture in doc.go.
var allowed = map[string][]string{
	"integrator":          {},
	"integrator/odetest":  {},
	"sim":                 {},
	"sim/table":           {},
	"sim/geom":            {},
	"sim/frame":           {"sim/geom"},
	"sim/air":             {},
	"sim/model":           {"sim/air", "sim/frame", "sim/geom"},
	"sim/crew":            {"sim/model", "sim/frame", "sim/geom"},
	"sim/flight":          {"sim/crew", "sim/model", "sim/air", "sim/frame", "sim/geom", "integrator"},
	"sim/measure":         {"sim/flight", "sim/crew", "sim/model", "sim/frame", "sim/geom", "sim/table"},
	"sim/study":           {"sim/measure", "sim/flight", "sim/crew", "sim/model", "sim/frame", "sim/table"},
	"plots":               {"sim/table", "sim/geom"},
	"plots/motion":        {"plots", "sim/table"},
	"plots/page":          {"sim/table", "plots"},
	"scenarios":           {"sim/study", "sim/measure", "sim/model", "sim/air", "sim/frame", "sim/geom", "sim/table"},
	"scenarios/published": {"scenarios", "sim/study", "sim/measure", "sim/model", "sim/air", "sim/frame"},
	"cmd/offplumb":        {"scenarios", "scenarios/published", "plots", "sim/study", "sim/measure", "sim/flight", "sim/crew", "sim/model", "integrator", "plots/motion", "sim/air", "sim/frame", "sim/geom", "sim/table", "plots/page"},
}

// outside is which modules each package may import beside the standard
// library; those not named may import none.
var outside = map[string][]string{
	"sim/geom":            {"gonum.org/v1/gonum"},
	"sim/air":             {"gonum.org/v1/gonum"},
	"sim/frame":           {"gonum.org/v1/gonum"},
	"sim/model":           {"gonum.org/v1/gonum"},
	"sim/crew":            {"gonum.org/v1/gonum"},
	"sim/flight":          {"gonum.org/v1/gonum"},
	"sim/measure":         {"gonum.org/v1/gonum"},
	"sim/study":           {"gonum.org/v1/gonum"},
	"plots":               {"gonum.org/v1/gonum", "gonum.org/v1/plot"},
	"scenarios":           {"github.com/pelletier/go-toml/v2"},
	"scenarios/published": {"gonum.org/v1/gonum"},
	"cmd/offplumb":        {"github.com/spf13/cobra", "github.com/spf13/pflag", "golang.org/x/sys", "gonum.org/v1/gonum"},
}

func TestImportsPointDown(t *testing.T) {
	seen := map[string]bool{}
	err := filepath.WalkDir("..", func(path string, d fs.DirEntry, err error) error {
		if err != nil || !strings.HasSuffix(path, ".go") || strings.HasSuffix(path, "_test.go") {
			return err
		}
		pkg := filepath.ToSlash(strings.TrimPrefix(filepath.Dir(path), "../"))
		if pkg == ".." {
			pkg = "."
		}
		seen[pkg] = true
		checkImports(t, pkg, path)
		return nil
	})
	if err != nil {
		t.Fatal(err)
	}
	for pkg := range seen {
		if _, ok := allowed[pkg]; !ok {
			t.Errorf("package %s stands nowhere in the policy", pkg)
		}
	}
	for pkg := range allowed {
		if !seen[pkg] {
			t.Errorf("the policy names %s, which has no code", pkg)
		}
	}
}

func checkImports(t *testing.T, pkg, path string) {
	t.Helper()
	src, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	f, err := parser.ParseFile(token.NewFileSet(), path, src, parser.ImportsOnly)
	if err != nil {
		t.Fatal(err)
	}
	for _, spec := range f.Imports {
		name, _ := strconv.Unquote(spec.Path.Value)
		if !mayImport(pkg, name) {
			t.Errorf("%s imports %s", path, name)
		}
	}
}

func mayImport(pkg, name string) bool {
	if own, ok := strings.CutPrefix(name, "offplumb/"); ok {
		return slices.Contains(allowed[pkg], own)
	}
	if !strings.Contains(strings.Split(name, "/")[0], ".") {
		return true // the standard library
	}
	return slices.ContainsFunc(outside[pkg], func(mod string) bool {
		return name == mod || strings.HasPrefix(name, mod+"/")
	})
}

// TestPolicyRefuses tries the policy itself.
func TestPolicyRefuses(t *testing.T) {
	for _, c := range [][2]string{
		{"integrator", "offplumb/sim/model"},
		{"plots", "offplumb/sim/model"},
		{"plots/motion", "offplumb/sim/measure"},
		{"sim/model", "offplumb/sim/flight"},
		{"sim/flight", "github.com/pelletier/go-toml/v2"},
	} {
		if mayImport(c[0], c[1]) {
			t.Errorf("%s may import %s", c[0], c[1])
		}
	}
}
