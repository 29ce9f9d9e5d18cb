package model

import (
	"fmt"
	"math"
	"strings"
)

// Variant is a release of which some numbers are others.
type Variant struct {
	Release Release
	Body    Body
	Spin    float64 // rad/s, of the habitat
}

// VariantOf is the release as the scenario has it.
func (m *Model) VariantOf(r *Release) Variant {
	return Variant{Release: *r, Body: m.BodyOf(r), Spin: m.Habitat.Spin}
}

// varied is a number of a release that a scatter may vary.
type varied struct {
	key       string
	low, high float64 // of what is possible, SI
	open      bool    // low itself is not
	to        func(v *Variant) *float64
	// lacks says, in words, why a release has no such number; "": it has one.
	lacks func(v *Variant) string
}

var unbounded = math.Inf(1)

// varieds are all of them.
var varieds = []varied{
	{key: "at.spinward", low: -unbounded, high: unbounded, to: func(v *Variant) *float64 { return &v.Release.At.Spinward.Value }, lacks: noPlace},
	{key: "at.axial", low: -unbounded, high: unbounded, to: func(v *Variant) *float64 { return &v.Release.At.Axial }, lacks: noPlace},
	{key: "at.height", low: -unbounded, high: unbounded, to: func(v *Variant) *float64 { return &v.Release.At.Height }, lacks: noHeight},
	{key: "at.radius", low: 0, high: unbounded, to: func(v *Variant) *float64 { return &v.Release.At.Radius }, lacks: noRadius},
	{key: "velocity.spinward", low: -unbounded, high: unbounded, to: func(v *Variant) *float64 { return &v.Release.Start.VSpinward }, lacks: noVelocity},
	{key: "velocity.axial", low: -unbounded, high: unbounded, to: func(v *Variant) *float64 { return &v.Release.Start.VAxial }, lacks: noVelocity},
	{key: "velocity.up", low: -unbounded, high: unbounded, to: func(v *Variant) *float64 { return &v.Release.Start.VUp }, lacks: noVelocity},
	{key: "throw.speed", low: 0, high: unbounded, to: func(v *Variant) *float64 { return &v.Release.Start.Speed }, lacks: noThrow},
	{key: "throw.heading", low: -unbounded, high: unbounded, to: func(v *Variant) *float64 { return &v.Release.Start.Heading }, lacks: noThrow},
	{key: "throw.elevation", low: -unbounded, high: unbounded, to: func(v *Variant) *float64 { return &v.Release.Start.Elevation }, lacks: noThrow},
	{key: "time", low: 0, high: unbounded, to: func(v *Variant) *float64 { return &v.Release.Time }, lacks: noTime},
	{key: "body.mass", low: 0, high: unbounded, open: true, to: func(v *Variant) *float64 { return &v.Body.Mass }, lacks: noBody},
	{key: "body.diameter", low: 0, high: unbounded, to: func(v *Variant) *float64 { return &v.Body.Diameter }, lacks: noBody},
	{key: "body.restitution", low: 0, high: 1, to: func(v *Variant) *float64 { return &v.Body.Restitution }, lacks: noBody},
	{key: "body.friction", low: 0, high: unbounded, to: func(v *Variant) *float64 { return &v.Body.Friction }, lacks: noBody},
	{key: "body.drag_area", low: 0, high: unbounded, open: true, to: func(v *Variant) *float64 { return &v.Body.DragArea }, lacks: noBody},
	{key: "body.drag_coefficient", low: 0, high: unbounded, open: true, to: func(v *Variant) *float64 { return &v.Body.DragCoefficient }, lacks: noBody},
	{key: "habitat.spin", low: -unbounded, high: unbounded, to: func(v *Variant) *float64 { return &v.Spin }, lacks: func(*Variant) string { return "" }},
}

func noPlace(v *Variant) string {
	if v.Release.Carried != nil {
		return "the release is let go from a hand under way, and has no place of its own"
	}
	return ""
}

func noHeight(v *Variant) string {
	if v.Release.At.HasRadius {
		return "the release is placed by its distance from the axis: vary at.radius"
	}
	return noPlace(v)
}

