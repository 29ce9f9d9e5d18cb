package measure

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/flight"
	"offplumb/sim/model"
	"offplumb/sim/table"
)

// OutsideSample is a release outside the hull at one instant. SI units.
type OutsideSample struct {
	Time     float64 // s since the release
	Distance float64 // m, from where it was let go, a place that turns with the habitat
	Radius   float64 // m, from the axis
	Axial    float64 // m
	Gap      float64 // m, between the body's surface and the habitat
	Nearest  string  // surface
	Speed    float64 // m/s, in the inertial frame
}

// Outside is how a release went outside the hull. NaN where there is nothing.
type Outside struct {
	Release             string
	Left, LeftSpeed     float64 // s and m/s, inertial: when it passed the outer face
	Leaves              float64 // rad, of the inertial velocity then from the tangent, outward positive
	Distance, Most      float64 // m, from where it was let go: at the end, the greatest
	Again, AgainTime    float64 // m and s: the closest approach once it was away
	AgainTo             string
	Swept               string  // surface that it first touches outside
	SweptTime, SweptHit float64 // s and m/s
	Outcome             string
}

// OutsideSamples gives a track at the output step from its leaving of the hull
// on.
func OutsideSamples(m *model.Model, t *flight.Track) []OutsideSample {
	if t.Left < 0 {
		return nil
	}
	times, _ := Times(t.End-t.Left, m.Output.Step)
	out := make([]OutsideSample, len(times))
	for i := range times {
		out[i] = outsideAt(m, t, t.Left+times[i])
	}
	return out
}

func outsideAt(m *model.Model, t *flight.Track, time float64) OutsideSample {
	s := localAt(m, t, time)
	near := m.Interior.Contact(s.Pos)
	return OutsideSample{Time: time, Distance: r3.Norm(r3.Sub(s.Pos, t.Local.Pos)), Radius: math.Hypot(s.Pos.X, s.Pos.Y), Axial: s.Pos.Z,
		Gap: math.Max(0, near.Gap-t.Body.Diameter/2), Nearest: m.Interior.Surface(near.Surface).Name, Speed: r3.Norm(t.At(time).Vel)}
}

// OutsideOf measures a track outside the hull; false for one that never was
// there.
func OutsideOf(m *model.Model, t *flight.Track) (Outside, bool) {
	none := math.NaN()
	out := Outside{Release: t.Release.Name, Again: none, AgainTime: none, SweptTime: none, SweptHit: none, Outcome: t.Outcome.String()}
	if t.Left < 0 {
		return out, false
	}
	out.Left = t.Left
	s := t.At(t.Left)
	out.LeftSpeed, out.Leaves = r3.Norm(s.Vel), climbs(s.Pos, s.Vel)
	for i := range t.Impacts {
		if hit := &t.Impacts[i]; hit.Time >= t.Left && m.IsOutside(hit.State.Pos) && r3.Norm(hit.State.Vel) > 0 {
			out.Swept, out.SweptTime, out.SweptHit = hit.Surface, hit.Time, r3.Norm(hit.State.Vel)
			break
		}
	}
	out.approach(m, t)
	return out, true
}

// climbs is the angle of a velocity out of the plane across the radius, rad.
func climbs(pos, vel r3.Vec) float64 {
	r := math.Hypot(pos.X, pos.Y)
	if r == 0 || r3.Norm(vel) == 0 {
		return math.NaN()
	}
	return math.Asin(math.Max(-1, math.Min(1, (pos.X*vel.X+pos.Y*vel.Y)/(r*r3.Norm(vel)))))
}

// awayGap is the gap, in m, beyond which a body counts as away, so that what
// comes near it then has come round: the rim of the hatch that it left by has
// not.
const awayGap = 1

// approach finds the greatest distance, and the closest approach once the body
// was away, up to a first touch.
func (o *Outside) approach(m *model.Model, t *flight.Track) {
	var times []float64
	for _, at := range looks(m, t) {
		if at >= t.Left {
			times = append(times, at)
		}
	}
	if len(times) == 0 || times[len(times)-1] < t.End {
		times = append(times, t.End)
	}
	best, away, falling := -1, 0.0, false
	var last OutsideSample
	for i, at := range times {
		s := outsideAt(m, t, at)
		o.Most, o.Distance = math.Max(o.Most, s.Distance), s.Distance
		// What goes on to a touch is no passing.
		ends := i+1 == len(times) && o.Swept == ""
		if falling && away > awayGap && !(last.Time >= o.SweptTime) && (s.Gap > last.Gap || ends) && !(last.Gap >= o.Again) {
			best, o.Again, o.AgainTime, o.AgainTo = i-1, last.Gap, last.Time, last.Nearest
		}
		away, falling, last = math.Max(away, s.Gap), i > 0 && s.Gap < last.Gap, s
	}
	if best > 0 && best+1 < len(times) {
		o.narrow(m, t, times[best-1], times[best+1])
	}
}

