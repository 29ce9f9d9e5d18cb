package integrator

import (
	"errors"
	"math"
)

// DefaultMaxSteps limits the trial steps between one Reset and the next:
// about a second of computing, after which a run is more likely lost than
// slow.
const DefaultMaxSteps = 1_000_000

// Stepper advances a system step by step. It owns the workspace and serves
// one goroutine.
type Stepper struct {
	tab  *Tableau
	sys  System
	norm norm
	ctl  controller

	rows []row // stage i of the method
	last row   // y1
	diff row   // error
	poly []row // dense output, one for each power of theta
	six  *six  // the same written out, or nil

	t      float64     // start of the current step
	y0, y1 []float64   // state there, and after the trial
	k      [][]float64 // stages
	arg    []float64   // argument of a stage
	err    []float64   // estimated error
	zero   []float64

	step     Step
	stats    Stats
	maxSteps int
	started  bool // Reset was called
	pending  bool // step holds an accepted step, which the next one starts from
	moved    bool // step was truncated, so its last stage is of no use
	fresh    bool // no Solve since Reset: events start anew
	aims     bool // an event tells where steps ought to end
	find     Finder
}

// Stats counts the work since the last Reset.
type Stats struct {
	Accepted int // steps
	Rejected int // trial steps whose error was too large
	Derivs   int // calls of Deriv
}

// NewStepper returns a stepper for sys. It must be Reset before its first
// step. The tableau and the tolerances are not to be changed afterwards; what
// stands behind sys may be, between a run and the next Reset, if Dim remains.
func NewStepper(tab *Tableau, sys System, tol Tol) (*Stepper, error) {
	if tab == nil || sys == nil {
		return nil, errors.New("integrator: no tableau or no system")
	}
	dim := sys.Dim()
	if dim < 1 {
		return nil, errors.New("integrator: system without components")
	}
	if err := errors.Join(tab.check(), tol.check(dim)); err != nil {
		return nil, err
	}
	st := &Stepper{tab: tab, sys: sys, norm: newNorm(tol, dim), ctl: newController(tab)}
	st.six = newSix(tab, dim)
	st.makeRows()
	st.makeSpace(dim)
	return st, nil
}

func (st *Stepper) makeRows() {
	tab := st.tab
	for _, a := range tab.A {
		st.rows = append(st.rows, newRow(a))
	}
	st.last, st.diff = newRow(tab.B), newRow(tab.E)
	for p := range tab.P[0] {
		column := make([]float64, len(tab.P))
		for i := range column {
			column[i] = tab.P[i][p]
		}
		st.poly = append(st.poly, newRow(column))
	}
}

func (st *Stepper) makeSpace(n int) {
	s, powers := len(st.tab.B), len(st.poly)
	space := make([]float64, (s+5+1+powers)*n)
	take := func(size int) []float64 {
		part := space[:size:size]
		space = space[size:]
		return part
	}
	st.y0, st.y1, st.arg, st.err, st.zero = take(n), take(n), take(n), take(n), take(n)
	for range s {
		st.k = append(st.k, take(n))
	}
	st.step.seg = Segment{dim: n, coef: take((1 + powers) * n)}
}

// Option is a setting of a Reset: [FirstStep], [MaxStep], [MaxSteps].
type Option struct {
	kind  optionKind
	value float64
}

type optionKind int

const (
	firstStep optionKind = iota
	maxStep
	maxSteps
)

// FirstStep suggests the first step, in the unit of time; 0: automatic.
func FirstStep(h float64) Option { return Option{firstStep, h} }

// MaxStep limits the steps, in the unit of time; 0: no limit. The step that
// ends at the end may be 1 % longer, so as to leave no splinter.
func MaxStep(h float64) Option { return Option{maxStep, h} }

// MaxSteps limits the trial steps until the next Reset; 0: DefaultMaxSteps.
func MaxSteps(n int) Option { return Option{maxSteps, float64(n)} }

// Reset starts a run at time t0 from y0, which it copies. It is required
// after any jump of the state or of the equations, because a step uses the
// derivative that the last one ended with. It panics if y0 has not Dim
// components or an option is negative or not a number.
func (st *Stepper) Reset(t0 float64, y0 []float64, opts ...Option) {
	if len(y0) != len(st.y0) {
		panic("integrator: Reset with a state of the wrong length")
	}
	copy(st.y0, y0)
	st.t = t0
	st.ctl.reset()
	st.maxSteps = DefaultMaxSteps
	for _, o := range opts {
		st.set(o)
	}
	st.stats = Stats{}
	st.started, st.pending, st.moved, st.fresh = true, false, false, true
	st.deriv(t0, st.y0, st.k[0])
}

func (st *Stepper) set(o Option) {
	if !(o.value >= 0) {
		panic("integrator: Reset with an option that is negative or not a number")
	}
	if o.value == 0 {
		return
	}
	switch o.kind {
	case firstStep:
		st.ctl.next = o.value
	case maxStep:
		st.ctl.max = o.value
	case maxSteps:
		st.maxSteps = int(o.value)
	}
}

