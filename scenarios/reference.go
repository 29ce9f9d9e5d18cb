package scenarios

import (
	"fmt"
	"strings"
)

// Reference gives the scenario format as a Markdown table, one row a key, from
// the same data as the checks and the schema.
func Reference() string {
	var b strings.Builder
	b.WriteString("| table | key | holds | default | meaning |\n| --- | --- | --- | --- | --- |\n")
	write := func(head string, s *section) {
		for i := range s.keys {
			k := &s.keys[i]
			if s == file && k.sub != nil {
				continue // it has rows of its own
			}
			deflt := k.deflt
			if k.required {
				deflt = "required"
			}
			fmt.Fprintf(&b, "| %s | `%s` | %s | %s | %s |\n", head, k.name, k.holds(), deflt, k.doc)
			head = ""
		}
	}
	write("", file)
	for i := range file.keys {
		k := &file.keys[i]
		if k.sub == nil {
			continue
		}
		write(k.header(k.name), k.sub)
		for j := range k.sub.keys {
			if nested := &k.sub.keys[j]; nested.want == wantTables && nested.name != "legs" {
				write(nested.header(k.name+"."+nested.name), nested.sub)
			}
		}
	}
	for _, s := range []*section{coning, leg, walkTo, rideTo, carryKeys, station, throwKeys, velocityKeys, carriedKeys, reach, doorway, vary, spreadOf(length), target, distanceRange, region} {
		write("*"+s.name+"*", s)
	}
	return b.String()
}

// Units lists the units of each kind of quantity, as a Markdown list.
func Units() string {
	var b strings.Builder
	for _, d := range dimensions {
		fmt.Fprintf(&b, "- %s: %s; such as `\"%s\"`\n", article(d.name), d.list(), d.example)
	}
	return b.String()
}

// header is how a table is headed in a file.
func (k *key) header(path string) string {
	if k.want == wantTables {
		return "`[[" + path + "]]`"
	}
	return "`[" + path + "]`"
}

// holds says what a key holds, in words.
func (k *key) holds() string {
	switch k.want {
	case wantQuantity:
		return k.kinds("")
	case wantNumber:
		return "number"
	case wantInteger:
		return "whole number"
	case wantFlag:
		return "true or false"
	case wantWord:
		return "`" + strings.Join(k.words, "`, `") + "`"
	case wantTexts:
		return "text or list"
	case wantList:
		if k.count == 0 {
			return "list of " + k.kinds("s")
		}
		return fmt.Sprintf("list of %d %s", k.count, k.kinds("s"))
	case wantBounds:
		return "list"
	case wantTable:
		return "*" + k.sub.name + "*"
	case wantTables:
		if k.name == "legs" {
			return "list of *legs*"
		}
		return "tables"
	case wantWordOrQuantity:
		return "`" + strings.Join(k.words, "`, `") + "` or " + article(k.dims[0].name)
	case wantBound:
		return "quantity or number"
	case wantOpen:
		return "*" + k.free.name + "*"
	case wantSettings:
		return "table of settings"
	case wantNumbers:
		return fmt.Sprintf("list of %d numbers", k.count)
	}
	return "text"
}

// kinds names the dimensions of a key, each with the ending.
func (k *key) kinds(ending string) string {
	words := make([]string, len(k.dims))
	for i, d := range k.dims {
		words[i] = article(d.name) + ending
	}
	return strings.Join(words, " or ")
}

func article(s string) string { return strings.TrimPrefix(strings.TrimPrefix(s, "a "), "an ") }
