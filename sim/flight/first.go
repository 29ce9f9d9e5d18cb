package flight

import "math"

const (
	// firstShare is the size of the leading error of a step of the method, in
	// units of the departure that drag makes in it times the fifth power of the
	// step's share of the time scale; tried out. It steers the first step alone,
	// which the control of steps corrects.
	firstShare = 0.3
	// freeTurn is the first step, in rad of the habitat's turning, of a body on
	// which nothing acts: any would do.
	freeTurn = 0.5
)

// firstStep suggests the first step of a flight, s: that of which the leading
// error is what the tolerances allow. The motion changes over the time in which
// drag slows the body, or the habitat turns. 0 where other forces act.
func (f *Flier) firstStep() float64 {
	if len(f.free.forces.fields) > 0 || f.free.forces.around != nil {
		return 0
	}
	omega, _ := f.m.Motion.Bounds(f.free.begin, f.free.begin)
	time, acc := f.free.relaxation()
	if acc == 0 {
		return freeTurn / math.Max(omega, slowest)
	}
	scale := 1 / (1/time + omega)
	s := &f.m.Solver
	h := scale
	for range 2 {
		h = scale * math.Exp(0.2*math.Log((s.RelTol+s.VelTol/(acc*h))/firstShare))
	}
	if !(h >= 0 && h <= math.MaxFloat64) {
		return 0 // beyond the range of numbers
	}
	return h
}
