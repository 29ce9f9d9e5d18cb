package scenarios_test

import (
	"errors"
	"fmt"
	"io/fs"
	"math"
	"strings"
	"testing"

	"offplumb/scenarios"
	"offplumb/sim/model"
)

// listHead is a scenario to put [[release_list]] below.
const listHead = `format = 1
[habitat]
floor_radius = "18 m"
spin = "5 rpm"
length = "14 m"
[[deck]]
name = "upper"
radius = "15 m"
[[body]]
name = "wrench"
mass = "1.4 kg"
diameter = "60 mm"
restitution = 0.6
friction = 0.7
drag_coefficient = 0.8
[[body]]
name = "point"
mass = "1 kg"
diameter = "0 m"
[[release]]
name = "in the file"
at.height = "1 m"
`

// loadLists loads the head with more text, its files by name.
func loadLists(more string, files map[string]string, opt scenarios.Options) (*scenarios.Scenario, error) {
	opt.ReadFile = func(name string) ([]byte, error) {
		src, ok := files[name]
		if !ok {
			return nil, &fs.PathError{Op: "open", Path: "/secret/" + name, Err: fs.ErrNotExist}
		}
		return []byte(src), nil
	}
	return scenarios.Load("s.toml", []byte(listHead+more), opt)
}

// loadList loads one list with keys of its own.
func loadList(keys, csv string) (*scenarios.Scenario, error) {
	return loadLists("[[release_list]]\nfile = \"l.csv\"\n"+keys, map[string]string{"l.csv": csv}, scenarios.Options{})
}

// listed loads one list and gives its releases.
func listed(t *testing.T, keys, csv string) []model.Release {
	t.Helper()
	sc, err := loadList(keys, csv)
	if err != nil {
		t.Fatalf("%s%s\n%v", keys, csv, err)
	}
	return sc.Model.Releases[1:]
}

func TestListColumns(t *testing.T) {
	got := listed(t, "", `release,body,mass_kg,diameter_m,deck,spinward_m,axial_m,height_m,v_spinward_m_s,v_axial_m_s,v_up_m_s
all of them,wrench,0.5,0.04,upper,1.5,-3,1.25,0.1,-0.2,3e-1
`)[0]
	want := model.Release{Name: "all of them", Body: "wrench", NoTrack: true,
		At:    model.Station{Deck: "upper", Spinward: model.Arc{Value: 1.5}, Axial: -3, Height: 1.25},
		Start: model.Start{Kind: model.Velocity, VSpinward: 0.1, VAxial: -0.2, VUp: 0.3}}
	own := model.Body{Name: "wrench", Mass: 0.5, Diameter: 0.04, Restitution: 0.6, Friction: 0.7, DragCoefficient: 0.8}
	if got.Own == nil || *got.Own != own {
		t.Errorf("its body is %+v, want %+v", got.Own, own)
	}
	got.Own = nil
	if got != want {
		t.Errorf("got\n%+v\nwant\n%+v", got, want)
	}
}

// TestListColumnsInAnyOrder: the header says which is which.
func TestListColumnsInAnyOrder(t *testing.T) {
	got := listed(t, "", "height_m,release, v_up_m_s \n1.25,tin,-1\n")[0]
	if got.Name != "tin" || got.At.Height != 1.25 || got.Start.VUp != -1 {
		t.Errorf("got %+v", got)
	}
}

// TestListDefaults: the list's keys stand in for columns that it lacks and for
// cells that are empty.
func TestListDefaults(t *testing.T) {
	const keys = `body = "wrench"
deck = "upper"
spinward = "30 deg"
axial = "1 m"
height = "1.1 m"
time = "2 s"
until = "landing"
tracks = true
throw = { speed = "3 m/s", heading = "90 deg" }
`
	deg := math.Pi / 180
	want := model.Release{Name: "a", Body: "wrench", Time: 2, Until: model.Until{Kind: model.UntilLanding},
		At:    model.Station{Deck: "upper", Spinward: model.Arc{Value: 30 * deg, IsAngle: true}, Axial: 1, Height: 1.1},
		Start: model.Start{Kind: model.Thrown, Speed: 3, Heading: 90 * deg}}
	for _, csv := range []string{
		"release\na\n",
		"release,body,mass_kg,diameter_m,deck,spinward_m,axial_m,height_m,v_spinward_m_s,v_axial_m_s,v_up_m_s\na,,,,,,,,,,\n",
		"release,height_m\r\na, \r\n",
	} {
		if got := listed(t, keys, csv)[0]; got != want {
			t.Errorf("%q: got\n%+v\nwant\n%+v", csv, got, want)
		}
	}
}

