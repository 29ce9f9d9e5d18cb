package measure

import (
	"math"
	"math/rand/v2"
	"testing"
)

// windings counts how often outlines go round a place.
func windings(pieces [][][2]float64, x, y float64) int {
	n := 0
	for _, loop := range pieces {
		for i := range loop {
			a, b := loop[i], loop[(i+1)%len(loop)]
			if (a[1] > y) == (b[1] > y) {
				continue
			}
			if x < a[0]+(y-a[1])/(b[1]-a[1])*(b[0]-a[0]) {
				if b[1] > a[1] {
					n++
				} else {
					n--
				}
			}
		}
	}
	return n
}

// holding is the share of places that lie in the outlines.
func holding(t *testing.T, pieces [][][2]float64, x, y []float64) float64 {
	t.Helper()
	in := 0
	for i := range x {
		switch n := windings(pieces, x[i], y[i]); n {
		case 1:
			in++
		case 0:
		default:
			t.Fatalf("the outlines go %d times round (%g, %g)", n, x[i], y[i])
		}
	}
	return float64(in) / float64(len(x))
}

// lump is how much of the landings of a bin may lie on either side of the
// outline drawn through it by straight lines.
const lump = 0.003

// TestContourHoldsItsShare: of the landings that it is made of the outline
// holds 95 %, of others nearly so, and its area is near the least that can be.
func TestContourHoldsItsShare(t *testing.T) {
	const n = 20_000
	for seed := range uint64(3) {
		x, y := normals(seed, n, 0.6, 0.15, 0.5+float64(seed))
		c := DensityContour(x, y, 0.95)
		if math.Abs(c.Inside-0.95) > 1./n+1e-12 {
			t.Errorf("seed %d: Inside is %g", seed, c.Inside)
		}
		if got := holding(t, c.Pieces, x, y); math.Abs(got-0.95) > lump {
			t.Errorf("seed %d: the outline holds %g", seed, got)
		}
		// Others are held less by the noise of the outline, which is of the
		// order of that of the density at the level: some of its landings in a
		// kernel of half the deviation wide.
		x, y = normals(seed+100, n, 0.6, 0.15, 0.5+float64(seed))
		if got := holding(t, c.Pieces, x, y); math.Abs(got-0.95) > 0.01 {
			t.Errorf("seed %d: the outline holds %g of other draws", seed, got)
		}
		// The least area that holds 95 % is that of the ellipse of the quantile.
		// Smoothing widens the variances by h^2/6, and they by 2.43^2 n^(-1/3)/6
		// of themselves: 4 % here.
		least := math.Pi * chiSquare95 * 0.6 * 0.15
		if c.Area < 0.97*least || c.Area > 1.08*least {
			t.Errorf("seed %d: area %g, the least is %g", seed, c.Area, least)
		}
	}
}

// TestContourOfTwoHeaps: two heaps far apart give two outlines and no area
// between them, where an ellipse has its centre.
func TestContourOfTwoHeaps(t *testing.T) {
	const seed, n = 4, 10_000
	x, y := normals(seed, n, 0.2, 0.2, 0)
	for i := range n / 2 {
		x[i] += 6
	}
	c := DensityContour(x, y, 0.95)
	if windings(c.Pieces, 3, -1) != 1 || windings(c.Pieces, 9, -1) != 1 || windings(c.Pieces, 6, -1) != 0 {
		t.Errorf("seed %d: %d pieces; the heaps and the middle are held %d, %d and %d times", seed, len(c.Pieces),
			windings(c.Pieces, 3, -1), windings(c.Pieces, 9, -1), windings(c.Pieces, 6, -1))
	}
	if got := holding(t, c.Pieces, x, y); math.Abs(got-0.95) > lump {
		t.Errorf("seed %d: the outlines hold %g", seed, got)
	}
	if e := LandingEllipse(x, y); e.Spinward < 5 || e.Spinward > 7 {
		t.Errorf("the ellipse has its centre at %g", e.Spinward)
	}
}

