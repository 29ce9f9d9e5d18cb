package scenarios_test

import (
	"fmt"
	"io/fs"
	"math"
	"reflect"
	"slices"
	"strings"
	"testing"

	"offplumb/scenarios"
	"offplumb/sim/model"
)

// scattering is a scenario with one scatter, whose vary table is given, and
// files beside it.
func scattering(vary string, files map[string]string, sets ...string) (*scenarios.Scenario, error) {
	src := "format = 1\n" + ring + `[[body]]
name = "b"
mass = "1 kg"
diameter = "6 cm"
[[release]]
name = "r"
body = "b"
at = { height = "1.9 m" }
[[scatter]]
name = "s"
of = "r"
samples = 10
sampling = "halton"
[scatter.vary]
` + vary
	return scenarios.Load("x.toml", []byte(src), scenarios.Options{Sets: sets, ReadFile: func(name string) ([]byte, error) {
		if s, ok := files[name]; ok {
			return []byte(s), nil
		}
		return nil, fs.ErrNotExist
	}})
}

func varied(t *testing.T, vary string, files map[string]string, sets ...string) []model.Spread {
	t.Helper()
	sc, err := scattering(vary, files, sets...)
	if err != nil {
		t.Fatalf("%s\n%v", vary, err)
	}
	return sc.Model.Scatters[0].Vary
}

// TestScatterValues: spreads come in the order of the file, in SI, of all the
// kinds, and with keys that hold a point written in both ways.
func TestScatterValues(t *testing.T) {
	got := varied(t, `
velocity.up = { uniform = ["-36 km/h", "0.5 m/s"] }
"at.height" = { normal = ["190 cm", "10 cm"] }
"at.spinward" = { normal = ["90 deg", "1 deg"] }
"body.restitution" = { triangular = [0.2, 0.35, 0.5] }
"habitat.spin" = { uniform = ["3 rpm", "6 rpm"] }
`, nil)
	want := []model.Spread{
		{Key: "velocity.up", Kind: model.Uniform, P: [3]float64{-10, 0.5}},
		{Key: "at.height", Kind: model.Normal, P: [3]float64{1.9, 0.1}},
		{Key: "at.spinward", Kind: model.Normal, P: [3]float64{math.Pi / 2, math.Pi / 180}, IsAngle: true},
		{Key: "body.restitution", Kind: model.Triangular, P: [3]float64{0.2, 0.35, 0.5}},
		{Key: "habitat.spin", Kind: model.Uniform, P: [3]float64{math.Pi / 10, math.Pi / 5}},
	}
	if len(got) != len(want) {
		t.Fatalf("%d spreads", len(got))
	}
	for i := range want {
		for k := range want[i].P {
			if math.Abs(got[i].P[k]-want[i].P[k]) > 1e-12 {
				t.Errorf("%s: %v, want %v", want[i].Key, got[i].P, want[i].P)
			}
		}
		got[i].P = want[i].P
		if !reflect.DeepEqual(got[i], want[i]) {
			t.Errorf("%+v, want %+v", got[i], want[i])
		}
	}
	sc, err := scattering(`"at.height" = { normal = ["1 m", "1 cm"] }`, nil)
	if err != nil {
		t.Fatal(err)
	}
	if s := sc.Model.Scatters[0]; s.Name != "s" || s.Of != "r" || s.Samples != 10 || s.Sampling != model.Halton {
		t.Errorf("%+v", s)
	}
}

// TestEveryKeyVaries: each key of the format is one that the model can vary: a
// release that lacks it is told so, and none is passed over.
func TestEveryKeyVaries(t *testing.T) {
	for _, key := range strings.Fields("at.spinward at.axial at.height velocity.spinward velocity.axial velocity.up time body.mass body.diameter " +
		"body.restitution body.friction body.drag_area body.drag_coefficient habitat.spin") {
		got := varied(t, fmt.Sprintf("%q = { file = \"f.csv\", column = \"x\" }\n", key), map[string]string{"f.csv": "x\n" + valueOf(key) + "\n"})
		if len(got) != 1 || got[0].Key != key || len(got[0].Data) != 1 {
			t.Errorf("%s: %+v", key, got)
		}
		// A value that makes a difference, for each key.
		v := model.Variant{}
		before := v
		if v.Set(&got[0], 0.25); reflect.DeepEqual(v, before) {
			t.Errorf("%s changes nothing", key)
		}
	}
}

