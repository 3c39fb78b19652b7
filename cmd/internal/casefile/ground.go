package casefile

import (
	"math"

	"standfast/lem"
)

// line returns a line from left to right; it records a fault where it runs back.
func (b *builder) line(v value) (lem.Profile, bool) {
	points, ok := b.points(v)
	if !ok || len(points) < 2 {
		return nil, false
	}
	items := b.items(v)
	for i := 1; i < len(points); i++ {
		if points[i].X < points[i-1].X {
			b.addFault(items[i], "write the points from left to right", "x = %s lies left of the point before, x = %s", figure(points[i].X), figure(points[i-1].X))
			ok = false
		}
	}
	if !ok {
		return nil, false
	}
	if points[0].X == points[len(points)-1].X {
		b.addFault(v, "a line runs from left to right", "all points have the same x")
		return nil, false
	}
	return points, true
}

// readGround fills the ground in force and keeps the ground before works.
func (b *builder) readGround(root value) {
	ground, _ := b.line(b.get(root, "ground"))
	b.job.Section.Ground, b.before = ground, ground
	if before := b.get(root, "ground_before"); before.there() {
		b.finished = true
		b.before, _ = b.line(before)
	}
}

// readStrata fills the strata; the top of the first is the ground before works.
func (b *builder) readStrata(v value) {
	for i, item := range b.items(v) {
		soil, okSoil := b.ref(&b.soils, b.get(item, "soil"))
		top := b.get(item, "top")
		profile, okTop := b.stratumTop(top, i)
		if okSoil && okTop {
			b.job.Section.Strata = append(b.job.Section.Strata, lem.Stratum{Soil: soil, Top: profile})
			b.stratumValues = append(b.stratumValues, top)
		}
	}
}

// stratumTop returns the top of stratum i. Only the first stratum starts at the ground.
func (b *builder) stratumTop(v value, i int) (lem.Profile, bool) {
	word, isWord := b.text(v)
	switch {
	case isWord && i > 0:
		b.addFault(v, "write its top as points, or move it to the first place", "only the first stratum has its top at the ground")
		return nil, false
	case isWord && word == wordGround:
		return b.before, b.before != nil
	case i == 0 && b.usable(v):
		b.addFault(v, "write `top: ground`", "the first stratum starts at the ground")
		return nil, false
	}
	return b.line(v)
}

// readPlaced fills the placed bodies, with their outlines turned clockwise.
func (b *builder) readPlaced(v value) {
	for _, item := range b.items(v) {
		soil, okSoil := b.ref(&b.soils, b.get(item, "soil"))
		outline := b.get(item, "outline")
		points, okPoints := b.points(outline)
		if !okSoil || !okPoints {
			continue
		}
		area := signedArea(points)
		switch {
		case area == 0:
			b.addFault(outline, "write its corners in order", "the outline encloses no area")
			continue
		case crossesItself(points):
			b.addFault(outline, "write its corners in order", "the outline crosses itself")
			continue
		case area > 0:
			points = reversed(points)
		}
		b.job.Section.Placed = append(b.job.Section.Placed, lem.Body{Soil: soil, Outline: points})
	}
}

// signedArea returns the area within an outline, positive if it runs anticlockwise, m2.
func signedArea(p []lem.Point) float64 {
	var twice float64
	for i, a := range p {
		q := p[(i+1)%len(p)]
		twice += (a.X-p[0].X)*(q.Y-p[0].Y) - (q.X-p[0].X)*(a.Y-p[0].Y)
	}
	return twice / 2
}

func reversed(p []lem.Point) []lem.Point {
	q := make([]lem.Point, len(p))
	for i, a := range p {
		q[len(p)-1-i] = a
	}
	return q
}

// crossesItself reports whether two edges of an outline cross between their ends. Edges that only touch do not cross.
func crossesItself(p []lem.Point) bool {
	for i := range p {
		for j := i + 2; j < len(p); j++ {
			if edgesCross(p[i], p[i+1], p[j], p[(j+1)%len(p)]) {
				return true
			}
		}
	}
	return false
}

// edgesCross reports whether a-b and c-d cross between their ends: each has its ends strictly on both sides of the other.
func edgesCross(a, b, c, d lem.Point) bool {
	side := func(p, q, r lem.Point) float64 { return (q.X-p.X)*(r.Y-p.Y) - (q.Y-p.Y)*(r.X-p.X) }
	return side(a, b, c)*side(a, b, d) < 0 && side(c, d, a)*side(c, d, b) < 0
}

// levels returns the lowest and highest level of a profile at x; they differ at a vertical step.
func levels(p lem.Profile, x float64) (lo, hi float64) {
	lo, hi = math.Inf(1), math.Inf(-1)
	for _, a := range p {
		if a.X == x {
			lo, hi = math.Min(lo, a.Y), math.Max(hi, a.Y)
		}
	}
	if lo > hi {
		y := p.At(x)
		return y, y
	}
	return lo, hi
}
