package plots

// LoadsChartSpec is what LoadsChart draws: what a crew member feels along a crew path,
// in panels above one another with one time axis. Each slice has the length of Time, or
// is nil; a NaN or an infinity is a gap. A panel without any finite value is left out.
type LoadsChartSpec struct {
	Title, Desc, Notes string // Desc is for readers who cannot see the figure; Notes may be empty

	Spin         float64   // rad/s; negative: the floor moves antispinward
	Time         []float64 // s, never decreasing; at least two different
	Legs         []LegSpan // in order of time
	GravityFeet  []float64 // g, apparent gravity at the feet
	GravityWaist []float64 // g
	GravityHead  []float64 // g
	Weight       []float64 // N
	SideSpinward []float64 // N, side load, spinward positive
	SideAxial    []float64 // N, side load, +axial positive
	Friction     []float64 // friction demand, a ratio
	HeadCross    []float64 // rad/s², cross-coupled angular acceleration of the head

	Limits [LoadPanels][]Level // limits to draw into each panel
}

// The panels of a LoadsChart.
const (
	PanelGravity = iota
	PanelWeight
	PanelSide
	PanelFriction
	PanelHead
	LoadPanels // how many there are
)

// columns are all the columns, by the panels they go to.
func (s LoadsChartSpec) columns() []loadColumn {
	return []loadColumn{
		{0, "feet", s.GravityFeet}, {0, "waist", s.GravityWaist}, {0, "head", s.GravityHead},
		{1, "", s.Weight},
		{2, "spinward", s.SideSpinward}, {2, "axial", s.SideAxial},
		{3, "", s.Friction},
		{4, "", s.HeadCross},
	}
}

type loadColumn struct {
	panel int
	name  string
	y     []float64
}

var loadTitles = [LoadPanels]string{
	"apparent gravity, g",
	"weight, N",
	"side load, N, spinward and +axial positive",
	"friction demand, side load over weight",
	"cross-coupled angular acceleration of the head, rad/s²",
}

// MostFriction bounds the panel of friction demand, which runs off to infinity where
// the weight goes to zero: no dry contact gives more (common practice, no source).
const MostFriction = 2.0

// LoadsChart draws the loads along a crew path. It is an error if the times are not in
// order, a slice has another length than Time, or no panel has a finite value.
func LoadsChart(spec LoadsChartSpec) (*Figure, error) {
	return StackChart(StackChartSpec{Title: spec.Title, Desc: spec.Desc, Notes: spec.Notes, Spin: spec.Spin,
		Axis: "time, s", X: spec.Time, Legs: spec.Legs, Panels: spec.panels()})
}

func (s LoadsChartSpec) panels() []PanelSpec {
	out := make([]PanelSpec, LoadPanels)
	for i := range out {
		out[i].Title, out[i].Levels = loadTitles[i], s.Limits[i]
	}
	out[PanelFriction].Most = MostFriction
	for _, c := range s.columns() {
		out[c.panel].Curves = append(out[c.panel].Curves, CurveSpec{Name: c.name, Y: c.y})
	}
	return out
}
