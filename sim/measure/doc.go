// Package measure turns tracks and crew paths into what people ask about:
// landings, deck offset and apparent deflection, samples of tracks, loads
// along crew paths, figures of the decks, and the verdicts on limits. All of
// it is pure: the same track gives the same numbers.
//
// Every table that the program writes has its columns here, each with its
// meaning and unit, in one place (COLUMNS.md is made from them): CSV files,
// data package, limits, sweeps and report follow from a column's entry.
//
// The main types are rows of tables: [Landing], the first touch; [Rest], the
// end; [Sample], an instant of a track; [Event], an impact; [Load], an instant
// of a crew path; [DeckFigure] and [HabitatFigure]; [Clearance]. Of many flights
// there are [Scattered], what a scatter comes to, and [LandMap], what a landing
// map does. A [Criterion] is a limit matched with what it judges; it is held
// against [Evidence] and gives a [Verdict].
//
// # Laws
//
//   - The apparent deflection of a drop is its deck offset; of any release it
//     is the offset less that of the uniform-gravity path.
//   - Spinward is a direction drawn on the habitat: at negative spin no sign
//     of a place changes its meaning.
//   - A limit is judged at the worst row of its worst target, and what has no
//     value is not held.
package measure
