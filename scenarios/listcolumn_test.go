package scenarios

import "testing"

func TestColumnsOfListsAreAtTheirPlaces(t *testing.T) {
	for name, at := range map[string]int{"release": releaseColumn, "body": bodyColumn, "mass_kg": massColumn, "diameter_m": diameterColumn,
		"deck": deckColumn, "spinward_m": spinwardColumn, "axial_m": axialColumn, "height_m": heightColumn,
		"v_spinward_m_s": vSpinwardColumn, "v_axial_m_s": vAxialColumn, "v_up_m_s": vUpColumn} {
		if got := listColumn(name); got != at {
			t.Errorf("%s is column %d, want %d", name, got, at)
		}
	}
}
