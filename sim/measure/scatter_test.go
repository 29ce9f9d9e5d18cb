package measure

import (
	"maps"
	"math"
	"math/rand/v2"
	"slices"
	"strings"
	"testing"

	"offplumb/sim/flight"
	"offplumb/sim/model"
	"offplumb/sim/table"
)

// normals gives n draws of a normal distribution of two dimensions: deviations
// a and b along axes turned by an angle.
func normals(seed uint64, n int, a, b, angle float64) (x, y []float64) {
	r := rand.New(rand.NewPCG(seed, 1))
	sin, cos := math.Sincos(angle)
	for range n {
		u, v := a*r.NormFloat64(), b*r.NormFloat64()
		x, y = append(x, 3+u*cos-v*sin), append(y, -1+u*sin+v*cos)
	}
	return x, y
}

// sixDeviations of a share p among n draws: what a right program exceeds in
// two of a thousand million cases.
func sixDeviations(p float64, n int) float64 { return 6 * math.Sqrt(p*(1-p)/float64(n)) }

// chiSquare95 is the quantile of chi-square of two degrees of freedom for 95 %
// as the tables have it (NIST/SEMATECH e-Handbook of Statistical Methods,
// section 1.3.6.7.4; from memory), to half a unit of its last digit.
const (
	chiSquare95 = 5.991
	chiSlack    = 0.0005
)

// TestEllipseAxes: the semi-axes over the deviations are the root of the
// tabulated quantile, and the axes lie as they were turned.
func TestEllipseAxes(t *testing.T) {
	// Four places with the variances 8/3 and 2/3, exactly.
	x, y := []float64{2, -2, 0, 0}, []float64{0, 0, 1, -1}
	for _, angle := range []float64{0, 0.4, -1.2, math.Pi / 2} {
		sin, cos := math.Sincos(angle)
		var tx, ty []float64
		for i := range x {
			tx, ty = append(tx, 5+x[i]*cos-y[i]*sin), append(ty, 7+x[i]*sin+y[i]*cos)
		}
		e := LandingEllipse(tx, ty)
		if got := e.Major * e.Major / (8. / 3); math.Abs(got-chiSquare95) > chiSlack {
			t.Errorf("turned by %g: the square of the major semi-axis is %g variances, want %g", angle, got, chiSquare95)
		}
		if got := e.Minor * e.Minor / (2. / 3); math.Abs(got-chiSquare95) > chiSlack {
			t.Errorf("turned by %g: the square of the minor semi-axis is %g variances, want %g", angle, got, chiSquare95)
		}
		if d := math.Remainder(e.Angle-angle, math.Pi); math.Abs(d) > 1e-12 || math.Hypot(e.Spinward-5, e.Axial-7) > 1e-12 {
			t.Errorf("turned by %g: angle %g, centre (%g, %g)", angle, e.Angle, e.Spinward, e.Axial)
		}
	}
}

// TestEllipseHoldsItsShare counts draws in the ellipse.
func TestEllipseHoldsItsShare(t *testing.T) {
	const n = 40_000
	for seed := range uint64(4) {
		x, y := normals(seed, n, 0.5, 0.1, 0.7*float64(seed))
		e := LandingEllipse(x, y)
		if math.Abs(e.Inside-0.95) > sixDeviations(0.95, n) {
			t.Errorf("seed %d: holds %g of its draws", seed, e.Inside)
		}
	}
}

// TestEllipseOfLine: of landings on a line the ellipse is a stretch of it, and
// holds what lies in that.
func TestEllipseOfLine(t *testing.T) {
	var x, y []float64
	for i := range 101 {
		x, y = append(x, 0.01*float64(i)), append(y, 2)
	}
	e := LandingEllipse(x, y)
	if e.Minor > 1e-9*e.Major || math.Abs(e.Angle) > 1e-9 || e.Inside != 1 {
		t.Errorf("%+v", *e)
	}
	if LandingEllipse(x[:2], y[:2]) != nil {
		t.Error("two landings have an ellipse")
	}
	same := []float64{1, 1, 1, 1}
	if e := LandingEllipse(same, same); e.Major != 0 || e.Minor != 0 || e.Inside != 1 {
		t.Errorf("of one place: %+v", *e)
	}
}