// TestListCellsWin: a cell wins over the list's key.
func TestListCellsWin(t *testing.T) {
	const keys = "body = \"wrench\"\ndeck = \"upper\"\nspinward = \"30 deg\"\naxial = \"1 m\"\nheight = \"1.1 m\"\nstill = true\n"
	got := listed(t, keys, "release,body,deck,spinward_m,axial_m,height_m,v_up_m_s\na,point,floor,2,3,1.5,1\n")[0]
	want := model.Release{Name: "a", Body: "point", NoTrack: true,
		At:    model.Station{Deck: "floor", Spinward: model.Arc{Value: 2}, Axial: 3, Height: 1.5},
		Start: model.Start{Kind: model.Velocity, VUp: 1}}
	if got != want {
		t.Errorf("got\n%+v\nwant\n%+v", got, want)
	}
}

func TestListBodies(t *testing.T) {
	body := func(name string, mass, diameter float64) *model.Body {
		return &model.Body{Name: name, Mass: mass, Diameter: diameter, Restitution: model.DefaultRestitution, Friction: model.DefaultFriction}
	}
	wrench := func(mass, diameter float64) *model.Body {
		return &model.Body{Name: "wrench", Mass: mass, Diameter: diameter, Restitution: 0.6, Friction: 0.7, DragCoefficient: 0.8}
	}
	const columns = "release,body,mass_kg,diameter_m,height_m\n"
	for _, c := range []struct {
		what, keys, row string
		name            string
		own             *model.Body
	}{
		{"none", "", "a,,,,1", "", nil},
		{"one of the file", "", "a,wrench,,,1", "wrench", nil},
		{"a mass of its own", "", "a,wrench,2,,1", "wrench", wrench(2, 0.06)},
		{"a width of its own", "", "a,wrench,,0.1,1", "wrench", wrench(1.4, 0.1)},
		{"both of its own", "", "a,wrench,2,0.1,1", "wrench", wrench(2, 0.1)},
		{"no name", "", "a,,2,0.1,1", "", body("", 2, 0.1)},
		{"a name of its own", "", "a,tin,2,0.1,1", "tin", body("tin", 2, 0.1)},
		{"a point of its own", "", "a,,2,0,1", "", body("", 2, 0)},
		{"the list's", "body = \"wrench\"\nmass = \"3 kg\"\ndiameter = \"5 cm\"\n", "a,,,,1", "wrench", wrench(3, 0.05)},
		{"the row's over the list's", "body = \"wrench\"\nmass = \"3 kg\"\ndiameter = \"5 cm\"\n", "a,,2,,1", "wrench", wrench(2, 0.05)},
		{"the list's mass for a point", "mass = \"3 kg\"\n", "a,point,,,1", "point", &model.Body{Name: "point", Mass: 3, Restitution: model.DefaultRestitution, Friction: model.DefaultFriction}},
	} {
		got := listed(t, c.keys, columns+c.row+"\n")[0]
		if got.Body != c.name || (got.Own == nil) != (c.own == nil) || c.own != nil && *got.Own != *c.own {
			t.Errorf("%s: got %q %+v, want %q %+v", c.what, got.Body, got.Own, c.name, c.own)
		}
	}
}

