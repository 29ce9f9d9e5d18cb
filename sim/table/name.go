package table

import (
	"strconv"
	"strings"
)

// longestName bounds a file name, in bytes, so that with an ending and a
// folder it stays below what file systems allow (255).
const longestName = 100

// Namer gives things file names, each once.
type Namer struct{ taken map[string]bool }

// Name gives the file name of a thing: its name in lower case, every run of
// characters other than a-z and 0-9 turned into one hyphen, none at the ends.
// An empty or taken one gets -2, -3 and so on.
func (n *Namer) Name(thing string) string {
	if n.taken == nil {
		// What some systems keep for devices.
		n.taken = map[string]bool{"con": true, "prn": true, "aux": true, "nul": true}
	}
	base := plain(thing)
	name := base
	for i := 2; name == "" || n.taken[name]; i++ {
		name = base + "-" + strconv.Itoa(i)
		if base == "" {
			name = strconv.Itoa(i)
		}
	}
	n.taken[name] = true
	return name
}

func plain(thing string) string {
	var b strings.Builder
	gap := false
	for _, r := range strings.ToLower(thing) {
		if r >= 'a' && r <= 'z' || r >= '0' && r <= '9' {
			if gap && b.Len() > 0 {
				b.WriteByte('-')
			}
			gap = false
			b.WriteRune(r)
			if b.Len() >= longestName {
				break
			}
			continue
		}
		gap = true
	}
	return b.String()
}
