package lem

import "math"

// daylightShare is the depth, as a share of the width of the ground, within which an end node of a polyline counts as lying on the ground,
// so that rounding does not make its end segment run on.
const daylightShare = 1e-9

// polylineAt returns the level of a polyline at x; its end segments run on.
func polylineAt(nodes []Point, x float64) float64 {
	i := 0
	for i+2 < len(nodes) && x > nodes[i+1].X {
		i++
	}
	a, b := nodes[i], nodes[i+1]
	return a.Y + (b.Y-a.Y)*(x-a.X)/(b.X-a.X)
}

// polyWalk goes along a polyline from left to right by intervals of x on which ground, layers and polyline are all straight.
type polyWalk struct {
	m              *Model
	nodes          []Point
	to             float64
	col, seg       int
	at             *column // The interval: its column
	x0, y0, x1, y1 float64 // and its ends on the polyline.
}

// walk starts a walk at x = from, in the column with index col; next goes to the first interval.
func (m *Model) walk(nodes []Point, from, to float64, col int) polyWalk {
	return polyWalk{m: m, nodes: nodes, to: to, col: col, x1: from, y1: polylineAt(nodes, from)}
}

// next goes to the next interval and reports whether there is one.
func (w *polyWalk) next() bool {
	if w.x1 >= w.to {
		return false
	}
	w.x0, w.y0 = w.x1, w.y1
	for w.col+1 < len(w.m.cols) && w.m.cols[w.col].x1 <= w.x0 {
		w.col++
	}
	for w.seg+2 < len(w.nodes) && w.nodes[w.seg+1].X <= w.x0 {
		w.seg++
	}
	w.at = &w.m.cols[w.col]
	w.x1 = w.to
	if w.col+1 < len(w.m.cols) {
		w.x1 = min(w.x1, w.at.x1)
	}
	a, b := w.nodes[w.seg], w.nodes[w.seg+1]
	if w.seg+2 < len(w.nodes) && b.X <= w.x1 {
		w.x1, w.y1 = b.X, b.Y
		return true
	}
	w.y1 = a.Y + (b.Y-a.Y)*(w.x1-a.X)/(b.X-a.X)
	return true
}

// daylight returns where the line through a, running on in the direction away from b, comes up to the ground, and whether it does. If a is not
// below the ground that is at a.
func (m *Model) daylight(a, b Point) (float64, bool) {
	i := m.columnAt(a.X)
	if m.cols[i].ground.at(a.X)-a.Y <= daylightShare*(m.right-m.left) {
		return a.X, true
	}
	slope := (b.Y - a.Y) / (b.X - a.X)
	step, x := 1, a.X
	if b.X > a.X {
		step = -1
	}
	for ; i >= 0 && i < len(m.cols); i += step {
		col := &m.cols[i]
		end := col.x1
		if step < 0 {
			end = col.x0
		}
		d0, d1 := col.ground.at(x)-a.Y-slope*(x-a.X), col.ground.at(end)-a.Y-slope*(end-a.X)
		if d1 <= 0 {
			if d0 <= d1 { // The ground falls below the line in a step.
				return x, true
			}
			return x + (end-x)*d0/(d0-d1), true
		}
		x = end
	}
	return a.X, false
}

// polylineParts lists in ws.parts the intervals where a polyline lies below the ground. An end node below the ground has its end segment run on
// to the first daylight; it reports whether some part was left out because there is none.
func (m *Model) polylineParts(ws *Workspace, s *Slip) (cut bool) {
	ws.parts = ws.parts[:0]
	n := len(s.Nodes)
	if n < 2 {
		return false
	}
	from, openLeft := m.daylight(s.Nodes[0], s.Nodes[1])
	to, openRight := m.daylight(s.Nodes[n-1], s.Nodes[n-2])
	if !(from < to) || from < m.cols[0].x0 || to > m.cols[len(m.cols)-1].x1 {
		return !openLeft || !openRight
	}
	start, startCol, under := from, 0, false
	if !openLeft {
		start = math.NaN()
	}
	w := m.walk(s.Nodes, from, to, m.columnAt(from))
	for w.next() {
		d0, d1 := w.at.ground.at(w.x0)-w.y0, w.at.ground.at(w.x1)-w.y1
		switch {
		case !under && d1 > 0: // Goes under, here or where it starts.
			x := w.x0
			if d0 < 0 {
				x = w.x0 + (w.x1-w.x0)*d0/(d0-d1)
			}
			if w.x0 > from || openLeft {
				start = x
			}
			startCol, under = w.col, true
		case under && d1 <= 0:
			x := w.x0 + (w.x1-w.x0)*d0/(d0-d1)
			cut = !ws.addPart(part{start, x, startCol, w.col}) || cut
			under = false
		}
	}
	if under {
		if !openRight {
			return true
		}
		cut = !ws.addPart(part{start, to, startCol, w.col}) || cut
	}
	return cut
}

// addPart files a part and reports whether it has a beginning.
func (ws *Workspace) addPart(p part) bool {
	if math.IsNaN(p.from) {
		return false
	}
	if p.to > p.from {
		ws.parts = append(ws.parts, p)
	}
	return true
}

// polylineDepth returns the greatest vertical depth of a part and whether it clears the firm base.
func (m *Model) polylineDepth(p part, s *Slip) (depth float64, clear bool) {
	clear = true
	tol := baseTolerance * (p.to - p.from)
	w := m.walk(s.Nodes, p.from, p.to, p.first)
	for w.next() {
		depth = max(depth, w.at.ground.at(w.x0)-w.y0, w.at.ground.at(w.x1)-w.y1)
		clear = clear && w.y0 >= w.at.firm.at(w.x0)-tol && w.y1 >= w.at.firm.at(w.x1)-tol
	}
	return depth, clear
}

// leastShare is the least width of a slice of a polyline, as a share of that aimed at.
const leastShare = 1e-9

// slicePolyline cuts a part of a polyline into slices; nodes and column edges are always slice edges.
func (m *Model) slicePolyline(ws *Workspace, p part, s *Slip, target int) {
	ws.n, ws.wet, ws.arc = 0, false, false
	width := (p.to - p.from) / float64(max(target, MinSlices))
	w := m.walk(s.Nodes, p.from, p.to, p.first)
	for w.next() {
		if w.x1-w.x0 <= leastShare*width { // Left over by rounding: its slope would be anything.
			continue
		}
		n := max(1, int(math.Ceil((w.x1-w.x0)/width-crossingMargin)))
		k := w.at.first
		dx, dy := (w.x1-w.x0)/float64(n), (w.y1-w.y0)/float64(n)
		x0, y0 := w.x0, w.y0
		for i := range n {
			x1, y1 := w.x0+dx*float64(i+1), w.y0+dy*float64(i+1)
			k = m.addBase(ws, w.at, k, x0, y0, x1, y1)
			x0, y0 = x1, y1
		}
	}
}
