package plots

import (
	"image/color"

	"gonum.org/v1/plot/vg"
)

// ink is a named colour, so that an SVG can carry a second value of it for dark pages.
type ink int

const (
	inkPaper ink = iota
	inkText
	inkSoft  // secondary text, thin helping lines
	inkLine  // structure
	inkRule  // frames and grids
	inkSolid // tint of hull and decks
	inkTint  // tint of fixtures
	inkBlue
	inkVermillion
	inkGreen
	inkPurple
	inkOrange
	inkSky
	inkHeat1 // of maps, from little to much: one hue, each darker than the one before
	inkHeat2
	inkHeat3
	inkHeat4
	inkHeat5
	inkHeat6
	inkCount
)

// inkSpec gives a colour on white paper, which is also the printed one, and on a dark page.
type inkSpec struct {
	name        string
	light, dark color.RGBA
}

// inks: the six series colours are those of Okabe & Ito (2008, from memory), less
// black, which is the text's, and yellow, which is lost on white. Their dark-page
// values are the same hues, lightened. All light values differ, because the SVG
// post-processing knows a colour by its value.
var inks = [inkCount]inkSpec{
	inkPaper:      {"paper", rgb(0xFFFFFF), rgb(0x14171A)},
	inkText:       {"text", rgb(0x1A1A1A), rgb(0xE8E8E8)},
	inkSoft:       {"soft", rgb(0x565656), rgb(0xB0B0B0)},
	inkLine:       {"line", rgb(0x4A4A4A), rgb(0xBEBEBE)},
	inkRule:       {"rule", rgb(0xCFCFCF), rgb(0x3D4248)},
	inkSolid:      {"solid", rgb(0xE4E4E4), rgb(0x2C3136)},
	inkTint:       {"tint", rgb(0xF1F1F1), rgb(0x22262A)},
	inkBlue:       {"blue", rgb(0x0072B2), rgb(0x4FA8E2)},
	inkVermillion: {"vermillion", rgb(0xD55E00), rgb(0xF58A45)},
	inkGreen:      {"green", rgb(0x009E73), rgb(0x33C79C)},
	inkPurple:     {"purple", rgb(0xCC79A7), rgb(0xE3A3C8)},
	inkOrange:     {"orange", rgb(0xE69F00), rgb(0xF4BC45)},
	inkSky:        {"sky", rgb(0x56B4E9), rgb(0x93D2F7)},
	inkHeat1:      {"heat1", rgb(0xD9E8F5), rgb(0x22384A)},
	inkHeat2:      {"heat2", rgb(0xB0CEE8), rgb(0x2C5270)},
	inkHeat3:      {"heat3", rgb(0x7FAFD8), rgb(0x3A7199)},
	inkHeat4:      {"heat4", rgb(0x4C8CC0), rgb(0x5595C2)},
	inkHeat5:      {"heat5", rgb(0x23679E), rgb(0x86BCE2)},
	inkHeat6:      {"heat6", rgb(0x0B4374), rgb(0xBEDDF3)},
}

func rgb(v uint32) color.RGBA {
	return color.RGBA{R: uint8(v >> 16), G: uint8(v >> 8), B: uint8(v), A: 0xFF}
}

// seriesInks is the order in which series take colours: the darkest first, for grey prints.
var seriesInks = []ink{inkBlue, inkVermillion, inkGreen, inkPurple, inkOrange, inkSky}

// seriesDashes goes with seriesInks as the second cue; solid first.
var seriesDashes = [][]vg.Length{
	nil, {7, 2.5}, {2, 1.8}, {9, 2.2, 2, 2.2}, {14, 3}, {5, 1.6, 1, 1.6, 1, 1.6},
}

// pen is a way to draw a line: colour, width in pt, dashes in pt.
type pen struct {
	ink    ink
	width  vg.Length
	dashes []vg.Length
}

var (
	penHull    = pen{ink: inkLine, width: 1.1}
	penDeck    = pen{ink: inkLine, width: 0.9}
	penFixture = pen{ink: inkLine, width: 0.7}
	penGhost   = pen{ink: inkSoft, width: 0.6, dashes: []vg.Length{3, 2}}
	penHatch   = pen{ink: inkSoft, width: 0.45}
	penPlumb   = pen{ink: inkText, width: 0.6, dashes: []vg.Length{9, 2, 1.5, 2}}
	penUniform = pen{ink: inkText, width: 0.8, dashes: []vg.Length{3.5, 2.2}}
	penDim     = pen{ink: inkText, width: 0.55}
	penExt     = pen{ink: inkSoft, width: 0.4}
	penFrame   = pen{ink: inkRule, width: 0.7}
	penGrid    = pen{ink: inkRule, width: 0.4}
	penAxis    = pen{ink: inkLine, width: 0.6}
	penLeader  = pen{ink: inkSoft, width: 0.4}
	penBody    = pen{ink: inkText, width: 0.7}
	penTick    = pen{ink: inkText, width: 0.7}
)

// trackPen draws the track of release i in a phase.
func trackPen(i int, ph Phase) pen {
	return pen{ink: seriesInk(i), width: 1.9, dashes: phaseDashes[ph]}
}

// phaseDashes: flight is solid, so that the strong line reads as the free motion.
var phaseDashes = [phaseCount][]vg.Length{
	Slide: {4.5, 1.8}, Roll: {1.6, 1.6}, Rest: {1.6, 1.6},
}

func seriesInk(i int) ink { return seriesInks[i%len(seriesInks)] }

// seriesPen draws line i of a chart. Colour and dash run at different lengths of
// cycle once the colours are used up, so that the first 36 lines all differ.
func seriesPen(i int) pen {
	lap := i / len(seriesInks)
	return pen{ink: seriesInk(i), width: 1.5, dashes: seriesDashes[(i+lap)%len(seriesDashes)]}
}

// Sizes of text and sheet, pt.
const (
	sizeTitle = 11.0
	sizeLabel = 8.5
	sizeTick  = 8.0
	sizeNote  = 7.5

	sheetLong  = 540.0 // 190 mm: A5 upright or across, less a margin of 10 mm
	sheetShort = 390.0 // 137.5 mm
	margin     = 10.0
)
