package remedies

import (
	"fmt"
	"math"
	"slices"

	"standfast/lem"
	"standfast/optimize"
)

// Places of the parameters of a regrade.
const (
	regradeBatter = iota
	regradePivot
	regradeBenches
	regradeInterval
	regradeFirst
	regradeWidth
	regradeUpper
)

// mostBenches is the greatest number of benches of a regraded face.
const mostBenches = 4

// regradeKind is the flattening of the face: a new face through a pivot on the toe-crest chord, with or without benches.
func regradeKind() Kind {
	return Kind{
		Name:    "regrade",
		Title:   "regrade",
		Summary: "A new face through a pivot on the line from toe to crest, with or without benches, cut above it and filled below it.",
		Parameters: []Parameter{
			{
				// Usual range 1V:2H to 1V:4H (common practice, no source).
				Name: "batter", Unit: "1V:nH", Meaning: "Batter of the new face, or of its part below the lowest bench: n in 1 vertical to n horizontal.",
				Min: 0.1, Max: 20, Default: optimize.Axis{Name: "batter", Min: 2, Max: 4, Step: 0.1},
			},
			{
				Name: "pivot", Unit: "1", Meaning: "Height of the point that the new face passes through, as a share of the height from toe (0) to crest (1), on the straight line between them.",
				Min: 0, Max: 1, Default: optimize.Axis{Name: "pivot"},
			},
			{
				Name: "benches", Unit: "1", Optional: true, Meaning: "Number of level benches, 0 to 4; none if not given.",
				Min: 0, Max: mostBenches,
			},
			{
				// 5 m to 10 m is usual (common practice, no source).
				Name: "bench_interval", Unit: "m", Optional: true, Meaning: "Height from bench to bench, and from the toe to the lowest one; equal parts of the height if not given.",
				Min: 0.1, Max: 50,
			},
			{
				Name: "first_bench", Unit: "m", Optional: true, Meaning: "Height of the lowest bench above the toe; the interval if not given.",
				Min: 0.1, Max: 50,
			},
			{
				// 1.5 m to 5 m is usual, 3 m for access (common practice, no source).
				Name: "bench_width", Unit: "m", Optional: true, Meaning: "Width of each bench, measured inward; needed with benches.",
				Min: 0.1, Max: 50,
			},
			{
				Name: "upper_batter", Unit: "1V:nH", Optional: true, Meaning: "Batter above the lowest bench; that below it if not given.",
				Min: 0.1, Max: 20,
			},
		},
		Choices: []Choice{
			{Name: "fill", Soil: true, Optional: true, Meaning: "Soil of the fill; needed where the new face runs above the ground."},
		},
		Place: "face",
		New:   newRegrade,
	}
}

// newRegrade makes the remedy; without a fill soil a face that runs above the ground is a violation.
func newRegrade(_ *Job, r *Request) (Remedy, error) {
	benches := r.Axes[regradeBenches]
	switch {
	case !r.has(regradeBenches) && (r.has(regradeInterval) || r.has(regradeFirst) || r.has(regradeWidth) || r.has(regradeUpper)):
		return nil, fmt.Errorf("%w: regrade: bench_interval, first_bench, bench_width and upper_batter need benches: give their number", ErrRequest)
	case r.has(regradeBenches) && (benches.Min != math.Trunc(benches.Min) || benches.Step != math.Trunc(benches.Step)):
		return nil, fmt.Errorf("%w: regrade: benches is a whole number: write 1, 2, 3", ErrRequest)
	case r.has(regradeBenches) && benches.Max > 0 && !r.has(regradeWidth):
		return nil, fmt.Errorf("%w: regrade: benches need a width: give bench_width", ErrRequest)
	}
	soil := r.soil("fill")
	return &earthworks{noun: "regraded face", soil: soil, cuts: true, fills: soil != noSoil && r.Axes[regradePivot].Max > 0, shape: regradeShape}, nil
}

// regradeShape is the face at batter x[0] through the point at share x[1] of the height on the toe-crest chord, with its benches, run
// both ways to the ground before works. Between crest and toe the face may cross the ground several times, cutting humps and filling
// hollows; its ends are where it meets the ground for good:
//   - at the top, beyond the crest if the face passes below the crest, else the meeting nearest to the crest;
//   - at the foot, beyond the toe if the face passes above the toe, else the meeting nearest to the toe.
func regradeShape(s *slope, x []float64) shape {
	n := x[regradeBatter]
	pivot := lem.Point{X: s.toe.X + x[regradePivot]*(s.crest.X-s.toe.X), Y: s.toe.Y + x[regradePivot]*s.height()}
	levels, fault := benchLevels(s, x)
	if fault != nil {
		return *fault
	}
	line := benched(s, pivot, levels, x)
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
	sh := shape{cut: true, fill: true, uphill: "top of regraded face", foot: "foot of regraded face"}
	var face path
	face.add(top.X, top.Y)
	for _, p := range line {
		if p.X > top.X && p.X < foot.X {
			face.add(p.X, p.Y)
		}
	}
	face.add(foot.X, foot.Y)
	sh.line = lem.Profile(face)
	sh.describe(sh.line)
	return sh
}

// benchLevels returns the levels of the benches from the lowest up, or the shape that says why there are none. Between two numbers of benches,
// where only the estimate with continuous sizes looks, the nearer one holds.
func benchLevels(s *slope, x []float64) ([]float64, *shape) {
	if math.IsNaN(x[regradeBenches]) || math.Round(x[regradeBenches]) == 0 {
		return nil, nil
	}
	count := int(math.Round(x[regradeBenches]))
	interval := x[regradeInterval]
	if math.IsNaN(interval) {
		interval = s.height() / float64(count+1)
	}
	first := x[regradeFirst]
	if math.IsNaN(first) {
		first = interval
	}
	levels := make([]float64, count)
	for i := range levels {
		levels[i] = s.toe.Y + first + float64(i)*interval
	}
	if over := levels[count-1] - s.crest.Y; over > -sameLevel {
		sh := noShape("levels of the benches", over, "bench %d, %s m above the toe, does not lie below the crest, %s m above the toe",
			count, metres(levels[count-1]-s.toe.Y), metres(s.height()))
		return nil, &sh
	}
	return levels, nil
}

// benched returns the face across the whole ground: the part below the lowest bench passes through the pivot, each part above a bench is set
// back by its width.
func benched(s *slope, pivot lem.Point, levels, x []float64) lem.Profile {
	n, width, upper := x[regradeBatter], x[regradeWidth], x[regradeUpper]
	if len(levels) == 0 {
		return ray(s.before, pivot, n)
	}
	if math.IsNaN(upper) {
		upper = n
	}
	at := lem.Point{X: pivot.X - (levels[0]-pivot.Y)*n, Y: levels[0]} // Outer edge of the lowest bench.
	right := math.Max(s.before.Right(), at.X)
	back := lem.Profile{{X: right, Y: at.Y - (right-at.X)/n}} // From the foot up.
	for i, level := range levels {
		if i > 0 {
			at = lem.Point{X: at.X - (level-levels[i-1])*upper, Y: level}
		}
		back = append(back, at)
		at.X -= width
		back = append(back, at)
	}
	left := math.Min(s.before.Left(), at.X)
	back = append(back, lem.Point{X: left, Y: at.Y + (at.X-left)/upper})
	slices.Reverse(back)
	return back
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
