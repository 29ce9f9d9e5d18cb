package plots

import (
	"math"
	"regexp"
	"strings"
	"testing"
)

func TestPathViewRefuses(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	cases := map[string]func(*PathViewSpec){
		"no title":          func(s *PathViewSpec) { s.Title = "" },
		"no description":    func(s *PathViewSpec) { s.Desc = " " },
		"no way":            func(s *PathViewSpec) { s.Way = nil },
		"way of NaN":        func(s *PathViewSpec) { s.Way[4].X = nan },
		"huge way":          func(s *PathViewSpec) { s.Way[4].Y = 1e12 },
		"spin of NaN":       func(s *PathViewSpec) { s.Spin = nan },
		"deck of NaN":       func(s *PathViewSpec) { s.Deck = nan },
		"negative deck":     func(s *PathViewSpec) { s.Deck = -1 },
		"feet of NaN":       func(s *PathViewSpec) { s.Stations[1].Feet.X = nan },
		"head of infinity":  func(s *PathViewSpec) { s.Stations[1].Head.Y = inf },
		"force of NaN":      func(s *PathViewSpec) { s.Stations[1].Force.Y = nan },
		"force of infinity": func(s *PathViewSpec) { s.Stations[1].Force.X = inf },
		"huge force":        func(s *PathViewSpec) { s.Stations[1].Force.X = 2e9 },
		"time of NaN":       func(s *PathViewSpec) { s.Stations[1].T = nan },
		"time runs back":    func(s *PathViewSpec) { s.Stations[1].T = -1 },
		"gap of NaN":        func(s *PathViewSpec) { s.Near.Gap = nan },
		"near of NaN":       func(s *PathViewSpec) { s.Near.At.X = nan },
		"near at no time":   func(s *PathViewSpec) { s.Near.T = inf },
		"unknown kind":      func(s *PathViewSpec) { s.Outlines[0].Kind = 99 },
	}
	for name, spoil := range cases {
		s := spokePath(0.4)
		spoil(&s)
		if f, err := PathView(s); err == nil || f != nil {
			t.Errorf("%s: drawn", name)
		}
	}
}

// TestPathsAreTold looks for what the reader came for.
func TestPathsAreTold(t *testing.T) {
	// By hand: 0.4 rad/s at the waist, 30 - 0.55*1.78 = 29.021 m from the axis, times 84 kg.
	const atRest = "390 N"
	cases := map[string][]string{
		"path down a spoke":                {atRest, "descend", "start", "end", "62.5 s", "force 200 N", "Arrows: force of the person on the structure.", "least clearance 0.320 m to spoke B at 30 s"},
		"path down a spoke, negative spin": {"the floor moves antispinward"},
		"path half round":                  {"spin axis", "walk", "hull", "47.1 s"},
		"path lap and a half":              {"The way goes 540° (1.50 turns) round the axis."},
		"path climb":                       {"walk", "turn head", "climb", "3, 4 s", "overlap of 40.0 mm with upper deck"},
		"path standing up":                 {"start and end", "stand up, stand", "1.5, 2 s", "425 to 467 N"},
		"path flat":                        {"0, 10 s", "703 N"},
		"path hub":                         {"plumb line of the start", "float"},
		"plan with paths":                  {"to the upper deck", "up the ladder"},
		"plan of a long walk":              {"night round"},
	}
	seen := map[string]bool{}
	for _, s := range pathSamples() {
		f, err := s.make()
		list := texts(t, render(t, f, err))
		seen[s.name] = true
		for _, w := range cases[s.name] {
			if !said(list, w) {
				t.Errorf("%s: no text %q", s.name, w)
			}
		}
		if s.name == "path hub" && said(list, " N") {
			t.Errorf("%s: a force is said where there is none", s.name)
		}
	}
	for name := range cases {
		if !seen[name] {
			t.Errorf("no sample %q", name)
		}
	}
}

// said reports whether the words stand in the figure, on one line or on several.
func said(list []svgText, words string) bool {
	var all []string
	for _, x := range list {
		all = append(all, x.s)
	}
	return strings.Contains(strings.Join(all, " "), words)
}

// arranged is a path view before it is painted.
func arranged(s PathViewSpec) *crewPath {
	p := &crewPath{spec: s, scene: scene{radius: s.Deck, outlines: s.Outlines, track: wayTrack(s.Way)}}
	p.head = headline{s.Title, s.Desc, s.Notes, s.Spin}
	p.arrange()
	return p
}

