package remedies

import (
	"fmt"
	"math"

	"standfast/lem"
	"standfast/optimize"
)

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
				Min: 0.1, Max: 200, Default: optimize.Axis{Name: "top_width", Min: 3, Max: 10, Step: 0.25},
			},
			{
				// 1V:2H to 1V:3H is usual (common practice, no source).
				Name: "batter", Unit: "1V:nH", Meaning: "Batter of the outer face: n in 1 vertical to n horizontal.",
				Min: 0.1, Max: 20, Default: optimize.Axis{Name: "batter", Min: 2, Max: 2},
			},
			{
				// 0.3 m to 0.5 m is usual (common practice, no source).
				Name: "blanket", Unit: "m", Optional: true, Meaning: "Thickness of a drainage blanket on the ground under the berm; none if not given.",
				Min: 0.1, Max: 5,
			},
		},
		Choices: []Choice{
			{Name: "fill", Soil: true, Meaning: "Soil of the fill."},
			{Name: "blanket_fill", Soil: true, Optional: true, Meaning: "Soil of the drainage blanket; it must be free-draining."},
		},
		Place: "toe",
		order: orderFill,
		New:   newBerm,
	}
}

// bermBlanket is the place of the thickness of the blanket under a berm.
const bermBlanket = 3

// newBerm makes the remedy; a blanket must drain freely.
func newBerm(j *Job, r *Request) (Remedy, error) {
	works := &earthworks{noun: "berm", soil: r.soil("fill"), fills: true, shape: bermShape("berm")}
	soil := r.soil("blanket_fill")
	switch {
	case r.has(bermBlanket) != (soil != noSoil):
		return nil, fmt.Errorf("%w: berm: a blanket needs its thickness and its soil: give blanket and blanket_fill", ErrRequest)
	case soil == noSoil:
		return works, nil
	case !j.Section.Soils[soil].FreeDraining:
		return nil, fmt.Errorf("%w: berm: blanket_fill %q is not free-draining: name a free-draining soil", ErrRequest, j.Section.Soils[soil].Name)
	}
	works.under = &blanket{soil: soil, thickness: bermBlanket}
	return works, nil
}

// bermShape is a level top at height x[0] above the toe, of width x[1] from where it meets the face before works to its outer edge,
// with an outer face at x[2] to its first meeting with the ground. Where the face has been cut back, the top runs on inward to it.
func bermShape(noun string) func(*slope, []float64) shape {
	return func(s *slope, x []float64) shape {
		height, width, n := x[0], x[1], x[2]
		limit := "shape of the " + noun
		if height > s.height()+sameLevel {
			return noShape(limit, height-s.height(), "top of %s %s m above the toe lies above the crest, %s m above the toe", noun, metres(height), metres(s.height()))
		}
		crown := s.toe.Y + height
		flat := ray(s.before, lem.Point{X: s.toe.X, Y: crown}, math.Inf(1))
		inner, ok := meet(flat, s.before, s.toe.X, s.crest.X, lower)
		if !ok {
			return noShape(limit, 0, "top of %s %s m above the toe does not meet the face", noun, metres(height))
		}
		heel, ok := meet(flat, s.ground, inner.X, s.ground.Left(), lower)
		if !ok {
			return noShape(limit, 0, "top of %s %s m above the toe does not meet the new face", noun, metres(height))
		}
		edge := lem.Point{X: inner.X + width, Y: crown}
		if under := s.ground.At(edge.X) - crown; under > sameLevel {
			return noShape(limit, under, "outer edge of %s at x = %s m lies below the ground", noun, metres(s.x(edge.X)))
		}
		outer := ray(s.ground, edge, n)
		foot, ok := meet(outer, s.ground, edge.X, s.ground.Right(), lower)
		if !ok || edge.X > s.ground.Right() {
			end := outer[len(outer)-1]
			return noShape("ground within the section", end.Y-levelRight(s.ground, end.X), "outer face of %s at %s meets no ground in the section", noun, batterText(n))
		}
		return shape{
			line: lem.Profile{heel, edge, foot}, fill: true,
			uphill: "back of " + noun, foot: "toe of " + noun,
			dims: []Dimension{
				lengthDim("top width", inner, edge),
				lengthDim("height", lem.Point{X: edge.X, Y: s.toe.Y}, edge),
				batterDim(edge, foot, n),
			},
			faces:  []face{{batter: n}},
			levels: []level{{what: "top of " + noun, width: width, haul: true}},
		}
	}
}