// State returns the time and the state reached. The slice is the stepper's
// own, valid until the next Step or Reset.
func (st *Stepper) State() (t float64, y []float64) {
	if st.pending {
		return st.step.T1, st.step.Y1
	}
	return st.t, st.y0
}

// Stats returns the work since the last Reset.
func (st *Stepper) Stats() Stats { return st.stats }

// NextStep returns the length that the next step would have, in the unit of
// time: what to give FirstStep if a run goes on after a small jump. 0: not
// known yet.
func (st *Stepper) NextStep() float64 { return min(st.ctl.next, st.ctl.max) }

// Step takes one accepted step toward tEnd and not beyond; a step that reaches
// it has T1 = tEnd exactly. The step is valid until the next Step or Reset.
// tEnd may be infinite, or nearer than the step that the error would allow:
// that shortens this step, to end it at a predicted contact for instance, and
// leaves the ones after it their length.
//
// It fails with a [StepError], and the state remains as it was. It panics
// before the first Reset.
func (st *Stepper) Step(tEnd float64) (*Step, error) {
	if !st.started {
		panic("integrator: Step before Reset")
	}
	st.commit()
	if !(tEnd > st.t) {
		return nil, st.fail(Backward, tEnd-st.t)
	}
	if st.ctl.next == 0 && !st.guess(tEnd) {
		return nil, st.fail(NonFinite, 0)
	}
	for st.stats.Accepted+st.stats.Rejected < st.maxSteps {
		t1, cut := st.ctl.end(st.t, tEnd)
		h := t1 - st.t // as rounded, so that theta is 1 at t1
		sq := st.trial(h, t1)
		if sq <= 1 {
			st.ctl.accept(h, sq, cut)
			st.stats.Accepted++
			return st.keep(t1, h), nil
		}
		st.stats.Rejected++
		if reason := st.ctl.reject(st.t, h, sq); reason != "" {
			return nil, st.fail(reason, h)
		}
	}
	return nil, st.fail(TooMany, st.NextStep())
}

// commit makes the end of the accepted step the start of the next.
func (st *Stepper) commit() {
	if !st.pending {
		return
	}
	st.t = st.step.T1
	st.y0, st.y1 = st.y1, st.y0
	if end := len(st.k) - 1; st.tab.FSAL && !st.moved {
		st.k[0], st.k[end] = st.k[end], st.k[0]
	} else {
		st.deriv(st.t, st.y0, st.k[0])
	}
	st.pending, st.moved = false, false
}

// keep records the accepted trial.
func (st *Stepper) keep(t1, h float64) *Step {
	st.pending = true
	s := &st.step
	s.st = st
	s.T0, s.T1, s.Y0, s.Y1 = st.t, t1, st.y0, st.y1
	s.h, s.dense = h, false
	return s
}

// trial computes y1 at t1 = t + h and returns the square of the error's norm.
func (st *Stepper) trial(h, t1 float64) float64 {
	if st.six != nil {
		return st.six.trial(st, h, t1)
	}
	end := len(st.k) - 1
	for i := 1; i <= end; i++ {
		arg, t := st.arg, t1
		if st.tab.FSAL && i == end {
			arg = st.y1
		}
		if c := st.tab.C[i]; c != 1 {
			t = st.t + c*h
		}
		st.rows[i].add(arg, st.y0, h, st.k)
		st.deriv(t, arg, st.k[i])
	}
	if !st.tab.FSAL {
		st.last.add(st.y1, st.y0, h, st.k)
	}
	st.diff.add(st.err, st.zero, h, st.k)
	return st.norm.squared(st.err, st.y0, st.y1)
}

func (st *Stepper) deriv(t float64, y, dy []float64) {
	st.stats.Derivs++
	st.sys.Deriv(t, y, dy)
}

// guess finds the first step (Hairer, Norsett & Wanner I, section II.4,
// "Starting step size"; from memory): an Euler step that changes the state by
// a hundredth gives the size of the second derivative, and the step is where
// the leading error would be a hundredth of the tolerance. It reports whether
// state and derivative are finite.
func (st *Stepper) guess(tEnd float64) bool {
	y, f := st.y0, st.k[0]
	d0 := math.Sqrt(st.norm.squared(y, y, y))
	d1 := math.Sqrt(st.norm.squared(f, y, y))
	if !(d0 <= math.MaxFloat64 && d1 <= math.MaxFloat64) {
		return false
	}
	h0 := 1e-6
	if d0 >= 1e-5 && d1 >= 1e-5 {
		h0 = 0.01 * d0 / d1
	}
	h0 = min(h0, st.ctl.max, tEnd-st.t)
	for i := range y {
		st.arg[i] = y[i] + h0*f[i]
	}
	st.deriv(st.t+h0, st.arg, st.y1)
	for i := range y {
		st.err[i] = st.y1[i] - f[i]
	}
	d2 := math.Sqrt(st.norm.squared(st.err, y, y)) / h0
	st.ctl.first(h0, d1, d2)
	return true
}

func (st *Stepper) fail(reason Reason, h float64) error {
	return &StepError{T: st.t, H: h, Reason: reason}
}
