// Command offplumb computes where objects go and what people feel inside a
// spinning habitat, and writes the evidence: tables, figures and a summary.
//
//	offplumb run SCENARIO.toml      everything the scenario asks for
//	offplumb join DIR...            joins the parts of a run
//	offplumb check SCENARIO.toml    reads and validates only
//	offplumb examples [NAME]        lists the shipped scenarios, or prints one
//	offplumb schema                 prints a JSON Schema of the scenario format
//	offplumb selfcheck              holds the program against published figures
//	offplumb version                version, Go version, build
//
// It is all of the program that prints, and none of its physics. The function
// run is the program: it gets arguments and streams and gives the exit status,
// so that tests drive it as users do. A run is a job (job.go): the loaded
// scenario, what package study computes of it, the rows that package measure
// makes of that. Each kind of study is a file that lists its tables, its
// figures and its lines of the summary. Files are written aside and put in
// place at the end (folder.go), in the order of a list, so that the same
// scenario gives the same bytes.
package main

import "os"

func main() { os.Exit(run(os.Args[1:], os.Stdin, os.Stdout, os.Stderr)) }
