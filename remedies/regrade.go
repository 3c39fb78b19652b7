package remedies

import "standfast/optimize"

// regradeKind is the flattening of the face: a new uniform face through a pivot on the toe-crest chord.
func regradeKind() Kind {
	return Kind{
		Name:    "regrade",
		Title:   "regrade",
		Summary: "A new uniform face through a pivot on the line from toe to crest, cut above it and filled below it.",
		Parameters: []Parameter{
			{
				// Usual range 1V:2H to 1V:4H (common practice, no source).
				Name: "batter", Unit: "1V:nH", Meaning: "Batter of the new face: n in 1 vertical to n horizontal.",
				Min: 0.1, Max: 20, Default: optimize.Axis{Name: "batter", Min: 2, Max: 4, Step: 0.1},
			},
			{
				Name: "pivot", Unit: "1", Meaning: "Height of the point that the new face passes through, as a share of the height from toe (0) to crest (1), on the straight line between them.",
				Min: 0, Max: 1, Default: optimize.Axis{Name: "pivot"},
			},
		},
		Choices: []Choice{
			{Name: "fill", Soil: true, Optional: true, Meaning: "Soil of the fill; needed where the new face runs above the ground."},
		},
		New: newRegrade,
	}
}
