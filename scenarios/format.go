package scenarios

import "strconv"

// The format, as data: it drives the checks, the JSON Schema and the table of
// the README. Sections stand before those that use them.

// Version is the version of the format that is read.
const Version = 1

var station = &section{name: "a station", doc: "A place in the habitat.",
	keys: []key{
		text("deck", "the deck that spinward and height count from").or(`"floor"`),
		arc("spinward", "arc on that deck, or an angle").or(`"0 m"`),
		qty("axial", length, anything, "along the axis, from the habitat's middle").or(`"0 m"`),
		qty("height", length, anything, "above that deck; of a body's centre").or(`"0 m"; a release must say it`),
		qty("radius", length, notNegative, "distance from the axis, in place of deck and height; the arc is then measured at it"),
		text("room", "the further room on whose floor the station stands: in a cabin spinward and axial are straight lengths from the middle of its flat floor and height is along its normal").or("the habitat"),
	}}

var reach = &section{name: "a reach", doc: "A point carried along with a person, from the feet.",
	keys: []key{
		qty("spinward", length, anything, "spinward of the feet").or(`"0 m"`),
		qty("axial", length, anything, "+axial of the feet").or(`"0 m"`),
		qty("height", length, anything, "above the feet").or(`"0 m"`),
	}}

var room = []key{
	word("shape", `"cylinder"`, "the form of the room", "cylinder", "torus", "sphere", "cabin"),
	qty("length", length, positive, "between the two end bulkheads").or("no bulkheads"),
	qty("ceiling_radius", length, positive, "distance of the ceiling from the axis").or("no ceiling"),
	qty("tube_radius", length, positive, "of a torus; floor_radius is its outermost"),
	flag("flat_floor", "a torus whose floor is a cylinder of floor_radius, 1.2 tube radii wide: the middle of the tube lies 0.8 tube radii above it, the ceiling 1.8"),
	lengths("size", 3, positive, "of a cabin: spinward, axial, up; its flat floor is tangent at floor_radius"),
}

var spinChange = &section{name: "a spin change", doc: "A change of the spin rate. They come one after the other, and the rate stays between them.",
	keys: []key{
		qty("start", duration, notNegative, "when it begins").need(),
		qty("over", duration, positive, "how long it takes").need(),
		qty("to", turnRate, anything, "the spin after it").need(),
		word("ramp", `"smooth"`, "how the rate goes over: smooth, by 3u^2 - 2u^3 of the share u of the time, with no jump of the Euler acceleration, or linear", "smooth", "linear"),
	}}

var coning = &section{name: "a coning", doc: "A steady precession of the axis about a direction that is fixed in the inertial frame. The spin is then the part of the angular velocity along the axis.",
	keys: []key{
		qty("half_angle", angle, span{low: 0, high: degrees(90)}, "between the axis and the fixed direction").need(),
		qty("period", duration, anything, "of one round; negative: against positive spin").need(),
		qty("phase", angle, anything, "from spinward zero, spinward positive: toward where the fixed direction leans from the axis at time 0").or(`"0 deg"`),
	}}

var habitat = &section{name: "the habitat", doc: "The habitat's own room and its spin.",
	keys: append([]key{
		qty("floor_radius", length, positive, `distance of the reference floor from the axis: the deck named "floor"`).need(),
		qty("spin", turnRate, anything, "positive: the floor moves spinward").one("spin"),
		qty("floor_gravity", accel, notNegative, "apparent gravity at rest on the reference floor; the spin is then positive").one("spin"),
		qty("rim_speed", speed, anything, "speed of the reference floor, spinward positive").one("spin"),
		tables("spin_change", spinChange, "changes of the spin"),
		table("coning", coning, "precession of the axis"),
		table("ambient_gravity", ambientKeys, "gravity beside that of the spin"),
	}, room...),
	exactly: []string{"spin"}}

var furtherRoom = &section{name: "a room", doc: "A further room, beside the habitat's own.",
	keys: append([]key{
		title(),
		qty("floor_radius", length, positive, "distance of its floor from the axis").need(),
		arc("spinward", "where its middle stands; a cabin only").or(`"0 m"`),
		qty("axial", length, anything, "where its middle stands").or(`"0 m"`),
	}, room...)}

