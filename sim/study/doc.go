// Package study runs what a scenario asks for: it prepares the releases and
// crew paths, spreads them over the cores, and gathers the results in the
// order of the file, so that the same scenario gives the same results for any
// number of workers.
package study
