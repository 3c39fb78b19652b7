package lem

import "math"

// polylineAt returns the level of a polyline at x; its end segments run on. i is a cursor: the segment last used.
func polylineAt(nodes []Point, i int, x float64) (y float64, segment int) {
	for i+2 < len(nodes) && x > nodes[i+1].X {
		i++
	}
	for i > 0 && x < nodes[i].X {
		i--
	}
	a, b := nodes[i], nodes[i+1]
	return a.Y + (b.Y-a.Y)*(x-a.X)/(b.X-a.X), i
}

// walkPolyline calls visit for every interval of x on which ground, layers and polyline are all straight, from left to right.
func (m *Model) walkPolyline(nodes []Point, from, to float64, visit func(col *column, x0, y0, x1, y1 float64)) {
	x := from
	y, seg := polylineAt(nodes, 0, x)
	for i := m.columnAt(from); i < len(m.cols) && x < to; i++ {
		col := &m.cols[i]
		end := min(col.x1, to)
		for x < end {
			next := end
			for _, n := range nodes[1 : len(nodes)-1] {
				if n.X > x && n.X < next {
					next = n.X
				}
			}
			var yn float64
			yn, seg = polylineAt(nodes, seg, next)
			visit(col, x, y, next, yn)
			x, y = next, yn
		}
	}
}

// polylineParts lists in ws.parts the intervals where a polyline, its ends run on, lies below the ground.
func (m *Model) polylineParts(ws *Workspace, s *Slip) {
	ws.parts = ws.parts[:0]
	if len(s.Nodes) < 2 {
		return
	}
	start, under := math.NaN(), false
	m.walkPolyline(s.Nodes, m.cols[0].x0, m.cols[len(m.cols)-1].x1, func(col *column, x0, y0, x1, y1 float64) {
		d0, d1 := col.ground.at(x0)-y0, col.ground.at(x1)-y1
		if d0 > 0 == (d1 > 0) {
			under = d1 > 0
			return
		}
		x := x0 + (x1-x0)*d0/(d0-d1)
		if d1 > 0 {
			start, under = x, true
			return
		}
		if under && !math.IsNaN(start) {
			ws.parts = append(ws.parts, part{start, x, m.columnAt(start), m.columnAt(x)})
		}
		start, under = math.NaN(), false
	})
}

// polylineDepth returns the greatest vertical depth of a part and whether it clears the firm base.
func (m *Model) polylineDepth(p part, s *Slip) (depth float64, clear bool) {
	clear = true
	m.walkPolyline(s.Nodes, p.from, p.to, func(col *column, x0, y0, x1, y1 float64) {
		depth = max(depth, col.ground.at(x0)-y0, col.ground.at(x1)-y1)
		tol := baseTolerance * (p.to - p.from)
		clear = clear && y0 >= col.firm.at(x0)-tol && y1 >= col.firm.at(x1)-tol
	})
	return depth, clear
}

// slicePolyline cuts a part of a polyline into slices; nodes and column edges are always slice edges.
func (m *Model) slicePolyline(ws *Workspace, p part, s *Slip, target int) {
	ws.n, ws.arc = 0, false
	width := (p.to - p.from) / float64(max(target, MinSlices))
	m.walkPolyline(s.Nodes, p.from, p.to, func(col *column, x0, y0, x1, y1 float64) {
		n := max(1, int(math.Ceil((x1-x0)/width-crossingMargin)))
		k := col.first
		for i := range n {
			t0, t1 := float64(i)/float64(n), float64(i+1)/float64(n)
			k = m.addBase(ws, col, k, x0+(x1-x0)*t0, y0+(y1-y0)*t0, x0+(x1-x0)*t1, y0+(y1-y0)*t1)
		}
	})
}