var draftKeys = &section{name: "a draft", doc: "A steady motion of the air relative to the habitat, in the local directions at each place: the same everywhere, or by height from lists or a file.",
	keys: []key{
		speeds("spinward", "spinward"),
		speeds("axial", "toward +axial"),
		speeds("up", "toward the axis"),
		{name: "heights", want: wantList, dims: []*dimension{length}, span: anything,
			doc: "those of the lists of speeds, above the reference floor: its radius less the distance from the axis"},
		text("file", "CSV file beside the scenario in place of the lists: height_m and one or more of spinward_m_s, axial_m_s, up_m_s"),
	}}

var airKeys = &section{name: "the air", doc: "The air, which turns with the habitat.",
	keys: []key{
		qty("pressure", pressure, positive, "of the air").or(`"101.325 kPa"`).one("pressure"),
		qty("temperature", temperature, span{low: 100, high: 1900}, "of the air").or(`"20 °C"`).one("temperature"),
		qty("density", density, positive, "in place of pressure and temperature, with viscosity"),
		qty("viscosity", viscosity, positive, "dynamic viscosity, with density"),
		flag("none", "a vacuum"),
		flag("stratified", "its density falls toward the axis, from that given at the reference floor; wants the temperature, and a steady spin"),
		flag("buoyancy", "bodies feel the pressure of the air and the added mass of a sphere"),
		table("draft", draftKeys, "a steady motion of the air relative to the habitat").or("none"),
	}}

var body = &section{name: "a body", doc: "What is released: a sphere.",
	keys: []key{
		title(),
		qty("mass", mass, positive, "its mass").need(),
		qty("diameter", length, notNegative, `of its sphere: contact and drag. "0 m" is a point, without drag`).need(),
		num("restitution", share, "of an impact along the normal").or("0.3"),
		num("friction", notNegative, "Coulomb friction coefficient").or("0.4"),
		flag("rolls", "it rolls instead of sliding"),
		qty("drag_area", area, positive, "area across the motion").or("that of the sphere"),
		num("drag_coefficient", positive, "a fixed one").or("the law for spheres"),
	}}

var throwKeys = &section{name: "a throw", doc: "A speed and its direction, relative to the habitat.",
	keys: []key{
		qty("speed", speed, notNegative, "relative to the habitat").need(),
		qty("heading", angle, anything, "0 spinward, 90 deg toward +axial; along a flat floor, over one").or(`"0 deg"`),
		qty("elevation", angle, span{low: -degrees(90), high: degrees(90)}, "above the deck; from the plane of a flat floor, over one").or(`"0 deg"`),
	}}

var velocityKeys = &section{name: "a velocity", doc: "Relative to the habitat.",
	keys: []key{
		qty("spinward", speed, anything, "spinward").or(`"0 m/s"`),
		qty("axial", speed, anything, "toward +axial").or(`"0 m/s"`),
		qty("up", speed, anything, "toward the axis; along the normal of a flat floor, over one").or(`"0 m/s"`),
	}}

var carriedKeys = &section{name: "a carried release", doc: "Let go by a crew member under way: it has the velocity of that point of the body.",
	keys: []key{
		text("path", "name of the crew path").need(),
		qty("time", duration, notNegative, "from the start of the path").or(`"0 s"`).one("when"),
		{name: "every", want: wantQuantity, dims: []*dimension{length, duration}, span: positive, group: "when",
			doc: "a let-go series: one release at each such length of the path, or time"},
		table("reach", reach, "where it is held"),
	}}

// motion are the keys of how a release starts.
var motion = []key{
	table("throw", throwKeys, "thrown at a speed").one("motion"),
	table("velocity", velocityKeys, "given a velocity").one("motion"),
	flag("still", "at rest in the inertial frame: it does not turn with the habitat").one("motion"),
}

func until(deflt string) key {
	return key{name: "until", want: wantWordOrQuantity, words: []string{"rest", "landing"}, dims: []*dimension{duration},
		span: positive, deflt: deflt, doc: `"rest", "landing" or a duration`}
}

var release = &section{name: "a release", doc: "An object let go, dropped, thrown or set free.",
	keys: append([]key{
		title(),
		text("body", "name of the body").or("a point, without drag"),
		table("at", station, "where its centre is").one("place"),
		table("carried", carriedKeys, "let go by a crew member under way").one("place"),
		qty("time", duration, notNegative, "when it is let go").or(`"0 s"`),
		until(`"rest"`),
	}, motion...),
	exactly: []string{"place"}}

