package remedies

import (
	"math"

	"standfast/lem"
)

// slope is the slope as the geometry of works sees it: descending to the right, whatever the facing of the job. Mirroring happens
// here and nowhere else.
type slope struct {
	mirrored   bool
	before     lem.Profile // Ground before works.
	ground     lem.Profile // Ground in force.
	crest, toe lem.Point   // On the ground before works.
}

// slopeOf returns the slope of a job with the ground in force of a proposal.
func slopeOf(j *Job, on *Proposal) *slope {
	s := &slope{mirrored: j.Facing() < 0, before: j.Section.Ground, ground: on.Section.Ground, crest: j.Crest, toe: j.Toe}
	if s.mirrored {
		s.before, s.ground = s.before.Mirror(), s.ground.Mirror()
		s.crest.X, s.toe.X = -s.crest.X, -s.toe.X
	}
	s.crest = onGround(s.before, s.crest)
	s.toe = onGround(s.before, s.toe)
	return s
}

// onGround moves a point vertically onto the ground; at a vertical step any level of the step is on it.
func onGround(ground lem.Profile, p lem.Point) lem.Point {
	a, b := levelLeft(ground, p.X), levelRight(ground, p.X)
	p.Y = min(max(p.Y, min(a, b)), max(a, b))
	return p
}

// height returns the height of the slope, m.
func (s *slope) height() float64 { return s.crest.Y - s.toe.Y }

// x returns the position in the section's own coordinates of a position on the slope, or the reverse.
func (s *slope) x(x float64) float64 {
	if s.mirrored {
		return -x
	}
	return x
}

// own returns a point in the section's own coordinates.
func (s *slope) own(p lem.Point) lem.Point { return lem.Point{X: s.x(p.X), Y: p.Y} }

// ray returns the line through p that falls 1 in n to the right, across the whole of a ground; n is infinite for a level line.
func ray(ground lem.Profile, p lem.Point, n float64) lem.Profile {
	left, right := math.Min(ground.Left(), p.X), math.Max(ground.Right(), p.X)
	return lem.Profile{{X: left, Y: p.Y + (p.X-left)/n}, p, {X: right, Y: p.Y - (right-p.X)/n}}
}

// meet goes along a line from x = from to x = to, in either direction, and returns the first point at which it is on the ground or
// has come to the wanted side of it; a vertical step of the ground at the far end counts. It reports false if there is none.
func meet(line, ground lem.Profile, from, to float64, want side) (lem.Point, bool) {
	there := func(y, g float64) bool { return (y-g)*float64(want) >= -sameLevel }
	if from < to {
		for _, p := range pieces(line, ground, from, to) {
			switch {
			case there(p.a0, p.b0):
				return lem.Point{X: p.x0, Y: p.a0}, true
			case there(p.a1, p.b1):
				return lem.Point{X: p.x1, Y: p.a1}, true
			}
		}
	}
	if to < from {
		ps := pieces(line, ground, to, from)
		for i := len(ps) - 1; i >= 0; i-- {
			p := ps[i]
			switch {
			case there(p.a1, p.b1):
				return lem.Point{X: p.x1, Y: p.a1}, true
			case there(p.a0, p.b0):
				return lem.Point{X: p.x0, Y: p.a0}, true
			}
		}
	}
	end := lem.Point{X: to, Y: line.At(to)}
	return end, there(end.Y, levelLeft(ground, to)) || there(end.Y, levelRight(ground, to))
}
