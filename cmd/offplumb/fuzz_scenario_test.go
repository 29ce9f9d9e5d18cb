package main

import (
	"fmt"
	"hash/fnv"
	"math/rand/v2"
	"strconv"
	"strings"
)

// dice makes choices from bytes, so that a fuzzer can change one of them, and
// from numbers seeded by the bytes once these are used up.
type dice struct {
	bytes []byte
	rest  *rand.Rand
}

func newDice(src []byte) *dice {
	h := fnv.New64a()
	h.Write(src)
	return &dice{src, rand.New(rand.NewPCG(h.Sum64(), 1))}
}

// of gives a number from 0 up to, but without, n.
func (d *dice) of(n int) int {
	if len(d.bytes) == 0 {
		return d.rest.IntN(n)
	}
	b := d.bytes[0]
	d.bytes = d.bytes[1:]
	return int(b) % n
}

func (d *dice) one(words ...string) string { return words[d.of(len(words))] }

// chance is true once in n times.
func (d *dice) chance(n int) bool { return d.of(n) == n-1 }

// between gives one of 256 numbers between two, as text.
func (d *dice) between(low, high float64) string {
	return strconv.FormatFloat(low+(high-low)*float64(d.of(256))/255, 'g', 5, 64)
}

// qty is between with a unit, quoted.
func (d *dice) qty(low, high float64, unit string) string {
	return `"` + d.between(low, high) + " " + unit + `"`
}

// odd are names that are made to break out of files, folders, pages and tables.
var odd = []string{"mug", "<script>alert(1)</script>", "]]>", `"quoted" & 'so'`, "con", "../../up", "/etc/x", "=1+1", "-1 @x", "كوب", "杯子 ⚙", "a.b.c", "{{.}}", "--", "%s %d", "COM1.txt"}

// tale is a scenario in the making.
type tale struct {
	*dice
	strings.Builder
	r        float64 // floor radius, m
	ceiling  float64 // height of the way up, m
	cylinder bool
	n        int
	bodies   []string
	releases []string // with a place of their own
	plain    []string // of them, those that are dropped
	paths    []string
	person   string
	decks    []string
	studies  []string
}

func (t *tale) add(format string, args ...any) { fmt.Fprintf(t, format+"\n", args...) }

// name gives a new name, quoted for TOML.
func (t *tale) name() (plain, quoted string) {
	t.n++
	plain = fmt.Sprintf("%s %d", odd[t.of(len(odd))], t.n)
	return plain, strconv.Quote(plain)
}

// scenarioOfDice makes a scenario of bytes, which is valid more often than not,
// and the release list that it names.
func scenarioOfDice(src []byte) (toml, list string) {
	t := &tale{dice: newDice(src)}
	_, title := t.name()
	t.add("format = 1\ntitle = %s", title)
	if t.chance(3) {
		_, q := t.name()
		t.add("question = %s\nnotes = %s", q, q)
	}
	t.habitat()
	t.air()
	t.things()
	t.add("[solver]\nmax_time = %s", t.qty(1, 20, "s"))
	t.add("[output]\nstep = %s", `"`+t.one("50 ms", "10 ms", "1 s", "0.1 s", "0.2 ms")+`"`)
	for range t.of(3) {
		t.body()
	}
	for range 1 + t.of(3) {
		t.release()
	}
	if t.chance(2) {
		t.crew()
	}
	if t.chance(3) {
		list = t.list()
	}
	for range t.of(3) {
		[]func(){t.scatter, t.sweep, t.throw, t.landMap}[t.of(4)]()
	}
	for range t.of(4) {
		t.limit()
	}
	for range t.of(3) {
		t.figure()
	}
	return t.String(), list
}

func (t *tale) habitat() {
	t.r = []float64{0.6, 4, 9, 18, 60, 240, 8000}[t.of(7)]
	shape := t.one("cylinder", "cylinder", "cylinder", "torus", "sphere", "cabin")
	t.cylinder, t.ceiling = shape == "cylinder", 0.4*t.r
	t.add("[habitat]\nfloor_radius = \"%g m\"\nshape = %q", t.r, shape)
	g := t.between(0.05, 1.2)
	t.add("%s", t.one(`floor_gravity = "`+g+` g"`, `floor_gravity = "`+g+` g"`, `rim_speed = "-`+t.between(0.1, 20)+` m/s"`, `spin = "0 rpm"`, `spin = "`+t.between(-9, 9)+` rpm"`))
	switch shape {
	case "torus":
		t.ceiling = 0.6 * t.r
		t.add("tube_radius = \"%g m\"\nflat_floor = %v", 0.3*t.r, t.chance(3))
	case "cabin":
		t.add("size = [\"%g m\", \"%g m\", \"%g m\"]", 0.5*t.r, 0.6*t.r, 0.5*t.r)
	case "cylinder":
		if !t.chance(4) {
			t.add("length = \"%g m\"", t.r*[]float64{0.5, 1, 3}[t.of(3)])
		}
		if t.chance(2) {
			t.add("ceiling_radius = \"%g m\"", t.r-t.ceiling)
		}
	}
	if t.chance(4) {
		t.add("[[habitat.spin_change]]\nstart = %s\nover = %s\nto = %s\nramp = %q", t.qty(0, 3, "s"), t.qty(0.1, 9, "s"), t.qty(-6, 6, "rpm"), t.one("smooth", "linear"))
	}
	if t.chance(5) {
		t.add("[habitat.coning]\nhalf_angle = %s\nperiod = %s\nphase = %s", t.qty(0, 12, "deg"), t.qty(-20, 20, "s"), t.qty(-180, 180, "deg"))
	}
}

