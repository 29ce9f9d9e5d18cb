package scenarios_test

import (
	"context"
	"fmt"
	"math"
	"reflect"
	"slices"
	"strings"
	"testing"

	"offplumb/scenarios"
	"offplumb/sim/measure"
	"offplumb/sim/study"
)

// sweepHead is a ring without air, 18 m in radius, with a drop in it.
const sweepHead = `format = 1
[habitat]
floor_radius = "18 m"
spin = "5.2 rpm"
[air]
none = true
[[release]]
name = "drop 1"
at = { height = "1 m" }
`

// swept loads a scenario and runs its first sweep.
func swept(t *testing.T, src string, workers int) (*scenarios.Sweep, []study.Point) {
	t.Helper()
	sc, err := scenarios.Load("sweep.toml", []byte(src), scenarios.Options{})
	if err != nil {
		t.Fatal(err)
	}
	return sc.Sweeps[0], runSweep(t, sc, sc.Sweeps[0], workers)
}

func runSweep(t *testing.T, sc *scenarios.Scenario, s *scenarios.Sweep, workers int) []study.Point {
	t.Helper()
	run := study.Sweep{Points: s.Points(), Picks: s.Picks, Variant: func(i int) (*study.Prepared, error) { return sc.Variant(s, i) }}
	points, err := run.Run(context.Background(), study.Options{Workers: workers})
	if err != nil {
		t.Fatal(err)
	}
	return points
}

// dropSlack bounds the roundings of the offset of a drop from below a third of
// the way to the axis, as a share of the radius: what sim/measure allows there
// (500 epsilon) times 1 + turned^2, of at most 2.3.
const dropSlack = 1200 * 0x1p-52

// TestSweepOfDrops: a sweep of the release height in vacuum gives the closed
// form at each point.
func TestSweepOfDrops(t *testing.T) {
	s, points := swept(t, sweepHead+`[[sweep]]
name = "chart"
key = "release.drop 1.at.height"
from = "5 cm"
to = "590 cm"
count = 40
measures = "landings.offset"
`, 2)
	if s.Keys[0].Unit != "cm" || len(points) != 40 {
		t.Fatalf("%d points in %q", len(points), s.Keys[0].Unit)
	}
	spin := 5.2 * math.Pi / 30
	for i := range points {
		height := s.Keys[0].Values[i] / 100
		want := measure.DropOffset(18, height, spin)
		if got := points[i].Values[0]; !(math.Abs(got-want) <= 18*dropSlack) {
			t.Errorf("%g m: offset %.17g m, want %.17g m", height, got, want)
		}
	}
}

// TestSweepOfSpinIsAntisymmetric: turning the habitat the other way round
// mirrors an offset and leaves a speed; without spin nothing lands.
func TestSweepOfSpinIsAntisymmetric(t *testing.T) {
	s, points := swept(t, sweepHead+`[solver]
max_time = "1 min"
[[sweep]]
name = "spin"
key = "habitat.spin"
from = "-6 rpm"
to = "6 rpm"
count = 9
measures = ["landings.offset", "landings.speed"]
`, 2)
	for i := range points {
		a, b := points[i].Values, points[len(points)-1-i].Values
		if k := s.Keys[0].Values; k[i] != -k[len(k)-1-i] {
			t.Fatalf("the spins are %v", k)
		}
		if s.Keys[0].Values[i] == 0 {
			if !math.IsNaN(a[0]) || a[1] != 0 {
				t.Errorf("without spin: %v", a)
			}
			continue
		}
		if !(math.Abs(a[0]+b[0]) <= 18*dropSlack) || !(math.Abs(a[1]-b[1]) <= 1e-11*a[1]) || a[0] == 0 {
			t.Errorf("%g rpm: %v, the other way round %v", s.Keys[0].Values[i], a, b)
		}
	}
}

