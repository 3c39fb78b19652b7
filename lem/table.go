package lem

import "math"

// TableSlice is a slice of a calculation by hand, as books print it. Its vertical load is its weight alone.
type TableSlice struct {
	Width       float64 // b, m.
	Inclination float64 // alpha of the base, rad, positive where it falls in the direction of movement.
	Length      float64 // Of the base, m; 0: Width/cos(alpha).
	Arc         float64 // Length that cohesion acts on in the Ordinary method, m; 0: Length.
	Weight      float64 // W, kN.
	Pore        float64 // u on the base, kPa.
	Cohesion    float64 // On the base, kPa.
	Friction    float64 // On the base, rad.
}

// SolveTable returns F of slices given one by one, with the kernels that solve the slices of a section, so that a calculation by hand can be
// checked number for number. The method is Ordinary or Bishop, which balance moments alone; with any other, or without an answer, ok is false.
func SolveTable(method Method, table []TableSlice) (f float64, ok bool) {
	if method != Ordinary && method != Bishop {
		return math.NaN(), false
	}
	var ws Workspace
	for i := range table {
		t := &table[i]
		sin, cos := math.Sincos(t.Inclination)
		tan := math.Tan(t.Friction)
		length := t.Length
		if length == 0 {
			length = t.Width / cos
		}
		arc := t.Arc
		if arc == 0 {
			arc = length
		}
		*ws.add() = slice{
			b: t.Width, sin: sin, cos: cos, tan: tan, q: t.Weight, cl: t.Cohesion * arc, ul: t.Pore * length,
			frees: t.Cohesion*t.Width + (t.Weight-t.Pore*t.Width)*tan,
		}
	}
	var r Result
	ws.method(method, &r)
	return r.F, r.Status == Converged
}
