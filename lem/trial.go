package lem

import (
	"context"
	"math"
)

// Bounds of trial arcs.
const (
	flattest     = 0.02 // Least half angle of an arc, rad.
	roundest     = 1.65 // Greatest half angle, rad: a little beyond a half circle.
	touchTol     = 1e-9 // How close an arc is brought to the firm base, as a share of its size.
	projectSteps = 24   // Steps of regula falsi to bring an arc to the depth of interest or to touch a boundary.
	tangentSteps = 20   // Halvings of the half angle to bring an arc to a boundary.
	// An arc is brought to within this share above the depth of interest. Where a boundary lies at just that depth, as beneath a berm with a face
	// parallel to the old one, an arc deeper by a share d cuts a chord through it as long as the root of d: 1e-3 cost F up to a tenth.
	depthOvershoot = 1e-9
)

// build makes the slip of a vector and reports whether there is one. An arc too shallow or through the firm base is first brought to the
// nearest that is neither, and the vector with it: minima often lie on these bounds.
func (s *searcher) build(p *vector) (Slip, bool) {
	if s.o.Sampler == ByCentre {
		return s.buildByCentre(p)
	}
	return s.buildByDaylight(p)
}

// buildByDaylight makes the arc through the ground at p[0] and p[1] with half angle p[2].
func (s *searcher) buildByDaylight(p *vector) (Slip, bool) {
	m := s.m
	x0, x1 := min(p[0], p[1]), max(p[0], p[1])
	if !(x1-x0 > shortestZone*(m.right-m.left)/4) || x0 < m.cols[0].x0 || x1 > m.cols[len(m.cols)-1].x1 {
		return Slip{}, false
	}
	a := Point{x0, m.cols[m.columnAt(x0)].ground.at(x0)}
	b := Point{x1, m.cols[m.columnAt(x1)].ground.at(x1)}
	p[2] = min(max(p[2], flattest), roundest)
	arc := func(half float64) (Point, float64) { return arcThrough(a, b, half) }
	if ok := s.project(&p[2], flattest, roundest, m.span(x0, x1), arc); !ok {
		return Slip{}, false
	}
	c, r := arc(p[2])
	return Slip{Kind: Circle, Centre: c, Radius: r}, true
}

// arcThrough returns the circle through two points whose lower arc between them has the given half angle.
func arcThrough(a, b Point, half float64) (Point, float64) {
	dx, dy := b.X-a.X, b.Y-a.Y
	chord := math.Hypot(dx, dy)
	r := chord / (2 * math.Sin(half))
	h := r * math.Cos(half) / chord
	return Point{(a.X+b.X)/2 - dy*h, (a.Y+b.Y)/2 + dx*h}, r
}

// buildByCentre makes the circle with centre p[0], p[1] and radius p[2].
func (s *searcher) buildByCentre(p *vector) (Slip, bool) {
	m := s.m
	c := Point{p[0], p[1]}
	if !(p[2] > 0) {
		return Slip{}, false
	}
	circle := func(r float64) (Point, float64) { return c, r }
	if s.o.MinDepth > 0 || m.firm {
		span := m.span(max(m.cols[0].x0, c.X-0.99*p[2]), min(m.cols[len(m.cols)-1].x1, c.X+0.99*p[2]))
		if span.from >= span.to || !s.project(&p[2], p[2]*0.7, p[2]*1.4, span, circle) {
			return Slip{}, false
		}
	}
	return Slip{Kind: Circle, Centre: c, Radius: p[2]}, true
}

// project brings q, on which the depth of the arc rises, into the range where the arc is deep enough and clears the firm base. It reports
// whether there is such a q.
func (s *searcher) project(q *float64, least, most float64, over part, arc func(float64) (Point, float64)) bool {
	m := s.m
	tol := depthOvershoot * s.o.MinDepth
	excess := func(v float64) float64 {
		c, r := arc(v)
		return m.circleDepth(over, c, r) - s.o.MinDepth
	}
	if s.o.MinDepth > 0 && excess(*q) < 0 {
		v, ok := firstAbove(excess, *q, most, tol)
		if !ok {
			return false
		}
		*q = v
	}
	clears := func(v float64) bool {
		c, r := arc(v)
		return m.circleClearsBase(over, c, r)
	}
	if !m.firm || clears(*q) {
		return true
	}
	lo, hi := least, *q
	if s.o.MinDepth > 0 && excess(lo) < 0 { // The shallowest that is of interest.
		lo, _ = firstAbove(excess, lo, hi, tol)
	}
	if !clears(lo) {
		return false
	}
	for hi-lo > touchTol*hi {
		if mid := (lo + hi) / 2; clears(mid) {
			lo = mid
		} else {
			hi = mid
		}
	}
	*q = lo
	return true
}

