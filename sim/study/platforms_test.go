package study_test

import (
	"context"
	"errors"
	"math"
	"strings"
	"testing"

	"offplumb/sim/flight"
	"offplumb/sim/measure"
	"offplumb/sim/model"
	"offplumb/sim/study"
)

// shaft is a ring joined to its hub by one spoke, without air, and what falls
// in it.
func shaft(spin, hub, ring, width float64, b model.Body, most float64) model.Model {
	b.Name = "faller"
	return model.Model{
		Habitat:  model.Habitat{Room: model.Room{FloorRadius: ring + 5, Length: 20, CeilingRadius: ring}, Spin: spin},
		Rooms:    []model.Room{{Name: "hub", FloorRadius: hub, Length: 14}},
		Passages: []model.Passage{{Name: "spoke", Spinward: model.Arc{Value: 0.7, IsAngle: true}, FromRadius: hub, ToRadius: ring, Width: width}},
		Bodies:   []model.Body{b},
		Solver:   model.Solver{RelTol: 1e-9, PosTol: 1e-12, VelTol: 1e-12, MaxTime: 60},
		Output:   model.Output{Step: 0.01},
		Spacings: []model.Spacing{{Name: "nets", Passage: "spoke", Body: "faller", MaxSpeed: most}},
	}
}

// platforms places them.
func platforms(t *testing.T, in model.Model) (*model.Model, []measure.Platform) {
	t.Helper()
	m, problems := model.New(in)
	if len(problems) > 0 {
		t.Fatalf("%+v", problems)
	}
	rows, err := study.Platforms(context.Background(), m, &m.Spacings[0])
	if err != nil {
		t.Fatal(err)
	}
	return m, rows
}

// TestPlatformsOfFreeFall tries the spacing where the passage is so wide that
// nothing touches its walls: a body let go at rest at r falls straight in the
// inertial frame and meets a net at rho with v^2 = omega^2 (rho^2 - r^2). So the
// next net stands a body's radius beyond sqrt(rho^2 - (v/omega)^2), to 1 mm.
func TestPlatformsOfFreeFall(t *testing.T) {
	const hub, ring, most, mass, d = 8.0, 22.0, 3.0, 90.0, 0.4
	for _, spin := range []float64{0.4, -0.4} {
		_, rows := platforms(t, shaft(spin, hub, ring, 10, model.Body{Mass: mass, Diameter: d, Friction: 0.3, Restitution: 0.2}, most))
		at := ring
		for i, p := range rows {
			rho := at - d/2
			next := math.Sqrt(rho*rho - most*most/(spin*spin))
			if math.IsNaN(next) || next < hub {
				next = hub
			}
			if math.Abs(p.Radius-at) > 1e-9 || math.Abs(p.Fall-(at-next)) > 1e-3 || p.Fall > at-next+1e-9 {
				t.Errorf("spin %g, net %d: at %.9g m, %.6g m below the next, want %.9g and %.6g", spin, i, p.Radius, p.Fall, at, at-next)
			}
			// A millimetre of fall is worth so much speed.
			v := math.Abs(spin) * math.Sqrt(rho*rho-next*next)
			if slack := 1e-3 * spin * spin * next / v; p.Speed > most || math.Abs(p.Speed-v) > slack+1e-8 {
				t.Errorf("spin %g, net %d: %.9g m/s, want %.9g", spin, i, p.Speed, v)
			}
			if math.Abs(p.From-(p.Radius-p.Fall)) > 1e-6 || math.Abs(p.Energy-mass*p.Speed*p.Speed/2) > 1e-9*p.Energy {
				t.Errorf("spin %g, net %d: worst from %.9g m with %.9g J", spin, i, p.From, p.Energy)
			}
			at = p.Radius - p.Fall // the law above then starts from where the net is
		}
		if math.Abs(at-hub) > 1e-3 {
			t.Errorf("spin %g: the fall onto the last net begins at %g m, want the inner end", spin, at)
		}
		if len(rows) < 6 {
			t.Errorf("spin %g: only %d nets", spin, len(rows))
		}
	}
}

// TestOnePlatformOfHighSpeed tries that where even the fall from the inner end
// is slow enough the outer end alone wants a platform.
func TestOnePlatformOfHighSpeed(t *testing.T) {
	const hub, ring, spin = 8.0, 30.0, 0.4
	// No fall ends faster than one from the axis with nothing lost would.
	_, rows := platforms(t, shaft(spin, hub, ring, 2, model.Body{Mass: 90, Diameter: 0.4, Friction: 0.3}, spin*ring))
	if len(rows) != 1 || rows[0].Radius != ring || rows[0].Fall != ring-hub || rows[0].Speed > spin*ring || rows[0].Speed < spin*ring/3 {
		t.Errorf("%+v", rows)
	}
}

