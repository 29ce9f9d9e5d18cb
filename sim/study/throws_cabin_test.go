package study_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/flight"
	"offplumb/sim/measure"
	"offplumb/sim/model"
	"offplumb/sim/study"
)

// leaningPlaces are places over flat floors where the floor's normal and the
// plumb line lie apart: off the middle of a habitat that is a cabin, of one that
// is turned round the axis, and of a cabin beside a ring.
func leaningPlaces() map[string]struct {
	in       model.Model
	from, to model.Station
} {
	cabin := model.Room{Shape: model.Cabin, FloorRadius: 12, Size: [3]float64{9, 6, 4}}
	turned := cabin
	turned.Spinward = model.Arc{Value: 2, IsAngle: true}
	beside := cabin
	beside.Name, beside.Spinward, beside.Axial = "cabin", model.Arc{Value: -0.7, IsAngle: true}, 40
	along := func(x, axial, height float64) model.Station {
		return model.Station{Spinward: model.Arc{Value: x}, Axial: axial, Height: height}
	}
	in := func(room model.Room, more ...model.Room) model.Model {
		return model.Model{Habitat: model.Habitat{Room: room, Spin: 5 * rpm}, Rooms: more}
	}
	room := func(s model.Station) model.Station { s.Room = "cabin"; return s }
	from, to := along(3.5, 1, 1.2), along(-3, -1, 0.8)
	return map[string]struct {
		in       model.Model
		from, to model.Station
	}{
		"cabin":        {in(cabin), from, to},
		"turned cabin": {in(turned), from, to},
		"second cabin": {in(model.Room{FloorRadius: 20, Length: 10}, beside), room(from), room(to)},
	}
}

// TestFlatFloorGivesBackWhatWasAsked: over a flat floor a velocity, and a
// throw's heading and elevation, are along the floor: the first row of the track
// has them as they were given, and a throw that was found comes to its target
// when it is pasted into a release, in either way.
func TestFlatFloorGivesBackWhatWasAsked(t *testing.T) {
	for name, c := range leaningPlaces() {
		t.Run(name, func(t *testing.T) {
			p := hall(t, c.in, model.ThrowTo{From: c.from, Target: model.Target{Station: c.to}, Speed: 6, Longest: 20})
			found := solved(t, p).Aims[0].Throws
			if len(found) == 0 {
				t.Fatal("no throw")
			}
			for i := range found {
				s := &found[i]
				if tilt := math.Abs(lean(t, p, c.from)); tilt < 0.2 {
					t.Fatalf("the floor and the plumb line are only %g rad apart", tilt)
				}
				for _, start := range []model.Start{
					{Kind: model.Thrown, Speed: s.Speed, Heading: s.Heading, Elevation: s.Elevation},
					{Kind: model.Velocity, VSpinward: s.V[0], VAxial: s.V[1], VUp: s.V[2]},
				} {
					pasted(t, p, c.from, start, s)
				}
			}
		})
	}
}

// lean is the angle (rad) at a place between the plumb line and the normal of
// the floor, which here lies across the axis.
func lean(t *testing.T, p *study.Prepared, at model.Station) float64 {
	t.Helper()
	place, err := p.Model.Resolve(at)
	if err != nil {
		t.Fatal(err)
	}
	f := p.Model.FlatBeneath(place.Vec())
	if f == nil {
		t.Fatal("no flat floor beneath")
	}
	return math.Remainder(place.Phi-f.Phi, 2*math.Pi)
}

// pasted flies a release that starts as a throw was found to.
func pasted(t *testing.T, p *study.Prepared, from model.Station, start model.Start, s *study.Thrown) {
	t.Helper()
	m := p.Model
	let, fault := flight.Release(m, &model.Release{Name: "r", At: from, Start: start, Until: model.Until{Kind: model.UntilDuration, Duration: s.Time}}, nil)
	if fault.Msg != "" {
		t.Fatal(fault)
	}
	track, err := flight.NewFlier(m).Fly(&let)
	if err != nil {
		t.Fatal(err)
	}
	first, _ := measure.Samples(m, track, flight.NewForces(m, track.Body, nil))
	got := [3]float64{first[0].VSpinward, first[0].VAxial, first[0].VUp}
	want := [3]float64{start.VSpinward, start.VAxial, start.VUp}
	if start.Kind == model.Thrown {
		level := start.Speed * math.Cos(start.Elevation)
		want = [3]float64{level * math.Cos(start.Heading), level * math.Sin(start.Heading), start.Speed * math.Sin(start.Elevation)}
	}
	for k := range got {
		if math.Abs(got[k]-want[k]) > 1e-12*s.Speed { // a few roundings
			t.Errorf("asked for %v, the track starts with %v", want, got)
			break
		}
	}
	if s.Outcome != measure.ThrowArrives {
		return
	}
	at := m.Motion.At(track.Begin + s.Time)
	if off := r3.Norm(r3.Sub(at.In(track.At(s.Time).Pos), s.Target.Pos)); off > 1e-6 {
		t.Errorf("pasted back it is %g m off the target", off)
	}
}
