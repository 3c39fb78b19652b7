package lem

import "math"

// Limits of the iteration for F.
const (
	maxIterations = 50
	fRelTol       = 1e-6 // Stop when |dF| <= fRelTol * F: the next step would be of the order of fRelTol cubed.
)

// bishop solves the simplified method (Bishop 1955): F = sum[(c b + (W - u b) tan phi)/m]/sum(driving), m = cos(alpha) + sin(alpha) tan phi/F.
// Written as g(F) = sum[(c b + (W - u b) tan phi)/(F cos + sin tan phi)] - driving = 0, g falls and is convex right of its largest pole
// as long as the numerators are positive. See [bracket] for the iteration.
func (ws *Workspace) bishop(leftward bool) (float64, Status) {
	var d, sum float64
	ss := ws.slice[:ws.n]
	for i := range ss {
		d += ws.drive(&ss[i], leftward)
		sum += ss[i].frees
	}
	d /= ws.lever()
	if !(d > 0 && sum > 0) {
		return math.NaN(), NotConverged
	}
	root := bracket{ws.pole(), math.Inf(1)}
	f := max(sum/d, 1.5*root.lo)
	for range maxIterations {
		var g, dg, ddg float64
		for i := range ss {
			s := &ss[i]
			q := 1 / (f*s.cos + s.sin*s.tan)
			t, h := s.frees*q, q*s.cos
			g += t
			dg += t * h
			ddg += t * h * h
		}
		next := root.next(f, g-d, dg, ddg)
		if math.Abs(next-f) <= fRelTol*next {
			return ws.admitted(next)
		}
		f = next
	}
	return math.NaN(), NotConverged
}

// bracket holds the bounds of the root of a falling function.
type bracket struct{ lo, hi float64 }

// next narrows the bounds by the value g of the function at f and returns where to look next, given dg and ddg, its slope negated and half its
// second derivative: a step of Halley's method, which is exact for a single slice, one of Newton's where that leaves the bounds, else the middle.
// At the root itself it stays there.
func (b *bracket) next(f, g, dg, ddg float64) float64 {
	if g > 0 {
		b.lo = f
	} else {
		b.hi = f
	}
	for _, next := range [...]float64{f + g*dg/(dg*dg-g*ddg), f + g/dg} {
		if next > b.lo && next < b.hi || next == f {
			return next
		}
	}
	if math.IsInf(b.hi, 1) {
		return 2 * b.lo
	}
	return (b.lo + b.hi) / 2
}
