package flight

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/air"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// around is the air about a body where it has a draft, layers of density, or
// buoyancy. With the air's velocity u, of the habitat's turning and the draft,
// and its acceleration Du/Dt at the body's place (inertial components)
//
//	(m + c M) dv/dt = F(v - u) + (1 + c) M Du/Dt + (m - M) g
//
// where M is the mass of the air displaced, c = 1/2 the share of it that a
// sphere carries along (Lamb, Hydrodynamics, section 92; Batchelor, An
// Introduction to Fluid Dynamics, section 6.8), F the drag, and g an ambient
// gravity, which the air feels too. M Du/Dt is the force of the pressure, -grad p
// times the volume, and c M (Du/Dt - dv/dt) that of the added mass: the equation
// of Maxey & Riley, Phys. Fluids 26 (1983) 883, with the drag of finite Reynolds
// numbers in place of Stokes', and without the history force and the terms of
// the air's curvature over the body's size (all from memory). In air that turns
// like a solid Du/Dt points to the axis, omega^2 r strong, and what is lighter
// than air rises.
//
// A draft w is steady in the habitat, so that (Taylor, Classical Mechanics, eq.
// 9.34, from memory)
//
//	Du/Dt = (w . grad) w + 2 omega x w + omega x (omega x r) + domega/dt x r
type around struct {
	floor  float64 // m, from which heights count
	core   float64 // m, within which a draft round the axis or to it fades
	draft  *air.Draft
	layers air.Layers
	mass   float64 // kg
	moved  float64 // kg, of the air displaced at the floor; 0 without buoyancy
}

// addedShare is the added mass of a sphere by that of the air displaced.
const addedShare = 0.5

// newAround gives what the air does to a body; nil where it only drags.
func newAround(m *model.Model, b model.Body, f *Forces) *around {
	w := &m.Weather
	if f.drag.None() || w.Draft == nil && !w.Stratified && !w.Buoyant {
		return nil
	}
	out := &around{floor: m.Habitat.FloorRadius, core: model.DraftCore * m.Habitat.FloorRadius, draft: w.Draft, layers: m.Layers(), mass: b.Mass}
	if w.Buoyant {
		out.moved = m.Displaced(b)
	}
	return out
}

// here is the air at a place, and what it and fields do there but for drag.
type here struct {
	wind    r3.Vec  // m/s, of the air, inertial components
	rest    r3.Vec  // m/s^2, acceleration but for drag
	density float64 // by that at the floor
	perMass float64 // 1/kg, by the inertia of the body and what it carries along
}

// drag gives the acceleration by drag of a body with a velocity (m/s, inertial).
func (h *here) drag(f *Forces, vel r3.Vec) r3.Vec {
	rel := r3.Sub(vel, h.wind)
	return r3.Scale(-h.perMass*h.rate(f, r3.Norm2(rel)), rel)
}

// rate is the drag by speed, kg/s, at a square of the speed relative to the air.
// Density counts through the Reynolds number alone.
func (h *here) rate(f *Forces, speed2 float64) float64 {
	return f.drag.PerVelocity2(h.density * h.density * speed2)
}

// at gives the air at an inertial place (m).
func (w *around) at(f *Forces, t float64, pos r3.Vec) here {
	h := here{density: 1, perMass: f.perMass}
	a := f.motion.At(t)
	q := a.In(pos)
	h.density = w.layers.Share(math.Hypot(q.X, q.Y))
	draft, bend := w.flow(q)
	h.wind = r3.Add(r3.Cross(a.Omega, pos), a.Out(draft))
	if w.moved > 0 {
		moved := h.density * w.moved
		h.perMass = 1 / (w.mass + addedShare*moved)
		pushed := r3.Sub(bend, a.Apparent(frame.State{Pos: q, Vel: draft}).Sum())
		h.rest = r3.Scale((1+addedShare)*moved*h.perMass, a.Out(pushed))
	}
	return h
}

// weigh adds what ambient fields do.
func (h *here) weigh(f *Forces, w *around, t float64, s frame.State) {
	share := 1.0
	if w != nil && w.moved > 0 {
		share = (w.mass - h.density*w.moved) * h.perMass
	}
	for _, g := range f.fields {
		h.rest = r3.Add(h.rest, r3.Scale(share, g.Accel(t, s)))
	}
}

func (w *around) accel(f *Forces, t float64, s frame.State) r3.Vec {
	h := w.at(f, t, s.Pos)
	h.weigh(f, w, t, s)
	return r3.Add(h.drag(f, s.Vel), h.rest)
}

// flow gives the draft w (m/s) at a place, and its change along itself, (w .
// grad) w (m/s^2), in habitat components: in cylindrical ones
//
//	w_r w_r' - w_phi^2/r,  w_r w_phi' + w_r w_phi/r,  w_r w_z'
func (w *around) flow(q r3.Vec) (draft, bend r3.Vec) {
	if w.draft == nil {
		return
	}
	r := math.Hypot(q.X, q.Y)
	if r == 0 {
		r = math.SmallestNonzeroFloat64
		q.X = r
	}
	v, rate := w.draft.At(w.floor - r)
	fade, slope := w.fade(r)
	out, round, along := -v[air.Up]*fade, v[air.Spinward]*fade, v[air.Axial]
	outs, rounds, alongs := rate[air.Up]*fade-v[air.Up]*slope, v[air.Spinward]*slope-rate[air.Spinward]*fade, -rate[air.Axial]
	turn := round / r
	br, bp, bz := out*outs-turn*round, out*(rounds+turn), out*alongs
	cos, sin := q.X/r, q.Y/r
	return r3.Vec{X: out*cos - round*sin, Y: out*sin + round*cos, Z: along}, r3.Vec{X: br*cos - bp*sin, Y: br*sin + bp*cos, Z: bz}
}

// fade is the share of a draft round the axis, or to it, that is there at a
// distance from it (m), and its rate (1/m): (3x - x^3)/2 of the share x of the
// core, so that the air turns like a solid on the axis, without a kink.
func (w *around) fade(r float64) (share, rate float64) {
	x := r / w.core
	if x >= 1 {
		return 1, 0
	}
	return x * (3 - x*x) / 2, 1.5 * (1 - x*x) / w.core
}
