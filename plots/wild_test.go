package plots

import (
	"bytes"
	"fmt"
	"math"
	"math/rand/v2"
	"testing"
)

// wild makes numbers of all sizes, and now and then what is no number.
type wild struct{ *rand.Rand }

func (w wild) number() float64 {
	switch w.IntN(60) {
	case 0:
		return math.NaN()
	case 1:
		return math.Inf(1 - 2*w.IntN(2))
	case 2, 3, 4, 5:
		return 0
	}
	v := math.Pow(10, w.Float64()*8-4)
	if w.IntN(20) == 0 {
		v = math.Pow(10, w.Float64()*40-20)
	}
	return v * float64(1-2*w.IntN(2))
}

func (w wild) point() Point { return Point{w.number(), w.number()} }

func (w wild) place() *Point {
	if w.IntN(3) == 0 {
		return nil
	}
	p := w.point()
	return &p
}

func (w wild) list(n int) []float64 {
	out := make([]float64, n)
	for i := range out {
		out[i] = w.number()
	}
	return out
}

func (w wild) times(n int) []float64 {
	out, t := make([]float64, n), 0.0
	step := math.Pow(10, w.Float64()*10-6)
	for i := range out {
		out[i] = t
		t += step * float64(w.IntN(3))
	}
	return out
}

func (w wild) track() []TrackPoint {
	out := make([]TrackPoint, w.IntN(12))
	size := math.Pow(10, w.Float64()*12-5)
	for i, t := range w.times(len(out)) {
		out[i] = TrackPoint{T: t, X: size * w.NormFloat64(), Y: size * w.NormFloat64(), Phase: phaseNames[w.IntN(4)]}
	}
	if len(out) > 0 && w.IntN(2) == 0 {
		out[0].X = 0
	}
	return out
}

func (w wild) outlines() []Outline {
	out := make([]Outline, w.IntN(4))
	for i := range out {
		out[i] = Outline{Kind: Kind(w.IntN(3)), Name: "piece", Closed: w.IntN(2) == 0, Path: Polygon(w.point(), w.point(), w.point())}
		if w.IntN(2) == 0 {
			out[i].Path = Sector(w.point(), math.Abs(w.number()), math.Abs(w.number()), w.NormFloat64(), 9*w.NormFloat64())
		}
	}
	return out
}

// TestWildInputsNeverPanic: whatever the numbers, a figure is drawn, with no text on
// another, or refused. Write
// turns a panic of the drawing into an error, so that such an error fails here.
func TestWildInputsNeverPanic(t *testing.T) {
	const seed, rounds = 20, 100
	w := wild{rand.New(rand.NewPCG(seed, 1))}
	drawn := 0
	for round := range rounds {
		for kind, draw := range wildFigures(w) {
			name := fmt.Sprintf("seed %d, round %d, kind %d", seed, round, kind)
			func() {
				defer func() {
					if r := recover(); r != nil {
						t.Errorf("%s: panic: %v", name, r)
					}
				}()
				f, err := draw()
				if err != nil {
					return
				}
				drawn++
				var b bytes.Buffer
				if err := f.Write(&b, "svg"); err != nil {
					t.Errorf("%s: %v", name, err)
					return
				}
				checkTexts(t, name, f, b.String())
			}()
		}
	}
	if drawn < rounds {
		t.Errorf("only %d of %d figures were drawn", drawn, 9*rounds)
	}
}

func wildFigures(w wild) []func() (*Figure, error) {
	side := SideViewSpec{
		Title: "t", Desc: "d", Spin: w.number(), Deck: math.Abs(w.number()), Outlines: w.outlines(), Track: w.track(), TickEvery: w.number(),
		Body: math.Abs(w.number()), Uniform: []Point{w.point(), w.point()}, Landing: w.place(), Rest: w.place(), Offset: w.number(), Deflection: w.number(),
	}
	inertial := InertialViewSpec{
		Title: "t", Desc: "d", Spin: w.number(), Outlines: w.outlines(), Foot: w.point(), ReleaseAngle: w.number(), LandingAngle: w.number(),
		Path: w.track(), Body: math.Abs(w.number()), Landing: w.place(), Offset: w.number(),
	}
	deck := DeckPlanSpec{
		Title: "t", Desc: "d", Radius: math.Abs(w.number()), Round: w.IntN(2) == 0, From: Point{-math.Abs(w.number()), -math.Abs(w.number())},
		To: Point{math.Abs(w.number()), math.Abs(w.number())}, Openings: []PlanOpening{{Name: "o", Centre: w.point(), Size: Point{1, 2}, Coaming: true}},
		Fixtures: []PlanFixture{{Name: "f", Path: []Point{w.point(), w.point(), w.point()}}},
		Releases: []PlanRelease{{Name: "r", At: w.point(), Landing: w.place()}, {Name: "q", At: w.point(), Landing: w.place()}},
	}
	crew := wildPath(w)
	deck.Paths = wildPlanPaths(w)
	scattered := ScatterPlanSpec{Deck: deck, Foot: w.point(), Median: w.place(), Landed: w.IntN(5), Line: w.IntN(2) == 0,
		Groups:  []ScatterGroup{{"a", []Point{w.point(), w.point()}}, {"b", []Point{w.point()}}},
		Ellipse: &PlanEllipse{w.point(), math.Abs(w.number()), math.Abs(w.number()), w.NormFloat64()}, Contour: [][]Point{{w.point(), w.point(), w.point()}}}
	n := w.IntN(9)
	deflections := DeflectionChartSpec{Title: "t", Desc: "d", Series: []DeflectionSeries{{"a", w.times(n), w.list(n), w.list(n), w.number()}, {"b", w.times(n), w.list(n), w.list(n), 0}}}
	loads := LoadsChartSpec{
		Title: "t", Desc: "d", Time: w.times(n), Legs: []LegSpan{{"l", 0, math.Abs(w.number())}, {"m", w.number(), math.Abs(w.number())}},
		GravityFeet: w.list(n), Weight: w.list(n), Friction: w.list(n), HeadCross: w.list(n),
	}
	near := TogetherTrack{Name: "n", Words: "lands", Track: side.Track, Landing: side.Landing, Rest: side.Rest, Body: side.Body}
	far := TogetherTrack{Name: "f", Track: w.track(), Landing: w.place(), Rest: w.place()}
	several := TogetherViewSpec{Title: "t", Desc: "d", Spin: side.Spin, Deck: side.Deck, Outlines: side.Outlines, Tracks: []TogetherTrack{near, far}}
	both := BothViewsSpec{Title: "t", Desc: "d", Side: side, Inertial: inertial}
	return []func() (*Figure, error){
		func() (*Figure, error) { return TogetherView(several) }, func() (*Figure, error) { return BothViews(both) },
		func() (*Figure, error) { return SideView(side) }, func() (*Figure, error) { return InertialView(inertial) },
		func() (*Figure, error) { return DeckPlan(deck) }, func() (*Figure, error) { return DeflectionChart(deflections) },
		func() (*Figure, error) { return LoadsChart(loads) }, func() (*Figure, error) { return PathView(crew) },
		func() (*Figure, error) { return ScatterPlan(scattered) },
	}
}
