package lem

import "math"

// crossingMargin is the share of a slice's width within which a boundary is taken to pass through the slice's end.
const crossingMargin = 1e-6

// sliceCircle cuts a part of a circle into slices whose bases are chords: never across a column's edge, and cut again where the base
// passes from one layer into the next, so that the answer converges with the square of the slice width.
func (m *Model) sliceCircle(ws *Workspace, p part, c Point, r float64, target int) {
	ws.n, ws.curvature = 0, 1/r
	width := (p.to - p.from) / float64(max(target, MinSlices))
	r2 := r * r
	x, y := p.from, c.Y-math.Sqrt(max(0, r2-(p.from-c.X)*(p.from-c.X)))
	for i := m.columnAt(p.from); i < len(m.cols) && m.cols[i].x0 < p.to; i++ {
		col := &m.cols[i]
		b := min(col.x1, p.to)
		if b <= x {
			continue
		}
		a := x
		n := max(1, int(math.Ceil((b-a)/width-crossingMargin)))
		step := (b - a) / float64(n)
		k := col.first // Layer at the left end of the next slice.
		for s := 1; s <= n; s++ {
			xr := a + float64(s)*step
			if s == n {
				xr = b
			}
			dx := xr - c.X
			yr := c.Y - math.Sqrt(max(0, r2-dx*dx))
			k = m.addBase(ws, col, k, x, y, xr, yr)
			x, y = xr, yr
		}
	}
}

// layerAt returns the layer of the column at a point, starting from layer k.
func (m *Model) layerAt(col *column, k int32, x, y float64) int32 {
	for k > col.first && y > m.layers[k-1].bottom.at(x) {
		k--
	}
	for k < col.last-1 && y < m.layers[k].bottom.at(x) {
		k++
	}
	return k
}

// addBase adds the slice over a chord from (x0,y0) to (x1,y1) in one column, cut where it crosses from layer to layer. It returns the
// layer at the right end.
func (m *Model) addBase(ws *Workspace, col *column, k int32, x0, y0, x1, y1 float64) int32 {
	if col.last-col.first == 1 {
		m.addSlice(ws, col, col.first, x0, y0, x1, y1)
		return k
	}
	slope := (y1 - y0) / (x1 - x0)
	inset := (x1 - x0) * crossingMargin
	kl := m.layerAt(col, k, x0+inset, y0+slope*inset)
	kr := m.layerAt(col, kl, x1-inset, y1-slope*inset)
	for kl != kr {
		edge, next := m.layers[kl].bottom, kl+1 // The boundary that is crossed on the way to kr.
		if kr < kl {
			edge, next = m.layers[kl-1].bottom, kl-1
		}
		xc := (edge.a - y0 + slope*x0) / (slope - edge.b)
		if xc > x0+inset && xc < x1-inset {
			yc := y0 + slope*(xc-x0)
			m.addSlice(ws, col, kl, x0, y0, xc, yc)
			x0, y0 = xc, yc
		}
		kl = next
	}
	m.addSlice(ws, col, kr, x0, y0, x1, y1)
	return kr
}

// addSlice adds one slice whose base lies in layer k of the column.
func (m *Model) addSlice(ws *Workspace, col *column, k int32, x0, y0, x1, y1 float64) {
	if ws.n == len(ws.slice) {
		ws.slice = append(ws.slice, make([]slice, 64)...)
	}
	s := &ws.slice[ws.n]
	ws.n++
	l := &m.layers[k]
	b, dy := x1-x0, y1-y0
	length := math.Sqrt(b*b + dy*dy)
	s.x, s.y, s.b = (x0+x1)/2, (y0+y1)/2, b
	s.cos, s.sin = b/length, -dy/length
	// An arc bulges below its chord: its mean level and its length, to the second order of the slice width.
	bulge := length * length * ws.curvature
	s.y -= bulge * length / (12 * b)
	length += bulge * length * ws.curvature / 24
	weight := l.sigma + l.slope*s.x - l.gamma*s.y
	s.soilW = (weight + col.pressure) * b
	s.q, s.h, s.k = s.soilW, 0, 0
	s.variable = col.variable
	s.ground = col.ground.at(s.x)
	if col.free > s.ground {
		p := GammaW * (col.free - s.ground) * b
		s.q += p
		s.h = p * col.ground.b
	}
	var u float64
	switch l.pore {
	case poreNone:
	case poreLine:
		u = GammaW * max(0, col.head(s.x, s.y)-s.y)
	case poreRu:
		u = l.ru * weight
	case poreLevel:
		u = GammaW * max(0, l.freeLevel-s.y)
	}
	c := l.c
	switch l.kind {
	case strengthConstant:
	case strengthGradient:
		c += l.gradient * max(0, l.datum.at(s.x)-s.y)
	case strengthPoints:
		c = undrainedAt(m.soils[l.soil].verticals, s.x, s.y)
	}
	s.tan = l.tan
	s.cl, s.ul = c*length, u*length
	s.frees = c*b + (s.q-u*b)*l.tan
	if m.kh != 0 {
		s.k = m.kh * s.soilW
		s.ky = m.weightLevel(col, k, s, weight)
	}
}

// head returns the level of the piezometric head at a point, drains counted: see Drawdown.
func (col *column) head(x, y float64) float64 {
	w := col.water.at(x)
	if col.fade == 0 {
		return w
	}
	inv := col.invert.at(x)
	if inv >= w {
		return w
	}
	r := col.ratio.at(x)
	switch {
	case y >= inv:
		return w - r*(w-y)
	case y > inv-col.fade:
		return w - r*(w-inv)*(1-(inv-y)/col.fade)
	}
	return w
}

// weightLevel returns the level at which the earthquake force on a slice acts: the centroid of soil and permanent surcharge.
func (m *Model) weightLevel(col *column, k int32, s *slice, weight float64) float64 {
	top := s.ground
	moment := col.pressure * top
	for i := col.first; i <= k; i++ {
		bottom := s.y
		if i < k {
			bottom = m.layers[i].bottom.at(s.x)
		}
		moment += m.layers[i].gamma * (top - bottom) * (top + bottom) / 2
		top = bottom
	}
	if total := weight + col.pressure; total > 0 {
		return moment / total
	}
	return s.y
}