// TestWilson holds the interval against its definition: at its ends the share
// found is z deviations off, by the binomial distribution of that end.
func TestWilson(t *testing.T) {
	const z = 1.959963984540054 // 97.5 % of the normal distribution
	for _, c := range []struct{ k, n int }{{0, 10}, {1, 10}, {5, 10}, {10, 10}, {37, 2000}, {1, 1}, {1999, 2000}} {
		s := shareOf("x", c.k, c.n)
		p := float64(c.k) / float64(c.n)
		for _, end := range []float64{s.Low, s.High} {
			if end == p {
				continue // of none or all one end is the share itself
			}
			if got := math.Abs(p-end) / math.Sqrt(end*(1-end)/float64(c.n)); math.Abs(got-z) > 1e-9 {
				t.Errorf("%d of %d: the end %g is %g deviations from the share", c.k, c.n, end, got)
			}
		}
		if s.Low > p || s.High < p || s.Low < 0 || s.High > 1 || s.Low == s.High {
			t.Errorf("%d of %d: %g to %g", c.k, c.n, s.Low, s.High)
		}
	}
	if s := shareOf("x", 0, 0); !math.IsNaN(s.Share) || !math.IsNaN(s.Low) || !math.IsNaN(s.High) {
		t.Errorf("none of none: %+v", s)
	}
}

func TestQuantileOfValues(t *testing.T) {
	for _, c := range []struct {
		values []float64
		p      float64
		want   float64
	}{
		{[]float64{7}, 0.05, 7}, {[]float64{1, 2}, 0.5, 1.5}, {[]float64{1, 2, 3, 4, 5}, 0.25, 2},
		{[]float64{1, 2, 3, 4}, 0.95, 3.85}, {[]float64{1, 2, 3}, 1, 3}, {[]float64{1, 2, 3}, 0, 1},
	} {
		if got := quantile(c.values, c.p); math.Abs(got-c.want) > 1e-12 {
			t.Errorf("quantile %g of %v is %g, want %g", c.p, c.values, got, c.want)
		}
	}
	if !math.IsNaN(quantile(nil, 0.5)) {
		t.Error("no values have a quantile")
	}
}

// hatchCloud is a cloud of six samples over a deck with an opening.
func hatchCloud(t *testing.T) (*model.Model, *Cloud) {
	t.Helper()
	m, problems := model.New(model.Model{
		Habitat: model.Habitat{Room: model.Room{FloorRadius: 20, Length: 10}, Spin: 0.5},
		Decks: []model.Deck{{Name: "upper", Radius: 17, Thickness: 0.05, Whole: true, Friction: model.None, Restitution: model.None,
			Openings: []model.Opening{{Name: "hatch", Size: [2]float64{1, 1}}, {Name: "shut", Axial: 3, Size: [2]float64{1, 1}, Closed: true}}}},
	})
	if problems != nil {
		t.Fatal(problems)
	}
	c := NewCloud(&model.Scatter{Name: "s", Samples: 6, Vary: []model.Spread{{Key: "at.height"}, {Key: "throw.heading"}}}, model.Place{Deck: 1})
	c.Draw = func(i int, into []float64) { into[0], into[1] = 1+float64(i), math.Pi*float64(i) }
	land := func(surface string, through ...string) *Landing {
		return &Landing{Outcome: flight.Landed, Surface: surface, Offset: -0.5, Time: 1, Speed: 2, Energy: 3, AllThrough: through}
	}
	c.Set(4, land("upper"), 1, 0)
	c.Set(0, land("floor", "hatch"), 2, 0)
	c.Set(1, land("upper"), 3, 0)
	c.Set(2, &Landing{Outcome: flight.Lost, Offset: math.NaN(), Energy: math.NaN()}, math.NaN(), math.NaN())
	c.LeaveOut(3, ShotImpossible, "body.mass not more than 0")
	c.LeaveOut(5, ShotImpossible, "body.mass not more than 0")
	return m, c
}