// valueOf is a value of a key, with its unit.
func valueOf(key string) string {
	switch {
	case strings.HasPrefix(key, "velocity"):
		return "1 m/s"
	case strings.HasPrefix(key, "at."), key == "body.diameter":
		return "1 m"
	}
	return map[string]string{"time": "1 s", "body.mass": "1 kg", "body.drag_area": "1 m^2", "habitat.spin": "1 rpm"}[key] + map[bool]string{true: "0.5"}[key == "body.restitution" || key == "body.friction" || key == "body.drag_coefficient"]
}

// TestScatterColumns: values of a file, by the unit in the column's name or of
// each field, with all that spreadsheets do.
func TestScatterColumns(t *testing.T) {
	for _, c := range []struct {
		what, key, column, file string
		want                    []float64
		angle                   bool
	}{
		{"unit in the name", "at.height", "height_cm", "height_cm,x\n190,1\n 210 ,2\n", []float64{1.9, 2.1}, false},
		{"the unit alone", "at.height", "mm", "mm\n1900\n", []float64{1.9}, false},
		{"longest unit", "velocity.up", "v_cm_s", "v_cm_s\n50\n", []float64{0.5}, false},
		{"area", "body.drag_area", "a_cm2", "a_cm2\n40\n", []float64{0.004}, false},
		{"unit in the fields", "at.height", "height", "height\n190 cm\n2.1 m\n", []float64{1.9, 2.1}, false},
		{"ratio", "body.friction", "mu", "mu\n.3\n0.4\n", []float64{0.3, 0.4}, false},
		{"angle by its name", "at.spinward", "s_deg", "s_deg\n180\n", []float64{math.Pi}, true},
		{"angle by its fields", "at.spinward", "s", "s\n180 deg\n", []float64{math.Pi}, true},
		{"length of the same key", "at.spinward", "s_m", "s_m\n2\n", []float64{2}, false},
		{"an angle that can be nothing else", "habitat.spin", "w_rpm", "w_rpm\n30\n", []float64{math.Pi}, false},
		{"byte-order mark, CRLF, quotes, empty rows", "at.height", "a \"b\"_m", "\ufeffx,\"a \"\"b\"\"_m\"\r\n1,\"1.5\"\r\n,\r\n2,2.5\r\n\r\n", []float64{1.5, 2.5}, false},
	} {
		got := varied(t, fmt.Sprintf("%q = { file = \"f.csv\", column = %q }\n", c.key, c.column), map[string]string{"f.csv": c.file})[0]
		ok := len(got.Data) == len(c.want) && got.Kind == model.Empirical && got.Source == "f.csv" && got.IsAngle == c.angle
		for i := range c.want {
			ok = ok && math.Abs(got.Data[i]-c.want[i]) < 1e-12
		}
		if !ok {
			t.Errorf("%s: %+v, want %v", c.what, got, c.want)
		}
	}
}

