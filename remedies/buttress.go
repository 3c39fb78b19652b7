package remedies

import (
	"fmt"

	"standfast/optimize"
)

// buttressKind is a buttress of free-draining rockfill at the toe.
func buttressKind() Kind {
	return Kind{
		Name:    "buttress",
		Title:   "rockfill toe buttress",
		Summary: "Free-draining rockfill with a level top placed against the toe of the slope.",
		Parameters: []Parameter{
			{
				// 2 m to 6 m is usual (common practice, no source).
				Name: "height", Unit: "m", Meaning: "Height of the level top above the toe.",
				Min: 0.1, Max: 50, Default: optimize.Axis{Name: "height", Min: 1, Max: 6, Step: 0.1},
			},
			{
				// 2 m to 4 m is usual (common practice, no source).
				Name: "top_width", Unit: "m", Meaning: "Width of the top from where it meets the face of the slope to its outer edge.",
				Min: 0.1, Max: 200, Default: optimize.Axis{Name: "top_width", Min: 2, Max: 6, Step: 0.25},
			},
			{
				// 1V:1.5H to 1V:2H is usual for rockfill (common practice, no source).
				Name: "batter", Unit: "1V:nH", Meaning: "Batter of the outer face: n in 1 vertical to n horizontal.",
				Min: 0.1, Max: 20, Default: optimize.Axis{Name: "batter", Min: 1.5, Max: 1.5},
			},
		},
		Choices: []Choice{{Name: "fill", Soil: true, Meaning: "Soil of the rockfill; it must be free-draining."}},
		Place:   "toe",
		order:   orderFill,
		New:     newButtress,
	}
}

// newButtress makes the remedy; its fill must drain freely, since nothing else carries water away from its back.
func newButtress(j *Job, r *Request) (Remedy, error) {
	soil := r.soil("fill")
	if !j.Section.Soils[soil].FreeDraining {
		return nil, fmt.Errorf("%w: buttress: fill %q is not free-draining; choose a free-draining rockfill, or a berm", ErrRequest, j.Section.Soils[soil].Name)
	}
	return &earthworks{noun: "buttress", soil: soil, shape: bermShape("buttress")}, nil
}
