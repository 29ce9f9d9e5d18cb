package plots

import (
	"encoding/xml"
	"math"
	"regexp"
	"strings"
	"testing"
)

// TestFiguresAreDocuments holds every sample to what a reader without eyes needs, and a
// strict security policy.
func TestFiguresAreDocuments(t *testing.T) {
	for _, s := range samples() {
		t.Run(s.name, func(t *testing.T) {
			f, err := s.make()
			svg := render(t, f, err)
			var title, desc, role, labelled string
			ids := map[string]bool{}
			elements(t, svg, func(e xml.StartElement, attr func(string) string, words string) {
				ids[attr("id")] = true
				switch e.Name.Local {
				case "title":
					title = words
				case "desc":
					desc = words
				case "svg":
					role, labelled = attr("role"), attr("aria-labelledby")
				}
				if attr("style") != "" {
					t.Errorf("<%s> has a style attribute", e.Name.Local)
				}
			})
			if title != f.Title() || desc == "" || role != "img" {
				t.Errorf("title %q, desc %q, role %q", title, desc, role)
			}
			for _, id := range strings.Fields(labelled) {
				if !ids[id] {
					t.Errorf("no element has the id %q", id)
				}
			}
		})
	}
}

func TestFiguresAreTheSameTwice(t *testing.T) {
	for _, s := range samples() {
		a, errA := s.make()
		b, errB := s.make()
		first := render(t, a, errA)
		if first != render(t, a, errA) || first != render(t, b, errB) {
			t.Errorf("%s: bytes differ", s.name)
		}
	}
}

func TestTextsDoNotCollide(t *testing.T) {
	for _, s := range samples() {
		f, err := s.make()
		checkTexts(t, s.name, f, render(t, f, err))
	}
}

// checkTexts is the placer's law, seen from outside: boxes of texts are disjoint and lie
// on the sheet.
func checkTexts(t *testing.T, name string, f *Figure, svg string) {
	t.Helper()
	const slack = 0.3 // pt: the box of a text is a little taller than its letters
	list := texts(t, svg)
	w, h := f.Size()
	for i, a := range list {
		if a.box.Min.X < 0 || a.box.Min.Y < 0 || a.box.Max.X.Points() > w || a.box.Max.Y.Points() > h {
			t.Errorf("%s: %q is off the sheet: %v", name, a.s, a.box)
		}
		for _, b := range list[:i] {
			if overlap(grow(a.box, -slack), b.box) {
				t.Errorf("%s: %q lies on %q", name, a.s, b.s)
			}
		}
	}
}

func TestTextsAreLegible(t *testing.T) {
	for _, s := range samples() {
		f, err := s.make()
		elements(t, render(t, f, err), func(e xml.StartElement, attr func(string) string, words string) {
			if e.Name.Local == "text" && number(t, attr("font-size")) < sizeNote {
				t.Errorf("%s: %q has size %s", s.name, words, attr("font-size"))
			}
		})
		if w, h := f.Size(); math.Max(w, h) > sheetLong+1e-9 || math.Min(w, h) > sheetShort+1e-9 {
			t.Errorf("%s: sheet of %g by %g pt", s.name, w, h)
		}
	}
}

var arcCommand = regexp.MustCompile(`A([0-9.e+-]+),([0-9.e+-]+) `)

// TestCirclesAreRound: at a true scale both radii of each arc are one, and the hull's
// radius on the page agrees with the scale bar.
func TestCirclesAreRound(t *testing.T) {
	for _, s := range samples() {
		f, err := s.make()
		svg := render(t, f, err)
		arcs := arcCommand.FindAllStringSubmatch(svg, -1)
		for _, a := range arcs {
			if a[1] != a[2] {
				t.Errorf("%s: arc with radii %s and %s", s.name, a[1], a[2])
			}
		}
		if strings.Contains(svg, "<ellipse") {
			t.Errorf("%s: ellipse", s.name)
		}
	}
}