var releaseList = &section{name: "a release list", doc: "A spreadsheet of releases, one a row. The other keys are defaults for columns that it lacks.",
	keys: append([]key{
		text("file", "CSV file, beside the scenario").need(),
		text("body", "name of the body"),
		qty("mass", mass, positive, "of the body, in place of its own"),
		qty("diameter", length, notNegative, "of the body, in place of its own"),
		text("deck", "the deck that spinward and height count from").or(`"floor"`),
		arc("spinward", "arc on that deck, or an angle").or(`"0 m"`),
		qty("axial", length, anything, "along the axis").or(`"0 m"`),
		qty("height", length, anything, "above that deck"),
		qty("time", duration, notNegative, "when they are let go").or(`"0 s"`),
		until(`"rest"`),
		flag("tracks", "write their tracks too"),
	}, motion...)}

var opening = &section{name: "an opening", doc: "A hole in a deck.",
	keys: []key{
		title(),
		arc("spinward", "of its middle").or(`"0 m"`),
		qty("axial", length, anything, "of its middle").or(`"0 m"`),
		lengths("size", 2, positive, "spinward, axial").need(),
		qty("coaming", length, notNegative, "height of its rim above the deck").or("none"),
		flag("closed", "a lid level with the deck"),
	}}

var deck = &section{name: "a deck", doc: `A floor above the reference floor. One named "floor", without radius and height, gives the reference floor its surface and its openings.`,
	keys: []key{
		title(),
		qty("radius", length, positive, "distance of its surface from the axis").one("level"),
		qty("height", length, positive, "above the reference floor").one("level"),
		qty("thickness", length, positive, "outward from its surface").or(`"50 mm"`),
		arc("from", "spinward extent").or("whole circle"),
		arc("to", "spinward extent").or("whole circle"),
		lengths("axial", 2, anything, "axial extent").or("whole length"),
		num("friction", notNegative, "of its surface; wins over the body's"),
		num("restitution", share, "of its surface; wins over the body's"),
		tables("opening", opening, "its openings"),
	}}

var doorway = &section{name: "a doorway", doc: "A hole in a wall, from its foot up.",
	keys: []key{
		qty("at", length, notNegative, "along the wall, from its first station to the middle of the doorway").need(),
		qty("width", length, positive, "of the doorway").need(),
		qty("height", length, positive, "of the doorway").need(),
	}}

var fixture = &section{name: "a fixture", doc: "Something solid that stands in a room.",
	keys: []key{
		title(),
		word("kind", "", "its form", "box", "post", "wall").need(),
		table("at", station, "box: the middle of its underside"),
		lengths("size", 3, positive, "box: spinward, axial, up"),
		qty("turn", angle, anything, "box: about the vertical, from spinward toward +axial").or(`"0 deg"`),
		table("from", station, "post, wall: one end; those of a post are rounded about the stations"),
		table("to", station, "post, wall: the other end"),
		qty("diameter", length, positive, "post"),
		qty("height", length, positive, "wall"),
		qty("thickness", length, positive, "wall").or(`"50 mm"`),
		table("doorway", doorway, "wall: a hole in it"),
		num("friction", notNegative, "of its surface; wins over the body's"),
		num("restitution", share, "of its surface; wins over the body's"),
	}}

var passage = &section{name: "a passage", doc: "A radial shaft: spoke, trunk, ladder well.",
	keys: []key{
		title(),
		arc("spinward", "where it runs").or(`"0 deg"`),
		qty("axial", length, anything, "where it runs").or(`"0 m"`),
		qty("from_radius", length, positive, "its inner end").need(),
		qty("to_radius", length, positive, "its outer end").need(),
		qty("width", length, positive, "of a square section").one("section"),
		qty("diameter", length, positive, "of a round section").one("section"),
	},
	exactly: []string{"section"}}

