package measure

import (
	"math"
	"sort"

	"gonum.org/v1/gonum/integrate/quad"
	"offplumb/sim/crew"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// Load is what a person feels and exerts at one instant, with its place for
// the tables. SI units.
type Load struct {
	crew.Loads
	Leg                string
	Arc, Axial, Height float64 // m, of the feet
	Work               float64 // J, of the support's force since the start of the path

	TiltRateSpinward, TiltRateAxial float64 // rad/s
}

// The power is integrated over stretches in which it is smooth, of at most
// powerStretch (s), by a quadrature of the order powerNodes: exact for what a
// ramp along a radius does, a polynomial of degree 7, and to rounding for the
// gentle curves of walks and pitched ladders.
const (
	powerNodes   = 4
	powerStretch = 0.25
)

// LoadSeries gives the loads along a path at the output step, its end last,
// and the step taken.
func LoadSeries(m *model.Model, p *crew.Plan) ([]Load, float64) {
	times, step := Times(p.Duration(), m.Output.Step)
	out := make([]Load, len(times))
	w := worker{power: func(t float64) float64 { return p.Loads(m, t).Power }, breaks: smoothBreaks(m, p)}
	for i, t := range times {
		l := p.Loads(m, t)
		out[i] = Load{Loads: l, Leg: p.LegName(l.Feet.Leg), Work: w.to(t)}
		out[i].Arc, out[i].Axial, out[i].Height = p.Place(m, &l.Feet)
		out[i].TiltRateSpinward, out[i].TiltRateAxial = tiltRate(m, p, t)
	}
	return out, step
}

// tiltStep is the time, in s, over which to either side a tilt is differenced.
// Its third derivative is that of the swing, a few 1/s^3 at most, so that the
// rate is good to 1e-8 rad/s; roundings of 1e-16 make less.
const tiltStep = 1e-4

// tiltRate gives the rates of the tilt, rad/s, by the parabola through three
// instants, the middle one at t, or at the ends of the path next to it.
func tiltRate(m *model.Model, p *crew.Plan, t float64) (spinward, axial float64) {
	h := math.Min(tiltStep, p.Duration()/2)
	mid := math.Min(math.Max(t, h), p.Duration()-h)
	a, b, c := p.Loads(m, mid-h), p.Loads(m, mid), p.Loads(m, mid+h)
	rate := func(a, b, c float64) float64 {
		fore, aft := frame.WrapAngle(c-b)/h, frame.WrapAngle(b-a)/h
		return (fore+aft)/2 + (t-mid)/h*(fore-aft)
	}
	return rate(a.TiltSpinward, b.TiltSpinward, c.TiltSpinward), rate(a.TiltAxial, b.TiltAxial, c.TiltAxial)
}

// smoothBreaks gives the times (s from the start of the path) at which the power
// has a kink: those of the path and those of the habitat's motion.
func smoothBreaks(m *model.Model, p *crew.Plan) []float64 {
	out := p.Breaks()
	for at := m.Motion.Stretch(p.Path.Time).End; at < p.Path.Time+p.Duration(); at = m.Motion.Stretch(at).End {
		out = append(out, at-p.Path.Time)
	}
	sort.Float64s(out)
	return out
}

// worker adds up the work of a power.
type worker struct {
	power  func(t float64) float64 // W
	breaks []float64               // s, between which it is smooth; those to come
	at     float64                 // s, up to which it is added up
	sum    float64                 // J
}

// to adds up the work to a later time (s) and gives it, J.
func (w *worker) to(t float64) float64 {
	for len(w.breaks) > 0 && w.breaks[0] < t {
		w.stretch(w.breaks[0])
		w.breaks = w.breaks[1:]
	}
	w.stretch(t)
	return w.sum
}

// stretch adds a stretch in which the power is smooth.
func (w *worker) stretch(t float64) {
	n := math.Ceil((t - w.at) / powerStretch)
	for from, k := w.at, 1.0; k <= n; k++ {
		w.sum += quad.Fixed(w.power, from+(t-from)*(k-1)/n, from+(t-from)*k/n, powerNodes, nil, 0)
	}
	w.at = math.Max(w.at, t)
}
