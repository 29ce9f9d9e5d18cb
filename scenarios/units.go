package scenarios

import (
	"fmt"
	"math"
	"strconv"
	"strings"

	"offplumb/sim/model"
)

// unit is a unit of a dimension.
type unit struct {
	name   string
	scale  float64 // SI value of one
	offset float64 // SI value of zero
}

// dimension is a kind of quantity.
type dimension struct {
	name    string // with its article, as in "wants a length"
	si      string
	example string
	units   []unit
	most    float64 // SI, the largest magnitude that is taken for meant
}

// The dimensions of the format. The first unit of each is the one that is
// shown; the conversions are exact by definition (SI Brochure; international
// yard and pound agreement 1959).
var (
	length = &dimension{"a length", "m", "1.9 m", []unit{{"m", 1, 0}, {"um", 1e-6, 0}, {"µm", 1e-6, 0}, {"mm", 1e-3, 0}, {"cm", 1e-2, 0},
		{"km", 1e3, 0}, {"in", 0.0254, 0}, {"ft", 0.3048, 0}, {"mi", 1609.344, 0}}, 1e9}
	duration = &dimension{"a time", "s", "2 s", []unit{{"s", 1, 0}, {"ms", 1e-3, 0}, {"min", 60, 0}, {"h", 3600, 0}}, 1e9}
	angle    = &dimension{"an angle", "rad", "30 deg", []unit{{"deg", math.Pi / 180, 0}, {"°", math.Pi / 180, 0}, {"rad", 1, 0}}, 1e6}
	turnRate = &dimension{"an angular speed", "rad/s", "4 rpm", []unit{{"rpm", math.Pi / 30, 0}, {"rad/s", 1, 0}, {"deg/s", math.Pi / 180, 0}}, 1e4}
	speed    = &dimension{"a speed", "m/s", "1.2 m/s", []unit{{"m/s", 1, 0}, {"km/h", 1 / 3.6, 0}, {"mph", 0.44704, 0}, {"ft/s", 0.3048, 0},
		{"cm/s", 1e-2, 0}, {"mm/s", 1e-3, 0}}, 1e6}
	accel       = &dimension{"an acceleration", "m/s^2", "0.5 g", []unit{{"m/s^2", 1, 0}, {"g", model.StandardGravity, 0}, {"ft/s^2", 0.3048, 0}}, 1e6}
	mass        = &dimension{"a mass", "kg", "1.4 kg", []unit{{"kg", 1, 0}, {"mg", 1e-6, 0}, {"ug", 1e-9, 0}, {"ng", 1e-12, 0}, {"g", 1e-3, 0}, {"t", 1e3, 0}, {"lb", 0.45359237, 0}}, 1e9}
	turnAccel   = &dimension{"an angular acceleration", "rad/s^2", "0.1 rad/s^2", []unit{{"rad/s^2", 1, 0}, {"deg/s^2", math.Pi / 180, 0}}, 1e6}
	pressure    = &dimension{"a pressure", "Pa", "70 kPa", []unit{{"Pa", 1, 0}, {"hPa", 100, 0}, {"kPa", 1e3, 0}, {"bar", 1e5, 0}, {"psi", 4.4482216152605 / (0.0254 * 0.0254), 0}}, 1e7}
	temperature = &dimension{"a temperature", "K", "22 °C", []unit{{"°C", 1, 273.15}, {"degC", 1, 273.15}, {"K", 1, 0}}, 2000}
	force       = &dimension{"a force", "N", "200 N", []unit{{"N", 1, 0}, {"kN", 1e3, 0}, {"lbf", 4.4482216152605, 0}}, 1e12}
	energy      = &dimension{"an energy", "J", "12 J", []unit{{"J", 1, 0}, {"kJ", 1e3, 0}}, 1e15}
	power       = &dimension{"a power", "W", "75 W", []unit{{"W", 1, 0}, {"kW", 1e3, 0}}, 1e12}
	density     = &dimension{"a density", "kg/m^3", "1.2 kg/m^3", []unit{{"kg/m^3", 1, 0}}, 1e5}
	viscosity   = &dimension{"a viscosity", "Pa s", "1.8e-5 Pa s", []unit{{"Pa s", 1, 0}}, 1e3}
	inertia     = &dimension{"a moment of inertia", "kg m^2", "0.1 kg m^2", []unit{{"kg m^2", 1, 0}}, 1e15}
	area        = &dimension{"an area", "m^2", "40 cm^2", []unit{{"m^2", 1, 0}, {"cm^2", 1e-4, 0}, {"mm^2", 1e-6, 0}}, 1e9}
)

