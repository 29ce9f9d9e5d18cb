// Package plots draws the figures: it turns tables and outlines, in SI units,
// into drawings. It knows no models and no physics.
//
// SideView and InertialView show one release, on board and from outside, BothViews does both
// over one ruler of time; TogetherView shows several on board; DeflectionChart
// the apparent deflection of one or several; DeckPlan one deck unrolled, with landings
// and crew paths; PathView a crew path with the person on it; LoadsChart what it does to
// the person; StackChart any panels above one another; ScatterPlan the landings of many
// samples of one release; MapPlan a figure of each place of a deck, in shades; ThrowView the
// throws that reach a target and ThrowCard a table of where to point. Each takes a spec of plain
// numbers, names and outlines, and refuses what cannot be drawn.
//
// # The language of the figures
//
// A figure is a sheet: a title, one or more views or panels in a hairline frame,
// a strip with the directions and the scale, and a line of notes. Within it
//
//   - structure is drawn in thin outlines, solids in a light tint;
//   - one strong line is what moves, and a phase other than flight is dashed;
//   - a release is an open circle, a landing a full one, a resting place a square;
//   - of many landings each is a small mark, whose shape tells what it is on, and a cross is
//     their median;
//   - shades of one hue, the darker the more, show a figure of each place; their steps are
//     outlined and bear their value, and a bar beside the plan has the others;
//   - a crew path starts at a diamond and ends with an arrowhead. The person is a thin
//     line with a dot for the head, and a thin arrow from the feet is a force, at a scale
//     that is stated as that of lengths is;
//   - what a throw is to reach is a dot in a ring, and a throw that hits something first
//     ends at a cross;
//   - a dimension line with arrows and a value gives what the reader came for;
//   - a chain line is a plumb line, a dashed thin one the uniform-gravity path;
//   - things are named where they stand, not in a legend, and no name lies on another;
//     of many tracks in one view each has a number, by which a list names it;
//   - a dimension line stands below the deck and the solid whose top that is;
//   - where both axes are lengths the scale is one: the sheet is cropped, never
//     stretched. What is too small for that is drawn again as a detail, with its
//     scale stated;
//   - every number carries its unit, or its axis does.
//
// Colours are those of Okabe & Ito, "Color Universal Design" (2002, revised 2008;
// values from memory), which people with the common kinds of colour blindness tell
// apart. They are never the only cue: a number, a mark or a dash goes with each, so
// that a grey print says the same. No colour is a verdict.
//
// An SVG carries second values of its colours for dark screens, by the classes of its
// elements, in rules that hold within a figure alone. Texts are texts.
//
// Sheets are at most 540 pt by 390 pt, or the same upright, so that they print on A5
// at full size with no text below 7.5 pt.
//
// # Conventions
//
// Lengths are in metres, angles in radians, times in seconds. Side views are seen
// from the +axial end: spinward to the right, up toward the axis. Deck plans are seen
// from above, by someone whose feet are on the deck: spinward to the right, +axial
// toward the bottom of the sheet, since facing spinward +axial is on the right hand.
//
// SVG and PNG bytes are the same on each run; a PDF carries its date. PDF text is in code
// page 1252: a character outside of it becomes a near one, or a question mark.
package plots
