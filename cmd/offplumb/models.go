package main

import (
	"fmt"
	"slices"
	"strings"

	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// statement is what a model of the program is and how far it holds. The words
// stand here only: the report takes those that its run used, and the README
// all limits and the table of what was checked.
type statement struct {
	topic   string
	how     string   // what is computed
	holds   string   // how far it holds
	against string   // what it was checked against, with the source
	within  string   // the range that it is meant for
	off     string   // its known error
	sources []string // published, "from memory" where one was not seen
	used    func(*job) bool
}

// statements are in the order of the reader's interest.
var statements = []statement{
	{topic: "Rotation", used: always,
		against: "The involute function of gear tables for drops (ISO 21771:2007); a puck on a turntable (Taylor, Classical Mechanics, problems 9.20 and 9.24); bodies falling on the turning Earth (Kibble & Berkshire, eq. 5.23)",
		within:  "floor radii up to 1e9 m; any spin, either way",
		off:     "none of its own in a rigid, heavy habitat; it would be of the order of the mass that moves by that of the habitat",
		how:     "Motion is solved in the inertial frame and carried into the frame of the habitat, where centrifugal, Coriolis and Euler acceleration appear.",
		holds: "Rotation is the only gravity. The spin may change and the axis may cone, as the scenario says: what makes them do so is not computed. " +
			"The habitat is rigid and heavy against what moves in it, and the air turns with it at once."},
	{topic: "Rest while the spin changes", used: (*job).unsteady,
		against: "Flights integrated in both frames by another program (SciPy, DOP853); the torque-free top for coning (textbook)",
		within:  "changes of the spin as given; half angles up to 90 deg",
		off:     "a body starts to slide early where static friction is the higher; not quantified",
		how:     "A resting body is watched until the last change of the spin is over, in a coning for one swing after that, and slides when friction does not hold it any more.",
		holds: "Static friction is taken as sliding friction, though it is often higher. The uniform-gravity path takes the gravity at the time of the release. " +
			"Platforms are spaced for falls from time 0."},
	{topic: "Integration", used: (*job).flew,
		against: "Problems with exact answers (DETEST of Hull & others, 1972, from memory); 500 throws in air solved in quadruple precision",
		within:  "relative tolerance from 1e-13 to 1e-3, by default 1e-9",
		off:     "those throws: less than 5e-8 m, s and m/s at the default",
		how:     "Free flight is integrated by the adaptive Dormand-Prince 5(4) pair, as a departure from uniform motion; without forces it is exact. Contacts are located on its continuous extension.",
		sources: []string{"Dormand & Prince, A family of embedded Runge-Kutta formulae, J. Comp. Appl. Math. 6 (1980) 19-26 (from memory)",
			"Hairer, Norsett & Wanner, Solving Ordinary Differential Equations I, 2nd ed. 1993, section II.6 (from memory)"}},
	{topic: "Numerical error", used: (*job).flew,
		how: "Each release is flown again to its landing at a hundred times the tolerances. A tenth of the difference, what the tolerances allow a step, and roundings bound the error of the landing; " +
			"without forces roundings alone. Sensitivities are central differences.",
		holds: "The numerical error is an estimate, tried on answers that are known, and of landings only: not of resting places, and not of what the models leave out."},
	{topic: "Bodies and air", used: (*job).flew,
		against: "Drag coefficients of spheres (Pruppacher & Klett, table 10.1, at second hand); water drops (Gunn & Kinzer 1949, at second hand); glass globes dropped 220 ft (Newton, Principia, book II); air (US Standard Atmosphere 1976)",
		within:  "Reynolds numbers below 3e5; air at 100 K to 1900 K",
		off:     "about 6 % of the drag of a smooth sphere; more for rough, flat or tumbling things, not quantified",
		how:     "The drag of a sphere, relative to air that turns with the habitat. Density and viscosity are those given, or of dry air at the pressure and temperature.",
		holds: "A body is a sphere without lift and without spin of its own in the air. Drag is that of a smooth sphere (Clift & Gauvin), to about 6 % below a Reynolds number of 3e5, " +
			"or your own drag coefficient. The air turns with the habitat like a solid: drafts and ventilation are not modelled. Water drops above 1.5 mm flatten and fall more slowly."},
	{used: (*job).dragged, sources: []string{
		"Clift & Gauvin 1970, drag of spheres (from memory)",
		"US Standard Atmosphere 1976, eq. 51: Sutherland's law of viscosity (from memory)",
		"ISO 2533:1975, standard atmosphere: gas constant of dry air (from memory)"}},
	{topic: "Contact", used: (*job).touched,
		against: "Rebounds by the rules of ball games (ITF, ITTF, FIFA); energies of test drops (EN 397, ANSI/ISEA Z89.1); a bead on a turning rod with friction (Kleppner & Kolenkow); slides solved by another program (SciPy)",
		within:  "rigid spheres on rigid surfaces; one restitution for all speeds",
		off:     "that of the restitution and friction given; resting places of real things are not predicted, only typical",
		how:     "A body rebounds by its restitution, and Coulomb friction acts along the surface, up to sticking; then it bounces, slides, rolls or rests.",
		holds: "Contact is that of a rigid sphere: normal restitution, Coulomb friction, and for a body that `rolls` the rolling of a solid sphere without rolling resistance. " +
			"A rebound of less than 1 mm ends the bouncing. Real things rattle, roll on their flats and catch on their corners: take resting places as typical, and landings as what happens.",
		sources: []string{"Brach, Mechanical Impact Dynamics, 1991, chapter 5 (from memory)",
			"Lotstedt, Mechanical systems of rigid bodies subject to unilateral constraints, SIAM J. Appl. Math. 42 (1982) (from memory)"}},
	{topic: "Interior", used: always,
		against: "Brute force: every solid and random interiors against sampled distances; no published source",
		within:  "the shapes named above",
		off:     "rounding of 64-bit numbers",
		how:     "Contact is where the distance to the nearest surface equals the body's radius.",
		holds: "Rooms are cylinders with flat ends, tori with a round or a flat floor, spheres and cabins with a flat floor, joined by radial passages of square or round section; " +
			"in them stand decks with openings, boxes, posts and walls. Floors of tubes and spheres take no openings, cabins no further decks: refused, not approximated."},
	{topic: "People", used: (*job).walked,
		against: "A person in a flight rotator (Benson, Guedry, Parker & Reschke, J. Vestib. Res. 7 (1997) 453-457); closed forms for steady walks and climbs (derived)",
		within:  "smooth paths; stature from 0.3 m to 3 m",
		off:     "none for the path as given; shocks of steps and pulls of hands are not in it, not quantified",
		how:     "The loads are what the support must give against the acceleration of the path, in the turning frame, at feet, waist and head.",
		holds:   "A person is a line from feet to head along the radius, on a flat floor along its normal, with smooth changes of speed. Loads are those of the path: the shocks of steps, and the forces of hands and balance, come on top."},
	{topic: "Habitat figures", used: always,
		against: "Spin and radius for a gravity (Taylor, problem 9.2; Serway; OpenStax University Physics; Globus & Hall 2017)",
		within:  "a point in vacuum for the drop; walking in reduced gravity for the walk-run speed",
		off:     "the walk-run speed is an average of people, not quantified",
		how:     "The drop offset of a deck is that of a point in vacuum, by the involute function; people change from walking to running at a Froude number of 0.5.",
		sources: []string{"ISO 21771:2007, the involute function",
			"Kram, Domingo & Ferris, J. Exp. Biol. 200 (1997) 821-826: walk and run in reduced gravity"}},
	{topic: "Scatter", used: (*job).scattering,
		against: "Known distributions drawn at random, in tests; no published source",
		within:  "up to 1e7 samples; independent numbers, or rows of a file",
		off:     "that of sampling, told as 95 % intervals; those of the spreads given are not in it",
		how:     "Probabilities have the 95 % interval of independent samples. The contour is the smallest area that holds 95 % of the landings, by their smoothed density.",
		sources: []string{"Wilson, J. Am. Stat. Assoc. 22 (1927) 209-212: intervals of probabilities (from memory)",
			"Hyndman, The American Statistician 50 (1996): regions of highest density (from memory)"}},
	{used: (*job).halton, sources: []string{"Halton, Numerische Mathematik 2 (1960) (from memory)"}},
}

// modelLimits lists how far the models hold, for the README.
func modelLimits() string {
	var b strings.Builder
	for i := range statements {
		if s := &statements[i]; s.holds != "" {
			b.WriteString(wrapped("- "+s.holds, "  "))
		}
	}
	return b.String()
}

// modelTable tells of each model what it was checked against, its range and its
// known error, for the README.
func modelTable() string {
	var b strings.Builder
	b.WriteString("| model | checked against | range | known error |\n| --- | --- | --- | --- |\n")
	for i := range statements {
		if s := &statements[i]; s.against != "" {
			fmt.Fprintf(&b, "| %s | %s | %s | %s |\n", s.topic, s.against, s.within, s.off)
		}
	}
	return b.String()
}

func always(*job) bool { return true }

// unsteady says whether the habitat's turning changes.
func (j *job) unsteady() bool { return j.model().Unsteady() }

// flew says whether any release was flown.
func (j *job) flew() bool {
	for i := range j.results {
		if j.results[i].Finished() {
			return true
		}
	}
	return j.scattering()
}

// dragged says whether the law of drag was used.
func (j *job) dragged() bool {
	if j.model().Air.Vacuum() {
		return false
	}
	for i := range j.results {
		if b := &j.Lets[i].Body; j.results[i].Finished() && b.Diameter > 0 && b.DragCoefficient == 0 {
			return true
		}
	}
	return false
}

// touched says whether anything was hit.
func (j *job) touched() bool {
	return slices.ContainsFunc(j.rests, func(r measure.Rest) bool { return r.Impacts > 0 || r.Slid > 0 })
}

// walked says whether a crew path was walked.
func (j *job) walked() bool {
	return slices.ContainsFunc(j.paths, func(p pathResult) bool { return !p.skipped })
}

// scattering says whether a scatter ran.
func (j *job) scattering() bool {
	return slices.ContainsFunc(j.scatters, func(s scatterResult) bool { return s.cloud != nil })
}

// halton says whether one used Halton points.
func (j *job) halton() bool {
	return slices.ContainsFunc(j.scatters, func(s scatterResult) bool { return s.cloud != nil && s.of.Sampling == model.Halton })
}
