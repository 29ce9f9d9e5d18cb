package flight_test

import (
	"fmt"
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/scenarios"
	"offplumb/sim/flight"
	"offplumb/sim/frame"
	"offplumb/sim/model"
	"offplumb/sim/study"
)

// fromFile flies the first release of a scenario in the format's own words.
func fromFile(t testing.TB, toml string) (*model.Model, *flight.Track) {
	t.Helper()
	sc, err := scenarios.Load("test.toml", []byte(toml), scenarios.Options{})
	if err != nil {
		t.Fatal(err)
	}
	p, problems := study.Prepare(sc.Model)
	if len(problems) > 0 {
		t.Fatal(problems)
	}
	track, err := flight.NewFlier(p.Model).Fly(&p.Lets[0])
	if err != nil {
		t.Fatal(err)
	}
	return p.Model, track
}

// rod is a spoke from a hub of 3 m to a ring of 60 m, and a bead of the radius
// a (m) let go at the radius r0 (m), touching the spoke's antispinward wall,
// that is, for negative spin its spinward wall. Its centre moves on a line at
// the distance off (m) from the radial one.
type rod struct {
	spin, mu, a, r0, off float64
}

func (r rod) toml() string {
	side := -math.Copysign(r.off, r.spin)
	return fmt.Sprintf(`
format = 1
[habitat]
floor_radius = "60 m"
ceiling_radius = "50 m"
length = "10 m"
spin = "%.17g rad/s"
[air]
none = true
[[room]]
name = "hub"
floor_radius = "3 m"
length = "8 m"
[[passage]]
name = "spoke"
from_radius = "3 m"
to_radius = "50 m"
width = "%.17g m"
[[body]]
name = "bead"
mass = "0.3 kg"
diameter = "%.17g m"
restitution = 0
friction = %.17g
[[release]]
name = "bead"
body = "bead"
at = { radius = "%.17g m", spinward = "%.17g rad" }
`, r.spin, 2*(r.a+r.off), 2*r.a, r.mu, math.Hypot(r.r0, r.off), math.Atan2(side, r.r0))
}

// slides checks that the track begins with a slide that goes on until at least
// the time T (s).
func slides(t *testing.T, track *flight.Track, until float64) {
	t.Helper()
	if len(track.Phases) == 0 || track.Phases[0].Kind != flight.Slide || track.Phases[0].T1 < until {
		t.Fatalf("begins with %+v, want a slide until %g s", kinds(track), until)
	}
}

// kinds tells the phases of a track.
func kinds(t *flight.Track) string {
	out := ""
	for i, p := range t.Phases {
		if i == 20 {
			return out + "..."
		}
		out += fmt.Sprintf("%v %.9g-%.9g on %q; ", p.Kind, p.T0, p.T1, p.Surface)
	}
	return out + t.Outcome.String()
}

// local is the state at a time, in the habitat.
func local(m *model.Model, track *flight.Track, time float64) frame.State {
	a := m.Motion.At(track.Begin + time)
	return a.ToHabitat(track.At(time))
}

func TestBeadOnRod(t *testing.T) {
	const w, r0 = 0.6, 8.0
	for _, spin := range []float64{w, -w} {
		m, track := fromFile(t, rod{spin: spin, a: 0.05, r0: r0}.toml())
		t.Log(kinds(track))
		end := 1.31695790 / w
		s := local(m, track, end)
		t.Log(s.Pos.X/r0-2, r3.Norm(s.Vel)/(w*r0)-math.Sqrt(3), s.Pos.Y)
	}
}
