package scenarios

import (
	"bytes"
	"encoding/csv"
	"fmt"
	"strings"

	"offplumb/sim/air"
	"offplumb/sim/model"
)

// weather reads what the air does beside turning with the habitat.
func (b *builder) weather(o *object, files reading) model.Weather {
	if o.flag("none") {
		return model.Weather{}
	}
	w := model.Weather{Stratified: o.flag("stratified"), Buoyant: o.flag("buoyancy"), Temperature: o.num("temperature")}
	if !o.has("temperature") && !o.has("density") && !o.has("viscosity") {
		w.Temperature = air.DefaultTemperature
	}
	if d := o.sub("draft"); d != nil {
		w.Draft = b.draft(d, files)
	}
	return w
}

// ways are the keys of a draft's components, in their order.
var ways = [...]string{air.Spinward: "spinward", air.Axial: "axial", air.Up: "up"}

// draft reads a draft; nil after a fault.
func (b *builder) draft(o *object, files reading) *air.Draft {
	given := 0
	for _, k := range ways {
		if o.has(k) {
			given++
		}
	}
	switch {
	case o.has("file"):
		b.refuses(o, "stands in the file", "heights", "spinward", "axial", "up")
		return b.draftFile(o, files)
	case given == 0:
		b.fault(o.node.key, o.path, `write spinward = "0.3 m/s"`, "a draft wants one or more of spinward, axial and up, or a file")
		return nil
	case o.has("heights"):
		return b.draftTable(o)
	}
	var speed [len(ways)]float64
	for c, k := range ways {
		if list := o.list(k); len(list) > 1 || o.has(k) && o.node.kids[k].kind == isArray {
			b.fault(o.at(k), join(o.path, k), "write heights = [...] beside it", "a list of speeds wants the key heights")
			return nil
		}
		speed[c] = o.num(k)
	}
	return air.UniformDraft(speed[air.Spinward], speed[air.Axial], speed[air.Up])
}

// draftTable reads lists by height.
func (b *builder) draftTable(o *object) *air.Draft {
	heights := bare(o.list("heights"))
	if heights == nil || !b.grows(heights, func(i int) place { return o.node.kids["heights"].items[i].at }, func(i int) string {
		return fmt.Sprintf("%s[%d]", join(o.path, "heights"), i)
	}, o.at("heights"), join(o.path, "heights")) {
		return nil
	}
	var speeds [len(ways)][]float64
	for c, k := range ways {
		if !o.has(k) {
			continue
		}
		speeds[c] = bare(o.list(k))
		if speeds[c] == nil {
			return nil // which is told
		}
		if o.node.kids[k].kind != isArray {
			for len(speeds[c]) < len(heights) {
				speeds[c] = append(speeds[c], speeds[c][0]) // one for all
			}
		}
		if len(speeds[c]) != len(heights) {
			b.fault(o.at(k), join(o.path, k), "", "wants a speed for each of the %d heights, got %d", len(heights), len(speeds[c]))
			return nil
		}
	}
	return b.profile(o, heights, speeds)
}

// grows faults heights that are too few or do not grow.
func (b *builder) grows(heights []float64, at func(int) place, key func(int) string, whole place, name string) bool {
	if len(heights) < 2 {
		b.fault(whole, name, "a draft that is the same at all heights wants none", "wants two heights or more, got %d", len(heights))
		return false
	}
	for i := 1; i < len(heights); i++ {
		if !(heights[i] > heights[i-1]) {
			b.fault(at(i), key(i), "", "wants heights that grow, got %g m after %g m", heights[i], heights[i-1])
			return false
		}
	}
	return true
}

func (b *builder) profile(o *object, heights []float64, speeds [len(ways)][]float64) *air.Draft {
	d, err := air.NewDraft(heights, speeds)
	if err != nil {
		b.fault(o.node.key, o.path, "", "%v", err)
		return nil
	}
	return d
}

// draftColumns are the columns of a draft's file, the heights first.
var draftColumns = [...]string{"height_m", "spinward_m_s", "axial_m_s", "up_m_s"}

// draftFile reads a table by height.
func (b *builder) draftFile(o *object, files reading) *air.Draft {
	src, ok := b.contents(o, "file", files)
	if !ok {
		return nil
	}
	there := map[string]bool{}
	if head, err := csv.NewReader(bytes.NewReader(newContent(o.str("file"), src).src)).Read(); err == nil {
		for _, name := range head {
			there[strings.TrimSpace(name)] = true
		}
	}
	if !there[draftColumns[0]] {
		b.fault(o.at("file"), join(o.path, "file"), "the columns are "+strings.Join(draftColumns[:], ", "), "wants the column %s in %s", draftColumns[0], o.str("file"))
		return nil
	}
	var lists [len(draftColumns)][]float64
	found := 0
	for i, name := range draftColumns {
		if i > 0 && !there[name] {
			continue
		}
		if i > 0 {
			found++
		}
		faults := len(b.errs)
		if lists[i] = b.draftColumn(o, src, name, i == 0); len(b.errs) > faults {
			return nil
		}
	}
	if found == 0 {
		b.fault(o.at("file"), join(o.path, "file"), "", "wants one or more of the columns spinward_m_s, axial_m_s and up_m_s in %s", o.str("file"))
		return nil
	}
	return b.profile(o, lists[0], [len(ways)][]float64(lists[1:]))
}

func (b *builder) draftColumn(o *object, src []byte, name string, heights bool) []float64 {
	dim := speed
	if heights {
		dim = length
	}
	c := columnReader{listReader: listReader{b: b, o: o, content: newContent(o.str("file"), src)}, name: name, dims: []*dimension{dim}}
	c.csv = csv.NewReader(bytes.NewReader(c.src))
	c.csv.ReuseRecord = true
	faults := len(b.errs)
	out := c.read()
	if heights && len(b.errs) == faults {
		at := func(int) place { return o.at("file") }
		b.grows(out, at, func(int) string { return join(o.path, "file") }, at(0), join(o.path, "file"))
	}
	return out
}

// bare gives a list's values, in SI; nil for none.
func bare(list []quantity) []float64 {
	var out []float64
	for _, q := range list {
		out = append(out, q.si)
	}
	return out
}
