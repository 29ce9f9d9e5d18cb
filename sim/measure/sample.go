package measure

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/flight"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// MaxRows bounds the rows of one track or crew table: a longer one is sampled
// at a whole multiple of the output step. At about 300 bytes a row the file
// stays below 30 MB.
const MaxRows = 100_000

// Sample is a track at one instant. SI units.
type Sample struct {
	Time                               float64
	Phase                              string
	Inertial, Local                    frame.State
	Polar                              frame.Polar // Phi not wrapped
	Arc, Axial, Offset, Height         float64
	VSpinward, VAxial, VUp             float64
	Centrifugal, Coriolis, Euler, Drag float64
}

// Times gives the instants from 0 to end, step apart, with the end as the
// last, and the step that was taken: a whole multiple of the one asked for
// where there would be more than MaxRows.
func Times(end, step float64) ([]float64, float64) {
	step *= math.Max(1, math.Ceil(end/step/MaxRows))
	n := int(end / step)
	out := make([]float64, 0, n+2)
	for i := 0; i <= n; i++ {
		out = append(out, float64(i)*step)
	}
	// A last step of rounding size is no instant of its own.
	if last := out[len(out)-1]; end-last > 1e-9*step {
		return append(out, end), step
	}
	out[len(out)-1] = end
	return out, step
}

// Samples gives a track at the output step, from its dense output, the end
// (contact, where there is one) last. It also gives the step taken.
func Samples(m *model.Model, t *flight.Track, drag *flight.Forces) ([]Sample, float64) {
	times, step := Times(t.End, m.Output.Step)
	out := make([]Sample, len(times))
	w := NewWinding(m, t)
	g := GroundOf(m, t)
	knots := append(t.Knots(), math.Inf(1))
	for i, k := 0, 0; i < len(times); i++ {
		for knots[k] < times[i] {
			w.To(knots[k])
			k++
		}
		out[i] = sampleAt(m, t, &g, times[i], w.To(times[i]), drag)
	}
	return out, step
}

func sampleAt(m *model.Model, t *flight.Track, g *Ground, time, round float64, forces *flight.Forces) Sample {
	a := m.Motion.At(t.Begin + time)
	s := t.At(time)
	local := a.ToHabitat(s)
	p := frame.PolarOf(local.Pos)
	p.Phi = t.Start.Phi + round
	out := Sample{Time: time, Inertial: s, Local: local, Polar: p, Offset: g.Offset(round)}
	out.Arc, out.Axial, out.Height = g.Place(local.Pos, round)
	if n := len(t.Phases); n > 0 && time >= t.End {
		out.Phase = t.Phases[n-1].Kind.String()
	} else if n > 0 {
		out.Phase = t.Phases[t.PhaseAt(time)].Kind.String()
	}
	out.VSpinward, out.VAxial, out.VUp = g.Split(local.Vel, p.Phi)
	ap := a.Apparent(local)
	out.Centrifugal, out.Coriolis, out.Euler = r3.Norm(ap.Centrifugal), r3.Norm(ap.Coriolis), r3.Norm(ap.Euler)
	if m.IsOutside(local.Pos) {
		out.Offset = math.NaN()
	} else {
		out.Drag = r3.Norm(forces.Drag(t.Begin+time, s))
	}
	return out
}
