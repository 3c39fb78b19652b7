package lem

import "math"

// Constants of the descent (Nelder and Mead 1965).
const (
	descentTrials = 90
	descentRelTol = 2e-6 // Stop when the simplex spans less than this share of F.
	descentGain   = 2e-5 // A new round must have gained more than this share of F to be followed by another.
)

// descend follows F downhill from a candidate with a simplex, and starts again from where it ended until that gains nothing more.
func (s *searcher) descend(c candidate, scale vector) candidate {
	for round := range roundsOfDescent {
		before := c.r.F
		c = s.simplex(c, scale, &allFree)
		if round > 0 && !(before-c.r.F > descentGain*before) {
			break
		}
		for i := range scale {
			scale[i] *= 0.4
		}
	}
	return c
}

// simplex is one run of Nelder and Mead's method in the parameters that a pin leaves free.
func (s *searcher) simplex(c candidate, scale vector, pin *pin) candidate {
	var corners [4]candidate
	n := len(pin.free)
	v := corners[:n+1]
	v[0] = c
	for k, i := range pin.free {
		p := c.p
		p[i] += scale[i]
		v[k+1] = s.tryPinned(p, pin)
		if math.IsInf(v[k+1].r.F, 1) { // Perhaps there is room on the other side.
			p[i] = c.p[i] - scale[i]
			v[k+1] = s.tryPinned(p, pin)
		}
	}
	for used := len(v); used < descentTrials; used++ {
		order(v)
		if v[n].r.F-v[0].r.F <= descentRelTol*v[0].r.F {
			break
		}
		var mid vector
		for i := range mid {
			for _, c := range v[:n] {
				mid[i] += c.p[i]
			}
			mid[i] /= float64(n)
		}
		along := func(t float64) candidate {
			p := mid
			for i := range p {
				p[i] += t * (v[n].p[i] - mid[i])
			}
			return s.tryPinned(p, pin)
		}
		r := along(-1)
		switch {
		case r.r.F < v[0].r.F:
			used++
			if e := along(-2); e.r.F < r.r.F {
				r = e
			}
			v[n] = r
		case r.r.F < v[n-1].r.F:
			v[n] = r
		default:
			used++
			t := 0.5
			if r.r.F < v[n].r.F {
				t = -0.5
			}
			if k := along(t); k.r.F < min(r.r.F, v[n].r.F) {
				v[n] = k
				continue
			}
			for j := 1; j < len(v); j++ {
				p := v[0].p
				for i := range p {
					p[i] += 0.5 * (v[j].p[i] - p[i])
				}
				v[j] = s.tryPinned(p, pin)
			}
			used += n
		}
	}
	order(v)
	return v[0]
}

// order sorts the corners by F, stable.
func order(v []candidate) {
	for i := 1; i < len(v); i++ {
		for j := i; j > 0 && v[j].r.F < v[j-1].r.F; j-- {
			v[j], v[j-1] = v[j-1], v[j]
		}
	}
}
