package measure_test

import (
	"math"
	"testing"

	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// TestHabitatFigures tries the figures of Taylor's habitat (Classical
// Mechanics, problem 9.2; seen): 40 m, 0.5 rad/s, 10 m/s^2, 20 m/s at the rim;
// 2 m above the floor 5 % less.
func TestHabitatFigures(t *testing.T) {
	for _, spin := range []float64{0.5, -0.5} {
		h := measure.HabitatOf(valid(t, ring(40, spin)), 2/model.HeadShare, 3)
		for _, c := range []struct {
			name      string
			got, want float64
		}{
			{"gravity", h.Gravity, 10}, {"rim speed", h.RimSpeed, 40 * spin}, {"spin", h.Spin, spin},
			{"head to foot", h.HeadToFoot, 0.05}, {"Coriolis ratio", h.CoriolisRatio, 0.3},
		} {
			if math.Abs(c.got-c.want) > 8*epsilon*math.Abs(c.want) {
				t.Errorf("spin %g: %s %.17g, want %g", spin, c.name, c.got, c.want)
			}
		}
	}
}

// TestHabitatDefaults tries that a stature and a speed of 0 are the defaults,
// and that a habitat that stands still has no Coriolis ratio.
func TestHabitatDefaults(t *testing.T) {
	m := valid(t, ring(18, 0.4))
	if got, want := measure.HabitatOf(m, 0, 0), measure.HabitatOf(m, 1.75, 1); got != want {
		t.Errorf("defaults give %+v, want %+v", got, want)
	}
	if h := measure.HabitatOf(valid(t, ring(18, 0)), 0, 0); !math.IsNaN(h.CoriolisRatio) || h.Gravity != 0 {
		t.Errorf("at rest %+v", h)
	}
}

// TestHeadToFootIsThatOfLoads tries the share against the loads of a person
// who stands: one word, one meaning.
func TestHeadToFootIsThatOfLoads(t *testing.T) {
	m, p := planned(t, ring(18, 0.5), model.Path{Legs: []model.Leg{{Kind: model.Stand, Duration: 1}}})
	l := p.Loads(m, 0.5)
	if got, want := measure.HabitatOf(m, mate.Stature, 0).HeadToFoot, l.GravityDifference/l.GravityFeet; math.Abs(got-want) > 64*epsilon {
		t.Errorf("head to foot %.17g, of the loads %.17g", got, want)
	}
}

// TestWalkRunTransition holds the speed at which walking turns into running to
// the Froude number v^2/(g l) of 0.5 (Kram, Domingo & Ferris, J. Exp. Biol. 200,
// 1997, 821-826), for legs of 0.53 of the default stature (from memory): at 1 g
// about the 2 m/s of every textbook, and as the root of gravity below. The
// decks' table has it for the gravity at rest on each.
func TestWalkRunTransition(t *testing.T) {
	const leg = 0.53 * 1.75
	for _, share := range []float64{1, 0.5, 0.16} {
		g := share * model.StandardGravity
		v := measure.WalkRunSpeed(g)
		if froude := v * v / (g * leg); math.Abs(froude-0.5) > 8*epsilon {
			t.Errorf("%g g: %g m/s is a Froude number of %.17g, want 0.5", share, v, froude)
		}
	}
	if v := measure.WalkRunSpeed(model.StandardGravity); math.Abs(v-2) > 0.2 {
		t.Errorf("at 1 g %g m/s, want about 2", v)
	}
	in := ring(40, 0.5, model.Deck{Name: "upper", Radius: 30, Thickness: 0.05, Whole: true})
	rows := measure.DeckTable(measure.DeckFigures(valid(t, in)))
	for k, column := range rows.Columns {
		if column.Name != "walk_run_m_s" {
			continue
		}
		for i, g := range []float64{10, 7.5} {
			if got := rows.Rows[i][k].Num; math.Abs(got*got/(g*leg)-0.5) > 8*epsilon {
				t.Errorf("deck %d, %g m/s^2: walk_run %.17g m/s", i, g, got)
			}
		}
		return
	}
	t.Error("decks.csv has no walk_run_m_s")
}

// TestGravityTimes tries the times below and above a level of gravity on a
// climb at a steady speed without ramps, on which the waist's gravity falls
// evenly, from 17.021 m to 12.021 m, and on the way down again, on which it
// grows.
func TestGravityTimes(t *testing.T) {
	const spin, v = 0.6, 0.5
	in := ring(18, spin)
	in.Output.Step = 0.3
	// Coriolis, 2 spin v, is across: the magnitude is a hypotenuse.
	level := math.Hypot(spin*spin*15, 2*spin*v)
	m, p := planned(t, in, model.Path{GravityLevels: []float64{level, 1, 100},
		Legs: []model.Leg{{Kind: model.Climb, Distance: 5, Speed: v}, {Kind: model.Descend, Distance: 5, Speed: v}}})
	rows, _ := measure.LoadSeries(m, p)
	got := measure.GravityTimes(p.Path, rows)
	// Between rows the gravity is taken as even, which it is but for a thousandth;
	// the rows at both ends, which stand still, are far from the level.
	above := 2 * (17.021 - 15) / v
	for i, want := range []float64{20 - above, 0, 20} {
		g := got[i]
		if math.Abs(g.Below-want) > 1e-3 || math.Abs(g.Below+g.Above-20) > 1e-9 || g.Path != "path" {
			t.Errorf("level %g m/s^2: %g s below and %g s above, want %g and the rest of 20", g.Level, g.Below, g.Above, want)
		}
	}
}