// TestSweepOfTwoKeys: all pairs, the second key going fastest; one of them may
// hold words.
func TestSweepOfTwoKeys(t *testing.T) {
	s, points := swept(t, sweepHead+`[[deck]]
name = "upper \"B\""
radius = "15 m"
[[sweep]]
name = "chart"
key = 'release."drop 1".at.height'
values = ["50 cm", "1 m", "2.5 m"]
key2 = "release.drop 1.at.deck"
values2 = ["floor", "upper \"B\""]
measures = "landings.offset"
`, 2)
	if got, want := fmt.Sprint(s.Settings(3)), `[release."drop 1".at.height=1 m release.drop 1.at.deck="upper \"B\""]`; got != want {
		t.Errorf("settings %s, want %s", got, want)
	}
	if got, want := s.Short(3), `height 1 m, deck upper "B"`; got != want {
		t.Errorf("in short %s, want %s", got, want)
	}
	if k := s.Keys[0]; k.Unit != "m" || !slices.Equal(k.Values, []float64{0.5, 1, 2.5}) || k.Words() || !s.Keys[1].Words() {
		t.Errorf("keys %+v", s.Keys)
	}
	spin, i := 5.2*math.Pi/30, 0
	for _, height := range []float64{0.5, 1, 2.5} {
		for _, r := range []float64{18, 15} {
			want := measure.DropOffset(r, height, spin)
			if points[i].Fault != nil || !(math.Abs(points[i].Values[0]-want) <= 18*dropSlack) {
				t.Errorf("point %d: %+v, want %g", i, points[i], want)
			}
			i++
		}
	}
}

// TestSweepSteps tries the values that a range gives: ends as they are, round
// numbers between.
func TestSweepSteps(t *testing.T) {
	for _, c := range []struct{ keys, want string }{
		{`key="release.drop 1.at.height", from="0.2 m", to="1 m", count=9`, "0.2 m|0.3 m|0.4 m|0.5 m|0.6 m|0.7 m|0.8 m|0.9 m|1 m"},
		{`key="release.drop 1.at.height", from="1 m", to="20 cm", count=3`, "1 m|0.6 m|0.2 m"},
		{`key="release.drop 1.at.axial", from="-0.3 ft", to="0.3 ft", count=7`, "-0.3 ft|-0.2 ft|-0.1 ft|0 ft|0.1 ft|0.2 ft|0.3 ft"},
		{`key="release.drop 1.at.height", from="1 m", to="1 m", count=1`, "1 m"},
		{`key="release.drop 1.at.height", from="1 m", to="1.00000000001 m", count=3`, "1 m|1.000000000005 m|1.00000000001 m"},
		{`key="solver.relative_tolerance", from=1e-9, to=3e-9, count=3`, "1e-09|2e-09|3e-09"},
		{`key="solver.relative_tolerance", values=[1e-9, 1_0e-7]`, "1e-9|1_0e-7"},
		{`key="release.drop 1.still", values=[true, false]`, "true|false"},
		{`key="release.drop 1.at.spinward", from="-2 deg", to="2 °", count=2`, "-0.03490658503988659 rad|0.03490658503988659 rad"},
		{`key="release.drop 1.until", values=["1 s", "2 min"]`, "1 s|2 min"},
	} {
		src := strings.Replace(sweepHead, "[habitat]", "sweep = [{name=\"s\", measures=\"landings.time\", "+c.keys+"}]\n[habitat]", 1)
		sc, err := scenarios.Load("s", []byte(src), scenarios.Options{})
		if err != nil {
			t.Errorf("%s: %v", c.keys, err)
			continue
		}
		if got := strings.Join(sc.Sweeps[0].Keys[0].Texts, "|"); got != c.want {
			t.Errorf("%s gives %s, want %s", c.keys, got, c.want)
		}
		for i := range sc.Sweeps[0].Points() {
			if _, err := sc.Variant(sc.Sweeps[0], i); err != nil {
				t.Errorf("%s: point %d: %v", c.keys, i, err)
			}
		}
	}
}

