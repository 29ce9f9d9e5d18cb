package study

import (
	"context"
	"math"
	"reflect"
	"testing"

	"offplumb/sim/air"
	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// slopes gives the sensitivities of a scenario's releases by release and input.
func slopes(t *testing.T, in model.Model, workers int) ([]measure.Slope, map[string]measure.Slope) {
	t.Helper()
	m, problems := model.New(in)
	if problems != nil {
		t.Fatal(problems)
	}
	p, problems := Prepare(m)
	if problems != nil {
		t.Fatal(problems)
	}
	results, err := p.Run(context.Background(), Options{Workers: workers})
	if err != nil {
		t.Fatal(err)
	}
	var which []int
	for i := range results {
		which = append(which, i)
	}
	rows, err := p.Slopes(context.Background(), which, results, Options{Workers: workers})
	if err != nil {
		t.Fatal(err)
	}
	by := map[string]measure.Slope{}
	for _, s := range rows {
		by[s.Release+" "+s.Input] = s
	}
	return rows, by
}

// near holds a derivative to the closed form, to what central differences at a
// step of 1e-3 of the scale neglect, 1e-6 of the third derivative: up to some
// ten times the first in scaled numbers.
func near(t *testing.T, what string, got, want float64) {
	t.Helper()
	if !(math.Abs(got-want) <= 1e-5*math.Max(1, math.Abs(want))) {
		t.Errorf("%s: %.9g, want %.9g", what, got, want)
	}
}

// TestSlopesOfDrop holds the sensitivity of a drop in vacuum to the derivatives
// of the involute: with cos(theta) = r0/(R - a), the offset is -R (tan theta -
// theta) after tan(theta)/omega at the speed omega (R - a) sin(theta), and
//
//	d theta/dh = 1/((R - a) sin theta),  d inv = tan^2 theta d theta.
func TestSlopesOfDrop(t *testing.T) {
	const radius, spin, height, size = 18.0, 0.55, 2.1, 0.06
	for _, sign := range []float64{1, -1} {
		in := ring(radius, sign*spin, 1e-9, model.Body{Name: "b", Mass: 1, Diameter: size})
		in.Releases = []model.Release{{Name: "drop", Body: "b", At: model.Station{Height: height, Spinward: model.Arc{Value: 0.3, IsAngle: true}}}}
		_, by := slopes(t, in, 2)
		rim := radius - size/2
		cos := (radius - height) / rim
		theta := math.Acos(cos)
		tan, sin := math.Tan(theta), math.Sin(theta)
		perHeight := 1 / (rim * sin)
		h := by["drop at.height"]
		near(t, "offset by height", h.Offset, -sign*radius*tan*tan*perHeight)
		near(t, "deflection by height", h.Deflection, -sign*radius*tan*tan*perHeight)
		near(t, "time by height", h.Time, perHeight/(spin*cos*cos))
		near(t, "speed by height", h.Speed, spin*rim*cos*perHeight)
		w := by["drop habitat.spin"]
		near(t, "offset by spin", w.Offset, 0)
		near(t, "time by spin", w.Time, -sign*tan/(spin*spin))
		near(t, "speed by spin", w.Speed, sign*rim*sin)
		for _, key := range []string{"at.spinward", "at.axial"} {
			s := by["drop "+key]
			near(t, key, math.Abs(s.Offset)+math.Abs(s.Axial)+math.Abs(s.Time)+math.Abs(s.Speed), 0)
		}
		near(t, "axial by velocity", by["drop velocity.axial"].Axial, tan/spin)
		// By a velocity v up: the inertial velocity is (-v, omega r0), so at once
		// dT = r0 v/(omega r0)^2 and the angle that it goes round is the same.
		near(t, "time by velocity up", by["drop velocity.up"].Time, 1/(spin*spin*(radius-height)))
		near(t, "offset by velocity up", by["drop velocity.up"].Offset, 0)
		// By a velocity v spinward: the line is the same, gone along faster.
		near(t, "time by velocity spinward", by["drop velocity.spinward"].Time, -sign*tan/(spin*spin*(radius-height)))
		near(t, "offset by velocity spinward", by["drop velocity.spinward"].Offset, radius*tan/(spin*(radius-height)))
	}
}

// TestSlopesOfThrow holds the sensitivity of a throw in vacuum to the geometry
// of the straight line, differentiated: its point x = p + v T on the rim moves
// by dx = dv T + v dT with x.dx = 0.
func TestSlopesOfThrow(t *testing.T) {
	const radius, spin, height, speed, heading, elevation = 18.0, 0.55, 1.5, 4.0, 0.7, 0.6
	in := ring(radius, spin, 1e-9, model.Body{Name: "b"})
	in.Releases = []model.Release{{Name: "throw", Body: "b", At: model.Station{Height: height},
		Start: model.Start{Kind: model.Thrown, Speed: speed, Heading: heading, Elevation: elevation}}}
	_, by := slopes(t, in, 1)
	r0 := radius - height
	ce, se, ch, sh := math.Cos(elevation), math.Sin(elevation), math.Cos(heading), math.Sin(heading)
	vx, vy, vz := -speed*se, spin*r0+speed*ce*ch, speed*ce*sh
	vv := vx*vx + vy*vy
	time := (-r0*vx + math.Sqrt(r0*r0*vx*vx+vv*(radius*radius-r0*r0))) / vv
	x, y := r0+vx*time, vy*time
	check := func(key string, per, dvx, dvy, dvz, dx0 float64) {
		dt := -(x*(dvx*time+dx0) + y*dvy*time) / (x*vx + y*vy)
		dx, dy := dx0+dvx*time+vx*dt, dvy*time+vy*dt
		s := by["throw "+key]
		near(t, key+": time", s.Time, per*dt)
		near(t, key+": axial", s.Axial, per*(dvz*time+vz*dt))
		near(t, key+": offset", s.Offset, per*radius*((x*dy-y*dx)/(radius*radius)-spin*dt))
	}
	deg := math.Pi / 180
	check("throw.speed", 1, -se, ce*ch, ce*sh, 0)
	check("throw.heading", deg, 0, -speed*ce*sh, speed*ce*ch, 0)
	check("throw.elevation", deg, -speed*ce, -speed*se*ch, -speed*se*sh, 0)
	check("at.height", 1, 0, -spin, 0, -1)
}

// TestSlopesMirror turns a scenario's spin and spinward motion round: offsets
// change sign, times and speeds do not. In air, with all workers alike.
func TestSlopesMirror(t *testing.T) {
	make := func(sign float64) model.Model {
		in := ring(12, sign*0.7, 1e-9, model.Body{Name: "b", Mass: 0.01, Diameter: 0.04})
		in.Air = air.Air{Density: 1.2, Viscosity: 1.8e-5}
		in.Releases = []model.Release{{Name: "push", Body: "b", At: model.Station{Height: 1.8},
			Start: model.Start{Kind: model.Velocity, VSpinward: sign * 1.2, VAxial: 0.4, VUp: 0.8}}}
		return in
	}
	rows, by := slopes(t, make(1), 1)
	again, _ := slopes(t, make(1), 3)
	if !reflect.DeepEqual(rows, again) {
		t.Error("three workers find others than one")
	}
	_, other := slopes(t, make(-1), 2)
	for key, s := range by {
		o := other[key]
		flip := 1.0
		if s.Input == "habitat.spin" || s.Input == "velocity.spinward" || s.Input == "at.spinward" {
			flip = -1
		}
		near(t, key+": offset", o.Offset, -flip*s.Offset)
		near(t, key+": axial", o.Axial, flip*s.Axial)
		near(t, key+": time", o.Time, flip*s.Time)
		near(t, key+": speed", o.Speed, flip*s.Speed)
	}
}

// TestSlopesAtAnEdge tries a drop beside the edge of a box: where a flight of a
// difference touches something else there is no derivative, and it is said.
func TestSlopesAtAnEdge(t *testing.T) {
	in := ring(18, 0.5, 1e-9, model.Body{Name: "b", Mass: 1, Diameter: 0.06})
	in.Fixtures = []model.Fixture{{Name: "box", Kind: model.Box, At: model.Station{Axial: 0.5029}, Size: [3]float64{2, 1, 0.5}, Friction: model.None, Restitution: model.None},
		{Name: "shelf", Kind: model.Box, At: model.Station{Spinward: model.Arc{Value: 5}, Height: 1}, Size: [3]float64{1, 1, 0.1}, Friction: model.None, Restitution: model.None}}
	in.Releases = []model.Release{{Name: "drop", Body: "b", At: model.Station{Height: 1.5, Axial: -0.0272}},
		{Name: "lies", Body: "b", At: model.Station{Height: 1.13, Spinward: model.Arc{Value: 5}}, Until: model.Until{Kind: model.UntilLanding}}}
	rows, by := slopes(t, in, 2)
	if s := by["drop at.axial"]; s.Note == "" || !math.IsNaN(s.Offset) || !math.IsNaN(s.Time) {
		t.Errorf("across the edge: %+v", s)
	}
	if s := by["drop at.height"]; s.Note != "" || math.IsNaN(s.Offset) {
		t.Errorf("along the edge: %+v", s)
	}
	for _, s := range rows {
		if s.Release == "lies" {
			t.Errorf("a release that stays where it lies has %+v", s)
		}
	}
}
