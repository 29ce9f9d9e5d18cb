package study_test

import (
	"bytes"
	"context"
	"errors"
	"fmt"
	"math"
	"runtime"
	"slices"
	"testing"

	"offplumb/sim/flight"
	"offplumb/sim/measure"
	"offplumb/sim/model"
	"offplumb/sim/study"
	"offplumb/sim/table"
)

// mapRing is the habitat of these tests, a vacuum unless it has air.
func mapRing(spin float64, l model.LandingMap) model.Model {
	if l.Directions == 0 {
		l.Directions = 1
	}
	l.Name = "m"
	return model.Model{
		Habitat: model.Habitat{Room: model.Room{FloorRadius: ringRadius, Length: 14}, Spin: spin},
		Solver:  model.Solver{RelTol: 1e-9, PosTol: 1e-12, VelTol: 1e-12, MaxTime: 60},
		Output:  model.Output{Step: 0.01},
		Bodies:  []model.Body{{Name: "b", Mass: 1.4, Diameter: 0.08, Restitution: 0.4, Friction: 0.3}},
		Maps:    []model.LandingMap{l},
	}
}

func prepared(t testing.TB, in model.Model) *study.Prepared {
	t.Helper()
	m, problems := model.New(in)
	if problems != nil {
		t.Fatal(problems)
	}
	p, problems := study.Prepare(m)
	if problems != nil {
		t.Fatal(problems)
	}
	return p
}

func mapped(t testing.TB, in model.Model, workers int) *measure.LandMap {
	t.Helper()
	p := prepared(t, in)
	c, err := p.LandingMap(context.Background(), &p.Model.Maps[0], study.MapOptions{Workers: workers})
	if err != nil {
		t.Fatal(err)
	}
	return c
}

func patchOver(x0, x1, z0, z1 float64) model.Region {
	return model.Region{Spinward: &[2]model.Arc{{Value: x0}, {Value: x1}}, Axial: &[2]float64{z0, z1}}
}

// cellsOf maps the cells of the only deck by their numbers.
func cellsOf(t testing.TB, c *measure.LandMap) map[[2]int32]measure.MapCell {
	t.Helper()
	if len(c.Decks) != 1 {
		t.Fatalf("%d decks", len(c.Decks))
	}
	out := map[[2]int32]measure.MapCell{}
	for _, cell := range c.Decks[0].Cells {
		out[[2]int32{cell.I, cell.J}] = cell
	}
	return out
}

// TestDropsLandInTheirCells: bodies dropped in vacuum land R inv(theta)
// antispinward after tan(theta)/omega, cos(theta) = r0/(R - a), inv the involute
// function of the gear handbooks (check A1 of the published ones), in the cells
// and at the times and speeds expected.
func TestDropsLandInTheirCells(t *testing.T) {
	const a, cell, step = 0.04, 0.071, 0.25
	heights := []float64{0.9, 1.9, 3.3}
	c := mapped(t, mapRing(ringSpin, model.LandingMap{Body: "b", Over: patchOver(-1.1, 1.3, 0.1, 0.9), Heights: heights, Step: step, Cell: cell, Until: model.UntilLanding}), 2)
	want := map[[2]int32]int{}
	times := map[[2]int32]float64{}
	worst := map[[2]int32]float64{}
	n := 0
	for i := range 10 { // 2.4 m hold nine steps, and 0.15 m shared out at the ends
		for j := range 4 { // 0.8 m hold three
			x, z := -1.1+0.075+step*float64(i), 0.1+0.025+step*float64(j)
			for _, h := range heights {
				theta := math.Acos((ringRadius - h) / (ringRadius - a))
				s := x - ringRadius*(math.Tan(theta)-theta)
				at := [2]int32{int32(math.Floor(s/cell + 0.5)), int32(math.Floor(z/cell + 0.5))}
				want[at]++
				times[at] += math.Tan(theta) / ringSpin
				// Inertial speed omega r0, of which omega r0 cos(theta) goes
				// spinward where the floor does at omega (R - a).
				v0 := ringSpin * (ringRadius - h)
				v := math.Hypot(v0*math.Sin(theta), v0*math.Cos(theta)-ringSpin*(ringRadius-a))
				worst[at] = math.Max(worst[at], 1.4*v*v/2)
				n++
			}
		}
	}
	if c.Flights != n || c.Landed != n || c.Places != n {
		t.Fatalf("%d flights, %d landed, %d places, want %d", c.Flights, c.Landed, c.Places, n)
	}
	got := cellsOf(t, c)
	for at, k := range want {
		g := got[at]
		if g.Landings != k {
			t.Errorf("cell %v: %d landings, want %d", at, g.Landings, k)
			continue
		}
		// Without drag a flight is exact but for the place of its contact.
		if math.Abs(g.Time-times[at]) > 1e-9*times[at] || math.Abs(g.Worst.Energy-worst[at]) > 1e-8*worst[at] {
			t.Errorf("cell %v: times %g, energy %g, want %g, %g", at, g.Time, g.Worst.Energy, times[at], worst[at])
		}
	}
	if len(got) != len(want) {
		t.Errorf("%d cells, want %d", len(got), len(want))
	}
}

