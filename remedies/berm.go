package remedies

import "standfast/optimize"

// bermKind is a berm of fill at the toe.
func bermKind() Kind {
	return Kind{
		Name:    "berm",
		Title:   "toe berm",
		Summary: "Fill with a level top placed against the toe of the slope.",
		Parameters: []Parameter{
			{
				// A quarter to a half of the slope's height is usual (common practice, no source).
				Name: "height", Unit: "m", Meaning: "Height of the level top above the toe.",
				Min: 0.1, Max: 50, Default: optimize.Axis{Name: "height", Min: 0.5, Max: 4, Step: 0.1},
			},
			{
				// At least 3 m for an excavator (common practice, no source).
				Name: "top_width", Unit: "m", Meaning: "Width of the top from where it meets the face of the slope to its outer edge.",
				Min: 0, Max: 200, Default: optimize.Axis{Name: "top_width", Min: 3, Max: 10, Step: 0.25},
			},
			{
				// 1V:2H to 1V:3H is usual (common practice, no source).
				Name: "batter", Unit: "1V:nH", Meaning: "Batter of the outer face: n in 1 vertical to n horizontal.",
				Min: 0.1, Max: 20, Default: optimize.Axis{Name: "batter", Min: 2, Max: 2},
			},
		},
		Choices: []Choice{{Name: "fill", Soil: true, Meaning: "Soil of the fill."}},
		New:     newBerm,
	}
}
