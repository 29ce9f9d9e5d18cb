package plots

import (
	"io"
	"math"
	"testing"
)

func TestSideViewRefuses(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	cases := map[string]func(*SideViewSpec){
		"no title":          func(s *SideViewSpec) { s.Title = " " },
		"no description":    func(s *SideViewSpec) { s.Desc = "" },
		"no track":          func(s *SideViewSpec) { s.Track = nil },
		"track of NaN":      func(s *SideViewSpec) { s.Track[3].X = nan },
		"track of infinity": func(s *SideViewSpec) { s.Track[3].Y = inf },
		"time of NaN":       func(s *SideViewSpec) { s.Track[3].T = nan },
		"time runs back":    func(s *SideViewSpec) { s.Track[3].T = -1 },
		"unknown phase":     func(s *SideViewSpec) { s.Track[3].Phase = "hop" },
		"huge track":        func(s *SideViewSpec) { s.Track[3].X = 1e12 },
		"spin of NaN":       func(s *SideViewSpec) { s.Spin = nan },
		"deck of NaN":       func(s *SideViewSpec) { s.Deck = nan },
		"negative deck":     func(s *SideViewSpec) { s.Deck = -1 },
		"negative body":     func(s *SideViewSpec) { s.Body = -1 },
		"infinite offset":   func(s *SideViewSpec) { s.Offset = inf },
		"landing of NaN":    func(s *SideViewSpec) { s.Landing = &Point{nan, 0} },
		"uniform of NaN":    func(s *SideViewSpec) { s.Uniform[1].Y = nan },
		"arc of NaN":        func(s *SideViewSpec) { s.Outlines[0].Path[0].Radius = nan },
		"unknown kind":      func(s *SideViewSpec) { s.Outlines[0].Kind = 99 },
	}
	for name, spoil := range cases {
		s := sideSpec(18, 1.9, sampleSpin, 0, 0, 0.03)
		spoil(&s)
		if f, err := SideView(s); err == nil || f != nil {
			t.Errorf("%s: drawn", name)
		}
	}
}

func TestInertialViewRefuses(t *testing.T) {
	cases := map[string]func(*InertialViewSpec){
		"no path":       func(s *InertialViewSpec) { s.Path = nil },
		"foot at axis":  func(s *InertialViewSpec) { s.Foot = Point{} },
		"foot of NaN":   func(s *InertialViewSpec) { s.Foot.X = math.NaN() },
		"angle of NaN":  func(s *InertialViewSpec) { s.LandingAngle = math.NaN() },
		"huge angle":    func(s *InertialViewSpec) { s.LandingAngle = 1e300 },
		"negative body": func(s *InertialViewSpec) { s.Body = -1 },
		"no title":      func(s *InertialViewSpec) { s.Title = "" },
	}
	for name, spoil := range cases {
		s := inertialSpec(18, 1.9, sampleSpin, 0, 0, 0.03)
		spoil(&s)
		if f, err := InertialView(s); err == nil || f != nil {
			t.Errorf("%s: drawn", name)
		}
	}
}

func TestDeckPlanRefuses(t *testing.T) {
	cases := map[string]func(*DeckPlanSpec){
		"nothing":           func(s *DeckPlanSpec) { *s = DeckPlanSpec{Title: "t", Desc: "d"} },
		"round, no radius":  func(s *DeckPlanSpec) { s.Radius = 0 },
		"negative radius":   func(s *DeckPlanSpec) { s.Radius = -1 },
		"turned inside out": func(s *DeckPlanSpec) { s.From.Y = 9 },
		"opening of NaN":    func(s *DeckPlanSpec) { s.Openings[0].Size.X = math.NaN() },
		"opening of 0":      func(s *DeckPlanSpec) { s.Openings[0].Size.X = 0 },
		"fixture of NaN":    func(s *DeckPlanSpec) { s.Fixtures[0].Path[0].X = math.NaN() },
		"release of NaN":    func(s *DeckPlanSpec) { s.Releases[0].At.X = math.NaN() },
		"landing of NaN":    func(s *DeckPlanSpec) { s.Releases[0].Landing.X = math.NaN() },
		"no description":    func(s *DeckPlanSpec) { s.Desc = "" },
		"path of no points": func(s *DeckPlanSpec) { s.Paths = []PlanPath{{Name: "p"}} },
		"path of NaN":       func(s *DeckPlanSpec) { s.Paths = []PlanPath{{Points: []Point{{}, {1, math.NaN()}}}} },
		"huge path":         func(s *DeckPlanSpec) { s.Paths = []PlanPath{{Points: []Point{{1e12, 0}}}} },
	}
	for name, spoil := range cases {
		s := planSpec()
		spoil(&s)
		if f, err := DeckPlan(s); err == nil || f != nil {
			t.Errorf("%s: drawn", name)
		}
	}
}