func (t *tale) air() {
	switch t.of(4) {
	case 0:
		t.add("[air]\nnone = true")
	case 1:
		t.add("[air]\npressure = %s\ntemperature = %s", t.qty(1, 200, "kPa"), t.qty(-80, 80, "degC"))
	}
}

// things are decks, openings, fixtures, rooms and passages, mostly of the
// cylinder, where most of them fit.
func (t *tale) things() {
	t.decks = []string{"floor"}
	if t.cylinder && t.chance(2) {
		name, q := t.name()
		t.decks = append(t.decks, name)
		t.add("[[deck]]\nname = %s\nheight = \"%g m\"\nthickness = \"%g m\"", q, 0.2*t.r, 0.01*t.r)
		if t.chance(2) {
			t.add("from = \"-%s deg\"\nto = %s\nfriction = %s", t.between(5, 90), t.qty(5, 90, "deg"), t.between(0, 1))
		}
		if t.chance(2) {
			_, q := t.name()
			t.add("[[deck.opening]]\nname = %s\nsize = [\"%g m\", \"%g m\"]\nclosed = %v", q, 0.06*t.r, 0.05*t.r, t.chance(3))
			if t.chance(3) {
				t.add("coaming = \"%g m\"", 0.01*t.r)
			}
		}
	}
	for range t.of(3) {
		if !t.cylinder {
			break
		}
		_, q := t.name()
		x, a := t.between(-0.3*t.r, 0.3*t.r), t.between(-0.1*t.r, 0.1*t.r)
		switch t.of(3) {
		case 0:
			t.add("[[fixture]]\nname = %s\nkind = \"box\"\nat = { spinward = \"%s m\", axial = \"%s m\" }\nsize = [\"%g m\", \"%g m\", \"%g m\"]\nturn = %s", q, x, a, 0.08*t.r, 0.05*t.r, 0.05*t.r, t.qty(-90, 90, "deg"))
		case 1:
			t.add("[[fixture]]\nname = %s\nkind = \"post\"\nfrom = { spinward = \"%s m\", axial = \"%s m\" }\nto = { spinward = \"%s m\", axial = \"%s m\", height = \"%g m\" }\ndiameter = \"%g m\"", q, x, a, x, a, 0.1*t.r, 0.01*t.r)
		default:
			t.add("[[fixture]]\nname = %s\nkind = \"wall\"\nfrom = { spinward = \"%s m\", axial = \"%g m\" }\nto = { spinward = \"%s m\", axial = \"%g m\" }\nheight = \"%g m\"\nthickness = \"%g m\"", q, x, -0.1*t.r, x, 0.1*t.r, 0.08*t.r, 0.006*t.r)
		}
	}
	if t.cylinder && t.chance(4) {
		_, room := t.name()
		_, spoke := t.name()
		t.add("[[room]]\nname = %s\nshape = \"cylinder\"\nfloor_radius = \"%g m\"\nlength = \"%g m\"", room, 0.15*t.r, 0.5*t.r)
		t.add("[[passage]]\nname = %s\nspinward = %s\nfrom_radius = \"%g m\"\nto_radius = \"%g m\"\n%s = \"%g m\"", spoke, t.qty(-30, 30, "deg"), 0.15*t.r, t.r-t.ceiling, t.one("width", "diameter"), 0.08*t.r)
	}
}

func (t *tale) body() {
	name, q := t.name()
	t.bodies = append(t.bodies, name)
	t.add("[[body]]\nname = %s\nmass = %s\ndiameter = \"%g m\"\nrestitution = %s\nfriction = %s\nrolls = %v", q, t.qty(0.001, 20, "kg"),
		t.r*[]float64{0, 0.001, 0.005, 0.02}[t.of(4)], t.between(0, 1), t.between(0, 1.5), t.chance(3))
}

