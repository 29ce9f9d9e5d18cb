package measure

import (
	"math"

	"offplumb/sim/model"
)

// HabitatFigure is what the habitat as a whole is like, for a person of a
// stature (m) who moves at a speed (m/s), under the spin at time 0; Last tells
// the same after the last change of the spin. SI units.
type HabitatFigure struct {
	Spin, Gravity, RimSpeed float64
	HeadToFoot              float64 // share by which gravity at the head is less than at the feet
	CoriolisRatio           float64 // Coriolis acceleration at the speed, by gravity
	Stature, Speed          float64

	Pulled

	Changes                             bool // the spin does
	LastSpin, LastGravity, LastRimSpeed float64
}

// HabitatOf works out the figures at the reference floor; a stature or speed
// of 0 is the default.
func HabitatOf(m *model.Model, stature, speed float64) HabitatFigure {
	if stature == 0 {
		stature = model.DefaultStature
	}
	if speed == 0 {
		speed = model.DefaultSpeed
	}
	h := &m.Habitat
	out := HabitatFigure{Spin: h.Spin, Gravity: m.Gravity(h.FloorRadius), RimSpeed: h.Spin * h.FloorRadius,
		Stature: stature, Speed: speed, HeadToFoot: model.HeadShare * stature / h.FloorRadius}
	out.CoriolisRatio = 2 * math.Abs(h.Spin) * speed / out.Gravity
	if h.Spin == 0 {
		out.CoriolisRatio = math.NaN()
	}
	out.Pulled = pulledOn(m, h.FloorRadius, middleOf(&m.Decks[0]))
	last := m.SpinAt(m.Settled())
	out.Changes = m.SpinChanges()
	out.LastSpin, out.LastGravity, out.LastRimSpeed = last, last*last*h.FloorRadius, last*h.FloorRadius
	return out
}

// froude is the Froude number v^2/(g l) at which people change from walking to
// running, whatever the gravity (Kram, Domingo & Ferris, J. Exp. Biol. 200,
// 1997, 821-826).
const froude = 0.5

// legLength is the length of a leg as a share of stature (from memory).
const legLength = 0.53

// WalkRunSpeed is the speed, m/s, at which a person of the default stature
// changes from walking to running under a gravity (m/s^2).
func WalkRunSpeed(gravity float64) float64 {
	return math.Sqrt(froude * gravity * legLength * model.DefaultStature)
}

// habitatColumns are those of habitat.csv.
var habitatColumns = []column[HabitatFigure]{
	{key: "spin", unit: turns, meaning: "spin rate, positive: the floor moves spinward", num: func(h *HabitatFigure) float64 { return h.Spin }},
	{key: "floor_gravity", unit: gravity, meaning: "apparent gravity at rest on the reference floor, of the spin alone", num: func(h *HabitatFigure) float64 { return h.Gravity }},
	{key: "rim_speed", unit: speedUnit, meaning: "speed of the reference floor", num: func(h *HabitatFigure) float64 { return h.RimSpeed }},
	{key: "head_to_foot", meaning: "share by which apparent gravity at the head is less than at the feet, standing on the floor; empty under ambient gravity", num: func(h *HabitatFigure) float64 { return h.emptied(h.HeadToFoot) }},
	{key: "coriolis_ratio", meaning: "Coriolis acceleration at the speed, by apparent gravity on the floor; empty under ambient gravity", num: func(h *HabitatFigure) float64 { return h.emptied(h.CoriolisRatio) }},
	{key: "stature", unit: metre, meaning: "stature that head_to_foot is for", num: func(h *HabitatFigure) float64 { return h.Stature }},
	{key: "speed", unit: speedUnit, meaning: "speed that coriolis_ratio is for", num: func(h *HabitatFigure) float64 { return h.Speed }},
	{key: "floor_gravity_least", unit: gravity, pulled: true, meaning: "least apparent gravity at rest on the reference floor, ambient gravity included, as it goes round", num: func(h *HabitatFigure) float64 { return h.Least }},
	{key: "floor_gravity_most", unit: gravity, pulled: true, meaning: "greatest apparent gravity at rest on the reference floor, ambient gravity included, as it goes round", num: func(h *HabitatFigure) float64 { return h.Most }},
	{key: "floor_tilt_most", unit: degree, pulled: true, meaning: "greatest angle of that from the normal of the reference floor, as it goes round: where a plumb bob hangs", num: func(h *HabitatFigure) float64 { return h.Tilt }},
	{key: "last_spin", unit: turns, later: true, meaning: "spin rate after its last change", num: func(h *HabitatFigure) float64 { return h.LastSpin }},
	{key: "last_floor_gravity", unit: gravity, later: true, meaning: "apparent gravity at rest on the reference floor after the last change", num: func(h *HabitatFigure) float64 { return h.LastGravity }},
	{key: "last_rim_speed", unit: speedUnit, later: true, meaning: "speed of the reference floor after the last change", num: func(h *HabitatFigure) float64 { return h.LastRimSpeed }},
}
