package plots

import (
	"math"
	"math/rand/v2"
	"strings"
	"testing"

	"gonum.org/v1/plot/vg"
)

func TestNumbersAsRead(t *testing.T) {
	for _, c := range []struct{ got, want string }{
		{length(0.6339), "0.634 m"}, {length(0.0008981), "0.898 mm"}, {length(2.3e6), "2300 km"}, {length(-3e-6), "\u22123.00 µm"},
		{length(0), "0 m"}, {roundLength(0.5), "0.5 m"}, {roundLength(200), "200 m"},
		{signedLength(-0.6339), "0.634 m antispinward"}, {signedLength(2), "2.00 m spinward"}, {signedLength(0), "0 m"},
		{degrees(math.Pi / 2), "90.0°"}, {degrees(3 * math.Pi), "540° (1.50 turns)"},
		{rpm(-math.Pi / 30), "1.00 rpm"}, {decimals(-0.0001, 2), "0.00"}, {signif(1e9, 3), "1.00e9"},
		{tickText(0.30000000000000004, 0.1), "0.3"}, {tickText(-20, 10), "\u221220"}, {tickText(2e6, 1e6), "2e6"},
	} {
		if c.got != c.want {
			t.Errorf("got %q, want %q", c.got, c.want)
		}
	}
}

// TestTicksAreRoundAndFew: multiples of 1, 2 or 5 times a power of ten, within the range.
func TestTicksAreRoundAndFew(t *testing.T) {
	const seed = 3
	r := rand.New(rand.NewPCG(seed, 1))
	for range 500 {
		lo := r.NormFloat64() * math.Pow(10, r.Float64()*12-6)
		span := math.Pow(10, r.Float64()*6-3) * (math.Abs(lo) + 1e-6)
		n := 1 + r.IntN(12)
		ticks, step := Ticks(lo, lo+span, n)
		lead := step / math.Pow(10, math.Floor(math.Log10(step)+1e-9))
		if math.Abs(lead-1) > 1e-6 && math.Abs(lead-2) > 1e-6 && math.Abs(lead-5) > 1e-6 {
			t.Fatalf("seed %d: step %g", seed, step)
		}
		if len(ticks) > n+1 {
			t.Errorf("seed %d: %d ticks in %d intervals", seed, len(ticks), n)
		}
		for _, v := range ticks {
			if v < lo-1e-6*step || v > lo+span+1e-6*step {
				t.Errorf("seed %d: tick %g outside of %g to %g", seed, v, lo, lo+span)
			}
		}
	}
	for _, bad := range [][2]float64{{0, 0}, {1, 0}, {math.NaN(), 1}, {0, math.Inf(1)}} {
		if ticks, _ := Ticks(bad[0], bad[1], 5); ticks != nil {
			t.Errorf("ticks for %v", bad)
		}
	}
}

// TestThinKeepsItsLaw: ends and order stay, and no point is farther than the tolerance.
func TestThinKeepsItsLaw(t *testing.T) {
	const seed, tolerance = 5, 0.3
	r := rand.New(rand.NewPCG(seed, 1))
	pts := []Point{{}}
	for range 400 {
		pts = append(pts, pts[len(pts)-1].add(Point{r.NormFloat64() * 0.2, r.NormFloat64() * 0.2}))
	}
	kept := Thin(pts, tolerance)
	if len(kept) >= len(pts)/2 || kept[0] != pts[0] || kept[len(kept)-1] != pts[len(pts)-1] {
		t.Fatalf("seed %d: %d of %d points kept", seed, len(kept), len(pts))
	}
	k := 0
	for _, p := range pts {
		if k+1 < len(kept) && p == kept[k+1] {
			k++
		}
		a, b := kept[k], kept[min(k+1, len(kept)-1)]
		if d := segmentDistance(p.X, p.Y, a.X, a.Y, b.X, b.Y); d > tolerance {
			t.Errorf("seed %d: a point lies %g from the line", seed, d)
		}
	}
}

