package table

import (
	"strconv"
	"strings"
)

// longestName bounds a file name, in bytes, so that with an ending and a
// folder it stays below what file systems allow (255).
const longestName = 100

// devices are the names that some systems keep for devices.
var devices = []string{"con", "prn", "aux", "nul", "com0", "lpt0",
	"com1", "com2", "com3", "com4", "com5", "com6", "com7", "com8", "com9",
	"lpt1", "lpt2", "lpt3", "lpt4", "lpt5", "lpt6", "lpt7", "lpt8", "lpt9"}

// Namer gives things file names, each once.
type Namer struct {
	taken map[string]bool
	last  map[string]int // the number last tried, of each name without one
}

// Name gives the file name of a thing: its name in lower case, every run of
// characters other than a-z and 0-9 turned into one hyphen, none at the ends.
// An empty or taken one gets -2, -3 and so on.
func (n *Namer) Name(thing string) string {
	if n.taken == nil {
		n.taken, n.last = map[string]bool{"": true}, map[string]int{}
		for _, d := range devices {
			n.taken[d] = true
		}
	}
	base := plain(thing)
	name := base
	for i := max(2, n.last[base]+1); n.taken[name]; i++ {
		name, n.last[base] = base+"-"+strconv.Itoa(i), i
	}
	n.taken[name] = true
	return name
}

func plain(thing string) string {
	var b strings.Builder
	hyphen := ""
	for _, r := range strings.ToLower(thing) {
		switch {
		case !(r >= 'a' && r <= 'z' || r >= '0' && r <= '9'):
			if b.Len() > 0 {
				hyphen = "-"
			}
			continue
		case b.Len()+len(hyphen) >= longestName:
			return b.String()
		}
		b.WriteString(hyphen)
		b.WriteRune(r)
		hyphen = ""
	}
	return b.String()
}
