package scenarios

import (
	"encoding/json"
	"fmt"
	"math"
	"os"
	"path/filepath"
	"reflect"
	"regexp"
	"slices"
	"strings"
	"testing"
	"unicode/utf8"

	"github.com/pelletier/go-toml/v2"
)

func readSchema(t *testing.T) map[string]any {
	t.Helper()
	var s map[string]any
	if err := json.Unmarshal(Schema(), &s); err != nil {
		t.Fatalf("not JSON: %v", err)
	}
	return s
}

// validator holds values against a JSON Schema, as far as ours goes. It fails
// on words that it does not know.
type validator struct{ faults []string }

func (v *validator) fault(path, format string, args ...any) {
	v.faults = append(v.faults, path+": "+fmt.Sprintf(format, args...))
}

// check holds a value as a TOML decoder gives it: texts, int64, float64,
// bool, []any, map[string]any.
func (v *validator) check(path string, s map[string]any, x any) {
	for word, arg := range s {
		switch word {
		case "$schema", "title", "description", "examples":
		case "type":
			if !isType(arg.(string), x) {
				v.fault(path, "%v is no %s", x, arg)
			}
		case "enum":
			if !slices.ContainsFunc(arg.([]any), func(a any) bool { return reflect.DeepEqual(a, x) }) {
				v.fault(path, "%v is none of %v", x, arg)
			}
		case "pattern":
			if text, ok := x.(string); ok && !regexp.MustCompile(arg.(string)).MatchString(text) {
				v.fault(path, "%q does not match %s", text, arg)
			}
		case "maxLength":
			if text, ok := x.(string); ok && utf8.RuneCountInString(text) > int(arg.(float64)) {
				v.fault(path, "is longer than %v", arg)
			}
		case "allOf":
			for _, sub := range arg.([]any) {
				v.check(path, sub.(map[string]any), x)
			}
		case "not":
			var one validator
			if one.check(path, arg.(map[string]any), x); len(one.faults) == 0 {
				v.fault(path, "fits what it must not")
			}
		case "required", "properties", "additionalProperties":
			if o, ok := x.(map[string]any); ok {
				v.object(path, word, arg, s, o)
			}
		case "items", "minItems", "maxItems":
			if list, ok := x.([]any); ok {
				v.list(path, word, arg, list)
			}
		case "minimum", "maximum", "exclusiveMinimum":
			if n, ok := asNumber(x); ok {
				v.number(path, word, arg.(float64), n)
			}
		case "oneOf", "anyOf":
			v.alternatives(path, word, arg.([]any), x)
		default:
			v.fault(path, "the schema has the word %q", word)
		}
	}
}

func (v *validator) object(path, word string, arg any, s, o map[string]any) {
	switch word {
	case "required":
		for _, k := range arg.([]any) {
			if _, ok := o[k.(string)]; !ok {
				v.fault(path, "lacks %s", k)
			}
		}
	case "properties":
		for k, sub := range arg.(map[string]any) {
			if kid, ok := o[k]; ok {
				v.check(path+"."+k, sub.(map[string]any), kid)
			}
		}
	case "additionalProperties":
		for k := range o {
			if _, ok := s["properties"].(map[string]any)[k]; !ok && arg == false {
				v.fault(path, "has the key %s", k)
			}
		}
	}
}

func (v *validator) list(path, word string, arg any, list []any) {
	switch word {
	case "items":
		for i, item := range list {
			v.check(fmt.Sprintf("%s[%d]", path, i), arg.(map[string]any), item)
		}
	case "minItems":
		if len(list) < int(arg.(float64)) {
			v.fault(path, "has %d items", len(list))
		}
	case "maxItems":
		if len(list) > int(arg.(float64)) {
			v.fault(path, "has %d items", len(list))
		}
	}
}

func (v *validator) number(path, word string, bound, n float64) {
	if word == "minimum" && n < bound || word == "maximum" && n > bound || word == "exclusiveMinimum" && n <= bound {
		v.fault(path, "%v breaks %s %v", n, word, bound)
	}
}

func (v *validator) alternatives(path, word string, subs []any, x any) {
	good := 0
	for _, sub := range subs {
		var one validator
		if one.check(path, sub.(map[string]any), x); len(one.faults) == 0 {
			good++
		}
	}
	if good == 0 || word == "oneOf" && good > 1 {
		v.fault(path, "%v fits %d of %d alternatives", x, good, len(subs))
	}
}

