package survey

import (
	"cmp"
	"slices"

	"standfast/cmd/internal/casefile"
)

// sortStrata puts strata in order from the surface down, by their mean level along the ground.
func sortStrata(s *casefile.Sketch) {
	if len(s.Ground) == 0 {
		return
	}
	const places = 25
	mean := func(l casefile.NamedLine) float64 {
		var sum float64
		for i := range places {
			sum += l.Line.At(s.Ground.Left() + (s.Ground.Right()-s.Ground.Left())*float64(i)/(places-1))
		}
		return sum
	}
	slices.SortStableFunc(s.Strata, func(a, b casefile.NamedLine) int { return cmp.Compare(mean(b), mean(a)) })
}
