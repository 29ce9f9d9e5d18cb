package measure_test

import (
	"math"
	"testing"

	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// TestDoubtOfVerdicts holds verdicts near a bound to what the numerical error
// could make of them, for one landing and for the worst of two.
func TestDoubtOfVerdicts(t *testing.T) {
	q := func(x float64) *model.Quantity { return &model.Quantity{SI: x, Unit: "m"} }
	landing := func(offset, place float64, unsure string) measure.Landing {
		return measure.Landing{Release: "r", Surface: "floor", Offset: offset, Error: measure.Numerical{Place: place, Unsure: unsure}}
	}
	sure := landing(0, 0.001, "")
	for _, c := range []struct {
		name     string
		limit    model.Limit
		landings []measure.Landing
		verdict  string
		doubtful bool
	}{
		{"well within", model.Limit{Max: q(1)}, []measure.Landing{landing(0.9, 0.01, "")}, measure.Held, false},
		{"at the bound, within", model.Limit{Max: q(1)}, []measure.Landing{landing(0.995, 0.01, "")}, measure.Held, true},
		{"at the bound, beyond", model.Limit{Max: q(1)}, []measure.Landing{landing(1.005, 0.01, "")}, measure.Broken, true},
		{"well beyond", model.Limit{Max: q(1)}, []measure.Landing{landing(1.1, 0.01, "")}, measure.Broken, false},
		{"on both sides", model.Limit{MaxAbs: q(1)}, []measure.Landing{landing(-1.005, 0.01, "")}, measure.Broken, true},
		{"at the warning level", model.Limit{Max: q(2), WarnMax: q(1)}, []measure.Landing{landing(0.995, 0.01, "")}, measure.Held, true},
		{"a worse one without doubt", model.Limit{Max: q(1)}, []measure.Landing{landing(0.995, 0.01, ""), landing(1.1, 0.01, "")}, measure.Broken, false},
		{"a better one with more doubt", model.Limit{Max: q(1)}, []measure.Landing{landing(0.9, 0.001, ""), landing(0.8, 0.3, "")}, measure.Held, true},
		{"no estimate", model.Limit{Max: q(1)}, []measure.Landing{landing(0.995, math.NaN(), "")}, measure.Held, false},
		{"unsure", model.Limit{Max: q(1)}, []measure.Landing{landing(0.1, math.NaN(), "bench")}, measure.Held, true},
		{"unsure, of surfaces", model.Limit{SurfaceIn: []string{"floor"}}, []measure.Landing{landing(0.1, math.NaN(), "bench")}, measure.Held, true},
		{"unsure beside a broken one", model.Limit{Max: q(-1)}, []measure.Landing{sure, landing(0.1, math.NaN(), "bench")}, measure.Broken, false},
	} {
		c.limit.Name, c.limit.Measure, c.limit.Of = c.name, "landings.offset", []string{"release.*"}
		in := model.Model{Habitat: model.Habitat{Room: model.Room{FloorRadius: 18}, Spin: 0.5}, Limits: []model.Limit{c.limit}}
		for i := range c.landings {
			in.Releases = append(in.Releases, model.Release{Name: string(rune('a' + i)), At: model.Station{Height: 1}})
		}
		m, problems := model.New(in)
		if problems != nil {
			t.Fatal(problems)
		}
		criteria, problems := measure.Criteria(m)
		if problems != nil {
			t.Fatal(c.name, problems)
		}
		v, ok := criteria[0].Judge(measure.Evidence{Landing: func(i int) (*measure.Landing, bool) { return &c.landings[i], true }})
		if !ok || v.Verdict != c.verdict || v.Doubtful() != c.doubtful || (v.Note() != "") != c.doubtful {
			t.Errorf("%s: %s, doubtful %v (%d to %d), want %s, %v", c.name, v.Verdict, v.Doubtful(), v.Least, v.Most, c.verdict, c.doubtful)
		}
	}
}
