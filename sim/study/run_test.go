package study_test

import (
	"context"
	"errors"
	"fmt"
	"reflect"
	"testing"

	"offplumb/sim/measure"
	"offplumb/sim/model"
	"offplumb/sim/study"
)

// many is a scenario of n drops from different heights.
func many(t testing.TB, n int) *study.Prepared {
	t.Helper()
	in := model.Model{
		Habitat: model.Habitat{Room: model.Room{FloorRadius: 18, Length: 14}, Spin: 0.5},
		Solver:  model.Solver{RelTol: 1e-9, PosTol: 1e-12, VelTol: 1e-12, MaxTime: 60},
		Output:  model.Output{Step: 0.01},
		Bodies:  []model.Body{{Name: "b", Mass: 1, Diameter: 0.06, Restitution: 0.4, Friction: 0.3}},
	}
	for i := range n {
		in.Releases = append(in.Releases, model.Release{Name: fmt.Sprint("r", i), Body: "b", NoTrack: i%2 == 1,
			At: model.Station{Height: 0.5 + 0.1*float64(i%100), Axial: 0.1 * float64(i%5)}})
	}
	m, problems := model.New(in)
	if problems != nil {
		t.Fatal(problems)
	}
	p, problems := study.Prepare(m)
	if problems != nil {
		t.Fatal(problems)
	}
	return p
}

// The same results for any number of workers, each in its place. Under the race
// detector this also tries that the workers share nothing that they change.
func TestWorkersChangeNothing(t *testing.T) {
	p := many(t, 24)
	var first []measure.Rest
	for _, workers := range []int{1, 2, 7} {
		told := 0
		results, err := p.Run(context.Background(), study.Options{Workers: workers, Done: func(int, int) { told++ }})
		if err != nil {
			t.Fatal(err)
		}
		var rests []measure.Rest
		for i := range results {
			if name := results[i].Landing.Release; name != p.Lets[i].Release.Name {
				t.Fatalf("result %d is that of %q", i, name)
			}
			if (results[i].Track == nil) != p.Lets[i].Release.NoTrack {
				t.Errorf("%d workers: release %d: track kept: %v", workers, i, results[i].Track != nil)
			}
			rests = append(rests, results[i].Rest)
		}
		if first == nil {
			first = rests
		}
		if !reflect.DeepEqual(rests, first) {
			t.Errorf("%d workers give other results than 1", workers)
		}
		if told != len(results) {
			t.Errorf("%d workers told of %d releases of %d", workers, told, len(results))
		}
	}
}

func TestOnlyWanted(t *testing.T) {
	p := many(t, 6)
	results, err := p.Run(context.Background(), study.Options{Workers: 2, Want: func(r *model.Release) bool { return r.Name == "r3" }})
	if err != nil {
		t.Fatal(err)
	}
	for i := range results {
		if results[i].Finished() != (i == 3) {
			t.Errorf("release %d: finished is %v", i, results[i].Finished())
		}
	}
}

// A run that is stopped keeps what it has done and says why it stopped.
func TestStops(t *testing.T) {
	p := many(t, 200)
	ctx, cancel := context.WithCancel(context.Background())
	results, err := p.Run(ctx, study.Options{Workers: 2, Done: func(done, _ int) {
		if done == 5 {
			cancel()
		}
	}})
	if !errors.Is(err, context.Canceled) {
		t.Fatalf("error %v", err)
	}
	done := 0
	for i := range results {
		if results[i].Finished() {
			done++
		}
	}
	if done < 5 || done == len(results) {
		t.Errorf("%d of %d releases done", done, len(results))
	}
}

// A limit on tracks keeps the tracks that it needs.
func TestLimitsKeepTracks(t *testing.T) {
	p := many(t, 4)
	in := *p.Model
	in.Decks = nil
	in.Limits = []model.Limit{{Name: "l", Of: []string{"release.r1"}, Measure: "tracks.height", Max: &model.Quantity{SI: 5, Unit: "m"}}}
	m, problems := model.New(in)
	if problems != nil {
		t.Fatal(problems)
	}
	q, problems := study.Prepare(m)
	if problems != nil {
		t.Fatal(problems)
	}
	results, err := q.Run(context.Background(), study.Options{Workers: 1})
	if err != nil {
		t.Fatal(err)
	}
	if results[1].Track == nil || results[3].Track != nil {
		t.Error("the wrong tracks are kept")
	}
}

func BenchmarkRun(b *testing.B) {
	p := many(b, 100)
	for b.Loop() {
		if _, err := p.Run(context.Background(), study.Options{Workers: 1}); err != nil {
			b.Fatal(err)
		}
	}
}