// TestListText: quotes, byte order mark, line ends, spaces, empty rows.
func TestListText(t *testing.T) {
	for _, c := range []struct {
		what, csv, want string
	}{
		{"plain", "release,height_m\na,1\nb,2\n", "a=1 b=2"},
		{"no line end", "release,height_m\na,1\nb,2", "a=1 b=2"},
		{"carriage returns", "release,height_m\r\na,1\r\nb,2\r\n", "a=1 b=2"},
		{"byte order mark", "\xef\xbb\xbfrelease,height_m\na,1\n", "a=1"},
		{"quotes", "\"release\",\"height_m\"\n\"cup, blue\",\"1\"\n\"3\"\" pipe\",2\n", "cup, blue=1 3\" pipe=2"},
		{"spaces", " release ,  height_m\n  a b ,  1 \n", "a b=1"},
		{"letters beyond ASCII", "release,height_m\nKüche 工具,1\n", "Küche 工具=1"},
		{"blank lines", "release,height_m\n\na,1\n\n\nb,2\n\n", "a=1 b=2"},
		{"rows of empty cells", "release,height_m\na,1\n,\n , \nb,2\n,\n", "a=1 b=2"},
		{"an exponent", "release,height_m\na,1e0\n", "a=1"},
		{"a sign", "release,height_m\na,+1\n", "a=1"},
		{"no rows", "release,height_m\n", ""},
	} {
		var got []string
		for _, r := range listed(t, "", c.csv) {
			got = append(got, fmt.Sprintf("%s=%g", r.Name, r.At.Height))
		}
		if s := strings.Join(got, " "); s != c.want {
			t.Errorf("%s: got %q, want %q", c.what, s, c.want)
		}
	}
}

