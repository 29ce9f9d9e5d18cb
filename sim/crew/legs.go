package crew

import (
	"math"

	"offplumb/sim/frame"
	"offplumb/sim/model"
)

func (b *builder) walk(key string, l *leg) {
	if b.plan.Flat != nil {
		b.cross(key+".walk", l)
		return
	}
	if b.deck < 0 || math.Abs(b.at.r-b.m.Decks[b.deck].Radius) > levelSlack {
		b.fault(key+".walk", "no deck underfoot: the feet are %.4g m from the axis", b.at.r)
		return
	}
	deck := &b.m.Decks[b.deck]
	to := b.at
	to.phi = walkTo(l.spec, b.at.phi, deck.Radius)
	if l.spec.Axial != nil {
		to.z = *l.spec.Axial
	}
	if !b.onDeck(l.deck, b.at, to) {
		b.fault(key+".walk", "leads off deck %q", deck.Name)
		return
	}
	b.follow(key+".walk", l, newArc(b.at, to, math.Hypot(deck.Radius*(to.phi-b.at.phi), to.z-b.at.z)))
}

// follow lets a leg follow a course.
func (b *builder) follow(key string, l *leg, c course) {
	if c.length() == 0 {
		b.fault(key, "a leg of no length: the person is there already")
		return
	}
	l.course = c
	b.at = c.end()
	l.way = profileOf(l.spec, c.length())
}

// profileOf is how a leg's way of a length (m) is gone.
func profileOf(spec *model.Leg, long float64) profile {
	if spec.Trapezoid && spec.Ramp > 0 {
		return newTrapezoid(long, spec.Speed, spec.Ramp)
	}
	return newRamped(long, spec.Speed, spec.Ramp)
}

// walkTo gives the angle (rad, not wrapped) that a walk ends at.
func walkTo(spec *model.Leg, phi, radius float64) float64 {
	if spec.Spinward != nil {
		phi = spec.Spinward.Angle(radius)
	}
	return phi + 2*math.Pi*spec.Laps
}

// onDeck tries the way at points half a foot's width apart at most.
func (b *builder) onDeck(d int, from, to spot) bool {
	deck := &b.m.Decks[d]
	if deck.Whole {
		return to.z >= deck.Axial[0] && to.z <= deck.Axial[1]
	}
	turn := math.Abs(to.phi - from.phi)
	n := 2 + int(math.Min(1e6, deck.Radius*turn/0.05))
	for k := 0; k <= n; k++ {
		u := float64(k) / float64(n)
		if !deck.Covers(from.phi+u*(to.phi-from.phi), from.z+u*(to.z-from.z)) {
			return false
		}
	}
	return true
}

// rise lets the person stand up or sit down: waist and head move, the feet
// stay. A person who stands up before having sat down was sitting from the
// start of the path.
func (b *builder) rise(key string, l *leg) {
	by := l.spec.Distance
	if l.spec.Kind == model.StandUp {
		b.low -= by
	} else {
		b.low += by
	}
	if up := -b.low; up > 0 {
		for i := range b.plan.legs {
			b.plan.legs[i].low += up
		}
		l.low, b.low, b.lowest = l.low+up, 0, b.lowest+up
	}
	b.lowest = math.Max(b.lowest, math.Max(l.low, b.low))
	if most := b.plan.Crew.Waist * b.plan.Crew.Stature; b.lowest > most {
		b.fault(key, "the waist, at %.3g m, would be lower than the feet", most)
		return
	}
	l.way = profileOf(l.spec, by)
}

func (b *builder) climb(key string, l *leg) {
	name, down := key+".climb", l.spec.Kind == model.Descend
	if down {
		name = key + ".descend"
	}
	b.follow(name, l, b.ladder(l.spec, down))
	b.hatch(key+".through", l)
	b.arrive(name)
}

