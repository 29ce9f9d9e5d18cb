package scenarios

import (
	"math"
	"math/big"
	"slices"
	"strings"
	"testing"
)

// exact is the exact SI value of one unit: num/den, times pi where turns is
// set, with its zero at offset.
type exact struct {
	num, den string
	turns    bool
	offset   string
}

// defined are the definitions of the units: SI Brochure; the foot, the inch,
// the mile and the pound by the yard and pound agreement of 1959; standard
// gravity 9.80665 m/s^2. lbf = lb times standard gravity, psi = lbf/in^2.
var defined = map[string]map[string]exact{
	"a length": {"m": {num: "1"}, "um": {num: "1", den: "1000000"}, "µm": {num: "1", den: "1000000"}, "mm": {num: "1", den: "1000"},
		"cm": {num: "1", den: "100"}, "km": {num: "1000"}, "in": {num: "0.0254"}, "ft": {num: "0.3048"}, "mi": {num: "1609.344"}},
	"a time":           {"s": {num: "1"}, "ms": {num: "1", den: "1000"}, "min": {num: "60"}, "h": {num: "3600"}},
	"an angle":         {"deg": {num: "1", den: "180", turns: true}, "°": {num: "1", den: "180", turns: true}, "rad": {num: "1"}},
	"an angular speed": {"rpm": {num: "2", den: "60", turns: true}, "rad/s": {num: "1"}, "deg/s": {num: "1", den: "180", turns: true}},
	"a speed": {"m/s": {num: "1"}, "km/h": {num: "1000", den: "3600"}, "mph": {num: "1609.344", den: "3600"}, "ft/s": {num: "0.3048"},
		"cm/s": {num: "1", den: "100"}, "mm/s": {num: "1", den: "1000"}},
	"an acceleration":         {"m/s^2": {num: "1"}, "g": {num: "9.80665"}, "ft/s^2": {num: "0.3048"}},
	"a mass":                  {"kg": {num: "1"}, "mg": {num: "1", den: "1000000"}, "ug": {num: "1", den: "1000000000"}, "ng": {num: "1", den: "1000000000000"}, "g": {num: "1", den: "1000"}, "t": {num: "1000"}, "lb": {num: "0.45359237"}},
	"an angular acceleration": {"rad/s^2": {num: "1"}, "deg/s^2": {num: "1", den: "180", turns: true}},
	"a pressure": {"Pa": {num: "1"}, "hPa": {num: "100"}, "kPa": {num: "1000"}, "bar": {num: "100000"},
		"psi": {num: "4.4482216152605", den: "0.00064516"}},
	"a temperature":       {"K": {num: "1"}, "°C": {num: "1", offset: "273.15"}, "degC": {num: "1", offset: "273.15"}},
	"a force":             {"N": {num: "1"}, "kN": {num: "1000"}, "lbf": {num: "4.4482216152605"}},
	"an energy":           {"J": {num: "1"}, "kJ": {num: "1000"}},
	"a power":             {"W": {num: "1"}, "kW": {num: "1000"}},
	"a density":           {"kg/m^3": {num: "1"}},
	"a viscosity":         {"Pa s": {num: "1"}},
	"a moment of inertia": {"kg m^2": {num: "1"}},
	"an area":             {"m^2": {num: "1"}, "cm^2": {num: "1", den: "10000"}, "mm^2": {num: "1", den: "1000000"}},
}

// pi to 60 digits (from memory; the digits are checked against math.Pi).
const piDigits = "3.14159265358979323846264338327950288419716939937510582097494"

func float(t *testing.T, s string) *big.Float {
	t.Helper()
	if s == "" {
		s = "1"
	}
	x, _, err := big.ParseFloat(s, 10, 200, big.ToNearestEven)
	if err != nil {
		t.Fatal(err)
	}
	return x
}

// si gives the SI value of x of the unit, to 200 bits.
func (e exact) si(t *testing.T, x string) *big.Float {
	out := float(t, x)
	out.Mul(out, float(t, e.num))
	out.Quo(out, float(t, e.den))
	if e.turns {
		out.Mul(out, float(t, piDigits))
	}
	if e.offset != "" {
		out.Add(out, float(t, e.offset))
	}
	return out
}