// hatched has an upper deck with a hatch, and a turned box on it.
func hatched(spin float64, l model.LandingMap) model.Model {
	in := mapRing(spin, l)
	way := math.Copysign(1, spin)
	in.Air.Density, in.Air.Viscosity = 1.2, 1.8e-5
	in.Decks = []model.Deck{{Name: "upper", Height: 3, Thickness: 0.05, From: model.Arc{Value: -4}, To: model.Arc{Value: 4}, Axial: [2]float64{-3, 3}, HasAxial: true,
		Friction: model.None, Restitution: model.None, Openings: []model.Opening{{Name: "hatch", Spinward: model.Arc{Value: 0.4 * way}, Size: [2]float64{0.9, 0.8}}}}}
	in.Fixtures = []model.Fixture{{Name: "box", Kind: model.Box, At: model.Station{Deck: "upper", Spinward: model.Arc{Value: -1.2 * way}, Axial: 0.3},
		Size: [3]float64{0.6, 0.4, 0.5}, Turn: 0.3 * way, Friction: model.None, Restitution: model.None}}
	return in
}

func overHatch(spin float64) model.LandingMap {
	turned := func(x0, x1, z0, z1 float64) model.Region {
		if spin < 0 {
			x0, x1 = -x1, -x0
		}
		r := patchOver(x0, x1, z0, z1)
		r.Deck = "upper"
		return r
	}
	r, zone := turned(-1.4, 1.1, -0.6, 0.73), turned(-2, -1.5, -0.5, 0.5)
	return model.LandingMap{Body: "b", Over: r, Heights: []float64{0.4, 1.31}, Speed: 0.7, Directions: 42, Step: 0.33, Cell: 0.117, Until: model.UntilLanding,
		Goals: []model.Goal{{Name: "hatch", Opening: "hatch"}, {Name: "top", Surfaces: []string{"box top"}}, {Name: "aisle", Zone: &zone}}}
}

