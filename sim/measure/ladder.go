package measure

import (
	"fmt"
	"math"

	"offplumb/sim/crew"
	"offplumb/sim/model"
	"offplumb/sim/table"
)

// leastPush is the side force, in N, below which a ladder leg counts as
// without one.
const leastPush = 0.5

// Ladders tells, for each climb and descent of a path, which side the person
// is pushed to, how hard, and which facing lets that press into the ladder.
func Ladders(m *model.Model, p *crew.Plan, loads []Load) []string {
	var out []string
	for leg := range p.Legs() {
		kind := p.Path.Legs[leg].Kind
		if kind != model.Climb && kind != model.Descend {
			continue
		}
		out = append(out, ladder(p, loads, leg))
	}
	return out
}

func ladder(p *crew.Plan, loads []Load, leg int) string {
	spec := &p.Path.Legs[leg]
	side, pull := 0.0, 0.0
	for i := range loads {
		if l := &loads[i]; l.Feet.Leg == leg {
			if math.Abs(l.SideSpinward) > math.Abs(side) {
				side = l.SideSpinward
			}
			if math.Abs(l.Pull) > math.Abs(pull) {
				pull = l.Pull
			}
		}
	}
	verb := "climbing"
	if spec.Kind == model.Descend {
		verb = "descending"
	}
	head := fmt.Sprintf("%s, leg %d, %s facing %s", p.Path.Name, leg+1, verb, facingWords[spec.Facing])
	if math.Abs(side) < leastPush {
		return head + ": no push to a side"
	}
	way, into := "spinward", "spinward"
	if side < 0 {
		way, into = "antispinward", "antispinward"
	}
	words := fmt.Sprintf("%s: pushed %s with up to %s N", head, way, table.Round(math.Abs(side), 3))
	switch {
	case pull > leastPush:
		words += fmt.Sprintf(", away from the ladder; facing %s it would press into the ladder", into)
	case pull < -leastPush:
		words += ", into the ladder"
	default:
		words += fmt.Sprintf(", along the ladder's face; facing %s it would press into the ladder", into)
	}
	return words
}

var facingWords = map[model.Direction]string{model.Spinward: "spinward", model.Antispinward: "antispinward",
	model.PlusAxial: "+axial", model.MinusAxial: "-axial"}
