// Package odetest holds initial-value problems with exact answers, to try
// integrators on. It is imported by tests only, and imports none itself.
//
// Most are of the set DETEST of Hull, Enright, Fellen & Sedgwick, Comparing
// numerical methods for ordinary differential equations, SIAM J. Numer. Anal.
// 9 (1972) 603-637 (from memory), whose names they bear: single equations (A),
// small systems (B), moderate systems (C), orbits (D) and equations of higher
// order (E), of which those are taken that have a closed form. They run over
// [0, 20]. A test shows that each exact solution starts where its problem does
// and satisfies its equations.
//
//	problem.go   the type, and the list
//	single.go    A
//	small.go     B and the oscillator
//	chain.go     C
//	orbit.go     D and the closing orbit of Arenstorf
//	higher.go    E
//	elliptic.go  the elliptic functions that B5 needs
//
// All quantities are dimensionless.
package odetest
