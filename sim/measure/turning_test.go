package measure_test

import (
	"math"
	"testing"

	"offplumb/sim/crew"
	"offplumb/sim/frame"
	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// spunDown is a ring whose spin goes from 0.6 rad/s to none, evenly.
func spunDown(t *testing.T) *model.Model {
	t.Helper()
	in := ring(10, 0.6)
	in.Habitat.Changes = []frame.Change{{Start: 2, Over: 6, To: 0, Linear: true}}
	return valid(t, in)
}

// TestTurnings tries the rows about a linear spin-down against hand: at 0.1
// rad/s^2 the Euler acceleration is 1 m/s^2 at 10 m, from the very start of the
// change to its end, and points spinward.
func TestTurnings(t *testing.T) {
	m := spunDown(t)
	rows := measure.Turnings(m, 10)
	seen := 0
	for i, r := range rows {
		if i > 0 && r.Time <= rows[i-1].Time {
			t.Fatalf("row %d: %g s after %g s", i, r.Time, rows[i-1].Time)
		}
		spin, euler := 0.6, 0.0
		switch {
		case r.Time >= 8:
			spin = 0
		case r.Time >= 2:
			spin, euler = 0.6-0.1*(r.Time-2), 1
		}
		if math.Abs(r.Spin-spin) > 1e-14 || math.Abs(r.Euler-euler) > 1e-14 || math.Abs(r.Gravity-math.Hypot(10*spin*spin, euler)) > 1e-13 {
			t.Errorf("%+v, want %g rad/s, %g m/s^2", r, spin, euler)
		}
		if euler > 0 && math.Abs(r.TiltSpinward-math.Atan2(1, 10*spin*spin)) > 1e-13 {
			t.Errorf("%g s: tilt %g rad", r.Time, r.TiltSpinward)
		}
		if r.Time >= 8 && !math.IsNaN(r.TiltSpinward+r.Friction) {
			t.Errorf("%g s: tilt %g rad without gravity", r.Time, r.TiltSpinward)
		}
		if r.Time == 2 || r.Time == 8 || r.Time == math.Nextafter(2, 0) || r.Time == math.Nextafter(8, 0) {
			seen++
		}
	}
	if seen != 4 {
		t.Errorf("%d of 4 rows about the kinks", seen)
	}
	if n := len(measure.Turnings(m, 1e6)); n > 3000 {
		t.Errorf("%d rows", n)
	}
}

// TestFiguresAfterLastChange tries the second set of figures, and that a steady
// habitat's tables have none.
func TestFiguresAfterLastChange(t *testing.T) {
	d := measure.DeckFigures(spunDown(t))[0]
	if !d.Changes || math.Abs(d.Gravity-3.6) > 1e-14 || d.LastGravity != 0 || d.LastSpeed != 0 || !math.IsNaN(d.LastDrop) {
		t.Errorf("%+v", d)
	}
	h := measure.HabitatOf(spunDown(t), 0, 0)
	if !h.Changes || h.Spin != 0.6 || h.LastSpin != 0 {
		t.Errorf("%+v", h)
	}
	steady := valid(t, ring(10, 0.6))
	with, without := len(measure.DeckTable([]measure.DeckFigure{d}).Columns), len(measure.DeckTable(measure.DeckFigures(steady)).Columns)
	if with != without+4 || len(measure.HabitatTable(h).Columns) != len(measure.HabitatTable(measure.HabitatOf(steady, 0, 0)).Columns)+3 {
		t.Errorf("%d columns of decks, %d of a steady habitat", with, without)
	}
}

// TestTiltRate holds the rate of the tilt of a person who stands in a linear
// spin-down to the closed form: tan(tilt) = a/omega^2, so that its rate is 2 a^2
// omega/(omega^4 + a^2).
func TestTiltRate(t *testing.T) {
	in := ring(10, 0.6)
	in.Habitat.Changes = []frame.Change{{Start: 2, Over: 6, To: 0, Linear: true}}
	in.Crews = []model.Crew{{Name: "p", Mass: 80, Stature: 1.7, Breadth: 0.5, Waist: 0.55, Head: 0.93}}
	in.Paths = []model.Path{{Name: "stands", Crew: "p", Legs: []model.Leg{{Kind: model.Stand, Duration: 7}}}}
	m := valid(t, in)
	p, problems := crew.NewPlan(m, &m.Paths[0])
	if len(problems) > 0 {
		t.Fatal(problems)
	}
	rows, _ := measure.LoadSeries(m, p)
	for i := 0; i < len(rows); i += 50 {
		r, want := &rows[i], 0.0
		if math.Abs(r.Time-2) < 0.01 {
			continue // a jump
		}
		if w := 0.6 - 0.1*(r.Time-2); r.Time > 2 {
			want = 2 * 0.01 * w / (w*w*w*w + 0.01)
		}
		if math.Abs(r.TiltRateSpinward-want) > 1e-7 || r.TiltRateAxial != 0 {
			t.Errorf("%g s: %g rad/s, want %g", r.Time, r.TiltRateSpinward, want)
		}
	}
}
