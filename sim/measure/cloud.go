package measure

import (
	"iter"
	"math"
	"strings"
	"sync"

	"offplumb/sim/flight"
	"offplumb/sim/model"
	"offplumb/sim/table"
)

// Fate is how a sample of a scatter ended.
type Fate uint8

// The fates.
const (
	ShotLanded     Fate = iota // it touched a surface
	ShotTime                   // its time ended
	ShotLost                   // it left the habitat
	ShotImpossible             // its numbers cannot be: it was left out
	ShotFailed                 // it could not be computed: it was left out
	fates
)

// String names a fate as the tables do.
func (f Fate) String() string {
	return [...]string{"landed", "time", "lost", "impossible", "failed"}[f]
}

// Cloud is what the samples of a scatter did: a column for each measure, as
// samples may be many. SI units; NaN where there is no value.
type Cloud struct {
	Scatter *model.Scatter
	Nominal model.Place // where the release starts in the scenario
	Fates   []Fate
	Offset, OffsetAxial,
	Deflection, Time, Speed, Energy []float64
	// Where it landed on the deck beneath the nominal release, unrolled: from
	// plumb under that release, m.
	Spinward, Axial []float64
	Work            flight.Work

	// Draw gives the varied numbers of a sample, SI, in the order of
	// Scatter.Vary.
	Draw func(sample int, into []float64)

	surface, through, why []uint32
	words                 *wordList
}

// NewCloud makes room for the samples of a scatter.
func NewCloud(s *model.Scatter, nominal model.Place) *Cloud {
	n := s.Samples
	c := &Cloud{Scatter: s, Nominal: nominal, Fates: make([]Fate, n), surface: make([]uint32, n), through: make([]uint32, n), why: make([]uint32, n), words: &wordList{}}
	for _, col := range c.columns() {
		*col = make([]float64, n)
		for i := range *col {
			(*col)[i] = math.NaN()
		}
	}
	return c
}

func (c *Cloud) columns() []*[]float64 {
	return []*[]float64{&c.Offset, &c.OffsetAxial, &c.Deflection, &c.Time, &c.Speed, &c.Energy, &c.Spinward, &c.Axial}
}

// wordList keeps each text once. Its numbers depend on who asks first; only the
// texts go out.
type wordList struct {
	mu    sync.Mutex
	texts []string
	index map[string]uint32
}

func (w *wordList) number(s string) uint32 {
	w.mu.Lock()
	defer w.mu.Unlock()
	if w.index == nil {
		w.index, w.texts = map[string]uint32{"": 0}, []string{""}
	}
	n, ok := w.index[s]
	if !ok {
		n = uint32(len(w.texts))
		w.index[s] = n
		w.texts = append(w.texts, s)
	}
	return n
}

func (w *wordList) text(n uint32) string {
	if n == 0 {
		return ""
	}
	return w.texts[n]
}

// LeaveOut notes that a sample has no result, and why.
func (c *Cloud) LeaveOut(sample int, fate Fate, why string) {
	c.Fates[sample], c.why[sample] = fate, c.words.number(why)
}

// between joins the names of openings; no name holds it.
const between = "\x00"

// Set notes what a sample did. spinward and axial say where it landed, m from
// plumb under the nominal release. Samples may be set at the same time by
// several goroutines.
func (c *Cloud) Set(sample int, l *Landing, spinward, axial float64) {
	c.Offset[sample], c.OffsetAxial[sample], c.Deflection[sample] = l.Offset, l.OffsetAxial, l.Deflection
	c.Time[sample], c.Speed[sample], c.Energy[sample] = l.Time, l.Speed, l.Energy
	c.Spinward[sample], c.Axial[sample] = spinward, axial
	c.surface[sample] = c.words.number(l.Surface)
	c.through[sample] = c.words.number(strings.Join(l.AllThrough, between))
	switch l.Outcome {
	case flight.Lost:
		c.Fates[sample] = ShotLost
	case flight.TimeUp:
		c.Fates[sample] = ShotTime
	default:
		c.Fates[sample] = ShotLanded
	}
}

// Keep drops the samples from a number on.
func (c *Cloud) Keep(n int) {
	c.Fates, c.surface, c.through, c.why = c.Fates[:n], c.surface[:n], c.through[:n], c.why[:n]
	for _, col := range c.columns() {
		*col = (*col)[:n]
	}
}

// Surface is what a sample touched first; "": nothing.
func (c *Cloud) Surface(sample int) string { return c.words.text(c.surface[sample]) }

// Through lists the openings that a sample fell through.
func (c *Cloud) Through(sample int) []string { return openingsOf(c.words.text(c.through[sample])) }

func openingsOf(joined string) []string {
	if joined == "" {
		return nil
	}
	return strings.Split(joined, between)
}

// shot is a sample as a row.
type shot struct {
	c *Cloud
	i int
}

