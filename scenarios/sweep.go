package scenarios

import (
	"strings"

	"offplumb/sim/measure"
)

const (
	// MaxPoints bounds the points of all sweeps of a scenario: a quarter of an
	// hour for the plainest.
	MaxPoints = 1_000_000
	// MaxSweeps bounds the sweeps of a scenario.
	MaxSweeps = 1000
)

// Sweep is a sweep: one key or two, stepped through values, and what is
// measured at each point.
type Sweep struct {
	Name  string
	Keys  []SweepKey     // one or two
	Picks []measure.Pick // measure by measure

	// Variants are the variants of the scenario, in place of what keys step
	// through; the one key is then their name.
	Variants []Variant

	node     *node
	path     string
	releases map[string]bool // names, as the file declares them, that the picks are of
}

// SweepKey is a key with the values that it takes.
type SweepKey struct {
	Name   string    // the key, its parts joined by points
	Texts  []string  // the values, as the scenario has them
	Values []float64 // numbers in the unit; none of a key that holds words
	Unit   string    // as the scenario has it; "": bare numbers or words
	parts  []string
	text   string // the key as the scenario has it
	quote  bool   // its values are texts
}

// Words says whether the key holds words, such as the name of a deck.
func (k *SweepKey) Words() bool { return k.Values == nil }

// tomlQuoted is how quotes stand within a text.
var tomlQuoted = strings.NewReplacer(`\`, `\\`, `"`, `\"`)

// setting gives a value as a setting.
func (k *SweepKey) setting(i int) string {
	v := k.Texts[i]
	if k.quote {
		v = `"` + tomlQuoted.Replace(v) + `"`
	}
	return k.text + "=" + v
}

// Points is the number of points: all pairs of values where there are two keys.
func (s *Sweep) Points() int {
	n := 1
	for i := range s.Keys {
		n *= len(s.Keys[i].Texts)
	}
	return n
}

// At gives the index of each key's value at a point; that of the last key goes
// fastest.
func (s *Sweep) At(point int) []int {
	out := make([]int, len(s.Keys))
	for i := len(s.Keys) - 1; i >= 0; i-- {
		n := len(s.Keys[i].Texts)
		out[i], point = point%n, point/n
	}
	return out
}

// Settings gives a point as settings KEY=VALUE.
func (s *Sweep) Settings(point int) []string {
	if s.Variants != nil {
		return nil
	}
	out := make([]string, len(s.Keys))
	for i, k := range s.At(point) {
		out[i] = s.Keys[i].setting(k)
	}
	return out
}

// Short names a point for people, with the ends of the keys.
func (s *Sweep) Short(point int) string {
	out := make([]string, len(s.Keys))
	for i, k := range s.At(point) {
		out[i] = s.Keys[i].Last() + " " + s.Keys[i].Texts[k]
	}
	return strings.Join(out, ", ")
}

// Last is the last part of the key.
func (k *SweepKey) Last() string { return k.parts[len(k.parts)-1] }
