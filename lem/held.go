package lem

import (
	"context"
	"math"
)

// Trial arcs held by the depth of interest and by a boundary at once.
const (
	heldPerBed = 40 // Trials along each boundary,
	heldGrowth = 24 // and doublings of the radius until the arc is deep enough.
)

// sweepHeld tries arcs that rest on the depth of interest and touch a boundary between soils at once: on a thin layer at that depth they are the
// only ones that find it, and a few trials between two stretches of ground hardly ever come near them. There is one for each point of the boundary
// that is no deeper than the depth of interest.
func (s *searcher) sweepHeld(ctx context.Context) {
	shift := sequenceOf(s.o.Seed + 2).shift[0]
	for _, bed := range s.m.beds() {
		within := s.m.shallow(&bed, s.o.MinDepth)
		var length float64
		for _, r := range within {
			length += r.To - r.From
		}
		for _, r := range within {
			n := math.Ceil(heldPerBed * s.o.Effort * (r.To - r.From) / length)
			for j := range int(n) {
				if ctx.Err() != nil {
					return
				}
				if p, ok := s.heldAt(&bed, r.From+(float64(j)+shift)/n*(r.To-r.From)); ok {
					s.note(s.try(p))
				}
			}
		}
	}
}

// heldAt returns the arc that touches a bed at x and rests on the depth of interest.
func (s *searcher) heldAt(bed *rail, x float64) (p vector, ok bool) {
	m := s.m
	at, k := bed.at(x), slopeAt(bed.pts, x, 1)
	sin := k / math.Hypot(1, k)
	cos := math.Sqrt(1 - sin*sin)
	centre := func(r float64) Point { return Point{at.X - r*sin, at.Y + r*cos} }
	excess := func(r float64) float64 {
		c := centre(r)
		over := m.span(max(m.cols[0].x0, c.X-0.99*r), min(m.cols[len(m.cols)-1].x1, c.X+0.99*r))
		return m.circleDepth(over, c, r) - s.o.MinDepth
	}
	r := s.o.MinDepth / 4
	if excess(r) >= 0 {
		return p, false
	}
	for range heldGrowth {
		if excess(2*r) >= 0 {
			break
		}
		r *= 2
	}
	if r, ok = firstAbove(excess, r, 2*r, depthOvershoot*s.o.MinDepth); !ok {
		return p, false
	}
	m.circleParts(&s.ws, centre(r), r)
	for _, q := range s.ws.parts {
		if q.from < x && x < q.to {
			return vector{q.from, q.to, flattest}, true
		}
	}
	return p, false
}

// shallow lists where a bed lies below the ground and comes within a depth of it.
func (m *Model) shallow(bed *rail, depth float64) []Range {
	var out []Range
	for i := range m.cols {
		c := &m.cols[i]
		for j := 1; j < len(bed.pts); j++ {
			x0, x1 := max(bed.pts[j-1].X, c.x0, m.left), min(bed.pts[j].X, c.x1, m.right)
			if x0 >= x1 {
				continue
			}
			// The depth is linear in between.
			d0, d1 := c.ground.at(x0)-bed.at(x0).Y, c.ground.at(x1)-bed.at(x1).Y
			from, to := 0.0, 1.0
			for _, bound := range [...]struct{ at, sign float64 }{{0, 1}, {depth, -1}} {
				e0, e1 := (d0-bound.at)*bound.sign, (d1-bound.at)*bound.sign // Negative where the bound is broken.
				switch {
				case e0 < 0 && e1 < 0:
					from, to = 1, 0
				case e0 < 0:
					from = max(from, e0/(e0-e1))
				case e1 < 0:
					to = min(to, e0/(e0-e1))
				}
			}
			if from < to {
				out = append(out, Range{x0 + from*(x1-x0), x0 + to*(x1-x0)})
			}
		}
	}
	return out
}
