package lem

import "math"

// Limits of the iteration for F.
const (
	maxIterations = 50
	fRelTol       = 1e-6 // Stop when |dF| <= fRelTol * F: Newton's next step would be of the order of fRelTol squared.
)

// bishop solves the simplified method (Bishop 1955): F = sum[(c b + (W - u b) tan phi)/m]/sum(driving), m = cos(alpha) + sin(alpha) tan phi/F.
// Written as g(F) = sum[(c b + (W - u b) tan phi)/(F cos + sin tan phi)] - driving = 0, g falls and is convex right of its largest pole
// as long as the numerators are positive, so Newton's method climbs to the root from the left.
func (ws *Workspace) bishop(leftward bool) (float64, Status) {
	d := ws.driving(leftward)
	if !(d > 0) {
		return math.NaN(), NotConverged
	}
	ss := ws.slice[:ws.n]
	var sum float64
	for i := range ss {
		sum += ss[i].frees
	}
	if !(sum > 0) {
		return math.NaN(), NotConverged
	}
	pole := ws.pole()
	lo, hi := pole, math.Inf(1)
	f := max(sum/d, 1.5*pole)
	for range maxIterations {
		var g, dg float64
		for i := range ss {
			s := &ss[i]
			q := 1 / (f*s.cos + s.sin*s.tan)
			t := s.frees * q
			g += t
			dg += t * q * s.cos
		}
		g -= d
		if g > 0 {
			lo = f
		} else {
			hi = f
		}
		next := f + g/dg
		if !(next > lo && next < hi) { // Outside the bracket, or not a number.
			if math.IsInf(hi, 1) {
				next = 2 * lo
			} else {
				next = (lo + hi) / 2
			}
		}
		if math.Abs(next-f) <= fRelTol*next {
			return ws.admitted(next)
		}
		f = next
	}
	return math.NaN(), NotConverged
}
