// Package scenarios reads scenario files. It is the only package that knows
// TOML: it decodes, keeps the position of every value, converts units to SI,
// checks, and reports all errors of a file at once. The shipped scenarios are
// embedded in it.
//
// [Load] reads a file and gives a [Scenario]: the model, and what only files
// know of, sweeps, figures and long lists. [Schema] and [Reference] tell the
// format, from the data that checks it. A fault that is found later, in the
// model, comes back as a key, and [Scenario.Problems] finds its line and column.
//
// # Laws
//
//   - A file that is refused is refused for all of its faults at once, each at
//     its line and column, and nothing has been computed.
//   - A file of format 1 means the same to every later version (testdata/frozen).
//   - No input, however malformed, panics or takes memory beyond its size's
//     measure (fuzz_test.go, hostile_test.go).
//
// The way of a file, each stage in a file of its own:
//
//	place.go     the place of each offset of a file
//	tree.go      TOML text -> a tree of nodes with their positions
//	set.go       settings from the command line, put into the tree
//	keys.go      the format as data: every key, its unit, range and meaning
//	check.go     the tree held against the format
//	values.go    each kind of value: words, numbers, lists, quantities
//	object.go    the typed values in SI that come of it
//	units.go     quantities with units
//	build.go     typed values -> model.Model
//	list.go      release lists in CSV; their rows in listrow.go
//	sweep.go     sweeps: read in sweep_read.go and sweep_values.go, each point loaded in variant.go
//	load.go      all of it in order, and the places of later problems
//	reference.go the format as a table for FORMAT.md; schema.go as JSON Schema
//	examples.go  the shipped scenarios
package scenarios
