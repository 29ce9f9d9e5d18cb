package motion

import "strings"

// hue is a colour on white paper and on a dark page: those of the figures (see plots).
type hue struct{ name, light, dark string }

var hues = []hue{
	{"paper", "#FFFFFF", "#14171A"},
	{"text", "#1A1A1A", "#E8E8E8"},
	{"soft", "#565656", "#B0B0B0"},
	{"line", "#4A4A4A", "#BEBEBE"},
	{"rule", "#CFCFCF", "#3D4248"},
	{"solid", "#E4E4E4", "#2C3136"},
	{"tint", "#F1F1F1", "#22262A"},
	{"blue", "#0072B2", "#4FA8E2"},
	{"vermillion", "#D55E00", "#F58A45"},
	{"green", "#00795A", "#33C79C"},
	{"purple", "#A3497B", "#E3A3C8"},
}

// looks are the rules of the drawings; $name is a hue.
const looks = `
.f-ground{fill:$paper}
.f-frame{fill:none;stroke:$rule}
.tint-hull,.tint-deck{fill:$solid}.tint-fixture{fill:$tint}
.line-hull,.line-deck,.line-fixture{stroke:$line;stroke-linejoin:round}
.line-hull:not([class*=tint]),.line-deck:not([class*=tint]),.line-fixture:not([class*=tint]){fill:none}
.line-hull{stroke-width:1.3}.line-deck{stroke-width:1.1}.line-fixture{stroke-width:.9}
.f-tick{fill:none;stroke:$line;stroke-width:.9}
.f-plumb{fill:none;stroke:$text;stroke-width:.9;stroke-dasharray:11 3 2 3}
.f-uniform{fill:none;stroke:$text;stroke-width:1.1;stroke-dasharray:5 3}
.f-past{opacity:.45}
.f-ahead{fill:none;stroke:$blue;stroke-width:1.2;opacity:.4}
.f-trail{fill:none;stroke:$blue;stroke-width:2.4;stroke-linejoin:round;stroke-linecap:round}
.f-slide{stroke-dasharray:6 3.6;stroke-linecap:butt}
.f-roll,.f-rest{stroke-dasharray:2.4 2.4;stroke-linecap:butt}
.f-ring{fill:$paper;stroke:$blue;stroke-width:1.6}
.f-dot{fill:$blue;stroke:$paper;stroke-width:1.4}
.f-body circle{fill:$vermillion;stroke:$paper;stroke-width:1.2}
.f-ghost circle{fill:none;stroke:$text;stroke-width:1.1;stroke-dasharray:2.6 1.8}
.f-axis{fill:none;stroke:$line;stroke-width:.9}
.f-head{fill:$line}
.f-bar{fill:none;stroke:$text;stroke-width:1}
.f-label{font-size:11px;fill:$text;stroke:$paper;stroke-width:3px;paint-order:stroke;stroke-linejoin:round}
.f-mid{text-anchor:middle}
.f-title{font-size:16px;font-weight:bold;fill:$text}
.f-name{font-size:12px;font-weight:bold;fill:$text}
.f-note{font-size:11px;fill:$soft}
.f-clock{font-size:13px;fill:$text;font-variant-numeric:tabular-nums}
.f-strip{fill:none;stroke:$line;stroke-width:1}
.f-thumb{fill:$vermillion;stroke:$paper;stroke-width:1.2}
`

// rules gives the rules with each hue put in.
func rules(value func(hue) string) string {
	var pairs []string
	for _, h := range hues {
		pairs = append(pairs, "$"+h.name, value(h))
	}
	return strings.NewReplacer(pairs...).Replace(strings.TrimSpace(looks))
}

// alone are the rules of a picture that stands alone. Print keeps the light colours.
func alone() string {
	light := rules(func(h hue) string { return h.light })
	dark := rules(func(h hue) string { return h.dark })
	return light + "\n@media screen and (prefers-color-scheme:dark){\n" + dark + "\n}"
}
