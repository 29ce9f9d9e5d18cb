package measure

// Lines writes lines of landings.csv and rests.csv while releases come, without
// a table of them. One goroutine at a time may use it.
type Lines struct {
	landings liner[Landing]
	rests    liner[Rest]
}

// NewLines makes one.
func NewLines() *Lines { return &Lines{newLiner(landingColumns), newLiner(restColumns)} }

// Landing appends the line of a landing.
func (l *Lines) Landing(dst []byte, row *Landing) []byte { return l.landings.line(dst, row) }

// Rest appends the line of a rest.
func (l *Lines) Rest(dst []byte, row *Rest) []byte { return l.rests.line(dst, row) }
