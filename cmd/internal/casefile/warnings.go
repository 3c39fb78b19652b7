package casefile

import (
	"math"
	"slices"

	"standfast/lem"
	"standfast/remedies"
)

// warnOfLines notes what is legal in the lines of the section but may not be meant.
func (b *builder) warnOfLines(root value) {
	g := b.job.Section.Ground
	if g == nil || b.before == nil {
		return
	}
	for i, s := range b.job.Section.Strata {
		b.warnOfEnds(b.stratumValues[i], s.Top)
	}
	for _, e := range b.entries(b.get(root, "water")) {
		if i, ok := b.waters.index[e.key.Value]; ok && b.job.Waters[i].Line != nil {
			b.warnOfEnds(e, b.job.Waters[i].Line)
			b.warnOfHighWater(e, i)
		}
	}
	b.warnOfAbsence()
	if !b.job.Stage.Given && !b.finished {
		b.note("no `stages` in the case: construction stages are not checked")
	}
}

// warnOfEnds warns of a line that does not reach the ends of the ground.
func (b *builder) warnOfEnds(v value, line lem.Profile) {
	g := b.job.Section.Ground
	if line.Left() > g.Left() || line.Right() < g.Right() {
		b.warn(v, "runs from x = %s to %s only and is held level beyond, to the ends of the ground at x = %s and %s",
			figure(line.Left()), figure(line.Right()), figure(g.Left()), figure(g.Right()))
	}
}

// standsAbove is the height of a water line above ground that is worth a word, m.
const standsAbove = 0.3

// warnOfHighWater notes a water line that stands above the ground, unless free water goes with it: it loads nothing.
func (b *builder) warnOfHighWater(v value, water int) {
	dry := slices.ContainsFunc(b.job.Situations, func(s remedies.Situation) bool { return s.Water == water && len(s.Free) == 0 })
	if !dry {
		return
	}
	g, line := b.job.Section.Ground, b.job.Waters[water].Line
	at, most := 0.0, standsAbove
	for _, x := range breaks(g, line) {
		if h := line.At(x) - g.At(x); h > most {
			at, most = x, h
		}
	}
	if most > standsAbove {
		b.warn(v, "stands up to %.1f m above the ground (at x = %s): this is pore pressure only; water that stands on the ground is `free_water` of a situation",
			most, figure(at))
	}
}

// breaks returns every x at which one of the lines may bend, within the first, from left to right.
func breaks(lines ...lem.Profile) []float64 {
	var xs []float64
	left, right := lines[0].Left(), lines[0].Right()
	for _, l := range lines {
		for _, a := range l {
			if a.X >= left && a.X <= right {
				xs = append(xs, a.X)
			}
		}
	}
	slices.Sort(xs)
	return slices.Compact(xs)
}

const (
	// noThickness is a stratum's thickness that counts as none, m.
	noThickness = 1e-6
	// shortGap is the length over which a stratum may be absent without a word, m.
	shortGap = 0.01
	// bisections narrow the end of a gap from any section to well below a millimetre.
	bisections = 40
)

// warnOfAbsence notes where strata pinch out, and warns of strata that are nowhere present.
func (b *builder) warnOfAbsence() {
	strata := b.job.Section.Strata
	lines := []lem.Profile{b.before}
	for _, s := range strata {
		lines = append(lines, s.Top)
	}
	xs := withMiddles(breaks(lines...))
	for i := range strata[:max(0, len(strata)-1)] {
		name := b.job.Section.Soils[strata[i].Soil].Name
		gaps := b.gaps(i, xs)
		whole := lem.Range{From: xs[0], To: xs[len(xs)-1]}
		if len(gaps) == 1 && gaps[0] == whole {
			b.warn(b.stratumValues[i], "no `%s` is left anywhere: the strata below it reach above its top, or above the ground, all along", name)
			continue
		}
		for _, g := range gaps {
			if g.To-g.From > shortGap {
				b.note("stratum %d (`%s`) is absent from x = %.2f to %.2f, where a lower stratum reaches above its top or the ground", i+1, name, g.From, g.To)
			}
		}
	}
}

// withMiddles returns the places and those half-way between them.
func withMiddles(xs []float64) []float64 {
	out := xs[:1:1]
	for i := 1; i < len(xs); i++ {
		out = append(out, (xs[i-1]+xs[i])/2, xs[i])
	}
	return out
}

// gaps returns where stratum i is absent, judged at the places xs and narrowed between them.
func (b *builder) gaps(i int, xs []float64) []lem.Range {
	var out []lem.Range
	open := false
	for k, x := range xs {
		absent := b.thickness(i, x) <= noThickness
		switch {
		case absent && !open:
			from := x
			if k > 0 {
				from = b.edge(i, xs[k-1], x)
			}
			out = append(out, lem.Range{From: from, To: x})
		case absent:
			out[len(out)-1].To = x
		case open:
			out[len(out)-1].To = b.edge(i, x, xs[k-1])
		}
		open = absent
	}
	return out
}

// thickness returns the thickness of stratum i at x before works, negative where it is absent by more than nothing, m.
func (b *builder) thickness(i int, x float64) float64 {
	under := math.Inf(-1)
	for _, s := range b.job.Section.Strata[i+1:] {
		under = max(under, s.Top.At(x))
	}
	return min(b.job.Section.Strata[i].Top.At(x), b.before.At(x)) - under
}

// edge returns where stratum i ends between a place with it and a place without.
func (b *builder) edge(i int, with, without float64) float64 {
	for range bisections {
		if middle := (with + without) / 2; b.thickness(i, middle) > noThickness {
			with = middle
		} else {
			without = middle
		}
	}
	return without
}
