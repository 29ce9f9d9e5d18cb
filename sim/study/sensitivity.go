package study

import (
	"context"
	"fmt"
	"math"
	"sync/atomic"

	"gonum.org/v1/gonum/diff/fd"
	"gonum.org/v1/gonum/mat"
	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/flight"
	"offplumb/sim/measure"
	"offplumb/sim/model"
)

const (
	// leastNudge and mostNudge bound the step of a difference as a share of its
	// scale. Between them it is the cube root of the relative tolerance, where
	// the error of a central difference, the step squared, is that of the
	// computed landings over the step.
	leastNudge, mostNudge = 1e-4, 1e-2
	// askew is the cosine between the normals of two touches from which on they
	// are on different sides of one surface.
	askew = 0.9
)

// nudge is a number of a release that is changed.
type nudge struct {
	input, unit string
	one         float64 // SI, one of the unit
	step        float64 // SI
	per         float64 // of the number as the scenario holds it, for 1 SI
	spread      model.Spread
	reach       func(*model.Reach) *float64 // of a carried release; nil: by spread
}

// Slopes works out how the landings of some releases change with what they are
// let go with: place, velocity or throw, and spin, by central differences. Every
// flight of a difference must first touch the same side of the same surface,
// through the same openings; where one does not there is none. Rows of a release
// stand together, in the order of which.
//
// It stops early, with the context's error, when the context ends.
func (p *Prepared) Slopes(ctx context.Context, which []int, results []Result, opt Options) ([]measure.Slope, error) {
	type work struct {
		of int
		by nudge
	}
	var all []work
	for _, i := range which {
		if l := &results[i].Landing; l.Outcome == flight.Landed && l.Time > 0 {
			for _, n := range p.nudges(i, l) {
				all = append(all, work{of: i, by: n})
			}
		}
	}
	out := make([]measure.Slope, len(all))
	var next atomic.Int64
	spread(min(opt.Workers, len(all)), func() {
		flier := flight.NewFlier(p.Model)
		for {
			k := int(next.Add(1)) - 1
			if k >= len(all) || ctx.Err() != nil {
				return
			}
			w := &all[k]
			d := differ{p: p, of: &p.Lets[w.of], base: &results[w.of], flier: flier}
			out[k] = d.slope(&w.by)
		}
	})
	return out, ctx.Err()
}

// nudges lists what is changed of a release that lands. Steps are shares of the
// flight's own scales: its way v T, v the greater of its speeds at the start and
// at the landing, but at most its distance from the axis; that way over T; the
// angle by which a throw misses by that way, at most a radian; the spin.
func (p *Prepared) nudges(i int, l *measure.Landing) (out []nudge) {
	let := &p.Lets[i]
	r := let.Release
	share := math.Min(math.Max(math.Cbrt(p.Model.Solver.RelTol), leastNudge), mostNudge)
	speed := math.Max(l.Speed, r3.Norm(let.Local.Vel))
	way := speed * l.Time
	if at := let.Place.R; at > 0 {
		way = math.Min(way, at)
	}
	length := func(key string, per float64, isAngle bool) {
		out = append(out, nudge{input: key, unit: "m", one: 1, step: share * way, per: per, spread: model.Spread{Key: key, IsAngle: isAngle}})
	}
	if r.Carried == nil {
		length("at.spinward", p.perArc(r, let), r.At.Spinward.IsAngle)
		length("at.axial", 1, false)
		if r.At.HasRadius {
			length("at.radius", 1, false)
		} else {
			length("at.height", 1, false)
		}
	} else {
		for _, n := range reaches {
			out = append(out, nudge{input: "carried.reach." + n.name, unit: "m", one: 1, step: share * way, per: 1, reach: n.to})
		}
	}
	add := func(key, unit string, one, step float64) {
		out = append(out, nudge{input: key, unit: unit, one: one, step: step, per: 1, spread: model.Spread{Key: key}})
	}
	switch r.Start.Kind {
	case model.Thrown:
		angle := share * math.Min(1, way/(r.Start.Speed*l.Time))
		add("throw.speed", "m/s", 1, share*math.Min(way/l.Time, r.Start.Speed))
		add("throw.heading", "deg", math.Pi/180, angle)
		add("throw.elevation", "deg", math.Pi/180, angle)
	case model.Dropped, model.Velocity:
		add("velocity.spinward", "m/s", 1, share*way/l.Time)
		add("velocity.axial", "m/s", 1, share*way/l.Time)
		add("velocity.up", "m/s", 1, share*way/l.Time)
	}
	if spin := math.Abs(p.Model.Habitat.Spin); spin > 0 {
		add("habitat.spin", "rad/s", 1, share*spin)
	}
	return out
}

