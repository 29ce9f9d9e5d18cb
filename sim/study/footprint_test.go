package study_test

import (
	"math"
	"testing"

	"offplumb/sim/model"
)

func around(loops [][][2]float64, x, y float64) int {
	sum := 0.0
	for _, loop := range loops {
		for k := range loop {
			a, b := loop[k], loop[(k+1)%len(loop)]
			sum += math.Remainder(math.Atan2(b[1]-y, b[0]-x)-math.Atan2(a[1]-y, a[0]-x), 2*math.Pi)
		}
	}
	return int(math.Round(sum / (2 * math.Pi)))
}

func areaOf(loops [][][2]float64) (sum float64) {
	for _, loop := range loops {
		for k := range loop {
			a, b := loop[k], loop[(k+1)%len(loop)]
			sum += (a[0]*b[1] - a[1]*b[0]) / 2
		}
	}
	return sum
}

// TestFootprintHoldsAllLandings: where cells are no smaller than the step its
// area is that of the cells with landings; else it is greater, and has no gap
// that is narrower than a step.
func TestFootprintHoldsAllLandings(t *testing.T) {
	for _, cell := range []float64{0.117, 0.4} {
		l := overHatch(ringSpin)
		l.Cell = cell
		c := mapped(t, hatched(ringSpin, l), 2)
		for i, f := range c.Footprints() {
			d := &c.Decks[i]
			if f.Deck != d.Name {
				t.Fatalf("%s stands beside %s", f.Deck, d.Name)
			}
			cells := float64(len(d.Cells)) * cell * cell
			if area := areaOf(f.Loops); math.Abs(area-f.Area) > 1e-9 || math.Abs(area-float64(f.Cells)*cell*cell) > 1e-9 ||
				area < cells-1e-9 || cell >= l.Step && area > cells+1e-9 {
				t.Errorf("cell %g, %s: area %g, told %g, of cells %g", cell, f.Deck, area, f.Area, cells)
			}
			for _, k := range d.Cells {
				if n := around(f.Loops, k.Worst.Spinward, k.Worst.Axial); n != 1 {
					t.Errorf("cell %g, %s: a landing at %g, %g is gone round %d times", cell, f.Deck, k.Worst.Spinward, k.Worst.Axial, n)
				}
			}
			if cell < l.Step && len(f.Loops) > 8 {
				t.Errorf("cell %g, %s: the footprint has %d pieces", cell, f.Deck, len(f.Loops))
			}
		}
	}
}

// TestFootprintEndsAtHalfALap: on a deck that goes all the way round no cell
// reaches beyond half a lap, and a whole round of drops covers the whole round.
func TestFootprintEndsAtHalfALap(t *testing.T) {
	l := model.LandingMap{Over: model.Region{Axial: &[2]float64{0, 0}}, Heights: []float64{1}, Step: 0.1, Cell: 0.7, Until: model.UntilLanding}
	c := mapped(t, mapRing(ringSpin, l), 2)
	half := math.Pi * ringRadius
	low, high := 0.0, 0.0
	f := c.Footprints()[0]
	for _, loop := range f.Loops {
		for _, p := range loop {
			low, high = math.Min(low, p[0]), math.Max(high, p[0])
		}
	}
	if math.Abs(low+half) > 1e-9 || math.Abs(high-half) > 1e-9 || math.Abs(f.Area-2*half*0.7) > 1e-6 || len(f.Loops) != 1 {
		t.Errorf("from %g to %g m, %g m^2 in %d outlines", low, high, f.Area, len(f.Loops))
	}
	if c.Places != int(2*half/0.1) {
		t.Errorf("%d places round %g m", c.Places, 2*half)
	}
}
