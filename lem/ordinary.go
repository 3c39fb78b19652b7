package lem

import "math"

// ordinary solves the Ordinary method (Fellenius 1936): F = sum(c l + N' tan phi)/sum(driving). Negative N' counts as it stands, on the safe
// side.
func (ws *Workspace) ordinary(leftward bool) (float64, Status) {
	d := ws.driving(leftward)
	if !(d > 0) {
		return math.NaN(), NotConverged
	}
	var r float64
	ss := ws.slice[:ws.n]
	for i := range ss {
		r += ss[i].cl + ws.ordinaryNormal(&ss[i])*ss[i].tan
	}
	return r / d, Converged
}

// ordinaryNormal returns the effective normal force of the Ordinary method on a slice, kN: N' = Q cos(alpha) - K sin(alpha) - u l. Where free
// water loads the slip, N' = (Q - u b) cos(alpha) - K sin(alpha), since Q cos(alpha) - u l breaks down there (the form that EM 1110-2-1902,
// 2003, Appendix C recommends; recalled from memory).
func (ws *Workspace) ordinaryNormal(s *slice) float64 {
	if ws.wet {
		return (s.q-s.ul*s.cos)*s.cos - s.k*s.sin
	}
	return s.q*s.cos - s.k*s.sin - s.ul
}
