package study

import (
	"context"
	"fmt"
	"math"

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
	// after the place is found, since it need not grow with the height: a fall
	// from far that slides on a rough wall ends more slowly than a short one that
	// does not touch it. They lie the closer the shorter the fall. sharpened is
	// how often the stretch about the fastest is then cut by a third.
	tried, sharpened = 24, 10
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
	f := faller{m: m, asked: s, passage: p, body: m.BodyOf(&model.Release{Body: s.Body}), flier: flight.NewFlier(m)}
	at := p.ToRadius
	var out []measure.Platform
	for len(out) < mostPlatforms {
		if ctx.Err() != nil {
			return nil, context.Cause(ctx)
		}
		row, err := f.above(at, p.FromRadius)
		if err != nil {
			return nil, err
		}
		out = append(out, row)
		next := at - row.Fall
		if next <= p.FromRadius+placed {
			return out, nil
		}
		at = next
	}
	return nil, fmt.Errorf("platforms of %q: more than %d would be needed", s.Name, mostPlatforms)
}

// faller lets a body go in a passage.
type faller struct {
	m       *model.Model
	asked   *model.Spacing
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

// above gives the platform at the distance at from the axis with as long a fall
// onto it as may be, at most from the distance in.
func (f *faller) above(at, in float64) (measure.Platform, error) {
	for from := in; ; {
		next, err := f.highest(at, from)
		if err != nil {
			return measure.Platform{}, err
		}
		if next > in && at-next < 2*placed+f.body.Diameter/2 {
			return measure.Platform{}, fmt.Errorf("platforms of %q: no spacing keeps the speed below %g m/s at %.4g m from the axis", f.asked.Name, f.asked.MaxSpeed, at)
		}
		row, err := f.worst(at, next)
		if err != nil || row.Speed <= f.asked.MaxSpeed || row.From <= next {
			return row, err
		}
		from = row.From // it is farther out, and too fast
	}
}

// highest gives a place, between in and the platform at, from which a fall onto
// the platform keeps below the speed: in itself if it does, else one beside
// which a fall from farther in does not.
func (f *faller) highest(at, in float64) (float64, error) {
	most := f.asked.MaxSpeed
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
	out := measure.Platform{Radius: at, Fall: at - from, From: from}
	long := at - f.body.Diameter/2 - from
	height := func(k float64) float64 { return at - f.body.Diameter/2 - long*k*k/tried/tried }
	top := 0.0
	for k := float64(tried); k > 0; k-- {
		before := out.Speed
		if _, err := f.try(&out, height(k)); err != nil {
			return out, err
		}
		if out.Speed > before {
			top = k
		}
	}
	// The fastest lies between the neighbours of the fastest that was tried.
	err := f.sharpen(&out, height(math.Min(tried, top+1)), height(math.Max(0, top-1)))
	out.Energy = f.body.Mass * out.Speed * out.Speed / 2
	return out, err
}

// try lets a fall onto a platform begin at a distance from the axis, keeps it
// if it is the worst so far, and gives its speed.
func (f *faller) try(p *measure.Platform, r float64) (float64, error) {
	v, err := f.speed(r, p.Radius)
	if v > p.Speed {
		p.Speed, p.From = v, r
	}
	return v, err
}

// sharpen narrows the stretch in which the worst fall begins, by thirds.
func (f *faller) sharpen(p *measure.Platform, lo, hi float64) error {
	for range sharpened {
		u, v := lo+(hi-lo)/3, hi-(hi-lo)/3
		a, err := f.try(p, u)
		if err != nil {
			return err
		}
		b, err := f.try(p, v)
		if err != nil {
			return err
		}
		if a > b {
			hi = v
		} else {
			lo = u
		}
	}
	return nil
}
