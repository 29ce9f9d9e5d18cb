package scenarios

import "offplumb/sim/model"

// maxDistances bounds the targets of a throw table: more than a few pages of
// it are of no use.
const maxDistances = 500

// throwTo reads a throw study.
func (b *builder) throwTo(o *object) model.ThrowTo {
	t := model.ThrowTo{Name: o.str("name"), From: b.station(o.sub("from")), Body: o.str("body"), Leaves: o.num("leaves"),
		Speed: o.num("speed"), Time: o.num("time"), Least: o.flag("least_speed"), Longest: o.num("longest")}
	if from := o.sub("from"); from != nil && !from.has("height") && !from.has("radius") {
		b.fault(from.node.at, from.path, `write height = "1.5 m"`, "a throw wants the height of the body's centre above the deck, or its radius")
	}
	if o.has("time") {
		b.refuses(o, "the time of the flight is given", "longest")
	}
	if o.str("along") == "axial" {
		t.Along = model.PlusAxial
	}
	t.Distances = b.distances(o)
	t.Target = b.target(o, t.Along, t.Table())
	return t
}

// distances are those of a throw table; nil: it is none.
func (b *builder) distances(o *object) []float64 {
	if list := o.list("distances"); list != nil {
		out := make([]float64, 0, len(list))
		for _, q := range list {
			out = append(out, q.si)
		}
		if len(out) > maxDistances {
			b.fault(o.at("distances"), join(o.path, "distances"), "", "wants at most %d distances, got %d", maxDistances, len(out))
		}
		return out
	}
	r := o.sub("range")
	if r == nil {
		if !o.has("distances") && !o.has("range") {
			b.refuses(o, "stands only beside distances or range", "along")
		}
		return nil
	}
	n := int(r.num("count"))
	out := make([]float64, 0, n)
	for i := range n {
		u := 0.0
		if n > 1 {
			u = float64(i) / float64(n-1)
		}
		out = append(out, r.num("from")*(1-u)+r.num("to")*u)
	}
	return out
}

// target reads what is to be reached.
func (b *builder) target(o *object, along model.Direction, table bool) model.Target {
	s := o.sub("target")
	if s == nil {
		return model.Target{}
	}
	t := model.Target{Station: b.station(s), Path: s.str("path"), Reach: reachOf(s.sub("reach")), HasSpinward: s.has("spinward"), HasAxial: s.has("axial")}
	switch {
	case s.has("path"):
		b.refuses(s, "a target on a crew path is where the person is", station.names()...)
		b.refuses(o, "a target on a crew path has no distances", "distances", "range")
	case s.has("reach"):
		b.refuses(s, "stands only beside path", "reach")
	case table && along == model.PlusAxial:
		b.refuses(s, "a throw table counts axial places from the thrower's", "axial", "room")
	case table:
		b.refuses(s, "a throw table counts spinward places from the thrower's", "spinward", "room")
	}
	return t
}
