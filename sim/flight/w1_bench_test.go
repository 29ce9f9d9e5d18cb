package flight_test

import (
	"encoding/csv"
	"fmt"
	"math"
	"os"
	"slices"
	"strconv"
	"testing"

	"offplumb/sim/air"
	"offplumb/sim/flight"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// workload is the workload of testdata/reference/w1: throws in air inside a bare
// cylinder, and their deck offsets (m) in quadruple precision.
type workload struct {
	m      *model.Model
	lets   []flight.Let
	offset []float64
}

// rowsOf reads the numbers of a table, by its columns; names are left as 0.
func rowsOf(t testing.TB, path string) []map[string]float64 {
	t.Helper()
	f, err := os.Open(path)
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	rows, err := csv.NewReader(f).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	var out []map[string]float64
	for _, row := range rows[1:] {
		nums := map[string]float64{}
		for i, field := range row {
			nums[rows[0][i]], _ = strconv.ParseFloat(field, 64)
		}
		out = append(out, nums)
	}
	return out
}

// throws reads the workload, to be flown at a relative tolerance, and the same
// in m and m/s, in a spin that may change.
func throws(t testing.TB, tol float64, changes ...frame.Change) *workload {
	t.Helper()
	in := ring(30, math.Sqrt(0.5*9.80665/30))
	in.Air = air.Air{Density: 1.2041, Viscosity: 1.813e-5}
	in.Habitat.Changes = changes
	in.Solver.RelTol, in.Solver.PosTol, in.Solver.VelTol = tol, tol, tol
	for i, v := range rowsOf(t, "../../testdata/reference/w1/throws.csv") {
		name := fmt.Sprint("w", i)
		in.Bodies = append(in.Bodies, model.Body{Name: name, Mass: v["mass_kg"], Diameter: v["diameter_m"]})
		in.Releases = append(in.Releases, model.Release{Name: name, Body: name, Until: model.Until{Kind: model.UntilLanding},
			At:    model.Station{Height: v["height_m"], Axial: v["axial_m"], Spinward: model.Arc{Value: v["spinward_m"]}},
			Start: model.Start{Kind: model.Velocity, VSpinward: v["v_spinward_m_s"], VAxial: v["v_axial_m_s"], VUp: v["v_up_m_s"]}})
	}
	m, problems := model.New(in)
	if len(problems) > 0 {
		t.Fatal(problems)
	}
	w := &workload{m: m}
	for i := range m.Releases {
		let, problem := flight.Release(m, &m.Releases[i], nil)
		if problem.Msg != "" {
			t.Fatal(problem)
		}
		w.lets = append(w.lets, let)
	}
	for _, v := range rowsOf(t, "../../testdata/reference/w1/landings.csv") {
		w.offset = append(w.offset, v["offset_m"])
	}
	return w
}

// off gives the errors of the landings' offsets, m, in rising order.
func (w *workload) off(t testing.TB) []float64 {
	t.Helper()
	f := flight.NewFlier(w.m)
	var off []float64
	for i := range w.lets {
		track, err := f.Fly(&w.lets[i])
		if err != nil || track.Landing() == nil {
			t.Fatal(err)
		}
		q := frame.PolarOf(track.Landing().State.Pos)
		off = append(off, math.Abs(30*frame.WrapAngle(q.Phi-w.lets[i].Place.Phi)-w.offset[i]))
	}
	slices.Sort(off)
	return off
}

// BenchmarkW1 flies the workload: one operation is one throw, from its release
// to its landing. With the time go the 99th percentile of the error in deck
// offset, in nm, and the integration's work.
func BenchmarkW1(b *testing.B) {
	for _, tol := range []float64{1e-4, 1e-5, 1e-6, 1e-7, 1e-8, 1e-9, 1e-10, 1e-12} {
		b.Run(fmt.Sprintf("%.0e", tol), func(b *testing.B) {
			w := throws(b, tol)
			off := w.off(b)
			f, track := flight.NewFlier(w.m), &flight.Track{}
			var work flight.Work
			n := 0
			b.ReportAllocs()
			for b.Loop() {
				if err := f.FlyAgain(track, &w.lets[n%len(w.lets)]); err != nil {
					b.Fatal(err)
				}
				work.Steps += track.Work.Steps
				work.Rejected += track.Work.Rejected
				work.Derivs += track.Work.Derivs
				n++
			}
			b.ReportMetric(1e9*off[len(off)*99/100], "nm-p99")
			b.ReportMetric(float64(work.Derivs)/float64(n), "derivs/op")
			b.ReportMetric(float64(work.Steps)/float64(n), "steps/op")
			b.ReportMetric(float64(work.Rejected)/float64(n), "rejected/op")
		})
	}
}

// TestFlightsAllocateNothingBySteps flies the workload at tolerances that take
// five and sixty steps a throw, in the space of one track.
func TestFlightsAllocateNothingBySteps(t *testing.T) {
	for _, tol := range []float64{1e-6, 1e-12} {
		w := throws(t, tol)
		f, track := flight.NewFlier(w.m), &flight.Track{}
		round := func() {
			for i := range w.lets {
				if err := f.FlyAgain(track, &w.lets[i]); err != nil {
					t.Fatal(err)
				}
			}
		}
		round() // until the track has the space of the longest
		const each = 2
		if got := testing.AllocsPerRun(3, round) / float64(len(w.lets)); got > each {
			t.Errorf("tolerance %g: %g allocations a throw, want %d at most", tol, got, each)
		}
	}
}

// TestFlyAgainIsFly tries that a track in the space of others is the same.
func TestFlyAgainIsFly(t *testing.T) {
	w := throws(t, 1e-9)
	f, track := flight.NewFlier(w.m), &flight.Track{}
	for i := range w.lets[:50] {
		if err := f.FlyAgain(track, &w.lets[i]); err != nil {
			t.Fatal(err)
		}
		other, err := flight.NewFlier(w.m).Fly(&w.lets[i])
		if err != nil {
			t.Fatal(err)
		}
		if track.Last != other.Last || track.End != other.End || track.Work != other.Work || len(track.Phases) != len(other.Phases) {
			t.Fatalf("throw %d ends at %v, %g s, alone at %v, %g s", i, track.Last, track.End, other.Last, other.End)
		}
		for _, share := range []float64{0.1, 0.5, 0.9} {
			if at := share * track.End; track.At(at) != other.At(at) {
				t.Fatalf("throw %d at %g s: %v, alone %v", i, at, track.At(at), other.At(at))
			}
		}
	}
}
