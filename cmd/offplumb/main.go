// Command offplumb computes where objects go and what people feel inside a
// spinning habitat, and writes the evidence: tables, figures and a summary.
package main

import "os"

func main() { os.Exit(run(os.Args[1:], os.Stdin, os.Stdout, os.Stderr)) }