// TestEveryFallIsSlow tries the promise: let go anywhere between two
// platforms, the body touches nothing faster than the limit, walls included,
// up to the platform. With much friction a fall from far, which slides, arrives
// more slowly than one from near, which does not touch the wall.
func TestEveryFallIsSlow(t *testing.T) {
	for _, c := range []struct {
		name                  string
		friction, restitution float64
		width, most           float64
		least, greatest       int // platforms
	}{
		{"bouncing", 0.2, 0.6, 1.8, 4, 4, 20},
		{"rough", 2, 0, 1.8, 4, 2, 20},
		{"rough, slow enough", 2, 0, 1.8, 5, 1, 1},
		{"narrow and rough", 3, 0, 0.9, 2.5, 2, 20},
	} {
		const spin, hub, ring, d = 0.37, 4.0, 31.0, 0.5
		m, rows := platforms(t, shaft(spin, hub, ring, c.width, model.Body{Mass: 96, Diameter: d, Friction: c.friction, Restitution: c.restitution}, c.most))
		if len(rows) < c.least || len(rows) > c.greatest {
			t.Errorf("%s: %d platforms, want %d to %d", c.name, len(rows), c.least, c.greatest)
		}
		fall := 0.0
		for i, p := range rows {
			fall += p.Fall
			if p.Speed > c.most {
				t.Errorf("%s: platform %d is met at %g m/s", c.name, i, p.Speed)
			}
			const tries = 8
			for k := 0.5; k < tries; k++ {
				from := p.Radius - d/2 - (p.Fall-d/2)*k/tries
				// The worst fall is looked for at some heights and between: a limit
				// passed by a hundredth would be none.
				if v := fastest(t, m, from, p.Radius-d/2); v > c.most*1.01 {
					t.Errorf("%s: platform %d at %.4g m, let go at %.4g m: %.4g m/s", c.name, i, p.Radius, from, v)
				}
			}
		}
		if math.Abs(fall-(ring-hub)) > 1e-9 {
			t.Errorf("%s: the falls add up to %g m, want %g", c.name, fall, ring-hub)
		}
	}
}

// fastest is the greatest speed (m/s) at which a body let go at a distance from
// the axis touches anything before it has come as far as another, and that
// there.
func fastest(t *testing.T, m *model.Model, from, to float64) float64 {
	t.Helper()
	in := model.Model{Habitat: m.Habitat, Rooms: m.Rooms, Passages: m.Passages, Bodies: m.Bodies, Solver: m.Solver, Output: m.Output}
	in.Releases = []model.Release{{Name: "r", Body: "faller", At: model.Station{HasRadius: true, Radius: from, Spinward: m.Passages[0].Spinward}}}
	n, problems := model.New(in)
	if len(problems) > 0 {
		t.Fatalf("%+v", problems)
	}
	p, problems := study.Prepare(n)
	if len(problems) > 0 {
		t.Fatalf("%+v", problems)
	}
	res, err := p.Run(context.Background(), study.Options{Workers: 1})
	if err != nil {
		t.Fatal(err)
	}
	rows, _ := measure.Samples(n, res[0].Track, flight.NewForces(n, res[0].Track.Body, nil))
	most := 0.0
	passed := math.Inf(1)
	for i := range rows {
		if s := &rows[i]; s.Polar.R >= to {
			most, passed = math.Hypot(math.Hypot(s.VSpinward, s.VAxial), s.VUp), s.Time
			break
		}
	}
	for _, e := range res[0].Events {
		if e.Kind == measure.Impact && e.Time < passed {
			most = math.Max(most, e.Speed)
		}
	}
	return most
}

// TestPlatformsFaults tries a limit that no spacing holds, a passage that is
// not there, and being stopped.
func TestPlatformsFaults(t *testing.T) {
	in := shaft(0.4, 8, 30, 10, model.Body{Mass: 90, Diameter: 0.4, Friction: 0.5}, 0.01)
	m, problems := model.New(in)
	if len(problems) > 0 {
		t.Fatal(problems)
	}
	if _, err := study.Platforms(context.Background(), m, &m.Spacings[0]); err == nil || !strings.Contains(err.Error(), "no spacing keeps the speed below 0.01 m/s at 30 m") {
		t.Errorf("too slow: %v", err)
	}
	if _, err := study.Platforms(context.Background(), m, &model.Spacing{Passage: "trunk", Body: "faller", MaxSpeed: 1}); err == nil || !strings.Contains(err.Error(), `no passage named "trunk"`) {
		t.Errorf("no passage: %v", err)
	}
	ctx, cancel := context.WithCancelCause(context.Background())
	stopped := errors.New("stopped")
	cancel(stopped)
	if _, err := study.Platforms(ctx, m, &m.Spacings[0]); !errors.Is(err, stopped) {
		t.Errorf("stopped: %v", err)
	}
}