// TestVariantIsTheSetting: a point of a sweep gives the very numbers that the
// scenario gives with the point's settings.
func TestVariantIsTheSetting(t *testing.T) {
	e, ok := scenarios.ExampleNamed("galley-ring")
	if !ok {
		t.Fatal("there is no galley-ring")
	}
	opt := scenarios.Options{ReadFile: exampleFile(&e), Sets: []string{
		"sweep.drop chart.count=4", "release.wrench from the locker.at.axial=0.7 m",
		`sweep.drop chart.of=["release.*", "path.*"]`, `sweep.drop chart.measures=["landings.speed", "rests.time", "impacts.energy", "tracks.v_up.min", "clearance.clearance", "crew.weight", "decks.gravity", "habitat.spin"]`}}
	src := e.Files[0].Data
	sc, err := scenarios.Load("s", src, opt)
	if err != nil {
		t.Fatal(err)
	}
	s := sc.Sweeps[0]
	points := runSweep(t, sc, s, 2)
	for i := range points {
		with := opt
		with.Sets = append(slices.Clone(opt.Sets), s.Settings(i)...)
		whole, err := scenarios.Load("s", src, with)
		if err != nil {
			t.Fatal(err)
		}
		run := study.Sweep{Points: 1, Picks: s.Picks, Variant: func(int) (*study.Prepared, error) {
			p, problems := study.Prepare(whole.Model)
			if len(problems) > 0 {
				return nil, whole.Problems(problems)
			}
			return p, nil
		}}
		want, err := run.Run(context.Background(), study.Options{Workers: 1})
		if err != nil {
			t.Fatal(err)
		}
		for k := range s.Picks {
			if a, b := points[i].Values[k], want[0].Values[k]; a != b && !(math.IsNaN(a) && math.IsNaN(b)) {
				t.Errorf("point %d, %s: %v, want %v", i, s.Picks[k].String(), a, b)
			}
		}
	}
	if points[0].Values[0] == points[1].Values[0] || math.IsNaN(points[0].Values[0]) {
		t.Errorf("the points do not differ: %+v", points[:2])
	}
}

// TestSweepSameForAnyWorkers compares all bits.
func TestSweepSameForAnyWorkers(t *testing.T) {
	const src = sweepHead + `[[sweep]]
name = "s"
key = "release.drop 1.at.height"
from = "0 m"
to = "20 m"
count = 17
measures = ["rests.time", "landings.offset"]
`
	var first []study.Point
	for _, workers := range []int{1, 7} {
		_, points := swept(t, src, workers)
		for i := range points {
			for k, v := range points[i].Values {
				if math.IsNaN(v) {
					points[i].Values[k] = -1e300 // equal to itself
				}
			}
			if points[i].Fault != nil {
				points[i].Fault = fmt.Errorf("%s", points[i].Fault)
			}
		}
		if first != nil && !reflect.DeepEqual(points, first) {
			t.Errorf("%d workers give other points", workers)
		}
		first = points
	}
}

// TestImpossiblePoints: a point that cannot be has no values and says why; the
// others are not touched, and nor is a measure of what stays possible.
func TestImpossiblePoints(t *testing.T) {
	const two = `[[release]]
name = "far"
at = { height = "17 m" }
[[release_list]]
file = "list.csv"
`
	sc, err := scenarios.Load("s", []byte(sweepHead+two+`[[sweep]]
name = "s"
key = "habitat.floor_radius"
values = ["18 m", "16 m", "0.5 m"]
measures = "landings.offset"
of = "release.drop 1"
[[sweep]]
name = "all"
key = "habitat.floor_radius"
values = ["18 m", "10 m"]
measures = "landings.time"
`), scenarios.Options{ReadFile: reads("list.csv", "release,height_m\nhigh,15\n")})
	if err != nil {
		t.Fatal(err)
	}
	points := runSweep(t, sc, sc.Sweeps[0], 1)
	if points[0].Fault != nil || points[1].Fault != nil {
		t.Errorf("another release makes a point impossible: %+v", points)
	}
	if err := points[2].Fault; err == nil || points[2].Values != nil || !strings.HasPrefix(err.Error(), "release[0].at") {
		t.Errorf("a release outside gives %+v", points[2])
	}
	all := sc.Sweeps[1]
	points = runSweep(t, sc, all, 1)
	if len(all.Picks) != 3 || all.Picks[2].Of != "high" || points[0].Fault != nil || points[1].Fault == nil {
		t.Errorf("picks %v give %+v", all.Picks, points)
	}
}

// reads gives one file.
func reads(name, data string) func(string) ([]byte, error) {
	read := false
	return func(got string) ([]byte, error) {
		if got != name || read {
			return nil, fmt.Errorf("no %s, or twice", got)
		}
		read = true
		return []byte(data), nil
	}
}

// TestLandingsStopEarly: where only landings count, releases are not followed
// past them; the landings are the same in every shipped scenario.
func TestLandingsStopEarly(t *testing.T) {
	all := scenarios.Examples()
	for i := range all {
		e := &all[i]
		sc, err := scenarios.Load(e.Files[0].Name, e.Files[0].Data, scenarios.Options{ReadFile: exampleFile(e), Sets: []string{"solver.max_time=20 s"}})
		if err != nil {
			t.Fatal(err)
		}
		prepare := func(int) (*study.Prepared, error) {
			p, problems := study.Prepare(sc.Model)
			if len(problems) > 0 {
				return nil, sc.Problems(problems)
			}
			return p, nil
		}
		p, err := prepare(0)
		if err != nil {
			t.Fatal(err)
		}
		if len(p.Lets) == 0 {
			continue
		}
		results, err := p.Run(context.Background(), study.Options{Workers: 2})
		if err != nil {
			t.Fatal(err)
		}
		for _, column := range []string{"time", "offset", "deflection", "height", "speed", "incidence"} {
			landingsAs(t, e.Name, sc, prepare, results, "landings."+column)
		}
	}
}

