package lem

import (
	"cmp"
	"context"
	"math"
	"slices"
)

// Minima often lie where a bound holds the arc: the depth of interest, a boundary to stronger soil that it just touches, or both. F rises like a
// cliff beyond the bound, and a simplex that may cross it shrinks on the spot. So arcs found near bounds are improved once more along them, in the
// parameters that the bound leaves.
const (
	pinsUpTo     = 1.15 // Basins up to this multiple of the lowest F are improved along bounds.
	restsOnDepth = 1e-2 // An arc within this share of the depth of interest rests on it.
	nearBed      = 0.05 // An arc within this share of its depth from a boundary may be held by it,
	bedsNearby   = 2    // of so many boundaries at most.
	pinWalk      = 0.02 // Steps in which an end is moved, as a share of the length, until the arc touches the boundary,
	pinSteps     = 6    // and how many of them either way.
	pinRounds    = 3    // Rounds of the descent along a bound.
	touchShare   = 0.02 // An arc touches a boundary if it clears it by less than this share of the hair beside it.
)

// pin is a bound that holds arcs: free parameters, and how the others follow from them.
type pin struct {
	free   []int
	follow func(p *vector) bool
}

// allFree is the pin of arcs that nothing holds.
var allFree = pin{free: []int{0, 1, 2}, follow: func(*vector) bool { return true }}

// improvePinned improves the basins near the lowest along the bounds that hold them.
func (s *searcher) improvePinned(ctx context.Context) {
	if len(s.found) == 0 {
		return
	}
	limit := max(pinsUpTo*s.found[0].r.F, s.o.Below*polishUpTo)
	for i := range s.found {
		if s.found[i].r.F > limit || ctx.Err() != nil {
			break
		}
		s.found[i] = s.descendPinned(s.found[i])
	}
	s.found = s.distinct(s.found)
}

// descendPinned follows F downhill along every bound that holds a candidate.
func (s *searcher) descendPinned(c candidate) candidate {
	if math.IsInf(c.r.F, 1) {
		return c
	}
	for _, pin := range s.pins(&c) {
		scale := s.scale(c)
		start := s.tryPinned(c.p, &pin)
		for range pinRounds {
			before := start.r.F
			for i := range scale {
				scale[i] *= 0.4
			}
			if start = s.simplex(start, scale, &pin); !(before-start.r.F > descentGain*before) {
				break
			}
		}
		if start.r.F < c.r.F {
			c = start
		}
	}
	return c
}

// tryPinned evaluates the arc of a vector that a pin holds.
func (s *searcher) tryPinned(p vector, pin *pin) candidate {
	if !pin.follow(&p) {
		c := candidate{p: p, setting: s.setting}
		c.r.F = math.Inf(1)
		return c
	}
	return s.try(p)
}

// pins lists the bounds that may hold a candidate.
func (s *searcher) pins(c *candidate) []pin {
	rests := s.o.MinDepth > 0 && c.r.Depth <= s.o.MinDepth*(1+restsOnDepth)
	if s.o.Sampler == ByCentre {
		if !rests {
			return nil
		}
		return []pin{{[]int{0, 1}, func(p *vector) bool {
			p[2] -= s.o.MinDepth / 2 // Too shallow, so that it is brought down to the bound.
			return true
		}}}
	}
	var out []pin
	if rests {
		out = append(out, pin{[]int{0, 1}, func(p *vector) bool {
			p[2] = flattest
			return true
		}})
	}
	for _, bed := range s.bedsNear(c) {
		if !rests {
			out = append(out, pin{[]int{0, 1}, func(p *vector) (ok bool) {
				p[2], ok = s.m.tangentAngle(&bed, min(p[0], p[1]), max(p[0], p[1]))
				return ok
			}})
			continue
		}
		x0, x1 := min(c.p[0], c.p[1]), max(c.p[0], c.p[1])
		moved := 0
		if (max(bed.from(), x0)+min(bed.to(), x1))/2 > (x0+x1)/2 == (c.p[1] > c.p[0]) {
			moved = 1
		}
		out = append(out, pin{[]int{1 - moved}, func(p *vector) bool { return s.touch(p, moved, &bed) }})
	}
	return out
}

// bedsNear lists the straight pieces of boundaries that a candidate almost touches, the nearest first.
func (s *searcher) bedsNear(c *candidate) []rail {
	type near struct {
		piece rail
		off   float64
	}
	var all []near
	for _, bed := range s.m.beds() {
		for i := 1; i < len(bed.pts); i++ {
			piece := rail{bed.pts[i-1 : i+1]}
			off := math.Abs(piece.rises(c.slip.Centre, c.slip.Radius, c.r.From.X, c.r.To.X))
			if off < nearBed*c.r.Depth {
				all = append(all, near{piece, off})
			}
		}
	}
	slices.SortStableFunc(all, func(a, b near) int { return cmp.Compare(a.off, b.off) })
	var out []rail
	for _, n := range all[:min(len(all), bedsNearby)] {
		out = append(out, n.piece)
	}
	return out
}

// touch moves one end of an arc that rests on the depth of interest until it just touches a bed from above as well.
func (s *searcher) touch(p *vector, moved int, bed *rail) bool {
	step := pinWalk * math.Abs(p[1]-p[0])
	here := s.clearance(p, moved, p[moved], bed)
	for k := 1; k <= pinSteps; k++ {
		for _, d := range [...]float64{step, -step} {
			from, to := p[moved]+float64(k-1)*d, p[moved]+float64(k)*d
			if f := s.clearance(p, moved, to, bed); !math.IsNaN(f) && !math.IsNaN(here) && f < 0 != (here < 0) {
				return s.touchBetween(p, moved, from, to, bed)
			}
		}
	}
	return false
}

// touchBetween moves one end of an arc that rests on the depth of interest to where, between two places, it just touches a bed from above. It
// reports whether it clears the bed at one of them only.
func (s *searcher) touchBetween(p *vector, moved int, from, to float64, bed *rail) bool {
	clear := func(x float64) float64 { return s.clearance(p, moved, x, bed) }
	f0, f1 := clear(from), clear(to)
	if math.IsNaN(f0+f1) || f0 < 0 == (f1 < 0) {
		return false
	}
	if f1 < 0 {
		from, to = to, from
	}
	x, ok := firstAbove(clear, from, to, touchShare*hairShare*(s.m.right-s.m.left))
	p[moved], p[2] = x, flattest
	return ok
}

// clearance returns by how much the arc that rests on the depth of interest, with one end moved to x, clears a bed below it, m.
func (s *searcher) clearance(p *vector, moved int, x float64, bed *rail) float64 {
	q := *p
	q[moved], q[2] = x, flattest
	slip, ok := s.build(&q)
	if !ok {
		return math.NaN()
	}
	return -bed.rises(slip.Centre, slip.Radius, min(q[0], q[1]), max(q[0], q[1]))
}