func TestScatterCounts(t *testing.T) {
	s := Scatter(hatchCloud(t))
	if s.Samples != 6 || s.Flown != 4 || s.Landed != 3 {
		t.Errorf("%d samples, %d flown, %d landed", s.Samples, s.Flown, s.Landed)
	}
	wantShares(t, "left out", s.LeftOut, Share{Name: "body.mass not more than 0", Count: 2, Share: 2. / 6})
	wantShares(t, "outcomes", s.Outcomes, Share{Name: "lost", Count: 1, Share: 0.25})
	wantShares(t, "surfaces", s.Surfaces, Share{Name: "floor", Count: 1, Share: 0.25}, Share{Name: "upper", Count: 2, Share: 0.5})
	wantShares(t, "openings", s.Openings, Share{Name: "hatch", Count: 1, Share: 0.25})
	x := s.Spread("plan_spinward")
	if x.Count != 3 || x.Mean != 2 || x.Std != 1 || x.Min != 1 || x.Max != 3 || s.Median[0] != 2 {
		t.Errorf("%+v, median %v", *x, s.Median)
	}
}

func wantShares(t *testing.T, what string, got []Share, want ...Share) {
	t.Helper()
	if len(got) != len(want) {
		t.Errorf("%s: %+v", what, got)
		return
	}
	for i := range want {
		if g := got[i]; g.Name != want[i].Name || g.Count != want[i].Count || g.Share != want[i].Share {
			t.Errorf("%s: %+v, want %+v", what, g, want[i])
		}
	}
}

// TestCloudTable: the columns of the contract, and a row for each sample, those
// left out without figures.
func TestCloudTable(t *testing.T) {
	_, c := hatchCloud(t)
	var b strings.Builder
	if err := table.StreamCSV(&b, CloudColumns(c.Scatter), c.Rows()); err != nil {
		t.Fatal(err)
	}
	lines := strings.Split(b.String(), "\r\n")
	for i, want := range []string{
		"sample,at.height_m,throw.heading_deg,offset_m,offset_axial_m,deflection_m,time_s,speed_m_s,energy_J,surface,through,outcome,plan_spinward_m,plan_axial_m",
		"1,1,0,-0.5,0,0,1,2,3,floor,hatch,landed,2,0",
		"2,2,180,-0.5,0,0,1,2,3,upper,,landed,3,0",
		"3,3,360,,0,0,0,0,,,,lost,,",
		"4,4,540,,,,,,,,,impossible,,",
	} {
		if lines[i] != want {
			t.Errorf("line %d is\n%s\nwant\n%s", i+1, lines[i], want)
		}
	}
	if len(lines) != 8 { // header, six samples, and nothing behind the last line end
		t.Errorf("%d lines", len(lines))
	}
}

// TestNothingLanded: a scatter of which nothing landed has no figures, and no
// NaN where a count is.
func TestNothingLanded(t *testing.T) {
	m, c := hatchCloud(t)
	for i := range c.Fates {
		c.LeaveOut(i, ShotImpossible, "x")
	}
	s := Scatter(m, c)
	if s.Flown != 0 || s.Ellipse != nil || s.Contour != nil || len(s.Covariance) != 0 || !math.IsNaN(s.Spreads[0].Mean) {
		t.Errorf("%+v", s)
	}
	for _, row := range ScatterTable(s).Rows {
		for _, cell := range row {
			if math.IsInf(cell.Num, 0) {
				t.Errorf("row %v", row)
			}
		}
	}
}

// TestCloudColumnsDiffer: whatever is varied, no two columns have one name.
func TestCloudColumnsDiffer(t *testing.T) {
	var vary []model.Spread
	for _, key := range slices.Sorted(maps.Keys(spreadUnits)) {
		vary = append(vary, model.Spread{Key: key})
	}
	seen := map[string]bool{}
	for _, c := range CloudColumns(&model.Scatter{Vary: vary}) {
		if seen[c.Name] {
			t.Errorf("two columns are named %s", c.Name)
		}
		seen[c.Name] = true
	}
}