// firstAbove returns a point between a, where f is negative, and b where f lies between 0 and tol, by regula falsi with the Illinois
// safeguard; ok is false if f(b) is negative. Either of a and b may be the greater.
func firstAbove(f func(float64) float64, a, b, tol float64) (v float64, ok bool) {
	fa, fb := f(a), f(b)
	if !(fb >= 0) {
		return 0, false
	}
	side := 0
	best := b
	for range projectSteps {
		v := b - (fb-tol/2)*(b-a)/(fb-fa) // Aim at half the tolerance above zero.
		if !((v-a)*(b-v) > 0) {
			v = (a + b) / 2
		}
		fv := f(v)
		if fv >= 0 {
			b, fb, best = v, fv, v
			if fv <= tol {
				break
			}
			if side == 1 {
				fa /= 2
			}
			side = 1
		} else {
			a, fa = v, fv
			if side == -1 {
				fb = tol/2 + (fb-tol/2)/2
			}
			side = -1
		}
	}
	return best, true
}

// sweep tries arcs all over the section and keeps the lowest of each cell.
func (s *searcher) sweep(ctx context.Context) {
	if s.o.Sampler == ByCentre {
		s.sweepByCentre(ctx)
		return
	}
	q := sequenceOf(s.o.Seed)
	n := int(math.Ceil(trialsPerPair * s.o.Effort))
	k := 0
	for i, a := range s.zones {
		for j, b := range s.zones[i:] {
			if ctx.Err() != nil {
				return
			}
			if !s.mayFail(a, b) {
				continue
			}
			for range n {
				v := q.at(k)
				k++
				x0, x1 := a.From+v[0]*(a.To-a.From), b.From+v[1]*(b.To-b.From)
				if j == 0 && x1 < x0 {
					x0, x1 = x1, x0
				}
				s.note(s.try(vector{x0, x1, flattest + v[2]*v[2]*(roundest-flattest)}))
			}
		}
	}
	s.sweepTangents(ctx)
	if s.o.MinDepth > 0 {
		s.sweepHeld(ctx)
	}
}

// sweepTangents tries arcs that just touch a boundary between soils from above: minima often rest on one, and are narrow there.
func (s *searcher) sweepTangents(ctx context.Context) {
	q := sequenceOf(s.o.Seed + 1)
	n := int(math.Ceil(tangentsPerPair * s.o.Effort))
	k := 0
	for _, bed := range s.m.beds() {
		for i, a := range s.zones {
			for _, b := range s.zones[i+1:] {
				if ctx.Err() != nil {
					return
				}
				if !s.mayFail(a, b) {
					continue
				}
				for range n {
					v := q.at(k)
					k++
					x0, x1 := a.From+v[0]*(a.To-a.From), b.From+v[1]*(b.To-b.From)
					if half, ok := s.m.tangentAngle(&bed, x0, x1); ok {
						s.note(s.try(vector{x0, x1, half}))
					}
				}
			}
		}
	}
}

// tangentAngle returns the half angle of the arc through the ground at two places that touches a bed from above, if there is one.
func (m *Model) tangentAngle(bed *rail, x0, x1 float64) (half float64, ok bool) {
	a, b := Point{x0, m.groundAt(x0)}, Point{x1, m.groundAt(x1)}
	rises := func(half float64) float64 {
		c, r := arcThrough(a, b, half)
		return bed.rises(c, r, x0, x1)
	}
	lo, hi := flattest, roundest
	if !(rises(lo) < 0 && rises(hi) > 0) {
		return 0, false
	}
	for range tangentSteps {
		if mid := (lo + hi) / 2; rises(mid) > 0 {
			hi = mid
		} else {
			lo = mid
		}
	}
	return lo, true
}

// mayFail reports whether slips between two zones, a left of b, can move in a wanted direction and daylight in the wanted ranges.
func (s *searcher) mayFail(a, b Range) bool {
	overlaps := func(z, want Range) bool { return want == Range{} || z.From <= want.To && want.From <= z.To }
	right := s.o.Window.Direction != LeftwardOnly && overlaps(a, s.o.Window.Head) && overlaps(b, s.o.Window.Toe)
	left := s.o.Window.Direction != RightwardOnly && overlaps(b, s.o.Window.Head) && overlaps(a, s.o.Window.Toe)
	return right || left
}

// sweepByCentre tries circles by centre and radius. Centres lie from below the toe level to well above the crest, more of them low.
func (s *searcher) sweepByCentre(ctx context.Context) {
	m := s.m
	q := sequenceOf(s.o.Seed)
	width, height := m.right-m.left, m.high-m.low
	height = max(height, shortestZone*width)
	n := int(math.Ceil(trialsByCentre * s.o.Effort))
	for k := range n {
		if k%512 == 0 && ctx.Err() != nil {
			return
		}
		v := q.at(k)
		x := m.left - 0.1*width + v[0]*1.2*width
		y := m.low + 0.3*height + 6*height*v[1]*v[1]
		ground := m.cols[m.columnAt(x)].ground.at(x)
		deepest := m.low - min(1.5*height, width/3)
		tangent := min(ground, y) - v[2]*(min(ground, y)-deepest)
		s.note(s.try(vector{x, y, y - tangent}))
	}
}

// scale returns the size of the first simplex about a candidate.
func (s *searcher) scale(c candidate) vector {
	length := c.r.To.X - c.r.From.X
	if s.o.Sampler == ByCentre {
		return vector{0.08 * length, 0.08 * length, 0.05 * length}
	}
	return vector{0.06 * length, 0.06 * length, 0.12}
}