func TestRefusedLists(t *testing.T) {
	long := strings.Repeat("x", 201)
	for _, c := range []struct {
		what, keys, csv, want string
	}{
		{"empty", "", "", "l.csv:1:1: wants a header row, got an empty file\n  hint: the first column is release"},
		{"only a byte order mark", "", "\xef\xbb\xbf", "l.csv:1:1: wants a header row, got an empty file\n  hint: the first column is release"},
		{"semicolons", "", "release;body;height_m\na;;1,5\n", "l.csv:1:1: unknown column \"release;body;height_m\"\n  hint: columns are separated by commas"},
		{"tabs", "", "release\tbody\theight_m\na\t\t1.5\n", "l.csv:1:1: unknown column \"release\\tbody\\theight_m\"\n  hint: columns are separated by commas"},
		{"a column misspelt", "", "release,heigth_m\n", "l.csv:1:1: wants a column named height_m, or the key height in [[release_list]]\nl.csv:1:9: unknown column \"heigth_m\"\n  hint: did you mean height_m?"},
		{"a column in another case", "height = \"1 m\"\n", "release,Body\na,wrench\n", "l.csv:1:9: unknown column \"Body\"\n  hint: did you mean body?"},
		{"an unknown column", "", "release,height_m,colour of it\n", "l.csv:1:18: unknown column \"colour of it\"\n  hint: the columns are release, body, mass_kg, diameter_m, deck, spinward_m, axial_m, height_m, v_spinward_m_s, v_axial_m_s, v_up_m_s"},
		{"columns without names", "", "release,height_m,,\n", "l.csv:1:18: unknown column \"\"\n  hint: the columns are release, body, mass_kg, diameter_m, deck, spinward_m, axial_m, height_m, v_spinward_m_s, v_axial_m_s, v_up_m_s\nl.csv:1:19: unknown column \"\"\n  hint: the columns are release, body, mass_kg, diameter_m, deck, spinward_m, axial_m, height_m, v_spinward_m_s, v_axial_m_s, v_up_m_s"},
		{"a column twice", "", "release,height_m,height_m\n", "l.csv:1:18: column \"height_m\" is given twice"},
		{"no release column", "", "body,height_m\nwrench,1\n", "l.csv:1:1: wants a column named release"},
		{"no height", "", "release,body\na,wrench\n", "l.csv:1:1: wants a column named height_m, or the key height in [[release_list]]"},
		{"an empty height", "", "release,height_m\na,1\nb,\n", "l.csv:3:3: height_m: wants a number, got an empty field"},
		{"no name", "", "height_m,release\n1,a\n1,\n", "l.csv:3:3: wants a name, got an empty field"},
		{"words for a number", "", "release,height_m\na,low\n", "l.csv:2:3: height_m: wants a number, got \"low\""},
		{"a unit", "", "release,height_m\na,1.5 m\n", "l.csv:2:3: height_m: wants a number, got \"1.5 m\"\n  hint: numbers stand without a unit, which the column's name gives"},
		{"another unit", "", "release,height_m\na,150cm\n", "l.csv:2:3: height_m: wants a number, got \"150cm\"\n  hint: numbers stand without a unit, which the column's name gives"},
		{"a decimal comma", "", "release,height_m\na,\"1,5\"\n", "l.csv:2:3: height_m: wants a number, got \"1,5\"\n  hint: decimals are written with a point"},
		{"NaN", "", "release,height_m\na,NaN\n", "l.csv:2:3: height_m: wants a number, got \"NaN\""},
		{"infinity", "", "release,height_m\na,-inf\n", "l.csv:2:3: height_m: wants a number, got \"-inf\""},
		{"overflow", "", "release,height_m\na,1e999\n", "l.csv:2:3: height_m: wants a number, got \"1e999\""},
		{"hexadecimal", "", "release,height_m\na,0x1p0\n", "l.csv:2:3: height_m: wants a number, got \"0x1p0\""},
		{"underscore", "", "release,height_m\na,1_0\n", "l.csv:2:3: height_m: wants a number, got \"1_0\""},
		{"two points", "", "release,height_m\na,1.2.3\n", "l.csv:2:3: height_m: wants a number, got \"1.2.3\""},
		{"beyond the largest", "", "release,height_m,v_up_m_s\na,1,2e6\n", "l.csv:2:5: v_up_m_s: wants a magnitude of at most 1e+06 m/s, got 2e6"},
		{"no mass", "", "release,mass_kg,height_m\na,0,1\n", "l.csv:2:3: mass_kg: wants more than 0 kg, got 0"},
		{"a negative mass", "", "release,mass_kg,height_m\na,-2,1\n", "l.csv:2:3: mass_kg: wants more than 0 kg, got -2"},
		{"a negative diameter", "", "release,diameter_m,height_m\na,-0.1,1\n", "l.csv:2:3: diameter_m: wants 0 m or more, got -0.1"},
		{"half a body", "", "release,mass_kg,height_m\na,2,1\n", "l.csv:2:1: a body without a name wants both a mass and a diameter"},
		{"the other half", "", "release,diameter_m,height_m\na,0.1,1\n", "l.csv:2:1: a body without a name wants both a mass and a diameter"},
		{"an unknown body with half", "", "release,body,mass_kg,height_m\na,wrnch,2,1\n", "l.csv:2:3: no body named \"wrnch\"\n  hint: one of its own wants both a mass and a diameter"},
		{"an unknown body", "", "release,body,height_m\na,wrnch,1\n", "l.csv:2:3: body: no body named \"wrnch\""},
		{"an unknown deck", "", "release,deck,height_m\na,attic,1\n", "l.csv:2:3: deck: no deck named \"attic\""},
		{"a release twice", "", "release,height_m\na,1\nb,1\na,2\n", "l.csv:4:1: a release named \"a\" is there already"},
		{"a release of the file", "", "release,height_m\nin the file,1\n", "l.csv:2:1: a release named \"in the file\" is there already"},
		{"a long name", "", "release,height_m\n" + long + ",1\n", "l.csv:2:1: release: wants a name of at most 200 bytes, got \"" + long[:57] + "...\""},
		{"a name for terminals", "", "release,height_m\na\x1b[31m,1\n", "l.csv:2:1: release: wants a name of printable characters, got \"a\\x1b[31m\""},
		{"a name of two lines", "", "release,height_m\n\"a\nb\",1\n", "l.csv:2:1: release: wants a name of printable characters, got \"a\\nb\""},
		{"a body's name for terminals", "", "release,body,mass_kg,diameter_m,height_m\na,\x07,1,1,1\n", "l.csv:2:3: body: wants a name of printable characters, got \"\\a\""},
		{"too few fields", "", "release,body,height_m\na,1\nb,,1\nc\n", "l.csv:2:1: wants 3 fields, as in the header row, got 2\nl.csv:4:1: wants 3 fields, as in the header row, got 1"},
		{"too many fields", "", "release,height_m\na,1,5\n", "l.csv:2:1: wants 2 fields, as in the header row, got 3\n  hint: a field that holds a comma stands in quotes; decimals are written with a point"},
		{"a quote in a field", "", "release,height_m\n3\" pipe,1\n", "l.csv:2:2: not CSV: a quote inside a field without quotes\n  hint: a field that holds a quote stands in quotes, with that quote twice: \"3\"\" pipe\""},
		{"a quote after characters beyond ASCII", "", "release,height_m\nüü\" pipe,1\n", "l.csv:2:3: not CSV: a quote inside a field without quotes\n  hint: a field that holds a quote stands in quotes, with that quote twice: \"3\"\" pipe\""},
		{"a quote without an end", "", "release,height_m\na,1\n\"b,1\n", "l.csv:4:1: not CSV: text behind the closing quote of a field, or no closing quote\n  hint: a field that holds a quote stands in quotes, with that quote twice: \"3\"\" pipe\""},
		{"a quote in the header", "", "rel\"ease,height_m\n", "l.csv:1:4: not CSV: a quote inside a field without quotes\n  hint: a field that holds a quote stands in quotes, with that quote twice: \"3\"\" pipe\""},
		{"not UTF-8", "", "release,height_m\nü,1\nK\xfcche,1\n", "l.csv:3:2: is not UTF-8\n  hint: save it as CSV UTF-8"},
		{"characters beyond ASCII before", "", "release,deck,height_m\nKüche 工具,floor,low\n", "l.csv:2:16: height_m: wants a number, got \"low\""},
		{"characters beyond ASCII in the header", "", "release,höhe,height_m,weite\n", "l.csv:1:9: unknown column \"höhe\"\n  hint: the columns are release, body, mass_kg, diameter_m, deck, spinward_m, axial_m, height_m, v_spinward_m_s, v_axial_m_s, v_up_m_s\nl.csv:1:23: unknown column \"weite\"\n  hint: the columns are release, body, mass_kg, diameter_m, deck, spinward_m, axial_m, height_m, v_spinward_m_s, v_axial_m_s, v_up_m_s"},
		{"after a quoted field of two lines", "", "release,body,height_m\na,\"\nwrench\n\",low\n", "l.csv:4:3: height_m: wants a number, got \"low\""},
		{"after a byte order mark", "", "\xef\xbb\xbfreleas,height_m\n", "l.csv:1:1: unknown column \"releas\"\n  hint: did you mean release?\nl.csv:1:1: wants a column named release"},
		{"several", "", "release,mass_kg,height_m\na,x,y\n,1,1\nb,-1,1\n", "l.csv:2:3: mass_kg: wants a number, got \"x\"\nl.csv:2:5: height_m: wants a number, got \"y\"\nl.csv:3:1: wants a name, got an empty field\nl.csv:4:3: mass_kg: wants more than 0 kg, got -1"},
	} {
		_, err := loadList(c.keys, c.csv)
		if err == nil {
			t.Errorf("%s is taken", c.what)
		} else if got := err.Error(); got != c.want {
			t.Errorf("%s: got\n%s\nwant\n%s", c.what, got, c.want)
		}
	}
}

