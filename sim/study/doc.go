// Package study runs what a scenario asks for: it prepares the releases and
// crew paths, spreads them over the cores, and gathers the results in the
// order of the file, so that the same scenario gives the same results for any
// number of workers.
//
// [Prepare] takes a model and works out what every run needs first: the crew
// paths, where each release starts, which limit judges what. [Prepared.Fly]
// then flies the releases, each into a [Result]. The studies go the same way,
// many flights at a time: scatters ([Scattering]), sweeps ([Sweep]), landing
// maps, throws ([Throws], by a search for the throws that arrive), platforms in
// a passage, and lists too long to be kept ([RowFlier]).
//
// A [Packer] stores results bit by bit, so that parts of a run that were computed on
// several machines can be joined to what one would have given.
//
// # Laws
//
//   - Item i depends on the model, the seed, the study's name and i, and on no
//     other item: its result goes to slot i, whoever computes it.
//   - Sums are taken in the order of the items.
//   - A context that ends stops the work, and no result is half there.
package study
