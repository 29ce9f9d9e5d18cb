package measure_test

import (
	"strings"
	"testing"

	"offplumb/sim/measure"
	"offplumb/sim/table"
)

// TestColumnsOfTables holds the first columns of the tables, in their order, to
// what scripts rest on.
func TestColumnsOfTables(t *testing.T) {
	for _, c := range []struct {
		name  string
		table *table.Table
		first string
	}{
		{"landings", measure.LandingTable(nil), "release, body, outcome, surface, time_s, offset_m, deflection_m, offset_axial_m, deflection_axial_m, deck, spinward_m, axial_m, height_m, spinward_deg, speed_m_s, normal_speed_m_s, incidence_deg, energy_J"},
		{"rests", measure.RestTable(nil), "release, outcome, surface, time_s, deck, spinward_m, axial_m, height_m, spinward_deg, impacts, path_m, slid_m"},
		{"crew", measure.CrewTable(nil), "time_s, leg, along_m, spinward_m, axial_m, height_m, gravity_feet_g, gravity_waist_g, gravity_head_g, tilt_spinward_deg, tilt_axial_deg, weight_N, side_spinward_N, side_axial_N, friction_demand, head_cross_rad_s2"},
		{"decks", measure.DeckTable(nil), "deck, radius_m, gravity_g, speed_m_s, coriolis_per_speed_1_s, drop_1m_offset_m"},
		{"clearance", measure.ClearanceTable(nil), "name, surface, clearance_m, time_s"},
		{"limits", measure.LimitTable(nil), "limit, of, measure, value, min, max, unit, verdict, at_s, source"},
		{"impacts", measure.EventTable(nil), "time_s, event, surface"},
		{"let-go series", measure.LetGoTable(nil), "along_m, path_time_s, radius_m, first_surface, first_time_s, first_speed_m_s, first_energy_J"},
		{"platforms", measure.PlatformTable(nil), "radius_m, fall_m, speed_m_s, from_m, energy_J"},
		{"gravity", measure.GravityTable(nil), "path, level_g, below_s, above_s"},
		{"habitat", measure.HabitatTable(measure.HabitatFigure{}), "spin_rpm, floor_gravity_g, rim_speed_m_s, head_to_foot, coriolis_ratio"},
	} {
		var names []string
		seen := map[string]bool{}
		for _, k := range c.table.Columns {
			if names = append(names, k.Name); seen[k.Name] || k.Meaning == "" {
				t.Errorf("%s: column %q comes twice, or means nothing: %q", c.name, k.Name, k.Meaning)
			}
			seen[k.Name] = true
		}
		if got := strings.Join(names, ", "); !strings.HasPrefix(got+", ", c.first+", ") {
			t.Errorf("%s begins %s\nwant %s", c.name, got, c.first)
		}
	}
}

// TestCellsOfTables tries some cells against their rows, in the units of their
// columns.
func TestCellsOfTables(t *testing.T) {
	rows := measure.RestTable([]measure.Rest{{Release: "a", Surface: "floor", Time: 2.5, Deck: "upper", Arc: 3, Impacts: 4, Path: 5, Slid: 1.5, Story: "rests"}})
	want := map[string]table.Cell{"release": table.Str("a"), "outcome": table.Str("landed"), "surface": table.Str("floor"), "time_s": table.Num(2.5), "deck": table.Str("upper"),
		"spinward_m": table.Num(3), "impacts": table.Num(4), "path_m": table.Num(5), "slid_m": table.Num(1.5), "story": table.Str("rests")}
	for i, k := range rows.Columns {
		if cell, ok := want[k.Name]; ok && rows.Rows[0][i] != cell {
			t.Errorf("%s is %+v, want %+v", k.Name, rows.Rows[0][i], cell)
		}
		delete(want, k.Name)
	}
	if len(want) > 0 {
		t.Errorf("no columns %v", want)
	}
}