func TestChartsRefuse(t *testing.T) {
	nan := math.NaN()
	for name, spoil := range map[string]func(*DeflectionChartSpec){
		"no series":    func(s *DeflectionChartSpec) { s.Series = nil },
		"empty series": func(s *DeflectionChartSpec) { s.Series = []DeflectionSeries{{Name: "a"}} },
		"all NaN": func(s *DeflectionChartSpec) {
			s.Series = []DeflectionSeries{{"a", []float64{0}, []float64{1}, []float64{nan}, 0}}
		},
		"unequal lengths": func(s *DeflectionChartSpec) { s.Series[0].Time = s.Series[0].Time[1:] },
		"huge":            func(s *DeflectionChartSpec) { s.Series[0].Deflection[1] = 1e300 },
		"no title":        func(s *DeflectionChartSpec) { s.Title = "" },
	} {
		s := deflectionSpec()
		spoil(&s)
		if f, err := DeflectionChart(s); err == nil || f != nil {
			t.Errorf("deflection, %s: drawn", name)
		}
	}
	for name, spoil := range map[string]func(*LoadsChartSpec){
		"no time": func(s *LoadsChartSpec) { *s = LoadsChartSpec{Title: "t", Desc: "d"} },
		"one moment": func(s *LoadsChartSpec) {
			*s = LoadsChartSpec{Title: "t", Desc: "d", Time: []float64{1}, Weight: []float64{1}}
		},
		"no values":      func(s *LoadsChartSpec) { *s = LoadsChartSpec{Title: "t", Desc: "d", Time: []float64{0, 1}} },
		"time runs back": func(s *LoadsChartSpec) { s.Time[5] = -1 },
		"time of NaN":    func(s *LoadsChartSpec) { s.Time[5] = nan },
		"short slice":    func(s *LoadsChartSpec) { s.Weight = s.Weight[1:] },
		"leg of NaN":     func(s *LoadsChartSpec) { s.Legs[0].To = nan },
		"leg runs back":  func(s *LoadsChartSpec) { s.Legs[0].To = -5 },
		"huge":           func(s *LoadsChartSpec) { s.Weight[5] = 1e300 },
	} {
		s := loadsSpec()
		spoil(&s)
		if f, err := LoadsChart(s); err == nil || f != nil {
			t.Errorf("loads, %s: drawn", name)
		}
	}
}

// TestDegenerateInputsAreDrawn: few points and odd sizes are no errors.
func TestDegenerateInputsAreDrawn(t *testing.T) {
	nan := math.NaN()
	one := []TrackPoint{{Y: 1}}
	cases := map[string]func() (*Figure, error){
		"release only": func() (*Figure, error) {
			return SideView(SideViewSpec{Title: "t", Desc: "d", Deck: 18, Track: one, Offset: nan, Deflection: nan})
		},
		"release at the deck": func() (*Figure, error) {
			return SideView(SideViewSpec{Title: "t", Desc: "d", Track: []TrackPoint{{}}, Landing: &Point{}})
		},
		"zero offset": func() (*Figure, error) {
			return SideView(SideViewSpec{Title: "t", Desc: "d", Deck: 18, Track: []TrackPoint{{Y: 1}, {T: 1}}, Landing: &Point{}})
		},
		"release at the axis": func() (*Figure, error) {
			return SideView(SideViewSpec{Title: "t", Desc: "d", Deck: 18, Spin: 1, Track: []TrackPoint{{Y: 18}, {T: 1, Y: 18}}, Offset: nan, Deflection: nan})
		},
		"long names": func() (*Figure, error) {
			s := thrownSpec()
			long := ""
			for range 40 {
				long += "a very long name "
			}
			s.Title, s.Surface, s.Notes, s.Outlines[0].Name = long, long, long+long, long
			return SideView(s)
		},
		"control characters": func() (*Figure, error) {
			s := thrownSpec()
			s.Title, s.Surface = "a\x00b\xff<&>", "\"\n'\u2028"
			return SideView(s)
		},
		"inertial point": func() (*Figure, error) {
			return InertialView(InertialViewSpec{Title: "t", Desc: "d", Foot: Point{1, 0}, Path: one, Offset: nan})
		},
		"one release": func() (*Figure, error) {
			return DeckPlan(DeckPlanSpec{Title: "t", Desc: "d", Releases: []PlanRelease{{At: Point{3, 4}}}})
		},
		"one value": func() (*Figure, error) {
			return DeflectionChart(DeflectionChartSpec{Title: "t", Desc: "d", Series: []DeflectionSeries{{"a", []float64{0}, []float64{0}, []float64{0}, 0}}})
		},
		"infinite friction": func() (*Figure, error) {
			return LoadsChart(LoadsChartSpec{Title: "t", Desc: "d", Time: []float64{0, 1, 2}, Friction: []float64{0.1, math.Inf(1), 0.2}})
		},
	}
	for name, draw := range cases {
		f, err := draw()
		if err != nil {
			t.Errorf("%s: %v", name, err)
			continue
		}
		if err := f.Write(io.Discard, "svg"); err != nil {
			t.Errorf("%s: %v", name, err)
		}
	}
}
