package flight_test

import (
	"encoding/csv"
	"math"
	"os"
	"strconv"
	"testing"

	"offplumb/sim/air"
	"offplumb/sim/flight"
	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// reference is a flight with drag that another integrator has worked out: see
// the header of the file and the script beside it. Its figures are good to
// 2e-13.
type reference struct {
	name string
	in   model.Model
	land figures
}

// figures are a landing's, SI, and the scale of lengths: the height too, since
// an offset may happen to be near nothing.
type figures struct{ time, offset, axial, speed, normal, length float64 }

// off gives the largest share by which the figures differ from others.
func (f figures) off(g figures) float64 {
	return max(math.Abs(f.time/g.time-1), math.Abs(f.offset-g.offset)/(math.Abs(g.offset)+g.length),
		math.Abs(f.axial-g.axial)/(math.Abs(g.axial)+g.length),
		math.Abs(f.speed/g.speed-1), math.Abs(f.normal-g.normal)/g.speed)
}

// references reads the stored flights.
func references(t *testing.T) []reference {
	t.Helper()
	file, err := os.Open("../../testdata/reference/drag_flights.csv")
	if err != nil {
		t.Fatal(err)
	}
	defer file.Close()
	r := csv.NewReader(file)
	r.Comment = '#'
	rows, err := r.ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	var out []reference
	for _, row := range rows[1:] {
		value := map[string]float64{}
		for i := 1; i < len(row); i++ {
			if value[rows[0][i]], err = strconv.ParseFloat(row[i], 64); err != nil {
				t.Fatal(err)
			}
		}
		out = append(out, newReference(row[0], value))
	}
	if len(out) < 12 {
		t.Fatalf("%d stored flights", len(out))
	}
	return out
}

func newReference(name string, v map[string]float64) reference {
	in := ring(v["floor_radius_m"], v["spin_rad_s"])
	in.Air = air.FromPressure(v["pressure_Pa"], v["temperature_K"])
	in.Bodies = []model.Body{{Name: "b", Mass: v["mass_kg"], Diameter: v["diameter_m"],
		DragCoefficient: v["drag_coefficient"], DragArea: v["drag_area_m2"]}}
	in.Releases = []model.Release{{Name: name, Body: "b", At: model.Station{Height: v["height_m"]}, Until: model.Until{Kind: model.UntilLanding},
		Start: model.Start{Kind: model.Velocity, VSpinward: v["v_spinward_m_s"], VAxial: v["v_axial_m_s"], VUp: v["v_up_m_s"]}}}
	return reference{name: name, in: in, land: figures{time: v["time_s"], offset: v["offset_m"], axial: v["offset_axial_m"],
		speed: v["speed_m_s"], normal: v["normal_speed_m_s"], length: v["height_m"]}}
}

// flown gives the program's own figures.
func flown(t *testing.T, in model.Model, setup flight.Setup) figures {
	t.Helper()
	m, track := one(t, in, setup)
	l := measure.Land(m, track)
	if l.Outcome != flight.Landed {
		t.Fatalf("%s: outcome %v", l.Release, l.Outcome)
	}
	return figures{time: l.Time, offset: l.Offset, axial: l.OffsetAxial, speed: l.Speed, normal: l.NormalSpeed}
}

// referenceTol is what a flight may err by as a whole, as a share: some tens of
// steps, each within the solver's relative tolerance of 1e-9.
const referenceTol = 1e-8

// TestDragFlightsAsReference holds flights with drag to those of the other
// integrator, at the tolerances that scenarios have by default.
func TestDragFlightsAsReference(t *testing.T) {
	for _, ref := range references(t) {
		if off := flown(t, ref.in, flight.Setup{}).off(ref.land); !(off <= referenceTol) {
			t.Errorf("%s: %.2g off, want %.2g at most", ref.name, off, referenceTol)
		}
	}
}

// TestDragFlightsConverge tries the same at a tolerance of 1e-13, which leaves
// the equations themselves, constants and all, nothing to differ by but what
// some thousand steps of 1e-13 do.
func TestDragFlightsConverge(t *testing.T) {
	for _, ref := range references(t) {
		ref.in.Solver.RelTol, ref.in.Solver.PosTol, ref.in.Solver.VelTol = 1e-13, 1e-16, 1e-16
		if off := flown(t, ref.in, flight.Setup{}).off(ref.land); !(off <= 1e-11) {
			t.Errorf("%s: %.2g off, want 1e-11 at most", ref.name, off)
		}
	}
}

// faint is a share of the drag of the program's own law.
type faint struct {
	share float64
	law   air.Law
}

// CdRe implements [air.Law].
func (f faint) CdRe(re float64) float64 { return f.share * f.law.CdRe(re) }

// wide is how much farther than the tolerance a wrong run must lie from the
// reference to be told from it without doubt.
const wide = 1000

// TestReferenceTellsCoriolisSign tries that the stored flights would find a
// Coriolis acceleration of the wrong sign: with the spin reversed and all else
// as it is, the centrifugal one is the same.
func TestReferenceTellsCoriolisSign(t *testing.T) {
	for _, ref := range references(t) {
		ref.in.Habitat.Spin = -ref.in.Habitat.Spin
		if off := flown(t, ref.in, flight.Setup{}).off(ref.land); !(off > wide*referenceTol) {
			t.Errorf("%s: the wrong sign is %.2g off only", ref.name, off)
		}
	}
}

// TestReferenceTellsHalfDrag tries that they would find drag of half the
// strength, and of 1 % too little.
func TestReferenceTellsHalfDrag(t *testing.T) {
	for _, ref := range references(t) {
		var law air.Law = air.CliftGauvin{}
		if cd := ref.in.Bodies[0].DragCoefficient; cd > 0 {
			law = air.Constant(cd)
		}
		if off := flown(t, ref.in, flight.Setup{Law: faint{1, law}}).off(ref.land); !(off <= referenceTol) {
			t.Errorf("%s: with all of the drag %.2g off", ref.name, off)
		}
		if off := flown(t, ref.in, flight.Setup{Law: faint{0.5, law}}).off(ref.land); !(off > wide*referenceTol) {
			t.Errorf("%s: half the drag is %.2g off only", ref.name, off)
		}
		if off := flown(t, ref.in, flight.Setup{Law: faint{0.99, law}}).off(ref.land); !(off > 10*referenceTol) {
			t.Errorf("%s: 99 %% of the drag is %.2g off only", ref.name, off)
		}
	}
}