// reaches are the numbers of a reach.
var reaches = []struct {
	name string
	to   func(*model.Reach) *float64
}{
	{"spinward", func(r *model.Reach) *float64 { return &r.Spinward }},
	{"axial", func(r *model.Reach) *float64 { return &r.Axial }},
	{"height", func(r *model.Reach) *float64 { return &r.Height }},
}

// perArc is by how much a place round the circle changes, as the scenario holds
// it, for 1 m of arc.
func (p *Prepared) perArc(r *model.Release, let *flight.Let) float64 {
	if !r.At.Spinward.IsAngle {
		return 1
	}
	if r.At.HasRadius {
		return 1 / r.At.Radius
	}
	g := measure.GroundAt(p.Model, let.Place.Polar, let.Place.Deck)
	return 1 / g.Radius
}

// differ takes the differences of one release.
type differ struct {
	p     *Prepared
	of    *flight.Let
	base  *Result
	flier *flight.Flier
}

// slope takes the central difference for one number.
func (d *differ) slope(n *nudge) measure.Slope {
	nan := math.NaN()
	out := measure.Slope{Release: d.of.Release.Name, Input: n.input, Unit: n.unit, Step: n.step / n.one,
		Offset: nan, Deflection: nan, Axial: nan, Time: nan, Speed: nan}
	if !(n.step > 0) {
		out.Note = "there is nothing to change it by"
		return out
	}
	jac := mat.NewDense(5, 1, nil)
	fd.Jacobian(jac, func(y, x []float64) {
		l, why := d.land(n, x[0]*n.step)
		if why != "" {
			if out.Note == "" {
				out.Note = why
			}
			return
		}
		y[0], y[1], y[2], y[3], y[4] = l.Offset, l.Deflection, l.OffsetAxial, l.Time, l.Speed
	}, []float64{0}, &fd.JacobianSettings{Formula: fd.Central, Step: 1})
	if out.Note != "" {
		return out
	}
	by := n.one / n.step
	out.Offset, out.Deflection, out.Axial = by*jac.At(0, 0), by*jac.At(1, 0), by*jac.At(2, 0)
	out.Time, out.Speed = by*jac.At(3, 0), by*jac.At(4, 0)
	return out
}

// land flies the release with a number changed by x (SI), up to its landing, or
// says in words why it cannot be compared.
func (d *differ) land(n *nudge, x float64) (measure.Landing, string) {
	none := measure.Landing{}
	m, flier := d.p.Model, d.flier
	v := m.VariantOf(d.of.Release)
	v.Release.Until = model.Until{Kind: model.UntilLanding}
	d.set(&v, n, x)
	v.Release.Own = &v.Body
	if v.Spin != m.Habitat.Spin {
		m = m.Spun(v.Spin)
		flier = flight.NewFlier(m)
	}
	how := fmt.Sprintf("with %.3g %s %s", math.Abs(x)/n.one, n.unit, map[bool]string{false: "less", true: "more"}[x > 0])
	let, fault := flight.Release(m, &v.Release, d.p.carrier(d.of.Release))
	if v.Release.Carried == nil && fault.Msg == "" {
		fault.Msg = m.Obstructed(let.Place, let.Body.Diameter/2)
	}
	if fault.Msg != "" {
		return none, how + " it cannot start there"
	}
	track, err := flier.Fly(&let)
	if err != nil {
		return none, how + " it cannot be computed"
	}
	l := measure.Land(m, track)
	if why := d.other(track, &l); why != "" {
		return none, how + " it " + why
	}
	return l, ""
}

// set changes a number of a variant by x (SI).
func (d *differ) set(v *model.Variant, n *nudge, x float64) {
	if n.reach != nil {
		c := *v.Release.Carried
		*n.reach(&c.Reach) += x
		v.Release.Carried = &c
		return
	}
	v.Set(&n.spread, v.Get(n.spread.Key)+x*n.per)
}

// other says in words how a landing is not of the kind of the first; "": it is.
func (d *differ) other(t *flight.Track, l *measure.Landing) string {
	first := &d.base.Landing
	switch {
	case l.Outcome != flight.Landed:
		return "lands on nothing"
	case l.Surface != first.Surface:
		return "lands on " + l.Surface
	case len(l.FellThrough) != len(first.FellThrough):
		return "falls through other openings"
	case d.base.Track != nil && r3.Dot(t.Landing().Contact.Normal, d.base.Track.Landing().Contact.Normal) < askew:
		return "lands on another side of " + l.Surface
	}
	for i := range l.FellThrough {
		if l.FellThrough[i] != first.FellThrough[i] {
			return "falls through other openings"
		}
	}
	return ""
}