// shotColumns are those of scatter/NAME.csv behind the varied numbers.
var shotColumns = []column[shot]{
	{key: "offset", unit: metre, meaning: "deck offset: arc on the deck beneath the release, from plumb under the release to plumb under the landing, spinward positive",
		num: func(s *shot) float64 { return s.c.Offset[s.i] }},
	{key: "offset_axial", unit: metre, meaning: "axial distance from release to landing", num: func(s *shot) float64 { return s.c.OffsetAxial[s.i] }},
	{key: "deflection", unit: metre, meaning: "apparent deflection: deck offset less that of the uniform-gravity path", num: func(s *shot) float64 { return s.c.Deflection[s.i] }},
	{key: "time", unit: second, meaning: "time of the landing, from the release", num: func(s *shot) float64 { return s.c.Time[s.i] }},
	{key: "speed", unit: speedUnit, meaning: "speed of the centre relative to the surface", num: func(s *shot) float64 { return s.c.Speed[s.i] }},
	{key: "energy", unit: joule, meaning: "half m v^2 at that speed, without spin", num: func(s *shot) float64 { return s.c.Energy[s.i] }},
	{key: "surface", meaning: "surface first touched", text: func(s *shot) string { return s.c.Surface(s.i) }},
	{key: "through", meaning: "openings fallen through, before the landing and after it", text: func(s *shot) string { return strings.Join(s.c.Through(s.i), "; ") }},
	{key: "outcome", meaning: "landed, time, lost; impossible: the numbers of this sample cannot be, and it is left out; failed: it could not be computed, and is left out",
		text: func(s *shot) string { return s.c.Fates[s.i].String() }},
	{key: "plan_spinward", unit: metre, meaning: "place of the landing on the deck beneath the release, unrolled, from plumb under the release as the scenario has it",
		num: func(s *shot) float64 { return s.c.Spinward[s.i] }},
	{key: "plan_axial", unit: metre, meaning: "axial place of the landing, from the release as the scenario has it", num: func(s *shot) float64 { return s.c.Axial[s.i] }},
}

// kilogram and squareMetre are units that only varied numbers have.
var (
	kilogram    = unit{"_kg", "kg", 1, "kg"}
	squareMetre = unit{"_m2", "m^2", 1, "m^2"}
)

// spreadUnits are those of varied numbers; others are ratios.
var spreadUnits = map[string]unit{
	"at.spinward": metre, "at.axial": metre, "at.height": metre, "at.radius": metre,
	"velocity.spinward": speedUnit, "velocity.axial": speedUnit, "velocity.up": speedUnit,
	"throw.speed": speedUnit, "throw.heading": degree, "throw.elevation": degree, "time": second,
	"body.mass": kilogram, "body.diameter": metre, "body.drag_area": squareMetre, "habitat.spin": turns,
}

func spreadColumn(s *model.Spread) table.Column {
	u := spreadUnits[s.Key]
	if s.IsAngle {
		u = degree
	}
	name := s.Key
	if name == "time" { // the landing has a column time_s
		name = "release.time"
	}
	return table.Column{Name: name + u.suffix, Unit: u.name, Scale: u.scale, Kind: table.Number, Meaning: "value of " + s.Key + " in this sample"}
}

// CloudColumns are those of scatter/NAME.csv.
func CloudColumns(s *model.Scatter) []table.Column {
	out := []table.Column{{Name: "sample", Kind: table.Integer, Meaning: "number of the sample, from 1"}}
	for i := range s.Vary {
		out = append(out, spreadColumn(&s.Vary[i]))
	}
	return append(out, headers(shotColumns)...)
}

// Rows gives the rows of scatter/NAME.csv, one after another. A row is good
// until the next.
func (c *Cloud) Rows() iter.Seq[[]table.Cell] {
	return func(yield func([]table.Cell) bool) {
		drawn := make([]float64, len(c.Scatter.Vary))
		row := make([]table.Cell, 0, len(drawn)+len(shotColumns)+1)
		for i := range c.Fates {
			c.Draw(i, drawn)
			row = append(row[:0], table.Num(float64(i+1)))
			for _, x := range drawn {
				row = append(row, table.Num(x))
			}
			if !yield(append(row, cells(shotColumns, &shot{c, i})...)) {
				return
			}
		}
	}
}

// Shot is what one sample did, to be kept elsewhere. SI units; NaN where there
// is no value.
type Shot struct {
	Fate                                                 Fate
	Offset, OffsetAxial, Deflection, Time, Speed, Energy float64
	Spinward, Axial                                      float64
	Surface, Through, Why                                string
}

// Shot gives a sample.
func (c *Cloud) Shot(i int) Shot {
	return Shot{c.Fates[i], c.Offset[i], c.OffsetAxial[i], c.Deflection[i], c.Time[i], c.Speed[i], c.Energy[i], c.Spinward[i], c.Axial[i],
		c.words.text(c.surface[i]), c.words.text(c.through[i]), c.words.text(c.why[i])}
}

// Take puts a sample in place that Shot gave.
func (c *Cloud) Take(i int, s Shot) {
	c.Fates[i], c.Offset[i], c.OffsetAxial[i], c.Deflection[i] = s.Fate, s.Offset, s.OffsetAxial, s.Deflection
	c.Time[i], c.Speed[i], c.Energy[i], c.Spinward[i], c.Axial[i] = s.Time, s.Speed, s.Energy, s.Spinward, s.Axial
	c.surface[i], c.through[i], c.why[i] = c.words.number(s.Surface), c.words.number(s.Through), c.words.number(s.Why)
}
