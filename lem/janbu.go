package lem

import "math"

// janbu solves Janbu's simplified method (1954) without its correction: horizontal forces close with no vertical force between slices,
//
//	F = sum[(c b + (Q - u b) tan phi)/(cos(alpha) m)]/sum(T + Q tan(alpha)), m = cos(alpha) + sin(alpha) tan phi/F,
//
// Q being the vertical and T the horizontal load of a slice. The iteration is that of [Workspace.bishop]: the sum differs by 1/cos alone.
func (ws *Workspace) janbu() (float64, Status) {
	var d, sum float64
	ss := ws.slice[:ws.n]
	for i := range ss {
		s := &ss[i]
		inv := 1 / s.cos
		d += s.h + s.k + s.q*s.sin*inv
		sum += s.frees * inv
	}
	if !(d > 0 && sum > 0) {
		return math.NaN(), NotConverged
	}
	root := bracket{ws.pole(), math.Inf(1)}
	f := max(sum/d, 1.5*root.lo)
	for range maxIterations {
		var g, dg, ddg float64
		for i := range ss {
			s := &ss[i]
			q := 1 / ((f*s.cos + s.sin*s.tan) * s.cos)
			t, h := s.frees*q, q*s.cos*s.cos
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

// Factors b1 of Janbu's correction (Janbu 1973, as usually fitted to his chart; recalled from memory).
const (
	janbuUndrained    = 0.69 // No friction along the whole slip.
	janbuCohesionless = 0.31 // No cohesion along the whole slip.
	janbuGeneral      = 0.50 // Otherwise, mixed slips included.
)

// janbuCorrection returns f0 = 1 + b1 (d/L - 1.4 (d/L)^2), which makes up for the vertical forces between slices that the simplified method
// leaves out. L is the straight length from the head to the exit of the slip, d its greatest distance from that line. Beyond d/L = 1/1.4 the
// parabola falls below 1, where it has no meaning; f0 then stays 1, on the safe side.
func (ws *Workspace) janbuCorrection(leftward bool) float64 {
	ss := ws.slice[:ws.n]
	b1 := janbuGeneral
	friction, cohesion := false, false
	for i := range ss {
		friction = friction || ss[i].tan != 0
		cohesion = cohesion || ss[i].cl != 0
	}
	switch {
	case !friction:
		b1 = janbuUndrained
	case !cohesion:
		b1 = janbuCohesionless
	}
	share := ws.sag(leftward)
	return 1 + b1*max(0, share-1.4*share*share)
}

// sag returns the greatest distance of the slip from the straight line between its ends over the length of that line.
func (ws *Workspace) sag(leftward bool) float64 {
	first, last := 0, ws.n-1
	a, b := ws.edge(first, -1, leftward), ws.edge(last, 1, leftward)
	dx, dy := b.X-a.X, b.Y-a.Y
	length := math.Hypot(dx, dy)
	if ws.arc { // R - R cos of half the angle over 2 R sin of it; the ends lie below the centre.
		half := length / (2 * ws.radius)
		return (1 - math.Sqrt(max(0, 1-half*half))) / (2 * half)
	}
	var d float64
	for i := range ws.slice[:ws.n] {
		p := ws.edge(i, 1, leftward)
		d = max(d, ((p.X-a.X)*dy-(p.Y-a.Y)*dx)/length)
	}
	return d / length
}

// edge returns the end of the base of slice i, on its right (side 1) or left (side -1).
func (ws *Workspace) edge(i int, side float64, leftward bool) Point {
	s := &ws.slice[i]
	x := s.x + side*s.b/2
	if ws.arc {
		dx := x - ws.centre.X
		return Point{x, ws.centre.Y - math.Sqrt(max(0, ws.radius*ws.radius-dx*dx))}
	}
	fall := side * s.b / 2 * s.sin / s.cos
	if leftward {
		fall = -fall
	}
	return Point{x, s.y - fall}
}
