package measure

import (
	"fmt"
	"math"
)

// scatterColumns are the figures of a scatter that limits can judge.
var scatterColumns = scatterFigures()

func scatterFigures() []column[Scattered] {
	var out []column[Scattered]
	add := func(key string, u unit, num func(*Scattered) float64) {
		out = append(out, column[Scattered]{key: key, unit: u, meaning: key, num: num})
	}
	for _, m := range []struct {
		key  string
		unit unit
	}{{"offset", metre}, {"offset_axial", metre}, {"deflection", metre}, {"time", second}, {"speed", speedUnit}, {"energy", joule}} {
		of := func(get func(*Spreading) float64) func(*Scattered) float64 {
			return func(s *Scattered) float64 { return get(s.Spread(m.key)) }
		}
		add(m.key+"_mean", m.unit, of(func(s *Spreading) float64 { return s.Mean }))
		add(m.key+"_deviation", m.unit, of(func(s *Spreading) float64 { return s.Std }))
		add(m.key+"_least", m.unit, of(func(s *Spreading) float64 { return s.Min }))
		add(m.key+"_greatest", m.unit, of(func(s *Spreading) float64 { return s.Max }))
		for k, p := range levels {
			add(fmt.Sprintf("%s_q%02.0f", m.key, 100*p), m.unit, of(func(s *Spreading) float64 { return s.Quantiles[k] }))
		}
	}
	add("through", unit{}, func(s *Scattered) float64 { return s.Through.Share })
	add("through_high", unit{}, func(s *Scattered) float64 { return s.Through.High })
	add("ellipse_major", metre, func(s *Scattered) float64 { return s.ellipse().Major })
	add("ellipse_minor", metre, func(s *Scattered) float64 { return s.ellipse().Minor })
	return out
}

// ellipse is the landing ellipse; of NaN where there is none.
func (s *Scattered) ellipse() Ellipse {
	if s.Ellipse == nil {
		return Ellipse{Major: math.NaN(), Minor: math.NaN()}
	}
	return *s.Ellipse
}