func (t *tale) ofBody() string {
	if len(t.bodies) == 0 || t.chance(4) {
		return ""
	}
	return "body = " + strconv.Quote(t.bodies[t.of(len(t.bodies))])
}

// station gives a place above a deck.
func (t *tale) station() string {
	return fmt.Sprintf("{ deck = %s, spinward = %s, axial = \"%s m\", height = \"%s m\" }", strconv.Quote(t.decks[t.of(len(t.decks))]),
		t.qty(-20, 20, "deg"), t.between(-0.15*t.r, 0.15*t.r), t.between(0.03*t.r, 0.15*t.r))
}

func (t *tale) release() {
	name, q := t.name()
	t.add("[[release]]\nname = %s\nat = %s\nuntil = \"%s\"", q, t.station(), t.one("rest", "landing", "3 s"))
	t.add("%s", t.ofBody())
	switch t.of(5) {
	case 0:
		t.add("throw = { speed = %s, heading = %s, elevation = %s }", t.qty(0, 12, "m/s"), t.qty(-180, 180, "deg"), t.qty(-90, 90, "deg"))
	case 1:
		t.add("velocity = { spinward = %s, axial = %s, up = %s }", t.qty(-5, 5, "m/s"), t.qty(-5, 5, "m/s"), t.qty(-5, 5, "m/s"))
	case 2:
		t.add("still = true")
	default:
		t.plain = append(t.plain, name)
	}
	if t.chance(4) {
		t.add("time = %s", t.qty(0, 5, "s"))
	}
	t.releases = append(t.releases, name)
}

func (t *tale) crew() {
	person, q := t.name()
	t.person = person
	t.add("[[crew]]\nname = %s\nmass = \"80 kg\"\nstature = %s", q, t.qty(0.4, 2.2, "m"))
	path, q := t.name()
	t.paths = append(t.paths, path)
	t.add("[[crew_path]]\nname = %s\ncrew = %s\nstart = { spinward = %s }\nlegs = [", q, strconv.Quote(person), t.qty(-5, 5, "deg"))
	for range 1 + t.of(3) {
		t.add("  %s", []string{
			fmt.Sprintf("{ walk = { spinward = %s }, speed = %s, ramp = %s },", t.qty(-30, 30, "deg"), t.qty(0.3, 4, "m/s"), t.qty(0, 1, "s")),
			fmt.Sprintf("{ stand = %s },", t.qty(0.1, 3, "s")),
			fmt.Sprintf("{ turn_head = %s, about = %q, over = \"0.5 s\" },", t.qty(-90, 90, "deg"), t.one("vertical", "spinward", "axial")),
			fmt.Sprintf("{ climb = \"%g m\", speed = \"0.5 m/s\", facing = %q },", 0.05*t.r, t.one("spinward", "-axial")),
			fmt.Sprintf("{ walk = { laps = %s }, speed = \"9 m/s\" },", t.between(-1, 1)),
			fmt.Sprintf("{ ride = { up = \"%g m\" }, speed = \"3 m/s\" },", 0.05*t.r),
		}[t.of(6)])
	}
	t.add("]")
	_, q = t.name()
	when := t.one(`time = "0.5 s"`, `every = "`+t.between(0.2, 2)+` s"`)
	t.add("[[release]]\nname = %s\ncarried = { path = %s, %s, reach = { spinward = \"0.2 m\", height = \"0.6 m\" } }\n%s", q, strconv.Quote(path), when, t.ofBody())
}

func (t *tale) list() string {
	t.add("[[release_list]]\nfile = \"list.csv\"\nuntil = %q\ntracks = %v", t.one("rest", "landing"), t.chance(3))
	var b strings.Builder
	b.WriteString("release,spinward_m,height_m,v_up_m_s\n")
	for range 1 + t.of(12) {
		name, _ := t.name()
		fmt.Fprintf(&b, "\"%s\",%s,%s,%s\n", strings.ReplaceAll(name, `"`, `""`), t.between(-0.2*t.r, 0.2*t.r), t.between(0.03*t.r, 0.15*t.r), t.between(-1, 1))
	}
	return b.String()
}

func (t *tale) study(name string) { t.studies = append(t.studies, name) }

func (t *tale) scatter() {
	if len(t.plain) == 0 {
		return
	}
	name, q := t.name()
	t.study(name)
	t.add("[[scatter]]\nname = %s\nof = %s\nsamples = %d\nsampling = %q", q, strconv.Quote(t.plain[t.of(len(t.plain))]), 1+t.of(60), t.one("random", "latin_hypercube", "halton"))
	if t.chance(3) {
		t.add("precision = \"%g m\"", 0.01*t.r)
	}
	t.add("vary = { \"velocity.spinward\" = { normal = [\"0 m/s\", \"0.5 m/s\"] }, \"velocity.up\" = { triangular = [\"-1 m/s\", \"0 m/s\", \"1 m/s\"] }, \"habitat.spin\" = { uniform = [%s, \"7 rpm\"] } }", t.qty(-7, 7, "rpm"))
}

