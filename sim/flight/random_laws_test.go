package flight_test

import (
	"math/rand/v2"
	"os"
	"strconv"
	"testing"
	"time"

	"offplumb/sim/flight"
	"offplumb/sim/model"
)

// Random releases in random habitats end in a stated outcome within the step
// budget, and keep the laws on the way: energy never grows in the frame of the
// surfaces, no normal force pulls, friction stays within its cone, phases join,
// and nothing gets into or off a surface. OFFPLUMB_WORLDS asks for more than the
// usual number of habitats.
func TestRandomTracksKeepTheLaws(t *testing.T) {
	randomTracks(t, 7, 320, nil)
}

// The same where the spin changes, the axis cones, or both: but for the
// energy, which a habitat that turns unevenly may give.
func TestRandomTracksKeepTheLawsInUnsteadyTurning(t *testing.T) {
	randomTracks(t, 8, 80, turning)
}

// randomTracks flies releases in n habitats of a stream of random numbers, made
// to turn as a function says.
func randomTracks(t *testing.T, stream uint64, n int, turn func(*rand.Rand, *model.Model)) {
	t.Helper()
	if more, err := strconv.Atoi(os.Getenv("OFFPLUMB_WORLDS")); err == nil {
		n = more
	}
	s := tally{outcomes: map[string]int{}, stream: stream}
	for i := range n {
		m := worlds(rand.New(rand.NewPCG(stream, uint64(i))), 5, turn)
		if m == nil {
			continue // the random habitat does not fit together
		}
		f := flight.NewFlier(m)
		for k := range m.Releases {
			s.fly(t, m, f, i, k)
		}
	}
	t.Logf("%d tracks of %d habitats: %v; the slowest took %v, the one of most steps %d; %d forces",
		s.tracks, n, s.outcomes, s.slowest, s.steps, s.forces)
	if s.tracks < n || s.forces < n {
		t.Errorf("only %d tracks and %d forces of %d habitats", s.tracks, s.forces, n)
	}
	for _, o := range []flight.Outcome{flight.Rested, flight.TimeUp} {
		if s.outcomes[o.String()] == 0 {
			t.Errorf("none ends by %q", o)
		}
	}
}

// tally counts random tracks.
type tally struct {
	tracks, steps, forces int
	outcomes              map[string]int
	stream                uint64
	slowest               time.Duration
}

// mostRandomSteps is what a minute may take in integration steps: a tenth of
// the budget of a release of an hour.
const mostRandomSteps = flight.MostSteps / 10

func (s *tally) fly(t *testing.T, m *model.Model, f *flight.Flier, i, k int) {
	t.Helper()
	let, problem := flight.Release(m, &m.Releases[k], nil)
	if problem.Msg != "" {
		t.Fatal(problem)
	}
	start := time.Now()
	track, err := f.Fly(&let)
	s.slowest = max(s.slowest, time.Since(start))
	if err != nil {
		t.Errorf("PCG(%d, %d), release %d: %v", s.stream, i, k, err)
		return
	}
	s.tracks++
	s.outcomes[track.Outcome.String()]++
	s.steps = max(s.steps, track.Work.Steps)
	if track.Work.Steps > mostRandomSteps {
		t.Errorf("PCG(%d, %d), release %d: %d steps", s.stream, i, k, track.Work.Steps)
	}
	faults, forces := flight.Judge(m, track)
	s.forces += forces
	if len(faults) > 0 {
		t.Errorf("PCG(%d, %d), release %d: %q\n%s", s.stream, i, k, faults, kinds(track))
	}
	// One that is stuck is wedged, and not lost in phases without end.
	ends := track.Outcome == flight.Rested || track.Outcome == flight.Stuck
	if rests := len(track.Phases) > 0 && track.Phases[len(track.Phases)-1].Kind == flight.Rest; rests != ends {
		t.Errorf("PCG(%d, %d), release %d: ends by %v: %s", s.stream, i, k, track.Outcome, kinds(track))
	}
}
