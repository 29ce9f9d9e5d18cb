package measure

import (
	"slices"

	"offplumb/sim/table"
)

// LandingTable is landings.csv: a row for each release.
func LandingTable(rows []Landing) *table.Table { return fill(landingColumns, rows) }

// TrackTable is tracks/NAME.csv: a row for each output step.
func TrackTable(rows []Sample) *table.Table { return fill(sampleColumns, rows) }

// CrewTable is crew/NAME.csv: a row for each output step.
func CrewTable(rows []Load) *table.Table { return fill(crewColumns, rows) }

// DeckTable is decks.csv: a row for each deck.
func DeckTable(rows []DeckFigure) *table.Table {
	return fill(unlessPulled(unlessSteady(deckColumns, len(rows) == 0 || !rows[0].Changes), len(rows) > 0 && rows[0].Pulls), rows)
}

// unlessSteady leaves out the columns of the time after the last change of a
// spin that is steady.
func unlessSteady[T any](cols []column[T], steady bool) []column[T] {
	return slices.DeleteFunc(slices.Clone(cols), func(c column[T]) bool { return steady && c.later })
}

// LimitTable is limits.csv: a row for each limit judged.
func LimitTable(rows []Verdict) *table.Table { return fill(verdictColumns, rows) }

// RestTable is rests.csv: a row for each release.
func RestTable(rows []Rest) *table.Table { return fill(restColumns, rows) }

// EventTable is impacts/NAME.csv: a row for each impact.
func EventTable(rows []Event) *table.Table { return fill(eventColumns, rows) }

// ClearanceTable is clearance.csv: a row for each surface that a release or a
// crew path came near.
func ClearanceTable(rows []Clearance) *table.Table { return fill(clearanceColumns, rows) }

// LetGoTable is letgo/NAME.csv: a row for each release of a let-go series.
func LetGoTable(rows []LetGo) *table.Table { return fill(letGoColumns, rows) }

// HabitatTable is habitat.csv, of one row.
func HabitatTable(h HabitatFigure) *table.Table {
	return fill(unlessPulled(unlessSteady(habitatColumns, !h.Changes), h.Pulls), []HabitatFigure{h})
}
