package scenarios

import (
	"hash/fnv"
	"io"
	"slices"
)

// hashOf is a number of a name; two names may have the same.
func hashOf(name string) uint64 {
	h := fnv.New64a()
	io.WriteString(h, name) // never fails
	return h.Sum64()
}

// apart faults the names that the long lists have twice. Numbers of the names
// tell which may be; the lists are read once more where there are any.
func apart(streams []*Stream) (errs ErrorList) {
	var all []uint64
	for _, s := range streams {
		all = append(all, s.hashes...)
	}
	slices.Sort(all)
	again, more := map[uint64]bool{}, 0
	for i := 1; i < len(all); i++ {
		if all[i] != all[i-1] {
			continue
		}
		if more++; len(again) < mostFaults {
			again[all[i]] = true
		}
	}
	if more == 0 {
		return nil
	}
	var last *Stream
	first := map[string]bool{}
	for _, s := range streams {
		s.each(func(l *listReader, i int) bool {
			name := l.b.in.Releases[i].Name
			if !again[hashOf(name)] {
				return true
			}
			if !first[name] {
				first[name] = true
				return true
			}
			errs = append(errs, l.b.rows[i].at("release").fault("", "", "a release named %q is there already", shorten(name)))
			last, more = s, more-1
			return len(errs) < mostFaults
		})
		if len(errs) == mostFaults {
			break
		}
	}
	if last != nil && more > 0 { // but for names whose numbers are the same
		errs = append(errs, last.end().fault("", "", "%s", moreFaults(more)))
	}
	return errs
}

// each reads the rows one after another, as long as it is told to.
func (s *Stream) each(do func(l *listReader, i int) bool) {
	rows, err := s.Open()
	if err != nil {
		return // as the scan has told
	}
	defer rows.f.Close()
	for {
		b, ok, err := rows.next()
		if !ok || err != nil {
			return
		}
		l, broken := s.read(b)
		for i := range l.b.in.Releases {
			if !do(l, i) {
				return
			}
		}
		if broken {
			return
		}
	}
}

// Find says which of some names are releases of the list.
func (s *Stream) Find(names []string) map[string]bool {
	out := map[string]bool{}
	s.each(func(l *listReader, i int) bool {
		if name := l.b.in.Releases[i].Name; slices.Contains(names, name) {
			out[name] = true
		}
		return len(out) < len(names)
	})
	return out
}