// unitRounding bounds the relative error of a conversion: the number as read,
// the unit as stored and their product are each rounded once, by half a unit
// of the last place, and so is the sum with an offset.
const unitRounding = 4 * 0x1p-53

func TestUnitsHoldTheirDefinitions(t *testing.T) {
	if p, _ := float(t, piDigits).Float64(); p != math.Pi {
		t.Fatal("pi is wrong")
	}
	for _, d := range dimensions {
		for _, u := range d.units {
			e, ok := defined[d.name][u.name]
			if !ok {
				t.Errorf("%s has the unit %s, which no definition here covers", d.name, u.name)
				continue
			}
			for _, x := range []string{"1", "7.3", "-0.041", "97", "0"} {
				q, err := measureOf(x+" "+u.name, d)
				if err != nil {
					t.Errorf("%s %s: %v", x, u.name, err)
					continue
				}
				want, _ := e.si(t, x).Float64()
				if math.Abs(q.si-want) > unitRounding*math.Abs(want) || q.dim != d {
					t.Errorf("%s %s is %v %s, want %v", x, u.name, q.si, d.si, want)
				}
			}
		}
		if len(d.units) != len(defined[d.name]) {
			t.Errorf("%s has %d units, want %d", d.name, len(d.units), len(defined[d.name]))
		}
	}
	if len(dimensions) != len(defined) {
		t.Errorf("there are %d dimensions, want %d", len(dimensions), len(defined))
	}
}

// TestUnitsShown: the units that errors and examples name are units.
func TestUnitsShown(t *testing.T) {
	for _, d := range dimensions {
		if q, err := measureOf(d.example, d); err != nil || q.dim != d {
			t.Errorf("the example of %s, %q: %v", d.name, d.example, err)
		}
		if q, err := measureOf("1 "+d.si, d); err != nil || q.si != 1 {
			t.Errorf("1 %s is %v (%v), want 1", d.si, q.si, err)
		}
		names := strings.Split(d.list(), ", ")
		if !slices.Contains(names, d.shown().name) && d.shown().name != d.si {
			t.Errorf("%s shows the unit %s, which is none of %s", d.name, d.shown().name, d.list())
		}
	}
}

func TestSpellingsOfQuantities(t *testing.T) {
	for _, c := range []struct {
		text string
		dim  *dimension
		want float64
	}{
		{"18 m", length, 18},
		{"18m", length, 18},
		{"  18   m  ", length, 18},
		{"18\u00a0m", length, 18}, // a no-break space
		{"18\tm", length, 18},
		{"+18 m", length, 18},
		{"-18 m", length, -18},
		{"018 m", length, 18},
		{"18. m", length, 18},
		{".5 m", length, 0.5},
		{"-.5m", length, -0.5},
		{"1e3 mm", length, 1},
		{"1E3mm", length, 1},
		{"1e+3 mm", length, 1},
		{"1e-3 m", length, 0.001},
		{"2.5e-3m", length, 0.0025},
		{"1e-3 km", length, 1},
		{"3 µm", length, 3e-6},
		{"3 \u03bcm", length, 3e-6}, // the Greek letter
		{"3 um", length, 3e-6},
		{"0 m", length, 0},
		{"-0 m", length, 0},
		{"1e-400 m", length, 0},
		{"9.8 m/s^2", accel, 9.8},
		{"9.8 m/s²", accel, 9.8},
		{"9.8 m/s2", accel, 9.8},
		{"9.8m/s²", accel, 9.8},
		{"1 ft/s²", accel, 0.3048},
		{"2 rad/s2", turnAccel, 2},
		{"180 deg/s²", turnAccel, math.Pi},
		{"180 °", angle, math.Pi},
		{"180°", angle, math.Pi},
		{"30 rpm", turnRate, math.Pi},
		{"36 km/h", speed, 10},
		{"22 °C", temperature, 295.15},
		{"22°C", temperature, 295.15},
		{"-40 degC", temperature, 233.15},
		{"1.2 kg/m³", density, 1.2},
		{"1.2 kg/m3", density, 1.2},
		{"1.8e-5 Pa s", viscosity, 1.8e-5},
		{"1.8e-5 Pa·s", viscosity, 1.8e-5},
		{"0.1 kg m^2", inertia, 0.1},
		{"0.1 kg·m²", inertia, 0.1},
		{"40 cm²", area, 0.004},
		{"40 cm2", area, 0.004},
	} {
		q, err := measureOf(c.text, c.dim)
		if err != nil || math.Abs(q.si-c.want) > unitRounding*math.Abs(c.want) {
			t.Errorf("%q is %v (%v), want %v", c.text, q.si, err, c.want)
		}
	}
}

