package model

import (
	"math"

	"offplumb/sim/air"
)

// Weather is what the air does beside turning with the habitat.
type Weather struct {
	Temperature float64    // K; 0: not known
	Draft       *air.Draft // nil: none
	Stratified  bool       // its density falls toward the axis
	Buoyant     bool       // bodies feel its pressure and its added mass
}

const (
	// DraftCore is the share of the reference floor's radius within which the
	// spinward and upward parts of a draft fade to nothing on the axis, where
	// those directions have no meaning.
	DraftCore = 0.05
	// layersMatter and buoyancyMatters are the shares of the density over the
	// habitat, and of a body's weight, above which leaving them out is told.
	layersMatter    = 0.01
	buoyancyMatters = 0.01
)

// AirTemperature is that of the air, K; where it is not known, the default.
func (m *Model) AirTemperature() float64 {
	if m.Weather.Temperature > 0 {
		return m.Weather.Temperature
	}
	return air.DefaultTemperature
}

// Layers is how the density of the air falls toward the axis, at the spin at
// time 0; uniform unless the scenario asks.
func (m *Model) Layers() air.Layers {
	if !m.Weather.Stratified {
		return air.Layers{Floor: m.Habitat.FloorRadius}
	}
	return air.LayersOf(m.Habitat.FloorRadius, m.Habitat.Spin, m.AirTemperature())
}

// AirAt is the air at a distance from the axis, m.
func (m *Model) AirAt(r float64) air.Air {
	a := m.Air
	if m.Weather.Stratified {
		a.Density *= m.Layers().Share(r)
	}
	return a
}

// Displaced is the mass of the air that a body takes the place of at the
// reference floor, kg.
func (m *Model) Displaced(b Body) float64 {
	return m.Air.Density * math.Pi / 6 * b.Diameter * b.Diameter * b.Diameter
}

// weather checks what the air does.
func (c *checker) weather() {
	m := c.m
	w := &m.Weather
	if m.Air.Vacuum() && (w.Draft != nil || w.Stratified || w.Buoyant) {
		c.fault("air", "", "a vacuum has no draft, no layers and no buoyancy")
		return
	}
	if w.Stratified && w.Temperature == 0 {
		c.fault("air.stratified", `write temperature = "20 °C" beside density and viscosity`, "wants the temperature of the air")
	}
	if w.Stratified && m.Unsteady() {
		c.fault("air.stratified", "leave it out: the density is then the same everywhere",
			"wants a steady spin: how layers of air follow a spin change or a coning is not modelled")
	}
	if d := w.Draft; d != nil {
		if sound := air.SoundSpeed(m.AirTemperature()); d.Fastest() >= sound {
			c.fault("air.draft", "", "wants speeds below that of sound, %.4g m/s, got %.4g m/s", sound, d.Fastest())
		}
	}
}

// LayersLeftOut is by what share the density would differ between the floor
// and the ceiling, or the axis, if the scenario asked for layers; 0 where it
// does, or where that is too little to matter.
func (m *Model) LayersLeftOut() float64 {
	if m.Air.Vacuum() || m.Weather.Stratified {
		return 0
	}
	l := air.LayersOf(m.Habitat.FloorRadius, m.Habitat.Spin, m.AirTemperature())
	if share := 1 - l.Share(m.Habitat.CeilingRadius); share > layersMatter {
		return share
	}
	return 0
}

// BuoyancyLeftOut is buoyancy by weight of a body where the scenario does not
// ask for it; 0 where it does, or where that is too little to matter.
func (m *Model) BuoyancyLeftOut(b Body) float64 {
	if m.Weather.Buoyant || b.Mass <= 0 {
		return 0
	}
	if share := m.Displaced(b) / b.Mass; share > buoyancyMatters {
		return share
	}
	return 0
}
