package scenarios

var scatter = &section{name: "a scatter", doc: "A release many times, its keys varied at random.",
	keys: []key{
		title(),
		text("of", "name of the release").need(),
		{name: "samples", want: wantInteger, span: span{low: 1, high: 1e7}, required: true, doc: "how many; each takes about 200 bytes of memory"},
		word("sampling", `"random"`, "how they are spread", "random", "latin_hypercube", "halton"),
		qty("precision", length, positive, "stop sooner, once the 95 % confidence interval of the mean deck offset reaches no further than this to either side").or("all samples"),
		num("share_precision", span{low: 0, high: 0.5, open: true}, "stop sooner, once those of the probabilities of surfaces and openings reach no further than this to either side, half of their width").or("all samples"),
		{name: "vary", want: wantOpen, free: vary, required: true, doc: "keys of the release and how each varies"},
	}}

var variantKeys = &section{name: "a variant", doc: "The scenario with some of its keys set otherwise, or another scenario file.",
	keys: []key{
		title(),
		{name: "set", want: wantSettings, doc: `keys and values, as in --set: { "fixture.bench.at.height" = "1.1 m" }`},
		text("file", "scenario file, in place of this one; settings of the command line go for it too"),
	}}

var sweep = &section{name: "a sweep", doc: "A key stepped through a range or a list of values, or two keys through all pairs of theirs, or named variants of the scenario, such as before and after. A point that is impossible has a row without measures. Of several rows, as along a crew path or of a let-go series, a measure is the value of the greatest magnitude, of clearance the least.",
	keys: []key{
		title(),
		text("key", "the key that is stepped, as in --set; it must hold a number or a quantity").one("steps"),
		tables("variants", variantKeys, "in place of a key, variants of the scenario; their landings are held against those of the first").one("steps"),
		bound("from", "first value"), bound("to", "last value"),
		{name: "count", want: wantInteger, span: span{low: 1, high: 1e6}, doc: "how many values, evenly spaced"},
		{name: "values", want: wantBounds, doc: "the values, in place of from, to and count"},
		text("key2", "a second key"),
		bound("from2", "its first value"), bound("to2", "its last value"),
		{name: "count2", want: wantInteger, span: span{low: 1, high: 1e6}, doc: "how many of its values"},
		{name: "values2", want: wantBounds, doc: "its values, in place of from2, to2 and count2"},
		texts("measures", "what is recorded: table.column; .min or .max behind it takes that of several rows").need(),
		texts("of", "what the measures are of: release.NAME, path.NAME or habitat; * stands for anything; or a list; a column each").or("the release or crew path that a key names, else all"),
	},
	exactly: []string{"steps"}}

var target = &section{name: "a target", doc: "A station, or a point of a moving person.",
	keys: append([]key{text("path", "name of a crew path"), table("reach", reach, "the point of the person")}, station.keys...)}

var distanceRange = &section{name: "a range of distances", doc: "Evenly spaced distances.",
	keys: []key{
		qty("from", length, anything, "first distance").need(),
		qty("to", length, anything, "last distance").need(),
		{name: "count", want: wantInteger, span: span{low: 1, high: maxDistances}, required: true, doc: "how many"},
	}}

var throwTo = &section{name: "a throw study", doc: "How to throw so as to reach a target: a station, or a point of a person under way, where that is when the throw arrives.",
	keys: []key{
		title(),
		table("from", station, "where it is thrown from").need(),
		text("body", "name of the body").or("a point, without drag"),
		table("target", target, "where it is to go").need(),
		qty("speed", speed, positive, "of the throw, relative to the habitat: all directions that reach are found").one("throw"),
		qty("time", duration, positive, "of the flight: its velocity is found").one("throw"),
		flag("least_speed", "the slowest throws: each that is slower than those of a little more or less time").one("throw"),
		qty("leaves", duration, notNegative, "when it is thrown").or(`"0 s"`),
		qty("longest", duration, positive, "of the flights that are looked at").or("one turn of the habitat; never more than max_time"),
		{name: "distances", want: wantList, dims: []*dimension{length}, span: anything, group: "table",
			doc: "a throw table: targets at these distances along the target's deck from plumb under the thrower, negative ones the other way"},
		table("range", distanceRange, "a throw table: evenly spaced distances").one("table"),
		word("along", `"spinward"`, "the way that distances are counted", "spinward", "axial"),
	},
	exactly: []string{"throw"}}