// TestMapIsItsReleases: a map is what the same releases do one by one.
func TestMapIsItsReleases(t *testing.T) {
	in := hatched(ringSpin, overHatch(ringSpin))
	c := mapped(t, in, 2)
	directions := study.Directions(42)
	l := &in.Maps[0]
	place := 0
	skipped := 0
	var from []int // place of each release
	low, high := l.Over.Spinward[0].Value, l.Over.Spinward[1].Value
	nx, nz := int((high-low)/l.Step)+1, int((l.Over.Axial[1]-l.Over.Axial[0])/l.Step)+1
	free, problems := model.New(in)
	if problems != nil {
		t.Fatal(problems)
	}
	for j := range nz {
		for i := range nx {
			x := (low+high)/2 + (float64(i)-float64(nx-1)/2)*l.Step
			z := (l.Over.Axial[0]+l.Over.Axial[1])/2 + (float64(j)-float64(nz-1)/2)*l.Step
			for _, h := range l.Heights {
				at := model.Station{Deck: "upper", Spinward: model.Arc{Value: x}, Axial: z, Height: h}
				p, _ := free.Resolve(at)
				if place++; free.Obstructed(p, 0.04) != "" {
					skipped++
					continue
				}
				for _, d := range directions {
					from = append(from, place-1)
					in.Releases = append(in.Releases, model.Release{Name: fmt.Sprint(len(in.Releases)), Body: "b", At: at, Until: model.Until{Kind: model.UntilLanding}, NoTrack: true,
						Start: model.Start{Kind: model.Velocity, VSpinward: 0.7 * d.X, VAxial: 0.7 * d.Y, VUp: 0.7 * d.Z}})
				}
			}
		}
	}
	if place != c.Places || skipped != c.SkippedPlaces() || len(from) != c.Flights || skipped == 0 {
		t.Fatalf("%d places, %d skipped, %d flights, want %d, %d, %d", c.Places, c.SkippedPlaces(), c.Flights, place, skipped, len(from))
	}
	results, err := prepared(t, in).Run(context.Background(), study.Options{Workers: 2})
	if err != nil {
		t.Fatal(err)
	}
	landings := map[string]int{}
	energy := map[string]float64{}
	surfaces := map[string]int{}
	reached := [3]map[int]int{{}, {}, {}}
	for i := range results {
		r := &results[i].Landing
		if r.Outcome != flight.Landed {
			t.Fatalf("release %d: %s", i, r.Outcome)
		}
		key := fmt.Sprint(r.Deck, int(math.Floor(r.Arc/l.Cell+0.5)), int(math.Floor(r.Place.Z/l.Cell+0.5)))
		landings[key]++
		energy[key] = math.Max(energy[key], r.Energy)
		surfaces[r.Surface]++
		for g, ok := range []bool{slices.Contains(r.AllThrough, "hatch"), r.Surface == "box top",
			r.Deck == "upper" && r.Arc >= -2 && r.Arc <= -1.5 && math.Abs(r.Place.Z) <= 0.5} {
			if ok {
				reached[g][from[i]]++
			}
		}
	}
	sum := 0
	for i := range c.Decks {
		d := &c.Decks[i]
		for _, cell := range d.Cells {
			key := fmt.Sprint(d.Name, int(cell.I), int(cell.J))
			if cell.Landings != landings[key] || math.Abs(cell.Worst.Energy-energy[key]) > 1e-9*energy[key] {
				t.Errorf("%s: %d landings, %g J, want %d, %g", key, cell.Landings, cell.Worst.Energy, landings[key], energy[key])
			}
			sum += cell.Landings
		}
	}
	if sum != c.Landed || sum != len(results) || c.CellCount() != len(landings) {
		t.Errorf("%d landings in %d cells, want %d in %d", sum, c.CellCount(), len(results), len(landings))
	}
	for i := range c.Surfaces {
		if s := &c.Surfaces[i]; s.Count != surfaces[s.Name] {
			t.Errorf("%s: %d, want %d", s.Name, s.Count, surfaces[s.Name])
		}
	}
	for g := range reached {
		total := 0
		for n := range c.Places {
			if x := c.Reached(g, n); !math.IsNaN(x) && math.Abs(x-float64(reached[g][n])/42) > rounding {
				t.Errorf("goal %d from place %d: %g, want %d of 42", g, n, x, reached[g][n])
			}
			total += reached[g][n]
		}
		if total == 0 || c.Goals[g].Count != total {
			t.Errorf("goal %d: %d, want %d, not 0", g, c.Goals[g].Count, total)
		}
	}
	checkStarts(t, c, prepared(t, in))
}