// TestPathViewsShowAllOfIt: ways, persons and arrows lie in the window, and the whole ring
// if the way goes far round it.
func TestPathViewsShowAllOfIt(t *testing.T) {
	for name, s := range map[string]PathViewSpec{
		"spoke": spokePath(0.4), "half": ringPath(sampleSpin, -math.Pi), "laps": ringPath(sampleSpin, 3*math.Pi), "short": ringPath(sampleSpin, 0.3),
		"climb": climbPath(), "standing": standingPath(), "flat": flatPath(), "hub": hubPath(),
	} {
		p := arranged(s)
		shown := s.Way
		for _, st := range s.Stations {
			shown = append(shown, st.Feet, st.Head)
			if tip := p.v.pt(st.Feet).Add(p.arrow(st)); !within(p.win, tip) {
				t.Errorf("%s: the arrow at %g s ends outside", name, st.T)
			}
		}
		for _, q := range shown {
			if !within(p.win, p.v.pt(q)) {
				t.Fatalf("%s: (%g, %g) m is not shown", name, q.X, q.Y)
			}
		}
		if whole := name == "half" || name == "laps"; p.whole != whole || whole && !within(p.win, p.v.pt(Point{0, 2 * s.Deck})) {
			t.Errorf("%s: whole ring: %v", name, p.whole)
		}
	}
}

var pushLine = regexp.MustCompile(`M([0-9.]+),([0-9.]+)L([0-9.]+),([0-9.]+)" fill="none" stroke="#D55E00" stroke-width="1.1`)

// TestForceBarAgreesWithTheArrows: on the page, force over length is one for all arrows and the bar.
func TestForceBarAgreesWithTheArrows(t *testing.T) {
	s := ringPath(sampleSpin, 0.5)
	f, err := PathView(s)
	svg := render(t, f, err)
	if !said(texts(t, svg), "force 500 N") {
		t.Fatal("the bar is not of 500 N")
	}
	var got []float64
	for _, m := range pushLine.FindAllStringSubmatch(svg, -1) {
		got = append(got, math.Hypot(number(t, m[3])-number(t, m[1]), number(t, m[4])-number(t, m[2])))
	}
	const barEnd = 1 // the stroke across the bar's beginning
	if len(got) != len(s.Stations)+1+barEnd {
		t.Fatalf("%d lines, want %d arrows and a bar", len(got), len(s.Stations))
	}
	perN := got[len(s.Stations)] / 500
	for i, st := range s.Stations {
		// Five significant digits are written: up to 0.01 pt for each of the ends.
		if want := st.Force.norm() * perN; math.Abs(got[i]-want) > 0.03 {
			t.Errorf("%g N is drawn %g pt long, want %g", st.Force.norm(), got[i], want)
		}
	}
}

// TestPersonsAreTrueToScale: the line of a person is as long as the scale makes the person.
func TestPersonsAreTrueToScale(t *testing.T) {
	s := standingPath()
	s.Stations = s.Stations[3:4]
	p := arranged(s)
	f, err := PathView(s)
	m := regexp.MustCompile(`M([0-9.]+),([0-9.]+)L([0-9.]+),([0-9.]+)" fill="none" stroke="#1A1A1A" stroke-width="0.8`).FindStringSubmatch(render(t, f, err))
	if m == nil {
		t.Fatal("no person")
	}
	got := math.Hypot(number(t, m[3])-number(t, m[1]), number(t, m[4])-number(t, m[2]))
	if want := sampleTall * p.v.perM; math.Abs(got-want) > 0.03 {
		t.Errorf("a person of %g m is drawn %g pt long, want %g", sampleTall, got, want)
	}
}

// TestDegeneratePathsAreDrawn: few points and odd sizes are no errors.
func TestDegeneratePathsAreDrawn(t *testing.T) {
	for name, s := range map[string]PathViewSpec{
		"one point":       {Way: []Point{{}}},
		"same point":      {Way: []Point{{0, 2}, {0, 2}}, Deck: 2},
		"person of 0 m":   {Way: []Point{{}}, Stations: []PathStation{{Force: Point{0, -1}}}},
		"tiny force":      {Way: []Point{{}, {1, 0}}, Stations: []PathStation{{Force: Point{5e-324, 0}}}},
		"huge force":      {Way: []Point{{}, {1, 0}}, Stations: []PathStation{{Force: Point{maxForce, 0}, Head: Point{0, 1}}}},
		"stations afar":   {Way: []Point{{}, {1, 0}}, Deck: 9, Stations: []PathStation{{Feet: Point{1e6, 0}}, {T: 1, Feet: Point{-1e6, 3}}}},
		"nameless legs":   {Way: []Point{{}}, Stations: []PathStation{{Leg: "a"}, {Leg: ""}, {Leg: "a"}}},
		"near off window": {Way: []Point{{}}, Near: &PathNear{At: Point{99, 99}}},
	} {
		s.Title, s.Desc = "t", "d"
		f, err := PathView(s)
		checkTexts(t, name, f, render(t, f, err))
	}
}