var dimensions = []*dimension{length, duration, angle, turnRate, speed, accel, mass, turnAccel, pressure, temperature,
	force, energy, power, density, viscosity, inertia, area}

// list names the units of a dimension.
func (d *dimension) list() string {
	var names []string
	for _, u := range d.units {
		names = append(names, u.name)
	}
	return strings.Join(names, ", ")
}

// shown is the unit in which a bound is told: the first, but SI where that
// one's zero is elsewhere.
func (d *dimension) shown() unit {
	if u := d.units[0]; u.offset == 0 {
		return u
	}
	return unit{d.si, 1, 0}
}

// find gives the unit of a name, as split spells it.
func (d *dimension) find(name string) (unit, bool) {
	for _, u := range d.units {
		if spelling.Replace(u.name) == name {
			return u, true
		}
	}
	return unit{}, false
}

// spelling brings the ways of writing a unit to one: m/s^2, m/s² and m/s2 are
// the same, and so are the two letters for micro.
var spelling = strings.NewReplacer("²", "2", "^2", "2", "³", "3", "^3", "3", "·", " ", "\u03bc", "µ")

// split divides a text such as "1.9 m" into number and unit. It fails where
// there is no finite number in front.
func split(text string) (x float64, name string, err error) {
	text = strings.TrimSpace(text)
	n := 0
	for n < len(text) && strings.IndexByte("+-.0123456789", text[n]) >= 0 {
		n++
	}
	// An exponent: e with digits behind it, which no unit has.
	if m := exponent(text[n:]); n > 0 && m > 0 {
		n += m
	}
	x, err = strconv.ParseFloat(text[:n], 64)
	if err != nil || math.IsInf(x, 0) {
		return 0, "", fmt.Errorf("no number in %q", text)
	}
	if name = strings.TrimSpace(text[n:]); name != "" {
		name = spelling.Replace(name)
	}
	return x, name, nil
}

// exponent gives the length of an exponent at the start of a text.
func exponent(s string) int {
	if s == "" || s[0] != 'e' && s[0] != 'E' {
		return 0
	}
	n := 1
	if n < len(s) && (s[n] == '+' || s[n] == '-') {
		n++
	}
	digits := n
	for n < len(s) && s[n] >= '0' && s[n] <= '9' {
		n++
	}
	if n == digits {
		return 0
	}
	return n
}

// quantity is a number with its dimension, in SI.
type quantity struct {
	si  float64
	dim *dimension
}

// measureOf reads a quantity of one of the given dimensions, the first of
// which has the unit where several do. The error names what is wanted, without
// what was found.
func measureOf(text string, dims ...*dimension) (quantity, error) {
	x, name, err := split(text)
	if err != nil {
		return quantity{}, fmt.Errorf("%s", wanted(dims))
	}
	for _, d := range dims {
		u, ok := d.find(name)
		if !ok {
			continue
		}
		si := x*u.scale + u.offset
		if math.Abs(si) > d.most {
			return quantity{}, fmt.Errorf("wants a magnitude of at most %g %s", d.most, d.si)
		}
		return quantity{si, d}, nil
	}
	return quantity{}, fmt.Errorf("%s", wantedUnit(dims))
}

// wanted says what a quantity should look like.
func wanted(dims []*dimension) string {
	if len(dims) > 3 {
		return "wants a number with its unit, or a bare number"
	}
	words := make([]string, len(dims))
	for i, d := range dims {
		words[i] = d.name + fmt.Sprintf(" such as %q", d.example)
	}
	return "wants " + strings.Join(words, " or ")
}

func wantedUnit(dims []*dimension) string {
	if len(dims) > 3 {
		return "wants a number with a unit of the format"
	}
	words := make([]string, len(dims))
	for i, d := range dims {
		words[i] = d.name + " in " + d.list()
	}
	return "wants " + strings.Join(words, " or ")
}
