package integrator_test

import (
	"math"
	"testing"

	"offplumb/integrator"
)

// afloat is a free flight in air that turns: the drag goes as the square of
// the speed against the air. The state is a position and a velocity in space.
func afloat() system {
	const spin, drag = 0.3, 0.02
	return system{6, func(_ float64, y, dy []float64) {
		wx, wy, wz := y[3]+spin*y[1], y[4]-spin*y[0], y[5]
		k := -drag * math.Sqrt(wx*wx+wy*wy+wz*wz)
		dy[0], dy[1], dy[2] = y[3], y[4], y[5]
		dy[3], dy[4], dy[5] = k*wx, k*wy, k*wz
	}}
}

// afloatTol has the groups of a position and a velocity.
var afloatTol = integrator.Tol{Rel: 1e-10, Abs: []float64{1e-9, 1e-9}, Groups: []int{3, 3}}

// afloatStart is a throw from near the axis.
var afloatStart = []float64{10, 0, 0, 0.5, 4, 1}

// hull is the gap to a cylinder about the third axis.
type hull struct{ radius float64 }

func (c *hull) Value(_ float64, y []float64) float64 { return c.radius - math.Hypot(y[0], y[1]) }

func (c *hull) Bound(s *integrator.Step, t float64, y []float64) (rate, accel, thin float64) {
	return math.Hypot(y[3], y[4]), s.MaxAccel(0, 2), 1e-6
}

// wantNoAllocs demands that do allocates nothing, once it has run.
func wantNoAllocs(t *testing.T, what string, do func()) {
	t.Helper()
	if n := testing.AllocsPerRun(100, do); n != 0 {
		t.Errorf("%s: %g allocations", what, n)
	}
}

func TestStepAllocatesNothing(t *testing.T) {
	for _, tol := range []integrator.Tol{afloatTol, tight(1e-9)} {
		st := newStepper(t, afloat(), tol)
		st.Reset(0, afloatStart)
		var seg integrator.Segment
		y := make([]float64, 6)
		wantNoAllocs(t, "Step, At, Rate, MaxRate, CopyTo, Truncate", func() {
			s, err := st.Step(math.Inf(1))
			if err != nil {
				t.Fatal(err)
			}
			s.At((s.T0+s.T1)/2, y)
			s.Rate(s.T0, y)
			_ = s.MaxRate(0, 3) + s.MaxAccel(0, 3)
			s.CopyTo(&seg)
			s.Truncate((s.T0 + s.T1) / 2)
		})
	}
}

func TestSolveAllocatesNothing(t *testing.T) {
	st := newStepper(t, afloat(), afloatTol)
	floor := &hull{60}
	events := map[string][]integrator.EventSpec{
		"no events": nil,
		"plain":     {{Event: stateGap(func(y []float64) float64 { return floor.Value(0, y) }), Slop: 1e-9, Terminal: true}},
		"bounded":   {{Event: floor, Slop: 1e-9, Terminal: true}},
		"several": {
			{Event: floor, Slop: 1e-9, Terminal: true},
			{Event: &hull{40}, Slop: 1e-9},
			{Event: &hull{20}, Slop: 1e-9},
			{Event: stateGap(func(y []float64) float64 { return y[1] - 3 }), Slop: 1e-9, Rising: true},
		},
	}
	for _, name := range []string{"no events", "plain", "bounded", "several"} {
		specs, hits := events[name], 0
		count := func(_ *integrator.Step, h []integrator.Hit) error { hits += len(h); return nil }
		wantNoAllocs(t, name, func() {
			st.Reset(0, afloatStart, integrator.FirstStep(0.1), integrator.MaxStep(5))
			if _, err := integrator.Solve(st, 30, specs, count); err != nil {
				t.Fatal(err)
			}
		})
		if hits == 0 && specs != nil {
			t.Errorf("%s: no hits", name)
		}
	}
}

func TestFinderAllocatesNothing(t *testing.T) {
	st := newStepper(t, afloat(), afloatTol)
	events := []integrator.EventSpec{{Event: &hull{60}, Slop: 1e-9, Terminal: true}}
	var f integrator.Finder
	wantNoAllocs(t, "Finder", func() {
		st.Reset(0, afloatStart)
		if err := f.Start(0, afloatStart, events); err != nil {
			t.Fatal(err)
		}
		for stop := false; !stop; {
			s, err := st.Step(100)
			if err != nil {
				t.Fatal(err)
			}
			if _, stop, err = f.Search(s); err != nil {
				t.Fatal(err)
			}
		}
	})
}
