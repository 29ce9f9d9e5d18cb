package scenarios

import (
	"encoding/json"
	"math"
	"regexp"
	"slices"
	"strings"
)

// Schema gives the JSON Schema (draft 2020-12) of the scenario format, for
// editors that check TOML against one.
func Schema() []byte {
	root := objectSchema(file)
	root["$schema"] = "https://json-schema.org/draft/2020-12/schema"
	root["title"] = "offplumb scenario, format 1"
	out, err := json.MarshalIndent(root, "", "  ")
	if err != nil {
		panic(err) // of strings, numbers, lists and maps only
	}
	return append(out, '\n')
}

type schema = map[string]any

func objectSchema(s *section) schema {
	props := schema{}
	var required []string
	for i := range s.keys {
		k := &s.keys[i]
		props[k.name] = keySchema(k)
		if k.required {
			required = append(required, k.name)
		}
	}
	out := schema{"type": "object", "description": s.doc, "properties": props, "additionalProperties": false}
	if required != nil {
		out["required"] = required
	}
	if groups := groupSchemas(s); groups != nil {
		out["allOf"] = groups
	}
	return out
}

// groupSchemas says of which keys only one may be given, or one must.
func groupSchemas(s *section) (out []schema) {
	seen := map[string]bool{}
	for i := range s.keys {
		g := s.keys[i].group
		if g == "" || seen[g] || len(s.group(g)) < 2 {
			continue
		}
		seen[g] = true
		var given []schema
		for j := range s.keys {
			if k := &s.keys[j]; k.group == g {
				given = append(given, k.given())
			}
		}
		ways := given
		if !slices.Contains(s.exactly, g) {
			ways = append(given[:len(given):len(given)], schema{"not": schema{"anyOf": given}})
		}
		out = append(out, schema{"oneOf": ways})
	}
	return out
}

// given says that a key is there; a flag only counts where it is set.
func (k *key) given() schema {
	out := schema{"required": []string{k.name}}
	if k.want == wantFlag {
		out["properties"] = schema{k.name: schema{"enum": []bool{true}}}
	}
	return out
}

func keySchema(k *key) schema {
	out := valueSchema(k)
	out["description"] = k.describe()
	return out
}

// describe is a key's meaning with its default.
func (k *key) describe() string {
	if k.deflt == "" {
		return k.doc
	}
	return k.doc + "; default " + k.deflt
}

func valueSchema(k *key) schema {
	switch k.want {
	case wantQuantity:
		return quantitySchema(k.dims, k.span)
	case wantName:
		return schema{"type": "string", "pattern": namePattern, "maxLength": longestName}
	case wantNumber:
		return k.span.schema("number")
	case wantInteger:
		return k.span.schema("integer")
	case wantFlag:
		return schema{"type": "boolean"}
	case wantWord:
		return schema{"enum": k.words}
	case wantTexts:
		one := schema{"type": "string"}
		return schema{"oneOf": []schema{one, {"type": "array", "items": one, "minItems": 1}}}
	case wantList:
		out := schema{"type": "array", "items": quantitySchema(k.dims, k.span), "minItems": 1}
		if k.count > 0 {
			out["minItems"], out["maxItems"] = k.count, k.count
		}
		return out
	case wantBounds:
		any := []schema{{"type": "string"}, {"type": "number"}, {"type": "boolean"}}
		return schema{"type": "array", "items": schema{"oneOf": any}, "minItems": 1}
	case wantTable:
		return objectSchema(k.sub)
	case wantTables:
		out := schema{"type": "array", "items": objectSchema(k.sub)}
		if k.required {
			out["minItems"] = 1
		}
		return out
	case wantWordOrQuantity:
		return schema{"anyOf": []schema{{"enum": k.words}, quantitySchema(k.dims, k.span)}}
	case wantBound:
		return boundSchema()
	case wantOpen:
		return objectSchema(k.free)
	case wantSettings:
		return schema{"type": "object"}
	case wantNumbers:
		return schema{"type": "array", "items": k.span.schema("number"), "minItems": k.count, "maxItems": k.count}
	}
	return schema{"type": "string"}
}

func boundSchema() schema {
	return schema{"oneOf": []schema{{"type": "number"}, quantitySchema(dimensions, anything)}}
}

func (s span) schema(kind string) schema {
	out := schema{"type": kind}
	if s.open {
		out["exclusiveMinimum"] = s.low
	} else if !math.IsInf(s.low, -1) {
		out["minimum"] = s.low
	}
	if !math.IsInf(s.high, 1) {
		out["maximum"] = s.high
	}
	return out
}

// spellings makes patterns of units that take all the ways of writing them.
var spellings = strings.NewReplacer(`\^2`, `(\^?2|²)`, `\^3`, `(\^?3|³)`, " ", "[ ·]", "µ", "[µ\u03bc]")

// namePattern is what a name may be: printable, without spaces at its ends.
const namePattern = `^[^\s\x00-\x1f\x7f]([^\x00-\x1f\x7f]*[^\s\x00-\x1f\x7f])?$`

// The numbers in front of a unit: any, those that are not negative (-0 is
// none), and those above 0.
const (
	anyNumber      = `[+-]?([0-9]+\.?[0-9]*|\.[0-9]+)`
	noNegative     = `(\+?([0-9]+\.?[0-9]*|\.[0-9]+)|-(0+\.?0*|\.0+))`
	positiveNumber = `\+?([0-9]*[1-9][0-9]*\.?[0-9]*|[0-9]*\.[0-9]*[1-9][0-9]*)`
)

// quantitySchema takes quantities of some dimensions. Of their range it knows
// the sign alone, since units differ.
func quantitySchema(dims []*dimension, within span) schema {
	number := anyNumber
	if within.low >= 0 {
		number = noNegative
		if within.low > 0 || within.open {
			number = positiveNumber
		}
	}
	var units []string
	for _, d := range dims {
		for _, u := range d.units {
			units = append(units, spellings.Replace(regexp.QuoteMeta(u.name)))
			if u.offset != 0 { // its zero is elsewhere
				number = anyNumber
			}
		}
	}
	return schema{"type": "string", "examples": []string{dims[0].example},
		"pattern": `^\s*` + number + `([eE][+-]?[0-9]+)?\s*(` + strings.Join(units, "|") + `)\s*$`}
}
