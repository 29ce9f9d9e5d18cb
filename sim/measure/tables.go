package measure

import "offplumb/sim/table"

// LandingTable is landings.csv: a row for each release.
func LandingTable(rows []Landing) *table.Table { return fill(landingColumns, rows) }

// TrackTable is tracks/NAME.csv: a row for each output step.
func TrackTable(rows []Sample) *table.Table { return fill(sampleColumns, rows) }

// CrewTable is crew/NAME.csv: a row for each output step.
func CrewTable(rows []Load) *table.Table { return fill(crewColumns, rows) }

// DeckTable is decks.csv: a row for each deck.
func DeckTable(rows []DeckFigure) *table.Table { return fill(deckColumns, rows) }

// LimitTable is limits.csv: a row for each limit judged.
func LimitTable(rows []Verdict) *table.Table { return fill(verdictColumns, rows) }