// checkStarts holds the start that a map tells of a flight against what it does:
// pasted back as a release, it lands as hard.
func checkStarts(t *testing.T, c *measure.LandMap, p *study.Prepared) {
	t.Helper()
	at, height, v := c.Start(c.From)
	r := model.Release{Name: "worst", Body: "b", At: model.Station{Deck: at.Deck, Spinward: model.Arc{Value: at.Spinward}, Axial: at.Axial, Height: height},
		Start: model.Start{Kind: model.Velocity, VSpinward: v.X, VAxial: v.Y, VUp: v.Z}, Until: model.Until{Kind: model.UntilLanding}}
	let, fault := flight.Release(p.Model, &r, nil)
	if fault.Msg != "" {
		t.Fatal(fault)
	}
	track, err := flight.NewFlier(p.Model).Fly(&let)
	if err != nil {
		t.Fatal(err)
	}
	// The station is told to rounding, the flight follows it to its tolerance.
	if l := measure.Land(p.Model, track); math.Abs(l.Energy-c.Worst.Energy) > 1e-7*l.Energy || l.Surface != c.Worst.Surface {
		t.Errorf("the worst start gives %g J on %s, the map %g J on %s", l.Energy, l.Surface, c.Worst.Energy, c.Worst.Surface)
	}
}

// TestMapIsMirrored: with the spin and all things turned round, the map is its
// mirror image.
func TestMapIsMirrored(t *testing.T) {
	one, other := mapped(t, hatched(ringSpin, overHatch(ringSpin)), 2), mapped(t, hatched(-ringSpin, overHatch(-ringSpin)), 2)
	if len(one.Decks) != len(other.Decks) || len(one.Decks) != 2 {
		t.Fatalf("%d and %d decks", len(one.Decks), len(other.Decks))
	}
	for i := range one.Decks {
		a, b := &one.Decks[i], &other.Decks[i]
		if a.Name != b.Name || a.Landings != b.Landings || len(a.Cells) != len(b.Cells) {
			t.Errorf("%s: %d landings in %d cells, mirrored %d in %d", a.Name, a.Landings, len(a.Cells), b.Landings, len(b.Cells))
			continue
		}
		mirrored := map[[2]int32]measure.MapCell{}
		for _, cell := range b.Cells {
			mirrored[[2]int32{-cell.I, cell.J}] = cell
		}
		for _, cell := range a.Cells {
			m := mirrored[[2]int32{cell.I, cell.J}]
			if m.Landings != cell.Landings || math.Abs(m.Worst.Energy-cell.Worst.Energy) > 1e-7*cell.Worst.Energy {
				t.Errorf("%s %d, %d: %d landings, %g J, mirrored %d, %g J", a.Name, cell.I, cell.J, cell.Landings, cell.Worst.Energy, m.Landings, m.Worst.Energy)
			}
		}
	}
	for g := range one.Goals {
		if one.Goals[g].Count != other.Goals[g].Count {
			t.Errorf("%s: %d, mirrored %d", one.Goals[g].Name, one.Goals[g].Count, other.Goals[g].Count)
		}
	}
}

func bytesOf(t *testing.T, c *measure.LandMap) []byte {
	t.Helper()
	var b bytes.Buffer
	err := errors.Join(table.StreamCSV(&b, measure.CellColumns(), c.Rows()), table.StreamCSV(&b, c.ReachColumns(), c.ReachRows()),
		measure.MapTable(c).WriteCSV(&b), measure.FootprintTable(c.Footprints()).WriteCSV(&b))
	if err != nil {
		t.Fatal(err)
	}
	return b.Bytes()
}

func TestMapIsTheSameForAnyWorkers(t *testing.T) {
	l := overHatch(ringSpin)
	l.Until, l.Directions = model.UntilRest, 12
	in := hatched(ringSpin, l)
	want := bytesOf(t, mapped(t, in, 1))
	for _, workers := range []int{2, 5} {
		if !bytes.Equal(bytesOf(t, mapped(t, in, workers)), want) {
			t.Errorf("%d workers give other bytes", workers)
		}
	}
}