// TestTimesAreShort: idle zeros are left out, others are not.
func TestTimesAreShort(t *testing.T) {
	for v, want := range map[float64]string{0: "0 s", 4: "4 s", 12.5: "12.5 s", 100: "100 s", 0.25: "0.25 s", 1e9: "1.00e9 s", -3: "\u22123 s"} {
		if got := shortSeconds(v); got != want {
			t.Errorf("%g s is %q, want %q", v, got, want)
		}
	}
}

// TestPlansWithoutPathsAreAsBefore: no path is the same as an empty list, and a plan of a
// path has all the lines of the plan without it.
func TestPlansWithoutPathsAreAsBefore(t *testing.T) {
	draw := func(paths []PlanPath) string {
		s := planSpec()
		s.Paths = paths
		f, err := DeckPlan(s)
		return render(t, f, err)
	}
	none := draw(nil)
	if none != draw([]PlanPath{}) {
		t.Error("an empty list changes the figure")
	}
	some := draw([]PlanPath{{Name: "p", Points: []Point{{-1, 0}, {2, 0}}}})
	if some == none || !strings.Contains(some, `stroke-dasharray="4.5,2.2`) {
		t.Error("a path is not drawn")
	}
	lines := regexp.MustCompile(`<path [^>]*>`).FindAllString(none, -1)
	if len(lines) == 0 {
		t.Error("the plan has no lines")
	}
	for _, l := range lines {
		const leader = `stroke-width="0.4` // labels may move, and their leaders with them
		if !strings.Contains(some, l) && !strings.Contains(l, leader) {
			t.Errorf("a path takes away %s", l)
		}
	}
}

// TestWaysOnPlans: a path is drawn where the deck is, however many laps off its arcs are.
func TestWaysOnPlans(t *testing.T) {
	at := func(x float64) string {
		s := planSpec()
		s.Releases = nil
		s.Paths = []PlanPath{{Name: "p", Points: []Point{{x, 1}, {x + 3, 2}, {x + 3, 2.5}}}}
		f, err := DeckPlan(s)
		return render(t, f, err)
	}
	const laps = 36 * math.Pi // exactly a lap of 18 m
	near := at(5)
	for _, x := range []float64{5 + laps, 5 - 3*laps} {
		// Rounding may move the last digit of a number; the words and lines are the same.
		far := at(x)
		if a, b := strings.Count(near, "<path"), strings.Count(far, "<path"); a != b {
			t.Errorf("%d lines at %g m, %d at 5 m", b, x, a)
		}
		if !said(texts(t, far), "p") || !said(texts(t, far), "5 m") {
			t.Errorf("the plan of a path at %g m is elsewhere", x)
		}
	}
}

// wildPath is a crew path of any numbers.
func wildPath(w wild) PathViewSpec {
	s := PathViewSpec{Title: "t", Desc: "d", Spin: w.number(), Deck: math.Abs(w.number()), Outlines: w.outlines()}
	for _, p := range w.track() {
		s.Way = append(s.Way, Point{p.X, p.Y})
	}
	sizes := []float64{1e-7, 1, 800, 1e5}
	for _, t := range w.times(w.IntN(9)) {
		st := PathStation{T: t, Head: w.point(), Leg: phaseNames[w.IntN(4)]}
		st.Force = Point{w.NormFloat64(), w.NormFloat64()}.scale(sizes[w.IntN(4)])
		if w.IntN(2) == 0 && len(s.Way) > 0 {
			st.Feet = s.Way[w.IntN(len(s.Way))]
			st.Head = st.Feet.add(Point{w.NormFloat64(), w.NormFloat64()})
		}
		s.Stations = append(s.Stations, st)
	}
	if p := w.place(); p != nil {
		s.Near = &PathNear{T: w.number(), At: *p, Gap: w.number(), Surface: "post"}
	}
	return s
}

func wildPlanPaths(w wild) []PlanPath {
	out := make([]PlanPath, w.IntN(3))
	for i := range out {
		out[i] = PlanPath{Name: "walk", Points: []Point{w.point(), w.point(), w.point()}[:1+w.IntN(3)]}
	}
	return out
}
