package remedies

import (
	"math"
	"slices"
	"sort"

	"standfast/lem"
)

// noSoil is returned where there is no soil.
const noSoil = -1

// addSoilAreas adds to dst, by soil, the area of each soil between under and top where top is the higher, from x = from to to.
// In a slab of x in which no two lines cross, the thickness of every soil is linear, so the column at mid-slab gives it exactly.
func addSoilAreas(dst []float64, s *lem.Section, top, under lem.Profile, from, to float64) {
	var levels []float64
	slabs := soilSlabs(s, top, under, from, to)
	for i := 1; i < len(slabs); i++ {
		width, x := slabs[i]-slabs[i-1], (slabs[i-1]+slabs[i])/2
		hi, lo := top.At(x), under.At(x)
		if hi <= lo {
			continue
		}
		levels = append(levels[:0], lo, hi)
		for _, y := range crossings(s, x) {
			if y > lo && y < hi {
				levels = append(levels, y)
			}
		}
		sort.Float64s(levels)
		for k := 1; k < len(levels); k++ {
			dst[s.SoilAt(x, (levels[k-1]+levels[k])/2)] += (levels[k] - levels[k-1]) * width
		}
	}
}

// crossings returns the levels of all soil boundaries on the vertical at x, in no order.
func crossings(s *lem.Section, x float64) []float64 {
	var ys []float64
	for _, st := range s.Strata {
		ys = append(ys, st.Top.At(x))
	}
	for _, b := range s.Placed {
		for i, q := range b.Outline {
			p := b.Outline[(i+len(b.Outline)-1)%len(b.Outline)]
			if (p.X > x) != (q.X > x) {
				ys = append(ys, p.Y+(q.Y-p.Y)*(x-p.X)/(q.X-p.X))
			}
		}
	}
	return ys
}

// soilSlabs returns the ends of the slabs of x between from and to in which no soil boundary, nor top or under, bends or crosses
// another.
func soilSlabs(s *lem.Section, top, under lem.Profile, from, to float64) []float64 {
	lines := boundaries(s, from, to)
	lines = append(lines, top, under)
	xs := []float64{from, to}
	for _, l := range lines {
		for _, p := range l {
			if p.X > from && p.X < to {
				xs = append(xs, p.X)
			}
		}
	}
	sort.Float64s(xs)
	xs = slices.Compact(xs)
	at := make([]float64, 2*len(lines))
	for i, n := 1, len(xs); i < n; i++ {
		x0, x1 := xs[i-1], xs[i]
		for k, l := range lines {
			at[2*k], at[2*k+1] = levelRight(l, x0), levelLeft(l, x1)
			for m := range k {
				d0, d1 := at[2*k]-at[2*m], at[2*k+1]-at[2*m+1]
				if d0*d1 < 0 {
					xs = append(xs, x0+(x1-x0)*d0/(d0-d1))
				}
			}
		}
	}
	sort.Float64s(xs)
	return slices.Compact(xs)
}

// boundaries returns the tops of the strata and, edge by edge, the outlines of the placed bodies that reach between from and to.
// An edge is held level beyond its ends like any profile: its crossings there make slabs too many, which does no harm.
func boundaries(s *lem.Section, from, to float64) []lem.Profile {
	var lines []lem.Profile
	for _, st := range s.Strata {
		lines = append(lines, st.Top)
	}
	for _, b := range s.Placed {
		for i, q := range b.Outline {
			p := b.Outline[(i+len(b.Outline)-1)%len(b.Outline)]
			if p.X > q.X {
				p, q = q, p
			}
			if p.X < q.X && q.X > from && p.X < to {
				lines = append(lines, lem.Profile{p, q})
			}
		}
	}
	return lines
}

// slabLayers calls f for every part of one soil between under and top from x = from to x = to, with its outline: a quadrilateral or a
// triangle between two verticals.
func slabLayers(s *lem.Section, top, under lem.Profile, from, to float64, f func(soil int, outline []lem.Point)) {
	slabs := soilSlabs(s, top, under, from, to)
	lines := boundaries(s, from, to)
	for i := 1; i < len(slabs); i++ {
		x0, x1 := slabs[i-1], slabs[i]
		x := (x0 + x1) / 2
		hi, lo := edgeOf(top, x0, x1), edgeOf(under, x0, x1)
		if hi.mid() <= lo.mid() {
			continue
		}
		edges := []edge{lo, hi}
		for _, l := range lines {
			if e := edgeOf(l, x0, x1); e.mid() > lo.mid() && e.mid() < hi.mid() {
				edges = append(edges, e)
			}
		}
		sort.Slice(edges, func(a, b int) bool { return edges[a].mid() < edges[b].mid() })
		for k := 1; k < len(edges); k++ {
			a, b := edges[k-1], edges[k]
			if b.mid()-a.mid() <= sameLevel {
				continue
			}
			var out path
			out.add(x0, b.y0)
			out.add(x1, b.y1)
			out.add(x1, a.y1)
			out.add(x0, a.y0)
			if n := len(out); math.Hypot(out[n-1].X-out[0].X, out[n-1].Y-out[0].Y) <= sameLevel {
				out = out[:n-1]
			}
			f(s.SoilAt(x, (a.mid()+b.mid())/2), out)
		}
	}
}

// edge is a line over a slab: its levels at both ends.
type edge struct{ y0, y1 float64 }

func (e edge) mid() float64 { return (e.y0 + e.y1) / 2 }

// edgeOf returns a profile over a slab in which it is straight.
func edgeOf(p lem.Profile, x0, x1 float64) edge { return edge{levelRight(p, x0), levelLeft(p, x1)} }
