package remedies

import (
	"math"
	"slices"
	"sort"

	"standfast/lem"
)

const (
	// sameLevel is the distance below which two levels, or two positions, are the same, m: far above the rounding of coordinates
	// of some kilometres (1e-12 m), far below anything that can be set out.
	sameLevel = 1e-9
	// straight is the offset from a line below which a point lies on it, m. It is so much smaller than sameLevel that leaving such
	// points out of a steep line does not make two lines differ.
	straight = 1e-11
)

// levelLeft returns the level of a profile just left of x, held level beyond its ends.
func levelLeft(p lem.Profile, x float64) float64 {
	i := sort.Search(len(p), func(k int) bool { return p[k].X >= x })
	switch {
	case i == 0:
		return p[0].Y
	case i == len(p):
		return p[i-1].Y
	}
	return between(p[i-1], p[i], x)
}

// levelRight returns the level of a profile just right of x, held level beyond its ends.
func levelRight(p lem.Profile, x float64) float64 {
	i := sort.Search(len(p), func(k int) bool { return p[k].X > x })
	switch {
	case i == 0:
		return p[0].Y
	case i == len(p):
		return p[i-1].Y
	}
	return between(p[i-1], p[i], x)
}

// between returns the level at x on the segment from a to b, a.X < b.X; exact at both ends.
func between(a, b lem.Point, x float64) float64 {
	switch x {
	case a.X:
		return a.Y
	case b.X:
		return b.Y
	}
	return a.Y + (b.Y-a.Y)*(x-a.X)/(b.X-a.X)
}

// piece is a stretch of x on which two profiles a and b are straight and do not cross: their levels at its ends.
type piece struct {
	x0, x1 float64
	a0, a1 float64
	b0, b1 float64
}

// gap returns the mean of a less b over the piece.
func (p *piece) gap() float64 { return (p.a0 + p.a1 - p.b0 - p.b1) / 2 }

// apart reports whether a and b differ anywhere on the piece.
func (p *piece) apart() bool {
	return math.Abs(p.a0-p.b0) > sameLevel || math.Abs(p.a1-p.b1) > sameLevel
}

// pieces splits from..to at every point of the two profiles, at their crossings and at the further breaks.
func pieces(a, b lem.Profile, from, to float64, breaks ...float64) []piece {
	xs := []float64{from, to}
	add := func(x float64) {
		if x > from && x < to {
			xs = append(xs, x)
		}
	}
	for _, p := range a {
		add(p.X)
	}
	for _, p := range b {
		add(p.X)
	}
	for _, x := range breaks {
		add(x)
	}
	sort.Float64s(xs)
	xs = slices.Compact(xs)
	out := make([]piece, 0, len(xs)+4)
	for i := 1; i < len(xs); i++ {
		x0, x1 := xs[i-1], xs[i]
		out = splitAtCrossing(out, piece{
			x0: x0, x1: x1,
			a0: levelRight(a, x0), a1: levelLeft(a, x1),
			b0: levelRight(b, x0), b1: levelLeft(b, x1),
		})
	}
	return out
}

// splitAtCrossing appends a piece whose lines may cross once, in two parts if they do.
func splitAtCrossing(out []piece, p piece) []piece {
	d0, d1 := p.a0-p.b0, p.a1-p.b1
	if d0*d1 >= 0 {
		return append(out, p)
	}
	x := p.x0 + (p.x1-p.x0)*d0/(d0-d1)
	if x <= p.x0 || x >= p.x1 { // the crossing is an end but for rounding
		return append(out, p)
	}
	y := p.b0 + (p.b1-p.b0)*d0/(d0-d1)
	return append(out,
		piece{p.x0, x, p.a0, y, p.b0, y},
		piece{x, p.x1, y, p.a1, y, p.b1})
}

// path collects the points of a line and leaves out those that repeat or lie on the way.
type path []lem.Point

// add appends a point.
func (p *path) add(x, y float64) {
	n := len(*p)
	if n > 0 {
		last := (*p)[n-1]
		if math.Abs(x-last.X) <= sameLevel {
			x = last.X // a step is vertical, not nearly so
			if math.Abs(y-last.Y) <= sameLevel {
				return
			}
		}
	}
	for n >= 2 && onLine((*p)[n-2], (*p)[n-1], lem.Point{X: x, Y: y}) {
		*p = (*p)[:n-1]
		n--
	}
	*p = append(*p, lem.Point{X: x, Y: y})
}

// onLine reports whether m lies on the line through a and b, to within straight.
func onLine(a, m, b lem.Point) bool {
	dx, dy := b.X-a.X, b.Y-a.Y
	length := math.Hypot(dx, dy)
	if length == 0 {
		return true
	}
	return math.Abs(dx*(m.Y-a.Y)-dy*(m.X-a.X)) <= straight*length
}

// side says which of two lines is kept.
type side int8

const (
	lower side = -1
	upper side = 1
)

// spliced returns ground with the lower (or upper) of itself and line between from and to.
func spliced(ground, line lem.Profile, from, to float64, keep side) lem.Profile {
	left, right := math.Min(ground.Left(), from), math.Max(ground.Right(), to)
	var out path
	for _, p := range pieces(line, ground, left, right, from, to) {
		if p.x0 >= from && p.x1 <= to && p.gap()*float64(keep) > 0 {
			out.add(p.x0, p.a0)
			out.add(p.x1, p.a1)
			continue
		}
		out.add(p.x0, p.b0)
		out.add(p.x1, p.b1)
	}
	return lem.Profile(out)
}

// run is a stretch of x on which one profile lies on one side of another, with both lines along it.
type run struct {
	from, to   float64
	top, under path
	area       float64
}

// runsAbove returns the stretches, from left to right, on which a lies above b, with the area between. A stretch ends where a and
// b meet, unless they meet in a point only.
func runsAbove(a, b lem.Profile) []run {
	left, right := math.Min(a.Left(), b.Left()), math.Max(a.Right(), b.Right())
	var out []run
	open := false
	for _, p := range pieces(a, b, left, right) {
		if !p.apart() || p.gap() <= 0 {
			open = false
			continue
		}
		touches := math.Abs(p.a0-p.b0) <= sameLevel
		if !open || touches {
			out = append(out, run{from: p.x0})
		}
		open = true
		r := &out[len(out)-1]
		r.to = p.x1
		r.top.add(p.x0, p.a0)
		r.top.add(p.x1, p.a1)
		r.under.add(p.x0, p.b0)
		r.under.add(p.x1, p.b1)
		r.area += p.gap() * (p.x1 - p.x0)
	}
	return out
}

// outline returns the region of a run as a clockwise simple outline.
func (r *run) outline() []lem.Point {
	out := slices.Clone(r.top)
	for i := len(r.under) - 1; i >= 0; i-- {
		out.add(r.under[i].X, r.under[i].Y)
	}
	// The last point may close the outline onto the first.
	if n := len(out); math.Hypot(out[n-1].X-out[0].X, out[n-1].Y-out[0].Y) <= sameLevel {
		out = out[:n-1]
	}
	return out
}

// shifted returns a profile moved vertically by dy.
func shifted(p lem.Profile, dy float64) lem.Profile {
	q := slices.Clone(p)
	for i := range q {
		q[i].Y += dy
	}
	return q
}
