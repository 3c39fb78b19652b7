package drawing

import "image/color"

func rgb(hex uint32) color.NRGBA {
	return color.NRGBA{R: uint8(hex >> 16), G: uint8(hex >> 8), B: uint8(hex), A: 0xff}
}

// Colours of lines and texts. Those that stand beside each other differ in lightness as well as hue, so that they can be told
// apart in grey and by the colour-blind.
var (
	paper      = rgb(0xffffff)
	inkBlack   = rgb(0x161616)
	inkGrey    = rgb(0x5c5c5c)
	inkFaint   = rgb(0xb4b4b4)
	cutInk     = rgb(0xb4531a)
	fillInk    = rgb(0x1d5f57)
	waterInk   = rgb(0x1a56a0)
	waterLight = rgb(0x86a9cf)
	waterFill  = rgb(0xd8e8f6)
	slipInk    = rgb(0x9c0f45)
	loadInk    = rgb(0x4a3a78)
	limitInk   = rgb(0x7a5a00)
	goodInk    = rgb(0x1d5f57)
	badInk     = rgb(0x9c0f45)
	labelPaper = color.NRGBA{R: 0xff, G: 0xff, B: 0xff, A: 0xd2}
)

// soilTints are the fills of soils by index, alternately lighter and darker so that neighbours differ in grey.
var soilTints = []color.NRGBA{
	rgb(0xf0e6cf), rgb(0xd9dfcb), rgb(0xefdccf), rgb(0xcfd6da), rgb(0xf5efe0), rgb(0xd8cdbb),
	rgb(0xe6e6da), rgb(0xc9d3c4), rgb(0xf0e0e0), rgb(0xd3cfdc),
}

func soilTint(i int) color.NRGBA { return soilTints[i%len(soilTints)] }

// Pens, in the line weights of a printed section: the ground in force heaviest, then the slip, water, strata, and what annotates.
var (
	groundPen     = pen{inkBlack, 1.7, nil}
	beforePen     = pen{inkGrey, 1.0, []float64{6, 3}}
	stagePen      = pen{inkBlack, 0.8, []float64{1, 2}}
	strataPen     = pen{inkGrey, 0.5, nil}
	bodyPen       = pen{inkBlack, 0.9, nil}
	firmPen       = pen{inkBlack, 0.9, []float64{8, 2, 2, 2}}
	waterPen      = pen{waterInk, 1.1, nil}
	waterOldPen   = pen{waterInk, 1.0, []float64{5, 3}}
	waterOtherPen = pen{waterLight, 0.7, nil}
	waterSoilPen  = pen{waterInk, 1.0, []float64{1.2, 2}}
	headPen       = pen{waterInk, 0.9, []float64{2.5, 1.8}}
	invertPen     = pen{waterInk, 0.9, []float64{7, 2, 1.5, 2}}
	slipPen       = pen{slipInk, 1.5, nil}
	crackPen      = pen{slipInk, 0.8, []float64{1, 2.2}}
	knownPen      = pen{slipInk, 1.0, []float64{5, 2.5}}
	observedPen   = pen{slipInk, 1.0, []float64{2, 1.6}}
	restraintPen  = pen{inkBlack, 2.6, nil}
	pressurePen   = pen{waterInk, 0.7, nil}
	loadPen       = pen{loadInk, 0.7, nil}
	lineLoadPen   = pen{loadInk, 1.3, nil}
	limitPen      = pen{limitInk, 0.8, []float64{9, 2.5, 2, 2.5}}
	zonePen       = pen{limitInk, 0.6, []float64{3, 2}}
	zoneHatchPen  = pen{limitInk, 0.3, nil}
	overheadPen   = pen{limitInk, 1.1, nil}
	rangePen      = pen{inkGrey, 0.8, nil}
	dimPen        = pen{inkBlack, 0.55, nil}
	leaderPen     = pen{inkGrey, 0.45, nil}
	framePen      = pen{inkBlack, 0.7, nil}
	tickPen       = pen{inkBlack, 0.5, nil}
	cutPen        = pen{cutInk, 0.6, nil}
	fillPen       = pen{fillInk, 0.6, nil}
)

// Hatches: cut leans one way, fill the other.
const (
	cutHatchAngle  = quarterTurn / 2
	fillHatchAngle = 3 * quarterTurn / 2
	hatchSpacing   = 4.6 // points
)

// Type sizes.
var (
	titleFace   = face{13, true}
	headFace    = face{9.5, true}
	optionFace  = face{9.5, false}
	bodyFace    = face{7.6, false}
	strongFace  = face{7.6, true}
	smallFace   = face{6.8, false}
	axisFace    = face{7.6, false}
	cautionFace = face{6.6, false}
)
