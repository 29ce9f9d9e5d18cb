package scenarios_test

import (
	"context"
	"math"
	"strings"
	"testing"

	"offplumb/scenarios"
	"offplumb/sim/flight"
	"offplumb/sim/study"
)

// runExample runs a shipped scenario.
func runExample(t *testing.T, name string) (*study.Prepared, []study.Result) {
	t.Helper()
	e, ok := scenarios.ExampleNamed(name)
	if !ok {
		t.Fatalf("there is no %s", name)
	}
	sc, err := scenarios.Load(name+".toml", e.Files[0].Data, scenarios.Options{})
	if err != nil {
		t.Fatal(err)
	}
	p, problems := study.Prepare(sc.Model)
	if len(problems) > 0 {
		t.Fatal(problems)
	}
	results, err := p.Run(context.Background(), study.Options{Workers: 1})
	if err != nil {
		t.Fatal(err)
	}
	return p, results
}

// TestStoriesOfSpinDown tries when the loose things of a shipped spin-down let
// go, from 6 rpm to none in 25 s: on the floor and over the middle of a bench,
// where 6 u (1 - u)/25 s is mu 0.628 (1 - 3u^2 + 2u^3)^2 rad/s; and that nothing
// is held at the end.
func TestStoriesOfSpinDown(t *testing.T) {
	slips := func(mu float64) float64 {
		lo, hi := 0.0, 1.0
		for range 60 {
			u := (lo + hi) / 2
			if rate := 1 - u*u*(3-2*u); 6*u*(1-u)/25 < mu*0.2*math.Pi*rate*rate {
				lo = u
			} else {
				hi = u
			}
		}
		return 4 + 25*lo
	}
	_, results := runExample(t, "spin-down-galley")
	for _, c := range []struct {
		name string
		mu   float64
	}{{"tin on the bench", 0.3}, {"tin on the shelf", 0.15}, {"tool box on the floor", 0.6}} {
		found := false
		for i := range results {
			if tr := results[i].Track; tr.Release.Name == c.name {
				found = true
				if p := &tr.Phases[0]; p.Kind != flight.Rest || math.Abs(p.T1-slips(c.mu)) > 1e-9 {
					t.Errorf("%s: %v until %.12g s, want %.12g s", c.name, p.Kind, p.T1, slips(c.mu))
				}
			}
		}
		if !found {
			t.Errorf("no %s", c.name)
		}
	}
	for i := range results {
		if r := &results[i]; r.Rest.Outcome != flight.TimeUp {
			t.Errorf("%s: %s", r.Landing.Release, r.Rest.Story)
		}
	}
	if s := results[0].Rest.Story; !strings.HasPrefix(s, "rests on bench top until 15.5 s; slides ") || !strings.HasSuffix(s, "floats where it is at 45.0 s, held by nothing") {
		t.Error(s)
	}
}

// TestStoriesOfSpinUp tries the shipped spin-up: at its start the demand for
// friction is 4/60 by 1/60 of a turn squared, (4/60)/(2 pi/60), 0.64: more than
// the smooth shelf and the floor give, less than the rough shelf does.
func TestStoriesOfSpinUp(t *testing.T) {
	_, results := runExample(t, "shelf-spin-up")
	for i, want := range []string{"rests on smooth shelf top until 10.0 s; slides 0.750 m on smooth shelf top; touches floor ",
		"starts on rough shelf top; rests at 0 s", "starts on floor; rests on floor until 10.0 s; slides "} {
		if s := results[i].Rest.Story; !strings.HasPrefix(s, want) {
			t.Errorf("%s: %s", results[i].Landing.Release, s)
		}
	}
}

// TestConingSwings tries that in the shipped coning ring landings half a swing
// apart lie on opposite sides along the axis, and alike along the deck.
func TestConingSwings(t *testing.T) {
	_, results := runExample(t, "coning-ring")
	a, b := &results[0].Landing, &results[2].Landing
	if a.OffsetAxial > -0.015 || b.OffsetAxial < 0.015 || math.Abs(a.Offset-b.Offset) > 0.005 {
		t.Errorf("axially %g m and %g m, along %g m and %g m", a.OffsetAxial, b.OffsetAxial, a.Offset, b.Offset)
	}
}
