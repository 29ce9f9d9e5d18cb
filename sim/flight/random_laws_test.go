package flight_test

import (
	"math/rand/v2"
	"os"
	"strconv"
	"testing"

	"offplumb/sim/flight"
)

// Random releases in random habitats end in a stated outcome within the step
// budget, and keep the laws on the way: energy never grows in the frame of the
// surfaces, no normal force pulls, friction stays within its cone, phases join,
// and nothing gets into or off a surface. OFFPLUMB_WORLDS asks for more than the
// usual number of habitats.
func TestRandomTracksKeepTheLaws(t *testing.T) {
	n := 150
	if more, err := strconv.Atoi(os.Getenv("OFFPLUMB_WORLDS")); err == nil {
		n = more
	}
	tracks := 0
	for i := range n {
		m := worlds(rand.New(rand.NewPCG(7, uint64(i))), 5)
		if m == nil {
			continue // the random habitat does not fit together
		}
		f := flight.NewFlier(m)
		for k := range m.Releases {
			let, problem := flight.Release(m, &m.Releases[k], nil)
			if problem.Msg != "" {
				t.Fatal(problem)
			}
			track, err := f.Fly(&let)
			if err != nil {
				t.Errorf("PCG(7, %d), release %d: %v", i, k, err)
				continue
			}
			tracks++
			if track.Work.Steps > flight.MostSteps {
				t.Errorf("PCG(7, %d), release %d: %d steps", i, k, track.Work.Steps)
			}
			if faults := flight.Judge(m, track); len(faults) > 0 {
				t.Errorf("PCG(7, %d), release %d: %q\n%s", i, k, faults, kinds(track))
			}
		}
	}
	if tracks < n {
		t.Errorf("only %d tracks of %d habitats", tracks, n)
	}
}
