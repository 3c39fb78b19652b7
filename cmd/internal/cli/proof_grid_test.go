package cli

import (
	"cmp"
	"math"
	"math/rand/v2"
	"slices"
)

// A stranger's search for the lowest circle: every centre of a plain grid with circles down to every level of another, and circles through
// every two of many points of the ground, which stand closer where it bends; each with Bishop's method as the stranger has it, then the lowest of
// them moved about at random as long as F falls. It has nothing of the program's searches.

// theirCircle is a circle by its centre and the level of its lowest point, with F by many slices.
type theirCircle struct{ x, y, low, f float64 }

// The grids, and how their lowest circles are moved.
const (
	gridAcross, gridUp, gridDown = 17, 13, 14 // Centres across and up, levels of lowest points.
	gridStations, gridAngles     = 28, 6      // Points of the ground, besides those where it bends; half angles of arcs.
	gridFlattest                 = 0.15       // Fall of the chord of an arc between two points.
	gridBest                     = 5          // Circles of each grid that are moved about.
	gridMoves, gridShrink        = 220, 0.975 // How often, and by what the moves become smaller.
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

// seed is a circle with the size of the moves that are to be tried on it.
type seed struct{ circle, step theirCircle }

// searchGrid goes through both grids and moves the lowest circles about. It returns them, the lowest first.
func (g *stranger) searchGrid() []theirCircle {
	var best []theirCircle
	for _, seeds := range [][]seed{g.byCentres(), g.byDaylight()} {
		slices.SortFunc(seeds, func(a, b seed) int { return cmp.Compare(a.circle.f, b.circle.f) })
		var kept []seed
		for _, s := range seeds {
			near := func(k seed) bool {
				a, b, far := s.circle, k.circle, min(s.step.x, k.step.x)
				return max(math.Abs(a.x-b.x), math.Abs(a.y-b.y), 2*math.Abs(a.low-b.low)) < 1.5*far
			}
			if len(kept) < gridBest && !slices.ContainsFunc(kept, near) {
				kept = append(kept, s)
				best = append(best, g.move(s.circle, s.step, 0))
			}
		}
	}
	slices.SortFunc(best, func(a, b theirCircle) int { return cmp.Compare(a.f, b.f) })
	return best
}

// byCentres returns the circles of the grid of centres that count.
func (g *stranger) byCentres() (out []seed) {
	ground := g.section.Ground
	bottom, top := math.Inf(1), math.Inf(-1)
	for _, p := range ground {
		bottom, top = min(bottom, p[1]), max(top, p[1])
	}
	height, left, width := top-bottom, ground[0][0], ground[len(ground)-1][0]-ground[0][0]
	step := theirCircle{x: width / (gridAcross + 1), y: 3 * height / gridUp, low: 2 * height / gridDown}
	for i := range gridAcross {
		for k := range gridUp {
			for m := range gridDown {
				c := theirCircle{x: left + step.x*float64(i+1), y: bottom + height/2 + step.y*float64(k), low: top - step.low*(float64(m)+0.5)}
				if c.f = g.onCircle(c, gridSlices); !math.IsInf(c.f, 1) {
					out = append(out, seed{c, step})
				}
			}
		}
	}
	return out
}

// byDaylight returns the circles through two points of the ground that count.
func (g *stranger) byDaylight() (out []seed) {
	ground := g.section.Ground
	left, right := ground[0][0], ground[len(ground)-1][0]
	var xs []float64
	for i := 1; i < gridStations; i++ {
		xs = append(xs, left+(right-left)*float64(i)/gridStations)
	}
	for _, p := range ground[1 : len(ground)-1] {
		for _, beside := range []float64{0.02, 0.7, 1.5, 3} {
			xs = append(xs, p[0]-beside, p[0]+beside)
		}
	}
	slices.Sort(xs)
	for i, a := range xs {
		for _, b := range xs[i+1:] {
			ya, yb := ground.at(a), ground.at(b)
			chord := math.Hypot(b-a, yb-ya)
			if a < left || b > right || math.Abs(ya-yb) < gridFlattest*(b-a) || chord < g.file.Settings.Depth {
				continue
			}
			for k := range gridAngles {
				half := math.Pi / 2 * (float64(k) + 0.7) / gridAngles
				up, r := chord/2/math.Tan(half), chord/2/math.Sin(half)
				c := theirPoint{(a+b)/2 - (yb-ya)/chord*up, (ya+yb)/2 + (b-a)/chord*up}
				if f := g.counted(c, r, a, b, gridSlices); !math.IsInf(f, 1) {
					out = append(out, seed{theirCircle{c[0], c[1], c[1] - r, f}, theirCircle{x: chord / 8, y: chord / 8, low: chord / 20}})
				}
			}
		}
	}
	return out
}

// move moves a circle at random as long as F falls, by steps that become smaller, until F is below enough.
func (g *stranger) move(c, step theirCircle, enough float64) theirCircle {
	rng := rand.New(rand.NewPCG(1, 2))
	c.f = g.onCircle(c, fewSlices)
	for size := 1.0; size > math.Pow(gridShrink, gridMoves) && c.f >= enough; size *= gridShrink {
		n := func() float64 { return size * rng.NormFloat64() }
		d := theirCircle{x: c.x + step.x*n(), y: c.y + step.y*n(), low: c.low + step.low*n()}
		if d.f = g.onCircle(d, fewSlices); d.f < c.f {
			c = d
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