// narrow refines the closest approach by thirds.
func (o *Outside) narrow(m *model.Model, t *flight.Track, a, b float64) {
	for range clearLooks {
		u, v := outsideAt(m, t, a+(b-a)/3), outsideAt(m, t, b-(b-a)/3)
		for _, s := range []OutsideSample{u, v} {
			if s.Gap < o.Again {
				o.Again, o.AgainTime, o.AgainTo = s.Gap, s.Time, s.Nearest
			}
		}
		if u.Gap < v.Gap {
			b = v.Time
		} else {
			a = u.Time
		}
	}
}

// outsideSampleColumns are those of outside/NAME.csv.
var outsideSampleColumns = []column[OutsideSample]{
	{key: "time", unit: second, meaning: "time from the release", num: func(s *OutsideSample) float64 { return s.Time }},
	{key: "distance", unit: metre, meaning: "distance from where it was let go, a place that turns with the habitat", num: func(s *OutsideSample) float64 { return s.Distance }},
	{key: "radius", unit: metre, meaning: "distance from the axis", num: func(s *OutsideSample) float64 { return s.Radius }},
	{key: "axial", unit: metre, meaning: "axial place", num: func(s *OutsideSample) float64 { return s.Axial }},
	{key: "gap", unit: metre, meaning: "distance between the body's surface and the habitat", num: func(s *OutsideSample) float64 { return s.Gap }},
	{key: "nearest", meaning: "surface that is nearest", text: func(s *OutsideSample) string { return s.Nearest }},
	{key: "speed_inertial", unit: speedUnit, meaning: "speed in the inertial frame", num: func(s *OutsideSample) float64 { return s.Speed }},
}

// outsideColumns are those of outside.csv.
var outsideColumns = []column[Outside]{
	{key: "release", meaning: "name of the release", text: func(o *Outside) string { return o.Release }},
	{key: "outcome", meaning: "as in rests.csv; lost: it went farther from where it was let go than it is followed", text: func(o *Outside) string { return o.Outcome }},
	{key: "left", unit: second, meaning: "when its centre first passed the hull's outer face, from the release", num: func(o *Outside) float64 { return o.Left }},
	{key: "left_speed", unit: speedUnit, meaning: "its speed then in the inertial frame", num: func(o *Outside) float64 { return o.LeftSpeed }},
	{key: "left_angle", unit: degree, meaning: "angle of that velocity from the tangent plane, outward positive", num: func(o *Outside) float64 { return o.Leaves }},
	{key: "distance", unit: metre, meaning: "distance at the end from where it was let go, a place that turns with the habitat", num: func(o *Outside) float64 { return o.Distance }},
	{key: "distance_most", unit: metre, meaning: "greatest distance from there", num: func(o *Outside) float64 { return o.Most }},
	{key: "again", unit: metre, meaning: "closest approach to the habitat once it had been more than 1 m away, up to a touch: what comes round again; empty where it only went away", num: func(o *Outside) float64 { return o.Again }},
	{key: "again_time", unit: second, meaning: "when that was, from the release", num: func(o *Outside) float64 { return o.AgainTime }},
	{key: "again_to", meaning: "surface that came closest", text: func(o *Outside) string { return o.AgainTo }},
	{key: "swept_by", meaning: "surface that it first touches outside; empty where it touches none", text: func(o *Outside) string { return o.Swept }},
	{key: "swept_time", unit: second, meaning: "when, from the release", num: func(o *Outside) float64 { return o.SweptTime }},
	{key: "swept_speed", unit: speedUnit, meaning: "at what speed relative to the surface", num: func(o *Outside) float64 { return o.SweptHit }},
}

// OutsideSampleTable is outside/NAME.csv: a row for each output step.
func OutsideSampleTable(rows []OutsideSample) *table.Table { return fill(outsideSampleColumns, rows) }

// OutsideTable is outside.csv: a row for each release that went outside.
func OutsideTable(rows []Outside) *table.Table { return fill(outsideColumns, rows) }

// away says how far a release is from where it was let go, of one outside.
func (s *teller) away() string {
	if s.t.Left < 0 {
		return ""
	}
	return ", " + table.Round(outsideAt(s.m, s.t, s.t.End).Distance, 3) + " m from where it was let go"
}
