package main

import (
	"bytes"
	"fmt"
	"math/rand/v2"
	"os"
	"path/filepath"
	"regexp"
	"strings"
	"testing"

	"offplumb/plots"
	"offplumb/scenarios"
)

// TestShippedFiguresAreClear draws every figure of every shipped scenario, and of each
// kind that it could ask for, and holds it to the language of the figures.
func TestShippedFiguresAreClear(t *testing.T) {
	paths, err := filepath.Glob("../../scenarios/shipped/*.toml")
	if err != nil || len(paths) == 0 {
		t.Fatal(paths, err)
	}
	dir := t.TempDir()
	lists, err := filepath.Glob("../../scenarios/shipped/*.csv")
	if err != nil {
		t.Fatal(err)
	}
	for _, path := range lists {
		list, err := os.ReadFile(path)
		if err != nil {
			t.Fatal(err)
		}
		put(t, filepath.Join(dir, filepath.Base(path)), string(list))
	}
	for _, path := range paths {
		src, err := os.ReadFile(path)
		if err != nil {
			t.Fatal(err)
		}
		t.Run(filepath.Base(path), func(t *testing.T) {
			t.Parallel()
			checkFigures(t, filepath.Join(dir, filepath.Base(path)), string(src))
		})
	}
}

// TestRandomFiguresAreClear does the same with habitats from a turntable to a world, of
// either spin.
func TestRandomFiguresAreClear(t *testing.T) {
	const seed, rounds = 7, 12
	dir := t.TempDir()
	r := rand.New(rand.NewPCG(seed, 0))
	for i := range rounds {
		src := randomScenario(r, i)
		t.Run(fmt.Sprintf("seed %d round %d", seed, i), func(t *testing.T) {
			t.Parallel()
			checkFigures(t, filepath.Join(dir, fmt.Sprintf("random-%d.toml", i)), src)
			if t.Failed() {
				t.Log(src)
			}
		})
	}
}

// randomScenario has three releases in a habitat of 0.2 to 2 g.
func randomScenario(r *rand.Rand, i int) string {
	radius := []float64{3, 11, 40, 300, 5e3, 4e6}[i%6] * (1 + r.Float64())
	sign := []string{"", "-"}[r.IntN(2)]
	speed := 1.4 + r.Float64()
	for v := 1.0; v < radius; v *= 4 { // rim speed grows as the root of the radius
		speed *= 2
	}
	var b strings.Builder
	fmt.Fprintf(&b, "format = 1\n[habitat]\nfloor_radius = \"%g m\"\nrim_speed = \"%s%g m/s\"\nlength = \"9 m\"\n", radius, sign, speed)
	fmt.Fprintf(&b, "[[body]]\nname = \"ball\"\nmass = \"0.4 kg\"\ndiameter = \"%g mm\"\nrestitution = %.2f\nfriction = 0.4\n", 20+300*r.Float64(), r.Float64()*0.7)
	for k := range 3 {
		fmt.Fprintf(&b, "[[release]]\nname = \"release number %d\"\nbody = \"ball\"\nuntil = \"20 s\"\nat = { height = \"%g m\", spinward = \"%g m\", axial = \"%g m\" }\n",
			k, 0.3+1.5*r.Float64(), 4*r.Float64()-2, 4*r.Float64()-2)
		if k > 0 {
			fmt.Fprintf(&b, "throw = { speed = \"%g m/s\", heading = \"%g deg\", elevation = \"%g deg\" }\n", 6*r.Float64(), 360*r.Float64(), 90*r.Float64())
		}
	}
	return b.String()
}

func put(t *testing.T, path, text string) {
	t.Helper()
	if err := os.WriteFile(path, []byte(text), 0o666); err != nil {
		t.Fatal(err)
	}
}

// checkFigures runs a scenario with figures of all kinds asked for.
func checkFigures(t *testing.T, path, src string) {
	t.Helper()
	put(t, path, src+asking(t, path, src))
	out := strings.TrimSuffix(path, ".toml") + "-out"
	args := []string{"run", path, "--out", out, "--quiet", "--jobs", "1"}
	for _, name := range regexp.MustCompile(`(?m)^\[\[scatter\]\]\nname *= *"([^"]*)"`).FindAllStringSubmatch(src, -1) {
		args = append(args, "--set", `scatter."`+name[1]+`".samples=200`)
	}
	var stdout, stderr bytes.Buffer
	if got := run(args, nil, &stdout, &stderr); got != exitDone && got != exitBroken {
		t.Fatalf("exit status %d: %s", got, stderr.String())
	}
	figures, err := filepath.Glob(filepath.Join(out, "*.svg"))
	if err != nil || len(figures) == 0 {
		t.Fatal("no figures", err)
	}
	for _, name := range figures {
		if strings.HasSuffix(name, "-motion.svg") {
			continue // its words come and go, and plots/motion tries it
		}
		svg, err := os.ReadFile(name)
		if err != nil {
			t.Fatal(err)
		}
		checkFigure(t, filepath.Base(name), svg)
	}
}

