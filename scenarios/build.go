package scenarios

import (
	"math"

	"offplumb/sim/air"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// builder makes a model's input of checked values. The rules here are those
// between keys, which the format as data cannot say.
type builder struct {
	checker
	in   model.Model
	keys []string // of each release: its path in the file, "" for a list's row
	rows []row    // of each release of a list: its place there

	streams []*Stream // lists that are too long to be kept
}

// at gives the place of a key of an object, or of the object.
func (o *object) at(key string) place {
	if kid, ok := o.node.kids[key]; ok {
		return kid.at
	}
	return o.node.key
}

// wants faults the keys of a list that an object lacks.
func (b *builder) wants(o *object, because string, keys ...string) bool {
	ok := true
	for _, k := range keys {
		if _, there := o.node.kids[k]; !there {
			b.fault(o.node.key, o.path, "", "%s wants the key %s", because, k)
			ok = false
		}
	}
	return ok
}

// refuses faults the keys of a list that an object has.
func (b *builder) refuses(o *object, because string, keys ...string) {
	for _, k := range keys {
		if kid, there := o.node.kids[k]; there {
			b.fault(kid.key, join(o.path, k), "", "%s", because)
		}
	}
}

// build makes the input of the model.
func (b *builder) build(o *object, files reading) {
	b.in.Title = o.str("title")
	b.habitat(o.sub("habitat"))
	b.in.Air = b.air(o.sub("air"))
	b.in.Weather = b.weather(o.sub("air"), files)
	for _, d := range o.subs("deck") {
		b.in.Decks = append(b.in.Decks, b.deck(d))
	}
	b.uniqueOpenings(o.subs("deck"))
	for _, r := range o.subs("room") {
		b.in.Rooms = append(b.in.Rooms, b.furtherRoom(r))
	}
	for _, p := range o.subs("passage") {
		b.in.Passages = append(b.in.Passages, model.Passage{Name: p.str("name"), Spinward: p.arc("spinward"), Axial: p.num("axial"),
			FromRadius: p.num("from_radius"), ToRadius: p.num("to_radius"), Width: p.num("width"), Diameter: p.num("diameter")})
	}
	for _, f := range o.subs("fixture") {
		b.in.Fixtures = append(b.in.Fixtures, b.fixture(f))
	}
	for _, d := range o.subs("body") {
		b.in.Bodies = append(b.in.Bodies, bodyOf(d))
	}
	for i, r := range o.subs("release") {
		b.release(i, r)
	}
	for _, l := range o.subs("release_list") {
		b.list(l, files)
	}
	b.people(o)
	for _, l := range o.subs("limit") {
		b.in.Limits = append(b.in.Limits, b.limit(l))
	}
	for _, p := range o.subs("platforms") {
		b.in.Spacings = append(b.in.Spacings, model.Spacing{Name: p.str("name"), Passage: p.str("passage"), Body: p.str("body"),
			MaxSpeed: p.num("max_speed"), Source: p.str("source")})
	}
	for _, s := range o.subs("scatter") {
		b.in.Scatters = append(b.in.Scatters, b.scatter(s, files))
	}
	for _, l := range o.subs("landing_map") {
		b.in.Maps = append(b.in.Maps, b.landingMap(l))
	}
	for _, t := range o.subs("throw_to") {
		b.in.Throws = append(b.in.Throws, b.throwTo(t))
	}
	b.settings(o.sub("solver"), o.sub("output"))
}

func (b *builder) habitat(o *object) {
	if o == nil {
		return
	}
	h := &b.in.Habitat
	h.Room = b.room(o)
	switch {
	case o.has("spin"):
		h.Spin = o.num("spin")
	case o.has("floor_gravity"):
		h.Spin = math.Sqrt(o.num("floor_gravity") / h.FloorRadius)
	default:
		h.Spin = o.num("rim_speed") / h.FloorRadius
	}
	for _, c := range o.subs("spin_change") {
		h.Changes = append(h.Changes, frame.Change{Start: c.num("start"), Over: c.num("over"), To: c.num("to"), Linear: c.str("ramp") == "linear"})
	}
	if c := o.sub("coning"); c != nil {
		h.Coning = frame.Coning{HalfAngle: c.num("half_angle"), Period: c.num("period"), Phase: c.num("phase")}
	}
	b.in.Ambient = b.ambient(o.sub("ambient_gravity"))
}

var shapes = map[string]model.Shape{"cylinder": model.Cylinder, "torus": model.Torus, "sphere": model.Sphere, "cabin": model.Cabin}

func (b *builder) room(o *object) model.Room {
	r := model.Room{Shape: shapes[o.str("shape")], FloorRadius: o.num("floor_radius"), Length: o.num("length"),
		CeilingRadius: o.num("ceiling_radius"), TubeRadius: o.num("tube_radius"), FlatFloor: o.flag("flat_floor")}
	for i, q := range o.list("size") {
		r.Size[i] = q.si
	}
	if o.has("shape") && o.str("shape") == "" {
		return r
	}
	switch r.Shape {
	case model.Torus:
		b.wants(o, "a torus", "tube_radius")
		b.refuses(o, "a torus has none", "length", "ceiling_radius", "size")
	case model.Cabin:
		b.wants(o, "a cabin", "size")
		b.refuses(o, "a cabin has none; its size says it", "length", "ceiling_radius", "tube_radius", "flat_floor")
	case model.Sphere:
		b.refuses(o, "a sphere has none", "length", "ceiling_radius", "tube_radius", "flat_floor", "size")
	default:
		b.refuses(o, "a cylinder has none", "tube_radius", "flat_floor", "size")
	}
	return r
}

func (b *builder) furtherRoom(o *object) model.Room {
	r := b.room(o)
	r.Name, r.Spinward, r.Axial = o.str("name"), o.arc("spinward"), o.num("axial")
	return r
}

func (b *builder) air(o *object) air.Air {
	switch {
	case o == nil:
		return air.FromPressure(air.DefaultPressure, air.DefaultTemperature)
	case o.flag("none"):
		b.refuses(o, "a vacuum has none", "pressure", "temperature", "density", "viscosity", "stratified", "buoyancy", "draft")
		return air.Air{}
	case o.has("density") || o.has("viscosity"):
		b.wants(o, "air given by density and viscosity", "density", "viscosity")
		b.refuses(o, "wants pressure and temperature, or density and viscosity, not both", "pressure")
		if !o.flag("stratified") {
			b.refuses(o, "wants pressure and temperature, or density and viscosity, not both", "temperature")
		}
		return air.Air{Density: o.num("density"), Viscosity: o.num("viscosity")}
	}
	return air.FromPressure(o.numOr("pressure", air.DefaultPressure), o.numOr("temperature", air.DefaultTemperature))
}

func (b *builder) deck(o *object) model.Deck {
	d := model.Deck{Name: o.str("name"), Radius: o.num("radius"), Height: o.num("height"), Thickness: o.num("thickness"),
		From: o.arc("from"), To: o.arc("to"), Whole: !o.has("from"), Friction: o.numOr("friction", model.None), Restitution: o.numOr("restitution", model.None)}
	if o.has("from") != o.has("to") {
		b.fault(o.node.key, o.path, "", "wants both from and to, or neither for a whole circle")
	}
	if z := o.list("axial"); z != nil {
		d.HasAxial, d.Axial = true, [2]float64{z[0].si, z[1].si}
	}
	if d.Name != model.FloorName {
		if !o.has("radius") && !o.has("height") {
			b.fault(o.node.key, o.path, "", "a deck wants one of radius or height")
		}
		d.Thickness = o.numOr("thickness", model.DefaultThickness)
	} else {
		b.refuses(o, "the reference floor goes the whole way round and from end to end", "from", "to", "axial")
	}
	for _, p := range o.subs("opening") {
		hole := model.Opening{Name: p.str("name"), Spinward: p.arc("spinward"), Axial: p.num("axial"),
			Coaming: p.num("coaming"), Closed: p.flag("closed")}
		for i, q := range p.list("size") {
			hole.Size[i] = q.si
		}
		d.Openings = append(d.Openings, hole)
	}
	return d
}

// uniqueOpenings holds the names of openings apart in the whole habitat, as
// limits name them without their deck.
func (b *builder) uniqueOpenings(decks []*object) {
	first := map[string]*node{}
	k := file.find("deck").sub.find("opening")
	for _, d := range decks {
		for _, o := range d.subs("opening") {
			if old, ok := first[o.str("name")]; !ok || old.at != o.at("name") {
				b.unique(o, first, k)
			}
		}
	}
}

func (b *builder) station(o *object) model.Station {
	if o == nil {
		return model.Station{}
	}
	if o.has("radius") {
		b.refuses(o, "a station by radius has none", "deck", "height", "room")
	}
	if o.has("room") {
		b.refuses(o, "a station in a room has none", "deck")
	}
	return model.Station{Deck: o.str("deck"), Room: o.str("room"), Spinward: o.arc("spinward"), Axial: o.num("axial"),
		Height: o.num("height"), Radius: o.num("radius"), HasRadius: o.has("radius")}
}

var fixtureKinds = map[string]model.FixtureKind{"box": model.Box, "post": model.Post, "wall": model.Wall}

// fixtureKeys lists what each kind of fixture must have and may have.
var fixtureKeys = map[string][2][]string{
	"box":  {{"at", "size"}, {"turn"}},
	"post": {{"from", "to", "diameter"}, nil},
	"wall": {{"from", "to", "height"}, {"thickness", "doorway"}},
}

func (b *builder) fixtureKeys(o *object, kind string) {
	own := fixtureKeys[kind]
	b.wants(o, "a "+kind, own[0]...)
	for _, other := range []string{"at", "size", "turn", "from", "to", "diameter", "height", "thickness", "doorway"} {
		if !contains(own[0], other) && !contains(own[1], other) {
			b.refuses(o, "a "+kind+" has none", other)
		}
	}
}

func (b *builder) fixture(o *object) model.Fixture {
	k := o.str("kind")
	if k != "" {
		b.fixtureKeys(o, k)
	}
	f := model.Fixture{Name: o.str("name"), Kind: fixtureKinds[k], At: b.station(o.sub("at")), Turn: o.num("turn"),
		From: b.station(o.sub("from")), To: b.station(o.sub("to")), Diameter: o.num("diameter"), Height: o.num("height"),
		Thickness: o.numOr("thickness", model.DefaultThickness), Friction: o.numOr("friction", model.None), Restitution: o.numOr("restitution", model.None)}
	for i, q := range o.list("size") {
		f.Size[i] = q.si
	}
	if d := o.sub("doorway"); d != nil {
		f.Doorway = &model.Doorway{At: d.num("at"), Width: d.num("width"), Height: d.num("height")}
	}
	return f
}

func contains(list []string, s string) bool {
	for _, x := range list {
		if x == s {
			return true
		}
	}
	return false
}

func bodyOf(o *object) model.Body {
	return model.Body{Name: o.str("name"), Mass: o.num("mass"), Diameter: o.num("diameter"),
		Restitution: o.numOr("restitution", model.DefaultRestitution), Friction: o.numOr("friction", model.DefaultFriction),
		Rolls: o.flag("rolls"), DragArea: o.num("drag_area"), DragCoefficient: o.num("drag_coefficient")}
}

func (b *builder) release(i int, o *object) {
	r := model.Release{Name: o.str("name"), Body: o.str("body"), At: b.station(o.sub("at")), Time: o.num("time"),
		Start: start(o), Until: untilOf(o)}
	if at := o.sub("at"); at != nil && !at.has("height") && !at.has("radius") {
		b.fault(at.node.at, at.path, `write height = "1.5 m"`, "a release wants the height of the body's centre above the deck, or its radius")
	}
	if c := o.sub("carried"); c != nil {
		r.Carried = &model.Carried{Path: c.str("path"), Time: c.num("time"), Every: c.num("every"), ByTime: c.get("every").dim == duration, Reach: reachOf(c.sub("reach"))}
		b.refuses(o, "a carried release is let go at the time of its path", "time")
	}
	b.in.Releases = append(b.in.Releases, r)
	b.keys = append(b.keys, o.path)
	b.rows = append(b.rows, row{})
}

func start(o *object) model.Start {
	switch t, v := o.sub("throw"), o.sub("velocity"); {
	case t != nil:
		return model.Start{Kind: model.Thrown, Speed: t.num("speed"), Heading: t.num("heading"), Elevation: t.num("elevation")}
	case v != nil:
		return model.Start{Kind: model.Velocity, VSpinward: v.num("spinward"), VAxial: v.num("axial"), VUp: v.num("up")}
	case o.flag("still"):
		return model.Start{Kind: model.Still}
	}
	return model.Start{}
}

func untilOf(o *object) model.Until {
	switch v := o.get("until"); {
	case v.text == "landing":
		return model.Until{Kind: model.UntilLanding}
	case v.dim != nil:
		return model.Until{Kind: model.UntilDuration, Duration: v.si}
	}
	return model.Until{}
}

func reachOf(o *object) model.Reach {
	return model.Reach{Spinward: o.num("spinward"), Axial: o.num("axial"), Height: o.num("height")}
}

func (b *builder) limit(o *object) model.Limit {
	l := model.Limit{Name: o.str("name"), Of: o.texts("of"), Measure: o.str("measure"), SurfaceIn: o.texts("surface_in"),
		SurfaceNotIn: o.texts("surface_not_in"), FallsThroughNot: o.texts("falls_through_not"), Source: o.str("source"),
		Stature: o.num("stature"), Speed: o.num("speed")}
	for _, k := range []struct {
		name string
		to   **model.Quantity
	}{{"min", &l.Min}, {"max", &l.Max}, {"max_abs", &l.MaxAbs}, {"warn_min", &l.WarnMin}, {"warn_max", &l.WarnMax}} {
		if q, ok := o.vals[k.name]; ok {
			*k.to = &model.Quantity{SI: q.si, Unit: q.quantity.unit()}
		}
	}
	if l.Min != nil && l.Max != nil && l.Min.SI > l.Max.SI {
		b.fault(o.at("max"), join(o.path, "max"), "", "wants no less than min")
	}
	return l
}

// unit is the SI unit of a quantity's dimension; an angle's is rad.
func (q quantity) unit() string {
	if q.dim == nil {
		return ""
	}
	return q.dim.si
}

func (b *builder) settings(s, out *object) {
	b.outside(s)
	b.in.Solver = model.Solver{Outside: b.in.Solver.Outside, RelTol: s.numOr("relative_tolerance", model.DefaultRelTol), PosTol: s.numOr("position_tolerance", model.DefaultPosTol),
		VelTol: s.numOr("velocity_tolerance", model.DefaultVelTol), MaxTime: s.numOr("max_time", model.DefaultMaxTime)}
	b.in.Output = model.Output{Step: out.numOr("step", model.DefaultStep)}
}
