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
	free := ws.wetted()
	for i := range ws.slice[:ws.n] {
		s := &ws.slice[i]
		r += s.cl + s.ordinaryNormal(free)*s.tan
	}
	return r / d, Converged
}

// wetted reports whether free water loads the slip.
func (ws *Workspace) wetted() bool {
	for i := range ws.slice[:ws.n] {
		if s := &ws.slice[i]; s.h != 0 || s.q != s.soilW && s.variable == 0 {
			return true
		}
	}
	return false
}

// ordinaryNormal returns N' of the Ordinary method on a slice of a slip that free water loads or not, kN.
func (s *slice) ordinaryNormal(free bool) float64 {
	if free {
		return (s.q-s.ul*s.cos)*s.cos - s.k*s.sin
	}
	return s.q*s.cos - s.k*s.sin - s.ul
}