func isType(kind string, x any) bool {
	n, isNumber := asNumber(x)
	switch kind {
	case "number":
		return isNumber
	case "integer":
		return isNumber && n == math.Trunc(n)
	case "string":
		_, ok := x.(string)
		return ok
	case "boolean":
		_, ok := x.(bool)
		return ok
	case "array":
		_, ok := x.([]any)
		return ok
	case "object":
		_, ok := x.(map[string]any)
		return ok
	}
	return false
}

func asNumber(x any) (float64, bool) {
	switch x := x.(type) {
	case int64:
		return float64(x), true
	case float64:
		return x, true
	}
	return 0, false
}

func validate(t *testing.T, schema map[string]any, src string) []string {
	t.Helper()
	var x map[string]any
	if err := toml.Unmarshal([]byte(src), &x); err != nil {
		t.Fatalf("%s\n%v", src, err)
	}
	var v validator
	v.check("", schema, x)
	slices.Sort(v.faults)
	return v.faults
}

// TestExamplesFitTheSchema: an editor that has the schema marks nothing in a
// shipped scenario.
func TestExamplesFitTheSchema(t *testing.T) {
	s := readSchema(t)
	for _, e := range Examples() {
		for _, f := range validate(t, s, string(e.Files[0].Data)) {
			t.Errorf("%s: %s", e.Name, f)
		}
	}
	frozen, err := filepath.Glob("../testdata/frozen/*.toml")
	if err != nil || len(frozen) == 0 {
		t.Fatal(frozen, err)
	}
	for _, path := range frozen {
		src, err := os.ReadFile(path)
		if err != nil {
			t.Fatal(err)
		}
		for _, f := range validate(t, s, string(src)) {
			t.Errorf("%s: %s", path, f)
		}
	}
}

// TestSchemaRefuses: what the reader refuses in a single key, the schema does
// too, at that key.
func TestSchemaRefuses(t *testing.T) {
	s := readSchema(t)
	const habitat = "[habitat]\nfloor_radius = \"18 m\"\nspin = \"5 rpm\"\n"
	for _, c := range []struct{ what, src, where string }{
		{"no habitat", "format = 1\n", ": lacks habitat"},
		{"no format", habitat, ": lacks format"},
		{"another format", "format = 2\n" + habitat, ".format: "},
		{"an unknown key", "format = 1\n" + habitat + "colour = 'blue'\n", ".habitat: has the key colour"},
		{"an unknown table", "format = 1\n" + habitat + "[colour]\n", ": has the key colour"},
		{"a bare number", "format = 1\n" + habitat + "length = 14\n", ".habitat.length: "},
		{"another unit", "format = 1\n" + habitat + "length = '14 kg'\n", ".habitat.length: "},
		{"no unit", "format = 1\n" + habitat + "length = '14'\n", ".habitat.length: "},
		{"text behind the unit", "format = 1\n" + habitat + "length = '14 m long'\n", ".habitat.length: "},
		{"a word", "format = 1\n" + habitat + "shape = 'ring'\n", ".habitat.shape: "},
		{"a list too short", "format = 1\n" + habitat + "size = ['1 m']\n", ".habitat.size: "},
		{"a list too long", "format = 1\n" + habitat + "size = ['1 m', '1 m', '1 m', '1 m']\n", ".habitat.size: "},
		{"one table", "format = 1\n" + habitat + "[body]\n", ".body: "},
		{"a share above one", "format = 1\n" + habitat + "[[body]]\nname='a'\nmass='1 g'\ndiameter='1 m'\nrestitution=2\n", ".body[0].restitution: "},
		{"a text for a flag", "format = 1\n" + habitat + "[air]\nnone = 'yes'\n", ".air.none: "},
		{"until", "format = 1\n" + habitat + "[[release]]\nname='a'\nat={height='1 m'}\nuntil='landed'\n", ".release[0].until: "},
		{"two spins", "format = 1\n" + habitat + "rim_speed = '9 m/s'\n", ".habitat: "},
		{"no spin", "format = 1\n[habitat]\nfloor_radius = '9 m'\n", ".habitat: "},
		{"two places", "format = 1\n" + habitat + "[[release]]\nname='a'\nat={height='1 m'}\ncarried={path='p'}\n", ".release[0]: "},
		{"a length below 0", "format = 1\n" + habitat + "length = '-14 m'\n", ".habitat.length: "},
		{"no length", "format = 1\n" + habitat + "length = '0.0 m'\n", ".habitat.length: "},
		{"a name with a space behind it", "format = 1\n" + habitat + "[[crew]]\nname='a '\nmass='1 kg'\nstature='1 m'\n", ".crew[0].name: "},
		{"no legs", "format = 1\n" + habitat + "[[crew_path]]\nname='a'\ncrew='b'\nlegs=[]\n", ".crew_path[0].legs: "},
		{"a bound", "format = 1\n" + habitat + "[[limit]]\nname='a'\nof='b'\nmeasure='c'\nmax='1 wink'\n", ".limit[0].max: "},
		{"half a sample", "format = 1\n" + habitat + "[[scatter]]\nname='a'\nof='b'\nvary={}\nsamples=1.5\n", ".scatter[0].samples: "},
		{"a leg without room", "format = 1\n" + habitat + "[[crew_path]]\nname='a'\ncrew='b'\nlegs=[{walk=3}]\n", ".crew_path[0].legs[0].walk: "},
	} {
		faults := validate(t, s, c.src)
		if len(faults) == 0 || slices.ContainsFunc(faults, func(f string) bool { return !strings.HasPrefix(f, c.where) }) {
			t.Errorf("%s: got %q, want faults %s alone", c.what, faults, c.where)
		}
	}
}

