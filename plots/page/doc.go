// Package page writes the report: one HTML file that opens from disk, reads
// without scripts, on a phone and in print, and asks the network for nothing.
// It knows no models: it is given words, rows and finished figures.
//
// # Laws
//
//   - Every text that it is given is escaped; control characters are dropped.
//   - The same [Report] gives the same bytes: no clock, no random number. A
//     Content-Security-Policy names each style and script by its SHA-256, and
//     lets nothing else run.
//   - The page is well-formed XML too, so that other tools can read it.
//   - A verdict is a word, never a colour.
//   - Scripts only add: without them every word and number is there.
//
// # Language
//
// The page speaks as the figures do: a title block, numbered sections, figures
// and tables, hairline frames, one family of type.
package page
