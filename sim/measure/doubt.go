package measure

import "math"

// landing is the landing that a limit on landings judges.
func (c *Criterion) landing(t Target, e Evidence) (*Landing, bool) {
	if c.Table != "landings" || e.Landing == nil {
		return nil, false
	}
	return e.Landing(t.Index)
}

// doubt widens the range of verdicts that are possible: to those of the values
// within the numerical error, and to all where it is unsure what is touched.
func (c *Criterion) doubt(v *Verdict, l *Landing) {
	if l.Error.Unsure != "" {
		v.Least, v.Most, v.Unsure = 0, len(ranks)-1, true
		return
	}
	if !v.Seen || math.IsInf(v.Bad.Over, 1) {
		return // a limit on surfaces, or no value
	}
	off := c.unit.of(l.errorOf(c.Key, c.unit))
	if !(off > 0) {
		return
	}
	for _, x := range []float64{v.Value - off, v.Value + off} {
		rank := c.badness(v, x).Rank
		v.Least, v.Most = min(v.Least, rank), max(v.Most, rank)
	}
}

// ranks are the verdicts, by their rank.
var ranks = [...]string{Held, Near, Broken}

// Join takes a verdict of the same limit on something else behind those before:
// it takes their place where it is worse. The worst that is possible, and the
// least, are those of all together.
func (v *Verdict) Join(o *Verdict) {
	least, most := max(v.Least, o.Least), max(v.Most, o.Most)
	unsure := v.Unsure || o.Unsure
	if o.Bad.worse(v.Bad) {
		*v = *o
	}
	v.Least, v.Most, v.Unsure = least, most, unsure
}

// Doubtful says whether the numerical error of a landing could change the
// verdict.
func (v *Verdict) Doubtful() bool { return v.Least < v.Most }

// Note says so in words; "": it could not.
func (v *Verdict) Note() string {
	switch {
	case !v.Doubtful():
		return ""
	case v.Unsure:
		return "unsure, since it is a matter of the numerical error what is touched"
	}
	return "within the numerical error of the bound"
}
