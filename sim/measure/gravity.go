package measure

import (
	"offplumb/sim/model"
	"offplumb/sim/table"
)

// GravityTime is how long a person feels less, and no less, than a level of
// apparent gravity along a path. SI units.
type GravityTime struct {
	Path         string
	Level        float64 // m/s^2
	Below, Above float64 // s, at the waist
}

// GravityTimes adds up the times below and above the levels that a path names,
// at the waist. The gravity is taken as changing evenly between output steps.
func GravityTimes(path *model.Path, loads []Load) []GravityTime {
	var out []GravityTime
	for _, level := range path.GravityLevels {
		g := GravityTime{Path: path.Name, Level: level}
		for i := 1; i < len(loads); i++ {
			a, b := loads[i-1].GravityWaist, loads[i].GravityWaist
			span := loads[i].Time - loads[i-1].Time
			below := span * shareBelow(a, b, level)
			g.Below += below
			g.Above += span - below
		}
		out = append(out, g)
	}
	return out
}

// shareBelow is the share of a straight line from a to b that lies below a
// level.
func shareBelow(a, b, level float64) float64 {
	switch {
	case a < level && b < level:
		return 1
	case a >= level && b >= level:
		return 0
	case a < level:
		return (level - a) / (b - a)
	}
	return (level - b) / (a - b)
}

// gravityColumns are those of gravity.csv.
var gravityColumns = []column[GravityTime]{
	{key: "path", meaning: "crew path", text: func(g *GravityTime) string { return g.Path }},
	{key: "level", unit: gravity, meaning: "level of apparent gravity that the path names", num: func(g *GravityTime) float64 { return g.Level }},
	{key: "below", unit: second, meaning: "time for which the waist feels less", num: func(g *GravityTime) float64 { return g.Below }},
	{key: "above", unit: second, meaning: "time for which it feels as much or more", num: func(g *GravityTime) float64 { return g.Above }},
}

// GravityTable is gravity.csv: a row for each level of each path.
func GravityTable(rows []GravityTime) *table.Table { return fill(gravityColumns, rows) }
