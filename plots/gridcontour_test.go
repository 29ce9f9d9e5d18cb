package plots

import (
	"math"
	"math/rand/v2"
	"testing"
)

// wavy is a grid of uneven steps with the values of f.
func wavy(f func(x, y float64) float64) *gridField {
	g := &gridField{x: []float64{-1, -0.4, 0, 0.3, 1, 1.7}, y: []float64{0, 0.5, 0.8, 2}}
	for _, y := range g.y {
		for _, x := range g.x {
			g.v = append(g.v, f(x, y))
		}
	}
	return g
}

func loopArea(loop []Point) (sum float64) {
	for k, p := range loop {
		q := loop[(k+1)%len(loop)]
		sum += (p.X*q.Y - q.X*p.Y) / 2
	}
	return sum
}

// TestContoursOfPlane: of a quantity that is linear the contour line is straight,
// in one piece from edge to edge, and what is above it has the area that it has.
func TestContoursOfPlane(t *testing.T) {
	g := wavy(func(x, y float64) float64 { return 2*x + y }) // 2x + y = 1: from (0.5, 0) to (-0.5, 2)
	lines := g.lines(1)
	if len(lines) != 1 {
		t.Fatalf("%d lines", len(lines))
	}
	for _, p := range lines[0] {
		if math.Abs(2*p.X+p.Y-1) > 1e-12 {
			t.Errorf("%v is not on the line", p)
		}
	}
	a, b := lines[0][0], lines[0][len(lines[0])-1]
	if a.Y > b.Y {
		a, b = b, a
	}
	if a.sub(Point{0.5, 0}).norm() > 1e-12 || b.sub(Point{-0.5, 2}).norm() > 1e-12 {
		t.Errorf("it runs from %v to %v", a, b)
	}
	sum := 0.0
	for _, part := range g.above(1) {
		if loopArea(part) < -1e-12 { // rounding
			t.Errorf("a part runs the other way round: %v", part)
		}
		sum += loopArea(part)
	}
	if want := 2 * (1.2 + 2.2) / 2; math.Abs(sum-want) > 1e-12 {
		t.Errorf("area %g, want %g", sum, want)
	}
}

// TestContoursClose: round a top the line closes; cells about a place without a
// value are left out.
func TestContoursClose(t *testing.T) {
	g := wavy(func(x, y float64) float64 { return -math.Hypot(x-0.1, y-0.7) })
	lines := g.lines(-0.6)
	if len(lines) != 1 || lines[0][0] != lines[0][len(lines[0])-1] {
		t.Errorf("not one closed line: %v", lines)
	}
	g.v[1*len(g.x)+2] = math.NaN()
	for _, part := range append(g.above(math.Inf(-1)), g.lines(-0.6)...) {
		for _, p := range part {
			if p.X > -0.4 && p.X < 0.3 && p.Y < 0.8 {
				t.Errorf("%v lies beside the place without a value", p)
			}
		}
	}
}

// TestContoursOfNoise: whatever the values, every piece of a line is in one of the
// lines, and a higher level has no more area above it.
func TestContoursOfNoise(t *testing.T) {
	const seed = 5
	rng := rand.New(rand.NewPCG(seed, 1))
	for range 200 {
		g := wavy(func(float64, float64) float64 { return rng.Float64() })
		before := math.Inf(1)
		for _, level := range []float64{0, 0.3, 0.5, 0.9} {
			pieces, area := 0, 0.0
			for _, line := range g.lines(level) {
				pieces += len(line) - 1
			}
			if n := len(g.cuts(level)); n != pieces {
				t.Fatalf("seed %d: %d pieces of %d in lines", seed, pieces, n)
			}
			for _, part := range g.above(level) {
				area += loopArea(part)
			}
			if area > before+1e-12 {
				t.Fatalf("seed %d: more area above a higher level", seed)
			}
			before = area
		}
	}
}

// contourSpec is a chart of a wave over a grid, with a place without a value.
func contourSpec() ContourChartSpec {
	s := ContourChartSpec{Title: "drops: landings.speed of drop over height and spin", Desc: "A map of the speed.", Notes: "Shades and lines: linear between the points of the sweep.",
		Spins: "The spin varies, \u22126 to 6 rpm.", AxisX: "release.drop.at.height, m", AxisY: "habitat.spin, rpm", Of: "landings.speed of drop, m/s", Unit: "m/s"}
	for i := range 12 {
		s.X = append(s.X, 0.2+0.3*float64(i))
	}
	for k := range 13 {
		s.Y = append(s.Y, -6+float64(k))
	}
	for _, y := range s.Y {
		for _, x := range s.X {
			s.Values = append(s.Values, math.Abs(y)*math.Sqrt(x))
		}
	}
	s.Values[40] = math.NaN()
	return s
}

func contourSamples() []sampleFigure {
	of := func(name string, change func(*ContourChartSpec)) sampleFigure {
		s := contourSpec()
		change(&s)
		return sampleFigure{"contours " + name, func() (*Figure, error) { return ContourChart(s) }}
	}
	return []sampleFigure{
		of("of speed", func(*ContourChartSpec) {}),
		of("of least grid", func(s *ContourChartSpec) {
			s.X, s.Y, s.Values = []float64{0, 1}, []float64{-1, 1}, []float64{-3, 1, 2, -4e6}
		}),
		of("without unit", func(s *ContourChartSpec) { s.Unit, s.Of, s.Spins, s.Spin = "", "habitat.coriolis_ratio", "", -0.5 }),
	}
}

func TestContourChartRefuses(t *testing.T) {
	for name, spoil := range map[string]func(*ContourChartSpec){
		"no title":      func(s *ContourChartSpec) { s.Title = "" },
		"a line":        func(s *ContourChartSpec) { s.X = s.X[:1] },
		"runs back":     func(s *ContourChartSpec) { s.Y[3] = -9 },
		"a value short": func(s *ContourChartSpec) { s.Values = s.Values[1:] },
		"the same throughout": func(s *ContourChartSpec) {
			for i := range s.Values {
				s.Values[i] = 4
			}
		},
		"no value": func(s *ContourChartSpec) {
			for i := range s.Values {
				s.Values[i] = math.NaN()
			}
		},
	} {
		s := contourSpec()
		spoil(&s)
		if _, err := ContourChart(s); err == nil {
			t.Errorf("%s: no error", name)
		}
	}
}
