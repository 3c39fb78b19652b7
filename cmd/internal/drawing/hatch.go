package drawing

import (
	"math"
	"slices"
)

// hatch returns the parts of a family of parallel lines that lie inside every one of the regions. Each region is a set of rings
// and holds what an odd number of them surrounds. The lines run at angle, rad, and stand spacing apart, points; their
// position does not depend on the regions, so that neighbouring hatches join.
func hatch(angle, spacing float64, regions ...[][]xy) [][]xy {
	s, c := math.Sincos(angle)
	lo, hi := math.Inf(-1), math.Inf(1)
	turned := make([][][]xy, len(regions))
	for i, rings := range regions {
		least, most := math.Inf(1), math.Inf(-1)
		for _, r := range rings {
			t := make([]xy, len(r))
			for k, p := range r {
				t[k] = xy{p.X*c + p.Y*s, p.Y*c - p.X*s}
				least, most = min(least, t[k].Y), max(most, t[k].Y)
			}
			turned[i] = append(turned[i], t)
		}
		lo, hi = max(lo, least), min(hi, most)
	}
	var out [][]xy
	for k := math.Ceil(lo / spacing); k*spacing <= hi; k++ {
		y := k * spacing
		inside := crossings(turned[0], y)
		for _, rings := range turned[1:] {
			inside = overlap(inside, crossings(rings, y))
		}
		for i := 0; i+1 < len(inside); i += 2 {
			a, b := inside[i], inside[i+1]
			out = append(out, []xy{{a*c - y*s, a*s + y*c}, {b*c - y*s, b*s + y*c}})
		}
	}
	return out
}

// crossings returns where the horizontal line at y enters and leaves the rings, ascending: each pair bounds a part inside.
func crossings(rings [][]xy, y float64) []float64 {
	var xs []float64
	for _, r := range rings {
		for i, p := range r {
			q := r[(i+1)%len(r)]
			if (p.Y <= y) != (q.Y <= y) {
				xs = append(xs, p.X+(q.X-p.X)*(y-p.Y)/(q.Y-p.Y))
			}
		}
	}
	slices.Sort(xs)
	return xs
}

// overlap returns the common part of two lists of intervals.
func overlap(a, b []float64) []float64 {
	var out []float64
	for i, j := 0, 0; i+1 < len(a) && j+1 < len(b); {
		if lo, hi := max(a[i], b[j]), min(a[i+1], b[j+1]); lo < hi {
			out = append(out, lo, hi)
		}
		if a[i+1] < b[j+1] {
			i += 2
		} else {
			j += 2
		}
	}
	return out
}
