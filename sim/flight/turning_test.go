package flight_test

import (
	"encoding/csv"
	"math"
	"os"
	"strconv"
	"testing"

	"gonum.org/v1/gonum/integrate/quad"
	"gonum.org/v1/gonum/num/quat"
	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/air"
	"offplumb/sim/flight"
	"offplumb/sim/frame"
	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// changed is a ring with changes of its spin, in which a block of friction mu
// and 0.2 m across stands on the floor.
func changed(r, spin, mu float64, changes ...frame.Change) model.Model {
	in := ring(r, spin)
	in.Habitat.Changes = changes
	in.Solver.MaxTime = 60
	in.Bodies = []model.Body{{Name: "block", Mass: 2, Diameter: 0.2, Friction: mu}}
	in.Releases = []model.Release{{Name: "block", Body: "block", At: model.Station{Height: 0.1}}}
	return in
}

// slipAt is when the first rest of a track ends, and what comes after it.
func slipAt(t *testing.T, track *flight.Track) (float64, *flight.Phase) {
	t.Helper()
	for i := range track.Phases {
		if p := &track.Phases[i]; p.Kind == flight.Rest && p.T1 > p.T0 && i+1 < len(track.Phases) {
			return p.T1, &track.Phases[i+1]
		}
	}
	t.Fatalf("never slips: %s", order(track))
	return 0, nil
}

// TestSlipsWhenConeIsLeft holds the start of a slide against the closed form: on
// a floor the pull along it is r |domega/dt|, the Euler acceleration, and the
// weight r omega^2 (Goldstein, Classical Mechanics, section 4.10, from memory),
// so that in a linear spin-down by a = |domega/dt| the block slips at omega^2 =
// a/mu, after (omega0 - sqrt(a/mu))/a, in the sense in which the floor moved. Of a
// spin-up the first moment is the worst.
func TestSlipsWhenConeIsLeft(t *testing.T) {
	for _, c := range []struct{ r, spin, to, over, mu float64 }{
		{14, 0.6, 0, 25, 0.3}, {14, -0.6, 0, 25, 0.3}, {200, 0.2, 0.05, 30, 0.9}, {4, 1.5, -1.5, 7, 0.4},
	} {
		const start = 3.0
		in := changed(c.r, c.spin, c.mu, frame.Change{Start: start, Over: c.over, To: c.to, Linear: true})
		_, track := lawful(t, in)
		a := math.Abs(c.to-c.spin) / c.over
		want := start + (math.Abs(c.spin)-math.Sqrt(a/c.mu))/a
		got, slide := slipAt(t, track)
		// The held force counts to 1e-12 of the pull: of omega, half of that.
		if math.Abs(got-want) > 1e-10*want {
			t.Errorf("%+v: slips at %.12g s, want %.12g s", c, got, want)
		}
		if v := local(&model.Model{Motion: must(t, in).Motion}, track, (slide.T0+slide.T1)/2).Vel; v.Y*c.spin <= 0 || slide.Kind != flight.Slide {
			t.Errorf("%+v: %v with %v", c, slide.Kind, v)
		}
	}
	for _, mu := range []float64{0.59, 0.61} { // a linear spin-up from omega: a/omega^2 is 0.6
		_, track := lawful(t, changed(10, 0.1, mu, frame.Change{Start: 2, Over: 50, To: 0.4, Linear: true}))
		if mu > 0.6 {
			if order(track) != "rest on floor, rested" || track.End != 0 {
				t.Errorf("friction %g: %s", mu, order(track))
			}
		} else if at, _ := slipAt(t, track); at != 2 {
			t.Errorf("friction %g: slips at %g s", mu, at)
		}
	}
}

func must(t *testing.T, in model.Model) *model.Model {
	t.Helper()
	m, problems := model.New(in)
	if len(problems) > 0 {
		t.Fatal(problems)
	}
	return m
}

// TestSlipFromShelf tries the same beside the middle of a flat shelf, where the
// pull along it and the weight mix: at h from the axis along the shelf's normal
// and x spinward along it, in a spin-down by a, omega^2 (mu h - x) = a (h + mu x).
func TestSlipFromShelf(t *testing.T) {
	const r, high, mu, a, omega, x = 12.0, 1.2, 0.35, 0.03, 0.7, 0.3
	in := changed(r, omega, mu, frame.Change{Start: 1, Over: omega / a, To: 0, Linear: true})
	in.Fixtures = []model.Fixture{{Name: "shelf", Kind: model.Box, At: model.Station{Height: high}, Size: [3]float64{1, 1, 0.05}, Friction: model.None, Restitution: model.None}}
	h := r - high - 0.05 - 0.1
	in.Releases[0].At = model.Station{HasRadius: true, Radius: math.Hypot(h, x), Spinward: model.Arc{Value: math.Atan2(x, h), IsAngle: true}}
	_, track := lawful(t, in)
	want := 1 + (omega-math.Sqrt(a*(h+mu*x)/(mu*h-x)))/a
	if got, _ := slipAt(t, track); math.Abs(got-want) > 1e-9 {
		t.Errorf("slips at %.12g s, want %.12g s: %s", got, want, order(track))
	}
}

// TestSlideInSpinDown holds a slide against its closed form. Seen from outside,
// nothing but friction mu r W^2 acts along the floor on a block that goes round
// at the rate W, so that W = w/(1 + mu w t) and the way gone round is ln(1 + mu w
// t)/mu, whatever the floor beneath does (a textbook problem on a block sliding
// within a hoop; from memory).
func TestSlideInSpinDown(t *testing.T) {
	const mu, r = 0.3, 14 - 0.1
	for _, c := range []frame.Change{{Start: 4, Over: 25, To: 0}, {Start: 4, Over: 25, To: 0, Linear: true}, {Start: 1, Over: 9, To: -0.6}} {
		m, track := lawful(t, changed(14, 0.6, mu, c))
		from, _ := slipAt(t, track)
		w := m.SpinAt(from)
		a0 := frame.PolarOf(local(m, track, from).Pos).Phi + m.Turned(from)
		for _, after := range []float64{1, 5, 12, 18} {
			s := local(m, track, from+after)
			rate, way := w/(1+mu*w*after), math.Log1p(mu*w*after)/mu
			if v := frame.LocalAt(frame.PolarOf(s.Pos).Phi); math.Abs(r3.Dot(s.Vel, v.Spinward)-r*(rate-m.SpinAt(from+after))) > 1e-4 {
				t.Errorf("%+v, %g s after: %v m/s, want %g", c, after, s.Vel, r*(rate-m.SpinAt(from+after)))
			}
			// It is set off with a creep of 2e-5 m/s, which friction takes away
			// or the pull outgrows within some ten seconds.
			if got := frame.PolarOf(s.Pos).Phi + m.Turned(from+after) - a0; math.Abs(frame.WrapAngle(got-way)) > 1e-4/r*10 {
				t.Errorf("%+v, %g s after: gone round %.9g rad, want %.9g", c, after, got, way)
			}
		}
	}
}

// TestBarelySlips tries that a moment in which friction all but holds is found:
// that of the greatest demand of a smooth change, for frictions either side of
// it. The demand 6 u (1 - u) d/T/omega^2 of a spin-up from omega0 to omega0 + d is
// greatest where its derivative vanishes, which is sought here by thirds.
func TestBarelySlips(t *testing.T) {
	const omega, d, over, start = 0.3, 0.6, 20.0, 2.0
	demand := func(u float64) float64 {
		w := omega + d*u*u*(3-2*u)
		return d / over * 6 * u * (1 - u) / (w * w)
	}
	a, b := 0.0, 0.5
	for range 100 {
		if u, v := a+(b-a)/3, b-(b-a)/3; demand(u) < demand(v) {
			a = u
		} else {
			b = v
		}
	}
	most := demand(a)
	for _, share := range []float64{1 - 1e-9, 1 - 1e-5, 1 + 1e-9} {
		_, track := lawful(t, changed(10, omega, most*share, frame.Change{Start: start, Over: over, To: omega + d}))
		if share > 1 {
			if order(track) != "rest on floor, rested" {
				t.Errorf("share %g: %s", share, order(track))
			}
			continue
		}
		// Near its top the demand falls off with the square of the time.
		if got, _ := slipAt(t, track); math.Abs(got-start-a*over) > 3*over*math.Sqrt(1-share) {
			t.Errorf("share %g: slips at %.9g s, the greatest demand is at %.9g s", share, got, start+a*over)
		}
		if track.Outcome != flight.Rested {
			t.Errorf("share %g: %s", share, order(track))
		}
	}
}

// TestSlipsInConing tries a block on the floor of a coning ring. In the
// habitat's axes omega = (p' cos(c), p' sin(c), s), p' = p sin(half angle), c =
// phase - q t; at r outward the pull is along the axis with p' r (s + q) cos(c),
// spinward with p'^2 r cos(c) sin(c), and outward with r (s^2 + p'^2 sin(c)^2).
func TestSlipsInConing(t *testing.T) {
	const r, s, half, period, phase = 20.0, 0.5, 0.1, 8.0, math.Pi / 2
	p := 2 * math.Pi / period
	side, q := p*math.Sin(half), s-p*math.Cos(half)
	demand := func(at float64) float64 {
		sin, cos := math.Sincos(phase - q*at)
		return math.Hypot(side*(s+q)*cos, side*side*cos*sin) / (s*s + side*side*sin*sin)
	}
	for _, mu := range []float64{0.02, 0.05, 0.0676} {
		at := 0.0
		for demand(at) < mu && at < 40 {
			at += 1e-3
		}
		lo, hi := at-1e-3, at
		for range 60 {
			if mid := (lo + hi) / 2; demand(mid) < mu {
				lo = mid
			} else {
				hi = mid
			}
		}
		in := changed(r, s, mu)
		in.Habitat.Coning = frame.Coning{HalfAngle: half, Period: period, Phase: phase}
		_, track := lawful(t, in)
		if at >= 40 {
			if order(track) != "rest on floor, rested" || track.End != 0 {
				t.Errorf("friction %g: %s", mu, order(track))
			}
			continue
		}
		if got, _ := slipAt(t, track); math.Abs(got-hi) > 1e-9 {
			t.Errorf("friction %g: slips at %.12g s, want %.12g s", mu, got, hi)
		}
	}
}

// TestNothingHoldsWithoutSpin tries the end of a spin-down: what has stopped
// against a wall is held by nothing, and what has not goes on; nothing rests.
func TestNothingHoldsWithoutSpin(t *testing.T) {
	in := changed(14, 0.6, 0.3, frame.Change{Start: 1, Over: 10, To: 0})
	in.Releases = append(in.Releases, model.Release{Name: "late", Body: "block", At: model.Station{Height: 2}, Time: 10.5})
	m := must(t, in)
	for k := range m.Releases {
		track := flyNth(t, m, k)
		if faults, _ := flight.Judge(m, track); len(faults) > 0 || track.Outcome != flight.TimeUp || track.End != in.Solver.MaxTime {
			t.Errorf("%s: %q %s", m.Releases[k].Name, faults, order(track))
		}
	}
}

// TestDropInSpinUp tries that a flight without air is a straight line from
// outside however the spin changes meanwhile: the drop lands where the line
// meets the floor's circle, and the floor has turned by the quadrature of the
// rate.
func TestDropInSpinUp(t *testing.T) {
	const r, r0 = 18.0, 15.5
	for _, c := range []frame.Change{{Start: 0.3, Over: 1, To: 1.1}, {Start: 0.2, Over: 0.7, To: -0.9, Linear: true}, {Start: 0.1, Over: 0.2, To: 0}} {
		in := ring(r, 0.5)
		in.Habitat.Changes = []frame.Change{c}
		in.Releases = []model.Release{{Name: "drop", At: model.Station{Height: r - r0}, Until: model.Until{Kind: model.UntilLanding}}}
		m, track := one(t, in, flight.Setup{})
		l := measure.Land(m, track)
		theta := math.Acos(r0 / r)
		time := math.Tan(theta) / 0.5
		turned := 0.0
		for from := 0.0; from < time; {
			to := time
			for _, joint := range []float64{c.Start, c.End()} {
				if joint > from {
					to = math.Min(to, joint)
				}
			}
			turned += quad.Fixed(m.SpinAt, from, to, 4, nil, 0)
			from = to
		}
		if math.Abs(l.Time-time) > 1e-12 || math.Abs(l.Offset-r*(theta-turned)) > 1e-11 {
			t.Errorf("%+v: lands after %.15g s at %.15g m, want %.15g s, %.15g m", c, l.Time, l.Offset, time, r*(theta-turned))
		}
		if want := 0.25 * r; math.Abs(l.Uniform.Gravity-want) > 1e-12 {
			t.Errorf("uniform gravity %g, at the release it is %g", l.Uniform.Gravity, want)
		}
	}
}

// TestFlightInConing tries that a flight without air in a coning habitat is a
// straight line from outside, and that it lands when that meets the cylinder
// about the axis as it then stands. The attitude is put together anew here, of
// quaternions.
func TestFlightInConing(t *testing.T) {
	const r, s, begin = 20.0, 0.45, 2.7
	k := frame.Coning{HalfAngle: 0.3, Period: 6, Phase: 0.8}
	about := r3.Vec{X: math.Sin(k.HalfAngle) * math.Cos(k.Phase), Y: math.Sin(k.HalfAngle) * math.Sin(k.Phase), Z: math.Cos(k.HalfAngle)}
	p := 2 * math.Pi / k.Period
	turn := func(at float64) r3.Rotation {
		q := quat.Mul(quat.Number(r3.NewRotation(p*at, about)), quat.Number(r3.NewRotation((s-p*math.Cos(k.HalfAngle))*at, r3.Vec{Z: 1})))
		return r3.Rotation(q)
	}
	inHabitat := func(v r3.Vec, at float64) r3.Vec { return r3.Rotation(quat.Conj(quat.Number(turn(at)))).Rotate(v) }
	for _, start := range []model.Start{{}, pushed(3, 2, 4), pushed(-6, -1, 0.5)} {
		in := ring(r, s)
		in.Habitat.Coning = k
		in.Releases = []model.Release{{Name: "point", At: model.Station{Height: 2, Axial: 1}, Time: begin, Start: start, Until: model.Until{Kind: model.UntilLanding}}}
		_, track := one(t, in, flight.Setup{})
		here := r3.Vec{X: r - 2, Z: 1}
		// The velocity of the place by differences, that of the throw on top.
		const h = 1e-5
		v := r3.Scale(1/(2*h), r3.Sub(turn(begin+h).Rotate(here), turn(begin-h).Rotate(here)))
		v = r3.Add(v, turn(begin).Rotate(r3.Vec{X: -start.VUp, Y: start.VSpinward, Z: start.VAxial}))
		at := func(time float64) r3.Vec {
			return inHabitat(r3.Add(turn(begin).Rotate(here), r3.Scale(time, v)), begin+time)
		}
		lo, hi := 0.0, 0.0
		for q := at(0); math.Hypot(q.X, q.Y) < r; q = at(hi) {
			lo, hi = hi, hi+1e-3
		}
		for range 60 {
			if q := at((lo + hi) / 2); math.Hypot(q.X, q.Y) < r {
				lo = (lo + hi) / 2
			} else {
				hi = (lo + hi) / 2
			}
		}
		// The differenced velocity is good to h^2/6 of the third derivative,
		// 20 m times 1/s^3, and to roundings of 4e-15 m over h.
		hit := track.Landing()
		if hit == nil || math.Abs(hit.Time-hi) > 1e-8 || r3.Norm(r3.Sub(hit.State.Pos, at(hi))) > 1e-7 {
			t.Errorf("%+v: lands at %+v, want %.12g s, %v", start, hit, hi, at(hi))
		}
	}
}

// TestTurningFlightsAsReference holds flights with drag in unsteady turning to
// those of another integrator, which are good to 4e-13: see the script beside
// the stored figures. The tolerance is that of steady flights, some tens of
// steps of 1e-9 of what the forces do, here on ways of up to 30 m.
func TestTurningFlightsAsReference(t *testing.T) {
	file, err := os.Open("../../testdata/reference/turning_flights.csv")
	if err != nil {
		t.Fatal(err)
	}
	defer file.Close()
	read := csv.NewReader(file)
	read.Comment = '#'
	rows, err := read.ReadAll()
	if err != nil || len(rows) < 8 {
		t.Fatal(err, len(rows))
	}
	for _, row := range rows[1:] {
		v := map[string]float64{}
		for i := 1; i < len(row); i++ {
			if v[rows[0][i]], err = strconv.ParseFloat(row[i], 64); err != nil {
				t.Fatal(err)
			}
		}
		for _, tol := range []struct{ rel, off float64 }{{model.DefaultRelTol, 3e-7}, {1e-13, 1e-10}} {
			if pos, vel := turningOff(t, v, tol.rel); pos > tol.off || vel > tol.off {
				t.Errorf("%s, tolerance %g: %.3g m and %.3g m/s off", row[0], tol.rel, pos, vel)
			}
		}
	}
}

// turningOff flies a stored flight and gives how far it is off.
func turningOff(t *testing.T, v map[string]float64, rel float64) (pos, vel float64) {
	t.Helper()
	in := ring(1000, v["spin_rad_s"])
	in.Solver.RelTol, in.Solver.PosTol, in.Solver.VelTol = rel, rel*1e-3, rel*1e-3
	if v["over_s"] > 0 {
		in.Habitat.Changes = []frame.Change{{Start: v["start_s"], Over: v["over_s"], To: v["to_rad_s"], Linear: v["linear"] == 1}}
	}
	in.Habitat.Coning = frame.Coning{HalfAngle: v["half_angle_rad"], Period: v["period_s"], Phase: v["phase_rad"]}
	in.Air = air.FromPressure(v["pressure_Pa"], 293.15)
	in.Bodies = []model.Body{{Name: "b", Mass: v["mass_kg"], Diameter: v["diameter_m"]}}
	in.Releases = []model.Release{{Name: "r", Body: "b", At: model.Station{HasRadius: true, Radius: v["radius_m"], Axial: v["axial_m"]}, Time: v["begin_s"],
		Start: pushed(v["v_spinward_m_s"], v["v_axial_m_s"], v["v_up_m_s"]), Until: model.Until{Kind: model.UntilDuration, Duration: v["duration_s"]}}}
	m, track := one(t, in, flight.Setup{})
	s := end(m, track)
	return r3.Norm(r3.Sub(s.Pos, r3.Vec{X: v["x_m"], Y: v["y_m"], Z: v["z_m"]})), r3.Norm(r3.Sub(s.Vel, r3.Vec{X: v["vx_m_s"], Y: v["vy_m_s"], Z: v["vz_m_s"]}))
}

// TestChangeOfNothing tries that changes to the rate that there is, and those
// that come after all is over, leave a track as it is, bit for bit.
func TestChangeOfNothing(t *testing.T) {
	for _, start := range []model.Start{{}, pushed(-2, 1, 0), pushed(1, 0.3, 3)} {
		in := bench(model.Body{Mass: 1, Diameter: 0.1, Friction: 0.2, Restitution: 0.5}, model.Station{Height: 1}, start)
		in.Air = air.FromPressure(air.DefaultPressure, air.DefaultTemperature)
		_, plain := one(t, in, flight.Setup{})
		in.Habitat.Changes = []frame.Change{{Start: 1, Over: 2, To: in.Habitat.Spin}, {Start: 8, Over: 0.1, To: in.Habitat.Spin, Linear: true}}
		in.Habitat.Coning = frame.Coning{Period: 3}
		_, same := one(t, in, flight.Setup{})
		in.Habitat.Changes = []frame.Change{{Start: 2 * in.Solver.MaxTime, Over: 2, To: 0}}
		_, late := one(t, in, flight.Setup{})
		for _, other := range []*flight.Track{same, late} {
			if order(other) != order(plain) || other.End != plain.End || other.Last != plain.Last || len(other.Impacts) != len(plain.Impacts) {
				t.Errorf("%+v: %s at %v, steadily %s at %v", start, order(other), other.Last, order(plain), plain.Last)
			}
		}
	}
}
