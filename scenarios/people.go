package scenarios

import "offplumb/sim/model"

func (b *builder) people(o *object) {
	for _, c := range o.subs("crew") {
		b.in.Crews = append(b.in.Crews, model.Crew{Name: c.str("name"), Mass: c.num("mass"), Stature: c.num("stature"),
			Breadth: c.numOr("breadth", model.DefaultBreadth), Waist: c.numOr("waist", model.WaistShare), Head: c.numOr("head", model.HeadShare)})
	}
	for _, p := range o.subs("crew_path") {
		path := model.Path{Name: p.str("name"), Crew: p.str("crew"), Start: b.station(p.sub("start")), Time: p.num("time")}
		for _, l := range p.subs("legs") {
			path.Legs = append(path.Legs, b.leg(l))
		}
		b.in.Paths = append(b.in.Paths, path)
	}
}

var facings = map[string]model.Direction{"spinward": model.Spinward, "antispinward": model.Antispinward,
	"+axial": model.PlusAxial, "-axial": model.MinusAxial}

var headAxes = map[string]model.Axis{"vertical": model.AboutVertical, "spinward": model.AboutSpinward, "axial": model.AboutAxial}

// defaultTurn is how long a turn of the head takes, s.
const defaultTurn = 1

func (b *builder) leg(o *object) model.Leg {
	l := model.Leg{Speed: o.num("speed"), Ramp: o.numOr("ramp", model.DefaultRamp), Facing: facings[o.str("facing")], About: headAxes[o.str("about")]}
	moves, ladder, head := []string{"speed", "ramp"}, []string{"facing"}, []string{"over", "about"}
	switch {
	case o.has("walk"):
		l.Kind = model.Walk
		b.walk(&l, o.sub("walk"))
		b.wants(o, "a walk", "speed")
		b.refuses(o, "a walk has none", append(ladder, head...)...)
	case o.has("climb"), o.has("descend"):
		l.Kind, l.Distance = model.Climb, o.num("climb")
		if o.has("descend") {
			l.Kind, l.Distance = model.Descend, o.num("descend")
		}
		b.wants(o, "a climb or descent", "speed")
		b.refuses(o, "a climb or descent has none", head...)
	case o.has("stand_up"), o.has("sit_down"):
		l.Kind, l.Distance = model.StandUp, o.num("stand_up")
		if o.has("sit_down") {
			l.Kind, l.Distance = model.SitDown, o.num("sit_down")
		}
		l.Speed, l.Ramp = o.numOr("speed", model.DefaultRise), o.numOr("ramp", model.DefaultRiseRamp)
		b.refuses(o, "standing up or sitting down has none", append(ladder, head...)...)
	case o.has("turn_head"):
		l.Kind, l.Angle, l.Duration = model.TurnHead, o.num("turn_head"), o.numOr("over", defaultTurn)
		b.refuses(o, "a turn of the head has none", append(moves, ladder...)...)
	default:
		l.Kind, l.Duration = model.Stand, o.num("stand")
		b.refuses(o, "standing has none", append(append(moves, ladder...), head...)...)
	}
	return l
}

func (b *builder) walk(l *model.Leg, o *object) {
	if o == nil {
		return
	}
	if o.has("spinward") {
		a := o.arc("spinward")
		l.Spinward = &a
	}
	if o.has("axial") {
		z := o.num("axial")
		l.Axial = &z
	}
	l.Laps = o.num("laps")
	if len(o.node.names) == 0 {
		b.fault(o.node.at, o.path, "", "a walk wants where to: spinward, laps or axial")
	}
}
