package lem

import (
	"math"
	"sort"
)

// columnAt returns the index of the column that holds x, the right-hand one at an edge; the outermost beyond the ends.
func (m *Model) columnAt(x float64) int {
	i := sort.Search(len(m.cols), func(k int) bool { return m.cols[k].x1 > x })
	return min(i, len(m.cols)-1)
}

// span returns the part from x0 to x1.
func (m *Model) span(x0, x1 float64) part { return part{x0, x1, m.columnAt(x0), m.columnAt(x1)} }

// circleParts lists in ws.parts the intervals where the lower arc of a circle lies below the ground and both ends daylight. It
// reports whether some part was left out because the arc does not come up to the ground.
func (m *Model) circleParts(ws *Workspace, c Point, r float64) (cut bool) {
	ws.parts = ws.parts[:0]
	first := &m.cols[0]
	last := &m.cols[len(m.cols)-1]
	lo, hi := max(c.X-r, first.x0), min(c.X+r, last.x1)
	if !(lo < hi) {
		return false
	}
	r2 := r * r
	// below reports whether the arc passes under the ground level y at x; the arc is a function of x only below its centre.
	below := func(x, y float64) bool {
		dx, dy := x-c.X, y-c.Y
		return dy >= 0 || dx*dx+dy*dy < r2
	}
	const nowhere = math.MaxFloat64
	start, startCol := nowhere, 0
	i := m.columnAt(lo)
	under := below(lo, m.cols[i].ground.at(lo))
	open := under // This part began without daylight.
	for ; i < len(m.cols) && m.cols[i].x0 < hi; i++ {
		col := &m.cols[i]
		a, b := max(col.x0, lo), min(col.x1, hi)
		g := col.ground
		next := below(b, g.at(b))
		if under && next {
			continue
		}
		// Crossings of the straight ground and the lower arc: A dx^2 + 2 B dx + C = 0.
		e := g.at(c.X) - c.Y
		qa, qb, qc := 1+g.b*g.b, e*g.b, e*e-r2
		disc := qb*qb - qa*qc
		if disc <= 0 && under == next {
			continue
		}
		root := math.Sqrt(max(disc, 0))
		x1, x2 := c.X+(-qb-root)/qa, c.X+(-qb+root)/qa
		switch {
		case !under && next: // The arc goes under at one of them.
			start, startCol = nearest(a, b, x1, x2, g, c.Y), i
		case under && !next:
			end := nearest(a, b, x2, x1, g, c.Y)
			if start != nowhere && !open {
				ws.parts = append(ws.parts, part{start, end, startCol, i})
			} else {
				cut = true
			}
			start, open = nowhere, false
		default: // Under in the middle of a straight ground only.
			if x1 > a && x2 < b && g.at(x1) < c.Y && g.at(x2) < c.Y {
				ws.parts = append(ws.parts, part{x1, x2, i, i})
			}
		}
		under = next
	}
	return cut || open || start != nowhere
}

// nearest returns the root that lies in [a, b], the preferred one first, clamped against rounding.
func nearest(a, b, preferred, other float64, g line, top float64) float64 {
	if preferred >= a && preferred <= b && g.at(preferred) <= top {
		return preferred
	}
	if other >= a && other <= b && g.at(other) <= top {
		return other
	}
	return min(max(preferred, a), b)
}

// circleDepth returns the greatest vertical depth of an arc below the ground over the part, m.
func (m *Model) circleDepth(p part, c Point, r float64) float64 {
	var d float64
	for i := p.first; i <= p.last; i++ {
		col := &m.cols[i]
		// The depth is concave over straight ground, greatest where the arc runs parallel to it.
		x := min(max(c.X+col.tangent*r, col.x0, p.from), col.x1, p.to)
		dx := x - c.X
		d = max(d, col.ground.at(x)-c.Y+math.Sqrt(max(0, r*r-dx*dx)))
	}
	return d
}

// circleClearsBase reports whether an arc stays above the firm base over the part.
func (m *Model) circleClearsBase(p part, c Point, r float64) bool {
	for i := p.first; i <= p.last; i++ {
		col := &m.cols[i]
		if math.IsInf(col.firm.a, -1) {
			continue
		}
		sin := col.firm.b / math.Hypot(1, col.firm.b)
		x := min(max(c.X+sin*r, col.x0, p.from), col.x1, p.to)
		dx := x - c.X
		if c.Y-math.Sqrt(max(0, r*r-dx*dx)) < col.firm.at(x)-baseTolerance*r {
			return false
		}
	}
	return true
}

// baseTolerance is the share of the radius by which an arc may touch the firm base: tangent slips are the point of a firm base.
const baseTolerance = 1e-9
