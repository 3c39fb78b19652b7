package lem

import (
	"math"
	"slices"
)

// Constants of rails.
const (
	hairShare     = 2e-5 // A slip along a boundary runs this share of the width inside the weaker side, clear of rounding.
	steepestRail  = 2.0  // Slope beyond which a boundary is a face, not a rail.
	shortestRail  = 0.02 // Share of the width below which a boundary guides no slip.
	sidesDiffer   = 0.15 // Both sides of a boundary are rails if each is the weaker over at least this share of its length.
	collinearHair = 0.1  // Vertices off the line of their neighbours by less than this share of a hair are left out.
)

// rail is a line below the ground that slips may run along: a hair inside the weaker side of a boundary between soils, just above the firm
// base, or a known slip surface.
type rail struct {
	pts []Point // X strictly increasing.
}

func (r *rail) from() float64 { return r.pts[0].X }

func (r *rail) to() float64 { return r.pts[len(r.pts)-1].X }

func (r *rail) at(x float64) Point { return Point{x, polylineAt(r.pts, x)} }

// appendBetween appends the vertices of the rail inside an interval.
func (r *rail) appendBetween(dst []Point, from, to float64) []Point {
	for _, p := range r.pts {
		if p.X > from && p.X < to {
			dst = append(dst, p)
		}
	}
	return dst
}

// boundary is a line between two soils as it is pieced together from the columns, with the shear strength on both sides of every piece.
type boundary struct {
	pts          []Point
	above, below []float64 // kPa, at F = 1, one value a piece; below is +Inf for the firm base.
}

// rails lists the rails of the section.
func (m *Model) rails(ws *Workspace) []rail {
	width := m.right - m.left
	var out []rail
	for _, b := range m.boundaries() {
		if b.pts[len(b.pts)-1].X-b.pts[0].X < shortestRail*width {
			continue
		}
		upper := b.shareAbove()
		if upper > sidesDiffer {
			out = append(out, b.offset(hairShare*width))
		}
		if upper < 1-sidesDiffer {
			out = append(out, b.offset(-hairShare*width))
		}
	}
	for _, nodes := range m.known {
		m.polylineParts(ws, &Slip{Kind: Polyline, Nodes: nodes})
		for _, p := range ws.parts {
			r := rail{nodes}
			pts := r.appendBetween([]Point{r.at(p.from)}, p.from, p.to)
			out = append(out, rail{append(pts, r.at(p.to))})
		}
	}
	return out
}

// beds lists the boundaries between soils, moved up by a hair, that circles may rest on.
func (m *Model) beds() []rail {
	width := m.right - m.left
	var out []rail
	for _, b := range m.boundaries() {
		if b.pts[len(b.pts)-1].X-b.pts[0].X >= shortestRail*width && !math.IsInf(b.below[0], 1) {
			out = append(out, b.offset(hairShare*width))
		}
	}
	return out
}

// rises returns how far the rail comes up above the lower arc of a circle at most, between two x, m; negative if it stays below.
func (r *rail) rises(c Point, radius, from, to float64) float64 {
	most := math.Inf(-1)
	r2 := radius * radius
	for i := 1; i < len(r.pts); i++ {
		a, b := r.pts[i-1], r.pts[i]
		x0, x1 := max(a.X, from), min(b.X, to)
		if x0 > x1 {
			continue
		}
		k := (b.Y - a.Y) / (b.X - a.X)
		x := min(max(c.X+radius*k/math.Hypot(1, k), x0), x1) // Where the arc is parallel.
		dx := x - c.X
		most = max(most, a.Y+k*(x-a.X)-c.Y+math.Sqrt(max(0, r2-dx*dx)))
	}
	return most
}

// shareAbove returns over what share of its length the soil above is the weaker.
func (b *boundary) shareAbove() float64 {
	var length, upper float64
	for i := range b.above {
		l := b.pts[i+1].X - b.pts[i].X
		length += l
		if b.above[i] <= b.below[i] {
			upper += l
		}
	}
	return upper / length
}

// offset returns the boundary moved up by dy, without the vertices that do not bend it.
func (b *boundary) offset(dy float64) rail {
	tol := math.Abs(dy) * collinearHair
	var out []Point
	for i, p := range b.pts {
		p.Y += dy
		if n := len(out); n > 0 && i+1 < len(b.pts) {
			q, next := out[n-1], b.pts[i+1]
			next.Y += dy
			if on := q.Y + (next.Y-q.Y)*(p.X-q.X)/(next.X-q.X); math.Abs(on-p.Y) <= tol {
				continue
			}
		}
		out = append(out, p)
	}
	return rail{out}
}

// boundaries pieces the bottoms of layers, and the firm base, together from column to column where they meet.
func (m *Model) boundaries() []boundary {
	width := m.right - m.left
	meet := hairShare * width
	var done, open []boundary
	for i := range m.cols {
		c := &m.cols[i]
		var grown []boundary
		for _, p := range m.piecesIn(c) {
			k := slices.IndexFunc(open, func(b boundary) bool { return math.Abs(b.pts[len(b.pts)-1].Y-p.pts[0].Y) < meet })
			if k < 0 {
				grown = append(grown, p)
				continue
			}
			b := open[k]
			open = slices.Delete(open, k, k+1)
			b.pts = append(b.pts, p.pts[1])
			b.above, b.below = append(b.above, p.above...), append(b.below, p.below...)
			grown = append(grown, b)
		}
		done = append(done, open...)
		open = grown
	}
	return append(done, open...)
}

// piecesIn returns the boundaries of one column.
func (m *Model) piecesIn(c *column) []boundary {
	var out []boundary
	xm := (c.x0 + c.x1) / 2
	add := func(l line, above, below float64) {
		if math.Abs(l.b) <= steepestRail {
			out = append(out, boundary{[]Point{{c.x0, l.at(c.x0)}, {c.x1, l.at(c.x1)}}, []float64{above}, []float64{below}})
		}
	}
	last := &m.layers[c.first]
	for k := c.first; k < c.last; k++ {
		l := &m.layers[k]
		last = l
		if k+1 == c.last || l.bottom.at(xm) <= c.firm.at(xm) {
			break
		}
		if next := &m.layers[k+1]; next.soil != l.soil {
			y := l.bottom.at(xm)
			add(l.bottom, m.strengthAt(c, l, xm, y), m.strengthAt(c, next, xm, y))
		}
	}
	if m.firm && c.firm.at(xm) < c.ground.at(xm) {
		add(c.firm, m.strengthAt(c, last, xm, c.firm.at(xm)), math.Inf(1))
	}
	return out
}

// strengthAt returns the shear strength of a layer on a level base under the weight of what lies above, kPa.
func (m *Model) strengthAt(c *column, l *layer, x, y float64) float64 {
	s := slice{x: x, y: y, b: 1, cos: 1}
	m.fill(&s, c, l, 1)
	return s.frees
}
