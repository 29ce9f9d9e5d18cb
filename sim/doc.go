// Package sim is the house of the simulation; it holds no code of its own.
//
// Imports point down this list only, and a test holds every allowed import as
// data:
//
//	cmd/offplumb     the command line: flags -> load -> run -> write
//	scenarios        the only package that knows TOML
//	  published      published figures, and the scenarios that they are held against
//	plots/page       the report: words, rows and figures -> one HTML file; knows no models
//	plots            tables and outlines -> figures; knows no models
//	plots/motion     tracks and outlines -> the moving picture, in a page and alone
//	sim/study        many runs, the worker pool
//	sim/measure      pure functions of tracks: landings, deflection, samples, limits
//	sim/flight       releases: flight, impact, slide, roll, rest
//	sim/crew         crew paths: kinematics and loads
//	sim/model        the validated scenario, SI units, immutable
//	sim/air          density, viscosity, drag law
//	sim/frame        spin, inertial frame <-> habitat frame, stations
//	sim/geom         the interior as a distance field; named surfaces
//	sim/table        columns with units; the one CSV writer and number formatter
//	integrator       Dormand-Prince 5(4) with dense output and events; knows no physics
//
// Data flows one way:
//
//	scenario file -> model -> tracks -> measures -> tables -> CSV, figures, report
package sim
