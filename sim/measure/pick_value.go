package measure

import (
	"math"
	"slices"

	"offplumb/sim/model"
)

// NeedRelease says whether the number comes of a release, and whether of its
// track, beyond its landing and its rest.
func (p *Pick) NeedRelease(r *model.Release) (needed, track bool) {
	if p.Kind != "release" || r.Name != p.Of && r.Series != p.Of {
		return false, false
	}
	return true, p.table == "tracks" || p.table == "impacts" || p.table == "clearance"
}

// PastLanding says whether the number depends on what a release does after its
// landing.
func (p *Pick) PastLanding() bool { return p.Kind == "release" && p.table != "landings" }

// Value takes the number out of the results of a scenario, SI; NaN where they
// have none.
func (p *Pick) Value(m *model.Model, e Evidence) float64 {
	best := math.NaN()
	for _, i := range p.members(m) {
		for _, x := range p.values(e, i) {
			switch {
			case math.IsNaN(x) && p.key == "friction_demand":
				return x // no weight at all: no finite demand is the worst
			case math.IsNaN(best) || p.worse(x, best):
				best = x
			}
		}
	}
	return best
}

func (p *Pick) worse(x, best float64) bool {
	switch p.take {
	case leastRow:
		return x < best
	case mostRow:
		return x > best
	}
	return math.Abs(x) > math.Abs(best)
}

// members are the things that it is of, by their index.
func (p *Pick) members(m *model.Model) (out []int) {
	switch p.Kind {
	case "habitat":
		return []int{0}
	case "deck":
		return indices(deckNames(m), p.Of)
	case "path":
		return indices(names(m, "path"), p.Of)
	}
	for i := range m.Releases {
		if r := &m.Releases[i]; r.Name == p.Of || r.Series == p.Of {
			out = append(out, i)
		}
	}
	return out
}

func indices(list []string, name string) (out []int) {
	if i := slices.Index(list, name); i >= 0 {
		out = append(out, i)
	}
	return out
}

// values are the entries of the column for the thing of an index.
func (p *Pick) values(e Evidence, i int) []float64 {
	switch p.table {
	case "landings":
		return one(p, landingColumns, i, e.Landing)
	case "rests":
		return one(p, restColumns, i, e.Rest)
	case "impacts":
		rows, _ := e.Events(i)
		return entries(p, eventColumns, slices.DeleteFunc(slices.Clone(rows), func(e Event) bool { return e.Kind != Impact }))
	case "tracks":
		rows, _ := e.Track(i)
		return entries(p, sampleColumns, rows)
	case "crew":
		rows, _ := e.Loads(i)
		return entries(p, crewColumns, rows)
	case "clearance":
		get := e.Clearance
		if p.Kind == "path" {
			get = e.PathClearance
		}
		rows, _ := get(i)
		return entries(p, clearanceColumns, rows)
	case "decks":
		return entries(p, deckColumns, e.Decks[i:i+1])
	case "spin":
		return entries(p, turningColumns, e.Turning())
	}
	return entries(p, habitatColumns, []HabitatFigure{e.Habitat(0, 0)})
}

func one[T any](p *Pick, cols []column[T], i int, get func(int) (*T, bool)) []float64 {
	row, ok := get(i)
	if !ok {
		return nil
	}
	return []float64{numberColumn(cols, p.key, p.unit).num(row)}
}

func entries[T any](p *Pick, cols []column[T], rows []T) []float64 {
	num := numberColumn(cols, p.key, p.unit).num
	out := make([]float64, len(rows))
	for i := range rows {
		out[i] = num(&rows[i])
	}
	return out
}
