package scenarios

var crew = &section{name: "a crew member", doc: "A person.",
	keys: []key{
		title(),
		qty("mass", mass, positive, "with kit").need(),
		qty("stature", length, span{low: 0.3, high: 3}, "height of the person").need(),
		qty("breadth", length, positive, "shoulders and kit").or(`"0.5 m"`),
		num("waist", share, "height of the waist as a share of stature").or("0.55"),
		num("head", share, "height of the head as a share of stature").or("0.93"),
	}}

var walkTo = &section{name: "the end of a walk", doc: "Where a walk goes on the deck underfoot; what is left out stays as it is. Arcs are not wrapped.",
	keys: []key{
		arc("spinward", "arc on the deck underfoot, or an angle").one("round"),
		num("laps", anything, "times round, spinward positive").one("round"),
		qty("axial", length, anything, "along the axis"),
	}}

var rideTo = &section{name: "a ride", doc: "How far a lift goes, from where the feet are.",
	keys: []key{
		qty("up", length, anything, "toward the axis; negative: away from it").one("way"),
		arc("spinward", "along the ring, at the radius of the feet").one("way"),
	},
	exactly: []string{"way"}}

var carryKeys = &section{name: "a load", doc: "A mass that the person holds.",
	keys: []key{
		qty("mass", mass, positive, "its mass").need(),
		table("at", reach, "where it is held").or(`height = "1 m"`),
	}}

var leg = &section{name: "a leg", doc: "One piece of a crew path.",
	keys: []key{
		table("walk", walkTo, "walk or run to a place").one("leg"),
		qty("stand", duration, positive, "stand still").one("leg"),
		qty("climb", length, positive, "toward the axis; one that ends level with a deck joins it").one("leg"),
		qty("descend", length, positive, "away from the axis; one that ends level with a deck joins it").one("leg"),
		qty("stand_up", length, positive, "rise from a seat: how far the head rises, the feet staying").one("leg"),
		qty("sit_down", length, positive, "sink onto a seat: how far the head sinks").one("leg"),
		table("ride", rideTo, "ride a lift, radially or along the ring").one("leg"),
		qty("turn", angle, anything, "turn the body about the vertical, to the left positive").one("leg"),
		qty("turn_head", angle, anything, "turn the head by an angle, by the right-hand rule about its axis: about the vertical, to the left").one("leg"),
		qty("speed", speed, positive, "of walk, climb, descend and ride; of the head in stand_up and sit_down").or(`"1 m/s" for stand_up and sit_down, else required`),
		qty("ramp", duration, notNegative, "of the speed, at both ends").or(`"0.5 s"; "0.45 s" for stand_up and sit_down`),
		word("profile", `"smooth"; "trapezoid" for a ride`, "how the speed grows and falls at both ends: smooth, with no jerk that is infinite, or steadily", "smooth", "trapezoid"),
		qty("pitch", angle, span{low: degrees(10), high: degrees(90)}, "climb, descend: of a straight ladder or stair above the deck at its start, rising the way that the person faces").or(`"90 deg": a radial ladder`),
		flag("head_first", "climb, descend: with the head outward of the feet"),
		text("through", "climb, descend: the opening that the way leads through; the shoulders must pass it"),
		qty("over", duration, positive, "of turn_head and turn").or(`"1 s"`),
		word("about", `"vertical"`, "axis of turn_head", "vertical", "spinward", "axial"),
		word("facing", `"spinward"`, "where the person looks on a ladder", "spinward", "antispinward", "+axial", "-axial"),
	},
	exactly: []string{"leg"}}

var crewPath = &section{name: "a crew path", doc: "A person's motion through stations.",
	keys: []key{
		title(),
		text("crew", "name of the person").need(),
		table("start", station, "where the feet are at the start").or("the reference floor's middle"),
		tables("legs", leg, "its legs, in order").need(),
		qty("time", duration, notNegative, "when it starts").or(`"0 s"`),
		table("carry", carryKeys, "a mass held all the way"),
		{name: "gravity_levels", want: wantList, dims: []*dimension{accel}, span: notNegative, doc: "levels of apparent gravity below and above which the time is wanted"},
	}}