func (t *tale) sweep() {
	name, q := t.name()
	t.add("[[sweep]]\nname = %s\nmeasures = [%q, %q]", q, t.one("landings.offset", "landings.deflection", "rests.time"), t.one("landings.speed", "landings.energy"))
	key := "release." + strconv.Quote(t.releases[t.of(len(t.releases))]) + ".at.height"
	switch t.of(3) {
	case 0:
		t.add("key = %s\nfrom = \"%g m\"\nto = \"%g m\"\ncount = %d", strconv.Quote(key), 0.02*t.r, 0.3*t.r, 1+t.of(9))
	case 1:
		t.add("key = \"solver.max_time\"\nvalues = [\"1 s\", \"2 s\"]\nkey2 = %s\nfrom2 = \"%g m\"\nto2 = \"%g m\"\ncount2 = %d", strconv.Quote(key), 0.02*t.r, 0.3*t.r, 1+t.of(4))
	default:
		_, before := t.name()
		_, after := t.name()
		t.add("variants = [ { name = %s }, { name = %s, set = { %s = \"%g m\" } } ]", before, after, strconv.Quote(key), 0.1*t.r)
	}
	t.study(name)
}

func (t *tale) throw() {
	name, q := t.name()
	t.study(name)
	target, table := t.station(), t.chance(3)
	if table {
		target = fmt.Sprintf("{ height = \"%g m\" }", 0.1*t.r)
	}
	t.add("[[throw_to]]\nname = %s\nfrom = %s\ntarget = %s\n%s\n%s", q, t.station(), target, t.ofBody(),
		t.one(`speed = "`+t.between(0.5, 15)+` m/s"`, `time = "`+t.between(0.2, 4)+` s"`, "least_speed = true"))
	if table {
		t.add("range = { from = \"%g m\", to = \"%g m\", count = %d }", -0.3*t.r, 0.4*t.r, 1+t.of(6))
	}
}

func (t *tale) landMap() {
	name, q := t.name()
	t.study(name)
	t.add("[[landing_map]]\nname = %s\nover = { spinward = [\"-2 deg\", %s], axial = [\"%g m\", \"%g m\"] }\nheights = [\"%g m\"]\nstep = \"%g m\"\ncell = \"%g m\"\nuntil = %q\n%s", q, t.qty(-1, 6, "deg"), -0.05*t.r, 0.05*t.r, 0.1*t.r,
		t.r*[]float64{0.03, 0.05, 0.2}[t.of(3)], t.r*[]float64{0.02, 0.05, 0.2}[t.of(3)], t.one("landing", "rest"), t.ofBody())
	if t.chance(2) {
		t.add("speed = %s\ndirections = 12", t.qty(0.1, 2, "m/s"))
	}
	if t.chance(2) {
		t.add("reaches = [ { deck = \"floor\", spinward = [\"-1 deg\", \"1 deg\"], axial = [\"%g m\", \"%g m\"] } ]", -0.1*t.r, 0.1*t.r)
	}
}

func (t *tale) limit() {
	_, q := t.name()
	_, source := t.name()
	t.add("[[limit]]\nname = %s\nsource = %s", q, source)
	switch t.of(4) {
	case 0:
		t.add("of = \"release.*\"\nmeasure = \"landings.deflection\"\nmin = \"-1 m\"\nwarn_max = %s\nmax = \"3 m\"", t.qty(0, 2, "m"))
	case 1:
		t.add("of = \"release.*\"\nmeasure = \"landings.speed\"\nmax = %s", t.qty(0, 9, "m/s"))
	case 2:
		t.add("of = \"habitat\"\nmeasure = \"habitat.floor_gravity\"\nmax = \"1 g\"")
	default:
		t.add("of = %s\nmeasure = \"clearance.clearance\"\nmin = \"1 mm\"", strconv.Quote("release."+t.releases[t.of(len(t.releases))]))
	}
}

func (t *tale) figure() {
	_, q := t.name()
	of := "release." + t.releases[t.of(len(t.releases))]
	kind := t.one("side", "deflection", "plan", "stack", "inertial", "loads", "path")
	if kind == "loads" || kind == "path" {
		if len(t.paths) == 0 {
			return
		}
		of = "path.*"
	}
	t.add("[[figure]]\nname = %s\nkind = %q\nof = %s", q, kind, strconv.Quote(of))
}