func TestRefusedQuantities(t *testing.T) {
	for _, c := range []struct {
		text string
		dim  *dimension
	}{
		{"", length}, {" ", length}, {"m", length}, {"18", length}, {"18 ", length},
		{"fast", turnRate},
		{"NaN m", length}, {"nan m", length}, {"inf m", length}, {"-inf m", length}, {"+Infinity m", length}, {"1e400 m", length}, {"-1e999 m", length},
		{"0x10 m", length}, {"0x1p4 m", length}, {"0b1 m", length}, {"0o7 m", length},
		{"1_000 m", length}, {"1,5 m", length}, {"1,500 m", length}, {"1 000 m", length}, {"1'000 m", length},
		{"1.2.3 m", length}, {"--1 m", length}, {"+-1 m", length}, {"1-2 m", length}, {"1e m", length}, {"1e+ m", length}, {"e3 m", length}, {".e3 m", length}, {". m", length}, {"- m", length},
		{"18 m high", length}, {"18 m m", length}, {"18 mm.", length}, {"18 m;", length}, {"18 meters", length}, {"18 M", length}, {"18 MM", length},
		{"about 18 m", length}, {"18 m\x00", length}, {"\u221218 m", length}, // U+2212, the minus sign of typesetters
		{"18 m^", length}, {"18 m^2", length}, {"18 m2", length}, {"18 kg", length}, {"18 rpm", speed}, {"18 g", length},
		{"4 rad", turnRate}, {"4 Hz", turnRate},
		{"1 g/s", accel}, {"1 m/s/s", accel},
		{"22 C", temperature}, {"22 F", temperature},
		{"1e10 m", length}, {"-1e9 mi", length}, {"1e7 K", temperature},
	} {
		q, err := measureOf(c.text, c.dim)
		if err == nil {
			t.Errorf("%q is taken for %v %s", c.text, q.si, c.dim.si)
		} else if !strings.HasPrefix(err.Error(), "wants ") {
			t.Errorf("%q: the error does not say what is wanted: %v", c.text, err)
		}
	}
}

// TestLargestMagnitudes: the bound itself is taken, in any unit.
func TestLargestMagnitudes(t *testing.T) {
	for _, text := range []string{"1e9 m", "-1e9 m", "1e6 km", "1e12 mm"} {
		if _, err := measureOf(text, length); err != nil {
			t.Errorf("%q: %v", text, err)
		}
	}
}

// TestUnitDecidesTheDimension: g is gram where a mass is wanted and standard
// gravity where an acceleration is; of several dimensions the unit decides.
func TestUnitDecidesTheDimension(t *testing.T) {
	for _, c := range []struct {
		text string
		dims []*dimension
		si   float64
		dim  *dimension
	}{
		{"2 g", []*dimension{mass}, 0.002, mass},
		{"2 g", []*dimension{accel}, 19.6133, accel},
		{"3 m", []*dimension{length, angle}, 3, length},
		{"180 deg", []*dimension{length, angle}, math.Pi, angle},
		{"2 g", dimensions, 19.6133, accel}, // a limit without a column: the first that has it
	} {
		q, err := measureOf(c.text, c.dims...)
		if err != nil || q.dim != c.dim || math.Abs(q.si-c.si) > unitRounding*c.si {
			t.Errorf("%q is %v of %v (%v), want %v of %s", c.text, q.si, q.dim, err, c.si, c.dim.name)
		}
	}
}