// TestSchemaTakesEveryUnit: the patterns take each unit of each dimension, in
// every way of writing it that the reader takes, and refuse what it refuses.
func TestSchemaTakesEveryUnit(t *testing.T) {
	for _, d := range dimensions {
		pattern := regexp.MustCompile(quantitySchema([]*dimension{d}, anything)["pattern"].(string))
		var texts []string
		for _, u := range d.units {
			for _, name := range []string{u.name, strings.NewReplacer("^2", "²", "^3", "³").Replace(u.name), strings.NewReplacer("^", "").Replace(u.name),
				strings.ReplaceAll(u.name, " ", "·"), strings.ReplaceAll(u.name, "µ", "\u03bc"), u.name + "x", u.name + "^2", u.name + " m"} {
				texts = append(texts, "1 "+name, "-.5e-3"+name, " +2. "+name+" ", "1,5 "+name, "0x1 "+name, "1_0 "+name, "nan "+name, name)
			}
		}
		for _, text := range texts {
			_, err := measureOf(text, d)
			if got := pattern.MatchString(text); got != (err == nil) {
				t.Errorf("%s %q: the pattern says %t, the reader %v", d.name, text, got, err)
			}
		}
	}
}

// TestSchemaTakes: what the reader takes in a group, or at the edge of a range,
// the schema does too.
func TestSchemaTakes(t *testing.T) {
	s := readSchema(t)
	const habitat = "format = 1\n[habitat]\nfloor_radius = \"18 m\"\nspin = \"-5 rpm\"\n"
	for _, src := range []string{
		habitat + "[air]\ntemperature = '-20 °C'\n",
		habitat + "[[body]]\nname='é 1'\nmass='+.5e-3 kg'\ndiameter='0 m'\n[[release]]\nname='a'\nat={height='1 m'}\ntime='-0 s'\n",
		habitat + "[[release]]\nname='a'\nat={height='1 m', axial='-1 m'}\nthrow={speed='1 m/s'}\nstill=false\n",
		habitat + "[[release]]\nname='a'\nat={height='01.0 m'}\nuntil='00.50 s'\n",
	} {
		if faults := validate(t, s, src); len(faults) > 0 {
			t.Errorf("%s\nis refused: %q", src, faults)
		}
		if _, err := Load("a.toml", []byte(src), Options{}); err != nil {
			t.Errorf("%s\nthe reader refuses it: %v", src, err)
		}
	}
}

// eachSection calls f once for every section of the format.
func eachSection(f func(*section)) {
	seen := map[*section]bool{}
	var walk func(*section)
	walk = func(s *section) {
		if s == nil || seen[s] {
			return
		}
		seen[s] = true
		f(s)
		for i := range s.keys {
			walk(s.keys[i].sub)
			walk(s.keys[i].free)
		}
	}
	walk(file)
}

