package measure

import (
	"math"

	"offplumb/sim/flight"
	"offplumb/sim/model"
)

// LetGo is one release of a let-go series: what it hits first, how it arrives
// where it ends, and the worst of its impacts. NaN where there is none.
type LetGo struct {
	Release         string
	Along           float64 // m along the path
	PathTime        float64 // s into the path
	Radius          float64 // m, distance from the axis where it is let go
	First           Event
	Arrival         Event // first impact on what it ends on
	Worst           Event // fastest impact
	Outcome, EndsOn string
	Time            float64 // s, of the end
	LeavesSpeed     float64 // m/s, at which it leaves a passage last
	hit, arrive     bool
}

// LetGoOf measures a release of a series.
func LetGoOf(t *flight.Track, r *Rest, events []Event) LetGo {
	out := LetGo{Release: t.Release.Name, Along: t.Release.Along, PathTime: t.Release.Carried.Time, Radius: t.Start.R,
		Outcome: r.Outcome.String(), EndsOn: r.Surface, Time: r.Time, LeavesSpeed: math.NaN()}
	none := Event{Time: math.NaN(), Speed: math.NaN(), NormalSpeed: math.NaN(), Energy: math.NaN(), Normal: math.NaN()}
	out.First, out.Arrival, out.Worst = none, none, none
	for _, e := range events {
		if e.Kind == Leaves {
			out.LeavesSpeed = e.Speed
			continue
		}
		if !out.hit {
			out.First, out.hit = e, true
		}
		if !out.arrive && e.Surface == r.Surface {
			out.Arrival, out.arrive = e, true
		}
		if !(e.Speed <= out.Worst.Speed) {
			out.Worst = e
		}
	}
	return out
}

// SeriesNames lists the let-go series of a model, in the order of the file.
func SeriesNames(m *model.Model) []string {
	var out []string
	for i := range m.Releases {
		if s := m.Releases[i].Series; s != "" && (len(out) == 0 || out[len(out)-1] != s) {
			out = append(out, s)
		}
	}
	return out
}

// letGoColumns are those of letgo/NAME.csv.
var letGoColumns = []column[LetGo]{
	{key: "along", unit: metre, meaning: "way along the path where it is let go", num: func(l *LetGo) float64 { return l.Along }},
	{key: "path_time", unit: second, meaning: "time into the path when it is let go", num: func(l *LetGo) float64 { return l.PathTime }},
	{key: "radius", unit: metre, meaning: "distance from the axis where it is let go", num: func(l *LetGo) float64 { return l.Radius }},
	{key: "first_surface", meaning: "surface first touched", text: func(l *LetGo) string { return l.First.Surface }},
	{key: "first_time", unit: second, meaning: "time of the first touch, from the release", num: func(l *LetGo) float64 { return l.First.Time }},
	{key: "first_speed", unit: speedUnit, meaning: "speed of the first touch", num: func(l *LetGo) float64 { return l.First.Speed }},
	{key: "first_energy", unit: joule, meaning: "energy of the first touch", num: func(l *LetGo) float64 { return l.First.Energy }},
	{key: "leaves_speed", unit: speedUnit, meaning: "speed at which it leaves a passage outward; empty if it does not", num: func(l *LetGo) float64 { return l.LeavesSpeed }},
	{key: "arrival_surface", meaning: "surface on which it ends", text: func(l *LetGo) string { return l.Arrival.Surface }},
	{key: "arrival_speed", unit: speedUnit, meaning: "speed of the first touch of that surface", num: func(l *LetGo) float64 { return l.Arrival.Speed }},
	{key: "arrival_energy", unit: joule, meaning: "energy of the first touch of that surface", num: func(l *LetGo) float64 { return l.Arrival.Energy }},
	{key: "worst_surface", meaning: "surface of the fastest impact", text: func(l *LetGo) string { return l.Worst.Surface }},
	{key: "worst_speed", unit: speedUnit, meaning: "speed of the fastest impact", num: func(l *LetGo) float64 { return l.Worst.Speed }},
	{key: "worst_energy", unit: joule, meaning: "energy of the fastest impact", num: func(l *LetGo) float64 { return l.Worst.Energy }},
	{key: "outcome", meaning: "how it ends, as in rests.csv", text: func(l *LetGo) string { return l.Outcome }},
	{key: "time", unit: second, meaning: "time of the end, from the release", num: func(l *LetGo) float64 { return l.Time }},
	{key: "release", meaning: "name of the release", text: func(l *LetGo) string { return l.Release }},
}
