package remedies

import "standfast/optimize"

// trenchDrainsKind is a set of stone-filled trenches that run down the slope.
func trenchDrainsKind() Kind {
	return Kind{
		Name:    "trench_drains",
		Title:   "trench drains",
		Summary: "Stone-filled trenches down the slope that lower the pore pressure between them; the stone adds no strength.",
		Parameters: []Parameter{
			{
				// 1.5 m to 4 m is usual (common practice, no source).
				Name: "depth", Unit: "m", Meaning: "Depth of the trench below the ground before works; the dig stops at the low-permeability soil, if one is named.",
				Min: 0.1, Max: 20, Default: optimize.Axis{Name: "depth", Min: 1.5, Max: 4, Step: 0.25},
			},
			{
				// 3 m to 15 m is usual (common practice, no source).
				Name: "spacing", Unit: "m", Meaning: "Spacing of the trenches along the slope, centre to centre.",
				Min: 0.5, Max: 200, Default: optimize.Axis{Name: "spacing", Min: 3, Max: 15, Step: 0.5},
			},
			{
				// 0.45 m to 0.8 m is usual (common practice, no source).
				Name: "width", Unit: "m", Meaning: "Width of a trench.",
				Min: 0.1, Max: 10, Default: optimize.Axis{Name: "width", Min: 0.6, Max: 0.6},
			},
			{
				Name: "effectiveness", Unit: "1", Optional: true,
				Meaning: "Share by which the head above the invert falls, at the invert and as a mean between drains; without it the drains must reach low_permeability and the share follows from their spacing.",
				Min:     0, Max: 1,
			},
			{
				Name: "from", Unit: "m", Optional: true, Meaning: "x of one end of the trenches; the toe if not given.",
				Min: -1e6, Max: 1e6,
			},
			{
				Name: "to", Unit: "m", Optional: true, Meaning: "x of the other end of the trenches; the crest if not given.",
				Min: -1e6, Max: 1e6,
			},
		},
		Choices: []Choice{
			{Name: "low_permeability", Soil: true, Optional: true, Meaning: "Soil of low permeability that the trenches reach down to; their invert is taken at its top."},
		},
		New: newTrenchDrains,
	}
}