// TestViewIsTrueToScale: the page distance of any two points is the scale times theirs.
func TestViewIsTrueToScale(t *testing.T) {
	const seed = 7
	r := rand.New(rand.NewPCG(seed, 1))
	for _, down := range []bool{false, true} {
		v := look(vg.Rectangle{Min: xy(10, 20), Max: xy(300, 250)}, 37, Point{2, 3}, xy(100, 100), down)
		for range 50 {
			p, q := Point{r.NormFloat64(), r.NormFloat64()}, Point{r.NormFloat64(), r.NormFloat64()}
			d := v.pt(p).Sub(v.pt(q))
			if got := math.Hypot(d.X.Points(), d.Y.Points()); math.Abs(got-37*p.dist(q)) > 1e-9 {
				t.Errorf("seed %d, down %v: %g pt for %g m", seed, down, got, p.dist(q))
			}
		}
		a := v.shown()
		if got := a.size(); math.Abs(got.X-290/37.0) > 1e-9 || math.Abs(got.Y-230/37.0) > 1e-9 {
			t.Errorf("down %v: shows %v", down, got)
		}
	}
}

// TestArcsAreCutAtTheWindow compares the parts of an arc with a walk along it.
func TestArcsAreCutAtTheWindow(t *testing.T) {
	const seed = 11
	r := rand.New(rand.NewPCG(seed, 1))
	win := vg.Rectangle{Min: xy(0, 0), Max: xy(100, 80)}
	for range 300 {
		a := pageArc{c: xy(100*r.Float64(), 100*r.Float64()), r: vg.Length(5 + 100*r.Float64()), start: 6 * r.NormFloat64()}
		a.end = a.start + 2*math.Pi*(2*r.Float64()-1)
		parts := a.inside(win)
		const steps = 400
		near := 0 // samples next to an edge may fall on either side
		for i := range steps {
			u := (float64(i) + 0.5) / steps
			angle, in := a.start+u*(a.end-a.start), false
			for _, p := range parts {
				in = in || (angle-p.start)*(angle-p.end) <= 0
			}
			if in != within(win, a.at(u)) {
				near++
			}
		}
		if near > 0 {
			t.Errorf("seed %d: arc %+v is cut wrongly at %d of %d places", seed, a, near, steps)
		}
	}
}

func TestDeckPlaceAndFootAreInverse(t *testing.T) {
	for _, radius := range []float64{0, 3, 18, 2.3e6} {
		d := deckLine{radius: radius}
		for _, s := range []float64{-4, -0.001, 0, 1e-9, 2.5, 9} {
			if got := d.foot(d.place(s)); math.Abs(got-s) > 1e-9 {
				t.Errorf("radius %g: foot of the place at %g is %g", radius, s, got)
			}
		}
	}
}

func TestTrackPlacesAndTimes(t *testing.T) {
	tr, err := newTrack([]TrackPoint{{0, 0, 2, ""}, {1, 1, 1, ""}, {2, 2, 0, "slide"}, {4, 4, 0, "rest"}, {9, 4, 0, "rest"}})
	if err != nil {
		t.Fatal(err)
	}
	if got := tr.place(0.5); got != (Point{0.5, 1.5}) {
		t.Errorf("place at 0.5 s is %v", got)
	}
	if got := tr.when(Point{3, 0}); math.Abs(got-3) > 1e-12 {
		t.Errorf("at (3, 0) after %g s", got)
	}
	if got := tr.moves(); got != 4 {
		t.Errorf("rests after %g s", got)
	}
	if runs := tr.runs(); len(runs) != 3 || runs[1].ph[0] != Slide || len(runs[1].at) != 2 {
		t.Errorf("runs: %+v", runs)
	}
	if cut := tr.upTo(0.5); cut.last() != (Point{0.5, 1.5}) || len(tr.at) != 5 {
		t.Errorf("cut at 0.5 s ends at %v", cut.last())
	}
	times, step := tr.marks(0)
	if step != 0.5 || len(times) != 8 || times[7] != 4 {
		t.Errorf("marks %v, step %g: none is wanted at rest", times, step)
	}
	if times, _ := tr.marks(2); len(times) != 2 {
		t.Errorf("marks each 2 s: %v", times)
	}
	if times, _ := tr.marks(1e-9); len(times) > maxMarks {
		t.Errorf("%d marks", len(times))
	}
}

