package remedies

import "standfast/optimize"

// waterLoweringKind is a plain lowering of the water lines, by whatever means: a what-if, not works.
func waterLoweringKind() Kind {
	return Kind{
		Name:    "water_lowering",
		Title:   "lower water (what-if)",
		Summary: "Every water line lowered by a depth, whatever the means; artesian lines stay.",
		Parameters: []Parameter{
			{
				Name: "lowering", Unit: "m", Meaning: "Depth by which the water lines are lowered.",
				Min: 0, Max: 100, Default: optimize.Axis{Name: "lowering", Min: 0.5, Max: 5, Step: 0.25},
			},
		},
		WhatIf: true,
		New:    newWaterLowering,
	}
}
