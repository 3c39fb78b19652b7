package lem

import "math"

// ordinary solves the Ordinary method (Fellenius 1936): F = sum(c l + N' tan phi)/sum(driving), with N' = W cos(alpha) - K sin(alpha) - u l.
// Where free water loads the slip, N' = (W - u b) cos(alpha) - K sin(alpha), since W cos(alpha) - u l breaks down there (the form that
// EM 1110-2-1902, 2003, Appendix C recommends; recalled from memory). Negative N' counts as it stands, on the safe side.
func (ws *Workspace) ordinary(leftward bool) (float64, Status) {
	d := ws.driving(leftward)
	if !(d > 0) {
		return math.NaN(), NotConverged
	}
	var r float64
	ss := ws.slice[:ws.n]
	free := false
	for i := range ss {
		free = free || ss[i].h != 0 || ss[i].q != ss[i].soilW && ss[i].variable == 0
	}
	for i := range ss {
		s := &ss[i]
		n := s.q*s.cos - s.k*s.sin - s.ul
		if free {
			n = (s.q-s.ul*s.cos)*s.cos - s.k*s.sin
		}
		r += s.cl + n*s.tan
	}
	return r / d, Converged
}
