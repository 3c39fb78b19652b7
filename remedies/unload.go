package remedies

import "standfast/optimize"

// unloadKind is the removal of weight at the head of the slope.
func unloadKind() Kind {
	return Kind{
		Name:    "unload",
		Title:   "unload the head",
		Summary: "A level platform cut below crest level from the face inward, with a back batter up to the ground.",
		Parameters: []Parameter{
			{
				// Usual range 1 m to 4 m (common practice, no source).
				Name: "depth", Unit: "m", Meaning: "Depth of the platform below the level of the crest.",
				Min: 0.1, Max: 50, Default: optimize.Axis{Name: "depth", Min: 0.5, Max: 4, Step: 0.25},
			},
			{
				Name: "width", Unit: "m", Meaning: "Width of the platform from where it comes out on the face, measured inward.",
				Min: 0, Max: 200, Default: optimize.Axis{Name: "width", Min: 1, Max: 15, Step: 0.25},
			},
			{
				// 1V:2H is usual (common practice, no source).
				Name: "back_batter", Unit: "1V:nH", Meaning: "Batter behind the platform: n in 1 vertical to n horizontal.",
				Min: 0.1, Max: 20, Default: optimize.Axis{Name: "back_batter", Min: 2, Max: 2},
			},
		},
		New: newUnload,
	}
}