// TestProblemsOfListedReleases: what the model finds wrong with a release of a
// list stands at the list's line and column.
func TestProblemsOfListedReleases(t *testing.T) {
	for _, c := range []struct {
		what, keys, csv, want string
	}{
		{"height", "", "release,height_m\na,1\nKüche,-0.5\n", "l.csv:3:7: height_m: lies below deck \"floor\": height -0.5 m"},
		{"axial", "", "release,axial_m,height_m\na,9,1\n", "l.csv:2:3: axial_m: lies outside the bulkheads at axial -7 m and 7 m: axial 9 m"},
		{"deck", "", "release,height_m,deck\na,1,attic\n", "l.csv:2:5: deck: no deck named \"attic\""},
		{"no room", "", "height_m,release,mass_kg,diameter_m\n0.1,a,1,0.5\n", "l.csv:2:1: a body of diameter 0.5 m has no room: its centre is 0.1 m from \"floor\""},
		{"a default of the list", "axial = \"9 m\"\n", "release,height_m\na,1\n", "l.csv:2:1: lies outside the bulkheads at axial -7 m and 7 m: axial 9 m"},
		{"beside one of the file", "[[release]]\nname = \"z\"\nat.height = \"-1 m\"\n", "release,height_m\na,1\nb,-2\n", "l.csv:3:3: height_m: lies below deck \"floor\": height -2 m\ns.toml:27:13: release[1].at.height: lies below deck \"floor\": height -1 m"},
	} {
		_, err := loadList(c.keys, c.csv)
		if err == nil {
			t.Errorf("%s is taken", c.what)
		} else if got := err.Error(); got != c.want {
			t.Errorf("%s: got\n%s\nwant\n%s", c.what, got, c.want)
		}
	}
}

