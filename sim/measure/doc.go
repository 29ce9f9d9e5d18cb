// Package measure turns tracks and crew paths into what people ask about:
// landings, deck offset and apparent deflection, samples of tracks, loads
// along crew paths, figures of the decks, and the verdicts on limits. All of
// it is pure: the same track gives the same numbers.
//
// Every table that the program writes has its columns here, each with its
// meaning and unit, in one place.
package measure