// TestSchemaHasEveryKey: every key of the format stands in the schema, with
// its meaning, and no other.
func TestSchemaHasEveryKey(t *testing.T) {
	var compare func(path string, s *section, o map[string]any)
	compare = func(path string, s *section, o map[string]any) {
		props := o["properties"].(map[string]any)
		if o["additionalProperties"] != false {
			t.Errorf("%s: the schema allows further keys", path)
		}
		if len(props) != len(s.keys) {
			t.Errorf("%s: the schema has %d keys, the format %d", path, len(props), len(s.keys))
		}
		required := fmt.Sprint(o["required"])
		for i := range s.keys {
			k := &s.keys[i]
			p, ok := props[k.name].(map[string]any)
			if !ok {
				t.Errorf("%s.%s is not in the schema", path, k.name)
				continue
			}
			if d, _ := p["description"].(string); !strings.HasPrefix(d, k.doc) || k.doc == "" {
				t.Errorf("%s.%s is described by %q, want %q", path, k.name, d, k.doc)
			}
			if has := slices.Contains(strings.Fields(strings.Trim(required, "[]")), k.name); has != k.required {
				t.Errorf("%s.%s: required is %t, want %t", path, k.name, has, k.required)
			}
			switch k.want {
			case wantTable:
				compare(path+"."+k.name, k.sub, p)
			case wantOpen:
				compare(path+"."+k.name, k.free, p)
			case wantTables:
				compare(path+"."+k.name, k.sub, p["items"].(map[string]any))
			}
		}
	}
	compare("", file, readSchema(t))
}

// TestFormatIsSound: names of keys are unique in their section, groups hold
// more than one key where one of them must be given, and sections have names.
func TestFormatIsSound(t *testing.T) {
	eachSection(func(s *section) {
		if s.name == "" || s.doc == "" {
			t.Errorf("a section without a name or a meaning: %q %q", s.name, s.doc)
		}
		seen := map[string]bool{}
		for i := range s.keys {
			k := &s.keys[i]
			if seen[k.name] {
				t.Errorf("%s has the key %s twice", s.name, k.name)
			}
			seen[k.name] = true
			if (k.sub != nil) != (k.want == wantTable || k.want == wantTables) {
				t.Errorf("%s.%s holds tables of no section, or no tables of one", s.name, k.name)
			}
			if k.want == wantQuantity && len(k.dims) == 0 || k.want == wantWord && len(k.words) == 0 {
				t.Errorf("%s.%s takes nothing", s.name, k.name)
			}
			if k.required && k.group != "" {
				t.Errorf("%s.%s is required and one of a group", s.name, k.name)
			}
		}
		for _, g := range s.exactly {
			if len(s.group(g)) < 2 {
				t.Errorf("%s wants one of the group %s, which has %q", s.name, g, s.group(g))
			}
		}
	})
	for s, keys := range instead {
		for k, others := range keys {
			for _, name := range append([]string{k}, others...) {
				if s.find(name) == nil {
					t.Errorf("%s has no key %s", s.name, name)
				}
			}
		}
	}
}

// TestReferenceHasEveryKey: the table of FORMAT.md has every key once in its
// section, and every section.
func TestReferenceHasEveryKey(t *testing.T) {
	lines := strings.Split(strings.TrimSpace(Reference()), "\n")
	rows := map[string][]string{} // by section
	head := ""                    // of the section at hand; the file's own keys have none
	for i, line := range lines {
		cells := strings.Split(line, " | ")
		if len(cells) != 5 || !strings.HasPrefix(line, "|") || !strings.HasSuffix(line, "|") {
			t.Fatalf("line %d has %d cells: %s", i+1, len(cells), line)
		}
		if i < 2 {
			continue
		}
		if first := strings.TrimSpace(strings.TrimPrefix(cells[0], "|")); first != "" {
			if rows[first] != nil {
				t.Errorf("the section %s stands twice", first)
			}
			head = first
		}
		rows[head] = append(rows[head], strings.Trim(cells[1], "`"))
	}
	sections := map[string]bool{}
	eachSection(func(s *section) {
		var want []string
		for i := range s.keys {
			if s != file || s.keys[i].sub == nil {
				want = append(want, s.keys[i].name)
			}
		}
		found := 0
		for head, got := range rows {
			if slices.Equal(got, want) {
				sections[head] = true
				found++
			}
		}
		if found == 0 {
			t.Errorf("no section of the table has the keys of %s: %q", s.name, want)
		}
	})
	for head := range rows {
		if !sections[head] {
			t.Errorf("the section %q of the table is none of the format", head)
		}
	}
}
