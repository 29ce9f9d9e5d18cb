package study_test

import (
	"context"
	"errors"
	"reflect"
	"testing"

	"offplumb/sim/measure"
	"offplumb/sim/model"
	"offplumb/sim/study"
)

// dropsFrom is a sweep of n heights (m) from 0 up, a decimetre apart; the odd
// ones are impossible.
func dropsFrom(t testing.TB, n int) *study.Sweep {
	t.Helper()
	p := many(t, 1)
	picks, err := measure.Picks(p.Model, "landings.offset", nil, false)
	if err != nil {
		t.Fatal(err)
	}
	return &study.Sweep{Points: n, Picks: picks, Variant: func(i int) (*study.Prepared, error) {
		if i%2 == 1 {
			return nil, errors.New("odd")
		}
		in := *p.Model
		in.Decks = nil
		in.Releases = []model.Release{p.Model.Releases[0]}
		in.Releases[0].At.Height = 0.1 * float64(i)
		m, problems := model.New(in)
		if problems != nil {
			return nil, errors.New(problems[0].Msg)
		}
		q, problems := study.Prepare(m)
		if problems != nil {
			return nil, errors.New(problems[0].Msg)
		}
		return q, nil
	}}
}

// The same points for any number of workers, each in its place.
func TestSweepWorkersChangeNothing(t *testing.T) {
	s := dropsFrom(t, 31)
	var first []study.Point
	for _, workers := range []int{1, 2, 7, 100} {
		told := 0
		points, err := s.Run(context.Background(), study.Options{Workers: workers, Done: func(int, int) { told++ }})
		if err != nil {
			t.Fatal(err)
		}
		for i := range points {
			p := &points[i]
			// Point 0 lies within the floor, since the ball has a size.
			if bad := i%2 == 1 || i == 0; bad != (p.Fault != nil) || bad != (p.Values == nil) || !p.Finished() {
				t.Fatalf("point %d: %+v", i, p)
			}
			p.Fault = nil // errors are made anew
		}
		if first != nil && !reflect.DeepEqual(points, first) {
			t.Errorf("%d workers give other points than 1", workers)
		}
		if first = points; told != len(points) {
			t.Errorf("%d workers told of %d points of %d", workers, told, len(points))
		}
	}
	for i := 4; i < len(first); i += 2 {
		if !(first[i].Values[0] < first[i-2].Values[0]) {
			t.Errorf("from higher up, point %d is off plumb by %g m, the one below by %g m", i, first[i].Values[0], first[i-2].Values[0])
		}
	}
}

// A sweep that is stopped keeps what it has done and says why it stopped.
func TestSweepStops(t *testing.T) {
	s := dropsFrom(t, 400)
	ctx, cancel := context.WithCancel(context.Background())
	points, err := s.Run(ctx, study.Options{Workers: 2, Done: func(done, _ int) {
		if done == 5 {
			cancel()
		}
	}})
	if !errors.Is(err, context.Canceled) {
		t.Fatalf("error %v", err)
	}
	done := 0
	for i := range points {
		if points[i].Finished() {
			done++
		}
	}
	if done < 5 || done == len(points) {
		t.Errorf("%d of %d points done", done, len(points))
	}
}

// A sweep without points is done at once.
func TestSweepOfNothing(t *testing.T) {
	points, err := (&study.Sweep{}).Run(context.Background(), study.Options{Workers: 3})
	if err != nil || len(points) != 0 {
		t.Errorf("%v, %v", points, err)
	}
}