func noRadius(v *Variant) string {
	if v.Release.Carried == nil && !v.Release.At.HasRadius {
		return "the release is placed by its height above a deck: vary at.height"
	}
	return noPlace(v)
}

// noVelocity lets a velocity be given to what is dropped.
func noVelocity(v *Variant) string {
	switch v.Release.Start.Kind {
	case Thrown:
		return "the release is thrown: vary throw.speed, throw.heading and throw.elevation"
	case Still:
		return "the release is at rest in the inertial frame"
	}
	return ""
}

func noThrow(v *Variant) string {
	if v.Release.Start.Kind != Thrown {
		return "the release is not thrown: vary velocity.spinward, velocity.axial and velocity.up"
	}
	return ""
}

func noTime(v *Variant) string {
	if v.Release.Carried != nil {
		return "the release is let go at the time of its path"
	}
	return ""
}

func noBody(v *Variant) string {
	if v.Body.Mass == 0 {
		return "the release has no body"
	}
	return ""
}

func variedNamed(key string) *varied {
	for i := range varieds {
		if varieds[i].key == key {
			return &varieds[i]
		}
	}
	return nil
}

// Possible says, in words, what a number of a release must be, where the value
// x (SI) is not; it is empty where it can be.
func Possible(key string, x float64) string {
	n := variedNamed(key)
	switch {
	case n == nil || x > n.low && x <= n.high || x == n.low && !n.open:
		return ""
	case x > n.high:
		return fmt.Sprintf("%s more than %g", key, n.high)
	case n.open:
		return fmt.Sprintf("%s not more than %g", key, n.low)
	}
	return fmt.Sprintf("%s less than %g", key, n.low)
}

// Set gives a number of the release another value, SI.
func (v *Variant) Set(s *Spread, x float64) {
	n := variedNamed(s.Key)
	if n == nil {
		return
	}
	*n.to(v) = x
	switch s.Key {
	case "at.spinward":
		v.Release.At.Spinward.IsAngle = s.IsAngle
	case "velocity.spinward", "velocity.axial", "velocity.up":
		v.Release.Start.Kind = Velocity
	}
}

// Get gives a number of the release that Set can change, SI; NaN: there is no
// such number.
func (v *Variant) Get(key string) float64 {
	n := variedNamed(key)
	if n == nil {
		return math.NaN()
	}
	return *n.to(v)
}

// Spun is the model with its habitat turning at another rate, rad/s, up to any
// change of the spin.
func (m *Model) Spun(spin float64) *Model {
	out := *m
	out.Habitat.Spin = spin
	out.turn()
	return &out
}

// ReleaseNamed gives the index of a release.
func (m *Model) ReleaseNamed(name string) (int, bool) {
	for i := range m.Releases {
		if m.Releases[i].Name == name {
			return i, true
		}
	}
	return 0, false
}

// scatters checks that scatters vary what their releases have.
func (c *checker) scatters() {
	for i := range c.m.Scatters {
		s := &c.m.Scatters[i]
		key := fmt.Sprintf("scatter[%d]", i)
		at, ok := c.m.ReleaseNamed(s.Of)
		switch {
		case !ok && c.inSeries(s.Of):
			continue
		case !ok:
			c.fault(key+".of", "", "no release named %q", s.Of)
			continue
		case c.m.Releases[at].series():
			c.fault(key+".of", fmt.Sprintf("such as %q", s.Of+seriesWord+"1 m"), "%q is a let-go series: name one of its releases", s.Of)
			continue
		}
		v := c.m.VariantOf(&c.m.Releases[at])
		for k := range s.Vary {
			if n := variedNamed(s.Vary[k].Key); n != nil && n.lacks(&v) != "" {
				c.fault(key+".vary."+n.key, "", "%s", n.lacks(&v))
			}
		}
	}
}

// seriesWord joins the name of a let-go series and the place of a release of
// it.
const seriesWord = " at "

func (r *Release) series() bool { return r.Carried != nil && r.Carried.Every > 0 }

// inSeries says whether a name can be that of a release of a let-go series that
// is not yet put in its place.
func (c *checker) inSeries(name string) bool {
	for i := range c.m.Releases {
		if r := &c.m.Releases[i]; r.series() && strings.HasPrefix(name, r.Name+seriesWord) {
			return true
		}
	}
	return false
}
