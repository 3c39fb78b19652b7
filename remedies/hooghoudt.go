package remedies

import "math"

// Steady flow to parallel drains under uniform recharge, and steady flow over a level base.

// hooghoudt is a set of parallel drains: S^2 = (8 K d m + 4 K m^2)/q, with m the head midway between drains, above them (Hooghoudt 1940, as in
// Ritzema, ed., Drainage Principles and Applications, ILRI Publ. 16, 1994, ch. 8).
type hooghoudt struct {
	spacing      float64 // S, m.
	depth        float64 // D, of permeable ground below the drains, m.
	radius       float64 // r, of a drain, m.
	permeability float64 // K, m/s.
	recharge     float64 // q, m/s.
}

// deepest is the D/S up to which the first of Moody's formulas holds.
const deepest = 0.3

// equivalentDepth returns d, the depth of level flow that makes up for the convergence of flow to the drains (Moody 1966, recalled from memory):
//
//	d = D/{1 + (D/S)[(8/pi) ln(D/r) - alpha]},  alpha = 3.55 - 1.6 D/S + 2 (D/S)^2,  for D/S <= 0.3,
//	d = pi S/{8 [ln(S/r) - 1.15]}                                                      otherwise.
//
// d is never more than D.
func (h *hooghoudt) equivalentDepth() float64 {
	s, d := h.spacing, h.depth
	if d <= 0 {
		return 0
	}
	ratio := d / s
	if ratio > deepest {
		around := math.Log(s/h.radius) - 1.15
		if around <= 0 { // Drains as wide as their spacing: out of the formula's reach.
			return 0
		}
		return math.Min(d, math.Pi*s/(8*around))
	}
	alpha := 3.55 - 1.6*ratio + 2*ratio*ratio
	return math.Min(d, d/(1+ratio*(8/math.Pi*math.Log(d/h.radius)-alpha)))
}

// midspan returns the head midway between drains, above them, m.
func (h *hooghoudt) midspan() float64 {
	d := h.equivalentDepth()
	return math.Sqrt(d*d+h.recharge*h.spacing*h.spacing/(4*h.permeability)) - d
}

// mean returns the mean head between drains, above them, m: the water table is the ellipse (h + d)^2 = d^2 + (q/K) x (S - x) (Dupuit), whose mean
// is two thirds of the midspan head where d is great and pi/4 of it where d is 0.
func (h *hooghoudt) mean() float64 {
	d := h.equivalentDepth()
	root := math.Sqrt(h.recharge / h.permeability)
	top := d + h.midspan()
	return d/2 + top*top/(root*h.spacing)*math.Asin(math.Min(1, root*h.spacing/(2*top))) - d
}

// dupuit is steady flow between two verticals over a level base, with recharge: h^2 = h1^2 - (h1^2 - h2^2) x/L + (w/K)(L - x) x (Dupuit 1863).
// It does not hold near steep exits nor on a base that slopes.
type dupuit struct {
	h1, h2 float64 // Heads above the base at x = 0 and x = L, m.
	length float64 // L, m.
	ratio  float64 // w/K, recharge over permeability.
}

// head returns the head above the base at x.
func (d *dupuit) head(x float64) float64 {
	return math.Sqrt(math.Max(0, d.h1*d.h1-(d.h1*d.h1-d.h2*d.h2)*x/d.length+d.ratio*(d.length-x)*x))
}

// flow returns the flow from x = 0 to x = L without recharge, m3/s per m: q = K (h1^2 - h2^2)/(2 L).
func (d *dupuit) flow(permeability float64) float64 {
	return permeability * (d.h1*d.h1 - d.h2*d.h2) / (2 * d.length)
}
