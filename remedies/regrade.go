package remedies

import (
	"standfast/lem"
	"standfast/optimize"
)

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

// newRegrade makes the remedy; without a fill soil a face that runs above the ground is a violation.
func newRegrade(_ *Job, r *Request) (Remedy, error) {
	return &earthworks{noun: "regraded face", soil: r.soil("fill"), shape: regradeShape}, nil
}

// regradeShape is the face at batter x[0] through the point at share x[1] of the height on the toe-crest chord, run both ways to the
// ground before works. Between crest and toe the face may cross the ground several times, cutting humps and filling hollows; its
// ends are where it meets the ground for good:
//   - at the top, beyond the crest if the face passes below the crest, else the meeting nearest to the crest;
//   - at the foot, beyond the toe if the face passes above the toe, else the meeting nearest to the toe.
func regradeShape(s *slope, x []float64) shape {
	n := x[0]
	pivot := lem.Point{X: s.toe.X + x[1]*(s.crest.X-s.toe.X), Y: s.toe.Y + x[1]*s.height()}
	line := ray(s.before, pivot, n)
	top, okTop := regradeTop(s, line, pivot.X)
	foot, okFoot := regradeFoot(s, line, pivot.X)
	const limit = "ground within the section"
	switch {
	case !okTop:
		return noShape(limit, s.before[0].Y-line[0].Y, "a face at %s through the pivot meets no ground at its top", batterText(n))
	case !okFoot:
		end := len(line) - 1
		return noShape(limit, line[end].Y-levelRight(s.before, line[end].X), "a face at %s through the pivot meets no ground at its foot", batterText(n))
	case foot.X-top.X <= sameLevel:
		return noShape(limit, 0, "a face at %s through the pivot is steeper than the slope and lies nowhere on it", batterText(n))
	}
	return shape{
		line: lem.Profile{top, foot}, cut: true, fill: true,
		uphill: "top of regraded face", foot: "foot of regraded face",
		dims: []Dimension{batterDim(top, foot, n)},
	}
}

// regradeTop returns the upper end of a face through the pivot.
func regradeTop(s *slope, line lem.Profile, pivotX float64) (lem.Point, bool) {
	if line.At(s.crest.X) < s.crest.Y-sameLevel {
		return meet(line, s.before, s.crest.X, s.before.Left(), upper)
	}
	if line.At(s.crest.X) <= s.crest.Y+sameLevel {
		return s.crest, true
	}
	return meet(line, s.before, s.crest.X, pivotX, lower)
}

// regradeFoot returns the lower end of a face through the pivot.
func regradeFoot(s *slope, line lem.Profile, pivotX float64) (lem.Point, bool) {
	if line.At(s.toe.X) > s.toe.Y+sameLevel {
		return meet(line, s.before, s.toe.X, s.before.Right(), lower)
	}
	if line.At(s.toe.X) >= s.toe.Y-sameLevel {
		return s.toe, true
	}
	return meet(line, s.before, s.toe.X, pivotX, upper)
}