// landingSlack is how far the same landing may differ in m, s, m/s and rad
// between a track that ends at it and one that goes on, where a body that
// slides on is read at the start of that phase: an angle of up to pi has
// roundings of 2.2e-16 of itself, which on a floor of 240 m are 1.7e-13 m.
const landingSlack = 1e-12

func landingsAs(t *testing.T, name string, sc *scenarios.Scenario, prepare func(int) (*study.Prepared, error), results []study.Result, column string) {
	t.Helper()
	picks, err := measure.Picks(sc.Model, column, nil, false)
	if err != nil {
		t.Fatal(err)
	}
	picks = slices.DeleteFunc(picks, func(p measure.Pick) bool { // a let-go series stands for several
		return slices.Contains(measure.SeriesNames(sc.Model), p.Of)
	})
	if len(picks) == 0 {
		return
	}
	run := study.Sweep{Points: 1, Picks: picks, Variant: prepare}
	points, err := run.Run(context.Background(), study.Options{Workers: 1})
	if err != nil || points[0].Fault != nil {
		t.Fatal(err, points[0].Fault)
	}
	rows := make([]measure.Landing, len(results))
	for i := range results {
		rows[i] = results[i].Landing
	}
	table := measure.LandingTable(rows)
	c := table.Index(picks[0].Column(true).Name[len("landings."):])
	for k := range picks {
		i := slices.IndexFunc(rows, func(l measure.Landing) bool { return l.Release == picks[k].Of })
		if got, want := points[0].Values[k], table.Rows[i][c].Num; !(math.Abs(got-want) <= landingSlack) && !(math.IsNaN(got) && math.IsNaN(want)) {
			t.Errorf("%s: %s: %v, want %v", name, picks[k].String(), got, want)
		}
	}
}

// TestTooManySweeps: a file full of sweeps, each of a release of its own, and
// one that asks for more points than there may be, are refused before they
// cost anything.
func TestTooManySweeps(t *testing.T) {
	many := sweepHead + entries(len(sweepHead), func(i int) string {
		return fmt.Sprintf("[[release]]\nname=\"r%[1]d\"\nat={height=\"1 m\"}\n[[sweep]]\nname=\"s%[1]d\"\nkey=\"release.r%[1]d.at.height\"\nvalues=[\"1 m\"]\nmeasures=\"landings.time\"\n", i)
	})
	const large = "[[sweep]]\nname=\"%d\"\nkey=\"habitat.spin\"\nfrom=\"1 rpm\"\nto=\"2 rpm\"\ncount=600_000\nmeasures=\"landings.time\"\n"
	for _, c := range []struct{ src, want string }{
		{many, "h:8013:3: sweep[1000]: wants at most 1000 sweeps of together at most 1000000 points, got 1001 of 1001 "},
		{sweepHead + fmt.Sprintf(large, 1) + fmt.Sprintf(large, 2), "h:17:3: sweep[1]: wants at most 1000 sweeps of together at most 1000000 points, got 2 of 1200000 "},
	} {
		_, err := scenarios.Load("h", []byte(c.src), scenarios.Options{})
		if err == nil || !strings.HasPrefix(err.Error(), c.want) {
			t.Errorf("got %.200v, want %s", err, c.want)
		}
	}
}

// BenchmarkVariant loads one point of a sweep of a shipped scenario.
func BenchmarkVariant(b *testing.B) {
	e, ok := scenarios.ExampleNamed("galley-ring")
	if !ok {
		b.Fatal("there is no galley-ring")
	}
	sc, err := scenarios.Load("galley-ring.toml", e.Files[0].Data, scenarios.Options{ReadFile: exampleFile(&e)})
	if err != nil {
		b.Fatal(err)
	}
	b.ReportAllocs()
	for b.Loop() {
		if _, err := sc.Variant(sc.Sweeps[0], 1); err != nil {
			b.Fatal(err)
		}
	}
}
