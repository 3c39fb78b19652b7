package cli

import (
	"cmp"
	"math"
	"slices"
)

// A stranger's search for the lowest circle: every centre of a plain grid with circles down to every level of another, each with Bishop's
// method as the stranger has it, then the lowest of them moved about as long as F falls. It has nothing of the program's searches.

// theirCircle is a circle by its centre and the level of its lowest point, with F by many slices.
type theirCircle struct{ x, y, low, f float64 }

// The grid, and how its lowest circles are moved.
const (
	gridAcross, gridUp, gridDown = 17, 13, 14 // Centres across and up, levels of lowest points.
	gridBest                     = 6          // Circles that are moved about.
	gridFinest                   = 0.03       // m: the last step that they are moved by.
	gridSlices                   = 16
)

// under returns the stretches in which the lower arc of a circle lies under a line, between its crossings with every straight of it.
func (l theirLine) under(c theirPoint, r float64) (out [][2]float64) {
	var xs []float64
	for i := 1; i < len(l); i++ {
		a, b := l[i-1], l[i]
		dx, dy, fx, fy := b[0]-a[0], b[1]-a[1], a[0]-c[0], a[1]-c[1]
		qa, qb := dx*dx+dy*dy, fx*dx+fy*dy
		disc := qb*qb - qa*(fx*fx+fy*fy-r*r)
		if disc <= 0 {
			continue
		}
		for _, root := range []float64{-math.Sqrt(disc), math.Sqrt(disc)} {
			if w := (root - qb) / qa; w >= 0 && w <= 1 && a[1]+w*dy <= c[1] {
				xs = append(xs, a[0]+w*dx)
			}
		}
	}
	slices.Sort(xs)
	for i := 1; i < len(xs); i++ {
		mid := (xs[i-1] + xs[i]) / 2
		if y, _ := arc(c, r)(mid); xs[i]-xs[i-1] > 0.01 && y < l.at(mid) {
			out = append(out, [2]float64{xs[i-1], xs[i]})
		}
	}
	return out
}

// onCircle returns the least F of the parts of a circle that lie in the ground, +Inf if none counts.
func (g *stranger) onCircle(c theirCircle, n int) float64 {
	least := math.Inf(1)
	r := c.y - c.low
	for _, part := range g.section.Ground.under(theirPoint{c.x, c.y}, r) {
		least = min(least, g.counted(theirPoint{c.x, c.y}, r, part[0], part[1], n))
	}
	return least
}

// searchGrid goes through the grid and moves the lowest circles about. It returns them, the lowest first.
func (g *stranger) searchGrid() []theirCircle {
	ground := g.section.Ground
	bottom, top := math.Inf(1), math.Inf(-1)
	for _, p := range ground {
		bottom, top = min(bottom, p[1]), max(top, p[1])
	}
	height, left, width := top-bottom, ground[0][0], ground[len(ground)-1][0]-ground[0][0]
	step := theirCircle{x: width / (gridAcross + 1), y: 3 * height / gridUp, low: 2 * height / gridDown}
	var all []theirCircle
	for i := range gridAcross {
		for k := range gridUp {
			for m := range gridDown {
				c := theirCircle{x: left + step.x*float64(i+1), y: bottom + height/2 + step.y*float64(k), low: top - step.low*(float64(m)+0.5)}
				if c.f = g.onCircle(c, gridSlices); !math.IsInf(c.f, 1) {
					all = append(all, c)
				}
			}
		}
	}
	slices.SortFunc(all, func(a, b theirCircle) int { return cmp.Compare(a.f, b.f) })
	var best []theirCircle
	for _, c := range all {
		near := func(b theirCircle) bool {
			return math.Abs(b.x-c.x) < 1.5*step.x && math.Abs(b.y-c.y) < 1.5*step.y && math.Abs(b.low-c.low) < 1.5*step.low
		}
		if len(best) < gridBest && !slices.ContainsFunc(best, near) {
			best = append(best, c)
		}
	}
	for i := range best {
		best[i] = g.move(best[i], step, 0)
	}
	slices.SortFunc(best, func(a, b theirCircle) int { return cmp.Compare(a.f, b.f) })
	return best
}

// move moves a circle along its three coordinates as long as F falls, by steps that are halved, until F is below enough.
func (g *stranger) move(c, step theirCircle, enough float64) theirCircle {
	const n = fewSlices
	c.f = g.onCircle(c, n)
	for max(step.x, step.y, step.low) > gridFinest {
		better := c
		for _, d := range []theirCircle{{x: step.x}, {x: -step.x}, {y: step.y}, {y: -step.y}, {low: step.low}, {low: -step.low}} {
			d = theirCircle{x: c.x + d.x, y: c.y + d.y, low: c.low + d.low}
			if d.f = g.onCircle(d, n); d.f < better.f {
				better = d
			}
		}
		if better == c {
			step = theirCircle{x: step.x / 2, y: step.y / 2, low: step.low / 2}
		}
		if c = better; c.f < enough {
			break
		}
	}
	c.f = g.onCircle(c, someSlices)
	return c
}

// onPolyline returns the least F of a polyline on this section, +Inf if no part of it counts: cut by the ground, and where an end of it
// lies in the ground its last straight runs on to the first daylight.
func (g *stranger) onPolyline(l theirLine, by solution, n int) float64 {
	const step = 0.01 // m, within which daylight is found.
	ground, end := g.section.Ground, len(l)-1
	base := func(x float64) (y, sin float64) {
		_, sin = chain(l)(min(max(x, l[0][0]), l[end][0]))
		corner := l[0]
		if x > l[end][0] {
			corner = l[end]
		} else if x >= l[0][0] {
			return l.at(x), sin
		}
		return corner[1] - (x-corner[0])*sin/math.Sqrt(1-sin*sin), sin
	}
	under := func(x float64) bool { y, _ := base(x); return y < ground.at(x) }
	from, to := l[0][0], l[end][0]
	for from > ground[0][0] && under(from) {
		from -= step
	}
	for to < ground[len(ground)-1][0] && under(to) {
		to += step
	}
	least, start := math.Inf(1), math.NaN()
	for x := from; x <= to+step; x += step {
		switch in := x <= to && under(x); {
		case in && math.IsNaN(start):
			start = x
		case !in && !math.IsNaN(start):
			if ss, ok := g.cut(base, start, x-step, n); ok {
				if f, _ := g.solve(ss, by); f < least {
					least = f
				}
			}
			start = math.NaN()
		}
	}
	return least
}