// TestContourOfRing: the landings lie round a hole, which the outline leaves
// out and the area too.
func TestContourOfRing(t *testing.T) {
	const seed, n = 6, 20_000
	r := rand.New(rand.NewPCG(seed, 1))
	var x, y []float64
	for range n {
		sin, cos := math.Sincos(2 * math.Pi * r.Float64())
		d := 2 + 0.1*r.NormFloat64()
		x, y = append(x, d*cos), append(y, d*sin)
	}
	c := DensityContour(x, y, 0.95)
	if windings(c.Pieces, 0, 0) != 0 || windings(c.Pieces, 2, 0) != 1 {
		t.Errorf("seed %d: the hole is held %d times, the ring %d times", seed, windings(c.Pieces, 0, 0), windings(c.Pieces, 2, 0))
	}
	if whole := math.Pi * 4; c.Area > whole {
		t.Errorf("seed %d: area %g, more than the disc's %g", seed, c.Area, whole)
	}
}

// TestContourOfLine: landings on a line, as of a release of which the height
// alone varies, have a stretch of it.
func TestContourOfLine(t *testing.T) {
	var x, y []float64
	for i := range 1000 {
		u := float64(i) / 999
		x, y = append(x, u*u), append(y, 3+2*u*u)
	}
	c := DensityContour(x, y, 0.95)
	if !c.Line || c.Area != 0 || len(c.Pieces) != 1 || len(c.Pieces[0]) != 2 || math.Abs(c.Inside-0.95) > 1e-9 {
		t.Fatalf("%+v", c)
	}
	// They lie densest near 0: the shortest stretch begins there.
	ends := c.Pieces[0]
	if ends[0][0] > ends[1][0] {
		ends[0], ends[1] = ends[1], ends[0]
	}
	to := math.Pow(949./999, 2)
	if math.Hypot(ends[0][0], ends[0][1]-3) > 1e-9 || math.Hypot(ends[1][0]-to, ends[1][1]-3-2*to) > 1e-9 {
		t.Errorf("from %v to %v, want (0, 3) to (%g, %g)", ends[0], ends[1], to, 3+2*to)
	}
}

func TestContourOfFewOrOne(t *testing.T) {
	x, y := normals(1, leastForContour-1, 1, 1, 0)
	if DensityContour(x, y, 0.95) != nil {
		t.Error("few landings have a contour")
	}
	same := make([]float64, 100)
	if DensityContour(same, same, 0.95) != nil {
		t.Error("one place has a contour")
	}
}

// TestContourWithOutliers: a few landings far off change neither the grid's
// fineness nor the outline much.
func TestContourWithOutliers(t *testing.T) {
	const seed, n = 8, 10_000
	x, y := normals(seed, n, 0.3, 0.3, 0)
	c := DensityContour(x, y, 0.95)
	for i := range 5 {
		x[i], y[i] = 1e6*float64(i+1), -1e7
	}
	far := DensityContour(x, y, 0.95)
	if far == nil || math.Abs(far.Area-c.Area) > 0.1*c.Area {
		t.Errorf("seed %d: area %g without, %g with outliers", seed, c.Area, far.Area)
	}
}

// TestLevelOfSaddle tries the cells whose corners across are high: outlines
// part or join by the middle.
func TestLevelOfSaddle(t *testing.T) {
	g := &grid{n: [2]int{4, 4}, step: [2]float64{1, 1}, f: make([]float64, 16)}
	for _, c := range []struct {
		high  float64
		loops int
	}{{1.4, 2}, {3, 1}} { // the middle is at half of high
		clear(g.f)
		g.f[1*4+1], g.f[2*4+2] = c.high, c.high
		loops := g.level(1)
		if len(loops) != c.loops {
			t.Errorf("corners of %g: %d outlines, want %d", c.high, len(loops), c.loops)
		}
		for _, loop := range loops {
			if shoelace(loop) <= 0 {
				t.Errorf("corners of %g: the high ground is on the right", c.high)
			}
		}
	}
}

func BenchmarkContour(b *testing.B) {
	x, y := normals(1, 10_000, 0.6, 0.15, 0.5)
	for b.Loop() {
		DensityContour(x, y, 0.95)
	}
}
