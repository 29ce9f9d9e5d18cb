package plots

import (
	"encoding/xml"
	"math"
	"math/rand/v2"
	"strings"
	"testing"
)

// scatterSpec has n landings spread round a place beside the hatch of planSpec, some of
// them on the floor below.
func scatterSpec(n int) ScatterPlanSpec {
	const seed = 9
	r := rand.New(rand.NewPCG(seed, 1))
	s := ScatterPlanSpec{Deck: planSpec(), Foot: Point{3.8, 0}, Landed: n, Groups: []ScatterGroup{{Name: "on upper 66.7 % (64.6 to 68.7 %)"}, {Name: "on floor 33.3 % (31.3 to 35.4 %)"}},
		Words: []string{"through hatch 2 33.3 % (31.3 to 35.4 %)", "median: 0.242 m antispinward, 5.46 mm toward -axial of plumb", "2000 samples, 3 left out"}}
	s.Deck.Title = "wrench: landings on the plan of \"upper\""
	for i := range n {
		g := &s.Groups[min(i%3, 1)]
		g.Places = append(g.Places, Point{3.5 - float64(i%3%2) + 0.3*r.NormFloat64(), 0.2 * r.NormFloat64()})
	}
	s.Median = &Point{3.4, 0.01}
	s.Ellipse = &PlanEllipse{Centre: Point{3.2, 0}, Major: 1.2, Minor: 0.5, Angle: 0.1}
	round := (&PlanEllipse{Centre: Point{3.5, 0}, Major: 0.7, Minor: 0.4}).outline()
	s.Contour = [][]Point{round[:len(round)-1], {{2.2, -0.3}, {2.7, -0.3}, {2.7, 0.3}, {2.2, 0.3}}}
	return s
}

// scatterLine is a scatter of one number: its landings lie on a line.
func scatterLine() ScatterPlanSpec {
	s := scatterSpec(0)
	s.Groups = []ScatterGroup{{Name: "on floor 100 %"}}
	for i := range 200 {
		s.Groups[0].Places = append(s.Groups[0].Places, Point{3.2 + 0.002*float64(i), 0})
	}
	s.Landed = 200
	s.Contour, s.Line = [][]Point{{{3.21, 0}, {3.59, 0}}}, true
	s.Ellipse = &PlanEllipse{Centre: Point{3.4, 0}, Major: 0.25}
	return s
}

func scatterSamples() []sampleFigure {
	scatter := func(name string, s ScatterPlanSpec) sampleFigure {
		return sampleFigure{"scatter " + name, func() (*Figure, error) { return ScatterPlan(s) }}
	}
	wordy := scatterSpec(300)
	for range 30 {
		wordy.Words = append(wordy.Words, "through one more of the many openings 3.3 % (1.3 to 5.4 %)")
	}
	bare := ScatterPlanSpec{Deck: planSpec(), Groups: []ScatterGroup{{Name: "on floor", Places: []Point{{0.1, 0}}}}, Landed: 1}
	open := scatterSpec(600)
	open.Deck.From.Y, open.Deck.To.Y = 0, 0
	lap := scatterSpec(100)
	for i := range lap.Groups[0].Places {
		lap.Groups[0].Places[i].X -= 2 * math.Pi * 18 * float64(i%3)
	}
	return []sampleFigure{scatter("beside a hatch", scatterSpec(MostDots)), scatter("on a line", scatterLine()),
		scatter("with many words", wordy), scatter("of one", bare), scatter("without bulkheads", open), scatter("over laps", lap)}
}

func TestScatterPlanRefuses(t *testing.T) {
	nan := math.NaN()
	for name, spoil := range map[string]func(*ScatterPlanSpec){
		"no title":              func(s *ScatterPlanSpec) { s.Deck.Title = "" },
		"no description":        func(s *ScatterPlanSpec) { s.Deck.Desc = "" },
		"foot of NaN":           func(s *ScatterPlanSpec) { s.Foot.X = nan },
		"median of NaN":         func(s *ScatterPlanSpec) { s.Median.Y = nan },
		"landing of NaN":        func(s *ScatterPlanSpec) { s.Groups[1].Places[0].X = nan },
		"huge landing":          func(s *ScatterPlanSpec) { s.Groups[0].Places[1].Y = 1e12 },
		"contour of infinity":   func(s *ScatterPlanSpec) { s.Contour[0][0].X = math.Inf(1) },
		"negative axis":         func(s *ScatterPlanSpec) { s.Ellipse.Minor = -1 },
		"axis of NaN":           func(s *ScatterPlanSpec) { s.Ellipse.Major = nan },
		"angle of NaN":          func(s *ScatterPlanSpec) { s.Ellipse.Angle = nan },
		"too many landings":     func(s *ScatterPlanSpec) { s.Groups[0].Places = make([]Point, MostDots+1) },
		"a deck of no radius":   func(s *ScatterPlanSpec) { s.Deck.Radius = 0 },
		"a deck that goes back": func(s *ScatterPlanSpec) { s.Deck.From.Y = 8 },
	} {
		s := scatterSpec(60)
		spoil(&s)
		if f, err := ScatterPlan(s); err == nil || f != nil {
			t.Errorf("%s: drawn", name)
		}
	}
}

// TestScatterPlanDrawsEachLanding counts the marks of the first group, one square each,
// and holds that the caption tells of landings that are not drawn.
func TestScatterPlanDrawsEachLanding(t *testing.T) {
	const n = 120
	s := scatterSpec(n)
	s.Groups = s.Groups[:1]
	places := len(s.Groups[0].Places)
	for _, landed := range []int{places, 5000} {
		s.Landed = landed
		f, err := ScatterPlan(s)
		svg := render(t, f, err)
		squares := 0
		elements(t, svg, func(e xml.StartElement, attr func(string) string, words string) {
			if k := strings.Count(attr("d"), "M"); e.Name.Local == "path" && k > 10 {
				squares += k
			}
		})
		if squares != places {
			t.Errorf("%d marks for %d landings", squares, places)
		}
		if got := strings.Contains(svg, "of 5000 landings are drawn"); got != (landed == 5000) {
			t.Errorf("of %d landings: told of those left out: %v", landed, got)
		}
	}
}

// TestScatterPlanShowsWhatMatters: the foot, the ellipse and the contour lie in the
// window, and a landing far off does not shrink them.
func TestScatterPlanShowsWhatMatters(t *testing.T) {
	scale := func(s ScatterPlanSpec) float64 {
		p := scatterPlan{plan: plan{spec: s.Deck}, of: s}
		p.spec.Releases = nil
		p.arrange()
		for _, q := range append(s.Ellipse.outline(), s.Foot, *s.Median, s.Contour[1][0]) {
			if !within(p.win, p.v.pt(q)) {
				t.Errorf("%v is not shown", q)
			}
		}
		return p.v.perM
	}
	s := scatterSpec(1000)
	near := scale(s)
	s.Groups[0].Places[5] = Point{3, 300}
	if far := scale(s); far != near {
		t.Errorf("a landing far off changes the scale from %g to %g pt/m", near, far)
	}
}

func TestEllipseOutline(t *testing.T) {
	e := PlanEllipse{Centre: Point{1, 2}, Major: 3, Minor: 1, Angle: math.Pi / 3}
	for _, p := range e.outline() {
		q := p.sub(e.Centre).turned(-e.Angle)
		if d := q.X*q.X/9 + q.Y*q.Y; math.Abs(d-1) > 1e-12 {
			t.Errorf("%v lies at %g", p, d)
		}
	}
}
