package measure

import (
	"slices"
	"strings"
)

// StandsFor says whether an entry of a limit's list, such as release.mug*,
// stands for a release of a name.
func StandsFor(of, release string) bool {
	pattern, ok := strings.CutPrefix(of, "release.")
	return ok && Matches(pattern, release)
}

// JudgeRelease gives the verdict on a limit for one release that is not one of
// the scenario's own, such as a row of a long list; the evidence is of it,
// whatever the index. It is false where the limit does not judge it.
func (c *Criterion) JudgeRelease(name string, e Evidence) (Verdict, bool) {
	if !c.ofReleases() || !slices.ContainsFunc(c.Limit.Of, func(of string) bool { return StandsFor(of, name) }) {
		return Verdict{}, false
	}
	return c.one(Target{Kind: "release", Name: name}, e)
}

// ofReleases says whether the limit judges releases.
func (c *Criterion) ofReleases() bool {
	switch c.Table {
	case "landings", "rests", "impacts", "clearance", "tracks":
		return true
	}
	return false
}

// JudgeSome is Judge for the releases from one index up to another, and for
// what else the limit judges if others says so.
func (c *Criterion) JudgeSome(e Evidence, from, to int, others bool) (Verdict, bool) {
	part := *c
	part.Targets = slices.DeleteFunc(slices.Clone(c.Targets), func(t Target) bool {
		if t.Kind != "release" {
			return !others
		}
		return t.Index < from || t.Index >= to
	})
	return part.Judge(e)
}
