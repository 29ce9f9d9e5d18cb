package plots

import "fmt"

// Phase is how a body moves along a piece of its track: it decides the dashes.
type Phase int

// The phases of a track. Flight is the zero value.
const (
	Flight Phase = iota
	Slide
	Roll
	Rest
	phaseCount
)

var phaseNames = [phaseCount]string{"flight", "slide", "roll", "rest"}

// phaseNamed finds a phase by its name; an empty name is flight.
func phaseNamed(name string) (Phase, error) {
	if name == "" {
		return Flight, nil
	}
	for i, n := range phaseNames {
		if n == name {
			return Phase(i), nil
		}
	}
	return 0, fmt.Errorf("no such phase: %q (flight, slide, roll, rest)", name)
}
