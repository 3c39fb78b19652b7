package casefile

import (
	"fmt"
	"math"

	"standfast/lem"
)

// onGround is how far the crest and toe may lie off the ground line, m: what a reader of a drawing cannot tell apart.
const onGround = 0.05

// readSlope fills crest and toe: as given, or as deduced from the ground.
func (b *builder) readSlope(root value) {
	v := b.get(root, "slope")
	switch {
	case b.before == nil:
		return
	case !v.there():
		b.deduceSlope(b.get(root, "ground"))
		return
	}
	at := b.get(v, "crest")
	crest, okCrest := b.slopePoint(at)
	toe, okToe := b.slopePoint(b.get(v, "toe"))
	b.job.Crest, b.job.Toe = crest, toe
	switch {
	case !okCrest || !okToe:
	case crest.Y <= toe.Y:
		b.addFault(at, "swap crest and toe", "the crest is not above the toe")
	case crest.X == toe.X:
		b.addFault(at, "set crest and toe of a vertical face 0.01 m apart", "crest and toe have the same x, so that the slope faces neither way")
	}
}

// slopePoint returns a point that must lie on the ground before works.
func (b *builder) slopePoint(v value) (lem.Point, bool) {
	p, ok := b.point(v)
	if !ok {
		return p, false
	}
	if p.X < b.before.Left() || p.X > b.before.Right() {
		b.addFault(v, "", "lies beyond the ground, which runs from x = %s to %s", figure(b.before.Left()), figure(b.before.Right()))
		return p, false
	}
	if lo, hi := levels(b.before, p.X); p.Y < lo-onGround || p.Y > hi+onGround {
		b.addFault(v, fmt.Sprintf("write [%s, %.2f]", figure(p.X), hi), "is not on the ground, which is at y = %.2f there", hi)
		return p, false
	}
	return p, true
}

// face is a stretch of ground that falls one way.
type face struct{ crest, toe lem.Point }

func (f face) height() float64 { return f.crest.Y - f.toe.Y }

func (f face) String() string {
	return fmt.Sprintf("from (%.2f, %.2f) to (%.2f, %.2f)", f.crest.X, f.crest.Y, f.toe.X, f.toe.Y)
}

const (
	// sustainedShare of the relief is the height over which the ground must fall to count as sustained.
	sustainedShare = 0.25
	// faceShare of the steepest sustained gradient is where a face ends.
	faceShare = 0.5
	// leastGradient is flatter than any face worth remedial works: 1V:10H.
	leastGradient = 0.1
	// widestBench is the width of flatter ground that does not end a face, m; benches are at most 5 m wide (common practice, no source).
	widestBench = 6
	// rivalShare of the highest face's height makes another face its rival, and the deduction ambiguous.
	rivalShare = 0.6
)

// deduceSlope takes the steepest sustained face of the ground for the slope, or refuses when two could be meant.
func (b *builder) deduceSlope(at value) {
	var best, rival face
	for _, f := range faces(b.before, b.job.Direction) {
		switch {
		case f.height() > best.height():
			best, rival = f, best
		case f.height() > rival.height():
			rival = f
		}
	}
	switch {
	case best.height() == 0:
		b.addFault(at, "write `slope: {crest: [x, y], toe: [x, y]}`", "the key `slope` is missing, and the ground has no face steeper than 1V:10H to take for it")
	case best.crest.X == best.toe.X:
		b.addFault(at, "write `slope: {crest: [x, y], toe: [x, y]}` with two points of different x", "the key `slope` is missing, and the steepest face, at x = %s, is vertical", figure(best.toe.X))
	case rival.height() >= rivalShare*best.height():
		b.addFault(at, fmt.Sprintf("write `slope: {crest: [%s, %s], toe: [%s, %s]}`, or the other", figure(best.crest.X), figure(best.crest.Y), figure(best.toe.X), figure(best.toe.Y)),
			"the key `slope` is missing, and two faces could be meant: %s, and %s", best, rival)
	default:
		b.job.Crest, b.job.Toe = best.crest, best.toe
		b.note("slope deduced from the ground: crest at (%.2f, %.2f), toe at (%.2f, %.2f)", best.crest.X, best.crest.Y, best.toe.X, best.toe.Y)
	}
}

// faces returns the faces of the ground that a movement in the direction can go down, from left to right.
func faces(p lem.Profile, direction lem.Direction) []face {
	limit := faceShare * sustainedGradient(p)
	if limit < leastGradient*faceShare {
		return nil
	}
	var all []face
	down := 0  // 1: the open face falls to the right, -1: to the left.
	end := 0.0 // x where the open face ends so far.
	for i := 1; i < len(p); i++ {
		a, c := p[i-1], p[i]
		way := fall(a, c, limit)
		if way == 0 {
			continue
		}
		if way != down || a.X-end > widestBench {
			all = append(all, face{a, a})
		}
		f := &all[len(all)-1]
		if way > 0 {
			f.toe = c
		} else {
			f.crest = c
		}
		down, end = way, c.X
	}
	kept := all[:0]
	for _, f := range all {
		right := f.toe.X >= f.crest.X
		if direction == lem.EitherWay || right == (direction == lem.RightwardOnly) {
			kept = append(kept, f)
		}
	}
	return kept
}

// fall returns 1 if the ground falls to the right from a to c at the gradient or steeper, -1 if it falls to the left so, 0 if neither.
func fall(a, c lem.Point, gradient float64) int {
	switch dx, dy := c.X-a.X, c.Y-a.Y; {
	case dy == 0 || math.Abs(dy) < gradient*dx:
		return 0
	case dy < 0:
		return 1
	}
	return -1
}

// steepest bounds a gradient, so that a vertical step has one.
const steepest = 100

// sustainedGradient returns the greatest gradient between two points of the ground that lie sustainedShare of the relief apart in
// level; 0 for level ground.
func sustainedGradient(p lem.Profile) float64 {
	lo, hi := math.Inf(1), math.Inf(-1)
	for _, a := range p {
		lo, hi = math.Min(lo, a.Y), math.Max(hi, a.Y)
	}
	best := 0.0
	for i, a := range p {
		for _, c := range p[i+1:] {
			if dy := math.Abs(c.Y - a.Y); dy > 0 && dy >= sustainedShare*(hi-lo) {
				best = math.Max(best, math.Min(steepest, dy/math.Max(c.X-a.X, dy/steepest)))
			}
		}
	}
	return best
}
