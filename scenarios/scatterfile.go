package scenarios

import (
	"bytes"
	"encoding/csv"
	"errors"
	"io"
	"math"
	"strings"

	"offplumb/sim/model"
)

// fromFile reads a spread from a column of a file.
func (b *builder) fromFile(out *model.Spread, o *object, s *section, files reading) {
	out.Kind, out.Source = model.Empirical, o.str("file")
	if !o.has("column") {
		b.wants(o, "a spread from a file", "column")
		return
	}
	src, ok := b.contents(o, "file", files)
	if !ok || o.vals["column"] == nil {
		return
	}
	c := columnReader{listReader: listReader{b: b, o: o, content: newContent(out.Source, src)}, name: o.str("column"), dims: s.find("normal").dims}
	c.csv = csv.NewReader(bytes.NewReader(c.src))
	c.csv.ReuseRecord = true
	out.Data = c.read()
	out.IsAngle = c.dim == angle && len(c.dims) > 1
}

// columnReader reads one column of numbers of a file.
type columnReader struct {
	listReader
	name string
	at   int // of the column
	dims []*dimension
	dim  *dimension // of what was read
	unit *unit      // that the column's name gives; nil: the fields have theirs
}

func (c *columnReader) read() []float64 {
	if at, bad := notText(c.src); bad {
		c.fault(c.place(at), "save it as CSV UTF-8", "is not UTF-8")
		return nil
	}
	head, err := c.csv.Read()
	switch {
	case errors.Is(err, io.EOF):
		c.fault(c.place(0), "", "wants a header row, got an empty file")
		return nil
	case err != nil:
		c.broken(err)
		return nil
	case !c.find(head):
		return nil
	}
	return c.rows()
}

// find looks for the column in the header row, and for its unit.
func (c *columnReader) find(head []string) bool {
	names := make([]string, min(len(head), mostColumns))
	for i := range names {
		names[i] = strings.TrimSpace(head[i])
		c.cols = append(c.cols, i)
	}
	c.at = -1
	for i, name := range names {
		if name == c.name && c.at >= 0 {
			c.fault(c.field(i), "", "column %q is given twice", shorten(name))
			return false
		} else if name == c.name {
			c.at = i
		}
	}
	if c.at < 0 {
		hint := "the columns are " + shorten(strings.Join(names, ", "))
		if like := nearest(c.name, names); like != "" {
			hint = "did you mean " + printable(like) + "?"
		}
		c.b.fault(c.o.at("column"), join(c.o.path, "column"), hint, "no column named %q in %s", shorten(c.name), c.file)
		return false
	}
	c.unit, c.dim = endingUnit(c.name, c.dims)
	return true
}

// underscored writes a unit as names of columns end in it.
var underscored = strings.NewReplacer("/", "_", "^", "", " ", "_", "°", "deg", "µ", "u")

// endingUnit gives the unit that a column's name ends in, the longest where
// several fit; nil: none.
func endingUnit(name string, dims []*dimension) (best *unit, of *dimension) {
	long := 0
	for _, d := range dims {
		for i := range d.units {
			end := underscored.Replace(d.units[i].name)
			if (name == end || strings.HasSuffix(name, "_"+end)) && len(end) > long {
				best, of, long = &d.units[i], d, len(end)
			}
		}
	}
	return best, of
}

func (c *columnReader) rows() []float64 {
	var out []float64
	for c.faults < mostFaults {
		rec, err := c.csv.Read()
		switch {
		case errors.Is(err, io.EOF):
			if len(out) == 0 && c.faults == 0 {
				c.fault(c.place(len(c.src)), "", "wants at least one row below the header")
			}
			return out
		case errors.Is(err, csv.ErrFieldCount):
			c.wrongCount(rec)
		case err != nil:
			c.broken(err)
			return nil
		case !isEmpty(rec):
			out = append(out, c.value(strings.TrimSpace(rec[c.at])))
		}
	}
	return nil
}

// value reads a field, in SI.
func (c *columnReader) value(field string) float64 {
	if len(c.dims) > 0 && c.unit == nil {
		q, err := measureOf(field, c.dims...)
		if err != nil {
			c.fault(c.field(c.at), "a column whose name ends in its unit, such as height_m, holds bare numbers", "%s: %v, got %q", printable(c.name), err, shorten(field))
			return 0
		}
		if c.dim != nil && q.dim != c.dim {
			c.fault(c.field(c.at), "", "%s: wants %s as the first row has, got %q", printable(c.name), c.dim.name, shorten(field))
		}
		c.dim = q.dim
		return q.si
	}
	x, rest, err := split(field)
	if err != nil || rest != "" {
		c.fault(c.field(c.at), comma(field), "%s: wants a number, got %q", printable(c.name), shorten(field))
		return 0
	}
	most := float64(mostNumber)
	if c.unit != nil {
		x, most = x*c.unit.scale+c.unit.offset, c.dim.most
	}
	if math.Abs(x) > most {
		c.fault(c.field(c.at), "", "%s: wants a magnitude of at most %g, in SI units, got %s", printable(c.name), most, shorten(field))
	}
	return x
}