// TestMapUntilRest: landings stay those of the map until landing; impacts and
// resting places come on top.
func TestMapUntilRest(t *testing.T) {
	l := overHatch(ringSpin)
	l.Directions = 12
	first := mapped(t, hatched(ringSpin, l), 2)
	l.Until = model.UntilRest
	rest := mapped(t, hatched(ringSpin, l), 2)
	if first.Landed != rest.Landed || first.Flights != rest.Flights {
		t.Fatalf("%d of %d, until rest %d of %d", first.Landed, first.Flights, rest.Landed, rest.Flights)
	}
	touches, rests, landings := 0, 0, 0
	for i := range rest.Decks {
		for _, cell := range rest.Decks[i].Cells {
			touches, rests, landings = touches+cell.Touches, rests+cell.Rests, landings+cell.Landings
		}
	}
	if landings != rest.Landed || rests+rest.Late < rest.Landed-rest.Gone || touches <= landings {
		t.Errorf("%d landings, %d touches, %d rests of %d", landings, touches, rests, rest.Landed)
	}
	if rest.Openings[0].Count < first.Openings[0].Count || rest.Worst.Energy < first.Worst.Energy {
		t.Errorf("through %d, worst %g; until landing %d, %g", rest.Openings[0].Count, rest.Worst.Energy, first.Openings[0].Count, first.Worst.Energy)
	}
}

// TestMapOverTops: places over a turned box lie within its top, at the height
// above it, and drops on it stay there where they fall short of its edge.
func TestMapOverTops(t *testing.T) {
	l := model.LandingMap{Body: "b", Over: model.Region{Fixtures: []string{"box"}, HasFixtures: true}, Heights: []float64{0.06}, Step: 0.1, Cell: 0.1}
	in := hatched(ringSpin, l)
	c := mapped(t, in, 2)
	p := prepared(t, in)
	if c.Places != 7*5 || c.SkippedPlaces() != 0 {
		t.Fatalf("%d places, %d skipped", c.Places, c.SkippedPlaces())
	}
	for n := range c.Places {
		near := p.Model.Interior.Contact(c.Place(n).Vec())
		if name := p.Model.Interior.Surface(near.Surface).Name; name != "box top" || math.Abs(near.Gap-0.06) > 1e-12 {
			t.Errorf("place %d: %g m from %s", n, near.Gap, name)
		}
	}
	// A fall of 2 cm takes 0.1 s and is bent by 0.4 mm: only the places on the
	// edges themselves can miss the top, and they meet its edge.
	if got := c.Surfaces[0]; got.Name != "box top" || got.Count != c.Flights {
		t.Errorf("%d of %d on %s", got.Count, c.Flights, got.Name)
	}
}

// TestMapStops: with its context, and with the context's error.
func TestMapStops(t *testing.T) {
	p := prepared(t, hatched(ringSpin, overHatch(ringSpin)))
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	if _, err := p.LandingMap(ctx, &p.Model.Maps[0], study.MapOptions{Workers: 2}); !errors.Is(err, context.Canceled) {
		t.Error(err)
	}
}

// TestMapIsBounded: what is kept does not grow with the flights, which all land
// in the same cells.
func TestMapIsBounded(t *testing.T) {
	in := mapRing(ringSpin, model.LandingMap{Body: "b", Over: patchOver(-0.5, 0.5, -0.5, 0.5), Heights: []float64{0.3}, Speed: 0.1, Directions: 252, Step: 0.1, Cell: 0.2, Until: model.UntilLanding})
	p := prepared(t, in)
	var live []uint64
	c, err := p.LandingMap(context.Background(), &p.Model.Maps[0], study.MapOptions{Workers: 2, Done: func(int, int) {
		runtime.GC()
		var s runtime.MemStats
		runtime.ReadMemStats(&s)
		live = append(live, s.HeapAlloc)
	}})
	if err != nil {
		t.Fatal(err)
	}
	// Tracks of some kB each would be 100 MB.
	if len(live) < 4 || live[len(live)-1] > live[0]+1<<20 {
		t.Errorf("%d flights in %d blocks, heap %d, then %d", c.Flights, len(live), live[0], live[len(live)-1])
	}
}

// BenchmarkLandingMap flies over a hatch in air.
func BenchmarkLandingMap(b *testing.B) {
	p := prepared(b, hatched(ringSpin, overHatch(ringSpin)))
	b.ReportAllocs()
	for b.Loop() {
		c, err := p.LandingMap(context.Background(), &p.Model.Maps[0], study.MapOptions{Workers: 1})
		if err != nil {
			b.Fatal(err)
		}
		b.ReportMetric(float64(b.Elapsed().Microseconds())/float64(b.N)/float64(c.Flights), "us/flight")
	}
}
