package measure

import (
	"offplumb/sim/flight"
	"offplumb/sim/model"
	"offplumb/sim/table"
)

// Platform is a platform or net of a passage. SI units.
type Platform struct {
	Radius float64 // from the axis
	Fall   float64 // the longest fall onto it
	Speed  float64 // of the worst contact of a fall that it ends
	From   float64 // from the axis, where that fall begins
	Energy float64
}

// platformColumns are those of platforms/NAME.csv.
var platformColumns = []column[Platform]{
	{key: "radius", unit: metre, meaning: "distance of the platform from the axis", num: func(p *Platform) float64 { return p.Radius }},
	{key: "fall", unit: metre, meaning: "way from the next platform, or the inner end, to it", num: func(p *Platform) float64 { return p.Fall }},
	{key: "speed", unit: speedUnit, meaning: "greatest speed of a contact in a fall onto it", num: func(p *Platform) float64 { return p.Speed }},
	{key: "from", unit: metre, meaning: "distance from the axis at which that fall begins", num: func(p *Platform) float64 { return p.From }},
	{key: "energy", unit: joule, meaning: "energy at that speed", num: func(p *Platform) float64 { return p.Energy }},
}

// PlatformTable is platforms/NAME.csv: a row for each platform, outermost
// first.
func PlatformTable(rows []Platform) *table.Table { return fill(platformColumns, rows) }

// Crossing gives the first time (s since the release) at which a track is at a
// distance r (m) from the axis on its way outward, and whether it ever is.
func Crossing(m *model.Model, t *flight.Track, r float64) (float64, bool) {
	knots := t.Knots()
	for k := 1; k < len(knots); k++ {
		before := knots[k-1]
		for part := 1.0; part <= passParts; part++ {
			now := knots[k-1] + (knots[k]-knots[k-1])*part/passParts
			if where(m, t, before).R <= r && where(m, t, now).R > r {
				return crossing(m, t, r, before, now), true
			}
			before = now
		}
	}
	return 0, false
}