// TestBadScatterFiles holds the faults of files to their words.
func TestBadScatterFiles(t *testing.T) {
	for _, c := range []struct{ what, key, column, file, want string }{
		{"empty", "at.height", "h_m", "", "f.csv:1:1: wants a header row, got an empty file"},
		{"header alone", "at.height", "h_m", "h_m\n", "f.csv:2:1: wants at least one row below the header"},
		{"no such column", "at.height", "h_m", "height_m\n1\n", "x.toml:20:42: scatter[0].vary.at.height.column: no column named \"h_m\" in f.csv\n  hint: the columns are height_m"},
		{"a column misspelt", "at.height", "heigth_m", "x,height_m\n1,1\n", "x.toml:20:42: scatter[0].vary.at.height.column: no column named \"heigth_m\" in f.csv\n  hint: did you mean height_m?"},
		{"a column twice", "at.height", "h_m", "h_m,h_m\n1,1\n", "f.csv:1:5: column \"h_m\" is given twice"},
		{"a word", "at.height", "h_m", "h_m\n1\nhigh\n", "f.csv:3:1: h_m: wants a number, got \"high\""},
		{"an empty field", "at.height", "h_m", "x,h_m\n1,1\n2,\n", "f.csv:3:3: h_m: wants a number, got \"\""},
		{"a decimal comma", "at.height", "h_m", "h_m\n\"1,9\"\n", "f.csv:2:1: h_m: wants a number, got \"1,9\"\n  hint: decimals are written with a point"},
		{"no unit", "at.height", "h", "h\n1.9\n", "f.csv:2:1: h: wants a length in m, um, µm, mm, cm, km, in, ft, mi, got \"1.9\"\n  hint: a column whose name ends in its unit, such as height_m, holds bare numbers"},
		{"angles and lengths", "at.spinward", "s", "s\n1 m\n1 deg\n", "f.csv:3:1: s: wants a length as the first row has, got \"1 deg\""},
		{"far too great", "at.height", "h_km", "h_km\n1e9\n", "f.csv:2:1: h_km: wants a magnitude of at most 1e+09, in SI units, got 1e9"},
		{"infinite", "body.friction", "f", "f\ninf\n", "f.csv:2:1: f: wants a number, got \"inf\""},
		{"ragged", "at.height", "h_m", "x,h_m\n1,2\n3\n", "f.csv:3:1: wants 2 fields, as in the header row, got 1"},
		{"no CSV", "at.height", "h_m", "x,h_m\n1,2\"3\n", "f.csv:2:4: not CSV: a quote inside a field without quotes\n  hint: a field that holds a quote stands in quotes, with that quote twice: \"3\"\" pipe\""},
		{"not UTF-8", "at.height", "h_m", "h_m\n\xff\n", "f.csv:2:1: is not UTF-8\n  hint: save it as CSV UTF-8"},
	} {
		_, err := scattering(fmt.Sprintf("%q = { file = \"f.csv\", column = %q }\n", c.key, c.column), map[string]string{"f.csv": c.file})
		if err == nil || err.Error() != c.want {
			t.Errorf("%s: says\n%v\nwant\n%s", c.what, err, c.want)
		}
	}
	_, err := scattering("\"at.height\" = { file = \"f.csv\", column = \"h_m\" }\n", map[string]string{"f.csv": "h_m\n" + strings.Repeat("x\n", 100_000)})
	if n := strings.Count(err.Error(), "\n"); n > 2000 {
		t.Errorf("%d lines of faults", n)
	}
}

// TestScatterInputs: the files of a scatter are inputs of the scenario.
func TestScatterInputs(t *testing.T) {
	sc, err := scattering("\"at.height\" = { file = \"f.csv\", column = \"h_m\" }\n", map[string]string{"f.csv": "h_m\n1\n"})
	if err != nil || !slices.ContainsFunc(sc.Inputs, func(in scenarios.Input) bool { return in.Name == "f.csv" }) {
		t.Errorf("%v, inputs %+v", err, sc)
	}
}

// TestSetScatter: settings reach into a spread, and one kind takes the place of
// another.
func TestSetScatter(t *testing.T) {
	const vary = `"at.height" = { normal = ["1.9 m", "0.1 m"] }` + "\n"
	for _, c := range []struct {
		set  string
		want model.Spread
	}{
		{`scatter.s.vary."at.height".uniform=["1 m", "2 m"]`, model.Spread{Key: "at.height", Kind: model.Uniform, P: [3]float64{1, 2}}},
		{`scatter.s.vary.at.height.normal=["2 m", "1 m"]`, model.Spread{Key: "at.height", Kind: model.Normal, P: [3]float64{2, 1}}},
		{`scatter.s.vary.at.height={ uniform = ["1 m", "2 m"] }`, model.Spread{Key: "at.height", Kind: model.Uniform, P: [3]float64{1, 2}}},
	} {
		if got := varied(t, vary, nil, c.set); len(got) != 1 || !reflect.DeepEqual(got[0], c.want) {
			t.Errorf("%s gives %+v", c.set, got)
		}
	}
	if got := varied(t, vary, nil, `scatter.s.vary.velocity.up.normal=["0 m/s", "1 m/s"]`); len(got) != 2 || got[1].Key != "velocity.up" {
		t.Errorf("a further key gives %+v", got)
	}
	for _, set := range []string{`scatter.s.vary.at.height.gaussian=["1 m", "2 m"]`, `scatter.s.vary.at.width=1`, `scatter.s.vary.at=1`} {
		if _, err := scattering(vary, nil, set); err == nil {
			t.Errorf("%s is taken", set)
		}
	}
}
