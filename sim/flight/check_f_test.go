package flight_test

import (
	"fmt"
	"math"
	"testing"

	"offplumb/sim/frame"
)

// Published check F22: balls with the restitution that the rules of their game
// imply (e = sqrt(h2/h1), the middle of the band), dropped where gravity is all
// but uniform, rebound within the band.
func TestReboundBands(t *testing.T) {
	for _, c := range []struct {
		name               string
		drop, low, high, d float64 // m
	}{
		{"tennis ball (ITF, rules of tennis)", 2.54, 1.35, 1.47, 0.067},
		{"table tennis ball (ITTF)", 0.305, 0.24, 0.26, 0.04},
		{"football (FIFA Quality)", 2, 1.15, 1.65, 0.22},
	} {
		e := math.Sqrt((c.low + c.high) / 2 / c.drop)
		m, track := fromFile(t, fmt.Sprintf(`
format = 1
[habitat]
floor_radius = "2300 km"
floor_gravity = "1 g"
[air]
none = true
[[body]]
name = "ball"
mass = "0.1 kg"
diameter = "%.17g m"
restitution = %.17g
[[release]]
name = "ball"
body = "ball"
at = { height = "%.17g m" }
until = "3 s"
`, c.d, e, c.drop+c.d/2))
		if len(track.Impacts) < 2 {
			t.Fatalf("%s: %s", c.name, kinds(track))
		}
		top := 0.0
		for k := 0.0; k <= 1000; k++ {
			time := track.Impacts[0].Time + (track.Impacts[1].Time-track.Impacts[0].Time)*k/1000
			top = math.Max(top, m.Decks[0].Radius-frame.PolarOf(local(m, track, time).Pos).R-c.d/2)
		}
		if top < c.low || top > c.high || math.Abs(top/c.drop-e*e) > 1e-5 {
			t.Errorf("%s rebounds %.6g m from %g m, want %g to %g", c.name, top, c.drop, c.low, c.high)
		}
	}
}
