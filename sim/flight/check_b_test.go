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

// along is the closed form of a bead on a turning rod with friction (Kleppner &
// Kolenkow, An Introduction to Mechanics, for mu = 0): from rest, x - mu b
// follows exp(omega (-mu +- sqrt(1 + mu^2)) t). It gives place (m) and speed
// (m/s) along the rod.
func (r rod) along(time float64) (x, v float64) {
	w, root := math.Abs(r.spin), math.Sqrt(1+r.mu*r.mu)
	l1, l2 := w*(root-r.mu), -w*(root+r.mu)
	y := r.r0 - r.mu*r.off
	a, b := -l2*y/(l1-l2), l1*y/(l1-l2)
	return r.mu*r.off + a*math.Exp(l1*time) + b*math.Exp(l2*time), a*l1*math.Exp(l1*time) + b*l2*math.Exp(l2*time)
}

// Published checks B6 and B7: place, speed and side force of a body that is
// pressed on the wall of a turning spoke, with and without friction, on the
// radial line and beside it, at either spin.
func TestBeadOnRod(t *testing.T) {
	const w, r0 = 0.6, 8.0
	for _, c := range []struct{ mu, off float64 }{{0, 0}, {0.1, 0}, {0.3, 0}, {0, 0.5}, {0.3, 0.5}} {
		for _, spin := range []float64{w, -w} {
			r := rod{spin: spin, mu: c.mu, a: 0.05, r0: r0, off: c.off}
			m, track := fromFile(t, r.toml())
			slides(t, track, 2/w)
			for _, time := range []float64{0.3 / w, 1 / w, 1.31695790 / w, 2 / w} {
				s := local(m, track, time)
				x, v := r.along(time)
				if math.Abs(s.Pos.X-x) > 1e-7*x || math.Abs(s.Vel.X-v) > 1e-7*v {
					t.Errorf("%+v, %g s: at %.12g m with %.12g m/s, want %.12g and %.12g", c, time, s.Pos.X, s.Vel.X, x, v)
				}
				side := force(m, track, time)
				if want := 2*w*v + w*w*c.off; math.Abs(side-want) > 1e-4*want {
					t.Errorf("%+v, %g s: side force %.8g N/kg, want %.8g", c, time, side, want)
				}
			}
		}
	}
}

// force is the magnitude of the force by mass (m/s^2) across the spoke, by the
// second difference of the inertial motion.
func force(m *model.Model, track *flight.Track, time float64) float64 {
	const h = 1e-3 // s: the difference errs by h^2/12 of the fourth derivative, 1e-7 of it here
	acc := r3.Add(r3.Sub(track.At(time+h).Pos, r3.Scale(2, track.At(time).Pos)), track.At(time-h).Pos)
	a := m.Motion.At(track.Begin + time)
	return math.Abs(a.In(r3.Scale(1/(h*h), acc)).Y)
}

// The printed figures: 2 r0 at omega t = 1.31695790 with speed sqrt(3) omega
// r0 (Kleppner & Kolenkow); r/r0 at omega t = 2 for three frictions (derived;
// textbook form).
func TestBeadFigures(t *testing.T) {
	const w, r0 = 0.6, 8.0
	m, track := fromFile(t, rod{spin: w, a: 0.05, r0: r0}.toml())
	s := local(m, track, 1.31695790/w)
	if math.Abs(s.Pos.X/r0-2) > 1e-8 || math.Abs(s.Vel.X/(w*r0)-math.Sqrt(3)) > 1e-8 {
		t.Errorf("at %.10g r0 with %.10g omega r0, want 2 and sqrt(3)", s.Pos.X/r0, s.Vel.X/(w*r0))
	}
	for mu, want := range map[float64]float64{0: 3.76219569, 0.1: 3.40854002, 0.3: 2.87474581} {
		m, track := fromFile(t, rod{spin: w, mu: mu, a: 0.05, r0: r0}.toml())
		if got := local(m, track, 2/w).Pos.X / r0; math.Abs(got-want) > 2e-8 {
			t.Errorf("friction %g: r/r0 is %.9g, want %.9g", mu, got, want)
		}
	}
}
