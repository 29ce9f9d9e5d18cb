package flight_test

import (
	"encoding/csv"
	"fmt"
	"math"
	"os"
	"strconv"
	"testing"

	"offplumb/sim/flight"
	"offplumb/sim/measure"
)

const (
	// slideTol is what a slide may err by as a whole, as a share: some tens of
	// steps, each within the solver's relative tolerance of 1e-9.
	slideTol = 3e-8
	// creep is the speed, in m/s, at which a slide counts as over.
	creep = 1e-5
)

// Published check H24 for slides: SciPy's DOP853 on the equations of
// testdata/reference/slides.py.
func TestSlidesAgainstReference(t *testing.T) {
	f, err := os.Open("../../testdata/reference/slides.csv")
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	r := csv.NewReader(f)
	r.Comment = '#'
	rows, err := r.ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	for _, row := range rows[1:] {
		var x [10]float64
		for i := range x {
			if x[i], err = strconv.ParseFloat(row[i+1], 64); err != nil {
				t.Fatal(err)
			}
		}
		if row[0] == "spoke" {
			slideInSpoke(t, x)
		} else {
			slideOnFloor(t, x)
		}
	}
}

const slideAir = "[air]\ndensity = \"1.2041 kg/m^3\"\nviscosity = \"1.813e-5 Pa s\"\n"

func slideInSpoke(t *testing.T, x [10]float64) {
	spin, mu, beside, start, mass, d := x[0], x[1], x[2], x[3], x[4], x[5]
	r := rod{spin: spin, mu: mu, a: d / 2, r0: start, off: beside}
	text := r.toml()
	text = replaced(t, text, "[air]\nnone = true\n", slideAir)
	text = replaced(t, text, "mass = \"0.3 kg\"", fmt.Sprintf("mass = \"%.17g kg\"", mass))
	m, track := fromFile(t, text)
	s := local(m, track, x[7])
	if math.Abs(s.Pos.X-x[8]) > slideTol*x[8] || math.Abs(s.Vel.X-x[9]) > slideTol*x[9] {
		t.Errorf("spoke %v: at %.12g m with %.12g m/s", x, s.Pos.X, s.Vel.X)
	}
}

func slideOnFloor(t *testing.T, x [10]float64) {
	spin, mu, start, mass, d, floor := x[0], x[1], x[3], x[4], x[5], x[6]
	m, track := fromFile(t, fmt.Sprintf(`
format = 1
[habitat]
floor_radius = "%.17g m"
spin = "%.17g rad/s"
%s[[body]]
name = "b"
mass = "%.17g kg"
diameter = "%.17g m"
friction = %.17g
[[release]]
name = "b"
body = "b"
at = { height = "%.17g m" }
velocity = { spinward = "%.17g m/s" }
`, floor, spin, slideAir, mass, d, mu, d/2, start))
	if track.Outcome != flight.Rested {
		t.Fatalf("floor %v: %s", x, kinds(track))
	}
	way := floor * measure.GoneRound(m, track, track.End)
	// What the last of the slide would take.
	left := creep / (mu * spin * spin * (floor - d/2))
	if math.Abs(track.End+left-x[7]) > slideTol*x[7] || math.Abs(way-x[8]) > slideTol*math.Abs(x[8]) {
		t.Errorf("floor %v: stops after %.12g s and %.12g m", x, track.End, way)
	}
}

func replaced(t *testing.T, text, old, by string) string {
	t.Helper()
	for i := 0; i+len(old) <= len(text); i++ {
		if text[i:i+len(old)] == old {
			return text[:i] + by + text[i+len(old):]
		}
	}
	t.Fatalf("no %q in the scenario", old)
	return ""
}

// On a flat floor apparent gravity leans by the angle whose tangent is the
// distance from the middle by that from the axis: a body set down there stays
// while that is below the friction, and slides above it.
func TestFlatFloorHoldsToFriction(t *testing.T) {
	const r, d, mu = 14.0, 0.2, 0.2
	edge := mu * (r - d/2) // m from the middle, where tan(angle) = mu
	for _, c := range []struct {
		share float64
		stays bool
	}{{0.999, true}, {1.001, false}, {-0.999, true}, {-1.001, false}} {
		_, track := fromFile(t, fmt.Sprintf(`
format = 1
[habitat]
shape = "cabin"
floor_radius = "14 m"
spin = "5 rpm"
size = ["9 m", "4 m", "2.4 m"]
[[body]]
name = "b"
mass = "2 kg"
diameter = "0.2 m"
friction = %g
[[release]]
name = "b"
body = "b"
at = { spinward = "%.17g m", height = "0.1 m" }
`, mu, c.share*edge))
		if stays := track.End == 0 && track.Outcome == flight.Rested; stays != c.stays {
			t.Errorf("%g of the edge: stays is %v, %s", c.share, stays, kinds(track))
		}
	}
}