// TestNamesAcrossLists: a release is named once in all lists and the file.
func TestNamesAcrossLists(t *testing.T) {
	const more = "[[release_list]]\nfile = \"a.csv\"\n[[release_list]]\nfile = \"sub/b.csv\"\n"
	files := map[string]string{"a.csv": "release,height_m\nx,1\ny,1\n", "sub/b.csv": "release,height_m\nz,1\ny,1\n"}
	_, err := loadLists(more, files, scenarios.Options{})
	const want = "sub/b.csv:3:1: a release named \"y\" is there already"
	if err == nil || err.Error() != want {
		t.Errorf("got %v, want %s", err, want)
	}
	files["sub/b.csv"] = "release,height_m\nz,1\n"
	sc, err := loadLists(more, files, scenarios.Options{})
	if err != nil {
		t.Fatal(err)
	}
	var got []string
	for _, in := range sc.Inputs {
		got = append(got, in.Name)
	}
	for _, r := range sc.Model.Releases {
		got = append(got, r.Name)
	}
	if s := strings.Join(got, " "); s != "s.toml a.csv sub/b.csv in the file x y z" {
		t.Errorf("inputs and releases are %s", s)
	}
}

// TestFilesOutside: a list beside or below the scenario is read, one elsewhere
// only with leave.
func TestFilesOutside(t *testing.T) {
	for _, c := range []struct {
		name string
		ok   bool
	}{
		{"l.csv", true}, {"sub/l.csv", true}, {"sub/../l.csv", true}, {"./l.csv", true},
		{"../l.csv", false}, {"/etc/l.csv", false}, {"sub/../../l.csv", false},
	} {
		more := fmt.Sprintf("[[release_list]]\nfile = %q\n", c.name)
		files := map[string]string{c.name: "release,height_m\na,1\n"}
		_, err := loadLists(more, files, scenarios.Options{})
		if (err == nil) != c.ok {
			t.Errorf("%s: %v", c.name, err)
		}
		want := fmt.Sprintf("s.toml:24:8: release_list[0].file: names a file outside the scenario's folder: %q\n  hint: --allow-outside permits it", c.name)
		if err != nil && err.Error() != want {
			t.Errorf("got %v, want %v", err, want)
		}
		if _, err := loadLists(more, files, scenarios.Options{AllowOutside: true}); err != nil {
			t.Errorf("%s, with leave: %v", c.name, err)
		}
	}
}

func TestUnreadableLists(t *testing.T) {
	for _, c := range []struct{ what, file, want string }{
		{"missing", "gone.csv", "cannot read \"gone.csv\": file does not exist"},
		{"no name", "", "wants the name of a CSV file, got \"\""},
		{"a name of two lines", "a\\nb", "wants the name of a CSV file, got \"a\\nb\""},
	} {
		_, err := loadLists("[[release_list]]\nfile = \""+c.file+"\"\n", nil, scenarios.Options{})
		want := "s.toml:24:8: release_list[0].file: " + c.want
		if err == nil || err.Error() != want {
			t.Errorf("%s: got %v, want %s", c.what, err, want)
		}
	}
}

func TestListSizeCap(t *testing.T) {
	big := strings.Repeat("\n", scenarios.MaxListSize+1)
	_, err := loadList("tracks = true\n", big)
	const want = "s.toml:24:8: release_list[0].file: cannot read \"l.csv\": is larger than 64 MiB"
	if err == nil || err.Error() != want {
		t.Errorf("got %v, want %s", err, want)
	}
}

// TestErrorsAreAList: callers get each fault of a list with its parts.
func TestErrorsAreAList(t *testing.T) {
	_, err := loadList("", "release,height_m\na,low\n")
	var list scenarios.ErrorList
	if !errors.As(err, &list) || len(list) != 1 {
		t.Fatalf("got %v", err)
	}
	if e := list[0]; e.File != "l.csv" || e.Line != 2 || e.Col != 3 || e.Msg == "" {
		t.Errorf("got %+v", e)
	}
}
