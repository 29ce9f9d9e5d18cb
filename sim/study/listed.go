package study

import (
	"fmt"
	"math"

	"offplumb/sim/flight"
	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// Row is what a row of a long release list did, whose releases are not those of
// the scenario.
type Row struct {
	Outcome
	Flown bool       // it was asked for
	Deck  int        // beneath it
	Foot  [2]float64 // m, of its plumb line on the plan of what is beneath it: along and axial
}

// Judged is a limit judged by some rows; without Any it judges none of them.
type Judged struct {
	Verdict measure.Verdict
	Any     bool
}

// Add takes a verdict on a row behind those before. Of verdicts as bad the first
// stays.
func (j *Judged) Add(o Judged) {
	if o.Any && j.Any {
		j.Verdict.Join(&o.Verdict)
	} else if o.Any {
		*j = o
	}
}

// RowFlier flies rows of long lists, one after another, and judges the limits by
// them. It keeps nothing of a row.
type RowFlier struct {
	p     *Prepared
	flier *flight.Flier
	surer *surer
	track flight.Track // the last one's
}

// RowFlier makes one; each worker has its own.
func (p *Prepared) RowFlier() *RowFlier {
	return &RowFlier{p: p, flier: flight.NewFlier(p.Model), surer: newSurer(p.Model)}
}

// Fly flies a row and adds its verdicts to those of the limits.
func (f *RowFlier) Fly(r *model.Release, verdicts []Judged) (Row, error) {
	m := f.p.Model
	let, fault := flight.Release(m, r, nil)
	if fault.Msg != "" {
		return Row{}, fmt.Errorf("release %q: %s", r.Name, fault.Msg)
	}
	track := &f.track
	if err := f.flier.FlyAgain(track, &let); err != nil {
		return Row{}, fmt.Errorf("release %q: %w", r.Name, err)
	}
	out := Row{Flown: true, Deck: let.Place.Deck, Outcome: Outcome{measure.Land(m, track), measure.EndOf(m, track), track.Work}}
	out.Foot = footOf(m, &let)
	f.surer.sure(&let, track, &out.Landing)
	if len(f.p.Limits) == 0 {
		return out, nil
	}
	e := f.evidence(track, &out)
	for i := range f.p.Limits {
		if v, ok := f.p.Limits[i].JudgeRelease(r.Name, e); ok {
			verdicts[i].Add(Judged{v, true})
		}
	}
	return out, nil
}

// evidence is what limits judge a row by.
func (f *RowFlier) evidence(t *flight.Track, row *Row) measure.Evidence {
	m := f.p.Model
	return measure.Evidence{
		Landing:   func(int) (*measure.Landing, bool) { return &row.Landing, true },
		Rest:      func(int) (*measure.Rest, bool) { return &row.Rest, true },
		Events:    func(int) ([]measure.Event, bool) { return measure.Events(m, t), true },
		Clearance: func(int) ([]measure.Clearance, bool) { return measure.Clearances(m, t), true },
		Track: func(int) ([]measure.Sample, bool) {
			rows, _ := measure.Samples(m, t, flight.NewForces(m, t.Body, nil))
			return rows, true
		},
	}
}

// footOf is the foot of a release's plumb line on the plan of what is beneath.
func footOf(m *model.Model, let *flight.Let) [2]float64 {
	g := measure.GroundAt(m, let.Place.Polar, let.Place.Deck)
	if f := g.Flat; f != nil {
		return [2]float64{f.Radius * math.Tan(let.Place.Phi-f.Phi), let.Place.Z - f.Z}
	}
	return [2]float64{g.Radius * let.Place.Phi, let.Place.Z}
}