func TestHullAndScaleBarAgree(t *testing.T) {
	f, err := SideView(sideSpec(18, 17, sampleSpin, 0, 0, 0.01))
	svg := render(t, f, err)
	most := 0.0
	for _, a := range arcCommand.FindAllStringSubmatch(svg, -1) {
		most = math.Max(most, number(t, a[1]))
	}
	bar := regexp.MustCompile(`M([0-9.]+),([0-9.]+)L([0-9.]+),([0-9.]+)L([0-9.]+),([0-9.]+)L([0-9.]+),([0-9.]+)Z" fill="none" stroke="#1A1A1A" stroke-width="0.5`).FindStringSubmatch(svg)
	if bar == nil {
		t.Fatal("no scale bar")
	}
	lo, hi := math.Inf(1), math.Inf(-1)
	for _, i := range []int{1, 3, 5, 7} {
		lo, hi = math.Min(lo, number(t, bar[i])), math.Max(hi, number(t, bar[i]))
	}
	if !has(texts(t, svg), "10 m") {
		t.Fatal("the bar is not of 10 m")
	}
	// Five significant digits are written: 0.01 pt at most in either.
	if perM := (hi - lo) / 10; math.Abs(most/18-perM) > 0.01 {
		t.Errorf("hull is drawn at %g pt/m, the bar at %g", most/18, perM)
	}
}

// TestValuesAreGiven looks for what the reader came for.
func TestValuesAreGiven(t *testing.T) {
	// From the closed form: R inv(theta), cos(theta) = r0/(R - a); design section 7.
	theta := math.Acos(16.1 / 17.97)
	drop := length(18 * (math.Tan(theta) - theta))
	theta = math.Acos(16.1 / 18) // of a point
	point := length(18 * (math.Tan(theta) - theta))
	thrown := thrownSpec()
	cases := []struct {
		name  string
		words []string
	}{
		{"side drop", []string{"deck offset = apparent deflection " + drop + " antispinward", "release, height 1.90 m", "landing on floor after", "plumb line", "0.2 s"}},
		{"side slid", []string{"slide", "rests after"}},
		{"side thrown", []string{"deck offset " + signedLength(thrown.Offset), "apparent deflection " + signedLength(thrown.Deflection), "uniform-gravity path"}},
		{"side near axis", []string{"spin axis", "antispinward"}},
		{"side hair", []string{"Detail of the landing", "1.59 mm"}},
		{"side negative spin", []string{"Spin \u22125.20 rpm: the floor moves antispinward.", point + " spinward"}},
		{"inertial drop", []string{"the habitat turns", "deck offset " + drop + " antispinward", "plumb line at release", "Dashed: the structure at release."}},
		{"inertial near axis", []string{"turns)", "spin axis"}},
		{"plan cropped", []string{"Cropped: the deck is 113 m round", "wrench from the locker", "floor: 0.639 m antispinward", "2, 5", "hatch 3 (closed)", "no landing"}},
		{"plan many", []string{"without a number"}},
		{"deflection", []string{"apparent deflection, m, spinward positive", "height above the deck, m", "time since the release, s", "drop from 3.00 m"}},
		{"loads", []string{"apparent gravity, g", "weight, N", "friction demand", "rad/s²", "feet", "climb", "time, s"}},
		{"loads of many legs", []string{"17 climb ladder 16"}},
	}
	made := map[string]sampleFigure{}
	for _, s := range samples() {
		made[s.name] = s
	}
	for _, c := range cases {
		s, ok := made[c.name]
		if !ok {
			t.Fatalf("no sample %q", c.name)
		}
		f, err := s.make()
		list := texts(t, render(t, f, err))
		var all []string
		for _, x := range list {
			all = append(all, x.s)
		}
		for _, w := range c.words {
			if !strings.Contains(strings.Join(all, " "), w) {
				t.Errorf("%s: no text %q in %q", c.name, w, all)
			}
		}
	}
}

// TestAllFormatsAreWritten: PNG and PDF come from the same drawing.
func TestAllFormatsAreWritten(t *testing.T) {
	magic := map[string]string{"svg": "<?xml", "png": "\x89PNG", "pdf": "%PDF"}
	f, err := SideView(slidSpec())
	if err != nil {
		t.Fatal(err)
	}
	for _, format := range Formats() {
		var b strings.Builder
		if err := f.Write(&b, format); err != nil || !strings.HasPrefix(b.String(), magic[format]) {
			t.Errorf("%s: %v, %q", format, err, b.String()[:min(8, b.Len())])
		}
	}
	if err := f.Write(&strings.Builder{}, "gif"); err == nil {
		t.Error("gif was written")
	}
}