var limit = &section{name: "a limit", doc: "An acceptance criterion of the project.",
	keys: []key{
		title(),
		texts("of", "release.NAME, path.NAME, study.NAME (of a scatter, a landing map or a throw study) or habitat; * stands for anything; or a list").need(),
		text("measure", "table.column, without the unit").need(),
		bound("min", "least value"),
		bound("max", "greatest value"),
		bound("max_abs", "greatest magnitude"),
		bound("warn_min", "below it the limit is near"),
		bound("warn_max", "above it the limit is near"),
		texts("surface_in", "surfaces that it may land on"),
		texts("surface_not_in", "surfaces that it must not land on"),
		texts("falls_through_not", "openings that it must not fall through"),
		text("source", "where the limit comes from, in the project's words").or("none stated"),
		qty("stature", length, span{low: 0.3, high: 3}, "of habitat.head_to_foot").or(`"1.75 m"`),
		qty("speed", speed, positive, "of habitat.coriolis_ratio").or(`"1 m/s"`),
	}}

var platforms = &section{name: "a spacing of platforms", doc: "Where platforms or nets must stand in a passage so that a body let go anywhere along its middle never touches anything faster than a speed.",
	keys: []key{
		title(),
		text("passage", "name of the passage").need(),
		text("body", "what falls: name of the body").need(),
		qty("max_speed", speed, positive, "of any contact").need(),
		text("source", "where the speed comes from, in the project's words").or("none stated"),
	}}

var solver = &section{name: "the solver", doc: "Accuracy of the integration. The tolerances hold for the departure from uniform motion in the inertial frame, as norms of position and velocity.",
	keys: []key{
		num("relative_tolerance", span{low: 1e-13, high: 1e-3}, "of each step").or("1e-9"),
		qty("position_tolerance", length, span{low: 1e-18, high: 1}, "of each step").or(`"1e-12 m"`),
		qty("velocity_tolerance", speed, span{low: 1e-18, high: 1}, "of each step").or(`"1e-12 m/s"`),
		qty("max_time", duration, positive, "of any release").or(`"1 h"`),
		word("outside", `"lost"`, "what becomes of what leaves the hull: its release ends there as lost, or is followed outside, in vacuum; then a release may begin there too", "lost", "follow"),
		qty("max_distance", length, positive, "from where it was let go, a place that turns with the habitat: beyond it, what is followed outside is lost").or(`"1 km"`),
	}}

var output = &section{name: "the output", doc: "What is written.",
	keys: []key{
		qty("step", duration, span{low: 1e-6, high: 1e9}, "between the rows of a track").or(`"10 ms"`),
		word("figures", `"all"`, "which figures are drawn: all that there are and those asked for, or those asked for alone", "all", "asked"),
	}}

var figure = &section{name: "a figure", doc: "A figure drawn on request: of some things together, or of a choice. A figure of kind side, deflection, plan or loads shows all that it is of in one; one of another kind is drawn for each.",
	keys: []key{
		title(),
		texts("of", "release.NAME (also of a let-go series), path.NAME, study.NAME or habitat; * stands for anything; or a list").need(),
		word("kind", "", "what is drawn: side: the side view; inertial: the view from outside; stack: both above one another, with a ruler of time; deflection: the apparent deflection; plan: the deck plan; loads: what a crew path does to the person; path: the crew path from the side; scatter, sweep, let_go, throws, landing_map: the figures of the study; throw_table: the table to print; spin: how the habitat turns", figureKindNames()...).need(),
	}}

// file is the whole format.
var file = &section{name: "the file", doc: "The file itself.",
	keys: []key{
		{name: "format", want: wantInteger, span: span{low: Version, high: Version}, required: true, doc: "version of the format: " + strconv.Itoa(Version)},
		text("title", "what the scenario is about").or("the file's name"),
		text("question", "what is to be answered"),
		text("notes", "the story behind it"),
		table("habitat", habitat, "the habitat").need(),
		table("air", airKeys, "the air"),
		tables("body", body, "bodies"),
		tables("release", release, "releases"),
		tables("release_list", releaseList, "lists of releases"),
		tables("deck", deck, "decks"),
		tables("fixture", fixture, "fixtures"),
		tables("room", furtherRoom, "further rooms"),
		tables("passage", passage, "passages"),
		tables("crew", crew, "persons"),
		tables("crew_path", crewPath, "crew paths"),
		tables("limit", limit, "limits"),
		tables("platforms", platforms, "spacings of platforms"),
		tables("scatter", scatter, "studies: scatter"),
		tables("sweep", sweep, "studies: sweeps"),
		tables("throw_to", throwTo, "studies: throws"),
		tables("landing_map", landingMap, "studies: landing maps"),
		table("solver", solver, "accuracy"),
		table("output", output, "what is written"),
		tables("figure", figure, "figures on request"),
	}}
