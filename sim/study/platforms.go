package study

import (
	"context"
	"fmt"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/flight"
	"offplumb/sim/measure"
	"offplumb/sim/model"
)

const (
	// placed is how exactly, in m, a platform is placed.
	placed = 1e-3
	// mostPlatforms bounds the platforms of one passage.
	mostPlatforms = 1000
	// tried is at how many heights between two platforms the speed is looked at
	// after the place is found, since it need not grow with the height.
	tried = 16
)

// Platforms finds where platforms or nets must stand in a passage so that a
// body that is let go in its middle, at rest, anywhere along it never touches
// anything at more than a speed: from the outer end inward, each as far from
// the last as the speed allows. The platform at the outer end is the first.
func Platforms(ctx context.Context, m *model.Model, s *model.Spacing) ([]measure.Platform, error) {
	p, ok := m.PassageNamed(s.Passage)
	if !ok {
		return nil, fmt.Errorf("no passage named %q", s.Passage)
	}
	f := faller{m: m, passage: p, body: m.BodyOf(&model.Release{Body: s.Body}), flier: flight.NewFlier(m)}
	at := p.ToRadius
	var out []measure.Platform
	for len(out) < mostPlatforms {
		if ctx.Err() != nil {
			return nil, context.Cause(ctx)
		}
		next, err := f.highest(at, p.FromRadius, s.MaxSpeed)
		if err != nil {
			return nil, err
		}
		row, err := f.worst(at, next)
		if err != nil {
			return nil, err
		}
		out = append(out, row)
		if next <= p.FromRadius {
			return out, nil
		}
		if at-next < 2*placed+f.body.Diameter/2 {
			return nil, fmt.Errorf("platforms of %q: no spacing keeps the speed below %g m/s at %.4g m from the axis", s.Name, s.MaxSpeed, at)
		}
		at = next
	}
	return nil, fmt.Errorf("platforms of %q: more than %d would be needed", s.Name, mostPlatforms)
}

// faller lets a body go in a passage.
type faller struct {
	m       *model.Model
	passage *model.Passage
	body    model.Body
	flier   *flight.Flier
}

// speed is the greatest speed (m/s) of a contact of a body let go at a distance
// r from the axis, before and at a platform at the distance to.
func (f *faller) speed(r, to float64) (float64, error) {
	rel := &model.Release{Name: f.passage.Name, Own: &f.body, At: model.Station{Radius: r, HasRadius: true,
		Spinward: f.passage.Spinward, Axial: f.passage.Axial}}
	if !f.passage.Spinward.IsAngle {
		rel.At.Spinward = model.Arc{Value: f.passage.Spinward.Angle(f.passage.FromRadius), IsAngle: true}
	}
	let, fault := flight.Release(f.m, rel, nil)
	if fault.Msg != "" {
		return 0, fmt.Errorf("%s", fault.Msg)
	}
	track, err := f.flier.Fly(&let)
	if err != nil {
		return 0, err
	}
	at, passes := measure.Crossing(f.m, track, to-f.body.Diameter/2)
	most := 0.0
	for i := range track.Impacts {
		if hit := &track.Impacts[i]; !passes || hit.Time <= at {
			most = max(most, r3.Norm(hit.State.Vel))
		}
	}
	if passes {
		a := f.m.Motion.At(track.Begin + at)
		most = max(most, r3.Norm(a.ToHabitat(track.At(at)).Vel))
	}
	return most, nil
}

// highest gives the innermost place, between in and the platform at, from
// which a fall onto the platform keeps below a speed.
func (f *faller) highest(at, in, most float64) (float64, error) {
	v, err := f.speed(in, at)
	if err != nil || v <= most {
		return in, err
	}
	good, bad := at-f.body.Diameter/2, in
	for good-bad > placed {
		mid := (good + bad) / 2
		v, err := f.speed(mid, at)
		if err != nil {
			return 0, err
		}
		if v <= most {
			good = mid
		} else {
			bad = mid
		}
	}
	return good, nil
}

// worst looks at falls from all heights between two platforms.
func (f *faller) worst(at, from float64) (measure.Platform, error) {
	out := measure.Platform{Radius: at, Fall: at - from}
	for k := range tried {
		r := from + (at-f.body.Diameter/2-from)*float64(k)/tried
		v, err := f.speed(r, at)
		if err != nil {
			return out, err
		}
		if v > out.Speed {
			out.Speed, out.From = v, r
		}
	}
	out.Energy = f.body.Mass * out.Speed * out.Speed / 2
	return out, nil
}