// asking are [[figure]] blocks of all kinds that a scenario has things for.
func asking(t *testing.T, path, src string) string {
	t.Helper()
	sc, err := scenarios.Load(path, []byte(src), scenarios.Options{ReadFile: func(name string) ([]byte, error) {
		return os.ReadFile(filepath.Join(filepath.Dir(path), name))
	}})
	if err != nil {
		t.Fatal(err)
	}
	var b strings.Builder
	ask := func(kind string, of []string) {
		if len(of) > 0 {
			fmt.Fprintf(&b, "\n[[figure]]\nname = \"test %s\"\nkind = %q\nof = [\"%s\"]\n", kind, kind, strings.Join(of, `", "`))
		}
	}
	var releases, paths, scatters, sweeps, series, throws, cards, maps []string
	for _, r := range sc.Model.Releases {
		if r.Series != "" && (len(series) == 0 || series[len(series)-1] != "release."+r.Series) {
			series = append(series, "release."+r.Series)
		} else if r.Series == "" && !r.NoTrack {
			releases = append(releases, "release."+r.Name)
		}
	}
	for _, p := range sc.Model.Paths {
		paths = append(paths, "path."+p.Name)
	}
	for _, s := range sc.Model.Scatters {
		scatters = append(scatters, "study."+s.Name)
	}
	for _, s := range sc.Sweeps {
		sweeps = append(sweeps, "study."+s.Name)
	}
	for i := range sc.Model.Throws {
		name := "study." + sc.Model.Throws[i].Name
		if throws = append(throws, name); sc.Model.Throws[i].Table() {
			cards = append(cards, name)
		}
	}
	for _, m := range sc.Model.Maps {
		maps = append(maps, "study."+m.Name)
	}
	few := func(of []string) []string { return of[:min(len(of), scenarios.MostTogether)] }
	for _, kind := range []string{"side", "inertial", "stack", "deflection", "plan"} {
		ask(kind, few(releases))
	}
	ask("loads", few(paths))
	ask("path", paths)
	ask("scatter", scatters)
	ask("sweep", sweeps)
	ask("let_go", series)
	ask("throws", throws)
	ask("throw_table", cards)
	ask("landing_map", maps)
	if sc.Model.Unsteady() {
		ask("spin", []string{"habitat"})
	}
	if len(releases) == 0 {
		ask("side", series)
	}
	return b.String()
}

// oneOfEach has something for each kind of figure.
const oneOfEach = `format = 1
[habitat]
floor_radius = "18 m"
spin = "5 rpm"
length = "8 m"
[[body]]
name = "mug"
mass = "0.3 kg"
diameter = "80 mm"
[[release]]
name = "drop"
body = "mug"
at = { height = "1.2 m" }
[[release]]
name = "slip"
body = "mug"
carried = { path = "walk", every = "1 m", reach = { height = "1 m" } }
[[crew]]
name = "mate"
mass = "80 kg"
stature = "1.7 m"
[[crew_path]]
name = "walk"
crew = "mate"
start = { spinward = "0 m" }
legs = [{ walk = { spinward = "3 m" }, speed = "1 m/s" }]
[[scatter]]
name = "careless"
of = "drop"
samples = 50
vary = { "at.height" = { uniform = ["1 m", "1.4 m"] } }
[[sweep]]
name = "heights"
key = "release.drop.at.height"
values = ["0.5 m", "1 m", "1.5 m"]
measures = ["landings.offset"]
[[habitat.spin_change]]
start = "5 s"
over = "2 s"
to = "4 rpm"
[[throw_to]]
name = "tosses"
body = "mug"
from = { height = "1 m" }
target = { height = "1 m" }
distances = ["2 m", "3 m"]
speed = "5 m/s"
[[landing_map]]
name = "map"
body = "mug"
over = { spinward = ["0 m", "0.5 m"], axial = ["0 m", "0.5 m"] }
heights = ["1 m"]
step = "0.25 m"
cell = "0.25 m"
[output]
figures = "asked"
`

// TestAllKindsInAllFormats writes a figure of each kind in each format, twice.
func TestAllKindsInAllFormats(t *testing.T) {
	dir := t.TempDir()
	path := filepath.Join(dir, "all.toml")
	blocks := asking(t, path, oneOfEach)
	put(t, path, oneOfEach+blocks)
	kinds := strings.Count(blocks, "[[figure]]")
	if kinds != 14 {
		t.Errorf("%d kinds of figures are asked for", kinds)
	}
	magic := map[string]string{"svg": "<?xml", "png": "\x89PNG", "pdf": "%PDF"}
	var before map[string][]byte
	for _, jobs := range []string{"1", "4"} {
		out := filepath.Join(dir, "out"+jobs)
		var stdout, stderr bytes.Buffer
		if got := run([]string{"run", path, "--out", out, "--quiet", "--jobs", jobs, "--figure-format", "svg,png,pdf"}, nil, &stdout, &stderr); got != exitDone {
			t.Fatalf("exit status %d: %s", got, stderr.String())
		}
		files := map[string][]byte{}
		for _, format := range plots.Formats() {
			names, _ := filepath.Glob(filepath.Join(out, "*."+format))
			if len(names) != kinds+1 { // a landing map has two
				t.Errorf("%d %s files of %d figures: %q", len(names), format, kinds, names)
			}
			for _, name := range names {
				data, err := os.ReadFile(name)
				if err != nil || !bytes.HasPrefix(data, []byte(magic[format])) {
					t.Errorf("%s: %v", name, err)
				}
				if format != "pdf" { // which carries its date
					files[filepath.Base(name)] = data
				}
			}
		}
		for name := range before {
			if !bytes.Equal(files[name], before[name]) {
				t.Errorf("%s has other bytes", name)
			}
		}
		before = files
	}
}