// ladder gives the course of a climb.
func (b *builder) ladder(spec *model.Leg, down bool) course {
	if pitch := spec.Pitch; pitch > 0 && pitch < math.Pi/2 {
		return newLine(b.at, b.local(), pitch, spec.Facing, spec.Distance, down)
	}
	if b.plan.Flat != nil {
		return newLine(b.at, b.local(), math.Pi/2, spec.Facing, spec.Distance, down)
	}
	to := b.at
	to.r -= spec.Distance
	if down {
		to.r = b.at.r + spec.Distance
	}
	return newArc(b.at, to, spec.Distance)
}

// arrive checks the end of a climb or a ride, and joins the deck that it is
// level with.
func (b *builder) arrive(key string) {
	if b.plan.Flat != nil {
		b.arriveFlat(key)
		return
	}
	if b.at.r > b.m.Decks[0].Radius+levelSlack {
		b.fault(key, "leads below the reference floor")
	}
	if b.at.r <= 0 {
		b.fault(key, "leads to the axis or beyond")
	}
	b.deck = b.levelDeck(b.at)
}

// ride moves the person in a lift, radially or along the ring.
func (b *builder) ride(key string, l *leg) {
	if b.plan.Flat != nil {
		b.rideFlat(key+".ride", l)
		return
	}
	to := b.at
	long := math.Abs(l.spec.Up)
	to.r -= l.spec.Up
	if l.spec.Round != nil {
		turn := l.spec.Round.Angle(b.at.r)
		to.phi += turn
		long = math.Abs(turn) * b.at.r
	}
	b.follow(key+".ride", l, newArc(b.at, to, long))
	b.arrive(key + ".ride")
}

// hatch checks that a climb leads through the opening that it names, and that
// the person's shoulders pass it.
func (b *builder) hatch(key string, l *leg) {
	name := l.spec.Through
	if name == "" || l.course == nil {
		return
	}
	d, o := b.opening(name)
	if o == nil {
		b.fault(key, "no opening named %q", name)
		return
	}
	lo, hi := math.Min(l.from.r, b.at.r), math.Max(l.from.r, b.at.r)
	if d.Radius < lo-levelSlack || d.Radius > hi+levelSlack {
		b.fault(key, "the way does not cross deck %q, in which %q is", d.Name, name)
		return
	}
	half := b.plan.Crew.Breadth / 2
	if room := b.roomIn(d, o, l); room < half {
		b.fault(key, "%q leaves %.3g m to its rim beside the person's middle, who needs %.3g m", name, room, half)
	}
}

// roomIn gives the least distance (m) of the person's middle from the rim of
// an opening while any part of the person is in it: on a pitched ladder, whose
// climber stands along the radius, head and feet pass it at different places.
func (b *builder) roomIn(d *model.Deck, o *model.Opening, l *leg) float64 {
	out := math.Inf(1)
	tall := b.plan.Crew.Stature
	if l.spec.HeadFirst {
		tall = -tall
	}
	for _, r := range []float64{d.Radius, d.Radius + tall} {
		at := crossing(l.course, r)
		across := d.Radius * math.Abs(frame.WrapAngle(at.phi-o.Spinward.Angle(d.Radius)))
		out = math.Min(out, math.Min(o.Size[0]/2-across, o.Size[1]/2-math.Abs(at.z-o.Axial)))
	}
	return out
}

// opening finds an opening by its name.
func (b *builder) opening(name string) (*model.Deck, *model.Opening) {
	for i := range b.m.Decks {
		d := &b.m.Decks[i]
		for k := range d.Openings {
			if d.Openings[k].Name == name {
				return d, &d.Openings[k]
			}
		}
	}
	return nil, nil
}

// levelDeck gives the deck that the end of a climb is level with; -1 where
// there is none.
func (b *builder) levelDeck(at spot) int {
	for i := range b.m.Decks {
		d := &b.m.Decks[i]
		if math.Abs(d.Radius-at.r) <= levelSlack && b.besides(d, at) {
			return i
		}
	}
	return -1
}

// besides says whether the deck is there or within a step, 1 m, of it: a
// ladder ends in the opening or at the edge of the deck that it leads to.
func (b *builder) besides(d *model.Deck, at spot) bool {
	step := 1 / d.Radius
	return d.Covers(at.phi, at.z) || d.Covers(at.phi+step, at.z) || d.Covers(at.phi-step, at.z)
}
