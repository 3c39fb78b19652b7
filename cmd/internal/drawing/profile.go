package drawing

import (
	"slices"
	"sort"

	"standfast/lem"
)

// thinnest is the depth of cut or fill below which two profiles count as one line, m: less than a pen's width at any scale.
const thinnest = 1e-3

// limits returns the levels that a profile approaches at x from the left and from the right, m. They differ at a vertical step.
func limits(p lem.Profile, x float64) (left, right float64) {
	i := sort.Search(len(p), func(k int) bool { return p[k].X >= x })
	switch {
	case i == len(p):
		return p[i-1].Y, p[i-1].Y
	case p[i].X > x && i == 0:
		return p[0].Y, p[0].Y
	case p[i].X > x:
		a, b := p[i-1], p[i]
		y := a.Y + (b.Y-a.Y)*(x-a.X)/(b.X-a.X)
		return y, y
	}
	k := i
	for k+1 < len(p) && p[k+1].X == x {
		k++
	}
	return p[i].Y, p[k].Y
}

// crop returns the part of p between x0 and x1, held level beyond its own ends.
func crop(p lem.Profile, x0, x1 float64) lem.Profile {
	_, y0 := limits(p, x0)
	y1, _ := limits(p, x1)
	out := lem.Profile{{X: x0, Y: y0}}
	for _, q := range p {
		if q.X > x0 && q.X < x1 {
			out = append(out, q)
		}
	}
	return append(out, lem.Point{X: x1, Y: y1})
}

// cropInside returns the part of p between x0 and x1 without running on beyond its own ends; nil if there is none.
func cropInside(p lem.Profile, x0, x1 float64) lem.Profile {
	if len(p) == 0 {
		return nil
	}
	x0, x1 = max(x0, p.Left()), min(x1, p.Right())
	if x0 >= x1 {
		return nil
	}
	return crop(p, x0, x1)
}

// span is a range of x in which two profiles are straight and do not cross.
type span struct{ x0, x1, a0, a1, b0, b1 float64 }

// spans cuts the common range of two profiles at their points and crossings.
func spans(a, b lem.Profile) []span {
	var xs []float64
	for _, p := range []lem.Profile{a, b} {
		for _, q := range p {
			xs = append(xs, q.X)
		}
	}
	slices.Sort(xs)
	xs = slices.Compact(xs)
	var out []span
	for i := 0; i+1 < len(xs); i++ {
		s := span{x0: xs[i], x1: xs[i+1]}
		_, s.a0 = limits(a, s.x0)
		s.a1, _ = limits(a, s.x1)
		_, s.b0 = limits(b, s.x0)
		s.b1, _ = limits(b, s.x1)
		d0, d1 := s.a0-s.b0, s.a1-s.b1
		if d0*d1 < 0 {
			t := d0 / (d0 - d1)
			x, y := s.x0+(s.x1-s.x0)*t, s.a0+(s.a1-s.a0)*t
			out = append(out, span{s.x0, x, s.a0, y, s.b0, y}, span{x, s.x1, y, s.a1, y, s.b1})
			continue
		}
		out = append(out, s)
	}
	return out
}

// lower returns the lower envelope of two profiles, upper the upper one.
func lower(a, b lem.Profile) lem.Profile {
	return envelope(a, b, func(y, z float64) float64 { return min(y, z) })
}

func upper(a, b lem.Profile) lem.Profile {
	return envelope(a, b, func(y, z float64) float64 { return max(y, z) })
}

func envelope(a, b lem.Profile, pick func(y, z float64) float64) lem.Profile {
	var out lem.Profile
	add := func(p lem.Point) {
		if len(out) == 0 || out[len(out)-1] != p {
			out = append(out, p)
		}
	}
	for _, s := range spans(a, b) {
		add(lem.Point{X: s.x0, Y: pick(s.a0, s.b0)})
		add(lem.Point{X: s.x1, Y: pick(s.a1, s.b1)})
	}
	return out
}

// between returns the regions where a lies above b, each as an outline.
func between(a, b lem.Profile) [][]lem.Point {
	var out [][]lem.Point
	var top, bottom []lem.Point
	flush := func() {
		if len(top) > 0 {
			slices.Reverse(bottom)
			out = append(out, append(top, bottom...))
		}
		top, bottom = nil, nil
	}
	for _, s := range spans(a, b) {
		if s.a0-s.b0+s.a1-s.b1 <= thinnest {
			flush()
			continue
		}
		top = append(top, lem.Point{X: s.x0, Y: s.a0}, lem.Point{X: s.x1, Y: s.a1})
		bottom = append(bottom, lem.Point{X: s.x0, Y: s.b0}, lem.Point{X: s.x1, Y: s.b1})
	}
	flush()
	return out
}

// under returns the region below p down to a level.
func under(p lem.Profile, level float64) []lem.Point {
	out := slices.Clone([]lem.Point(p))
	return append(out, lem.Point{X: p.Right(), Y: level}, lem.Point{X: p.Left(), Y: level})
}

// same reports whether two profiles are the same line.
func same(a, b lem.Profile) bool {
	if len(a) == 0 || len(b) == 0 {
		return len(a) == len(b)
	}
	for _, s := range spans(a, b) {
		if max(s.a0-s.b0, s.b0-s.a0, s.a1-s.b1, s.b1-s.a1) > thinnest {
			return false
		}
	}
	return true
}