// TestAutomaticMarksAreFourToTwelve for any duration.
func TestAutomaticMarksAreFourToTwelve(t *testing.T) {
	for end := 1e-3; end < 1e5; end *= 1.07 {
		tr := track{t: []float64{0, end}, at: []Point{{}, {1, 0}}, ph: []Phase{Flight, Flight}}
		if times, _ := tr.marks(0); len(times) < 4 || len(times) > 12 {
			t.Errorf("%d marks in %g s", len(times), end)
		}
	}
}

// TestPlacerKeepsItsLaw: no two boxes overlap, all lie within bounds, and what must be
// shown is.
func TestPlacerKeepsItsLaw(t *testing.T) {
	const seed = 13
	r := rand.New(rand.NewPCG(seed, 1))
	for round := range 20 {
		pl := placer{bounds: vg.Rectangle{Max: xy(400, 300)}}
		pl.text(vg.Rectangle{Min: xy(100, 100), Max: xy(200, 112)})
		pl.polyline(priceStrong, xy(0, 0), xy(400, 300))
		for i := range 25 {
			at := xy(150+100*r.Float64(), 100+100*r.Float64())
			pl.mark(at, 3)
			pl.add(label{s: strings.Repeat("x", 1+r.IntN(14)), size: sizeNote, at: at, clear: 3, need: i%2 == 0})
		}
		if lost := pl.solve(); len(lost) > 0 {
			t.Errorf("seed %d, round %d: lost %q", seed, round, lost)
		}
		boxes := append([]vg.Rectangle(nil), pl.fixed...)
		for _, l := range pl.labels {
			if !l.ok {
				continue
			}
			if !within(pl.bounds, l.box.Min) || !within(pl.bounds, l.box.Max) {
				t.Errorf("seed %d, round %d: %q is out of bounds", seed, round, l.s)
			}
			for _, b := range boxes {
				if overlap(b, l.box) {
					t.Errorf("seed %d, round %d: %q lies on another", seed, round, l.s)
				}
			}
			boxes = append(boxes, l.box)
		}
	}
}

// TestCrossesAgreesWithAWalk along the segment; those that graze a corner are left out.
func TestCrossesAgreesWithAWalk(t *testing.T) {
	const seed, steps = 17, 2000
	r := rand.New(rand.NewPCG(seed, 1))
	box := vg.Rectangle{Min: xy(3, 4), Max: xy(7, 6)}
	for range 500 {
		a, b := xy(10*r.Float64(), 10*r.Float64()), xy(10*r.Float64(), 10*r.Float64())
		inside := 0
		for i := range steps + 1 {
			if within(box, a.Add(b.Sub(a).Scale(vg.Length(i)/steps))) {
				inside++
			}
		}
		if got := crosses(box, a, b); got != (inside > 0) && inside != 0 || got && !crosses(grow(box, 0.01), a, b) {
			t.Errorf("seed %d: %v to %v: %v, %d samples inside", seed, a, b, got, inside)
		}
		if inside == 0 && crosses(grow(box, -0.05), a, b) {
			t.Errorf("seed %d: %v to %v does not come near", seed, a, b)
		}
	}
}

func TestTextIsCutToItsWidth(t *testing.T) {
	const words = "a line of words that goes on and on, without an end in sight"
	for _, w := range []float64{30, 80, 200} {
		lines := wrap(words, w, sizeNote, false, 2)
		if len(lines) > 2 {
			t.Errorf("%d lines", len(lines))
		}
		for _, l := range lines {
			if got := textWidth(l, sizeNote, false); got > w {
				t.Errorf("%q is %g pt wide, not %g", l, got, w)
			}
		}
	}
	if got := clean("a\x00b\n c\xff"); got != "a b c" {
		t.Errorf("clean gives %q", got)
	}
	if got := toCodePage("\u22125 µm ² € \u4e2d"); got != "\x965 \xb5m \xb2 \x80 ?" {
		t.Errorf("code page: %q", got)
	}
}
